//! From checked values to the scenario.
use super::model::{
    Absorber, Anchor, AnchorKind, Compliance, DampingLaw, Fall, LIMIT_KEYS, Limits, Line, LineKind, Obstacle, OwnLimit,
    Place, Scenario, StretchLaw, Subject, SubjectKind,
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
        place: Place { standing: m(v, "place.standing"), anchor: m(v, "place.anchor") },
        fall: Fall { free_fall: m(v, "fall.free_fall") },
        line: line(v)?,
        absorber: if v.has("absorber") { Some(absorber(v)?) } else { None },
        harness: if v.has("harness") { Some(compliance(v, "harness")?) } else { None },
        anchor: anchor(v)?,
        obstacles: (1..=v.obstacles).map(|n| obstacle(v, n)).collect::<Option<Vec<_>>>()?,
        limits: limits(v),
    })
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

fn line(v: &Values) -> Option<Line> {
    let kind = match v.words.get("line.kind")?.as_str() {
        "lanyard" => LineKind::Lanyard,
        "rope" => LineKind::Rope,
        "webbing" => LineKind::Webbing,
        "cable" => LineKind::Cable,
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
    })
}

fn stretch(v: &Values) -> Option<StretchLaw> {
    if let Some(stiffness) = m(v, "line.stiffness") {
        return Some(StretchLaw::Stiffness(stiffness));
    }
    if let Some(modulus) = m(v, "line.modulus") {
        return Some(StretchLaw::Modulus(modulus));
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
    Some(Absorber {
        deploy_force: m(v, "absorber.deploy_force")?,
        onset_force: m(v, "absorber.onset_force"),
        stroke: m(v, "absorber.stroke")?,
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
        _ => AnchorKind::Fixed,
    };
    Some(Anchor { kind, capacity: m(v, "anchor.capacity") })
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
