//! The built-in published limits.
use crate::quantity::Unit;

/// How a value was confirmed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Mark {
    /// Read in the official text or an official guide.
    Published,
    /// Read in a secondary summary of it.
    Secondary,
    /// From memory, unverified; said wherever the value is shown.
    Memory,
}

/// One limit of a set.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PublishedLimit {
    /// What it limits, in words.
    pub quantity: &'static str,
    /// The value as the source states it.
    pub value: f64,
    /// The unit of the source.
    pub unit: Unit,
    /// Clause with year where known.
    pub clause: &'static str,
    /// How confirmed.
    pub mark: Mark,
}

/// A set of limits that belong together.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LimitSet {
    /// Name used in files: `eu-363`.
    pub name: &'static str,
    /// What it was written for.
    pub scope: &'static str,
    /// The limits.
    pub limits: &'static [PublishedLimit],
}

/// All built-in sets.
#[must_use]
pub fn limit_sets() -> &'static [LimitSet] {
    todo!()
}

/// A set by its name.
#[must_use]
pub fn limit_set(_name: &str) -> Option<&'static LimitSet> {
    todo!()
}
