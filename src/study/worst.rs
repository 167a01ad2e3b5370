//! The worst that the bands of a scenario do to each check, as far as a bounded search finds it.
use super::evaluate::{Evaluator, Run, StudyError};
use super::sobol::{MOST_DIMENSIONS, Sobol};
use crate::margin::{Check, CheckKind, Verdict};
use rayon::prelude::*;
use std::cmp::Ordering;

/// Most bands for which every corner is tried: 2^12 runs.
pub const MOST_CORNER_BANDS: usize = 12;
/// Runs spread over the inside of the box: beside all corners, and where there are too many of them.
const INSIDE_RUNS: [usize; 2] = [256, 2048];
/// Seed of these runs; the search has no seed of its own, so that the same file has the same worst.
const INSIDE_SEED: u64 = 1;
/// The refinement starts with steps of this share of each band, halves them, and ends below the second share.
const STEPS: (f64, f64) = (0.25, 1e-5);
/// A point this close to an end, as a share of the band, is at the end.
const AT_END: f64 = 1e-9;

/// Where an input is at the worst found.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Place {
    /// At the low end of its band.
    Low,
    /// At the high end of its band.
    High,
    /// Inside its band.
    Inside,
    /// Anywhere: the check has the same margin with the input at its typical value.
    Anywhere,
}

/// One wide input at the worst found.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stand {
    /// Number of the input.
    pub input: usize,
    /// Its value, SI.
    pub value: f64,
    /// Where that is in its band.
    pub place: Place,
}

/// What the bands do to one check.
#[derive(Clone, Debug, PartialEq)]
pub struct Worst {
    /// Which check.
    pub kind: CheckKind,
    /// At the typical values; none where it does not apply there.
    pub typical: Option<Check>,
    /// The worst found; none where no run judged it.
    pub worst: Option<Check>,
    /// The wide inputs at the worst found, in file order.
    pub stands: Vec<Stand>,
    /// Runs of the search that left it open, failed ones included.
    pub open_runs: usize,
    /// The verdict of both together: short where typical is, open where typical is or where the search met open runs
    /// and no short one, thin where only the worst is short.
    pub verdict: Verdict,
}

impl Worst {
    /// True when every input that matters is at an end of its band.
    #[must_use]
    pub fn is_corner(&self) -> bool {
        self.stands.iter().all(|stand| stand.place != Place::Inside)
    }
}

/// What the search found, and what it took.
#[derive(Clone, Debug, PartialEq)]
pub struct WorstFound {
    /// Every check, in order of its kind.
    pub checks: Vec<Worst>,
    /// How many runs it took.
    pub runs: usize,
    /// How many of them failed.
    pub failed: usize,
    /// True when every corner of the box was tried.
    pub all_corners: bool,
}

/// Searches the box of all wide bands for the smallest margin of each check.
///
/// Tries every corner where at most [`MOST_CORNER_BANDS`] inputs are wide, the typical values and points spread over the inside; then
/// refines each check from the worst corner and the worst inner point by a coordinate search with halving steps. Exact
/// where the margin rises or falls with each input throughout; else the worst found, no more.
///
/// # Errors
/// [`StudyError::TooManyBands`] beyond [`MOST_DIMENSIONS`] wide inputs.
///
/// # Reference
/// Hooke and Jeeves (1961), J. ACM 8(2):212-229, exploratory moves.
pub fn worst_found(evaluator: &Evaluator) -> Result<WorstFound, StudyError> {
    let wide = evaluator.wide();
    if wide.len() > MOST_DIMENSIONS {
        return Err(StudyError::TooManyBands { bands: wide.len(), most: MOST_DIMENSIONS });
    }
    let all_corners = wide.len() <= MOST_CORNER_BANDS;
    let search = Search { evaluator, wide };
    let starts = search.starts(all_corners);
    let runs = starts.points.par_iter().map(|point| search.run(point)).collect::<Result<Vec<_>, _>>()?;
    let typical = evaluator.typical();
    let found = kinds(evaluator, &runs);
    let checks =
        found.par_iter().map(|&kind| search.check(kind, &typical, &starts, &runs)).collect::<Result<Vec<_>, _>>()?;
    Ok(WorstFound {
        runs: runs.len() + checks.iter().map(|(_, runs, _)| runs).sum::<usize>(),
        failed: count(runs.iter(), |run| run.failure.is_some())
            + checks.iter().map(|(.., failed)| failed).sum::<usize>(),
        checks: checks.into_iter().map(|(worst, ..)| worst).collect(),
        all_corners,
    })
}

/// `thin` and its siblings: one word of the typical and the worst verdict, and of how many runs were open.
fn together(typical: Option<&Check>, worst: Option<&Check>, open_runs: usize) -> Verdict {
    match (typical.map_or(Verdict::Open, |c| c.verdict), worst.map(|c| c.verdict)) {
        (Verdict::Holds, Some(Verdict::Short)) => Verdict::Thin,
        (Verdict::Holds, _) if open_runs > 0 => Verdict::Open,
        (typical, _) => typical,
    }
}

fn kinds(evaluator: &Evaluator, runs: &[Run]) -> Vec<CheckKind> {
    let mut kinds = evaluator.kinds().to_vec();
    kinds.extend(runs.iter().flat_map(|run| &run.checks).map(|check| check.kind));
    kinds.sort_unstable();
    kinds.dedup();
    kinds
}

fn count<'r>(runs: impl Iterator<Item = &'r Run>, is: impl Fn(&Run) -> bool) -> usize {
    runs.filter(|run| is(run)).count()
}

struct Starts {
    /// Points of the unit box; the corners come first.
    points: Vec<Vec<f64>>,
    corners: usize,
}

/// A judged point.
#[derive(Clone)]
struct Found {
    point: Vec<f64>,
    check: Check,
}

impl Found {
    /// Worse is less: short before the others, then the smaller margin.
    fn compare(&self, other: &Self) -> Ordering {
        let rank = |found: &Self| u8::from(found.check.verdict != Verdict::Short);
        let margin = |found: &Self| found.check.margin.unwrap_or(f64::INFINITY);
        rank(self).cmp(&rank(other)).then(margin(self).total_cmp(&margin(other)))
    }
}

struct Search<'e> {
    evaluator: &'e Evaluator,
    wide: Vec<usize>,
}

impl Search<'_> {
    fn starts(&self, all_corners: bool) -> Starts {
        let bands = self.wide.len();
        if bands == 0 {
            return Starts { points: vec![Vec::new()], corners: 1 };
        }
        let corners = if all_corners { 1_usize << bands } else { 0 };
        let corner = |number: usize| (0..bands).map(|d| if number >> d & 1 == 1 { 1.0 } else { 0.0 }).collect();
        let sobol = Sobol::scrambled(bands, INSIDE_SEED);
        let inside = INSIDE_RUNS[usize::from(!all_corners)];
        let mut points: Vec<Vec<f64>> = (0..corners).map(corner).collect();
        points.push(self.wide.iter().map(|&input| self.typical_share(input)).collect());
        points.extend((0..inside).map(|index| sobol.point(index)));
        Starts { points, corners }
    }

    fn typical_share(&self, input: usize) -> f64 {
        let band = self.evaluator.inputs()[input].measure.band;
        (band.typical - band.low) / (band.high - band.low)
    }

    fn value(&self, d: usize, share: f64) -> f64 {
        let band = self.evaluator.inputs()[self.wide[d]].measure.band;
        if share >= 1.0 { band.high } else { band.low + share * (band.high - band.low) }
    }

    fn run(&self, point: &[f64]) -> Result<Run, StudyError> {
        let values: Vec<_> = point.iter().enumerate().map(|(d, share)| (self.wide[d], self.value(d, *share))).collect();
        self.evaluator.at(&values)
    }

    /// One check: its worst, the runs that its refinement took and how many of these failed.
    fn check(
        &self,
        kind: CheckKind,
        typical: &Run,
        starts: &Starts,
        runs: &[Run],
    ) -> Result<(Worst, usize, usize), StudyError> {
        let mut tally = Tally { kind, runs: 0, failed: 0, open: 0 };
        let judged: Vec<_> = runs.iter().zip(&starts.points).map(|(run, point)| tally.judge(run, point)).collect();
        (tally.runs, tally.failed) = (0, 0);
        let (corners, inside) = judged.split_at(starts.corners);
        let worst_of = |list: &[Option<Found>]| list.iter().flatten().min_by(|a, b| a.compare(b)).cloned();
        let mut best: Option<Found> = None;
        for start in [worst_of(corners), worst_of(inside)].into_iter().flatten() {
            let found = self.refine(start, &mut tally)?;
            if best.as_ref().is_none_or(|best| found.compare(best).is_lt()) {
                best = Some(found);
            }
        }
        let typical = typical.check(kind).copied();
        let stands = best.as_ref().map_or(Ok(Vec::new()), |found| self.stands(found, &mut tally))?;
        let worst = best.map(|found| found.check);
        let verdict = together(typical.as_ref(), worst.as_ref(), tally.open);
        Ok((Worst { kind, typical, worst, stands, open_runs: tally.open, verdict }, tally.runs, tally.failed))
    }

    /// Moves along one input at a time as long as that makes it worse, with halving steps.
    fn refine(&self, start: Found, tally: &mut Tally) -> Result<Found, StudyError> {
        let mut best = start;
        let mut step = STEPS.0;
        while step > STEPS.1 && best.check.margin.is_some() {
            let mut moved = false;
            for d in 0..self.wide.len() {
                for sign in [-1.0, 1.0] {
                    let mut point = best.point.clone();
                    point[d] = (point[d] + sign * step).clamp(0.0, 1.0);
                    if point[d] == best.point[d] {
                        continue;
                    }
                    let found = tally.judge(&self.run(&point)?, &point);
                    if let Some(found) = found.filter(|found| found.compare(&best).is_lt()) {
                        best = found;
                        moved = true;
                    }
                }
            }
            if !moved {
                step /= 2.0;
            }
        }
        Ok(best)
    }

    fn stands(&self, found: &Found, tally: &mut Tally) -> Result<Vec<Stand>, StudyError> {
        let mut stands = Vec::with_capacity(self.wide.len());
        for (d, &input) in self.wide.iter().enumerate() {
            let mut point = found.point.clone();
            point[d] = self.typical_share(input);
            let other = tally.judge(&self.run(&point)?, &point);
            let same = other.is_some_and(|other| other.check == found.check);
            let share = found.point[d];
            let place = match share {
                _ if same && point[d] != share => Place::Anywhere,
                _ if share <= AT_END => Place::Low,
                _ if share >= 1.0 - AT_END => Place::High,
                _ => Place::Inside,
            };
            stands.push(Stand { input, value: self.value(d, share), place });
        }
        Ok(stands)
    }
}

/// Counts the runs of one check.
struct Tally {
    kind: CheckKind,
    runs: usize,
    failed: usize,
    open: usize,
}

impl Tally {
    /// The point where the run judged the check; an open one is counted.
    fn judge(&mut self, run: &Run, point: &[f64]) -> Option<Found> {
        self.runs += 1;
        self.failed += usize::from(run.failure.is_some());
        let check = *run.check(self.kind)?;
        if check.verdict == Verdict::Open {
            self.open += 1;
            return None;
        }
        Some(Found { point: point.to_vec(), check })
    }
}
