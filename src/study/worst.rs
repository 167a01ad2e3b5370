//! The worst that the bands of a scenario do to each check, as far as a bounded search finds it.
use super::evaluate::{Evaluator, StudyError};
use super::memory::{Count, Memory, Outcome};
use super::sobol::{MOST_DIMENSIONS, Sobol};
use super::watch::Watch;
use crate::margin::{Check, CheckKind, Verdict};
use rayon::prelude::*;
use std::sync::Arc;

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

/// Margins that differ by less than this share of demand or limit differ by the rounding of their runs.
const ROUNDING: f64 = 1e-10;

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
    /// The verdict of both together: short where typical is, thin where only the worst is (also where the check does
    /// not apply at the typical values), open where typical is, where the search met open runs and no short one, or
    /// where it was broken off without a short one.
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
    /// True when it was broken off: what it has not found may still be there.
    pub partial: bool,
}

/// Searches the box of all wide bands for the smallest margin of each check.
///
/// Tries every corner where at most [`MOST_CORNER_BANDS`] inputs are wide, the typical values and points spread over the
/// inside; then refines each check from the worst corner and the worst inner point by a coordinate search with halving
/// steps. Exact where the margin rises or falls with each input throughout; else the worst found, no more. `watch` is
/// told of every run and may break off: what is found by then is given and marked.
///
/// # Errors
/// [`StudyError::TooManyBands`] beyond [`MOST_DIMENSIONS`] wide inputs.
///
/// # Reference
/// Hooke and Jeeves (1961), J. ACM 8(2):212-229, exploratory moves.
pub fn worst_found(evaluator: &Evaluator, watch: &Watch<'_>) -> Result<WorstFound, StudyError> {
    let wide = evaluator.wide();
    if wide.len() > MOST_DIMENSIONS {
        return Err(StudyError::TooManyBands { bands: wide.len(), most: MOST_DIMENSIONS });
    }
    let all_corners = wide.len() <= MOST_CORNER_BANDS;
    let search = Search::new(evaluator, wide, watch);
    let starts = search.starts(all_corners)?;
    let typical = Outcome::of(evaluator.peaks_at(&[])?);
    let found = kinds(evaluator, &starts);
    search.count.refining(found.len());
    let checks = found.par_iter().map(|&kind| search.check(kind, &typical, &starts)).collect::<Result<Vec<_>, _>>()?;
    let (runs, failed) = search.memory.counts();
    Ok(WorstFound { runs, failed, checks, all_corners, partial: search.count.is_stopped() })
}

/// `thin` and its siblings: one word of the typical and the worst verdict, of how many runs were open, and of whether
/// the search came to its end.
fn together(typical: Option<&Check>, worst: Option<&Check>, open_runs: usize, partial: bool) -> Verdict {
    let unsure = open_runs > 0 || partial;
    match (typical.map_or(Verdict::Holds, |c| c.verdict), worst.map(|c| c.verdict)) {
        (Verdict::Holds, Some(Verdict::Short)) => Verdict::Thin,
        (Verdict::Holds, _) if unsure => Verdict::Open,
        (typical, _) => typical,
    }
}

fn kinds(evaluator: &Evaluator, starts: &Starts) -> Vec<CheckKind> {
    let mut kinds = evaluator.kinds().to_vec();
    kinds.extend(starts.points.iter().flat_map(|(_, run)| &run.checks).map(|check| check.kind));
    kinds.sort_unstable();
    kinds.dedup();
    kinds
}

/// A point of the unit box with what its run gave.
type Tried = (Vec<f64>, Arc<Outcome>);

struct Starts {
    /// The corners come first; fewer than meant where the search was broken off.
    points: Vec<Tried>,
    corners: usize,
}

/// A judged point.
#[derive(Clone)]
struct Found {
    point: Vec<f64>,
    check: Check,
}

impl Found {
    /// Worse than another: short where the other is not, or a smaller margin beyond rounding.
    fn is_worse_than(&self, other: &Self) -> bool {
        let short = |found: &Self| found.check.verdict == Verdict::Short;
        match (short(self), short(other)) {
            (true, false) => true,
            (false, true) => false,
            _ => self.margin() < other.margin() - other.rounding(),
        }
    }

    /// The same check but for rounding.
    fn is_same_as(&self, other: &Self) -> bool {
        let away = self.margin() - other.margin();
        let close = self.check.verdict == other.check.verdict && away.abs() <= other.rounding();
        close || self.check == other.check
    }

    fn margin(&self) -> f64 {
        self.check.margin.unwrap_or(f64::INFINITY)
    }

    fn rounding(&self) -> f64 {
        let scale = [self.check.limit, self.check.demand].into_iter().flatten().map(f64::abs).fold(0.0, f64::max);
        ROUNDING * scale
    }
}

/// The worst of a list, the first of equals.
fn worst_of(list: &[Option<Found>]) -> Option<Found> {
    let worse = |best: Option<Found>, found: &Found| match best {
        Some(best) if !found.is_worse_than(&best) => Some(best),
        _ => Some(found.clone()),
    };
    list.iter().flatten().fold(None, worse)
}

struct Search<'e> {
    evaluator: &'e Evaluator,
    wide: Vec<usize>,
    memory: Memory,
    count: Count<'e>,
}

impl<'e> Search<'e> {
    fn new(evaluator: &'e Evaluator, wide: Vec<usize>, watch: &'e Watch<'e>) -> Self {
        Self { evaluator, wide, memory: Memory::default(), count: Count::new(watch) }
    }

    fn starts(&self, all_corners: bool) -> Result<Starts, StudyError> {
        let bands = self.wide.len();
        let corners = if all_corners { 1_usize << bands } else { 0 };
        let corner = |number: usize| (0..bands).map(|d| if number >> d & 1 == 1 { 1.0 } else { 0.0 }).collect();
        let mut points: Vec<Vec<f64>> = (0..corners).map(corner).collect();
        if bands > 0 {
            let sobol = Sobol::scrambled(bands, INSIDE_SEED);
            let inside = INSIDE_RUNS[usize::from(!all_corners)];
            points.push(self.wide.iter().map(|&input| self.typical_share(input)).collect());
            points.extend((0..inside).map(|index| sobol.point(index)));
        }
        self.count.corners(points.len());
        let tried = |point: Vec<f64>| Ok(self.run(&point)?.map(|run| (point, run)));
        let tried = points.into_par_iter().map(tried).collect::<Result<Vec<Option<Tried>>, StudyError>>()?;
        let corners = tried.iter().take(corners).flatten().count();
        Ok(Starts { points: tried.into_iter().flatten().collect(), corners })
    }

    fn typical_share(&self, input: usize) -> f64 {
        let band = self.evaluator.inputs()[input].measure.band;
        (band.typical - band.low) / (band.high - band.low)
    }

    fn value(&self, d: usize, share: f64) -> f64 {
        let band = self.evaluator.inputs()[self.wide[d]].measure.band;
        if share >= 1.0 { band.high } else { band.low + share * (band.high - band.low) }
    }

    /// The run of a point; none once the search is broken off.
    fn run(&self, point: &[f64]) -> Result<Option<Arc<Outcome>>, StudyError> {
        if self.count.tell_run() {
            return Ok(None);
        }
        let values: Vec<_> = point.iter().enumerate().map(|(d, share)| (self.wide[d], self.value(d, *share))).collect();
        self.memory.outcome(&values, || self.evaluator.peaks_at(&values)).map(Some)
    }

    fn check(&self, kind: CheckKind, typical: &Outcome, starts: &Starts) -> Result<Worst, StudyError> {
        let mut tally = Tally { kind, open: 0 };
        let judged: Vec<_> = starts.points.iter().map(|(point, run)| tally.judge(run, point)).collect();
        let (corners, inside) = judged.split_at(starts.corners);
        let mut best: Option<Found> = None;
        let varies =
            judged.windows(2).any(|pair| pair[0].as_ref().map(|f| f.check) != pair[1].as_ref().map(|f| f.check));
        for start in [worst_of(corners), worst_of(inside)].into_iter().flatten() {
            let found = if varies { self.refine(start, &mut tally)? } else { start };
            if best.as_ref().is_none_or(|best| found.is_worse_than(best)) {
                best = Some(found);
            }
        }
        let typical = typical.check(kind).copied();
        let stands = best.as_ref().map_or(Ok(Vec::new()), |found| self.stands(found, &mut tally))?;
        let worst = best.map(|found| found.check);
        self.count.refined();
        let verdict = together(typical.as_ref(), worst.as_ref(), tally.open, self.count.is_stopped());
        Ok(Worst { kind, typical, worst, stands, open_runs: tally.open, verdict })
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
                    let Some(run) = self.run(&point)? else { return Ok(best) };
                    if let Some(found) = tally.judge(&run, &point).filter(|found| found.is_worse_than(&best)) {
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
            let other = self.run(&point)?.and_then(|run| tally.judge(&run, &point));
            let same = other.is_some_and(|other| other.is_same_as(found));
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

/// Counts the open runs of one check.
struct Tally {
    kind: CheckKind,
    open: usize,
}

impl Tally {
    /// The point where the run judged the check; an open one is counted.
    fn judge(&mut self, run: &Outcome, point: &[f64]) -> Option<Found> {
        let check = *run.check(self.kind)?;
        if check.verdict == Verdict::Open {
            self.open += 1;
            return None;
        }
        Some(Found { point: point.to_vec(), check })
    }
}
