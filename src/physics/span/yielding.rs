//! A span with an in-line absorber as a part of the path whose law changes each time its stretch turns back.
use super::{SpanCurve, SpanError};
use crate::physics::{Table, knots};

/// A stretch this near beyond the last turning point counts as being there, relative.
const HAIR: f64 = 1e-9;

/// The law of a span, with a spring in series where there is one, between two turning points of its stretch.
///
/// Stretch counts from where the cable is just taut with the length deployed so far. While the stretch grows beyond
/// [`YieldingSpan::yields_from_m`] the absorber obeys `T <= F` and deploys; once it has turned back the law is that of
/// the longer cable, elastic up to the turning point and the old law beyond: [`YieldingSpan::turned`].
#[derive(Clone, Debug, PartialEq)]
pub struct YieldingSpan {
    curve: SpanCurve,
    spring_n_per_m: Option<f64>,
    largest_n: f64,
    share: f64,
    table: Table,
    yields_from_m: Option<f64>,
    used_up_at_m: Option<f64>,
}

impl YieldingSpan {
    /// Law on first loading: force of one line up to `largest_n`, N, within `share` of it; `spring_n_per_m` is the
    /// stiffness in series, N/m.
    ///
    /// # Errors
    /// When the knots do not rise.
    pub fn new(curve: SpanCurve, spring_n_per_m: Option<f64>, largest_n: f64, share: f64) -> Result<Self, SpanError> {
        let bare = curve.envelope_table(largest_n, share)?.table;
        let end = bare.knots()[bare.pieces()].0;
        let taut = curve.slack_m();
        let bounds = curve.deployment_bounds_m().map(|bounds| bounds.map(|at| at - taut));
        let stretch = |x: f64| x + spring_n_per_m.map_or(0.0, |k| bare.value(x) / k);
        let within = |x: f64| (x < end).then(|| stretch(x));
        let (yields_from_m, used_up_at_m) = (bounds.and_then(|b| within(b[0])), bounds.and_then(|b| within(b[1])));
        let table = match spring_n_per_m {
            Some(k) => knots::with_spring(&bare, k)?,
            None => bare,
        };
        Ok(Self { curve, spring_n_per_m, largest_n, share, table, yields_from_m, used_up_at_m })
    }

    /// Force of one line, N, over the stretch, m.
    #[must_use]
    pub const fn table(&self) -> &Table {
        &self.table
    }

    /// Stretch beyond which it gives for good, m; none when it does so no more, or not within its table.
    #[must_use]
    pub const fn yields_from_m(&self) -> Option<f64> {
        self.yields_from_m
    }

    /// Stretch at which the stroke is used up, m; none when it is so already, or not within the table.
    #[must_use]
    pub const fn used_up_at_m(&self) -> Option<f64> {
        self.used_up_at_m
    }

    /// Length deployed up to the last turning point, m.
    #[must_use]
    pub const fn deployed_m(&self) -> f64 {
        self.curve.deployed_m()
    }

    /// Length deployed, m, at a stretch in m that grows.
    #[must_use]
    pub fn deployed_at_m(&self, stretch_m: f64) -> f64 {
        if self.yields_from_m.is_none_or(|from| stretch_m <= from) {
            return self.curve.deployed_m();
        }
        self.curve.loading(self.deflection_m(stretch_m)).deployed_m
    }

    /// Work the absorber has taken in all, J for each worker, at a stretch in m that grows.
    #[must_use]
    pub fn taken_j(&self, stretch_m: f64) -> f64 {
        self.curve.slider_work_j(self.deployed_at_m(stretch_m))
    }

    /// The law after the stretch has turned back at a value in m, beyond [`YieldingSpan::yields_from_m`], and how much
    /// farther down the longer cable is just taut, m: stretch counts from there.
    ///
    /// At the turning point both laws have the same force exactly, and beyond it they are the same.
    ///
    /// # Errors
    /// When the knots do not rise.
    pub fn turned(&self, stretch_m: f64) -> Result<(Self, f64), SpanError> {
        let force_n = self.table.value(stretch_m);
        let curve = self.curve.with_deployed(self.deployed_at_m(stretch_m));
        let shift_m = curve.slack_m() - self.curve.slack_m();
        let turn_m = stretch_m - shift_m;
        let elastic = curve.table(force_n, self.share * self.largest_n / force_n)?.table;
        let mut knots = self.fitted(&elastic, turn_m, force_n);
        let beyond = self.table.knots().iter().filter(|&&(x, y)| x > stretch_m * (1.0 + HAIR) && y > force_n);
        knots.extend(beyond.map(|&(x, y)| (x - shift_m, y)));
        let last = knots[knots.len() - 1];
        if last.0 <= turn_m {
            let slope = self.table.piece(self.table.pieces() - 1).slope;
            knots.push((turn_m * 2.0, force_n + slope * turn_m));
        }
        let gives = !curve.is_used_up();
        let used_up_at_m = self.used_up_at_m.map(|at| at - shift_m).filter(|_| gives);
        let table = Table::elastic(knots)?;
        Ok((Self { curve, table, yields_from_m: gives.then_some(turn_m), used_up_at_m, ..*self }, shift_m))
    }

    /// An elastic table with the spring, its ends moved onto the turning point.
    fn fitted(&self, elastic: &Table, turn_m: f64, force_n: f64) -> Vec<(f64, f64)> {
        let end = elastic.knots()[elastic.pieces()];
        let (wide, high) = (turn_m - self.spring_m(force_n), force_n / end.1);
        let place = |&(x, y): &(f64, f64)| (x * wide / end.0 + self.spring_m(y * high), y * high);
        let mut knots: Vec<_> = elastic.knots().iter().map(place).collect();
        if let Some(last) = knots.last_mut() {
            *last = (turn_m, force_n);
        }
        knots
    }

    fn spring_m(&self, force_n: f64) -> f64 {
        self.spring_n_per_m.map_or(0.0, |k| force_n / k)
    }

    /// Deflection of the span alone, from the chord.
    fn deflection_m(&self, stretch_m: f64) -> f64 {
        self.curve.slack_m() + stretch_m - self.spring_m(self.table.value(stretch_m))
    }
}
