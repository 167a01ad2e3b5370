//! Zeros of functions that are monotone between known points.
use std::cell::Cell;

thread_local! {
    static EVALUATIONS: Cell<u32> = const { Cell::new(0) };
}

/// Evaluations of event functions on this thread since the last call.
pub(super) fn take_evaluations() -> u32 {
    EVALUATIONS.replace(0)
}

/// Counts evaluations of event functions.
pub(super) fn count(evaluations: u32) {
    EVALUATIONS.set(EVALUATIONS.get().saturating_add(evaluations));
}

/// Which way a function passes a level.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Passage {
    /// From at or below to above.
    Up,
    /// From above to at or below.
    Down,
}

impl Passage {
    /// Whether the two end values of a stretch show this passage through zero. Half open, so that a value that is
    /// exactly zero where two stretches meet is counted once.
    #[must_use]
    pub fn shows(self, start: f64, end: f64) -> bool {
        match self {
            Self::Up => start <= 0.0 && end > 0.0,
            Self::Down => start > 0.0 && end <= 0.0,
        }
    }
}

/// A function at one time.
#[derive(Clone, Copy, Debug)]
struct Sample {
    t: f64,
    value: f64,
    slope: f64,
}

/// Zero of a function monotone on `[a, b]` whose end values differ in sign, to the last bits of the time.
///
/// `f` returns value and slope. See [`refined_zero`].
pub fn monotone_zero(f: impl FnMut(f64) -> (f64, f64), a: f64, fa: f64, b: f64, fb: f64) -> f64 {
    let secant = a + (b - a) * (fa / (fa - fb));
    monotone_zero_from(f, secant, a, fa, b, fb)
}

/// As [`monotone_zero`], from a start that is known to be good.
pub fn monotone_zero_from(f: impl FnMut(f64) -> (f64, f64), start: f64, a: f64, fa: f64, b: f64, fb: f64) -> f64 {
    if fa == 0.0 { a } else { refined_zero(f, start, (a, b), fb > fa) }
}

/// Zero within a bracket, by Newton's step where it stays inside and halving where it does not: never more than about
/// 60 evaluations, usually 3 to 5.
///
/// It ends when a step is in the last bits of the time, or when the next one would be: Newton's error after a step `d`
/// is `f'' d^2 / 2 f'`, with `f''` from the slopes at the last two places.
///
/// # Reference
/// Press et al., Numerical Recipes, 3rd ed. 2007, section 9.4 (safeguarded Newton).
fn refined_zero(mut f: impl FnMut(f64) -> (f64, f64), start: f64, (a, b): (f64, f64), rising: bool) -> f64 {
    let (mut lo, mut hi) = (a, b);
    let mut t = if start > lo && start < hi { start } else { 0.5 * (lo + hi) };
    let mut before: Option<(f64, f64)> = None;
    for _ in 0..120 {
        count(1);
        let (value, slope) = f(t);
        if value == 0.0 {
            return t;
        }
        if (value > 0.0) == rising {
            hi = t;
        } else {
            lo = t;
        }
        let newton = t - value / slope;
        let inside = newton > lo && newton < hi;
        let next = if inside { newton } else { 0.5 * (lo + hi) };
        let step = (next - t).abs();
        let last_bits = 2.0 * f64::EPSILON * t.abs();
        if step <= last_bits || next <= lo || next >= hi {
            return next.clamp(lo, hi);
        }
        let exact = |(t0, slope0): (f64, f64)| {
            step * step * (slope - slope0).abs() <= 0.1 * last_bits * slope.abs() * (t - t0).abs()
        };
        if inside && before.is_some_and(exact) {
            return next;
        }
        before = Some((t, slope));
        t = next;
    }
    t
}

/// A start for the zero between two samples of differing sign: of the cubic with their values and slopes.
fn cubic_start(a: &Sample, b: &Sample) -> f64 {
    let h = b.t - a.t;
    let (da, db, rise) = (a.slope * h, b.slope * h, b.value - a.value);
    let (second, third) = (3.0 * rise - 2.0 * da - db, da + db - 2.0 * rise);
    let mut u = -a.value / rise;
    for _ in 0..4 {
        let value = a.value + u * (da + u * (second + u * third));
        let slope = da + u * (2.0 * second + u * 3.0 * third);
        let next = u - value / slope;
        if !(next > 0.0 && next < 1.0) {
            break;
        }
        u = next;
    }
    a.t + u * h
}

/// A first passage.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Passing {
    /// When.
    pub time: f64,
    /// How far beyond the level the function goes at least before it turns or the search ends, `>= 0`.
    pub beyond: f64,
}

/// First passage of a function through zero in `(from, to]`, given all points between which it is monotone.
pub fn first_passing(
    mut f: impl FnMut(f64) -> (f64, f64),
    passage: Passage,
    from: f64,
    turns: impl IntoIterator<Item = f64>,
    to: f64,
) -> Option<Passing> {
    let mut sample = |t: f64| {
        count(1);
        let (value, slope) = f(t);
        Sample { t, value, slope }
    };
    let mut a = sample(from);
    for t in turns.into_iter().filter(|&t| t > from && t < to).chain(std::iter::once(to)) {
        let b = sample(t);
        if passage.shows(a.value, b.value) {
            let time = if b.value == 0.0 {
                b.t
            } else if a.value == 0.0 {
                a.t
            } else {
                refined_zero(f, cubic_start(&a, &b), (a.t, b.t), b.value > a.value)
            };
            return Some(Passing { time, beyond: b.value.abs() });
        }
        a = b;
    }
    None
}
