//! What a sample of the band box says: shares that fall short, and how each key number spreads.
use super::evaluate::{Evaluator, Run, StudyError};
use super::sample::Sampler;
use super::sobol::MOST_POINTS;
use crate::estimate::{Number, Value};
use crate::margin::{CheckKind, Verdict};
use crate::quantity::Dimension;
use rayon::prelude::*;
use std::collections::BTreeMap;
use std::ops::{ControlFlow, Range};

/// The numbers whose spread is kept, where they apply; clearances are kept beside them.
pub const KEY_NUMBERS: &[&str] = &[
    "free_fall_distance",
    "arrest_force_peak",
    "anchor_force_peak",
    "deceleration_peak",
    "deployed_length",
    "arrest_distance",
    "total_fall_distance",
    "lowest_foot",
    "lowest_underside",
    "span_tension_peak",
    "strike_speed",
];
/// Shares at which quantiles are given.
pub const QUANTILE_SHARES: [f64; 7] = [0.0, 0.05, 0.25, 0.5, 0.75, 0.95, 1.0];
/// Bars of a histogram, of equal width from the smallest to the largest value.
pub const BARS: usize = 32;
/// Runs between two looks at whether to stop; a part is always a multiple of it, or the whole.
pub const BATCH: usize = 256;
/// Runs that one thread gathers before they are put together in order.
const PART: usize = 16;
/// Two-sided 95 % point of the normal distribution.
const Z_95: f64 = 1.959_963_984_540_054;

/// A share with its 95 % confidence interval.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Share {
    /// How many.
    pub count: usize,
    /// Of how many.
    pub of: usize,
    /// `count / of`; 0 of none.
    pub share: f64,
    /// Low end of the interval.
    pub low: f64,
    /// High end of the interval.
    pub high: f64,
}

impl Share {
    /// A share with its Wilson interval: `(p + z^2/2n +- z sqrt(p(1-p)/n + z^2/4n^2)) / (1 + z^2/n)`; 0 to 1 where
    /// there is no sample. For independent samples; the even samples used here are nearer than it says.
    ///
    /// # Reference
    /// Wilson (1927), J. Am. Stat. Assoc. 22(158):209-212.
    #[must_use]
    #[expect(clippy::cast_precision_loss, reason = "counts stay below 2^32")]
    pub fn new(count: usize, of: usize) -> Self {
        if of == 0 {
            return Self { count, of, share: 0.0, low: 0.0, high: 1.0 };
        }
        let n = of as f64;
        let share = count as f64 / n;
        let z2 = Z_95 * Z_95;
        let middle = share + z2 / (2.0 * n);
        let half = Z_95 * (share * (1.0 - share) / n + z2 / (4.0 * n * n)).sqrt();
        let low = if count == 0 { 0.0 } else { ((middle - half) / (1.0 + z2 / n)).max(0.0) };
        let high = if count == of { 1.0 } else { ((middle + half) / (1.0 + z2 / n)).min(1.0) };
        Self { count, of, share, low, high }
    }
}

/// What the sample says of one check. The counts add up to the number of samples.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CheckSpread {
    /// Which check.
    pub kind: CheckKind,
    /// Samples that fall short, of all samples.
    pub short: Share,
    /// Samples that fall short or are open, of all samples: what cannot be said to hold.
    pub not_held: Share,
    /// Samples that hold.
    pub holds: usize,
    /// Samples that are open, failed runs included.
    pub open: usize,
    /// Samples to which the check does not apply.
    pub absent: usize,
}

/// How one number spreads over the samples.
#[derive(Clone, Debug, PartialEq)]
pub struct NumberSpread {
    /// Its id.
    pub id: String,
    /// What it measures.
    pub dimension: Dimension,
    /// Its SI unit as in JSON.
    pub unit: &'static str,
    /// Samples that have it.
    pub count: usize,
    /// Samples that do not: failed runs, and runs where it does not apply.
    pub missing: usize,
    /// Mean, SI.
    pub mean: f64,
    /// Values at [`QUANTILE_SHARES`], SI, interpolated between samples.
    pub quantiles: [f64; 7],
    /// Samples per bar from the smallest to the largest value; one bar where all are equal.
    pub bars: Vec<usize>,
}

/// The whole sample.
#[derive(Clone, Debug, PartialEq)]
pub struct Spread {
    /// Samples asked for.
    pub asked: usize,
    /// Samples made.
    pub samples: usize,
    /// Seed.
    pub seed: u64,
    /// Runs that gave no numbers.
    pub failed: usize,
    /// Every check that applied to any sample, in order of kind.
    pub checks: Vec<CheckSpread>,
    /// The key numbers in the order of results.
    pub numbers: Vec<NumberSpread>,
}

impl Spread {
    /// A sample that was stopped before its first run.
    #[must_use]
    pub const fn empty(asked: usize, seed: u64) -> Self {
        Self { asked, samples: 0, seed, failed: 0, checks: Vec::new(), numbers: Vec::new() }
    }

    /// True when it was stopped before all samples were made.
    #[must_use]
    pub const fn is_partial(&self) -> bool {
        self.samples < self.asked
    }
}

/// Runs a seeded sample of all wide bands, in parallel on the current rayon pool.
///
/// `watch` is told how many samples are made after every batch, and may break off: what is there is then evaluated and
/// marked by [`Spread::is_partial`]. The same seed and number of samples give the same result on any number of threads.
///
/// # Errors
/// [`StudyError::Samples`] outside of 1 to [`MOST_POINTS`]; [`StudyError::TooManyBands`].
pub fn spread(
    evaluator: &Evaluator,
    samples: usize,
    seed: u64,
    watch: &mut dyn FnMut(usize) -> ControlFlow<()>,
) -> Result<Spread, StudyError> {
    if samples == 0 || samples > MOST_POINTS {
        return Err(StudyError::Samples { count: samples, least: 1, most: MOST_POINTS });
    }
    let sampler = Sampler::new(evaluator, seed)?;
    let mut gathered = Gathered::default();
    while gathered.samples < samples {
        let batch = gathered.samples..(gathered.samples + BATCH).min(samples);
        let starts: Vec<usize> = batch.clone().step_by(PART).collect();
        let part = |start: usize| Gathered::of(evaluator, &sampler, start..(start + PART).min(batch.end));
        for part in starts.into_par_iter().map(part).collect::<Result<Vec<_>, _>>()? {
            gathered.append(part);
        }
        if watch(gathered.samples).is_break() {
            break;
        }
    }
    Ok(gathered.spread(samples, seed))
}

/// Values of one number in order of the samples.
struct Column {
    dimension: Dimension,
    unit: &'static str,
    values: Vec<f64>,
}

#[derive(Default)]
struct Gathered {
    samples: usize,
    failed: usize,
    /// Per check how many hold, are open and are short.
    verdicts: BTreeMap<CheckKind, [usize; 3]>,
    /// Per id, in the order in which they first came.
    columns: Vec<(String, Column)>,
}

impl Gathered {
    /// The runs of some samples, in their order.
    fn of(evaluator: &Evaluator, sampler: &Sampler, samples: Range<usize>) -> Result<Self, StudyError> {
        let mut gathered = Self::default();
        for index in samples {
            gathered.take(&evaluator.peaks_at(&sampler.values(index))?);
        }
        Ok(gathered)
    }

    fn take(&mut self, run: &Run) {
        self.samples += 1;
        self.failed += usize::from(run.failure.is_some());
        for check in &run.checks {
            let at = match check.verdict {
                Verdict::Holds => 0,
                Verdict::Open => 1,
                Verdict::Thin | Verdict::Short => 2,
            };
            self.verdicts.entry(check.kind).or_default()[at] += 1;
        }
        let is_key = |id: &str| KEY_NUMBERS.contains(&id) || id.starts_with("clearance.");
        for (place, number) in run.numbers.iter().filter(|number| is_key(&number.id)).enumerate() {
            if let Value::Number(value) = number.value {
                self.column(place, number).values.push(value);
            }
        }
    }

    /// The samples that come after these: the same as if each had been taken after the other.
    fn append(&mut self, later: Self) {
        self.samples += later.samples;
        self.failed += later.failed;
        for (kind, counts) in later.verdicts {
            let own = self.verdicts.entry(kind).or_default();
            for (own, more) in own.iter_mut().zip(counts) {
                *own += more;
            }
        }
        for (id, column) in later.columns {
            match self.columns.iter_mut().find(|(own, _)| *own == id) {
                Some((_, own)) => own.values.extend(column.values),
                None => self.columns.push((id, column)),
            }
        }
    }

    /// The column of a number; it mostly stands at the same place as in the run before.
    fn column(&mut self, place: usize, number: &Number) -> &mut Column {
        let there = self.columns.get(place).is_some_and(|(id, _)| *id == number.id);
        let found = if there { Some(place) } else { self.columns.iter().position(|(id, _)| *id == number.id) };
        let at = found.unwrap_or_else(|| {
            let column = Column { dimension: number.dimension, unit: number.unit, values: Vec::new() };
            self.columns.push((number.id.clone(), column));
            self.columns.len() - 1
        });
        &mut self.columns[at].1
    }

    fn spread(self, asked: usize, seed: u64) -> Spread {
        let samples = self.samples;
        let check = |(kind, [holds, open, short]): (CheckKind, [usize; 3])| CheckSpread {
            kind,
            short: Share::new(short, samples),
            not_held: Share::new(short + open, samples),
            holds,
            open,
            absent: samples - holds - open - short,
        };
        let number = |(id, column): (String, Column)| column.spread(id, samples);
        Spread {
            asked,
            samples,
            seed,
            failed: self.failed,
            checks: self.verdicts.into_iter().map(check).collect(),
            numbers: self.columns.into_par_iter().map(number).collect(),
        }
    }
}

impl Column {
    #[expect(clippy::cast_precision_loss, reason = "counts stay below 2^32")]
    fn spread(mut self, id: String, samples: usize) -> NumberSpread {
        let count = self.values.len();
        let mean = self.values.iter().sum::<f64>() / count as f64;
        self.values.sort_unstable_by(f64::total_cmp);
        NumberSpread {
            id,
            dimension: self.dimension,
            unit: self.unit,
            count,
            missing: samples - count,
            mean,
            quantiles: QUANTILE_SHARES.map(|share| quantile(&self.values, share)),
            bars: bars(&self.values),
        }
    }
}

/// Linear between the two samples beside it; `sorted` holds at least one.
///
/// # Reference
/// Hyndman and Fan (1996), Am. Stat. 50(4):361-365, type 7.
#[expect(clippy::cast_precision_loss, clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "small, >= 0")]
fn quantile(sorted: &[f64], share: f64) -> f64 {
    let place = share * (sorted.len() - 1) as f64;
    let below = sorted[place as usize];
    let above = sorted[place.ceil() as usize];
    below + place.fract() * (above - below)
}

#[expect(clippy::cast_precision_loss, clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "small, >= 0")]
fn bars(sorted: &[f64]) -> Vec<usize> {
    let (Some(&least), Some(&most)) = (sorted.first(), sorted.last()) else { return Vec::new() };
    if least >= most {
        return vec![sorted.len()];
    }
    let mut bars = vec![0; BARS];
    for value in sorted {
        let place = (value - least) / (most - least) * BARS as f64;
        bars[(place as usize).min(BARS - 1)] += 1;
    }
    bars
}
