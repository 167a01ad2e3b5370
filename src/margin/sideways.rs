//! Checks of a fall that swings: how far to the side, and what it meets.
use super::judge::{Check, CheckKind, Impact, judge};
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
            _ if gap_m.is_none() && self.tells_reach() => check.out_of_reach(),
            _ => check,
        }
    }

    fn impact(&self) -> Option<Impact> {
        let (speed, drop) = (self.numbers.get("strike_speed")?, self.numbers.get("strike_drop_equivalent")?);
        Some(Impact { speed_m_per_s: speed, drop_equivalent_m: drop })
    }
}
