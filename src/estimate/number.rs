//! Numbers that come out, by id.
use crate::quantity::Dimension;

/// A number or a word.
#[derive(Clone, Debug, PartialEq)]
pub enum Value {
    /// SI value.
    Number(f64),
    /// A word, such as the damping regime.
    Text(String),
}

/// One result.
#[derive(Clone, Debug, PartialEq)]
pub struct Number {
    /// Stable id: `arrest_force_peak`, `clearance.plant-room_roof`.
    pub id: String,
    /// Its value.
    pub value: Value,
    /// What it measures; text has `Ratio`.
    pub dimension: Dimension,
    /// Unit as in JSON: `m`, `N`, `1`, `text`.
    pub unit: &'static str,
}

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

/// Every id with its meaning, in the order in which results are shown.
pub const DEFINITIONS: &[Definition] = &[];

/// The results of one run in the order of [`DEFINITIONS`]; an id that does not apply is not there.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Numbers(Vec<Number>);

impl Numbers {
    /// The SI value of an id, if it applies and is a number.
    #[must_use]
    pub fn get(&self, id: &str) -> Option<f64> {
        self.0.iter().find(|n| n.id == id).and_then(|n| match n.value {
            Value::Number(v) => Some(v),
            Value::Text(_) => None,
        })
    }
    /// All results in order.
    pub fn iter(&self) -> impl Iterator<Item = &Number> {
        self.0.iter()
    }
}

impl FromIterator<Number> for Numbers {
    fn from_iter<I: IntoIterator<Item = Number>>(numbers: I) -> Self {
        Self(numbers.into_iter().collect())
    }
}
