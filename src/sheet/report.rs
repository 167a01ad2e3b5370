//! Everything an output needs about one file.
use super::ReportBands;
use crate::estimate::{Estimate, EstimateError, estimate};
use crate::margin::{Margin, Rules, UnknownBasis, Verdict, margins, margins_in, remarks, worst};
use crate::quantity::UnitSystem;
use crate::scenario::Scenario;
use sha2::{Digest, Sha256};
use std::fmt::Write;

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
    /// Sentences about the limits as a whole: what the set was written for, what is not judged.
    pub limit_remarks: Vec<String>,
    /// What the bands do to the checks, once it was worked out; then `margins` and `verdict` are of both together.
    pub bands: Option<ReportBands>,
}

impl Report {
    /// The checks with their notes in the given units; all else as in `margins`.
    #[must_use]
    pub fn margins_in(&self, system: UnitSystem) -> Vec<Margin> {
        let noted = margins_in(&self.scenario, &self.estimate, system).unwrap_or_default();
        let note = |margin: &Margin| {
            let same = noted.iter().find(|n| n.id == margin.id);
            same.map_or_else(|| margin.note.clone(), |n| n.note.clone())
        };
        self.margins.iter().map(|margin| Margin { note: note(margin), ..margin.clone() }).collect()
    }
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
pub fn report(file: &str, text: &str, scenario: &Scenario) -> Result<Report, ReportError> {
    let rules = Rules::of(scenario)?;
    let estimate = estimate(scenario)?;
    let margins = margins(scenario, &estimate)?;
    Ok(Report {
        file: file.to_owned(),
        scenario_sha256: sha256_hex(text),
        scenario: scenario.clone(),
        estimate,
        verdict: worst(margins.iter().map(|m| m.verdict)),
        margins,
        limit_remarks: remarks(&rules, scenario),
        bands: None,
    })
}

/// Hex SHA-256 of a text's bytes.
#[must_use]
pub fn sha256_hex(text: &str) -> String {
    Sha256::digest(text.as_bytes()).iter().fold(String::with_capacity(64), |mut hex, byte| {
        let _ = write!(hex, "{byte:02x}");
        hex
    })
}
