//! Text to numbers with units.
use super::{Dimension, Measure, Unit};

/// Why a text is not a quantity; offsets are bytes into the text.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
#[error("todo")]
pub struct QuantityError;

/// Reads `1.8 m`, `6 ft 6 in`, `6 kN`: one value with its unit. Returns the SI value and the unit.
///
/// # Errors
/// When there is no number, it is not finite, or the unit is missing, unknown or of another dimension.
pub fn parse_quantity(_text: &str, _dimension: Dimension) -> Result<(f64, Unit), QuantityError> {
    todo!()
}

/// Reads a value or a band: `100 kg`, `80..120 kg`, `80..100..120 kg`.
///
/// # Errors
/// As [`parse_quantity`], and when the band is out of order.
pub fn parse_measure(_text: &str, _dimension: Dimension) -> Result<Measure, QuantityError> {
    todo!()
}
