//! From a share of a band's distribution to the value below which it lies.
use crate::quantity::{Band, Shape};
use statrs::distribution::{ContinuousCDF, Normal};

/// Standard deviations from end to end of a normal band: low and high are two of them from the middle.
///
/// Reason: a band states what is nearly always met, and 95.4 % of an uncut normal lie within two.
pub const NORMAL_WIDTH: f64 = 4.0;

/// The inverse of a band's cumulative distribution, prepared for many calls.
///
/// - uniform: `low + u (high - low)`; typical plays no part;
/// - triangular: most likely at typical;
/// - normal: mean typical and standard deviation `(high - low) / 4`, cut at low and high and scaled back to 1.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Quantile {
    band: Band,
    /// Normal bands: the share of the uncut distribution below low and below high.
    cut: (f64, f64),
}

impl Quantile {
    /// Prepares a band.
    #[must_use]
    pub fn new(band: Band) -> Self {
        let below = |value: f64| Normal::standard().cdf((value - band.typical) / sigma(&band));
        let normal = band.shape == Shape::Normal && band.is_wide();
        let cut = if normal { (below(band.low), below(band.high)) } else { (0.0, 1.0) };
        Self { band, cut }
    }

    /// The value, SI, below which the share `u` of the band lies; `u` from 0 to 1, values beyond are taken as these.
    /// Always within low to high, and not falling as `u` rises. Accuracy 1e-10 of the width
    /// for the normal shape, where it is that of the error function used, and rounding for the others.
    ///
    /// # Reference
    /// Devroye (1986), Non-Uniform Random Variate Generation, II.2 (inversion, and of cut distributions).
    #[must_use]
    pub fn at(&self, u: f64) -> f64 {
        let Band { low, typical, high, shape } = self.band;
        if !self.band.is_wide() {
            return typical;
        }
        let u = u.clamp(0.0, 1.0);
        let value = match shape {
            Shape::Uniform => low + u * (high - low),
            Shape::Triangular => triangular(&self.band, u),
            Shape::Normal => {
                let share = self.cut.0 + u * (self.cut.1 - self.cut.0);
                typical + sigma(&self.band) * Normal::standard().inverse_cdf(share)
            }
        };
        value.clamp(low, high)
    }
}

fn sigma(band: &Band) -> f64 {
    (band.high - band.low) / NORMAL_WIDTH
}

fn triangular(band: &Band, u: f64) -> f64 {
    let width = band.high - band.low;
    let rise = band.typical - band.low;
    if u * width < rise {
        band.low + (u * width * rise).sqrt()
    } else {
        band.high - ((1.0 - u) * width * (band.high - band.typical)).sqrt()
    }
}
