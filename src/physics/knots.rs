//! A smooth rising curve as a piecewise-linear law with few knots and a known error.
use super::{Table, TableError};

/// A table and how well it follows its curve.
#[derive(Clone, Debug, PartialEq)]
pub struct Fit {
    /// The table, its abscissa counted from the start of the curve.
    pub table: Table,
    /// Largest difference between table and curve found at all knots and 15 points inside each piece, in units of the
    /// ordinate.
    pub error: f64,
}

/// Cells of a stretch over which the curvature is summed.
const CELLS: u32 = 128;
/// Points inside a piece where the error is measured.
const PROBES: u32 = 15;
/// A knot on the curve leaves an error of 3/2 of what is left when the knots are moved to the mean of the curve.
const GAIN: f64 = 1.5;
/// How much denser the knots are put when the error was too large, and how often.
const DENSER: f64 = 1.1;
/// See [`DENSER`].
const TRIES: u32 = 40;

/// Fits a table to a curve.
///
/// `bounds` (two or more, rising) are the ends of the stretches in which the curve is smooth, with a kink at most between
/// them; `curve` rises from 0 at the first bound; `area` is its exact integral from there. Knots are placed so that each
/// piece has the same share of `sqrt(|f''|)`, at least two pieces a stretch, then moved off the curve by the mean error of their two pieces, so that the
/// table's area up to the last bound is that of the curve. First and last knot stay on the curve.
///
/// Accuracy: `error <= tolerance` unless 40 rounds of denser knots do not reach it, which [`Fit::error`] then shows.
///
/// # Errors
/// When the knots do not rise in any round, as for a curve that does not rise.
///
/// # Reference
/// Equal shares of the root of the curvature: de Boor, A Practical Guide to Splines (1978), chapter XII.
pub fn fit(
    bounds: &[f64],
    curve: impl Fn(f64) -> f64,
    area: impl Fn(f64) -> f64,
    tolerance: f64,
) -> Result<Fit, TableError> {
    let shares: Vec<Vec<f64>> = bounds.windows(2).map(|ends| shares(ends[0], ends[1], &curve)).collect();
    let mut density = (8.0 * GAIN * tolerance).sqrt().recip();
    let mut best = Err(TableError::TooShort { rows: 0 });
    for _ in 0..TRIES {
        let fit = fit_at(&places(bounds, &shares, density), &curve, &area);
        if fit.as_ref().is_ok_and(|fit| fit.error <= tolerance) {
            return fit;
        }
        // Moves fall with the square of the pieces, rises with the pieces: denser knots rise where the curve does, also
        // on a flat stretch beside a steep one.
        if fit.is_ok() || best.is_err() {
            best = fit;
        }
        density *= DENSER;
    }
    best
}

/// A law in series with a spring, N/m: at each force the elongations add. Exact, with the same knots.
///
/// # Errors
/// When the stiffness is not above 0.
pub fn with_spring(table: &Table, stiffness_n_per_m: f64) -> Result<Table, TableError> {
    Table::elastic(table.knots().iter().map(|&(x, y)| (x + y / stiffness_n_per_m, y)).collect())
}

/// Running sum of `sqrt(|f''|)` over the cells of one stretch.
fn shares(from: f64, to: f64, curve: &impl Fn(f64) -> f64) -> Vec<f64> {
    let cell = (to - from) / f64::from(CELLS);
    let mut sum = 0.0;
    let mut sums = vec![0.0];
    sums.extend((0..CELLS).map(|i| {
        let left = from + f64::from(i) * cell;
        let bend = curve(left) - 2.0 * curve(left + 0.5 * cell) + curve(left + cell);
        sum += 2.0 * bend.abs().sqrt();
        sum
    }));
    sums
}

fn places(bounds: &[f64], shares: &[Vec<f64>], density: f64) -> Vec<f64> {
    let mut places = vec![bounds[0]];
    for (ends, sums) in bounds.windows(2).zip(shares) {
        let total = sums[sums.len() - 1];
        let pieces = (total * density).ceil().max(2.0);
        let width = (ends[1] - ends[0]) / f64::from(CELLS);
        let mut number = 1.0;
        while number < pieces {
            let wanted = total * number / pieces;
            let cell = sums.partition_point(|&sum| sum <= wanted).clamp(1, sums.len() - 1);
            let within = (wanted - sums[cell - 1]) / (sums[cell] - sums[cell - 1]);
            #[expect(clippy::cast_precision_loss, reason = "at most the number of cells")]
            places.push(ends[0] + (cell as f64 - 1.0 + within) * width);
            number += 1.0;
        }
        places.push(ends[1]);
    }
    places
}

fn fit_at(places: &[f64], curve: &impl Fn(f64) -> f64, area: &impl Fn(f64) -> f64) -> Result<Fit, TableError> {
    let on: Vec<(f64, f64)> = places.iter().map(|&x| (x, curve(x))).collect();
    let areas: Vec<f64> = places.iter().map(|&x| area(x)).collect();
    let moves = moves(&on, &areas);
    let knots: Vec<(f64, f64)> = on.iter().zip(&moves).map(|(&(x, y), by)| (x - places[0], y - by)).collect();
    let table = Table::elastic(anchored(knots))?;
    let error = places.windows(2).flat_map(probes).map(|x| (table.value(x - places[0]) - curve(x)).abs());
    let error = error.chain(moves.iter().map(|by| by.abs())).fold(0.0, f64::max);
    Ok(Fit { table, error })
}

/// The curve starts at 0 but for rounding.
fn anchored(mut knots: Vec<(f64, f64)>) -> Vec<(f64, f64)> {
    knots[0] = (0.0, 0.0);
    knots
}

fn probes(ends: &[f64]) -> impl Iterator<Item = f64> + use<> {
    let (from, step) = (ends[0], (ends[1] - ends[0]) / f64::from(PROBES + 1));
    (1..=PROBES).map(move |i| from + f64::from(i) * step)
}

/// How far each knot moves down: the mean error of its two pieces, and what makes the whole area right.
fn moves(on: &[(f64, f64)], areas: &[f64]) -> Vec<f64> {
    let widths: Vec<f64> = on.windows(2).map(|w| w[1].0 - w[0].0).collect();
    let extra: Vec<f64> =
        (0..widths.len()).map(|i| 0.5 * (on[i].1 + on[i + 1].1) * widths[i] - (areas[i + 1] - areas[i])).collect();
    let mut moves = vec![0.0; on.len()];
    for i in 1..widths.len() {
        moves[i] = 0.5 * (extra[i - 1] / widths[i - 1] + extra[i] / widths[i]);
    }
    // What is still missing is taken in proportion to the force, which keeps the knots rising.
    let reach = |i: usize| 0.5 * (widths[i - 1] + widths[i]);
    let taken: f64 = (1..widths.len()).map(|i| moves[i] * reach(i)).sum();
    let lever: f64 = (1..widths.len()).map(|i| on[i].1 * reach(i)).sum();
    let share = (extra.iter().sum::<f64>() - taken) / lever;
    for i in 1..widths.len() {
        moves[i] += share * on[i].1;
    }
    moves
}
