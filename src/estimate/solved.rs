//! What was solved, part by part and mode by mode: for whoever works a run by hand.
use super::setup::Setup;
use super::{Mode, Sample};
use crate::arrest::signal::Signal;
use crate::arrest::third::Spectrum;
use crate::arrest::{Motion, Stretch};
use crate::physics::{Absorber, Group};

/// The path as it was solved, and the first modes of the motion. SI units.
#[derive(Clone, Debug, PartialEq)]
pub struct Solved {
    /// Falling mass, kg.
    pub mass_kg: f64,
    /// Gravity, m/s2.
    pub gravity_m_per_s2: f64,
    /// Free-fall distance, m.
    pub free_fall_m: f64,
    /// Length that a modulus is divided by, m, where it is known.
    pub elastic_length_m: Option<f64>,
    /// The line.
    pub line: PartView,
    /// Everything else that gives: series spring, harness, anchor, lifeline.
    pub other: Option<PartView>,
    /// The absorber, wet and cold factor counted in.
    pub absorber: Option<SliderView>,
    /// Roots of the third-order equation of a path with a damped part in series with another part.
    pub cubic: Option<CubicView>,
    /// The modes in order, a straight piece of a table each; empty in a planar run.
    pub modes: Vec<ModeView>,
}

/// An elastic part with its damper beside it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PartView {
    /// Stiffness, N/m: of the first piece where the law is a table.
    pub stiffness_n_per_m: f64,
    /// Straight pieces of its law; 1 where it is linear.
    pub pieces: usize,
    /// Damping, N s/m; 0 where none.
    pub damping_n_s_per_m: f64,
}

/// The absorber.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SliderView {
    /// Deployment force at deployed length 0, N.
    pub force_n: f64,
    /// Whether that force stays the same over the stroke.
    pub is_constant: bool,
    /// Force at which it first moves, N.
    pub onset_n: f64,
    /// Stroke, m.
    pub stroke_m: f64,
}

/// Roots of `s^3 + b2 s^2 + b1 s + b0` about the hang position, the first piece of each law taken.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CubicView {
    /// Coefficients `b2`, `b1`, `b0`.
    pub coefficients: [f64; 3],
    /// The real root, 1/s.
    pub real_per_s: f64,
    /// Decay of the other two, 1/s.
    pub decay_per_s: f64,
    /// Square of their imaginary part, 1/s2; negative where they are real.
    pub square_per_s2: f64,
}

/// How travel runs within one mode, `tau` from its start.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Form {
    /// `rest + exp(-decay tau) (p cos + q sin/omega)` with `omega^2 = square`, or `cosh` and `sinh` where it is negative.
    Oscillation {
        /// Where it tends to, m of travel past taut.
        rest_m: f64,
        /// Decay, 1/s.
        decay_per_s: f64,
        /// Square of the frequency, 1/s2.
        square_per_s2: f64,
        /// Distance to rest at the start, m.
        from_rest_m: f64,
    },
    /// Constant acceleration, m/s2 downward.
    Constant {
        /// Acceleration, m/s2.
        acceleration_m_per_s2: f64,
    },
    /// Third order: `rest + exp(-decay tau) (p cos + q sin/omega) + r exp(real tau)` with `omega^2 = square`, or `cosh`
    /// and `sinh` where it is negative.
    Third {
        /// Where it tends to, m of travel past taut.
        rest_m: f64,
        /// The real root farthest from the others, 1/s.
        real_per_s: f64,
        /// Decay of the other two, 1/s.
        decay_per_s: f64,
        /// Square of their imaginary part, 1/s2; negative where they are real.
        square_per_s2: f64,
        /// `p` in m, `q` in m/s, `r` in m; none where the roots nearly meet and the form is another one.
        coefficients: Option<[f64; 3]>,
    },
    /// Fourth order: one step of a power series.
    Fourth,
}

/// One mode of the motion.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ModeView {
    /// What the line does.
    pub mode: Mode,
    /// State at its start.
    pub start: Sample,
    /// State at its end.
    pub end: Sample,
    /// How it runs.
    pub form: Form,
}

impl Solved {
    /// `motion` is that of the vertical core; a planar run has none.
    pub(super) fn of(setup: &Setup, path: &crate::physics::SeriesPath, motion: Option<&Motion>) -> Self {
        let fall = &setup.fall;
        let (line, other) = (part(&path.line), part(&path.other));
        Self {
            mass_kg: fall.mass_kg,
            gravity_m_per_s2: fall.gravity_m_per_s2,
            free_fall_m: fall.free_fall_m,
            elastic_length_m: setup.geometry.elastic_length_m,
            line: line.unwrap_or(PartView { stiffness_n_per_m: f64::INFINITY, pieces: 1, damping_n_s_per_m: 0.0 }),
            other,
            absorber: path.absorber.as_ref().map(slider),
            cubic: line.zip(other).and_then(|(line, other)| cubic(fall.mass_kg, line, other)),
            modes: motion.map(modes).unwrap_or_default(),
        }
    }
}

fn part(group: &Group) -> Option<PartView> {
    let stiffness_n_per_m = group.elastic.piece(0)?.slope;
    let pieces = match &group.elastic {
        crate::physics::Elastic::Table(table) => table.pieces(),
        _ => 1,
    };
    let damping_n_s_per_m = if group.is_damped() { group.damping_n_s_per_m } else { 0.0 };
    Some(PartView { stiffness_n_per_m, pieces, damping_n_s_per_m })
}

fn slider(absorber: &Absorber) -> SliderView {
    let knots = absorber.force.knots();
    let force_n = knots.first().map_or(0.0, |knot| knot.1);
    SliderView {
        force_n,
        is_constant: knots.iter().all(|knot| knot.1 == force_n),
        onset_n: absorber.onset_n,
        stroke_m: absorber.stroke_m,
    }
}

fn cubic(mass_kg: f64, line: PartView, other: PartView) -> Option<CubicView> {
    let (k1, c1) = (line.stiffness_n_per_m, line.damping_n_s_per_m);
    let (k2, c2) = (other.stiffness_n_per_m, other.damping_n_s_per_m);
    let c = c1 + c2;
    if c == 0.0 {
        return None;
    }
    let mc = mass_kg * c;
    let coefficients = [(k1 + k2) / c + c1 * c2 / mc, (k1 * c2 + k2 * c1) / mc, k1 * k2 / mc];
    let roots = Spectrum::in_series(mass_kg, (k1, c1), (k2, c2));
    Some(CubicView {
        coefficients,
        real_per_s: roots.lambda,
        decay_per_s: roots.pair.decay,
        square_per_s2: roots.pair.q,
    })
}

fn modes(motion: &Motion) -> Vec<ModeView> {
    motion.stretches().iter().map(mode).collect()
}

fn mode(stretch: &Stretch) -> ModeView {
    let at = |time_s: f64| Sample::from(Motion::within(stretch, time_s));
    let form = match stretch.x {
        Signal::Swing(x) => {
            Form::Oscillation { rest_m: x.rest, decay_per_s: x.of.decay, square_per_s2: x.of.q, from_rest_m: x.p }
        }
        Signal::Drift(x) => Form::Constant { acceleration_m_per_s2: 2.0 * x.c[2] },
        Signal::Wave(x) => Form::Third {
            rest_m: x.rest,
            real_per_s: x.of.lambda,
            decay_per_s: x.of.pair.decay,
            square_per_s2: x.of.pair.q,
            coefficients: x.of.far.then_some(x.a),
        },
        Signal::Series(_) => Form::Fourth,
    };
    let start = at(stretch.start_s);
    ModeView { mode: start.mode, start, end: at(stretch.start_s + stretch.length_s), form }
}
