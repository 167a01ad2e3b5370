//! The first event that ends a mode.
use super::mode::{Mode, Path, Pieces, State, Stretch};
use super::outcome::Fall;
use super::roots::{Passage, monotone_zero_from};
use super::signal::{Moment, Signal};

/// Relative size of a passage that is told from touching a level.
pub const TOUCH: f64 = 1e-12;

/// What ends a mode.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum End {
    /// The force becomes negative.
    Slack,
    /// Taut again.
    Taut,
    /// The force reaches what moves the slider.
    Onset,
    /// The slider stops.
    SliderStops,
    /// The slider is at its stroke.
    StrokeUsedUp,
    /// The slider passes a knot of its table.
    SliderKnot,
    /// A group passes a knot: which group, and whether upward.
    Knot(usize, bool),
    /// A lifeline whose in-line absorber has given turns back.
    SpanTurns,
    /// The solution of the mode ends, not the mode.
    StepEnds,
}

/// The slider's part of the state.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Slider {
    /// It has moved before: the onset force counts once.
    pub started: bool,
    /// It is at its stroke for good.
    pub locked: bool,
}

/// Force that moves the slider; none when there is none or it is locked.
pub fn moving_force(fall: &Fall, slider: Slider, s: f64) -> Option<f64> {
    let absorber = fall.path.absorber.as_ref().filter(|_| !slider.locked)?;
    Some(if slider.started { absorber.force.value(s) } else { absorber.onset_n })
}

/// The end of a stretch and what ends it.
pub struct Ending {
    /// When.
    pub at: Moment,
    /// What happens there; none at the horizon.
    pub end: Option<End>,
}

/// Earliest of several ends.
struct Earliest<'a> {
    stretch: &'a Stretch,
    best: Option<(f64, End)>,
    /// The moment of the best, once it has been needed.
    at: Option<Moment>,
    horizon: f64,
}

impl Earliest<'_> {
    fn offer(&mut self, time: Option<f64>, end: End) {
        if let Some(time) = time.filter(|&t| self.best.is_none_or(|(b, _)| t < b)) {
            (self.best, self.at) = (Some((time, end)), None);
        }
    }

    /// As [`Self::offer`], but wins over what has been offered for the same time.
    fn offer_first(&mut self, time: Option<f64>, end: End) {
        if let Some(time) = time.filter(|&t| self.best.is_none_or(|(b, _)| t <= b)) {
            (self.best, self.at) = (Some((time, end)), None);
        }
    }

    fn until(&self) -> f64 {
        self.best.map_or(self.horizon, |(t, _)| t)
    }

    /// First value of a signal and the one at the best so far, where it is known to be monotone between: the passage of
    /// a level that is not between them is no earlier end.
    fn ends(&mut self, signal: &Signal) -> Option<[f64; 2]> {
        let (time, _) = self.best?;
        let moment = self.at.get_or_insert_with(|| self.stretch.moment(time));
        signal.monotone_ends(moment)
    }

    fn ending(self) -> Ending {
        let until = self.until();
        let at = self.at.unwrap_or_else(|| self.stretch.moment(until));
        Ending { at, end: self.best.map(|(_, end)| end) }
    }
}

impl Path<'_> {
    /// The first end of a stretch within `horizon` s.
    pub fn first_end(&self, stretch: &Stretch, pieces: Pieces, slider: Slider, horizon: f64) -> Ending {
        let mut first = Earliest { stretch, best: None, at: None, horizon };
        match stretch.mode {
            Mode::Stuck => {
                // The knots come first: on a short stretch up to one, most other ends are ruled out at a glance.
                self.knots(stretch, pieces, &mut first);
                self.stuck_ends(stretch, slider, &mut first);
            }
            Mode::Sliding => {
                self.sliding_ends(stretch, pieces, &mut first);
                self.knots(stretch, pieces, &mut first);
            }
            Mode::Slack => {
                self.knots(stretch, pieces, &mut first);
                first.offer_first(taut_again(stretch, first.until()), End::Taut);
            }
        }
        first.ending()
    }

    fn stuck_ends(&self, stretch: &Stretch, slider: Slider, first: &mut Earliest) {
        let force = &stretch.force;
        let onset = moving_force(self.fall(), slider, stretch.s.value(0.0));
        if let Some(level) = onset
            && first.ends(force).is_none_or(|[a, b]| a.max(b) > level)
        {
            first.offer_first(through(force, level, TOUCH * level, first.until()), End::Onset);
        }
        if first.ends(force).is_none_or(|[a, b]| a.min(b) < 0.0) {
            let scale = self.fall().weight_n() + force.value(0.0).abs();
            let scale = onset.map_or(scale, |level| scale.max(level));
            let down = force.scaled(-1.0, 0.0);
            first.offer_first(through(&down, 0.0, TOUCH * scale, first.until()), End::Slack);
        }
    }

    fn sliding_ends(&self, stretch: &Stretch, pieces: Pieces, first: &mut Earliest) {
        let Some(absorber) = &self.fall().path.absorber else { return };
        let stops = match &stretch.s {
            Signal::Series(s) => s.first_stop(first.horizon),
            s => s.first_maximum(0.0, first.horizon),
        };
        first.offer(stops, End::SliderStops);
        let knot = absorber.force.piece(pieces.slider).x1;
        let (level, end) =
            if knot < absorber.stroke_m { (knot, End::SliderKnot) } else { (absorber.stroke_m, End::StrokeUsedUp) };
        // Up to its first maximum the length is largest at an end.
        if first.best.is_none_or(|(stop, _)| stretch.s.value(stop) > level) {
            first.offer(stretch.s.first_passage(level, Passage::Up, 0.0, first.until()), end);
        }
    }

    fn knots(&self, stretch: &Stretch, pieces: Pieces, first: &mut Earliest) {
        for (group, law) in [&self.fall().path.line.elastic, &self.fall().path.other.elastic].into_iter().enumerate() {
            let Some(piece) = law.piece(pieces.group[group]) else { continue };
            let e = &stretch.e[group];
            let upward = stretch.v.value(0.0) > 0.0;
            for up in [upward, !upward] {
                if up && piece.x1.is_finite() && first.ends(e).is_none_or(|[a, b]| a.max(b) > piece.x1) {
                    // A stretch that only touches a knot at its top stays on its piece.
                    let time = through(e, piece.x1, TOUCH * piece.x1, first.until());
                    first.offer(time, End::Knot(group, true));
                }
                let rises = |[a, b]: [f64; 2]| a >= piece.x0 && b > a && b > piece.x0 * (1.0 + TOUCH);
                if !up && pieces.group[group] > 0 && !first.ends(e).is_some_and(rises) {
                    let at_once = leaves_downward(e, piece.x0, first.until()).then_some(0.0);
                    let time = at_once.or_else(|| e.first_passage(piece.x0, Passage::Down, 0.0, first.until()));
                    first.offer(time, End::Knot(group, false));
                }
            }
        }
    }

    /// Pieces that hold a state.
    pub fn pieces(&self, state: &State) -> Pieces {
        let path = &self.fall().path;
        Pieces {
            group: [path.line.elastic.piece_at(state.e[0]), path.other.elastic.piece_at(state.e[1])],
            slider: path.absorber.as_ref().map_or(0, |a| a.force.piece_at(state.s)),
        }
    }
}

/// On a knot and on its way down: the piece below has begun. What rises from it by no more than rounding does so as well.
fn leaves_downward(e: &Signal, knot: f64, to: f64) -> bool {
    let on = |value: f64| value <= knot * (1.0 + TOUCH);
    on(e.value(0.0)) && (e.starts_down() || e.first_maximum(0.0, to).is_some_and(|top| on(e.value(top))))
}

/// First rise through a level that goes on to more than `touch` above it before it falls again.
fn through(signal: &Signal, level: f64, touch: f64, to: f64) -> Option<f64> {
    let mut from = 0.0;
    loop {
        let rise = signal.first_passing(level, Passage::Up, from, to)?;
        if rise.beyond > touch {
            return Some(rise.time);
        }
        let rise = rise.time;
        let top = signal.first_maximum(rise, to).unwrap_or(to);
        if signal.value(top) > level + touch {
            return Some(rise);
        }
        // The later maxima of a swing are no higher.
        if top <= from || top >= to || matches!(signal, Signal::Swing(_)) {
            return None;
        }
        from = top;
    }
}

/// When a slack path is taut again: the gap `e1 + e2 + s - x` opens from zero (with zero rate where a damper lets go
/// smoothly) and closes once. Its curvature, decaying stretches less gravity, changes sign at most once, so after its
/// largest opening it only closes.
fn taut_again(stretch: &Stretch, horizon: f64) -> Option<f64> {
    let (Signal::Drift(x), Signal::Drift(e1), Signal::Drift(e2)) = (stretch.x, stretch.e[0], stretch.e[1]) else {
        return None;
    };
    let s = stretch.s.value(0.0);
    let c = [e1.c[0] + e2.c[0] + s - x.c[0], -x.c[1], -x.c[2]];
    let gap = super::drift::Drift { c, relax: [e1.relax[0], e2.relax[0]] };
    let (end, closed) = (horizon, gap.value(horizon));
    if closed > 0.0 {
        return None;
    }
    let widest = gap.turns(0.0, horizon).into_iter().flatten().rfind(|t| t.is_maximum);
    let (from, open) = match widest {
        Some(turn) => (turn.time, gap.value(turn.time)),
        None => (0.0, gap.value(0.0)),
    };
    if open <= 0.0 {
        return Some(from);
    }
    // Where the dampers have relaxed, the gap is a parabola open below.
    let [c0, c1, c2] = gap.c;
    let parabola = -(c1 - (c1 * c1 - 4.0 * c2 * c0).sqrt()) / (2.0 * c2);
    Some(monotone_zero_from(|t| gap.value_slope(t), parabola, from, open, end, closed))
}
