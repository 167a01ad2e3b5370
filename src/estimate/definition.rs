//! Every id of a result with its meaning.
use crate::quantity::Dimension;

mod table;

pub use table::DEFINITIONS;

/// What an id means.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Definition {
    /// Id, without the name of an obstacle (`clearance`).
    pub id: &'static str,
    /// Unit as in JSON.
    pub unit: &'static str,
    /// What it measures.
    pub dimension: Dimension,
    /// Short label for screens and text: `arrest force, peak`.
    pub label: &'static str,
    /// One sentence.
    pub meaning: &'static str,
}

/// The definition of an id, also of one that ends in the name of an obstacle.
#[must_use]
pub fn definition(id: &str) -> Option<&'static Definition> {
    let stem = id.split_once('.').map_or(id, |(stem, _)| stem);
    DEFINITIONS.iter().find(|d| d.id == stem)
}
