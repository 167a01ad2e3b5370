//! A lifeline with an absorber in line: its law changes each time its stretch turns back.
use super::mode::Stretch;
use super::next::{End, TOUCH};
use super::outcome::{ArrestError, EnergyAccount, Fall, Happening, Outcome, Settings, SpanGiven};
use super::roots::take_evaluations;
use super::signal::Signal;
use super::solve::Run;
use crate::physics::{Elastic, YieldingSpan};
use std::borrow::Cow;

/// Places nearer to a knot than this share of it are on it.
const AT_KNOT: f64 = 1e-12;

/// Solves a vertical arrest on a lifeline whose in-line absorber gives: as [`super::solve`], with the span as group 2 in
/// place of that of the fall.
///
/// # Errors
/// As [`super::solve`], and when the knots of the span's law do not rise.
pub fn solve_on_span(fall: &Fall, span: YieldingSpan, settings: &Settings) -> Result<Outcome, ArrestError> {
    let mut fall = fall.clone();
    fall.path.other.elastic = Elastic::Table(span.table().clone());
    fall.check()?;
    take_evaluations();
    let mut run = Run::new(Cow::Owned(fall), *settings);
    run.span = Some(SpanState { law: span, shift_m: 0.0, leg: 0, used_up: false, given: false });
    run.all()?;
    run.outcome()
}

/// The span of a run in progress.
pub(super) struct SpanState {
    law: YieldingSpan,
    /// How far below the first taut position the longer cable is just taut, m.
    pub shift_m: f64,
    /// First of the stretches with the present law.
    pub leg: usize,
    used_up: bool,
    /// The absorber moves.
    given: bool,
}

impl SpanState {
    /// Whether a stretch in m is one at which it gives, or has given and not yet turned back.
    pub fn gives_at(&self, stretch_m: f64) -> bool {
        self.law.yields_from_m().is_some_and(|from| stretch_m > from * (1.0 + TOUCH))
    }
}

impl Run<'_> {
    /// Travel of the first taut position above the present one, m.
    pub fn shift_m(&self) -> f64 {
        self.span.as_ref().map_or(0.0, |span| span.shift_m)
    }

    /// A stretch of the solution as it counts from the first taut position.
    pub fn shown(&self, stretch: &Stretch) -> Stretch {
        moved(stretch, self.shift_m())
    }

    /// The finished stretches with the present law, as they were solved.
    pub fn hidden(&self) -> impl Iterator<Item = Stretch> {
        let (leg, shift_m) = self.span.as_ref().map_or((0, 0.0), |span| (span.leg, span.shift_m));
        self.stretches[leg..].iter().map(move |stretch| moved(stretch, -shift_m))
    }

    /// The first end of a stretch, or the turning back of the span where that comes first.
    pub fn or_turned(&self, stretch: &Stretch, end: Option<(f64, End)>, horizon: f64) -> Option<(f64, End)> {
        let turned = || {
            let from = self.span.as_ref()?.law.yields_from_m()?;
            let e = &stretch.e[1];
            let beyond = |t: f64| (e.value(t) > from * (1.0 + TOUCH)).then_some((t, End::SpanTurns));
            if e.starts_down() {
                return beyond(0.0);
            }
            beyond(e.first_maximum(0.0, end.map_or(horizon, |(t, _)| t))?)
        };
        turned().or(end)
    }

    /// The span turns back: the cable is longer by what has been deployed.
    pub fn turn_span(&mut self) -> Result<(), ArrestError> {
        let Some(span) = &self.span else { return Ok(()) };
        let stretch_m = self.state.e[1];
        let (law, shift_m) = span.law.turned(stretch_m)?;
        let before_j = self.fall.path.other.elastic.energy_j(stretch_m);
        let after = Elastic::Table(law.table().clone());
        self.work.span_absorber_j += before_j - after.energy_j(stretch_m - shift_m);
        self.fall.to_mut().path.other.elastic = after;
        self.hang_j = self.fall.hang_j();
        // The turning point is a knot of the new law; what turns back is below it.
        self.state.e[1] = (stretch_m - shift_m).next_down();
        self.state.x -= shift_m;
        self.before = self.state;
        let shift_m = span.shift_m + shift_m;
        let (leg, used_up, given) = (self.stretches.len(), span.used_up, span.given);
        self.span = Some(SpanState { law, shift_m, leg, used_up, given: false });
        if given {
            self.happened(Happening::SpanStops);
        }
        Ok(())
    }

    /// The span passes a knot of its law upward: where its absorber starts, or where the stroke is used up.
    pub fn span_knot(&mut self) {
        let at = |knot: Option<f64>, e: f64| knot.is_some_and(|knot| (e - knot).abs() <= AT_KNOT * knot);
        let e = self.state.e[1];
        let Some(span) = &mut self.span else { return };
        if at(span.law.yields_from_m(), e) {
            span.given = true;
            self.happened(Happening::SpanStarts);
        } else if at(span.law.used_up_at_m(), e) {
            (span.given, span.used_up) = (false, true);
            self.happened(Happening::SpanUsedUp);
        }
    }

    /// What the absorber of the span has given in all, the cable still being on its way included.
    pub fn span_given(&self) -> Option<SpanGiven> {
        let span = self.span.as_ref()?;
        Some(SpanGiven { deployed_m: span.law.deployed_at_m(self.state.e[1]), used_up: span.used_up })
    }

    /// With the work of the span's absorber apart from group 2, whose part is what its springs gained: a pretension
    /// that is given up counts against it.
    pub fn split(&self, mut account: EnergyAccount, stretch_m: f64) -> EnergyAccount {
        if let Some(span) = &self.span {
            let taken_j = span.law.taken_j(stretch_m);
            account.other_j += account.span_absorber_j - taken_j;
            account.span_absorber_j = taken_j;
        }
        account
    }
}

fn moved(stretch: &Stretch, by_m: f64) -> Stretch {
    if by_m == 0.0 {
        return *stretch;
    }
    let e = [stretch.e[0], stretch.e[1].scaled(1.0, by_m)];
    Stretch { x: stretch.x.scaled(1.0, by_m), e, ..*stretch }
}

impl Signal {
    /// Whether it falls from its very start.
    pub(super) fn starts_down(&self) -> bool {
        let slope = self.derivative();
        let first = slope.value(0.0);
        first < 0.0 || (first == 0.0 && slope.derivative().value(0.0) < 0.0)
    }

    fn derivative(&self) -> Self {
        match self {
            Self::Swing(s) => Self::Swing(s.derivative()),
            Self::Drift(s) => Self::Drift(s.derivative()),
            Self::Wave(s) => Self::Wave(s.derivative()),
            Self::Series(s) => Self::Series(s.derivative()),
        }
    }
}
