//! Lines through a grid of verdicts: which edges of the grid are crossed, and where on each.
use super::evaluate::{Evaluator, StudyError};
use super::field::{Edge, Field, Of, Piece};
use crate::margin::{Check, CheckKind, Verdict};
use rayon::prelude::*;

/// A margin below this share of the limit is zero.
const ZERO_SHARE: f64 = 1e-9;
/// A bracket of this share of an edge is a point, where no margin leads to it and where one does.
const POINT_SHARE: [f64; 2] = [1e-4, 1e-9];
/// Margins on both sides of a point below this share of the limit are those of a zero, larger ones of a jump.
const SMALL_SHARE: f64 = 1e-6;
/// Rounds on one edge; halving alone needs 14 to come to a point.
const ROUNDS: usize = 60;

/// One line to be drawn.
pub(super) struct Contour<'a> {
    evaluator: &'a Evaluator,
    field: &'a Field,
    of: Of,
    /// By cell: whether it holds.
    holds: Vec<bool>,
}

/// One end of a bracket on an edge: the share of the edge from its first end, and the checks there.
struct End {
    share: f64,
    holds: bool,
    checks: Vec<Check>,
    /// Halved by Illinois steps while the end stays.
    weight: f64,
}

impl<'a> Contour<'a> {
    pub(super) fn new(evaluator: &'a Evaluator, field: &'a Field, of: Of) -> Self {
        let holds = field.cells.iter().map(|cell| holds(&cell.checks, of)).collect();
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
        let middle = holds(&self.look(x, y)?, self.of);
        let corner = self.holds[up * axes[0].steps + across];
        let joined = if middle == corner { [[below, right], [above, left]] } else { [[below, left], [right, above]] };
        pieces.extend(joined);
        Ok(())
    }

    fn look(&self, x: f64, y: f64) -> Result<Vec<Check>, StudyError> {
        Ok(self.evaluator.peaks_at(&[(self.field.across.input, x), (self.field.up.input, y)])?.checks)
    }

    /// The change between two neighbours: regula falsi after Illinois on the margin of the check that governs on the side
    /// that does not hold, halving where that margin does not change its sign. Which side a place is on is told by the
    /// verdicts alone.
    ///
    /// # Reference
    /// Dowell and Jarratt (1971), BIT 11:168-174.
    fn refine(&self, a: usize, b: usize) -> Result<Edge, StudyError> {
        let (from, to) = (self.place(a), self.place(b));
        let at = |share: f64| (from.0 + share * (to.0 - from.0), from.1 + share * (to.1 - from.1));
        let end = |share: f64, checks: Vec<Check>| End { share, holds: holds(&checks, self.of), checks, weight: 1.0 };
        let checks = |place: usize| self.field.cells[place].checks.clone();
        let mut ends = [end(0.0, checks(a)), end(1.0, checks(b))];
        let mut last = None;
        for round in 0..ROUNDS {
            let bad = &ends[usize::from(ends[0].holds)];
            let followed = governing(&bad.checks, self.of).map(|check| check.kind);
            let rooms = followed.and_then(|kind| crossed(&ends, kind));
            if ends[1].share - ends[0].share <= POINT_SHARE[usize::from(rooms.is_some())] {
                break;
            }
            let share = guess(&ends, rooms, round);
            let (x, y) = at(share);
            let seen = end(share, self.look(x, y)?);
            let governs = governing(&seen.checks, self.of).map(|check| check.kind);
            let room = followed.and_then(|kind| room(&seen.checks, kind));
            if rooms.is_some() && (seen.holds || governs == followed) && room.is_some_and(|r| r.abs() <= ZERO_SHARE) {
                let beyond = governing(&bad.checks, self.of).map_or(Verdict::Open, |check| check.verdict);
                return Ok(Edge { x, y, kind: followed, beyond, through_zero: true });
            }
            let side = usize::from(seen.holds != ends[0].holds);
            ends[side] = seen;
            if last == Some(side) {
                ends[1 - side].weight /= 2.0;
            }
            last = Some(side);
        }
        Ok(self.point_between(&ends, at))
    }

    /// The bracket is a point: it lies on the side that holds, and names the check that stops holding.
    fn point_between(&self, ends: &[End; 2], at: impl Fn(f64) -> (f64, f64)) -> Edge {
        let [good, bad] = if ends[0].holds { [&ends[0], &ends[1]] } else { [&ends[1], &ends[0]] };
        let (x, y) = at(good.share);
        let check = governing(&bad.checks, self.of);
        let kind = check.map(|check| check.kind);
        let small = |end: &End| kind.and_then(|kind| room(&end.checks, kind)).is_some_and(|r| r.abs() <= SMALL_SHARE);
        let beyond = check.map_or(Verdict::Open, |check| check.verdict);
        Edge { x, y, kind, beyond, through_zero: small(good) && small(bad) }
    }

    fn place(&self, number: usize) -> (f64, f64) {
        let across = &self.field.across;
        (across.value(number % across.steps), self.field.up.value(number / across.steps))
    }
}

/// The check that governs: the one that is followed or, of all, the worst verdict and within it the least room.
fn governing(checks: &[Check], of: Of) -> Option<&Check> {
    let worse = |a: &&Check, b: &&Check| b.verdict.cmp(&a.verdict).then(a.relative().total_cmp(&b.relative()));
    match of {
        Of::One(kind) => checks.iter().find(|check| check.kind == kind),
        Of::All => checks.iter().min_by(worse),
    }
}

/// Whether a place is on the good side of a line; a single check that does not apply is.
fn holds(checks: &[Check], of: Of) -> bool {
    let check = governing(checks, of);
    match of {
        Of::One(_) => check.is_none_or(|check| check.verdict == Verdict::Holds),
        Of::All => check.is_some_and(|check| check.verdict == Verdict::Holds),
    }
}

/// The margin of a check as a share of its limit, where it has one.
fn room(checks: &[Check], kind: CheckKind) -> Option<f64> {
    let check = checks.iter().find(|check| check.kind == kind)?;
    check.margin.map(|_| check.relative()).filter(|room| room.is_finite())
}

/// The margins of a check at both ends where it passes through zero between them, weighted; none where it does not, as
/// where it is zero all along the side that holds.
fn crossed(ends: &[End; 2], kind: CheckKind) -> Option<[f64; 2]> {
    let [a, b] = [room(&ends[0].checks, kind)?, room(&ends[1].checks, kind)?];
    let [good, bad] = if ends[0].holds { [a, b] } else { [b, a] };
    (good > ZERO_SHARE && bad < 0.0).then_some([a * ends[0].weight, b * ends[1].weight])
}

/// Where to look next between two ends.
fn guess(ends: &[End; 2], rooms: Option<[f64; 2]>, round: usize) -> f64 {
    let [a, b] = [ends[0].share, ends[1].share];
    let middle = f64::midpoint(a, b);
    match rooms {
        // Every fourth round halves, so that no bracket is stuck at a kink.
        Some([p, q]) if round % 4 != 3 => {
            let share = a + (b - a) * p / (p - q);
            if share > a && share < b { share } else { middle }
        }
        _ => middle,
    }
}
