//! Ids and labels of checks.
use super::judge::CheckKind;
use super::rules::Ruling;
use super::span::SpanRules;
use super::words::Words;

impl Words<'_> {
    pub(super) fn id(&self, kind: CheckKind) -> String {
        match kind {
            CheckKind::Clearance(i) => self.rules.clearance_ids.get(i).cloned().unwrap_or_default(),
            CheckKind::LevelStrike(i) => self.scenario.obstacles.get(i).map_or(String::new(), |o| strike_id(&o.id())),
            CheckKind::FaceStrike(i) => self.scenario.faces.get(i).map_or(String::new(), |f| strike_id(&f.id())),
            other => plain_id(other).to_owned(),
        }
    }

    pub(super) fn label(&self, kind: CheckKind) -> String {
        match kind {
            CheckKind::Clearance(i) => {
                let name = self.scenario.obstacles.get(i).map_or("", |o| o.name.as_str());
                format!("clearance {name}")
            }
            CheckKind::LevelStrike(i) => {
                format!("swing strike {}", self.scenario.obstacles.get(i).map_or("", |o| o.name.as_str()))
            }
            CheckKind::FaceStrike(i) => {
                format!("swing strike {}", self.scenario.faces.get(i).map_or("", |f| f.name.as_str()))
            }
            CheckKind::SpanEndLoad => with_factor("lifeline end load", self.span_factor(|s| s.end_factor.as_ref())),
            CheckKind::SpanTension => with_factor("lifeline tension", self.span_factor(|s| s.cable_factor.as_ref())),
            CheckKind::AnchorLoad => with_factor("anchor load", self.rules.anchor_factor.as_ref()),
            CheckKind::LineLoad => with_factor("line force", self.rules.line_factor.as_ref()),
            other => plain_label(other).to_owned(),
        }
    }

    fn span_factor(&self, pick: fn(&SpanRules) -> Option<&Ruling>) -> Option<&Ruling> {
        self.rules.span.as_ref().and_then(pick)
    }
}

fn strike_id(name: &str) -> String {
    format!("swing_strike.{name}")
}

fn with_factor(label: &str, factor: Option<&Ruling>) -> String {
    match factor.map(Ruling::si) {
        Some(factor) if factor != 1.0 => format!("{label} x {factor}"),
        _ => label.to_owned(),
    }
}

pub const fn missing_key(kind: CheckKind) -> &'static str {
    match kind {
        CheckKind::SpanTension => "not stated: state `anchor.span.strength`",
        CheckKind::SpanCableDiameter => "the file states no diameter: measure the cable",
        CheckKind::AnchorLoad | CheckKind::AnchorStrength | CheckKind::SpanEndLoad | CheckKind::SpanAnchorStrength => {
            "not stated: state `anchor.capacity`"
        }
        CheckKind::LineLoad | CheckKind::LineStrength => "not stated: state `line.strength`",
        CheckKind::TotalFall => "the limit needs the length of the line: state `line.length`",
        _ => "the limit is missing",
    }
}

const fn plain_id(kind: CheckKind) -> &'static str {
    match kind {
        CheckKind::Clearance(_) => "clearance",
        CheckKind::LevelStrike(_) | CheckKind::FaceStrike(_) => "swing_strike",
        CheckKind::SwingDistance => "swing_distance",
        CheckKind::SwingAngle => "swing_angle",
        CheckKind::SpanEndLoad => "span_end_load",
        CheckKind::SpanTension => "span_tension",
        CheckKind::SpanLength => "span_length",
        CheckKind::SpanSlack => "span_slack",
        CheckKind::SpanWorkers => "span_workers",
        CheckKind::SpanAnchorStrength => "span_anchor_strength",
        CheckKind::SpanCableDiameter => "span_cable_diameter",
        CheckKind::ArrestForce => "arrest_force",
        CheckKind::Stroke => "stroke",
        CheckKind::SpanStroke => "span_stroke",
        CheckKind::FreeFall => "free_fall",
        CheckKind::DecelerationDistance => "deceleration_distance",
        CheckKind::TotalFall => "total_fall_distance",
        CheckKind::AnchorLoad => "anchor_load",
        CheckKind::AnchorStrength => "anchor_strength",
        CheckKind::LineLoad => "line_load",
        CheckKind::LineStrength => "line_strength",
        CheckKind::RatedMass => "rated_mass",
        CheckKind::RatedFreeFall => "rated_free_fall",
        CheckKind::SubjectMass => "subject_mass",
        CheckKind::LanyardLength => "lanyard_length",
        CheckKind::StaticElongation => "static_elongation",
        CheckKind::DynamicElongation => "dynamic_elongation",
    }
}

const fn plain_label(kind: CheckKind) -> &'static str {
    match kind {
        CheckKind::Clearance(_) => "clearance",
        CheckKind::LevelStrike(_) | CheckKind::FaceStrike(_) => "swing strike",
        CheckKind::SwingDistance => "swing to the side",
        CheckKind::SwingAngle => "swing angle",
        CheckKind::SpanEndLoad => "lifeline end load",
        CheckKind::SpanTension => "lifeline tension",
        CheckKind::SpanLength => "lifeline span",
        CheckKind::SpanSlack => "lifeline slack over span",
        CheckKind::SpanWorkers => "lifeline workers",
        CheckKind::SpanAnchorStrength => "lifeline end anchors",
        CheckKind::SpanCableDiameter => "lifeline cable diameter",
        CheckKind::ArrestForce => "arrest force",
        CheckKind::Stroke => "absorber stroke",
        CheckKind::SpanStroke => "lifeline absorber stroke",
        CheckKind::FreeFall => "free fall",
        CheckKind::DecelerationDistance => "deceleration distance",
        CheckKind::TotalFall => "total fall distance",
        CheckKind::AnchorLoad => "anchor load",
        CheckKind::AnchorStrength => "anchor strength",
        CheckKind::LineLoad => "line force",
        CheckKind::LineStrength => "line strength",
        CheckKind::RatedMass => "mass, absorber rating",
        CheckKind::RatedFreeFall => "free fall, absorber rating",
        CheckKind::SubjectMass => "subject mass",
        CheckKind::LanyardLength => "lanyard length",
        CheckKind::StaticElongation => "rope elongation, static",
        CheckKind::DynamicElongation => "rope elongation, dynamic",
    }
}
