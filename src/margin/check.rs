//! The checks of one run.
use super::judge::Check;
use super::numeric::checks;
use super::{Rules, Verdict, margin_of};
use crate::estimate::{Estimate, Numbers, Validity};
use crate::quantity::{Dimension, UnitSystem};
use crate::scenario::Scenario;

/// Which side of the limit is good.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Sense {
    /// The demand must not exceed the limit.
    AtMost,
    /// The demand must reach the limit.
    AtLeast,
}

/// Where a limit comes from.
#[derive(Clone, Debug, PartialEq)]
pub struct Basis {
    /// `eu-363: EN 363 as applied in DGUV Regel 112-198 s.5.1 (published)`, `the file (reserve wanted)`;
    /// for an override both the file's value with its reason and the published one.
    pub words: String,
    /// True when a value used is from memory, unverified.
    pub from_memory: bool,
}

/// One check.
#[derive(Clone, Debug, PartialEq)]
pub struct Margin {
    /// Stable id: `clearance.plant-room_roof`, `arrest_force`, `anchor_load`.
    pub id: String,
    /// Label for screens: `arrest force`, `anchor load x 2`.
    pub label: String,
    /// What the run asks for, SI; none when it cannot be had.
    pub demand: Option<f64>,
    /// What is allowed, SI; none when it is missing.
    pub limit: Option<f64>,
    /// What both measure.
    pub dimension: Dimension,
    /// Which side is good.
    pub sense: Sense,
    /// Room left, SI: positive holds. None when open for a missing number.
    pub margin: Option<f64>,
    /// The word.
    pub verdict: Verdict,
    /// Source of the limit.
    pub basis: Basis,
    /// Why it is open, or what else must be read beside it.
    pub note: Option<String>,
}

/// `limits.basis` names no built-in set.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
#[error("no built-in set of limits is named `{name}`")]
pub struct UnknownBasis {
    /// The name in the file.
    pub name: String,
    /// The nearest built-in name.
    pub nearest: Option<&'static str>,
}

/// Every check that applies to a scenario and its estimate, the governing one first (see [`governing_first`]). Notes are
/// in metric units.
///
/// # Errors
/// When the scenario names an unknown set.
pub fn margins(scenario: &Scenario, estimate: &Estimate) -> Result<Vec<Margin>, UnknownBasis> {
    margins_in(scenario, estimate, UnitSystem::Metric)
}

/// As [`margins`], with the notes in the given units.
///
/// # Errors
/// When the scenario names an unknown set.
pub fn margins_in(scenario: &Scenario, estimate: &Estimate, system: UnitSystem) -> Result<Vec<Margin>, UnknownBasis> {
    worded(scenario, &estimate.numbers, &estimate.validity, system)
}

/// As [`margins`], from the numbers of a run and the reasons why its model is not valid (none when it is).
///
/// # Errors
/// When the scenario names an unknown set.
pub fn margins_from(
    scenario: &Scenario,
    numbers: &Numbers,
    validity: &[Validity],
) -> Result<Vec<Margin>, UnknownBasis> {
    worded(scenario, numbers, validity, UnitSystem::Metric)
}

fn worded(
    scenario: &Scenario,
    numbers: &Numbers,
    validity: &[Validity],
    system: UnitSystem,
) -> Result<Vec<Margin>, UnknownBasis> {
    let rules = Rules::of(scenario)?;
    let mut list = checks(&rules, scenario, numbers, validity);
    list.sort_by(governing_first);
    Ok(list.iter().map(|check| margin_of(&rules, scenario, validity, check, system)).collect())
}

/// The order of checks: worst verdict first; within one verdict what the run gives before what only compares two
/// stated values (a lanyard of just the length allowed does not govern the fall); then the least room as a share of
/// the limit; then by kind.
#[must_use]
pub fn governing_first(a: &Check, b: &Check) -> std::cmp::Ordering {
    let from_run = |check: &Check| check.kind.needs_model();
    b.verdict
        .cmp(&a.verdict)
        .then_with(|| from_run(b).cmp(&from_run(a)))
        .then_with(|| a.relative().total_cmp(&b.relative()))
        .then_with(|| a.kind.cmp(&b.kind))
}
