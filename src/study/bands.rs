//! What the bands of a scenario do to its checks: the worst found and the share that falls short.
use super::evaluate::{Evaluator, StudyError};
use super::spread::{Spread, spread};
use super::watch::{Progress, Step, Watch};
use super::worst::{WorstFound, worst_found};
use crate::scenario::Scenario;

/// Runs of a sample where nothing else is said: 2^12, which tells a share within two hundredths.
pub const USUAL_SAMPLES: usize = 4096;
/// Seed of a sample where nothing else is said.
pub const USUAL_SEED: u64 = 1;
/// Most runs of a sample that may be asked for.
pub const MOST_SAMPLES: usize = 1_000_000;

/// Which sample is drawn.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Sampling {
    /// How many runs.
    pub samples: usize,
    /// Which sample.
    pub seed: u64,
}

impl Sampling {
    /// As the scenario says, else the usual.
    #[must_use]
    pub fn of(scenario: &Scenario) -> Self {
        let samples = scenario.study.samples.and_then(|samples| usize::try_from(samples).ok());
        Self { samples: samples.unwrap_or(USUAL_SAMPLES), seed: scenario.study.seed.unwrap_or(USUAL_SEED) }
    }
}

/// The worst found and the sample of one scenario.
#[derive(Clone, Debug, PartialEq)]
pub struct Bands {
    /// The worst found of each check.
    pub found: WorstFound,
    /// The sample.
    pub spread: Spread,
}

impl Bands {
    /// True when either was broken off.
    #[must_use]
    pub const fn is_partial(&self) -> bool {
        self.found.partial || self.spread.is_partial()
    }
}

/// Searches and samples all wide bands; none where no input is wide. `watch` may break off: what there is then is given
/// and marked.
///
/// # Errors
/// See [`worst_found`] and [`spread`].
pub fn bands(evaluator: &Evaluator, sampling: Sampling, watch: &Watch<'_>) -> Result<Option<Bands>, StudyError> {
    if evaluator.wide().is_empty() {
        return Ok(None);
    }
    let found = worst_found(evaluator, watch)?;
    let Sampling { samples, seed } = sampling;
    let mut told = |done| watch(Progress { step: Step::Sample, done, of: samples });
    let spread = if found.partial || told(0).is_break() {
        Spread::empty(samples, seed)
    } else {
        spread(evaluator, samples, seed, &mut told)?
    };
    Ok(Some(Bands { found, spread }))
}

/// Searches all wide bands for the worst found and draws no sample; none where no input is wide. `watch` may break off.
///
/// # Errors
/// See [`worst_found`].
pub fn worst_only(evaluator: &Evaluator, watch: &Watch<'_>) -> Result<Option<Bands>, StudyError> {
    if evaluator.wide().is_empty() {
        return Ok(None);
    }
    let found = worst_found(evaluator, watch)?;
    Ok(Some(Bands { found, spread: Spread::empty(0, USUAL_SEED) }))
}
