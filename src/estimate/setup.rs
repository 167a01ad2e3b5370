//! From a scenario's typical values to the falling mass and its path.
mod law;
mod place;

use super::EstimateError;
use super::rigging::Rigging;
use crate::arrest::Fall;
use crate::physics::{Course, Geometry, SeriesPath};
use crate::scenario::{AnchorKind, Scenario, Subject, SubjectKind};

/// What is solved, and what of the geometry the results need.
pub struct Setup {
    /// The fall; with a span its path leaves the span out.
    pub fall: Fall,
    /// Where the fall starts, with the working.
    pub geometry: Geometry,
    /// Elevation of the attachment at the start, m, where the file gives elevations.
    pub attachment_start_m: Option<f64>,
    /// Parts of the path that were joined to first order in their damping.
    pub joined: Option<&'static str>,
    /// The horizontal lifeline, if any.
    pub span: Option<Rigging>,
}

impl Setup {
    /// # Errors
    /// When the geometry contradicts itself, a law has no stiffness, or parts do not go together.
    pub fn of(scenario: &Scenario) -> Result<Self, EstimateError> {
        let attachment_start_m = attachment_start(scenario);
        let geometry = place::geometry(scenario, attachment_start_m)?;
        let (other, joined) = law::other(scenario);
        let line = law::line(scenario, geometry.elastic_length_m)?;
        let path = SeriesPath { line, other, absorber: law::absorber(scenario)? };
        let mut fall = Fall {
            mass_kg: scenario.subject.mass.si(),
            gravity_m_per_s2: scenario.gravity.si(),
            free_fall_m: geometry.free_fall_m,
            speed_at_taut_m_per_s: None,
            path,
        };
        let span = match &scenario.anchor.kind {
            AnchorKind::Span(span) => Some(Rigging::new(span, &fall, &geometry)?),
            AnchorKind::Fixed | AnchorKind::Sprung(_) => None,
        };
        fall.free_fall_m += span.as_ref().map_or(0.0, |s| s.curve.slack_m());
        Ok(Self { fall, geometry, attachment_start_m, joined, span })
    }

    /// Whether the pivot lies beside the fall line.
    pub fn is_planar(&self) -> bool {
        self.geometry.course() == Course::Planar
    }
}

/// From the attachment down to the feet or to the underside, m.
pub fn body_below_attachment(subject: &Subject) -> Option<f64> {
    match subject.kind {
        SubjectKind::Person => subject.attachment_above_feet,
        SubjectKind::Load => subject.underside_below_attachment,
    }
    .map(|m| m.si())
}

/// Stretch allowance of a person's harness, m.
pub fn allowance(subject: &Subject) -> f64 {
    match subject.kind {
        SubjectKind::Person => subject.stretch_allowance.map_or(0.0, |a| a.si()),
        SubjectKind::Load => 0.0,
    }
}

fn attachment_start(scenario: &Scenario) -> Option<f64> {
    Some(scenario.place.standing?.si() + body_below_attachment(&scenario.subject)?)
}
