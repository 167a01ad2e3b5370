//! The taut system about its hang position: regime, damping ratio, frequencies.
use super::oscillator::{Oscillator, Regime};
use super::outcome::Fall;
use super::third::Spectrum;

/// The linear system about the hang position with the slider at rest.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Hang {
    /// Its regime.
    pub regime: Regime,
    /// Modulus of the complex pair, rad/s, and damping ratio `-Re/modulus`; none when there is no such pair.
    pub pair: Option<(f64, f64)>,
    /// Imaginary part of the pair, rad/s; underdamped only.
    pub damped_frequency: Option<f64>,
}

impl Fall {
    /// The linear system about the hang position; none when nothing in the path stretches.
    #[must_use]
    pub fn about_hang(&self) -> Option<Hang> {
        let groups = [&self.path.line, &self.path.other];
        let at = self.hang_elongation_m();
        let slope = |i: usize| groups[i].elastic.piece(groups[i].elastic.piece_at(at[i])).map(|p| p.slope);
        let damping = |i: usize| if groups[i].is_damped() { groups[i].damping_n_s_per_m } else { 0.0 };
        let (c1, c2) = (damping(0), damping(1));
        let pair = match (slope(0), slope(1)) {
            (None, None) => return None,
            (Some(k), None) | (None, Some(k)) => Oscillator::new(self.mass_kg, c1 + c2, k),
            (Some(k1), Some(k2)) if c1 + c2 == 0.0 => Oscillator::new(self.mass_kg, 0.0, 1.0 / (1.0 / k1 + 1.0 / k2)),
            (Some(k1), Some(k2)) => Spectrum::in_series(self.mass_kg, (k1, c1), (k2, c2)).pair,
        };
        Some(Hang::of(pair))
    }
}

impl Hang {
    fn of(pair: Oscillator) -> Self {
        let regime = pair.regime();
        let damped_frequency = (regime == Regime::Underdamped).then_some(pair.frequency);
        let pair = (regime != Regime::Overdamped).then(|| (pair.stiffness.sqrt(), pair.ratio()));
        Self { regime, pair, damped_frequency }
    }
}
