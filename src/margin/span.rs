//! Checks of a horizontal lifeline: what its supports and its cable carry, and the geometry that a set prescribes.
use super::judge::{Cause, Check, CheckKind, judge};
use super::limit::LimitKind;
use super::numeric::Run;
use super::rules::Ruling;
use super::verdict::Verdict;
use crate::scenario::{Span, SpanTension};

/// The limits of a horizontal lifeline.
#[derive(Clone, Debug, PartialEq)]
pub struct SpanRules {
    /// Factor on the load of an end support.
    pub end_factor: Option<Ruling>,
    /// Factor on the tension of the cable.
    pub cable_factor: Option<Ruling>,
    /// Longest prescribed span.
    pub length: Option<Ruling>,
    /// Least prescribed slack over span.
    pub slack: Option<Ruling>,
    /// Most workers of a prescribed lifeline.
    pub workers: Option<Ruling>,
    /// Least strength of the end anchors of a prescribed lifeline.
    pub anchor: Option<Ruling>,
    /// Least diameter of the cable of a prescribed lifeline.
    pub diameter: Option<Ruling>,
    /// Least strength of the supports that the file itself asks for.
    pub own_strength: Option<Ruling>,
}

impl SpanRules {
    /// From a search by the file's own key and the kinds of a set.
    ///
    /// A set with a factor of its own for a lifeline has it judged; in another its factor on an anchor load counts for
    /// the supports and its factor on the line force for the cable.
    pub fn of(find: &dyn Fn(&str, &[LimitKind]) -> Option<Ruling>) -> Self {
        let own_factor = find("", &[LimitKind::SpanFactor]);
        let end = if own_factor.is_some() { LimitKind::SpanFactor } else { LimitKind::AnchorFactor };
        Self {
            end_factor: find("anchor_factor", &[end]),
            cable_factor: own_factor.or_else(|| find("line_factor", &[LimitKind::LineFactor])),
            length: find("", &[LimitKind::SpanLength]),
            slack: find("", &[LimitKind::SpanSlack]),
            workers: find("", &[LimitKind::SpanWorkers]),
            anchor: find("", &[LimitKind::SpanAnchorStrength]),
            diameter: find("", &[LimitKind::SpanCableDiameter]),
            own_strength: find("anchor_strength", &[]),
        }
    }
}

/// Unloaded sag in the middle over the span; a cable with pretension is taken as straight.
fn slack_over_span(span: &Span) -> f64 {
    match &span.tension {
        SpanTension::Sag(sag) => sag.si() / span.length.si(),
        SpanTension::Pretension(_) => 0.0,
    }
}

impl Run<'_> {
    pub(super) fn span(&self, list: &mut Vec<Check>, span: &Span, rules: &SpanRules) {
        let capacity = self.scenario.anchor.capacity.map(|c| c.si());
        let strength = span.strength.map(|s| s.si());
        self.carried(list, CheckKind::SpanEndLoad, rules.end_factor.as_ref(), ("span_end_force", capacity));
        self.carried(list, CheckKind::SpanTension, rules.cable_factor.as_ref(), ("span_tension_peak", strength));
        if let (Some(capacity), Some(ruling)) = (capacity, &rules.own_strength) {
            list.push(judge(CheckKind::AnchorStrength, Some(capacity), Some(ruling.si())));
        }
        if let Some(absorber) = &span.absorber {
            let given = self.numbers.get("span_deployed_length");
            let check = judge(CheckKind::SpanStroke, given, Some(absorber.stroke.si()));
            let used_up = self.numbers.get("span_stroke_used_up").is_some_and(|flag| flag != 0.0);
            list.push(if used_up { check.short(Cause::StrokeUsedUp) } else { check });
        }
        self.rule(list, CheckKind::SpanLength, rules.length.as_ref(), Some(span.length.si()));
        self.rule(list, CheckKind::SpanSlack, rules.slack.as_ref(), Some(slack_over_span(span)));
        let workers = span.workers.map_or(1.0, |n| n.si());
        self.rule(list, CheckKind::SpanWorkers, rules.workers.as_ref(), Some(workers));
        for (kind, ruling, stated) in [
            (CheckKind::SpanAnchorStrength, &rules.anchor, capacity),
            // No key of the file states it.
            (CheckKind::SpanCableDiameter, &rules.diameter, None),
        ] {
            let Some(ruling) = ruling else { continue };
            let check = judge(kind, stated, Some(ruling.si()));
            list.push(if stated.is_none() { check.open(Cause::NotStated) } else { check });
        }
    }

    /// Factor times a force of the run against what is stated to carry it.
    fn carried(
        &self,
        list: &mut Vec<Check>,
        kind: CheckKind,
        factor: Option<&Ruling>,
        (id, stated): (&str, Option<f64>),
    ) {
        if stated.is_none() && self.rules.set.is_none() && factor.is_none() {
            return;
        }
        let force = self.numbers.get(id);
        let times = |factor: f64| judge(kind, force.map(|f| factor * f), stated);
        let mut check = times(factor.map_or(1.0, Ruling::si));
        let other = factor.and_then(Ruling::judged_by_set).is_some_and(|p| p.or == Some(LimitKind::SpanFactor));
        let least = self.rules.least_conditional(LimitKind::SpanFactor).filter(|_| other);
        if check.verdict == Verdict::Short && least.is_some_and(|f| times(f).verdict == Verdict::Holds) {
            check = check.open(Cause::OtherRule);
        }
        list.push(check);
    }
}
