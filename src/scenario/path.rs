//! Addressing an input by its path.
use super::{Field, Scenario};
use crate::quantity::Measure;

/// One numeric input of a scenario, present in it.
#[derive(Clone, Debug, PartialEq)]
pub struct Input {
    /// Concrete path: `line.stiffness`, `obstacle.2.top` (numbers from 1).
    pub path: String,
    /// Its key's entry in the table.
    pub field: &'static Field,
    /// Its value.
    pub measure: Measure,
}

/// Every numeric input that the scenario holds, in file order.
#[must_use]
pub fn inputs(_scenario: &Scenario) -> Vec<Input> {
    todo!()
}

/// The scenario with the typical value of one input replaced (the band's ends kept where they still enclose it).
/// `None` when the scenario has no such input or the value is outside the field's range.
#[must_use]
pub fn with_value(_scenario: &Scenario, _path: &str, _value_si: f64) -> Option<Scenario> {
    todo!()
}
