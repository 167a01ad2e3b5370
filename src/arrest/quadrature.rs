//! Integrals of decaying functions by Gauss-Legendre panels that grow with time.

/// Abscissae and weights of the 12-point rule on -1..1, positive half.
///
/// # Reference
/// Abramowitz and Stegun, Handbook of Mathematical Functions, 1964, table 25.4, n = 12.
const RULE: [(f64, f64); 6] = [
    (0.125_233_408_511_468_9, 0.249_147_045_813_402_8),
    (0.367_831_498_998_180_2, 0.233_492_536_538_354_8),
    (0.587_317_954_286_617_5, 0.203_167_426_723_065_9),
    (0.769_902_674_194_304_7, 0.160_078_328_543_346_23),
    (0.904_117_256_370_474_9, 0.106_939_325_995_318_43),
    (0.981_560_634_246_719_3, 0.047_175_336_386_511_83),
];

/// Integral of `f` over `0..t`, where `f` is made of exponentials that decay at rates up to `fastest` (1/s) and waves
/// no faster than that. Relative accuracy about 1e-12 for such functions.
pub fn integral(f: impl Fn(f64) -> f64, t: f64, fastest: f64) -> f64 {
    integral_with_waves(f, t, fastest, 0.0)
}

/// As [`integral`], where slow waves of angular frequency `wave` (1/s) go on after the fast parts have died away.
pub fn integral_with_waves(f: impl Fn(f64) -> f64, t: f64, fastest: f64, wave: f64) -> f64 {
    let start = 0.5 / fastest;
    let longest = if wave > 0.0 { 1.0 / wave } else { f64::INFINITY };
    let (mut a, mut sum) = (0.0, 0.0);
    while a < t {
        let width = start.max(0.5 * a).min(longest);
        let b = if width.is_finite() && width > 0.0 { t.min(a + width) } else { t };
        sum += panel(&f, a, b);
        a = b;
    }
    sum
}

fn panel(f: &impl Fn(f64) -> f64, a: f64, b: f64) -> f64 {
    let (middle, half) = (0.5 * (a + b), 0.5 * (b - a));
    half * RULE.iter().map(|(x, w)| w * (f(middle - half * x) + f(middle + half * x))).sum::<f64>()
}
