//! Agreement with a value as it is printed: half a unit of its last digit.

/// Fails unless `actual` rounds to the printed number (unit factors apply to `actual` before).
#[track_caller]
pub fn assert_printed(printed: &str, actual: f64) {
    let decimals = printed.split_once('.').map_or(0, |parts| parts.1.len());
    let expected: f64 = printed.parse().expect("a number");
    let half = 0.5 * 10_f64.powi(-i32::try_from(decimals).expect("few digits"));
    let off = (actual - expected).abs();
    assert!(off <= half * (1.0 + 1e-6), "printed {printed}, got {actual:.14}, off by {off:.2e}");
}
