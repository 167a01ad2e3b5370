//! One input across a range, with the values at which a verdict changes.
use super::{Evaluator, Run, StudyError};
use crate::margin::{CheckKind, Verdict};
use std::ops::RangeInclusive;

/// Fewest cells that are searched for changes of verdict, however few rows the table has.
const CELLS: usize = 400;
/// Halvings of a bracket: a cell of the range is cut down to rounding.
const HALVINGS: usize = 60;
/// A margin at a change of verdict below this share of the limit is a zero crossing, beyond it a jump.
const ZERO_SHARE: f64 = 1e-6;

/// One row: the value and its run.
#[derive(Clone, Debug, PartialEq)]
pub struct Row {
    /// Value of the input, SI.
    pub value: f64,
    /// The run.
    pub run: Run,
}

/// A value at which a check changes between holding and not holding.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Crossing {
    /// The check.
    pub kind: CheckKind,
    /// The value of the input on the side that holds, SI.
    pub value: f64,
    /// The nearest value found on the other side, SI.
    pub beyond: f64,
    /// The verdict below the value.
    pub below: Verdict,
    /// The verdict above it.
    pub above: Verdict,
    /// True where the margin passes through zero, false where the verdict jumps (a stroke used up, a model that stops
    /// being valid).
    pub through_zero: bool,
}

/// One input across a range.
#[derive(Clone, Debug, PartialEq)]
pub struct Variation {
    /// Number of the input in [`Evaluator::inputs`].
    pub input: usize,
    /// Evenly spaced rows, both ends included.
    pub rows: Vec<Row>,
    /// Changes of verdict, by value. Two changes of one check that lie closer than a four-hundredth of the range (or a
    /// row) can be missed.
    pub crossings: Vec<Crossing>,
}

/// Half to double of an exact input, or its band; within its physical range. None for an exact zero.
#[must_use]
pub fn usual_range(evaluator: &Evaluator, input: usize) -> Option<RangeInclusive<f64>> {
    let input = evaluator.inputs().get(input)?;
    let band = input.measure.band;
    let (a, b) = if band.is_wide() { (band.low, band.high) } else { (band.typical / 2.0, band.typical * 2.0) };
    let (low, high) = (a.min(b).max(input.field.least), a.max(b).min(input.field.most));
    (low < high).then_some(low..=high)
}

/// Runs one input across a range (SI, low below high) in `rows` rows, at least 2.
///
/// # Errors
/// [`StudyError::NoInput`] and [`StudyError::NotFinite`].
pub fn vary(
    evaluator: &Evaluator,
    input: usize,
    range: RangeInclusive<f64>,
    rows: usize,
) -> Result<Variation, StudyError> {
    let rows = grid(evaluator, input, &range, rows.max(2) - 1)?;
    let finer = if rows.len() > CELLS { None } else { Some(grid(evaluator, input, &range, CELLS)?) };
    let crossings = crossings(evaluator, input, finer.as_deref().unwrap_or(&rows))?;
    Ok(Variation { input, rows, crossings })
}

#[expect(clippy::cast_precision_loss, reason = "counts of rows are small")]
fn grid(
    evaluator: &Evaluator,
    input: usize,
    range: &RangeInclusive<f64>,
    cells: usize,
) -> Result<Vec<Row>, StudyError> {
    let (low, high) = (*range.start(), *range.end());
    (0..=cells)
        .map(|i| {
            let share = i as f64 / cells as f64;
            let value = low * (1.0 - share) + high * share;
            Ok(Row { value, run: evaluator.at(&[(input, value)])? })
        })
        .collect()
}

fn crossings(evaluator: &Evaluator, input: usize, rows: &[Row]) -> Result<Vec<Crossing>, StudyError> {
    let mut found = Vec::new();
    for pair in rows.windows(2) {
        let [a, b] = pair else { continue };
        for kind in evaluator.kinds() {
            if verdict(&a.run, *kind) != verdict(&b.run, *kind) && holds(&a.run, *kind) != holds(&b.run, *kind) {
                found.push(crossing(evaluator, input, *kind, [a, b])?);
            }
        }
    }
    Ok(found)
}

/// The verdict of a check; one that does not apply holds.
fn verdict(run: &Run, kind: CheckKind) -> Verdict {
    run.check(kind).map_or(Verdict::Holds, |check| check.verdict)
}

fn holds(run: &Run, kind: CheckKind) -> bool {
    verdict(run, kind) == Verdict::Holds
}

/// Halves a bracket until its ends are neighbours; it works across jumps and runs without a margin as well.
fn crossing(evaluator: &Evaluator, input: usize, kind: CheckKind, ends: [&Row; 2]) -> Result<Crossing, StudyError> {
    let [mut a, mut b] = ends.map(Row::clone);
    let first = holds(&a.run, kind);
    for _ in 0..HALVINGS {
        let value = f64::midpoint(a.value, b.value);
        if value == a.value || value == b.value {
            break;
        }
        let run = evaluator.at(&[(input, value)])?;
        let end = if holds(&run, kind) == first { &mut a } else { &mut b };
        *end = Row { value, run };
    }
    let small = |row: &Row| row.run.check(kind).is_some_and(|c| c.relative().abs() < ZERO_SHARE);
    let (below, above) = (verdict(&a.run, kind), verdict(&b.run, kind));
    let through_zero = small(&a) && small(&b);
    let (value, beyond) = if first { (a.value, b.value) } else { (b.value, a.value) };
    Ok(Crossing { kind, value, beyond, below, above, through_zero })
}
