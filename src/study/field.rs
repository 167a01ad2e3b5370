//! Two inputs across a grid: the verdict of every cell, and the lines along which a verdict changes.
use super::evaluate::{Evaluator, Failure, Run, StudyError};
use super::zero::Contour;
use crate::margin::{Check, CheckKind, Verdict, governing_first, worst};
use rayon::prelude::*;
use std::ops::{ControlFlow, RangeInclusive};

/// Most values along one input.
pub const MOST_STEPS: usize = 400;
/// Cells that are run between two looks at whether to stop, at least; always whole rows.
const BATCH: usize = 512;

/// One input of a field.
#[derive(Clone, Debug, PartialEq)]
pub struct Axis {
    /// Number of the input in [`Evaluator::inputs`].
    pub input: usize,
    /// Range, SI, low below high.
    pub range: RangeInclusive<f64>,
    /// Evenly spaced values, both ends included; 2 to [`MOST_STEPS`].
    pub steps: usize,
}

impl Axis {
    /// The value with a number from 0, SI.
    #[must_use]
    #[expect(clippy::cast_precision_loss, reason = "steps are few")]
    pub fn value(&self, step: usize) -> f64 {
        let share = step as f64 / (self.steps.max(2) - 1) as f64;
        *self.range.start() * (1.0 - share) + *self.range.end() * share
    }
}

/// One cell of the grid: the checks with both inputs at its values and all others at their typical values.
#[derive(Clone, Debug, PartialEq)]
pub struct Cell {
    /// Every check that applies; all open where the run failed.
    pub checks: Vec<Check>,
    /// Why the run has no numbers.
    pub failure: Option<Failure>,
}

impl Cell {
    fn of(run: Run) -> Self {
        Self { checks: run.checks, failure: run.failure }
    }

    /// The worst verdict of all checks; `open` where the run failed or nothing can be judged.
    #[must_use]
    pub fn verdict(&self) -> Verdict {
        worst(self.checks.iter().map(|check| check.verdict))
    }

    /// The check that governs, where there is one; its margin is the governing margin of the cell, SI.
    #[must_use]
    pub fn governing(&self) -> Option<&Check> {
        self.checks.iter().min_by(|a, b| governing_first(a, b))
    }

    /// The check of a kind, where it applies.
    #[must_use]
    pub fn check(&self, kind: CheckKind) -> Option<&Check> {
        self.checks.iter().find(|check| check.kind == kind)
    }
}

/// What a line of a field parts.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Of {
    /// All checks together: where every check holds from where one does not.
    All,
    /// One check.
    One(CheckKind),
}

/// A point of a line, refined along one edge of the grid.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Edge {
    /// Value of the first input, SI.
    pub x: f64,
    /// Value of the second input, SI.
    pub y: f64,
    /// The check that changes; of several at once the one that governs.
    pub kind: Option<CheckKind>,
    /// The verdict on the side that does not hold.
    pub beyond: Verdict,
    /// True where a margin passes through zero; false where the verdict jumps (a stroke used up, a model that stops
    /// being valid, a run that fails).
    pub through_zero: bool,
}

/// A piece of a line across one cell of the grid.
pub type Piece = [Edge; 2];

/// A grid of verdicts.
#[derive(Clone, Debug, PartialEq)]
pub struct Field {
    /// The first input, drawn to the right.
    pub across: Axis,
    /// The second input, drawn upwards.
    pub up: Axis,
    /// Row by row from the low end of the second input, each from the low end of the first; whole rows only.
    pub cells: Vec<Cell>,
    /// Where all checks together change between holding and not holding, see [`zero_line`].
    pub line: Vec<Piece>,
    /// True when it was stopped before every row was run and the line refined.
    pub partial: bool,
}

impl Field {
    /// A cell by its steps; none where it was not run.
    #[must_use]
    pub fn cell(&self, across: usize, up: usize) -> Option<&Cell> {
        if across < self.across.steps { self.cells.get(up * self.across.steps + across) } else { None }
    }

    /// Rows that were run, from the low end.
    #[must_use]
    pub const fn rows(&self) -> usize {
        self.cells.len() / self.across.steps
    }

    /// How many cells have a verdict.
    #[must_use]
    pub fn count(&self, verdict: Verdict) -> usize {
        self.cells.iter().filter(|cell| cell.verdict() == verdict).count()
    }

    /// How many runs failed.
    #[must_use]
    pub fn failed(&self) -> usize {
        self.cells.iter().filter(|cell| cell.failure.is_some()).count()
    }
}

/// Runs a grid of two inputs, all others at their typical values, in parallel on the current rayon pool.
///
/// `watch` is told how many cells are run after every part of the grid and may break off: whole rows that are there are
/// kept, the line is left out, and the result is marked by [`Field::partial`]. The same field comes out on any number of threads.
///
/// # Errors
/// [`StudyError::Axis`] for an empty or reversed range, a count outside of 2 to [`MOST_STEPS`], or one input twice;
/// otherwise as [`Evaluator::at`].
pub fn field(
    evaluator: &Evaluator,
    across: Axis,
    up: Axis,
    watch: &mut dyn FnMut(usize) -> ControlFlow<()>,
) -> Result<Field, StudyError> {
    fits(evaluator, [&across, &up])?;
    let mut field = Field { across, up, cells: Vec::new(), line: Vec::new(), partial: true };
    let rows_at_once = BATCH.div_ceil(field.across.steps);
    while field.rows() < field.up.steps {
        let rows = field.rows()..(field.rows() + rows_at_once).min(field.up.steps);
        let batch = rows.start * field.across.steps..rows.end * field.across.steps;
        let cells = batch.into_par_iter().map(|place| run(evaluator, &field, place)).collect::<Result<Vec<_>, _>>()?;
        field.cells.extend(cells);
        if watch(field.cells.len()).is_break() {
            return Ok(field);
        }
    }
    field.line = zero_line(evaluator, &field, Of::All)?;
    field.partial = false;
    Ok(field)
}

fn fits(evaluator: &Evaluator, axes: [&Axis; 2]) -> Result<(), StudyError> {
    for axis in axes {
        let count = evaluator.inputs().len();
        let input = evaluator.inputs().get(axis.input).ok_or(StudyError::NoInput { index: axis.input, count })?;
        let wide = axis.range.start() < axis.range.end();
        let finite = axis.range.start().is_finite() && axis.range.end().is_finite();
        if !wide || !finite || !(2..=MOST_STEPS).contains(&axis.steps) || axes[0].input == axes[1].input {
            return Err(StudyError::Axis { path: input.path.clone(), most: MOST_STEPS });
        }
    }
    Ok(())
}

fn run(evaluator: &Evaluator, field: &Field, place: usize) -> Result<Cell, StudyError> {
    let (across, up) = (&field.across, &field.up);
    let values = [(across.input, across.value(place % across.steps)), (up.input, up.value(place / across.steps))];
    Ok(Cell::of(evaluator.peaks_at(&values)?))
}

/// Where a check, or all together, changes between holding and not holding, as pieces of a line, one or two in a cell.
///
/// Every point is found by root finding along an edge between two neighbours of the grid, not read off it: the margin
/// there is within 1e-9 of the limit of zero, or the verdict jumps within a ten-thousandth of the edge. Between its points a
/// piece is straight where the line may bend, and what changes twice between two neighbours is missed. A check that does
/// not apply holds.
///
/// # Errors
/// As [`Evaluator::at`].
pub fn zero_line(evaluator: &Evaluator, field: &Field, of: Of) -> Result<Vec<Piece>, StudyError> {
    Contour::new(evaluator, field, of).pieces()
}
