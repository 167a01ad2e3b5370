//! Numbers with units to text.
use super::{Dimension, Unit, UnitSystem};

/// The unit in which a system shows a dimension (forces in kN or lbf, lengths in m or ft).
#[must_use]
pub fn display_unit(_dimension: Dimension, _system: UnitSystem) -> Unit {
    todo!()
}

/// `format_si(5123.0, Force, Metric)` is `5.12 kN`: a readable number of digits, always with its unit.
#[must_use]
pub fn format_si(_value_si: f64, _dimension: Dimension, _system: UnitSystem) -> String {
    todo!()
}

/// A value in one given unit, the shortest text that reads back to the same value within 12 digits.
#[must_use]
pub fn format_unit(_value_si: f64, _unit: Unit) -> String {
    todo!()
}
