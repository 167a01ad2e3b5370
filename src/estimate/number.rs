//! Numbers that come out, by id.
use super::definition::definition;
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
    /// Adds a number under an id of [`super::DEFINITIONS`]; an unknown id or a number that is not finite is left out.
    pub(super) fn put(&mut self, id: &str, value: f64) {
        if value.is_finite() {
            self.push(id, Value::Number(value));
        }
    }

    /// Adds a number where there is one.
    pub(super) fn put_some(&mut self, id: &str, value: Option<f64>) {
        if let Some(value) = value {
            self.put(id, value);
        }
    }

    pub(super) fn push(&mut self, id: &str, value: Value) {
        if let Some(d) = definition(id) {
            self.0.push(Number { id: id.to_owned(), value, dimension: d.dimension, unit: d.unit });
        }
    }

    /// Leaves some ids out.
    pub(super) fn forget(&mut self, ids: &[&str]) {
        self.0.retain(|number| !ids.contains(&number.id.as_str()));
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
