//! Sentences beside the numbers: what is taken for granted, and what the reader must know.
use super::Validity;
use super::setup::Setup;
use crate::arrest::{Ended, Outcome};
use crate::physics::Group;
use crate::quantity::{Dimension, UnitSystem, format_si};
use crate::scenario::{Scenario, SubjectKind};

/// What the model takes for granted in this run.
pub fn assumptions(scenario: &Scenario, setup: &Setup) -> Vec<String> {
    let path = &setup.fall.path;
    let falls = if setup.is_planar() {
        "The subject is a rigid mass without width that falls straight down until taut and then swings in one plane about \
         the pivot, up to its first turn; the line has no mass and nothing drags in the air."
    } else {
        "The subject is a rigid mass that falls straight down; the line has no mass and nothing drags in the air."
    };
    let mut list = vec![falls.to_owned(), path_sentence(&path.line, &path.other).to_owned()];
    if !path.is_linear() {
        list.push(
            "A force-elongation table is straight between its rows; beyond the last it goes on straight, and what \
             depends on that is open."
                .to_owned(),
        );
    }
    list.extend(setup.span.iter().flat_map(super::rigging::Rigging::assumptions));
    list.extend(setup.geometry.notes.iter().map(|&note| note.to_owned()));
    if path.absorber.is_some() {
        list.push(
            "The absorber slides at its deployment force, never takes anything back, and is rigid at its stroke."
                .to_owned(),
        );
    }
    list.extend(setup.joined.map(str::to_owned));
    if scenario.fall.free_fall.is_none() {
        list.push("The free fall is worked out from the elevations and the length of the line.".to_owned());
    }
    list.push(format!("Gravity is {} m/s2; elevations are above the file's datum.", setup.fall.gravity_m_per_s2));
    list
}

fn path_sentence(line: &Group, other: &Group) -> &'static str {
    match (line.is_damped() || other.is_damped(), other.is_rigid()) {
        (false, true) => "The line is a linear spring without damping.",
        (true, true) => "The line is a linear spring with a viscous damper beside it (Kelvin-Voigt).",
        (false, false) => "The line and the other parts of the path are linear springs without damping.",
        (true, false) => "The line and the other parts of the path are linear springs with viscous dampers, in series.",
    }
}

/// What the reader must know about these numbers.
///
/// `vertical` is the outcome of the vertical core; a planar run has none.
pub fn warnings(scenario: &Scenario, setup: &Setup, vertical: Option<&Outcome>, stroke_used_up: bool) -> Vec<String> {
    let mut list = Vec::new();
    if vertical.is_some_and(|outcome| contact_jump(setup, outcome)) {
        list.push(
            "The largest force is the jump of the damper at the moment of taut (c v0): an artefact of the two-parameter \
             line. Give `line.series_stiffness` for a three-parameter line without that jump."
                .to_owned(),
        );
    }
    list.extend(setup.span.iter().flat_map(super::rigging::Rigging::warnings));
    if vertical.is_some_and(|outcome| outcome.ended == Ended::TimeLimit) {
        list.push(
            "The motion is not settled at the time limit: settle time and slack episodes are left out. Little or no \
             damping does that."
                .to_owned(),
        );
    }
    if stroke_used_up {
        list.push("The absorber's stroke is used up: from there on only stretch limits the force.".to_owned());
    }
    if vertical.and_then(|outcome| outcome.span).is_some_and(|given| given.used_up) {
        list.push(
            "The stroke of the absorber in line with the lifeline is used up: from there on the tension of the cable has \
             no bound but its stretch."
                .to_owned(),
        );
    }
    if scenario.harness.is_some() && scenario.subject.stretch_allowance.is_some_and(|a| a.si() > 0.0) {
        list.push(
            "Both [harness] and `subject.stretch_allowance` are given: the stretch of the harness is counted twice."
                .to_owned(),
        );
    }
    list.extend(heavy(scenario));
    if !setup.is_planar() {
        list.extend(beside(scenario));
        list.extend(faces(scenario));
    }
    list
}

/// The warnings with a sentence for each reason why numbers are open, which comes first.
pub fn with_open(warnings: Vec<String>, validity: &[Validity]) -> Vec<String> {
    let open = |reason: &Validity| {
        let words = reason.told(|m| both(m, Dimension::Length));
        format!("The model is not valid for this run: {words}. What depends on the motion is open, not judged.")
    };
    validity.iter().map(open).chain(warnings).collect()
}

/// A value in metric and in US units: sentences of an estimate do not know the reader's.
pub fn both(si: f64, dimension: Dimension) -> String {
    let text = |system| format_si(si, dimension, system);
    format!("{} ({})", text(UnitSystem::Metric), text(UnitSystem::Us))
}

fn contact_jump(setup: &Setup, outcome: &Outcome) -> bool {
    let path = &setup.fall.path;
    let one_damped = path.line.is_damped() && path.other.is_rigid();
    one_damped && outcome.peak_force_n > 0.0 && outcome.time_peak_force_s == outcome.time_taut_s
}

/// # Reference
/// Goh and Love, Safety Science 48 (2010), 747-754.
fn heavy(scenario: &Scenario) -> Option<String> {
    let mass = scenario.subject.mass.si();
    let heavy = scenario.subject.kind == SubjectKind::Person && scenario.absorber.is_some() && mass > 100.0;
    heavy.then(|| {
        format!(
            "The person's mass of {} is above {}: most absorbers tested were not adequate for heavy workers (Goh and \
             Love 2010).",
            both(mass, Dimension::Mass),
            both(100.0, Dimension::Mass)
        )
    })
}

fn beside(scenario: &Scenario) -> Option<String> {
    let names: Vec<_> =
        scenario.obstacles.iter().filter(|o| !o.is_below(&scenario.subject)).map(|o| format!("`{}`", o.name)).collect();
    (!names.is_empty()).then(|| format!("Beside the fall line, so not met by a straight fall: {}.", names.join(", ")))
}

fn faces(scenario: &Scenario) -> Option<String> {
    let names: Vec<_> = scenario.faces.iter().map(|f| format!("`{}`", f.name)).collect();
    (!names.is_empty())
        .then(|| format!("A straight fall does not swing, so faces are not judged: {}.", names.join(", ")))
}
