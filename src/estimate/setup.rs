//! From a scenario's typical values to the falling mass and its path.
use super::EstimateError;
use crate::arrest::Fall;
use crate::physics::{Absorber, Group, SeriesPath};
use crate::quantity::{Dimension, UnitSystem, format_si};
use crate::scenario::{AnchorKind, DampingLaw, LineKind, Scenario, StretchLaw, Subject, SubjectKind};

/// What is solved, and what of the geometry the results need.
pub struct Setup {
    /// The fall.
    pub fall: Fall,
    /// Elevation of the attachment at the start, m, where the file gives elevations.
    pub attachment_start_m: Option<f64>,
    /// Parts of the path that were joined to first order in their damping.
    pub joined: Option<&'static str>,
}

impl Setup {
    /// # Errors
    /// When the geometry contradicts itself or a law has no stiffness.
    pub fn of(scenario: &Scenario) -> Result<Self, EstimateError> {
        if let Some((what, path)) = unsolved(scenario) {
            return Err(not_solved(what, path));
        }
        let attachment_start_m = attachment_start(scenario);
        let (other, joined) = other(scenario);
        let path = SeriesPath { line: line(scenario)?, other, absorber: absorber(scenario) };
        let fall = Fall {
            mass_kg: scenario.subject.mass.si(),
            gravity_m_per_s2: scenario.gravity.si(),
            free_fall_m: free_fall(scenario, attachment_start_m)?,
            speed_at_taut_m_per_s: None,
            path,
        };
        Ok(Self { fall, attachment_start_m, joined })
    }
}

fn not_solved(what: &str, path: &'static str) -> EstimateError {
    EstimateError::Geometry {
        message: format!("{what} is not solved yet"),
        hint: "the file can be read and checked; its fall cannot be worked out by this version".to_owned(),
        path,
    }
}

/// What the file states and no solver here works out.
fn unsolved(scenario: &Scenario) -> Option<(&'static str, &'static str)> {
    let absorber = scenario.absorber.as_ref();
    let found = [
        (scenario.line.kind == LineKind::Retractable, "a retractable line", "line.kind"),
        (scenario.line.kind == LineKind::Vertical, "a vertical line with a grab", "line.kind"),
        (
            scenario.place.anchor_offset.is_some_and(|m| m.si() != 0.0),
            "an anchor beside the fall line",
            "place.anchor_offset",
        ),
        (scenario.place.edge.is_some(), "a line over an edge", "place.edge"),
        (matches!(scenario.line.stretch, StretchLaw::Curve(_)), "a force-elongation table", "line.curve"),
        (absorber.is_some_and(|a| a.force_table.is_some()), "a table of deployment forces", "absorber.force_table"),
        (absorber.is_some_and(|a| a.wet_cold_factor.is_some()), "a wet and cold factor", "absorber.wet_cold_factor"),
        (matches!(scenario.anchor.kind, AnchorKind::Span(_)), "a horizontal lifeline", "anchor.kind"),
    ];
    found.into_iter().find(|(is, ..)| *is).map(|(_, what, path)| (what, path))
}

/// From the attachment down to the feet or to the underside, m.
pub fn body_below_attachment(subject: &Subject) -> Option<f64> {
    match subject.kind {
        SubjectKind::Person => subject.attachment_above_feet,
        SubjectKind::Load => subject.underside_below_attachment,
    }
    .map(|m| m.si())
}

fn attachment_start(scenario: &Scenario) -> Option<f64> {
    Some(scenario.place.standing?.si() + body_below_attachment(&scenario.subject)?)
}

fn free_fall(scenario: &Scenario, attachment: Option<f64>) -> Result<f64, EstimateError> {
    if let Some(stated) = scenario.fall.free_fall {
        return Ok(stated.si());
    }
    let missing = |what: &str, path| EstimateError::Geometry {
        message: format!("the free fall cannot be worked out without {what}"),
        hint: "state it, or state `fall.free_fall` instead".to_owned(),
        path,
    };
    let anchor = scenario.place.anchor.ok_or_else(|| missing("`place.anchor`", "place.anchor"))?.si();
    let length = scenario.line.length.ok_or_else(|| missing("`line.length`", "line.length"))?.si();
    let attachment = attachment.ok_or_else(|| missing("the height of the attachment", "place.standing"))?;
    let apart = (anchor - attachment).abs();
    if apart > length + 1e-9 {
        let show = |m| format_si(m, Dimension::Length, UnitSystem::Metric);
        return Err(EstimateError::Geometry {
            message: format!(
                "the line of `{}` is shorter than the distance of `{}` from the anchor to the attachment",
                show(length),
                show(apart)
            ),
            hint: "lengthen `line.length`, or check `place.anchor`, `place.standing` and the attachment height"
                .to_owned(),
            path: "line.length",
        });
    }
    Ok((attachment - (anchor - length)).max(0.0))
}

/// Stiffness of the line at its typical values, N/m.
fn stiffness(scenario: &Scenario) -> Result<f64, EstimateError> {
    let gravity = scenario.gravity.si();
    let force = |m: &crate::quantity::Measure| if m.dimension() == Dimension::Mass { m.si() * gravity } else { m.si() };
    let modulus = match &scenario.line.stretch {
        StretchLaw::Stiffness(stiffness) => return Ok(stiffness.si()),
        StretchLaw::Modulus(modulus) => modulus.si(),
        // F = W + sqrt(W^2 + 2 W K f) of an undamped line, solved for K.
        StretchLaw::RatedImpact { force, mass, fall_factor } => {
            let weight = mass.si() * gravity;
            force.si() * (force.si() - 2.0 * weight) / (2.0 * weight * fall_factor.si())
        }
        StretchLaw::StaticElongation { percent, from, to } => (force(to) - force(from)) / percent.si(),
        StretchLaw::Curve(_) => return Err(not_solved("a force-elongation table", "line.curve")),
    };
    let length = scenario.line.length.map(|l| l.si());
    match length.map(|l| modulus / l) {
        Some(stiffness) if stiffness > 0.0 && stiffness.is_finite() => Ok(stiffness),
        Some(_) => Err(EstimateError::Geometry {
            message: format!(
                "the line's law gives a modulus of `{}`",
                format_si(modulus, Dimension::Force, UnitSystem::Metric)
            ),
            hint: "the rated force must exceed twice the weight of the rated mass, and the loads must rise".to_owned(),
            path: "line",
        }),
        None => Err(EstimateError::Geometry {
            message: "a modulus gives no stiffness without `line.length`".to_owned(),
            hint: "state `line.length`".to_owned(),
            path: "line.length",
        }),
    }
}

fn line(scenario: &Scenario) -> Result<Group, EstimateError> {
    let stiffness = stiffness(scenario)?;
    let damping = match &scenario.line.damping {
        DampingLaw::None => 0.0,
        DampingLaw::Damping(damping) => damping.si(),
        DampingLaw::Ratio(ratio) => 2.0 * ratio.si() * (scenario.subject.mass.si() * stiffness).sqrt(),
    };
    Ok(Group::damped(stiffness, damping))
}

/// Group 2 and, where it had to be joined to first order, a sentence that says so.
fn other(scenario: &Scenario) -> (Group, Option<&'static str>) {
    let mut parts = Vec::with_capacity(3);
    parts.extend(scenario.line.series_stiffness.map(|k| (k.si(), 0.0)));
    let sprung = match &scenario.anchor.kind {
        AnchorKind::Sprung(compliance) => Some(compliance),
        AnchorKind::Fixed | AnchorKind::Span(_) => None,
    };
    parts.extend(
        [scenario.harness.as_ref(), sprung]
            .into_iter()
            .flatten()
            .map(|c| (c.stiffness.si(), c.damping.map_or(0.0, |d| d.si()))),
    );
    let joined = (parts.len() > 1 && parts.iter().any(|p| p.1 > 0.0)).then_some(
        "The parts beside the line (series spring, harness, anchor) are joined into one spring and one damper, to first \
         order in the damping.",
    );
    (Group::in_series(&parts), joined)
}

fn absorber(scenario: &Scenario) -> Option<Absorber> {
    let absorber = scenario.absorber.as_ref()?;
    let [_, force, _] = absorber.first_force_n();
    Some(Absorber::constant(force, absorber.onset_force.map_or(force, |f| f.si()), absorber.stroke_m()))
}
