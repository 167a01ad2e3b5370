//! The nearest value of one input at which every check holds.
use super::StudyError;
use super::held::{Held, Judge, Look, Values};
use super::remedy::{Span, Way, Without};
use crate::quantity::{Unit, format_unit, parse_quantity};

/// Cells of the search on each side of today's value.
const CELLS: u32 = 400;
/// Halvings of a bracket.
pub(super) const HALVINGS: usize = 60;
/// Rounds in which places of the bands join those where every check must hold.
pub(super) const ROUNDS: usize = 16;
/// Digits to which a value is rounded to the holding side; more where the window is narrower than that.
pub(super) const DIGITS: [i32; 3] = [5, 8, 11];

/// The search of one input.
pub(super) struct Search<'a> {
    pub span: &'a Span,
    pub judge: Judge<'a>,
    pub held: Held,
}

impl Search<'_> {
    /// The nearest value; at the worst in rounds, see [`super::remedies_of`].
    pub fn way(mut self) -> Result<Result<Way, Without>, StudyError> {
        for _ in 0..ROUNDS {
            if self.judge.is_stopped() {
                return Ok(Err(Without::Stopped));
            }
            let Some((value, shown, ways)) = self.nearest()? else {
                let stopped = self.judge.is_stopped();
                return Ok(Err(if stopped { Without::Stopped } else { Without::NoneInRange }));
            };
            match self.judge.look(&[(self.span.index, value)])? {
                Look::Holds => return self.found(value, shown, ways).map(Ok),
                Look::Fails(places) => {
                    // Every place is tried: a place that is known already can be found once more.
                    let new = places.iter().filter(|place| self.judge.add(place)).count();
                    if new == 0 {
                        return Ok(Err(Without::Unsettled));
                    }
                }
                Look::Unclear => break,
            }
        }
        Ok(Err(if self.judge.is_stopped() { Without::Stopped } else { Without::Unsettled }))
    }

    fn found(&self, value: f64, shown: String, ways: usize) -> Result<Way, StudyError> {
        let narrowed = self.held == Held::Worst && self.span.input.measure.band.is_wide();
        let way_back = self.span.today() - value;
        let back = value + way_back.signum() * (STEP * value.abs()).min(way_back.abs());
        let place = self.judge.failing_place(&[(self.span.index, back)])?;
        Ok(way(self.span, value, shown, narrowed, ways, place.unwrap_or_default()))
    }

    fn holds(&self, value: f64) -> Result<bool, StudyError> {
        self.judge.holds(&[(self.span.index, value)])
    }

    /// The nearest value that holds at all known places, as the file would state it, and the number of stretches that
    /// hold.
    fn nearest(&self) -> Result<Option<(f64, String, usize)>, StudyError> {
        let today = self.span.today();
        if self.holds(today)? {
            let written = format_unit(today, self.span.input.measure.unit);
            return Ok(Some((today, written, 1)));
        }
        let mut nearest: Option<(f64, f64)> = None;
        let mut ways = 0;
        for end in [self.span.range.0, self.span.range.1] {
            let (first, count) = self.side(end)?;
            ways += count;
            let distance = |pair: (f64, f64)| (pair.1 - today).abs();
            nearest = match (nearest, first) {
                (Some(a), Some(b)) => Some(if distance(b) < distance(a) { b } else { a }),
                (a, b) => a.or(b),
            };
        }
        let Some((mut short, mut good)) = nearest else { return Ok(None) };
        for _ in 0..HALVINGS {
            let middle = f64::midpoint(short, good);
            if middle == short || middle == good {
                break;
            }
            *(if self.holds(middle)? { &mut good } else { &mut short }) = middle;
        }
        let (value, written) = self.rounded(good)?;
        Ok(Some((value, written, ways)))
    }

    /// From today's value to one end: the first bracket (not holding, holding), and how many stretches hold.
    fn side(&self, end: f64) -> Result<(Option<(f64, f64)>, usize), StudyError> {
        let (mut first, mut count) = (None, 0);
        let (mut last, mut held) = (self.span.today(), false);
        for i in 1..=CELLS {
            // Denser near today's value, where the answer is wanted.
            let share = (f64::from(i) / f64::from(CELLS)).powi(2);
            let value = self.span.today() * (1.0 - share) + end * share;
            let holds = self.holds(value)?;
            if holds && !held {
                count += 1;
                first = first.or(Some((last, value)));
            }
            (last, held) = (value, holds);
        }
        Ok((first, count))
    }

    /// The value as the file would state it: few digits, rounded away from today's value, and checked as it reads.
    fn rounded(&self, good: f64) -> Result<(f64, String), StudyError> {
        let unit = self.span.input.measure.unit;
        let away = (good - self.span.today()).signum();
        for digits in DIGITS {
            for more in [0.0, 1.0] {
                let Some((value, written)) = rounded(good, unit, digits, away, more) else { continue };
                if self.holds(value)? {
                    return Ok((value, written));
                }
            }
        }
        Ok((good, format_unit(good, unit)))
    }
}

/// A step back from a value, as a share of it, at which a check is known to fail.
const STEP: f64 = 1e-4;

/// A value rounded to some digits of its unit towards `way` (1 up, -1 down), and `more` steps further; with its text, read
/// back.
pub(super) fn rounded(value: f64, unit: Unit, digits: i32, way: f64, more: f64) -> Option<(f64, String)> {
    let shown = value / unit.factor();
    let step = 10_f64.powf(shown.abs().max(1e-12).log10().floor() - f64::from(digits));
    let first = (shown * way / step).ceil();
    let written = format_unit((first + more) * way * step * unit.factor(), unit);
    let (value, _) = parse_quantity(&written, unit.dimension()).ok()?;
    Some((value, written))
}

/// A value with its text and its change.
pub(super) fn way(span: &Span, value: f64, shown: String, narrowed: bool, ways: usize, place: Values) -> Way {
    let written = if narrowed { without_band(&shown) } else { shown.clone() };
    Way { value, written, shown, narrowed, relative: span.share(value), scale: span.scale, ways, place }
}

/// `1.5 m` as a band of no width: `1.5..1.5 m`.
fn without_band(written: &str) -> String {
    match written.split_once(' ') {
        Some((number, unit)) => format!("{number}..{number} {unit}"),
        None => format!("{written}..{written}"),
    }
}
