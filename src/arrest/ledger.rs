//! The energy account and the energy above the hang position.
use super::mode::{Mode, Pieces, State, Stretch};
use super::outcome::{EnergyAccount, Fall};
use super::signal::{Moment, Signal};

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

impl Work {
    /// Sum, J.
    pub fn total_j(self) -> f64 {
        self.damper_j + self.absorber_j + self.span_absorber_j
    }
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

    /// Elastic energy less the weight's at the hang position, J: what [`Self::energy_above_j`] counts from.
    pub(super) fn hang_j(&self) -> f64 {
        let hang = self.hang_elongation_m();
        self.elastic_j(hang).iter().sum::<f64>() - self.weight_n() * (hang[0] + hang[1])
    }

    /// Energy above the hang position for the length deployed so far, J; `hang_j` is [`Self::hang_j`].
    pub(super) fn energy_above_j(&self, state: &State, hang_j: f64) -> f64 {
        let held_j = self.account(state, Work::default()).total_j();
        self.held_above_j(held_j, state, hang_j)
    }

    /// As [`Self::energy_above_j`], where the kinetic and elastic energy is known.
    pub(super) fn held_above_j(&self, held_j: f64, state: &State, hang_j: f64) -> f64 {
        held_j - self.weight_n() * (state.x - state.s) - hang_j
    }

    /// Kinetic and elastic energy of a state on known straight pieces, J.
    pub(super) fn held_j(&self, pieces: Pieces, state: &State) -> f64 {
        let [line, other] = [&self.path.line.elastic, &self.path.other.elastic];
        let elastic = line.energy_on_j(pieces.group[0], state.e[0]) + other.energy_on_j(pieces.group[1], state.e[1]);
        0.5 * self.mass_kg * state.v * state.v + elastic
    }

    /// The account at a state, J.
    pub(super) fn account(&self, state: &State, work: Work) -> EnergyAccount {
        let [line_j, other_j] = self.elastic_j(state.e);
        let kinetic_j = 0.5 * self.mass_kg * state.v * state.v;
        let Work { damper_j, absorber_j, span_absorber_j } = work;
        EnergyAccount { kinetic_j, line_j, other_j, absorber_j, span_absorber_j, damper_j }
    }

    /// Work done in a stretch up to a moment, J: each integral is worked out on its own, not from the balance.
    pub(super) fn work_in(&self, stretch: &Stretch, moment: &Moment) -> Work {
        let path = &self.path;
        let damper_j = [&path.line, &path.other]
            .iter()
            .zip(&stretch.e)
            .filter(|(group, _)| group.is_damped())
            .map(|(group, e)| group.damping_n_s_per_m * rate_square_integral(e, moment))
            .sum();
        let absorber_j = match (&path.absorber, stretch.mode) {
            (Some(absorber), Mode::Sliding) => {
                absorber.force.integral(stretch.s.value_at(moment)) - absorber.force.integral(stretch.s.value(0.0))
            }
            _ => 0.0,
        };
        Work { damper_j, absorber_j, span_absorber_j: 0.0 }
    }
}

fn rate_square_integral(e: &Signal, moment: &Moment) -> f64 {
    let t = moment.t;
    match e {
        Signal::Swing(e) => e.derivative().square_integral(t, moment.pair()),
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
