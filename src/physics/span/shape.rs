//! Lengths of a cable between two supports, in forms that do not cancel, and the root of a rising function.

/// Lengths at one deflection.
pub struct Shape {
    /// Length of the two straight parts beyond the chord, `l - chord`, m.
    pub excess_m: f64,
    /// First derivative of `l` over the deflection: `sin th1 + sin th2`.
    pub rate: f64,
    /// Second derivative, 1/m.
    pub bend_per_m: f64,
}

impl Shape {
    /// Two straight parts to a point below the chord.
    ///
    /// `runs_m` are the horizontal distances to the left and to the right support, `slope` the rise over run of the
    /// chord. Along the chord the two parts add up to it, so `l - chord` is the sum of `l_i - c_i = p^2 / (l_i + c_i)` with
    /// c along and p across the chord.
    pub fn of(runs_m: [f64; 2], slope: f64, deflection_m: f64) -> Self {
        let stretch = 1.0_f64.hypot(slope);
        let across = deflection_m / stretch;
        let shift = slope * across;
        let [left, right] = [(runs_m[0], -shift), (runs_m[1], shift)].map(|(run, moved)| {
            let along = run * stretch + moved;
            let length = along.hypot(across);
            let beyond = if along > 0.0 { across * (across / (length + along)) } else { length - along };
            (length, beyond, run / length * (run / length) / length)
        });
        let turned = slope * (left.1 / left.0 - right.1 / right.0);
        Self {
            excess_m: left.1 + right.1,
            rate: (across / left.0 + across / right.0 + turned) / stretch,
            bend_per_m: left.2 + right.2,
        }
    }
}

/// Nodes and weights of Gauss-Legendre quadrature with six points on (-1, 1), the positive half.
///
/// Reference: Abramowitz and Stegun 1972, table 25.4.
const GAUSS: [(f64, f64); 3] = [
    (0.238_619_186_083_196_9, 0.467_913_934_572_691_05),
    (0.661_209_386_466_264_5, 0.360_761_573_048_138_6),
    (0.932_469_514_203_152, 0.171_324_492_379_170_35),
];

/// Half range of slopes above which the closed form keeps all but three digits; below it the quadrature keeps them all.
const STEEP: f64 = 0.1;

/// Length of a parabola beyond its chord, m.
///
/// The parabola hangs `sag_m` below the middle of a chord of horizontal run `run_m` and rise over run `slope`; its slope
/// runs evenly over `slope -+ 4 sag / run`. Relative accuracy 1e-12 for any sag.
pub fn parabola_excess(run_m: f64, slope: f64, sag_m: f64) -> f64 {
    let half = 4.0 * sag_m / run_m;
    let chord = 1.0_f64.hypot(slope);
    if half < STEEP {
        let beyond = |t: f64| t * (2.0 * slope + t) / (1.0_f64.hypot(slope + t) + chord);
        let mean: f64 = GAUSS.iter().map(|&(x, w)| 0.5 * w * (beyond(half * x) + beyond(-half * x))).sum();
        return run_m * mean;
    }
    let arc = |u: f64| 0.5 * (u * 1.0_f64.hypot(u) + u.asinh());
    run_m * ((arc(slope + half) - arc(slope - half)) / (2.0 * half) - chord)
}

/// Root above `low` of a rising function given with its slope: safeguarded Newton, to a few units in the last place.
///
/// `first` is a first guess above `low`; the function is not above 0 at `low`.
pub fn rising_root(low: f64, first: f64, f: impl Fn(f64) -> (f64, f64)) -> f64 {
    let (mut below, mut above) = (low, first);
    while f(above).0 < 0.0 && above.is_finite() {
        below = above;
        above = low + 2.0 * (above - low);
    }
    let mut x = above;
    for _ in 0..MOST_STEPS {
        let (value, slope) = f(x);
        if value < 0.0 {
            below = x;
        } else {
            above = x;
        }
        let newton = x - value / slope;
        let next = if newton > below && newton < above { newton } else { 0.5 * (below + above) };
        if value == 0.0 || (next - x).abs() <= 2.0 * f64::EPSILON * x.abs() {
            return x;
        }
        x = next;
    }
    x
}

/// Steps after which a bracket of any two numbers is bisected to neighbours, with room for Newton's.
const MOST_STEPS: u32 = 200;
