//! Everything an output needs about one file.
use crate::estimate::{Estimate, EstimateError};
use crate::margin::{Margin, UnknownBasis, Verdict};
use crate::scenario::Scenario;

/// One file's scenario, estimate and margins.
#[derive(Clone, Debug)]
pub struct Report {
    /// Name of the file as given.
    pub file: String,
    /// Hex SHA-256 of its bytes.
    pub scenario_sha256: String,
    /// The scenario.
    pub scenario: Scenario,
    /// The numbers.
    pub estimate: Estimate,
    /// The checks, governing first.
    pub margins: Vec<Margin>,
    /// The worst verdict.
    pub verdict: Verdict,
}

/// Why there is no report.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum ReportError {
    /// No estimate.
    #[error(transparent)]
    Estimate(#[from] EstimateError),
    /// Unknown set of limits.
    #[error(transparent)]
    Basis(#[from] UnknownBasis),
}

/// Solves and checks one scenario.
///
/// # Errors
/// See [`ReportError`].
pub fn report(_file: &str, _text: &str, _scenario: &Scenario) -> Result<Report, ReportError> {
    todo!()
}
