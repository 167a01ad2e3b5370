//! What an event does to the state and the mode.
use super::event::End;
use super::law::Force;
use super::outcome::Impulse;
use super::run::{Run, give_back, is_impulse};
use crate::arrest::{Happening, Mode};

/// A force judged at once counts as above a level by this share.
const TOUCH: f64 = 1e-12;

impl Run<'_> {
    pub(super) fn apply(&mut self, end: End) {
        match end {
            End::Slack => self.go_slack(),
            End::Taut => self.taut(),
            End::Onset => self.slide(),
            End::SliderStops => {
                self.happened(Happening::DeploymentEnd);
                self.hold();
            }
            End::StrokeUsedUp => self.lock(),
            End::SliderKnot => {
                self.pieces.slider += 1;
                self.modes += 1;
            }
            End::Knot(group, up) => {
                let piece = &mut self.pieces.group[group];
                *piece = if up { *piece + 1 } else { piece.saturating_sub(1) };
                self.modes += 1;
            }
            End::Reversal => self.end(),
        }
    }

    fn is_rigid(&self) -> bool {
        self.plane.path.line.is_rigid() && self.plane.path.other.is_rigid()
    }

    fn go_slack(&mut self) {
        self.happened(Happening::Slack);
        self.first_slack_s.get_or_insert(self.time_s);
        let path = &self.plane.path;
        for (e, group) in self.state.e.iter_mut().zip([&path.line, &path.other]) {
            if !group.is_damped() {
                *e = 0.0;
            }
        }
        self.enter(Mode::Slack);
    }

    /// The path is taut, first or again: the force right after decides whether the slider moves.
    pub(super) fn taut(&mut self) {
        self.happened(Happening::Taut);
        self.enter(Mode::Stuck);
        let level = self.moving_force();
        if self.is_rigid() {
            match level {
                Some(level) if is_impulse(self.state.radial_speed()) => {
                    self.touched(level);
                    self.slide();
                }
                _ => self.hold(),
            }
            return;
        }
        let Force::Along(force) = self.law().force else { return };
        let at_once = force.value(self.state.distance(), self.state.radial_speed(), self.state.e);
        if let Some(level) = level.filter(|l| at_once > l * (1.0 + TOUCH)) {
            self.touched(level);
            self.slide();
        }
    }

    /// Taut with the slider held. A rigid path loses what speed it has along itself.
    fn hold(&mut self) {
        self.enter(Mode::Stuck);
        if !self.is_rigid() {
            return;
        }
        let radial = self.state.radial_speed();
        let distance = self.state.distance();
        let lost_j = 0.5 * self.plane.mass_kg * radial * radial;
        for i in 0..2 {
            self.state.velocity[i] -= radial * self.state.position[i] / distance;
        }
        self.lost_j += lost_j;
        if is_impulse(radial) {
            self.impulses.push(Impulse { time_s: self.time_s, speed_m_per_s: radial, lost_j });
        }
    }

    fn slide(&mut self) {
        self.happened(Happening::DeploymentStart);
        let lost_j = give_back(self.fall, &mut self.state, self.slider);
        self.slider.started = true;
        self.absorber_j += lost_j;
        self.enter(Mode::Sliding);
        let stroke = self.plane.path.absorber.as_ref().map_or(f64::INFINITY, |a| a.stroke_m);
        if self.state.s >= stroke {
            self.lock();
        }
    }

    /// The slider is at its stroke for good.
    fn lock(&mut self) {
        self.happened(Happening::StrokeUsedUp);
        self.slider.locked = true;
        if let Some(absorber) = &self.plane.path.absorber {
            self.state.s = absorber.stroke_m;
        }
        self.hold();
    }
}
