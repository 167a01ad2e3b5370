//! Checks of a fall that swings: how far to the side, and what it meets.
use super::judge::{Cause, Check, CheckKind, Impact, judge};
use super::numeric::Run;
use super::verdict::Verdict;
use crate::scenario::{LineKind, Scenario};

/// Whether the pivot lies beside the fall line, so that the fall becomes a swing.
pub fn swings(scenario: &Scenario) -> bool {
    let place = &scenario.place;
    let beside = match (&place.edge, place.anchor_offset) {
        (Some(edge), _) => edge.offset.si() != 0.0,
        (None, offset) => offset.is_some_and(|d| d.si() != 0.0),
    };
    beside && scenario.fall.free_fall.is_none() && scenario.line.kind != LineKind::Vertical
}

impl Run<'_> {
    /// Whether the run is one of a swing: its numbers say so.
    pub(super) fn has_swung(&self) -> bool {
        self.numbers.get("swing_drop").is_some()
    }

    /// Whether a gap that is missing is missing because the swing never comes near.
    pub(super) fn tells_reach(&self) -> bool {
        self.has_swung() && self.numbers.get("lowest_attachment").is_some()
    }

    pub(super) fn sideways(&self, list: &mut Vec<Check>) {
        if !self.has_swung() && !swings(self.scenario) {
            return;
        }
        let (rules, numbers) = (self.rules, self.numbers);
        let levels = self.scenario.obstacles.len();
        for (i, id) in rules.approach_ids.iter().enumerate() {
            let kind = if i < levels { CheckKind::LevelStrike(i) } else { CheckKind::FaceStrike(i - levels) };
            list.push(self.strike(kind, numbers.get(id)));
        }
        let (distance, angle) = (numbers.get("swing_offset_peak"), numbers.get("swing_angle_peak"));
        self.rule(list, CheckKind::SwingDistance, rules.swing_distance.as_ref(), distance);
        self.rule(list, CheckKind::SwingAngle, rules.swing_angle.as_ref(), angle);
    }

    /// The gap must not close. No gap in a run that did swing: the body is never beside or above it.
    fn strike(&self, kind: CheckKind, gap_m: Option<f64>) -> Check {
        let check = judge(kind, gap_m, Some(0.0));
        match check.verdict {
            Verdict::Short => Check { impact: self.impact(), ..check },
            _ if gap_m.is_none() && self.tells_reach() => match kind {
                CheckKind::FaceStrike(i) if self.legs_may_meet(i) => check.open(Cause::BelowAttachment),
                _ => check.not_met(Cause::OutOfReach),
            },
            _ => check,
        }
    }

    /// Whether a face that the attachment never passes is within reach of what hangs below the attachment.
    fn legs_may_meet(&self, face: usize) -> bool {
        let Some(face) = self.scenario.faces.get(face) else { return false };
        let number = |id| self.numbers.get(id);
        let lowest = number("lowest_foot").or_else(|| number("lowest_underside")).unwrap_or(f64::NEG_INFINITY);
        let half_width = self.scenario.subject.half_width.map_or(0.0, |w| w.si());
        let reach = number("swing_offset_peak").map_or(f64::INFINITY, |offset| offset + half_width);
        let start = self.scenario.place.standing.map_or(f64::INFINITY, |standing| standing.si());
        // Above the feet at their lowest, below the feet at the start: they come past its height.
        let at_height = face.top.si() >= lowest && face.bottom.si() <= start.max(lowest);
        at_height && face.offset.si().abs() <= reach
    }

    fn impact(&self) -> Option<Impact> {
        let (speed, drop) = (self.numbers.get("strike_speed")?, self.numbers.get("strike_drop_equivalent")?);
        Some(Impact { speed_m_per_s: speed, drop_equivalent_m: drop })
    }
}
