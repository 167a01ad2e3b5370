//! What a reviewer should look at though the file can be read.
use super::line::{DampingLaw, StretchLaw};
use super::model::{Obstacle, Scenario, SubjectKind};
use super::{Faults, doubt_rigging, doubt_size};
use crate::quantity::format_measure;

/// Heaviest person with tools that is not a doubt, kg: above every published rating of a personal absorber.
const HEAVY_PERSON_KG: f64 = 200.0;
/// Lightest person that is not a doubt, kg: below it absorbers may hardly deploy.
const LIGHT_PERSON_KG: f64 = 40.0;
/// Highest attachment above the soles that is not a doubt, m: a dorsal D-ring of a tall person is near 1.6 m.
const HIGH_ATTACHMENT_M: f64 = 2.0;
/// Least elongation of a line between two loads that is not a doubt: a wire rope stretches more.
const LEAST_ELONGATION: f64 = 0.001;
/// Gravity on the ground differs from the standard by less than this, m/s2.
const GRAVITY_SPREAD_M_PER_S2: f64 = 0.05;
/// Standard gravity, m/s2, by definition (3rd CGPM, 1901).
const STANDARD_GRAVITY_M_PER_S2: f64 = 9.806_65;

/// One doubt before it has its place.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Doubt {
    /// Id of its rule, see [`super::DOUBT_RULES`].
    pub id: &'static str,
    /// Path of the input or section it is about.
    pub path: String,
    /// What is doubtful here: lower case, no full stop, values in back-quotes.
    pub message: String,
    /// What stands at the marker.
    pub expected: &'static str,
    /// What to do next.
    pub hint: &'static str,
}

/// Doubts about a file's own statements that the file does not accept, sorted by place; the numbers of a run are not
/// judged here.
#[must_use]
pub fn doubts(file: &str, text: &str, scenario: &Scenario) -> Faults {
    super::review(file, text, scenario, None).open()
}

/// Every doubt about a file's own statements, accepted or not.
pub(super) fn raised(scenario: &Scenario) -> Vec<Doubt> {
    let mut found = Vec::new();
    found.extend(mass(scenario));
    found.extend(body(scenario));
    found.extend(gravity(scenario));
    found.extend(damping(scenario));
    found.extend(fall(scenario));
    found.extend(absorber(scenario));
    found.extend(line_strength(scenario));
    found.extend(doubt_rigging::doubts(scenario));
    found.extend(harness(scenario));
    found.extend(datum(scenario));
    found.extend(obstacles(scenario));
    found.extend(limits(scenario));
    found.extend(doubt_size::doubts(scenario));
    found
}

pub(super) fn doubt(
    id: &'static str,
    path: &str,
    message: String,
    expected: &'static str,
    hint: &'static str,
) -> Doubt {
    Doubt { id, path: path.to_owned(), message, expected, hint }
}

fn mass(scenario: &Scenario) -> Option<Doubt> {
    if scenario.subject.kind != SubjectKind::Person {
        return None;
    }
    let mass = &scenario.subject.mass;
    let shown = format_measure(mass);
    if mass.band.high > HEAVY_PERSON_KG {
        let hint = "check the number and its unit; personal equipment is rated for less";
        return Some(doubt(
            "mass-above-usual",
            "subject.mass",
            format!("a person of `{shown}` is above 200 kg"),
            "very heavy",
            hint,
        ));
    }
    (mass.band.low < LIGHT_PERSON_KG).then(|| {
        let hint = "check the number and its unit; an absorber may hardly deploy for so light a person";
        doubt("mass-below-usual", "subject.mass", format!("a person of `{shown}` is below 40 kg"), "very light", hint)
    })
}

fn body(scenario: &Scenario) -> Vec<Doubt> {
    let subject = &scenario.subject;
    let mut found = Vec::new();
    if let Some(height) = subject.attachment_above_feet
        && height.band.high > HIGH_ATTACHMENT_M
    {
        let message = format!("the attachment is `{}` above the feet", format_measure(&height));
        let hint = "it is measured from the soles, standing, not from the datum";
        found.push(doubt("attachment-high", "subject.attachment_above_feet", message, "very high on the body", hint));
    }
    if let Some(factor) = subject.body_factor
        && factor.band.high > 1.0
    {
        let message = format!("a body factor of `{}` lowers the arrest force that is judged", format_measure(&factor));
        let hint = "leave it at 1 unless a test of this very equipment supports it";
        found.push(doubt("body-factor-above-one", "subject.body_factor", message, "above 1", hint));
    }
    if subject.kind == SubjectKind::Person
        && scenario.place.standing.is_some()
        && subject.attachment_above_feet.is_none()
    {
        let message = "the height of the attachment above the feet is not stated".to_owned();
        let hint = "add `attachment_above_feet`; without it the attachment has no elevation";
        found.push(doubt("attachment-height-missing", "subject", message, "no `attachment_above_feet`", hint));
    }
    found
}

fn gravity(scenario: &Scenario) -> Option<Doubt> {
    let off = (scenario.gravity.si() - STANDARD_GRAVITY_M_PER_S2).abs() > GRAVITY_SPREAD_M_PER_S2;
    off.then(|| {
        let message = format!("gravity is `{}`", format_measure(&scenario.gravity));
        doubt("gravity-unusual", "gravity", message, "not as on the ground", "take the key out to use 9.80665 m/s2")
    })
}

/// Damping above critical, about the subject's mass and the line's own stiffness.
fn damping(scenario: &Scenario) -> Option<Doubt> {
    let (path, ratio) = match (&scenario.line.damping, &scenario.line.stretch) {
        (DampingLaw::Ratio(ratio), _) => ("line.damping_ratio", ratio.band.high),
        (DampingLaw::Damping(damping), law) => {
            let critical = 2.0 * (scenario.subject.mass.si() * first_stiffness(law)?).sqrt();
            ("line.damping", damping.band.high / critical)
        }
        _ => return None,
    };
    (ratio > 1.0).then(|| {
        let message = format!("a damping ratio of `{ratio:.2}` is above critical");
        let hint =
            "textile and wire lines are far below 1; the force jump at taut grows with it, see `line.series_stiffness`";
        doubt("line-overdamped", path, message, "overdamped line", hint)
    })
}

/// Stiffness of a law that states it, N/m; of a table its first piece.
fn first_stiffness(law: &StretchLaw) -> Option<f64> {
    match law {
        StretchLaw::Stiffness(stiffness) => Some(stiffness.si()),
        StretchLaw::Curve(rows) => rows.get(1).map(|(elongation_m, force_n)| force_n / elongation_m),
        _ => None,
    }
}

fn fall(scenario: &Scenario) -> Vec<Doubt> {
    let mut found = Vec::new();
    if let (Some(anchor), Some(standing)) = (scenario.place.anchor, scenario.place.standing)
        && anchor.si() < standing.si()
    {
        let message = "the anchor lies below the standing surface".to_owned();
        let hint = "check both elevations and the datum; from there the fall is nearly twice the line's length";
        found.push(doubt("anchor-below-feet", "place.anchor", message, "below the feet", hint));
    }
    if let (Some(free_fall), Some(length)) = (scenario.fall.free_fall, scenario.line.length)
        && free_fall.si() > 2.0 * length.si()
    {
        let message = format!("the free fall is more than twice the line's length of `{}`", format_measure(&length));
        let hint = "a line on a fixed point allows at most twice its length; check both numbers";
        found.push(doubt("fall-above-twice-length", "fall.free_fall", message, "fall factor above 2", hint));
    }
    if let StretchLaw::StaticElongation { percent, .. } = &scenario.line.stretch
        && percent.band.low < LEAST_ELONGATION
    {
        let message = format!("a static elongation of `{}` is that of a steel bar", format_measure(percent));
        let hint = "the number is in percent: write `3.4`, not `0.034`, for 3.4 %";
        found.push(doubt("elongation-tiny", "line.static_elongation.percent", message, "very small", hint));
    }
    if let StretchLaw::RatedImpact { fall_factor, .. } = &scenario.line.stretch
        && fall_factor.band.high > 2.0
    {
        let message = format!("the rated drop has a fall factor of `{}`", format_measure(fall_factor));
        let hint = "a line on a fixed point allows at most 2; check the data sheet";
        found.push(doubt(
            "rated-drop-above-two",
            "line.rated_impact.fall_factor",
            message,
            "fall factor above 2",
            hint,
        ));
    }
    found
}

fn absorber(scenario: &Scenario) -> Vec<Doubt> {
    let Some(absorber) = &scenario.absorber else { return Vec::new() };
    let mut found = Vec::new();
    let weight_n = scenario.subject.mass.band.high * scenario.gravity.si();
    if let Some(force) = absorber.deploy_force
        && force.band.low <= weight_n
    {
        let message = format!("a deployment force of `{}` does not exceed the weight", format_measure(&force));
        let hint = "such an absorber cannot stop the fall before its stroke is used up; check force, mass and units";
        found.push(doubt("absorber-below-weight", "absorber.deploy_force", message, "not above the weight", hint));
    }
    for (absent, id, key) in [
        (absorber.rated_mass.is_none(), "rated-mass-missing", "rated_mass"),
        (absorber.rated_free_fall.is_none(), "rated-free-fall-missing", "rated_free_fall"),
    ] {
        if absent {
            let message = format!("the absorber has no `{key}`");
            let hint = "copy the rating from its label; without it the check cannot be made";
            found.push(doubt(id, "absorber", message, "no rating", hint));
        }
    }
    found
}

fn line_strength(scenario: &Scenario) -> Option<Doubt> {
    let (strength, absorber) = scenario.line.strength.zip(scenario.absorber.as_ref())?;
    let onset_n = absorber.onset_force.map_or(absorber.first_force_n()[2], |onset| onset.band.high);
    (strength.band.low < onset_n).then(|| {
        let message = format!("the line breaks at `{}`, before the absorber starts", format_measure(&strength));
        doubt(
            "strength-below-onset",
            "line.strength",
            message,
            "below the onset force",
            "check both numbers and their units",
        )
    })
}

fn harness(scenario: &Scenario) -> Option<Doubt> {
    scenario.harness.as_ref()?;
    if scenario.subject.kind == SubjectKind::Load {
        let hint = "a harness belongs to a person; use a sprung anchor or the line's own stiffness for a load";
        return Some(doubt("harness-on-load", "harness", "a load has a harness".to_owned(), "for persons", hint));
    }
    scenario.subject.stretch_allowance.filter(|allowance| allowance.band.high > 0.0).map(|allowance| {
        let message =
            format!("a stretch allowance of `{}` and a [harness] both count its stretch", format_measure(&allowance));
        let hint = "reduce the allowance to the shift of the attachment alone, or take [harness] out";
        doubt("harness-counted-twice", "subject.stretch_allowance", message, "counted twice", hint)
    })
}

fn datum(scenario: &Scenario) -> Option<Doubt> {
    let elevations = scenario.place.standing.is_some() || !scenario.obstacles.is_empty();
    (elevations && scenario.datum.as_deref().is_none_or(|datum| datum.trim().is_empty())).then(|| {
        let hint = "add `datum = \"finished floor of level 0\"` at the top";
        doubt("datum-missing", "place.standing", "nothing says what elevation 0 is".to_owned(), "no datum", hint)
    })
}

fn obstacles(scenario: &Scenario) -> Vec<Doubt> {
    if scenario.obstacles.is_empty() {
        let hint = "add an `[[obstacle]]` for every level, ledge and machine that the fall could reach";
        return vec![doubt(
            "obstacle-missing",
            "obstacle",
            "no obstacle is stated, no clearance is judged".to_owned(),
            "no [[obstacle]]",
            hint,
        )];
    }
    let mut found = Vec::new();
    if scenario.place.standing.is_none() {
        let hint = "add `place.standing` for the elevations";
        let message = "obstacles have elevations, the subject has none".to_owned();
        found.push(doubt("obstacle-without-standing", "obstacle.1", message, "cannot be judged", hint));
    }
    for (index, obstacle) in scenario.obstacles.iter().enumerate() {
        found.extend(obstacle_doubts(scenario, index + 1, obstacle));
    }
    found
}

fn obstacle_doubts(scenario: &Scenario, number: usize, obstacle: &Obstacle) -> Vec<Doubt> {
    let mut found = Vec::new();
    if obstacle.reserve.is_some_and(|reserve| reserve.band.low == 0.0) {
        let message = format!("the reserve of obstacle {number} is 0 m, touching it just so would hold");
        let hint = "state the clear space wanted above it";
        found.push(doubt("reserve-none", &format!("obstacle.{number}.reserve"), message, "no reserve", hint));
    }
    if obstacle.reserve.is_none() {
        let message = format!("obstacle {number} has no reserve, touching it just so would hold");
        let hint = "add `reserve`, the clear space wanted above it";
        found.push(doubt("reserve-missing", &format!("obstacle.{number}"), message, "no reserve", hint));
    }
    if let Some(standing) = scenario.place.standing
        && obstacle.top.si() > standing.si()
    {
        let message = format!("the top of obstacle {number} lies above the start of the fall");
        let hint = "check both elevations and the datum";
        found.push(doubt("obstacle-above-start", &format!("obstacle.{number}.top"), message, "above the start", hint));
    }
    found
}

fn limits(scenario: &Scenario) -> Option<Doubt> {
    let limits = &scenario.limits;
    match limits.basis.as_deref() {
        None if limits.own.is_empty() => {
            let hint = "add `[limits]` with `basis = \"eu-363\"` or another set";
            Some(doubt(
                "limits-missing",
                "limits",
                "no limits are stated, no force is judged".to_owned(),
                "no [limits]",
                hint,
            ))
        }
        None => {
            let hint = "add `basis = \"own\"`, or the published set that they belong to";
            Some(doubt("basis-missing", "limits", "single limits stand without a basis".to_owned(), "no basis", hint))
        }
        Some("own") if limits.own.is_empty() => {
            let hint = "state the limits, or name a published set";
            Some(doubt(
                "own-limits-missing",
                "limits.basis",
                "basis `own` states no limit".to_owned(),
                "no limits",
                hint,
            ))
        }
        Some(_) => None,
    }
}
