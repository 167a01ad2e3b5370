//! Numbers with units, and bands (low..typical..high): parse, print, convert.
//!
//! Everything inside the program is SI; a unit exists only where a number is read or shown.
mod band;
mod dimension;
mod display;
mod error;
mod parse;
mod unit;

pub use band::{Band, Measure, Shape};
pub use dimension::Dimension;
pub use display::{display_unit, format_band, format_measure, format_si, format_unit};
pub use error::QuantityError;
pub use parse::{parse_measure, parse_quantity};
pub use unit::{Unit, UnitSystem};
