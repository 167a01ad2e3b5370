//! Values that are possible alone and impossible together.
use super::anchor::AnchorKind;
use super::line::StretchLaw;
use super::model::{Face, Obstacle, Scenario};
use super::values::quoted;
use super::{Fault, Places, Severity, span_clash};
use crate::quantity::{Dimension, Measure, format_measure, format_unit};

/// Two values that cannot both be.
pub(super) struct Clash {
    path: String,
    message: String,
    expected: String,
    hint: String,
}

impl Clash {
    pub(super) fn new(path: &str, message: String, expected: String, hint: &str) -> Self {
        Self { path: path.to_owned(), message, expected, hint: hint.to_owned() }
    }

    /// The fault at the place of the value.
    pub fn at(self, places: &Places) -> Fault {
        let Self { path, message, expected, hint } = self;
        Fault { severity: Severity::Error, span: places.of(&path), message, expected, hint: Some(hint) }
    }
}

/// Every clash of a scenario's typical values.
pub(super) fn clashes(scenario: &Scenario) -> Vec<Clash> {
    let mut found = Vec::new();
    found.extend(absorber(scenario));
    found.extend(stroke(scenario));
    found.extend(packed(scenario));
    found.extend(rated_impact(scenario));
    found.extend(static_elongation(scenario));
    found.extend(scenario.obstacles.iter().enumerate().filter_map(|(index, obstacle)| extent(index + 1, obstacle)));
    found.extend(scenario.obstacles.iter().enumerate().filter_map(|(index, level)| above(scenario, index + 1, level)));
    found.extend(scenario.faces.iter().enumerate().filter_map(|(index, face)| upright(index + 1, face)));
    if let AnchorKind::Span(span) = &scenario.anchor.kind {
        found.extend(span_clash::clashes(span));
    }
    found
}

fn absorber(scenario: &Scenario) -> Option<Clash> {
    let absorber = scenario.absorber.as_ref()?;
    let onset = absorber.onset_force?;
    let [_, first_n, _] = absorber.first_force_n();
    (onset.si() < first_n).then(|| {
        let shown = absorber.deploy_force.map_or_else(|| format_unit(first_n, onset.unit), |f| format_measure(&f));
        Clash::new(
            "absorber.onset_force",
            format!("the onset force is below the deployment force `{shown}`"),
            format!("expected at least {shown}"),
            "deployment starts at the onset force and goes on at the deployment force, which is not larger",
        )
    })
}

fn stroke(scenario: &Scenario) -> Option<Clash> {
    let absorber = scenario.absorber.as_ref()?;
    let stroke = absorber.stroke?;
    let last_m = absorber.force_table.as_ref()?.last()?.0;
    (stroke.si() > last_m).then(|| {
        let last = format_unit(last_m, stroke.unit);
        Clash::new(
            "absorber.stroke",
            format!(
                "a stroke of `{}` goes beyond the last row of the force table at `{last}`",
                format_measure(&stroke)
            ),
            format!("expected at most {last}"),
            "add rows up to the stroke, or leave `stroke` out to use the last row",
        )
    })
}

/// An anchor below a level that the subject hangs over cannot keep it clear.
fn above(scenario: &Scenario, number: usize, obstacle: &Obstacle) -> Option<Clash> {
    let anchor = scenario.place.anchor?;
    (anchor.si() < obstacle.top.si() && obstacle.is_below(&scenario.subject)).then(|| {
        Clash::new(
            &format!("obstacle.{number}.top"),
            format!(
                "the anchor at `{}` lies below the top of {} at `{}`",
                format_measure(&anchor),
                quoted(&obstacle.name),
                format_measure(&obstacle.top)
            ),
            format!("expected at most {}", format_measure(&anchor)),
            "what hangs below the anchor is below that level too; check both elevations, the datum and the extent",
        )
    })
}

fn upright(number: usize, face: &Face) -> Option<Clash> {
    (face.bottom.si() >= face.top.si()).then(|| {
        Clash::new(
            &format!("face.{number}.top"),
            format!(
                "the face ends at `{}`, where it starts at `{}`",
                format_measure(&face.top),
                format_measure(&face.bottom)
            ),
            format!("expected more than {}", format_measure(&face.bottom)),
            "`bottom` and `top` are elevations above the datum",
        )
    })
}

fn packed(scenario: &Scenario) -> Option<Clash> {
    let packed = scenario.absorber.as_ref()?.packed_length?;
    let length = scenario.line.length?;
    (packed.si() > length.si()).then(|| {
        Clash::new(
            "absorber.packed_length",
            format!("the packed absorber is longer than the whole line of `{}`", format_measure(&length)),
            format!("expected at most {}", format_measure(&length)),
            "`line.length` includes the packed absorber",
        )
    })
}

fn rated_impact(scenario: &Scenario) -> Option<Clash> {
    let StretchLaw::RatedImpact { force, mass, .. } = &scenario.line.stretch else { return None };
    let least_n = 2.0 * mass.si() * scenario.gravity.si();
    (force.si() <= least_n).then(|| {
        Clash::new(
            "line.rated_impact.force",
            format!("a rated force of `{}` gives no stiffness for a mass of `{}`", format_measure(force), format_measure(mass)),
            format!("expected more than twice the weight, {:.3} kN", least_n / 1000.0),
            "an elastic line that stops a fall feels more than twice the weight; check the force and the mass of the rating",
        )
    })
}

fn static_elongation(scenario: &Scenario) -> Option<Clash> {
    let StretchLaw::StaticElongation { from, to, .. } = &scenario.line.stretch else { return None };
    let load_n = |load: &Measure| {
        if load.dimension() == Dimension::Mass { load.si() * scenario.gravity.si() } else { load.si() }
    };
    (load_n(from) >= load_n(to)).then(|| {
        Clash::new(
            "line.static_elongation.to",
            format!("the larger load `{}` is not above the smaller one `{}`", format_measure(to), format_measure(from)),
            format!("expected more than {}", format_measure(from)),
            "`from` is the smaller load, `to` the larger one",
        )
    })
}

fn extent(number: usize, obstacle: &Obstacle) -> Option<Clash> {
    let (from, to) = obstacle.extent.as_ref()?;
    (from.si() >= to.si()).then(|| {
        Clash::new(
            &format!("obstacle.{number}.to"),
            format!("the extent ends at `{}`, where it starts at `{}`", format_measure(to), format_measure(from)),
            format!("expected more than {}", format_measure(from)),
            "`from` is left of `to`; both count from the fall line, right positive",
        )
    })
}
