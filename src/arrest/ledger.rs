//! The energy account and the energy above the hang position.
use super::mode::{Mode, State, Stretch};
use super::outcome::{EnergyAccount, Fall};
use super::signal::Signal;

/// Work done so far, J.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
#[expect(clippy::struct_field_names, reason = "the suffix is the unit")]
pub struct Work {
    /// Taken by the dampers.
    pub damper_j: f64,
    /// Taken by the absorber.
    pub absorber_j: f64,
    /// Taken by the absorber in line with a lifeline.
    pub span_absorber_j: f64,
}

impl Fall {
    /// Weight, N.
    #[must_use]
    pub fn weight_n(&self) -> f64 {
        self.mass_kg * self.gravity_m_per_s2
    }

    /// Travel at rest with a deployed length kept, m.
    #[must_use]
    pub fn hang_travel_m(&self, deployed_m: f64) -> f64 {
        deployed_m + self.hang_elongation_m().iter().sum::<f64>()
    }

    pub(super) fn hang_elongation_m(&self) -> [f64; 2] {
        let weight = self.weight_n();
        [self.path.line.elastic.elongation_m(weight), self.path.other.elastic.elongation_m(weight)]
    }

    pub(super) fn elastic_j(&self, e: [f64; 2]) -> [f64; 2] {
        [self.path.line.elastic.energy_j(e[0]), self.path.other.elastic.energy_j(e[1])]
    }

    /// Energy above the hang position for the length deployed so far, J.
    pub(super) fn energy_above_j(&self, state: &State) -> f64 {
        let hang = self.hang_elongation_m();
        let weight = self.weight_n();
        let kept: f64 = self.elastic_j(hang).iter().sum::<f64>() - weight * (hang[0] + hang[1]);
        let kinetic = 0.5 * self.mass_kg * state.v * state.v;
        kinetic + self.elastic_j(state.e).iter().sum::<f64>() - weight * (state.x - state.s) - kept
    }

    /// The account at a state, J.
    pub(super) fn account(&self, state: &State, work: Work) -> EnergyAccount {
        let [line_j, other_j] = self.elastic_j(state.e);
        let kinetic_j = 0.5 * self.mass_kg * state.v * state.v;
        let Work { damper_j, absorber_j, span_absorber_j } = work;
        EnergyAccount { kinetic_j, line_j, other_j, absorber_j, span_absorber_j, damper_j }
    }

    /// Work done in the first `t` s of a stretch, J: each integral is worked out on its own, not from the balance.
    pub(super) fn work_in(&self, stretch: &Stretch, t: f64) -> Work {
        let path = &self.path;
        let damper_j = [&path.line, &path.other]
            .iter()
            .zip(&stretch.e)
            .filter(|(group, _)| group.is_damped())
            .map(|(group, e)| group.damping_n_s_per_m * rate_square_integral(e, t))
            .sum();
        let absorber_j = match (&path.absorber, stretch.mode) {
            (Some(absorber), Mode::Sliding) => {
                absorber.force.integral(stretch.s.value(t)) - absorber.force.integral(stretch.s.value(0.0))
            }
            _ => 0.0,
        };
        Work { damper_j, absorber_j, span_absorber_j: 0.0 }
    }
}

fn rate_square_integral(e: &Signal, t: f64) -> f64 {
    match e {
        Signal::Swing(e) => e.derivative().square_integral(t),
        Signal::Wave(e) => e.derivative().square_integral(t),
        Signal::Series(e) => e.derivative().square_integral(t),
        Signal::Drift(e) => {
            let (away, rate) = e.relax[0];
            0.5 * away * away * rate * -(-2.0 * rate * t).exp_m1()
        }
    }
}

impl EnergyAccount {
    /// Sum of all entries, J.
    #[must_use]
    pub fn total_j(&self) -> f64 {
        self.kinetic_j + self.line_j + self.other_j + self.absorber_j + self.span_absorber_j + self.damper_j
    }
}

impl std::ops::AddAssign for Work {
    fn add_assign(&mut self, other: Self) {
        self.damper_j += other.damper_j;
        self.absorber_j += other.absorber_j;
        self.span_absorber_j += other.span_absorber_j;
    }
}

impl std::ops::Add for Work {
    type Output = Self;
    fn add(mut self, other: Self) -> Self {
        self += other;
        self
    }
}
