//! Addressing an input by its path.
use super::anchor::{AnchorKind, Compliance, Span, SpanTension};
use super::clash;
use super::field::{Field, LISTS, field_for, list_of};
use super::keys::FIELDS;
use super::line::{DampingLaw, StretchLaw};
use super::model::{Face, Obstacle, Place, Scenario};
use crate::quantity::{Band, Measure};

/// One numeric input of a scenario, present in it.
#[derive(Clone, Debug, PartialEq)]
pub struct Input {
    /// Concrete path: `line.stiffness`, `obstacle.2.top` (numbers from 1).
    pub path: String,
    /// Its key's entry in the table.
    pub field: &'static Field,
    /// Its value.
    pub measure: Measure,
}

/// Every numeric input that the scenario holds, in file order.
///
/// Gravity counts; the limits of `[limits]` do not: they are what the fall is judged by, not what it is.
#[must_use]
pub fn inputs(scenario: &Scenario) -> Vec<Input> {
    let mut scenario = scenario.clone();
    let counts = [scenario.obstacles.len(), scenario.faces.len()];
    let mut found = Vec::new();
    let numeric = |field: &&Field| field.dimension.is_some() && list_of(field.path).is_none();
    for field in FIELDS.iter().filter(numeric) {
        found.extend(input(&mut scenario, field.path.to_owned(), field));
    }
    for (list, count) in LISTS.into_iter().zip(counts) {
        for n in 1..=count {
            for field in FIELDS.iter().filter(|field| list_of(field.path) == Some(list)) {
                found.extend(input(&mut scenario, field.path.replace('*', &n.to_string()), field));
            }
        }
    }
    found
}

fn input(scenario: &mut Scenario, path: String, field: &'static Field) -> Option<Input> {
    let measure = *measure_mut(scenario, &path)?;
    Some(Input { path, field, measure })
}

/// The scenario with the typical value of one input replaced (the band's ends kept where they still enclose it,
/// moved to it where not).
///
/// `None` when the scenario has no such input, the value is outside the field's range, or it cannot be together
/// with the other values (an onset force below the deployment force).
#[must_use]
pub fn with_value(scenario: &Scenario, path: &str, value_si: f64) -> Option<Scenario> {
    with_values(scenario, &[(path, value_si)])
}

/// The scenario with the typical values of several inputs replaced at once, each as in [`with_value`].
///
/// `None` when the scenario lacks one of the inputs, a value is outside its field's range, or the values cannot be
/// together; only all of them together are judged, whatever their order.
#[must_use]
pub fn with_values(scenario: &Scenario, values: &[(&str, f64)]) -> Option<Scenario> {
    replaced(scenario, values, moved)
}

/// As [`with_values`], with the values exact: the bands of these inputs are left out.
#[must_use]
pub fn with_exact_values(scenario: &Scenario, values: &[(&str, f64)]) -> Option<Scenario> {
    replaced(scenario, values, |measure, value_si| Measure { band: Band::point(value_si), ..*measure })
}

fn replaced(
    scenario: &Scenario,
    values: &[(&str, f64)],
    replace: impl Fn(&Measure, f64) -> Measure,
) -> Option<Scenario> {
    let mut changed = scenario.clone();
    for &(path, value_si) in values {
        let field = field_for(path)?;
        if !(value_si >= field.least && value_si <= field.most) {
            return None;
        }
        let measure = measure_mut(&mut changed, path)?;
        *measure = replace(measure, value_si);
    }
    clash::clashes(&changed).is_empty().then_some(changed)
}

/// A measure with another typical value, its band stretched to enclose it.
pub(super) fn moved(measure: &Measure, value_si: f64) -> Measure {
    let mut moved = *measure;
    if measure.band.is_wide() {
        moved.band.low = measure.band.low.min(value_si);
        moved.band.high = measure.band.high.max(value_si);
    } else {
        moved.band.low = value_si;
        moved.band.high = value_si;
    }
    moved.band.typical = value_si;
    moved
}

/// The measure at a path, if the scenario holds it.
fn measure_mut<'s>(scenario: &'s mut Scenario, path: &str) -> Option<&'s mut Measure> {
    let (section, key) = path.split_once('.').unwrap_or(("", path));
    match section {
        "" => (key == "gravity").then_some(&mut scenario.gravity),
        "subject" => subject(scenario, key),
        "place" => place(&mut scenario.place, key),
        "fall" => scenario.fall.free_fall.as_mut().filter(|_| key == "free_fall"),
        "line" => line(scenario, key),
        "absorber" => absorber(scenario, key),
        "harness" => spring(scenario.harness.as_mut()?, key),
        "anchor" => anchor(scenario, key),
        "obstacle" => {
            let (index, key) = entry(key)?;
            obstacle(scenario.obstacles.get_mut(index)?, key)
        }
        "face" => {
            let (index, key) = entry(key)?;
            face(scenario.faces.get_mut(index)?, key)
        }
        _ => None,
    }
}

/// `2.top` as place in a list from 0, and key.
fn entry(key: &str) -> Option<(usize, &str)> {
    let (number, key) = key.split_once('.')?;
    Some((number.parse::<usize>().ok()?.checked_sub(1)?, key))
}

fn place<'s>(place: &'s mut Place, key: &str) -> Option<&'s mut Measure> {
    match (key, place.edge.as_mut()) {
        ("standing", _) => place.standing.as_mut(),
        ("anchor", _) => place.anchor.as_mut(),
        ("anchor_offset", _) => place.anchor_offset.as_mut(),
        ("edge.offset", Some(edge)) => Some(&mut edge.offset),
        ("edge.elevation", Some(edge)) => Some(&mut edge.elevation),
        ("edge.strength_factor", Some(edge)) => edge.strength_factor.as_mut(),
        _ => None,
    }
}

fn subject<'s>(scenario: &'s mut Scenario, key: &str) -> Option<&'s mut Measure> {
    let subject = &mut scenario.subject;
    match key {
        "mass" => Some(&mut subject.mass),
        "attachment_above_feet" => subject.attachment_above_feet.as_mut(),
        "underside_below_attachment" => subject.underside_below_attachment.as_mut(),
        "stretch_allowance" => subject.stretch_allowance.as_mut(),
        "half_width" => subject.half_width.as_mut(),
        "body_factor" => subject.body_factor.as_mut(),
        _ => None,
    }
}

fn line<'s>(scenario: &'s mut Scenario, key: &str) -> Option<&'s mut Measure> {
    let line = &mut scenario.line;
    match key {
        "length" => line.length.as_mut(),
        "series_stiffness" => line.series_stiffness.as_mut(),
        "strength" => line.strength.as_mut(),
        "mass_per_length" => line.mass_per_length.as_mut(),
        "lock_travel" => line.lock_travel.as_mut(),
        "grab_slide" => line.grab_slide.as_mut(),
        "slack" => line.slack.as_mut(),
        "damping" | "damping_ratio" => match (&mut line.damping, key) {
            (DampingLaw::Damping(measure), "damping") | (DampingLaw::Ratio(measure), "damping_ratio") => Some(measure),
            _ => None,
        },
        _ => stretch(&mut line.stretch, key),
    }
}

fn stretch<'s>(law: &'s mut StretchLaw, key: &str) -> Option<&'s mut Measure> {
    match (law, key) {
        (StretchLaw::Stiffness(measure), "stiffness")
        | (StretchLaw::Modulus(measure), "modulus")
        | (StretchLaw::RatedImpact { force: measure, .. }, "rated_impact.force")
        | (StretchLaw::RatedImpact { mass: measure, .. }, "rated_impact.mass")
        | (StretchLaw::RatedImpact { fall_factor: measure, .. }, "rated_impact.fall_factor")
        | (StretchLaw::StaticElongation { percent: measure, .. }, "static_elongation.percent")
        | (StretchLaw::StaticElongation { from: measure, .. }, "static_elongation.from")
        | (StretchLaw::StaticElongation { to: measure, .. }, "static_elongation.to") => Some(measure),
        _ => None,
    }
}

fn absorber<'s>(scenario: &'s mut Scenario, key: &str) -> Option<&'s mut Measure> {
    let absorber = scenario.absorber.as_mut()?;
    match key {
        "deploy_force" => absorber.deploy_force.as_mut(),
        "onset_force" => absorber.onset_force.as_mut(),
        "stroke" => absorber.stroke.as_mut(),
        "wet_cold_factor" => absorber.wet_cold_factor.as_mut(),
        "rated_mass" => absorber.rated_mass.as_mut(),
        "rated_free_fall" => absorber.rated_free_fall.as_mut(),
        "packed_length" => absorber.packed_length.as_mut(),
        _ => None,
    }
}

fn spring<'s>(compliance: &'s mut Compliance, key: &str) -> Option<&'s mut Measure> {
    match key {
        "stiffness" => Some(&mut compliance.stiffness),
        "damping" => compliance.damping.as_mut(),
        _ => None,
    }
}

fn anchor<'s>(scenario: &'s mut Scenario, key: &str) -> Option<&'s mut Measure> {
    match (&mut scenario.anchor.kind, key) {
        (_, "capacity") => scenario.anchor.capacity.as_mut(),
        (AnchorKind::Sprung(compliance), key) => spring(compliance, key),
        (AnchorKind::Span(span), key) => self::span(span, key.strip_prefix("span.")?),
        (AnchorKind::Fixed, _) => None,
    }
}

fn span<'s>(span: &'s mut Span, key: &str) -> Option<&'s mut Measure> {
    match (key, &mut span.tension, &mut span.absorber) {
        ("length", ..) => Some(&mut span.length),
        ("at", ..) => span.at.as_mut(),
        ("pretension", SpanTension::Pretension(measure), _) | ("sag", SpanTension::Sag(measure), _) => Some(measure),
        ("modulus", ..) => Some(&mut span.modulus),
        ("support_stiffness", ..) => span.support_stiffness.as_mut(),
        ("level_difference", ..) => span.level_difference.as_mut(),
        ("workers", ..) => span.workers.as_mut(),
        ("spans", ..) => span.spans.as_mut(),
        ("strength", ..) => span.strength.as_mut(),
        ("absorber.deploy_force", _, Some(absorber)) => Some(&mut absorber.deploy_force),
        ("absorber.stroke", _, Some(absorber)) => Some(&mut absorber.stroke),
        _ => None,
    }
}

fn face<'s>(face: &'s mut Face, key: &str) -> Option<&'s mut Measure> {
    match key {
        "offset" => Some(&mut face.offset),
        "bottom" => Some(&mut face.bottom),
        "top" => Some(&mut face.top),
        _ => None,
    }
}

fn obstacle<'s>(obstacle: &'s mut Obstacle, key: &str) -> Option<&'s mut Measure> {
    match key {
        "top" => Some(&mut obstacle.top),
        "from" => obstacle.extent.as_mut().map(|extent| &mut extent.0),
        "to" => obstacle.extent.as_mut().map(|extent| &mut extent.1),
        "reserve" => obstacle.reserve.as_mut(),
        _ => None,
    }
}
