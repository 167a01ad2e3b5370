//! The numeric core of the checks: numbers in, verdicts out, no text. Cheap enough for a hundred thousand runs.
use super::judge::{Cause, Check, CheckKind, ROUNDING_SHARE, judge};
use super::limit::{LimitKind, WrittenFor};
use super::rules::{Rules, Ruling};
use super::sideways::swings;
use super::stretch::static_elongation;
use super::verdict::Verdict;
use crate::estimate::{Numbers, Validity};
use crate::scenario::{AnchorKind, LineKind, Scenario};

/// Every check that applies to the numbers of one run, not yet sorted by verdict.
///
/// `rules` are those of the same scenario; where only values of the scenario changed they stay the same.
#[must_use]
pub fn checks(rules: &Rules, scenario: &Scenario, numbers: &Numbers, validity: &[Validity]) -> Vec<Check> {
    let run = Run { rules, scenario, numbers };
    let mut list = Vec::with_capacity(rules.clearance_ids.len() + 12);
    run.clearances(&mut list);
    run.fall(&mut list);
    run.sideways(&mut list);
    run.anchor(&mut list);
    run.line(&mut list);
    run.ratings(&mut list);
    if !validity.is_empty() {
        list.iter_mut().filter(|c| c.kind.needs_model()).for_each(|c| *c = c.open(Cause::NotValid));
    }
    accept_either(&mut list, CheckKind::ArrestForce, rules.arrest_force.as_ref(), CheckKind::FreeFall);
    accept_either(&mut list, CheckKind::FreeFall, rules.free_fall.as_ref(), CheckKind::ArrestForce);
    accept_either(&mut list, CheckKind::AnchorStrength, rules.anchor_strength.as_ref(), CheckKind::AnchorLoad);
    accept_either(&mut list, CheckKind::SwingDistance, rules.swing_distance.as_ref(), CheckKind::SwingAngle);
    accept_either(&mut list, CheckKind::SwingAngle, rules.swing_angle.as_ref(), CheckKind::SwingDistance);
    list
}

pub(super) struct Run<'a> {
    pub(super) rules: &'a Rules,
    pub(super) scenario: &'a Scenario,
    pub(super) numbers: &'a Numbers,
}

impl Run<'_> {
    fn clearances(&self, list: &mut Vec<Check>) {
        for (i, (id, obstacle)) in self.rules.clearance_ids.iter().zip(&self.scenario.obstacles).enumerate() {
            let reserve = obstacle.reserve.map_or(0.0, |r| r.si());
            let check = judge(CheckKind::Clearance(i), self.numbers.get(id), Some(reserve));
            let beside = || !obstacle.is_below(&self.scenario.subject) && !swings(self.scenario);
            list.push(match check.demand {
                None if self.tells_reach() => check.not_met(Cause::OutOfReach),
                None if beside() => check.not_met(Cause::Beside),
                _ => check,
            });
        }
    }

    fn fall(&self, list: &mut Vec<Check>) {
        let rules = self.rules;
        self.rule(list, CheckKind::ArrestForce, rules.arrest_force.as_ref(), self.body_force());
        self.stroke(list);
        self.rule(list, CheckKind::FreeFall, rules.free_fall.as_ref(), self.free_fall());
        self.rule(list, CheckKind::DecelerationDistance, rules.deceleration.as_ref(), self.absorber_travel());
        self.total_fall(list);
    }

    pub(super) fn rule(&self, list: &mut Vec<Check>, kind: CheckKind, ruling: Option<&Ruling>, demand: Option<f64>) {
        let Some(ruling) = ruling else { return };
        let check = judge(kind, demand, Some(ruling.si()));
        list.push(self.within_set(strict(check, ruling), ruling));
    }

    /// Outside of what the set was written for nothing can hold by it; what is short stays short.
    fn within_set(&self, check: Check, ruling: &Ruling) -> Check {
        let by_set = ruling.judged_by_set().is_some();
        let scoped = matches!(check.kind, CheckKind::ArrestForce | CheckKind::DynamicElongation);
        let outside = || self.rules.set.is_some_and(|s| !self.is_within(&s.written_for));
        if scoped && by_set && check.verdict == Verdict::Holds && outside() {
            check.open(Cause::OutsideSet)
        } else {
            check
        }
    }

    fn is_within(&self, set: &WrittenFor) -> bool {
        let below = |value: Option<f64>, most: Option<f64>| match (value, most) {
            (_, None) => true,
            (None, Some(_)) => false,
            (Some(value), Some(most)) => value <= most * (1.0 + ROUNDING_SHARE),
        };
        (!set.absorber || self.scenario.absorber.is_some())
            && (!set.rope || self.scenario.line.kind == LineKind::Rope)
            && below(self.free_fall(), set.free_fall_m)
            && below(self.numbers.get("fall_factor"), set.fall_factor)
            && below(Some(self.scenario.subject.mass.si()), set.mass_kg)
    }

    fn body_force(&self) -> Option<f64> {
        let factor = self.scenario.subject.body_factor.map_or(1.0, |f| f.si());
        self.numbers.get("arrest_force_peak").map(|f| f / factor)
    }

    fn free_fall(&self) -> Option<f64> {
        self.numbers.get("free_fall_distance")
    }

    fn absorber_travel(&self) -> Option<f64> {
        if self.scenario.absorber.is_some() {
            return self.numbers.get("deployed_length");
        }
        self.numbers.get("arrest_distance").or_else(|| self.numbers.get("swing_drop"))
    }

    fn stroke(&self, list: &mut Vec<Check>) {
        let Some(absorber) = &self.scenario.absorber else { return };
        let check = judge(CheckKind::Stroke, self.numbers.get("deployed_length"), Some(absorber.stroke_m()));
        let used_up = self.numbers.get("stroke_used_up").is_some_and(|flag| flag != 0.0);
        list.push(if used_up { check.short(Cause::StrokeUsedUp) } else { check });
    }

    fn total_fall(&self, list: &mut Vec<Check>) {
        let Some(ruling) = &self.rules.total_fall else { return };
        let twice_length = self.scenario.line.length.map(|l| 2.0 * l.si());
        let limit =
            if ruling.is_past_twice_length() { twice_length.map(|l| l + ruling.si()) } else { Some(ruling.si()) };
        let swung = || Some(self.free_fall()? + self.numbers.get("swing_drop")?);
        let demand = self.numbers.get("total_fall_distance").or_else(swung);
        list.push(judge(CheckKind::TotalFall, demand, limit));
    }

    fn anchor(&self, list: &mut Vec<Check>) {
        let capacity = self.scenario.anchor.capacity.map(|c| c.si());
        let rules = self.rules;
        if let (AnchorKind::Span(span), Some(span_rules)) = (&self.scenario.anchor.kind, &rules.span) {
            return self.span(list, span, span_rules);
        }
        let asked = rules.set.is_some() || rules.anchor_factor.is_some() || rules.anchor_strength.is_some();
        if capacity.is_none() && !asked {
            return;
        }
        let factor = rules.anchor_factor.as_ref().map_or(1.0, Ruling::si);
        let demand = self.numbers.get("anchor_force_peak").map(|f| factor * f);
        list.push(judge(CheckKind::AnchorLoad, demand, capacity));
        if let (Some(capacity), Some(ruling)) = (capacity, &rules.anchor_strength) {
            list.push(judge(CheckKind::AnchorStrength, Some(capacity), Some(ruling.si())));
            self.accept_conditional(list, ruling, LimitKind::AnchorStrengthConditional, capacity);
        }
    }

    /// Short by the value that is judged, but enough for another condition of the same set: open.
    pub(super) fn accept_conditional(&self, list: &mut [Check], ruling: &Ruling, kind: LimitKind, stated: f64) {
        let either = ruling.judged_by_set().is_some_and(|p| p.or == Some(kind));
        let enough = || self.rules.least_conditional(kind).is_some_and(|least| stated >= least);
        if let Some(last) = list.last_mut()
            && last.verdict == Verdict::Short
            && either
            && enough()
        {
            *last = last.open(Cause::OtherRule);
        }
    }

    fn line(&self, list: &mut Vec<Check>) {
        let rules = self.rules;
        let factor = rules.line_factor.as_ref().map_or(1.0, Ruling::si);
        let demand = self.numbers.get("arrest_force_peak").map(|f| factor * f);
        let stated = self.scenario.line.strength.map(|s| s.si());
        let ruling = self.line_strength();
        if stated.is_some() || (ruling.is_none() && rules.line_factor.is_some()) {
            let left = stated.map(|strength| strength / edge_factor(self.scenario));
            list.push(judge(CheckKind::LineLoad, demand, left));
        }
        let Some(ruling) = ruling else { return };
        let check = judge(CheckKind::LineStrength, stated, Some(ruling.si()));
        list.push(if stated.is_none() { check.open(Cause::NotStated) } else { check });
        if let Some(strength) = stated {
            self.accept_conditional(list, ruling, LimitKind::LineStrength, strength);
        }
    }

    /// The strength a set asks of the line; a smaller one may hold where the line lets nobody fall far.
    fn line_strength(&self) -> Option<&Ruling> {
        let near = self.free_fall().is_some_and(|fall| fall <= SHORT_FALL_M * (1.0 + ROUNDING_SHARE));
        let short_fall = self.rules.short_fall_line_strength.as_ref().filter(|r| near && r.published.is_some());
        short_fall.or(self.rules.line_strength.as_ref())
    }

    fn ratings(&self, list: &mut Vec<Check>) {
        let mass = Some(self.scenario.subject.mass.si());
        if let Some(absorber) = &self.scenario.absorber {
            if let Some(rated) = absorber.rated_mass {
                list.push(judge(CheckKind::RatedMass, mass, Some(rated.si())));
            }
            if let Some(rated) = absorber.rated_free_fall {
                list.push(judge(CheckKind::RatedFreeFall, self.free_fall(), Some(rated.si())));
            }
        }
        let rules = self.rules;
        self.rule(list, CheckKind::SubjectMass, rules.subject_mass.as_ref(), mass);
        let length = self.scenario.line.length.map(|l| l.si());
        self.rule(list, CheckKind::LanyardLength, rules.lanyard_length.as_ref(), length);
        let elongation = static_elongation(self.scenario);
        self.rule(list, CheckKind::StaticElongation, rules.static_elongation.as_ref(), elongation);
        let stretch = self.numbers.get("line_elongation_peak").zip(length).map(|(e, l)| e / l);
        self.rule(list, CheckKind::DynamicElongation, rules.dynamic_elongation.as_ref(), stretch);
    }
}

/// A rule that accepts one of two: the one that is short is open while the other holds.
fn accept_either(list: &mut [Check], kind: CheckKind, ruling: Option<&Ruling>, other: CheckKind) {
    let wanted = match other {
        CheckKind::FreeFall => LimitKind::FreeFall,
        CheckKind::ArrestForce => LimitKind::ArrestForce,
        CheckKind::SwingDistance => LimitKind::SwingDistance,
        CheckKind::SwingAngle => LimitKind::SwingAngle,
        _ => LimitKind::AnchorFactor,
    };
    let either = ruling.and_then(Ruling::judged_by_set).is_some_and(|p| p.or == Some(wanted));
    let other_holds = list.iter().any(|c| c.kind == other && c.verdict == Verdict::Holds);
    if either && other_holds {
        list.iter_mut()
            .filter(|c| c.kind == kind && c.verdict == Verdict::Short)
            .for_each(|c| *c = c.open(Cause::OtherRule));
    }
}

fn strict(check: Check, ruling: &Ruling) -> Check {
    if ruling.is_strict() && check.margin == Some(0.0) { check.short(Cause::OnTheLimit) } else { check }
}

/// Free fall up to which 29 CFR 1926.502(d)(12) asks less of a self-retracting line: 2 ft, m.
const SHORT_FALL_M: f64 = 2.0 * 0.3048;

/// The file's own number that divides the line's strength at an edge; 1 without one.
pub(super) fn edge_factor(scenario: &Scenario) -> f64 {
    scenario.place.edge.as_ref().and_then(|edge| edge.strength_factor).map_or(1.0, |factor| factor.si())
}
