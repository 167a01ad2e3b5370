//! Lines through a grid of verdicts: which edges of the grid are crossed, and where on each.
use super::evaluate::{Evaluator, StudyError};
use super::field::{Cell, Edge, Field, Of, Piece};
use crate::margin::{Check, Verdict};
use rayon::prelude::*;

/// A margin below this share of the limit is zero.
const ZERO_SHARE: f64 = 1e-9;
/// A bracket of this share of an edge is a point, where no margin leads to it and where one does.
const POINT_SHARE: [f64; 2] = [1e-6, 1e-9];
/// Margins on both sides of a point below this share of the limit are those of a zero, larger ones of a jump.
const SMALL_SHARE: f64 = 1e-6;
/// Rounds on one edge; halving alone needs 20 to come to a point.
const ROUNDS: usize = 60;

/// One line to be drawn.
pub(super) struct Contour<'a> {
    evaluator: &'a Evaluator,
    field: &'a Field,
    of: Of,
    /// By cell: whether it holds.
    holds: Vec<bool>,
}

/// Whether a place holds, and the margin that a root is sought of.
#[derive(Clone, Copy)]
struct Sight {
    holds: bool,
    /// The check that governs.
    check: Option<Check>,
}

/// One end of a bracket on an edge: the share of the edge from its first end, and what was seen there.
#[derive(Clone, Copy)]
struct End {
    share: f64,
    sight: Sight,
    /// The margin as a share of the limit, of the check that is followed; halved by Illinois steps.
    room: Option<f64>,
}

impl<'a> Contour<'a> {
    pub(super) fn new(evaluator: &'a Evaluator, field: &'a Field, of: Of) -> Self {
        let holds = field.cells.iter().map(|cell| sight(cell.checks.as_slice(), of).holds).collect();
        Self { evaluator, field, of, holds }
    }

    /// Every piece, in the order of the cells.
    pub(super) fn pieces(&self) -> Result<Vec<Piece>, StudyError> {
        let (columns, rows) = (self.field.across.steps, self.field.rows());
        let level = rows * (columns - 1);
        let edges = level + columns * rows.saturating_sub(1);
        let points = (0..edges).into_par_iter().map(|number| self.point(number)).collect::<Result<Vec<_>, _>>()?;
        let mut pieces = Vec::new();
        for up in 0..rows.saturating_sub(1) {
            for across in 0..columns - 1 {
                let at = |number: usize| points.get(number).copied().flatten();
                // Around the cell: below, right, above, left.
                let below = at(up * (columns - 1) + across);
                let above = at((up + 1) * (columns - 1) + across);
                let [left, right] = [0, 1].map(|d| at(level + up * columns + across + d));
                self.join([below, right, above, left], (across, up), &mut pieces)?;
            }
        }
        Ok(pieces)
    }

    /// The point of an edge: first all edges to the right, row by row, then all upward.
    fn point(&self, number: usize) -> Result<Option<Edge>, StudyError> {
        let (columns, rows) = (self.field.across.steps, self.field.rows());
        let level = rows * (columns - 1);
        let (a, b) = if number < level {
            let first = number / (columns - 1) * columns + number % (columns - 1);
            (first, first + 1)
        } else {
            (number - level, number - level + columns)
        };
        if self.holds[a] == self.holds[b] { Ok(None) } else { self.refine(a, b).map(Some) }
    }

    /// Two points make a piece; of four, the middle of the cell tells which belong together.
    fn join(
        &self,
        points: [Option<Edge>; 4],
        (across, up): (usize, usize),
        pieces: &mut Vec<Piece>,
    ) -> Result<(), StudyError> {
        let [Some(below), Some(right), Some(above), Some(left)] = points else {
            let found: Vec<Edge> = points.into_iter().flatten().collect();
            if let [a, b] = found[..] {
                pieces.push([a, b]);
            }
            return Ok(());
        };
        let axes = [&self.field.across, &self.field.up];
        let [x, y] =
            [(axes[0], across), (axes[1], up)].map(|(axis, i)| f64::midpoint(axis.value(i), axis.value(i + 1)));
        let middle = self.look(x, y)?.holds;
        let corner = self.holds[up * axes[0].steps + across];
        let joined = if middle == corner { [[below, right], [above, left]] } else { [[below, left], [right, above]] };
        pieces.extend(joined);
        Ok(())
    }

    fn look(&self, x: f64, y: f64) -> Result<Sight, StudyError> {
        let run = self.evaluator.at(&[(self.field.across.input, x), (self.field.up.input, y)])?;
        Ok(sight(&run.checks, self.of))
    }

    /// The change between two neighbours: regula falsi after Illinois on the margin that changes sign, halving where there is
    /// none or where it does not shrink the bracket.
    ///
    /// # Reference
    /// Dowell and Jarratt (1971), BIT 11:168-174.
    fn refine(&self, a: usize, b: usize) -> Result<Edge, StudyError> {
        let (from, to) = (self.place(a), self.place(b));
        let at = |share: f64| (from.0 + share * (to.0 - from.0), from.1 + share * (to.1 - from.1));
        let end = |share: f64, sight: Sight| End { share, sight, room: sight.room() };
        let cell = |place: usize| sight(cell_checks(&self.field.cells[place]), self.of);
        let mut ends = [end(0.0, cell(a)), end(1.0, cell(b))];
        let mut last = None;
        for round in 0..ROUNDS {
            let width = ends[1].share - ends[0].share;
            if width <= POINT_SHARE[usize::from(ends.iter().all(|end| end.room.is_some()))] {
                break;
            }
            let share = guess(&ends, round);
            let (x, y) = at(share);
            let seen = self.look(x, y)?;
            if seen.room().is_some_and(|room| room.abs() <= ZERO_SHARE) {
                let bad = ends[usize::from(ends[0].sight.holds)];
                let kind = seen.check.map(|c| c.kind);
                return Ok(Edge { x, y, kind, beyond: bad.sight.verdict(), through_zero: true });
            }
            let side = usize::from(seen.holds != ends[0].sight.holds);
            ends[side] = end(share, seen);
            if last == Some(side) {
                // The other end stays: its weight is halved, so that the next guess falls nearer to it.
                ends[1 - side].room = ends[1 - side].room.map(|room| room / 2.0);
            }
            last = Some(side);
        }
        Ok(jump(&ends, at))
    }

    fn place(&self, number: usize) -> (f64, f64) {
        let across = &self.field.across;
        (across.value(number % across.steps), self.field.up.value(number / across.steps))
    }
}

/// The verdict jumps: the point on the side that holds, and the check that stops holding.
fn jump(ends: &[End; 2], at: impl Fn(f64) -> (f64, f64)) -> Edge {
    let [good, bad] = if ends[0].sight.holds { [ends[0], ends[1]] } else { [ends[1], ends[0]] };
    let (x, y) = at(good.share);
    let small = |end: End| end.sight.room().is_some_and(|room| room.abs() <= SMALL_SHARE);
    let (kind, beyond) = (bad.sight.check.map(|c| c.kind), bad.sight.verdict());
    Edge { x, y, kind, beyond, through_zero: small(good) && small(bad) }
}

fn cell_checks(cell: &Cell) -> &[Check] {
    &cell.checks
}

impl Sight {
    fn verdict(&self) -> Verdict {
        self.check.map_or(Verdict::Open, |check| check.verdict)
    }

    /// The margin as a share of the limit where it tells the side: positive where it holds, negative where not.
    fn room(&self) -> Option<f64> {
        let check = self.check?;
        let room = check.relative();
        let tells = check.margin.is_some() && room.is_finite() && (room >= 0.0) == self.holds;
        tells.then_some(room)
    }
}

fn sight(checks: &[Check], of: Of) -> Sight {
    match of {
        Of::One(kind) => {
            let check = checks.iter().find(|check| check.kind == kind).copied();
            Sight { holds: check.is_none_or(|check| check.verdict == Verdict::Holds), check }
        }
        Of::All => {
            // The worst verdict, then the least room: that of the run and of stated values alike, so that the margin
            // is continuous where no verdict jumps.
            let worse = |a: &&Check, b: &&Check| b.verdict.cmp(&a.verdict).then(a.relative().total_cmp(&b.relative()));
            let check = checks.iter().min_by(worse).copied();
            Sight { holds: check.is_some_and(|check| check.verdict == Verdict::Holds), check }
        }
    }
}

/// Where to look next between two ends.
fn guess(ends: &[End; 2], round: usize) -> f64 {
    let [a, b] = ends;
    let middle = f64::midpoint(a.share, b.share);
    match (a.room, b.room) {
        // Every fourth round halves, so that no bracket is stuck at a kink.
        (Some(p), Some(q)) if round % 4 != 3 && p != q => {
            let share = a.share + (b.share - a.share) * p / (p - q);
            if share > a.share && share < b.share { share } else { middle }
        }
        _ => middle,
    }
}
