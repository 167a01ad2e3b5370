//! The modes of the path and the exact solution of each.
use super::drift::Drift;
use super::fourth::{self, Damped};
use super::oscillator::{Oscillator, Swing};
use super::outcome::Fall;
use super::signal::{Moment, Signal};
use super::third::{Spectrum, Wave};
use crate::physics::{Group, Piece};

/// What the path is doing.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Mode {
    /// Taut, the slider (if any) not moving.
    Stuck,
    /// Taut, the slider moving.
    Sliding,
    /// Carries no force.
    Slack,
}

/// State at one instant, SI.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct State {
    /// Travel past taut, m.
    pub x: f64,
    /// Downward speed, m/s.
    pub v: f64,
    /// Stretch of the line and of everything else, m.
    pub e: [f64; 2],
    /// Deployed length, m.
    pub s: f64,
}

/// Straight pieces in force: of the two groups, and of the slider.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Pieces {
    /// Numbers of the groups' pieces.
    pub group: [usize; 2],
    /// Number of the slider's piece.
    pub slider: usize,
}

/// One mode from its start on; times run from that start.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stretch {
    /// Start, s from the start of the fall.
    pub start_s: f64,
    /// How long the mode lasts, s.
    pub length_s: f64,
    /// The mode.
    pub mode: Mode,
    /// Travel.
    pub x: Signal,
    /// Speed.
    pub v: Signal,
    /// Line force.
    pub force: Signal,
    /// Stretch of the groups.
    pub e: [Signal; 2],
    /// Deployed length.
    pub s: Signal,
}

impl Stretch {
    /// State at a time from the start of the stretch.
    #[must_use]
    pub fn state(&self, t: f64) -> State {
        self.state_at(&self.moment(t))
    }

    /// A time from the start of the stretch: all its swings, or waves, are of the same roots.
    #[must_use]
    pub fn moment(&self, t: f64) -> Moment {
        self.x.moment(t)
    }

    /// State at a moment of the stretch.
    #[must_use]
    pub fn state_at(&self, moment: &Moment) -> State {
        let at = |signal: &Signal| signal.value_at(moment);
        State { x: at(&self.x), v: at(&self.v), e: [at(&self.e[0]), at(&self.e[1])], s: at(&self.s) }
    }
}

/// One elastic group on its present piece.
#[derive(Clone, Copy)]
struct Part {
    piece: Option<Piece>,
    c: f64,
    e: f64,
}

impl Part {
    fn new(group: &Group, index: usize, e: f64) -> Self {
        let c = if group.is_damped() { group.damping_n_s_per_m } else { 0.0 };
        Self { piece: group.elastic.piece(index), c, e }
    }

    fn force(&self) -> f64 {
        self.piece.map_or(0.0, |p| p.value(self.e))
    }

    fn slope(&self) -> f64 {
        self.piece.map_or(f64::INFINITY, |p| p.slope)
    }

    /// Stretch over time under a constant force: at once without a damper, as a relaxation with one.
    fn under(&self, force: f64) -> Drift {
        let Some(piece) = self.piece else { return Drift::default() };
        let target = piece.inverse(force);
        let away = self.e - target;
        let relax = if self.c > 0.0 && away != 0.0 { (away, piece.slope / self.c) } else { (0.0, 0.0) };
        Drift { c: [target, 0.0, 0.0], relax: [relax, (0.0, 0.0)] }
    }
}

/// The falling mass on its path.
pub struct Path<'a> {
    fall: &'a Fall,
}

impl<'a> Path<'a> {
    /// The path of a fall.
    pub const fn new(fall: &'a Fall) -> Self {
        Self { fall }
    }

    /// The fall it belongs to.
    pub const fn fall(&self) -> &Fall {
        self.fall
    }

    fn parts(&self, pieces: Pieces, state: &State) -> [Part; 2] {
        let path = &self.fall.path;
        [Part::new(&path.line, pieces.group[0], state.e[0]), Part::new(&path.other, pieces.group[1], state.e[1])]
    }

    fn weight(&self) -> f64 {
        self.fall.mass_kg * self.fall.gravity_m_per_s2
    }

    /// The exact solution of a mode from a state.
    pub fn stretch(&self, mode: Mode, pieces: Pieces, state: &State, start_s: f64) -> Stretch {
        let parts = self.parts(pieces, state);
        let mut stretch = match mode {
            Mode::Slack => self.slack(&parts, state),
            Mode::Sliding => self.sliding(&parts, pieces.slider, state),
            Mode::Stuck => self.stuck(&parts, state),
        };
        stretch.start_s = start_s;
        stretch
    }

    fn slack(&self, parts: &[Part; 2], state: &State) -> Stretch {
        let x = Drift { c: [state.x, state.v, 0.5 * self.fall.gravity_m_per_s2], ..Drift::default() };
        Stretch {
            start_s: 0.0,
            length_s: f64::INFINITY,
            mode: Mode::Slack,
            x: Signal::Drift(x),
            v: Signal::Drift(x.derivative()),
            force: Signal::constant(0.0),
            e: parts.map(|part| Signal::Drift(part.under(0.0))),
            s: Signal::constant(state.s),
        }
    }

    fn stuck(&self, parts: &[Part; 2], state: &State) -> Stretch {
        let springs = match parts {
            [a, b] if a.piece.is_none() && b.piece.is_none() => return self.at_rest(state),
            [a, b] if a.piece.is_some() && b.piece.is_some() && a.c + b.c > 0.0 => {
                return self.third(Mode::Stuck, parts, state, None);
            }
            parts => parts,
        };
        let [k1, k2] = springs.each_ref().map(Part::slope);
        let k = if k1.is_finite() && k2.is_finite() { 1.0 / (1.0 / k1 + 1.0 / k2) } else { k1.min(k2) };
        let c = springs[0].c + springs[1].c;
        let elastic = springs.iter().find(|p| p.piece.is_some()).map_or(0.0, Part::force);
        let (x, force) = self.swing(c, k, elastic, state);
        let now = elastic + c * state.v;
        let e = springs.map(|part| {
            if part.piece.is_none() {
                Signal::constant(0.0)
            } else if c > 0.0 {
                Signal::Swing(x.scaled(1.0, -state.s))
            } else {
                Signal::Swing(force.scaled(1.0 / part.slope(), part.e - now / part.slope()))
            }
        });
        Self::taut(Mode::Stuck, Signal::Swing(x), Signal::Swing(x.derivative()), Signal::Swing(force), e, state)
    }

    fn swing(&self, c: f64, k: f64, elastic: f64, state: &State) -> (Swing, Swing) {
        let of = Oscillator::new(self.fall.mass_kg, c, k);
        let from_rest = (elastic - self.weight()) / k;
        let x = Swing::new(of, state.x - from_rest, from_rest, state.v);
        (x, x.derivative().derivative().scaled(-self.fall.mass_kg, self.weight()))
    }

    fn taut(mode: Mode, x: Signal, v: Signal, force: Signal, e: [Signal; 2], state: &State) -> Stretch {
        let s = Signal::constant(state.s);
        Stretch { start_s: 0.0, length_s: f64::INFINITY, mode, x, v, force, e, s }
    }

    fn at_rest(&self, state: &State) -> Stretch {
        let zero = Signal::constant(0.0);
        Self::taut(Mode::Stuck, Signal::constant(state.x), zero, Signal::constant(self.weight()), [zero; 2], state)
    }

    fn sliding(&self, parts: &[Part; 2], piece: usize, state: &State) -> Stretch {
        let Some(absorber) = &self.fall.path.absorber else { return self.stuck(parts, state) };
        let piece = absorber.force.piece(piece);
        let force = piece.value(state.s);
        if piece.slope == 0.0 {
            return self.sliding_at(force, parts, state);
        }
        match parts.iter().filter(|p| p.c > 0.0).count() {
            0 => self.sliding_spring(piece.slope, force, parts, state),
            1 => self.third(Mode::Sliding, parts, state, Some((piece.slope, force))),
            _ => self.fourth(parts, state, (piece.slope, force)),
        }
    }

    fn fourth(&self, parts: &[Part; 2], state: &State, (slope, force): (f64, f64)) -> Stretch {
        let damped = |p: &Part| Damped { force: p.force(), stretch: p.e, stiffness: p.slope(), damping: p.c };
        fourth::Sliding {
            mass: self.fall.mass_kg,
            gravity: self.fall.gravity_m_per_s2,
            x: state.x,
            v: state.v,
            s: state.s,
            force,
            slope,
            parts: [damped(&parts[0]), damped(&parts[1])],
        }
        .step()
    }

    fn sliding_at(&self, force: f64, parts: &[Part; 2], state: &State) -> Stretch {
        let acceleration = self.fall.gravity_m_per_s2 - force / self.fall.mass_kg;
        let x = Drift { c: [state.x, state.v, 0.5 * acceleration], ..Drift::default() };
        let e = parts.map(|part| part.under(force));
        let relax = e.map(|e| (-e.relax[0].0, e.relax[0].1));
        let given: f64 = relax.iter().map(|r| r.0).sum();
        let s = Drift { c: [state.s - given, state.v, 0.5 * acceleration], relax };
        Stretch {
            s: Signal::Drift(s),
            ..Self::taut(
                Mode::Sliding,
                Signal::Drift(x),
                Signal::Drift(x.derivative()),
                Signal::constant(force),
                e.map(Signal::Drift),
                state,
            )
        }
    }

    fn sliding_spring(&self, slope: f64, force: f64, parts: &[Part; 2], state: &State) -> Stretch {
        let compliance: f64 = 1.0 / slope + parts.iter().map(|p| 1.0 / p.slope()).sum::<f64>();
        let (x, t) = self.swing(0.0, 1.0 / compliance, force, state);
        let along = |k: f64, start: f64| Signal::Swing(t.scaled(1.0 / k, start - force / k));
        let e = parts.map(|p| if p.piece.is_some() { along(p.slope(), p.e) } else { Signal::constant(0.0) });
        let taut =
            Self::taut(Mode::Sliding, Signal::Swing(x), Signal::Swing(x.derivative()), Signal::Swing(t), e, state);
        Stretch { s: along(slope, state.s), ..taut }
    }

    /// Two parts in series of which at least one is damped. While the slider moves on a rising force it is one more
    /// spring, in series with the undamped part.
    fn third(&self, mode: Mode, parts: &[Part; 2], state: &State, slider: Option<(f64, f64)>) -> Stretch {
        let m = self.fall.mass_kg;
        let damped = usize::from(parts[0].c == 0.0);
        let (a, b) = (parts[damped], parts[1 - damped]);
        let (k1, c1, f1) = (a.slope(), a.c, a.force());
        let (k2, c2, f2) = match slider {
            Some((slope, force)) => (1.0 / (1.0 / slope + 1.0 / b.slope()), 0.0, force),
            None => (b.slope(), b.c, b.force()),
        };
        let c = c1 + c2;
        let of = Spectrum::in_series(m, (k1, c1), (k2, c2));
        let w = self.weight();
        let (lambda, v) = (of.lambda, state.v);
        let away = [(f1 - w) / k1, (f2 - w) / k2];
        let x_away = away[0] + away[1];
        let e1 = (f2 - f1 + c2 * v) / c;
        let e2 = v - e1;
        let dv = (w - f1 - c1 * e1) / m;
        let ee1 = (k2 * e2 - k1 * e1 + c2 * dv) / c;
        let ddv = -(k1 * e1 + c1 * ee1) / m;
        // With (D + K/C) e1 = (k2 x + c2 v) / C and K/C + lambda = off, large terms of a fast root never meet.
        let off = 2.0 * of.pair.decay - c1 * c2 / (m * c);
        let (without_e1, without_e2) =
            ((k2 * x_away + c2 * v) / c - off * away[0], (k1 * x_away + c1 * v) / c - off * away[1]);
        let (without_de1, without_de2) = ((k2 * v + c2 * dv) / c - off * e1, (k1 * v + c1 * dv) / c - off * e2);
        let without_dde1 = (k2 * dv + c2 * ddv) / c - off * ee1;
        let without_t = [k1 * without_e1 + c1 * without_de1, k1 * without_de1 + c1 * without_dde1];
        let without_v = [dv - lambda * v, -without_t[0] / m];
        let wave = |rest: f64, away: f64, without: [f64; 2]| Signal::Wave(Wave::new(of, rest, away, without));
        let x = wave(state.x - x_away, x_away, [v - lambda * x_away, without_v[0]]);
        let t = wave(w, -m * dv, without_t);
        let first = wave(a.e - away[0], away[0], [without_e1, without_de1]);
        let v = wave(0.0, v, without_v);
        let along = |k: f64, start: f64| t.scaled(1.0 / k, start - f2 / k);
        let (second, s) = match slider {
            Some((slope, _)) if b.piece.is_some() => (along(b.slope(), b.e), along(slope, state.s)),
            Some((slope, _)) => (Signal::constant(0.0), along(slope, state.s)),
            None => (wave(b.e - away[1], away[1], [without_e2, without_de2]), Signal::constant(state.s)),
        };
        let e = if damped == 0 { [first, second] } else { [second, first] };
        Stretch { s, ..Self::taut(mode, x, v, t, e, state) }
    }
}
