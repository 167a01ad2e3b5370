//! Which input matters: bars of one input at a time, and the shares of the variance.
use super::band::Quantile;
use super::evaluate::{Evaluator, Run, StudyError};
use super::sobol::{MOST_DIMENSIONS, Sobol, SplitMix};
use super::watch::{Progress, Step, Watch, unwatched};
use crate::margin::CheckKind;
use rayon::prelude::*;

/// Resamples for the confidence of the shares.
const RESAMPLES: usize = 200;
/// Fewest base points for which shares are given, and most.
const POINTS: (usize, usize) = (16, 1 << 24);

/// A target whose standard deviation is below this share of its mean does not vary but for rounding.
const ROUNDING: f64 = 1e-12;

/// What is ranked by.
#[derive(Clone, Debug, PartialEq)]
pub enum Target {
    /// A number by its id, SI.
    Number(String),
    /// The margin of a check, SI.
    Margin(CheckKind),
}

impl Target {
    /// Its value in a run, where there is one.
    #[must_use]
    pub fn of(&self, run: &Run) -> Option<f64> {
        match self {
            Self::Number(id) => run.numbers.get(id),
            Self::Margin(kind) => run.check(*kind)?.margin,
        }
    }
}

/// One input moved over its band, all others at their typical values.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bar {
    /// Number of the input.
    pub input: usize,
    /// The target at the low end, SI; none where that run does not give it.
    pub low: Option<f64>,
    /// The target at the typical value, SI.
    pub typical: Option<f64>,
    /// The target at the high end, SI.
    pub high: Option<f64>,
}

impl Bar {
    /// Largest minus smallest of the three, SI; none where one is missing.
    #[must_use]
    pub fn reach(&self) -> Option<f64> {
        let (low, typical, high) = (self.low?, self.typical?, self.high?);
        Some(low.max(typical).max(high) - low.min(typical).min(high))
    }
}

/// The bars of every wide input, the longest first; those with a missing end come before all others, since nothing is
/// known of how far they reach. What happens between the ends does not show: see the worst found.
///
/// # Errors
/// None but those of [`Evaluator::at`].
pub fn bars(evaluator: &Evaluator, target: &Target) -> Result<Vec<Bar>, StudyError> {
    let run = |values: &[(usize, f64)]| match target {
        Target::Margin(_) => evaluator.peaks_at(values),
        Target::Number(_) => evaluator.at(values),
    };
    let typical = target.of(&run(&[])?);
    let mut bars = Vec::new();
    for input in evaluator.wide() {
        let band = evaluator.inputs()[input].measure.band;
        let at = |value| run(&[(input, value)]).map(|run| target.of(&run));
        bars.push(Bar { input, low: at(band.low)?, typical, high: at(band.high)? });
    }
    let reach = |bar: &Bar| bar.reach().unwrap_or(f64::INFINITY);
    bars.sort_by(|a, b| reach(b).total_cmp(&reach(a)));
    Ok(bars)
}

/// A share of the variance with its 95 % confidence interval.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Part {
    /// Estimate.
    pub value: f64,
    /// Low end of the interval.
    pub low: f64,
    /// High end of the interval.
    pub high: f64,
}

/// What one input does to the variance of the target.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Importance {
    /// Number of the input; of the dimension for [`importance_of`].
    pub input: usize,
    /// First order: the share that would go if this input alone were known.
    pub first: Part,
    /// Total: the share that would stay if all others were known.
    pub total: Part,
}

/// The shares of the variance of a target over the bands.
#[derive(Clone, Debug, PartialEq)]
pub struct Ranking {
    /// One entry per input, in file order; empty where the target does not vary.
    pub inputs: Vec<Importance>,
    /// Base points asked for.
    pub asked: usize,
    /// Base points used; fewer where it was broken off.
    pub points: usize,
    /// Base points left out of the estimate since one of their runs gave no value: they are no part of the shares, and
    /// where there are any, the shares speak of the rest of the bands only.
    pub without_value: usize,
}

/// First-order and total shares of the variance of a target over all wide bands, from `points` base points (a power of
/// two is best) and `points (2 bands + 2)` runs.
///
/// # Errors
/// [`StudyError::TooManyBands`] beyond half of [`MOST_DIMENSIONS`]; [`StudyError::Samples`] outside of 16 to 2^24.
pub fn importance(evaluator: &Evaluator, target: &Target, points: usize, seed: u64) -> Result<Ranking, StudyError> {
    let mut all = importances(evaluator, std::slice::from_ref(target), points, seed, &unwatched)?;
    Ok(all.pop().unwrap_or(Ranking { inputs: Vec::new(), asked: points, points: 0, without_value: 0 }))
}

/// [`importance`] of several targets from the same runs. `watch` is told how many base points are done and may break
/// off: the shares are then of those.
///
/// # Errors
/// See [`importance`].
pub fn importances(
    evaluator: &Evaluator,
    targets: &[Target],
    points: usize,
    seed: u64,
    watch: &Watch<'_>,
) -> Result<Vec<Ranking>, StudyError> {
    let quantiles: Vec<_> =
        evaluator.wide().into_iter().map(|i| (i, Quantile::new(evaluator.inputs()[i].measure.band))).collect();
    let peaks_do = targets.iter().all(|target| matches!(target, Target::Margin(_)));
    let value = |point: &[f64]| {
        let values: Vec<_> = quantiles.iter().zip(point).map(|((input, q), u)| (*input, q.at(*u))).collect();
        let run = if peaks_do { evaluator.peaks_at(&values) } else { evaluator.at(&values) };
        targets.iter().map(|target| target.of(run.as_ref().ok()?)).collect()
    };
    let tried = tried(quantiles.len(), points, seed, &value, watch)?;
    let mut rankings: Vec<_> =
        (0..targets.len()).map(|target| ranking(&tried, target, quantiles.len(), points, seed)).collect();
    for part in rankings.iter_mut().flat_map(|ranking| &mut ranking.inputs) {
        part.input = quantiles[part.input].0;
    }
    Ok(rankings)
}

/// The same for any function of a point of the unit cube.
///
/// With points A and B, and P the point A with one coordinate from B and Q the point B with it from A: first order
/// `mean(f(B) (f(P) - f(A)) + f(A) (f(Q) - f(B))) / 2V`, total `mean((f(A) - f(P))^2 + (f(B) - f(Q))^2) / 4V`, f less its
/// mean in the first; confidence from 200 resamples of the base points.
///
/// # Errors
/// See [`importance`].
///
/// # Reference
/// Saltelli et al. (2010), Comput. Phys. Commun. 181(2):259-270, table 2 (b) and (f), each with A and B
/// also changed over; Jansen (1999), Comput. Phys.
/// Commun. 117:35-43, for the total.
pub fn importance_of(
    dimensions: usize,
    points: usize,
    seed: u64,
    value: &(dyn Fn(&[f64]) -> Option<f64> + Sync),
) -> Result<Ranking, StudyError> {
    let tried = tried(dimensions, points, seed, &|point| vec![value(point)], &unwatched)?;
    Ok(ranking(&tried, 0, dimensions, points, seed))
}

/// The targets at one point, where there are such.
type Values = Vec<Option<f64>>;

/// All targets at one base point: at A, at B, and for each coordinate at A with it from B and at B with it from A.
struct Tried {
    a: Values,
    b: Values,
    mixed: Vec<(Values, Values)>,
}

/// Base points between two looks at whether to stop.
const BATCH: usize = 32;

/// Runs every base point and its mixtures.
fn tried(
    dimensions: usize,
    points: usize,
    seed: u64,
    values: &(dyn Fn(&[f64]) -> Values + Sync),
    watch: &Watch<'_>,
) -> Result<Vec<Tried>, StudyError> {
    if dimensions > MOST_DIMENSIONS / 2 {
        return Err(StudyError::TooManyBands { bands: dimensions, most: MOST_DIMENSIONS / 2 });
    }
    if points < POINTS.0 || points > POINTS.1 {
        return Err(StudyError::Samples { count: points, least: POINTS.0, most: POINTS.1 });
    }
    let sobol = Sobol::scrambled(2 * dimensions, seed);
    let mut tried = Vec::with_capacity(points);
    while tried.len() < points {
        if watch(Progress { step: Step::Ranking, done: tried.len(), of: points }).is_break() {
            break;
        }
        let batch = tried.len()..(tried.len() + BATCH).min(points);
        tried.par_extend(batch.into_par_iter().map(|index| Tried::at(&sobol.point(index), dimensions, values)));
    }
    Ok(tried)
}

/// The shares of one target.
fn ranking(tried: &[Tried], target: usize, dimensions: usize, asked: usize, seed: u64) -> Ranking {
    let rows: Vec<Row> = tried.iter().filter_map(|tried| tried.row(target)).collect();
    let all: Vec<usize> = (0..rows.len()).collect();
    let varies = shares(&rows, &all, 0).is_some();
    let one = |input| confident(&rows, &all, input, seed);
    let inputs = if varies { (0..dimensions).into_par_iter().filter_map(one).collect() } else { Vec::new() };
    Ranking { inputs, asked, points: tried.len(), without_value: tried.len() - rows.len() }
}

impl Tried {
    fn at(point: &[f64], dimensions: usize, values: &(dyn Fn(&[f64]) -> Values + Sync)) -> Self {
        let (a, b) = point.split_at(dimensions);
        let mixed = |d: usize| {
            let (mut p, mut q) = (a.to_vec(), b.to_vec());
            std::mem::swap(&mut p[d], &mut q[d]);
            (values(&p), values(&q))
        };
        Self { a: values(a), b: values(b), mixed: (0..dimensions).map(mixed).collect() }
    }

    fn row(&self, target: usize) -> Option<Row> {
        let of = |values: &Values| values.get(target).copied().flatten();
        let mixed = self.mixed.iter().map(|(p, q)| Some((of(p)?, of(q)?))).collect::<Option<_>>()?;
        Some(Row { a: of(&self.a)?, b: of(&self.b)?, mixed })
    }
}

/// One target at one base point and its mixtures.
struct Row {
    a: f64,
    b: f64,
    mixed: Vec<(f64, f64)>,
}

/// First and total share of one input over the chosen rows; none where the target does not vary.
#[expect(clippy::cast_precision_loss, reason = "counts stay below 2^25")]
fn shares(rows: &[Row], chosen: &[usize], input: usize) -> Option<(f64, f64)> {
    let n = chosen.len() as f64;
    let over = |term: &dyn Fn(&Row) -> f64| chosen.iter().map(|&at| term(&rows[at])).sum::<f64>() / n;
    let mean = over(&|row| row.a.midpoint(row.b));
    let variance = over(&|row| (row.a - mean).powi(2).midpoint((row.b - mean).powi(2)));
    if variance.is_nan() || variance <= (ROUNDING * mean).powi(2) {
        return None;
    }
    let mixed = |row: &Row| row.mixed.get(input).copied().unwrap_or((row.a, row.b));
    let first = over(&|row| {
        let (p, q) = mixed(row);
        ((row.b - mean) * (p - row.a)).midpoint((row.a - mean) * (q - row.b))
    });
    let total = over(&|row| {
        let (p, q) = mixed(row);
        (row.a - p).powi(2).midpoint((row.b - q).powi(2)) / 2.0
    });
    Some((first / variance, total / variance))
}

fn confident(rows: &[Row], all: &[usize], input: usize, seed: u64) -> Option<Importance> {
    let (first, total) = shares(rows, all, input)?;
    let mut stream = SplitMix::of(seed, input as u64);
    let mut resampled = (Vec::with_capacity(RESAMPLES), Vec::with_capacity(RESAMPLES));
    for _ in 0..RESAMPLES {
        let chosen: Vec<usize> = all.iter().map(|_| below(stream.next(), all.len())).collect();
        if let Some((first, total)) = shares(rows, &chosen, input) {
            resampled.0.push(first);
            resampled.1.push(total);
        }
    }
    Some(Importance { input, first: part(first, resampled.0), total: part(total, resampled.1) })
}

/// A random number as one of `count`, from 0.
#[expect(clippy::cast_possible_truncation, reason = "the quotient is below `count`")]
fn below(random: u64, count: usize) -> usize {
    ((u128::from(random) * count as u128) >> 64) as usize
}

/// The middle 95 % of the resamples about the estimate.
fn part(value: f64, mut resampled: Vec<f64>) -> Part {
    resampled.sort_unstable_by(f64::total_cmp);
    let tail = resampled.len() / 40;
    let low = resampled.get(tail).copied().unwrap_or(value);
    let high = resampled.iter().rev().nth(tail).copied().unwrap_or(value);
    Part { value, low, high }
}
