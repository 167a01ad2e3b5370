//! Round tick positions for an axis, shared by the screen and the figures.

/// Round positions along an axis.
#[derive(Clone, Debug, PartialEq)]
pub struct Ticks {
    /// Positions in rising order, all within the range asked for.
    pub values: Vec<f64>,
    /// Distance between two neighbours; 1, 2 or 5 times a power of ten.
    pub step: f64,
    /// Decimals that tell neighbours apart.
    pub decimals: usize,
}

impl Ticks {
    /// The text of one tick: always the same number of decimals, no `-0`.
    #[must_use]
    pub fn label(&self, value: f64) -> String {
        fixed(value, self.decimals)
    }

    /// The widest label, in characters.
    #[must_use]
    pub fn widest(&self) -> usize {
        self.values.iter().map(|&v| self.label(v).len()).max().unwrap_or(0)
    }
}

/// A number with a fixed number of decimals and without a minus sign before zero.
#[must_use]
pub fn fixed(value: f64, decimals: usize) -> String {
    let text = format!("{value:.decimals$}");
    if text.starts_with('-') && text.bytes().all(|b| matches!(b, b'-' | b'0' | b'.')) {
        return text.trim_start_matches('-').to_owned();
    }
    text
}

/// Ticks within `low..=high`, at most `at_most` of them, on multiples of 1, 2 or 5 times a power of ten.
///
/// A range that is empty, reversed or not finite has no ticks; neither has `at_most` 0.
#[must_use]
pub fn ticks(low: f64, high: f64, at_most: usize) -> Ticks {
    let none = Ticks { values: Vec::new(), step: 1.0, decimals: 0 };
    let span = high - low;
    if at_most == 0 || !span.is_finite() || span <= 0.0 {
        return none;
    }
    let mut step = step_from(span / as_f64(at_most));
    for _ in 0..4 {
        let values = multiples(low, high, step);
        if values.len() <= at_most {
            return Ticks { values, step, decimals: decimals(step) };
        }
        step = step_from(step * 1.5);
    }
    none
}

/// The smallest of 1, 2, 5 times a power of ten that is not below `least` (`least > 0`).
#[must_use]
pub fn step_from(least: f64) -> f64 {
    let decade = 10_f64.powi(floor_log10(least));
    let within = 1.0 + 1e-9;
    for factor in [1.0, 2.0, 5.0] {
        if factor * decade * within >= least {
            return factor * decade;
        }
    }
    10.0 * decade
}

/// The exponent of the leading digit of a positive number.
#[expect(clippy::cast_possible_truncation, reason = "exponents of finite f64 lie within -324..=308")]
pub(crate) fn floor_log10(value: f64) -> i32 {
    value.log10().floor() as i32
}

fn multiples(low: f64, high: f64, step: f64) -> Vec<f64> {
    let slip = 1e-9;
    let first = (low / step - slip).ceil();
    let last = (high / step + slip).floor();
    let mut values = Vec::new();
    let mut index = first;
    while index <= last && values.len() <= 1000 {
        values.push(index * step);
        index += 1.0;
    }
    values
}

fn decimals(step: f64) -> usize {
    usize::try_from(-floor_log10(step * (1.0 + 1e-9))).unwrap_or(0)
}

#[expect(clippy::cast_precision_loss, reason = "counts of ticks are far below 2^52")]
fn as_f64(count: usize) -> f64 {
    count as f64
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn steps_are_one_two_or_five() {
        assert_eq!(step_from(0.9), 1.0);
        assert_eq!(step_from(1.1), 2.0);
        assert_eq!(step_from(2.1), 5.0);
        assert_eq!(step_from(5.1), 10.0);
        assert!((step_from(0.013) - 0.02).abs() < 1e-15);
    }

    #[test]
    fn ticks_stay_in_range_and_below_the_count() {
        for (low, high) in [(0.0, 1.0), (-3.7, 13.2), (6.9, 13.21), (0.0, 0.031), (-1e-6, 1e-6), (0.0, 6523.0)] {
            for at_most in 1..20 {
                let found = ticks(low, high, at_most);
                assert!(found.values.len() <= at_most, "{low} {high} {at_most}: {found:?}");
                let slip = found.step * 1e-6;
                assert!(found.values.iter().all(|&v| v >= low - slip && v <= high + slip), "{found:?}");
            }
        }
    }

    #[test]
    fn labels_tell_neighbours_apart() {
        for (low, high) in [(0.0, 1.0), (6.9, 7.02), (-0.3, 0.4)] {
            let found = ticks(low, high, 8);
            let labels: Vec<String> = found.values.iter().map(|&v| found.label(v)).collect();
            let mut unique = labels.clone();
            unique.dedup();
            assert_eq!(labels, unique);
            assert!(labels.len() >= 3, "{labels:?}");
        }
    }

    #[test]
    fn zero_has_no_minus_sign() {
        assert_eq!(fixed(-0.001, 2), "0.00");
        assert_eq!(fixed(-0.25, 2), "-0.25");
    }

    #[test]
    fn ranges_that_are_none_have_no_ticks() {
        assert!(ticks(1.0, 1.0, 5).values.is_empty());
        assert!(ticks(2.0, 1.0, 5).values.is_empty());
        assert!(ticks(f64::NAN, 1.0, 5).values.is_empty());
        assert!(ticks(0.0, 1.0, 0).values.is_empty());
    }
}
