//! From checked values to the scenario.
use super::anchor::{Anchor, AnchorKind, Compliance, Span, SpanAbsorber, SpanTension};
use super::field::ACCEPT;
use super::line::{Absorber, DampingLaw, Line, LineKind, StretchLaw};
use super::model::{
    Acceptance, Edge, Face, Fall, LIMIT_KEYS, Limits, Obstacle, OwnLimit, Place, Scenario, Study, Subject, SubjectKind,
};
use super::values::Values;
use crate::quantity::{Measure, Unit};

/// Standard gravity, m/s2, by definition (3rd CGPM, 1901).
const STANDARD_GRAVITY_M_PER_S2: f64 = 9.806_65;

/// The scenario, or nothing where a needed value is missing or refused (the faults say which).
pub(super) fn scenario(values: &mut Values) -> Option<Scenario> {
    let v = &*values;
    Some(Scenario {
        title: word(v, "title"),
        notes: word(v, "notes"),
        datum: word(v, "datum"),
        gravity: m(v, "gravity").unwrap_or(Measure::exact(STANDARD_GRAVITY_M_PER_S2, Unit::MetrePerSecondSquared)),
        subject: subject(v)?,
        place: place(v)?,
        fall: Fall { free_fall: m(v, "fall.free_fall") },
        line: line(v)?,
        absorber: if v.has("absorber") { Some(absorber(v)?) } else { None },
        harness: if v.has("harness") { Some(compliance(v, "harness")?) } else { None },
        anchor: anchor(v)?,
        obstacles: (1..=v.count("obstacle")).map(|n| obstacle(v, n)).collect::<Option<Vec<_>>>()?,
        faces: (1..=v.count("face")).map(|n| face(v, n)).collect::<Option<Vec<_>>>()?,
        limits: limits(v),
        study: Study { seed: whole(v, "study.seed"), samples: whole(v, "study.samples") },
        accepted: (1..=v.count(ACCEPT)).map(|n| acceptance(v, n)).collect::<Option<Vec<_>>>()?,
    })
}

/// A whole number, which the reader keeps within 0 to 2^53 - 1.
#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "whole, from 0 to below 2^53")]
fn whole(values: &Values, path: &str) -> Option<u64> {
    m(values, path).map(|measure| measure.si() as u64)
}

fn m(values: &Values, path: &str) -> Option<Measure> {
    values.measures.get(path).copied()
}

fn word(values: &Values, path: &str) -> Option<String> {
    values.words.get(path).cloned()
}

fn subject(v: &Values) -> Option<Subject> {
    let kind = match v.words.get("subject.kind")?.as_str() {
        "person" => SubjectKind::Person,
        "load" => SubjectKind::Load,
        _ => return None,
    };
    Some(Subject {
        kind,
        mass: m(v, "subject.mass")?,
        attachment_above_feet: m(v, "subject.attachment_above_feet"),
        underside_below_attachment: m(v, "subject.underside_below_attachment"),
        stretch_allowance: m(v, "subject.stretch_allowance"),
        half_width: m(v, "subject.half_width"),
        body_factor: m(v, "subject.body_factor"),
    })
}

fn place(v: &Values) -> Option<Place> {
    let edge = |v| {
        Some(Edge {
            offset: m(v, "place.edge.offset")?,
            elevation: m(v, "place.edge.elevation")?,
            strength_factor: m(v, "place.edge.strength_factor"),
        })
    };
    Some(Place {
        standing: m(v, "place.standing"),
        anchor: m(v, "place.anchor"),
        anchor_offset: m(v, "place.anchor_offset"),
        edge: if v.has("place.edge") { Some(edge(v)?) } else { None },
    })
}

fn line(v: &Values) -> Option<Line> {
    let kind = match v.words.get("line.kind")?.as_str() {
        "lanyard" => LineKind::Lanyard,
        "rope" => LineKind::Rope,
        "webbing" => LineKind::Webbing,
        "cable" => LineKind::Cable,
        "retractable" => LineKind::Retractable,
        "vertical" => LineKind::Vertical,
        _ => return None,
    };
    let damping = match (m(v, "line.damping"), m(v, "line.damping_ratio")) {
        (Some(damping), _) => DampingLaw::Damping(damping),
        (None, Some(ratio)) => DampingLaw::Ratio(ratio),
        (None, None) => DampingLaw::None,
    };
    Some(Line {
        kind,
        length: m(v, "line.length"),
        stretch: stretch(v)?,
        damping,
        series_stiffness: m(v, "line.series_stiffness"),
        strength: m(v, "line.strength"),
        mass_per_length: m(v, "line.mass_per_length"),
        lock_travel: m(v, "line.lock_travel"),
        grab_slide: m(v, "line.grab_slide"),
        slack: m(v, "line.slack"),
    })
}

fn stretch(v: &Values) -> Option<StretchLaw> {
    if let Some(stiffness) = m(v, "line.stiffness") {
        return Some(StretchLaw::Stiffness(stiffness));
    }
    if let Some(modulus) = m(v, "line.modulus") {
        return Some(StretchLaw::Modulus(modulus));
    }
    if let Some(curve) = v.tables.get("line.curve") {
        return Some(StretchLaw::Curve(curve.clone()));
    }
    if v.has("line.rated_impact") {
        return Some(StretchLaw::RatedImpact {
            force: m(v, "line.rated_impact.force")?,
            mass: m(v, "line.rated_impact.mass")?,
            fall_factor: m(v, "line.rated_impact.fall_factor")?,
        });
    }
    Some(StretchLaw::StaticElongation {
        percent: m(v, "line.static_elongation.percent")?,
        from: m(v, "line.static_elongation.from")?,
        to: m(v, "line.static_elongation.to")?,
    })
}

fn absorber(v: &Values) -> Option<Absorber> {
    let deploy_force = m(v, "absorber.deploy_force");
    let force_table = v.tables.get("absorber.force_table").cloned();
    if deploy_force.is_none() && force_table.is_none() {
        return None;
    }
    Some(Absorber {
        deploy_force,
        force_table,
        onset_force: m(v, "absorber.onset_force"),
        stroke: m(v, "absorber.stroke"),
        wet_cold_factor: m(v, "absorber.wet_cold_factor"),
        rated_mass: m(v, "absorber.rated_mass"),
        rated_free_fall: m(v, "absorber.rated_free_fall"),
        packed_length: m(v, "absorber.packed_length"),
    })
}

fn compliance(v: &Values, section: &str) -> Option<Compliance> {
    let stiffness = m(v, &format!("{section}.stiffness"))?;
    Some(Compliance { stiffness, damping: m(v, &format!("{section}.damping")) })
}

fn anchor(v: &Values) -> Option<Anchor> {
    let kind = match v.words.get("anchor.kind").map_or("fixed", String::as_str) {
        "sprung" => AnchorKind::Sprung(compliance(v, "anchor")?),
        "span" => AnchorKind::Span(span(v)?),
        _ => AnchorKind::Fixed,
    };
    Some(Anchor { kind, capacity: m(v, "anchor.capacity") })
}

fn span(v: &Values) -> Option<Span> {
    let key = |name: &str| m(v, &format!("anchor.span.{name}"));
    let absorber =
        || Some(SpanAbsorber { deploy_force: key("absorber.deploy_force")?, stroke: key("absorber.stroke")? });
    let tension = match (key("pretension"), key("sag")) {
        (Some(pretension), None) => SpanTension::Pretension(pretension),
        (None, Some(sag)) => SpanTension::Sag(sag),
        _ => return None,
    };
    Some(Span {
        length: key("length")?,
        at: key("at"),
        tension,
        modulus: key("modulus")?,
        support_stiffness: key("support_stiffness"),
        absorber: if v.has("anchor.span.absorber") { Some(absorber()?) } else { None },
        workers: key("workers"),
        spans: key("spans"),
        level_difference: key("level_difference"),
        strength: key("strength"),
    })
}

fn face(v: &Values, n: usize) -> Option<Face> {
    let key = |name: &str| format!("face.{n}.{name}");
    Some(Face {
        name: word(v, &key("name"))?,
        offset: m(v, &key("offset"))?,
        bottom: m(v, &key("bottom"))?,
        top: m(v, &key("top"))?,
    })
}

fn obstacle(v: &Values, n: usize) -> Option<Obstacle> {
    let key = |name: &str| format!("obstacle.{n}.{name}");
    Some(Obstacle {
        name: word(v, &key("name"))?,
        top: m(v, &key("top"))?,
        extent: m(v, &key("from")).zip(m(v, &key("to"))),
        reserve: m(v, &key("reserve")),
    })
}

fn acceptance(v: &Values, n: usize) -> Option<Acceptance> {
    let key = |name: &str| word(v, &format!("{ACCEPT}.{n}.{name}"));
    Some(Acceptance { doubt: key("doubt")?, at: key("at"), why: key("why")? })
}

fn limits(v: &Values) -> Limits {
    let own = LIMIT_KEYS
        .iter()
        .filter_map(|(key, _, _)| {
            let path = format!("limits.{key}");
            let value = m(v, &path)?;
            Some(OwnLimit { key: (*key).to_owned(), value, why: v.whys.get(&path).cloned() })
        })
        .collect();
    Limits { basis: word(v, "limits.basis"), own }
}
