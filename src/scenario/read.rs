//! From TOML text to a scenario, collecting every fault.
use super::{Faults, Scenario};

/// Reads the text of a scenario file. Doubts (reserve missing, double counted stretch) do not refuse; see
/// [`super::Severity`].
///
/// # Errors
/// Every fault of the text at once, sorted by place.
pub fn read(_file: &str, _text: &str) -> Result<Scenario, Faults> {
    todo!()
}
