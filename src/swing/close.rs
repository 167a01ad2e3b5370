//! The energy account of a run, its lowest point, and what it comes to in the end.
use super::approach;
use super::outcome::{Ended, Lowest, PlaneOutcome, WorkCount};
use super::plane::{Point, SwingError};
use super::run::Run;
use super::series::State;
use crate::arrest::{EnergyAccount, Mode};

/// Largest imbalance of the energy account over the fall energy with which a run counts as computed.
const BALANCE: f64 = 1e-8;

/// Heights below this share of the line's length are rounding against its length and are not judged finer.
const LEAST_HEIGHT: f64 = 1e-6;

impl Run<'_> {
    pub fn offer_lowest(&mut self, state: &State, time_s: f64) {
        let at = self.point(state);
        let deeper = |(old, _): (Lowest, _)| at.elevation_m < old.at.elevation_m - 1e-9 * self.plane.free_length_m;
        if self.lowest.is_none_or(deeper) {
            let lowest = Lowest { time_s, at, speed_m_per_s: state.speed() };
            self.lowest = Some((lowest, self.account(state, self.absorbed_j(state.s))));
        }
    }

    pub fn point(&self, state: &State) -> Point {
        let pivot = self.plane.pivot;
        Point::new(pivot.offset_m + state.position[0], pivot.elevation_m + state.position[1])
    }

    /// Work of the slider from the state at the start of the step to a deployed length, J.
    pub fn absorbed_j(&self, to: f64) -> f64 {
        match &self.plane.path.absorber {
            Some(absorber) if self.mode == Mode::Sliding => {
                absorber.force.integral(to) - absorber.force.integral(self.state.s)
            }
            _ => 0.0,
        }
    }

    pub fn account(&self, state: &State, absorbed_j: f64) -> EnergyAccount {
        let path = &self.plane.path;
        EnergyAccount {
            kinetic_j: 0.5 * self.body.mass * state.speed().powi(2),
            line_j: path.line.elastic.energy_j(state.e[0]),
            other_j: path.other.elastic.energy_j(state.e[1]),
            absorber_j: self.absorber_j + absorbed_j,
            span_absorber_j: 0.0,
            damper_j: state.damper_j,
        }
    }

    pub fn total_j(&self, state: &State, absorbed_j: f64) -> f64 {
        self.account(state, absorbed_j).total_j() + self.plane.weight_n() * state.position[1] + self.lost_j
    }

    pub fn outcome(mut self) -> Result<PlaneOutcome, SwingError> {
        let state = self.state;
        self.offer_lowest(&state, self.time_s);
        let Some((lowest, energy)) = self.lowest else {
            return Err(SwingError::Energy { residual: f64::NAN });
        };
        let height_m = self.plane.start.elevation_m - lowest.at.elevation_m;
        let energy_residual =
            self.imbalance_j / (self.plane.weight_n() * height_m.max(LEAST_HEIGHT * self.plane.free_length_m));
        if energy_residual.is_nan() || energy_residual > BALANCE {
            return Err(SwingError::Energy { residual: energy_residual });
        }
        let [x, z] = self.taut_state.position;
        let taut_at = self.point(&self.taut_state);
        let side = if x == 0.0 { 1.0 } else { x.signum() };
        let (levels, faces) = approach::all(self.plane, &self.trajectory);
        Ok(PlaneOutcome {
            free_fall_m: self.fall.free_fall_m,
            time_taut_s: self.taut_s,
            taut_at,
            speed_at_taut_m_per_s: self.taut_state.speed(),
            tangential_speed_at_taut_m_per_s: self.taut_state.tangential_speed(),
            peak_force: self.impulses.is_empty().then_some(self.force.peak),
            peak_force_without_impulses: self.force.peak,
            impulses: self.impulses,
            line_elongation_peak_m: self.stretch[0].peak.value.max(0.0),
            other_elongation_peak_m: self.stretch[1].peak.value.max(0.0),
            deployed_m: state.s,
            stroke_used_up: self.slider.locked,
            time_first_slack_s: self.first_slack_s,
            time_above_s: self.above_s,
            lowest,
            swing_drop_m: taut_at.elevation_m - lowest.at.elevation_m,
            ended: self.ended.unwrap_or(Ended::TimeLimit),
            end_s: self.time_s,
            angle_at_taut_rad: (side * x).atan2(-z),
            angle_at_end_rad: (side * state.position[0]).atan2(-state.position[1]),
            reach_m: approach::reach_m(self.plane, &self.trajectory),
            levels,
            faces,
            energy,
            energy_residual,
            work: WorkCount { modes: self.modes, steps: self.steps },
            happenings: self.happenings,
            trajectory: self.trajectory,
        })
    }
}
