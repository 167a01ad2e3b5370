//! How far a step may go.
use super::law::Law;
use super::poly::ORDER;
use super::series::Series;

/// Longest flight in one step, s: exact at any length, kept short for the width of the numbers.
const FLIGHT_S: f64 = 1.0;
/// Relaxations go at most this many of their time constants in a step: twice as far the series is still exact.
const RELAXATIONS: f64 = 1.0;
/// A relaxation that has come this near to its rest, relative to a millimetre, is there.
pub const AT_REST_M: f64 = 1e-21;

/// Sizes against which truncation is judged.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Scales {
    pub tolerance: f64,
    pub length: f64,
    pub force: f64,
    /// Stretch of the groups under the weight.
    pub stretch: [f64; 2],
}

/// Length of a step in s such that the last two terms of every series are below the tolerance.
pub fn taut(series: &Series, scales: &Scales) -> f64 {
    let reach = |j: usize| {
        let length = scales.length;
        let mut worst = (series.x[j].abs().max(series.z[j].abs())) / length;
        for (a, scale) in series.a.iter().zip(scales.stretch) {
            if a[j] != 0.0 {
                worst = worst.max(a[j].abs() / scale);
            }
        }
        let force = series.force[j - 1].abs() / scales.force;
        let order = f64::from(u32::try_from(j).unwrap_or(u32::MAX));
        let by_place = (scales.tolerance / worst).powf(1.0 / order);
        let by_force = (scales.tolerance / force).powf(1.0 / (order - 1.0));
        by_place.min(by_force)
    };
    reach(ORDER - 1).min(reach(ORDER))
}

/// Length of a step of flight in s.
pub fn slack(law: &Law) -> f64 {
    let fastest = law.relaxation.iter().map(|r| r.rate).fold(0.0, f64::max);
    FLIGHT_S.min(RELAXATIONS / fastest)
}
