//! The ranking of every check of a scenario: bars and shares of the variance.
use super::bands::Sampling;
use super::evaluate::{Evaluator, StudyError};
use super::rank::{Bar, Ranking, Target, bars, importances};
use super::watch::Watch;
use crate::margin::CheckKind;

/// Which input matters to one check.
#[derive(Clone, Debug, PartialEq)]
pub struct CheckRanking {
    /// Which check.
    pub kind: CheckKind,
    /// One input at a time over its band, the longest bar first.
    pub bars: Vec<Bar>,
    /// Shares of the variance of its margin; none for one wide input, whose share is all of it.
    pub shares: Option<Ranking>,
}

/// Ranks the wide inputs for every check that applies at the typical values. The shares take about twice as many runs as
/// the sample.
///
/// # Errors
/// See [`importances`].
pub fn ranked(evaluator: &Evaluator, sampling: Sampling, watch: &Watch<'_>) -> Result<Vec<CheckRanking>, StudyError> {
    let kinds = evaluator.kinds();
    let targets: Vec<Target> = kinds.iter().map(|&kind| Target::Margin(kind)).collect();
    let bands = evaluator.wide().len();
    let shares: Vec<Option<Ranking>> = if bands > 1 {
        let points = points(sampling.samples, bands);
        importances(evaluator, &targets, points, sampling.seed, watch)?.into_iter().map(Some).collect()
    } else {
        vec![None; targets.len()]
    };
    let one = |((&kind, target), shares)| Ok(CheckRanking { kind, bars: bars(evaluator, target)?, shares });
    kinds.iter().zip(&targets).zip(shares).map(one).collect()
}

/// The largest power of two with `points (2 bands + 2) <= 2 samples`, from 16 to 2^16.
fn points(samples: usize, bands: usize) -> usize {
    let most = (samples / (bands + 1)).clamp(16, 1 << 16);
    1 << most.ilog2()
}
