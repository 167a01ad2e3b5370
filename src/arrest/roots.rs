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
fn count(evaluations: u32) {
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

/// Zero of a function monotone on `[a, b]` whose end values differ in sign, to the last bits of the time.
///
/// `f` returns value and slope. Newton's step where it stays inside the bracket, halving where it does not: never
/// more than about 60 evaluations, usually 5 to 8.
///
/// # Reference
/// Press et al., Numerical Recipes, 3rd ed. 2007, section 9.4 (safeguarded Newton).
pub fn monotone_zero(mut f: impl FnMut(f64) -> (f64, f64), a: f64, fa: f64, b: f64, fb: f64) -> f64 {
    if fa == 0.0 {
        return a;
    }
    let rising = fb > fa;
    let (mut lo, mut hi) = (a, b);
    let mut t = start_point(a, fa, b, fb);
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
        let next = if newton > lo && newton < hi { newton } else { 0.5 * (lo + hi) };
        if (next - t).abs() <= 2.0 * f64::EPSILON * t.abs() || next <= lo || next >= hi {
            return next.clamp(lo, hi);
        }
        t = next;
    }
    t
}

fn start_point(a: f64, fa: f64, b: f64, fb: f64) -> f64 {
    let secant = a + (b - a) * (fa / (fa - fb));
    if secant > a && secant < b { secant } else { 0.5 * (a + b) }
}

/// First passage of a function through zero in `(from, to]`, given all points between which it is monotone.
pub fn first_passage(
    mut f: impl FnMut(f64) -> (f64, f64),
    passage: Passage,
    from: f64,
    turns: impl IntoIterator<Item = f64>,
    to: f64,
) -> Option<f64> {
    let mut a = from;
    let mut fa = f(a).0;
    for b in turns.into_iter().filter(|&t| t > from && t < to).chain(std::iter::once(to)) {
        count(1);
        let fb = f(b).0;
        if passage.shows(fa, fb) {
            return Some(if fb == 0.0 { b } else { monotone_zero(f, a, fa, b, fb) });
        }
        (a, fa) = (b, fb);
    }
    None
}
