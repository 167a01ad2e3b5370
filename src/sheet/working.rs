//! How the geometry was worked out, and the sums of space from the anchor and from the standing surface down.
use super::Report;
use super::page::{Page, Tone, pad_left};
use super::text::row;
use crate::estimate::{Elevations, Estimate};
use crate::quantity::{Dimension, UnitSystem, format_si};
use crate::scenario::{Scenario, SubjectKind};
use serde_json::{Value, json};

/// Columns of the words of a sum.
const WORDS: usize = 64;

/// A sum of space that the fall takes, from a datum down.
pub(super) struct Sum {
    /// Where it counts from: `the anchor`.
    pub(super) datum: &'static str,
    /// Words and lengths in m, from the datum down.
    pub(super) terms: Vec<(String, f64)>,
}

impl Sum {
    pub(super) fn total_m(&self) -> f64 {
        self.terms.iter().map(|term| term.1).sum()
    }
}

/// The steps of the geometry in order.
pub fn working(page: &mut Page, estimate: &Estimate, system: UnitSystem) {
    if estimate.working.is_empty() {
        return;
    }
    page.heading("how the free fall is worked out");
    for step in &estimate.working {
        line(page, &step.what, step.value_m, system);
    }
}

/// The space that the fall takes below the anchor and below the standing surface.
pub fn clearance_sums(page: &mut Page, report: &Report, system: UnitSystem) {
    for sum in sums(&report.scenario, report.estimate.elevations.as_ref()) {
        page.heading(&format!("space the fall takes, measured below {}", sum.datum));
        for (words, value) in &sum.terms {
            line(page, words, *value, system);
        }
        line(page, &format!("= clear space wanted below {}", sum.datum), sum.total_m(), system);
    }
}

fn line(page: &mut Page, words: &str, value_m: f64, system: UnitSystem) {
    let cell = pad_left(&format_si(value_m, Dimension::Length, system), 16);
    row(page, "  ", (words, WORDS), &cell, Tone::Plain);
}

/// Both sums, where elevations are known. They differ by the height of the anchor above the standing surface, so that
/// they end at the same elevation.
pub(super) fn sums(scenario: &Scenario, elevations: Option<&Elevations>) -> Vec<Sum> {
    let Some(e) = elevations else { return Vec::new() };
    let from_anchor = e.anchor_m.map(|anchor| Sum {
        datum: "the anchor",
        terms: vec![
            (
                "from the anchor down to the attachment when the line comes taut".to_owned(),
                anchor - e.attachment_taut_m,
            ),
            (after_taut(scenario), e.attachment_taut_m - e.attachment_lowest_m),
            (body(scenario.subject.kind).to_owned(), e.body_below_attachment_m),
        ],
    });
    let from_standing = Sum {
        datum: standing(scenario.subject.kind),
        terms: vec![
            ("free fall".to_owned(), e.attachment_start_m - e.attachment_taut_m),
            (after_taut(scenario), e.attachment_taut_m - e.attachment_lowest_m),
        ],
    };
    let mut sums: Vec<Sum> = from_anchor.into_iter().chain([from_standing]).collect();
    for sum in &mut sums {
        sum.terms.extend(below_the_body(scenario, e));
    }
    sums
}

fn after_taut(scenario: &Scenario) -> String {
    let absorber = if scenario.absorber.is_some() { ", absorber" } else { "" };
    let swing = if scenario.place.anchor_offset.is_some() || scenario.place.edge.is_some() { ", swing" } else { "" };
    format!("from taut down to the lowest point: stretch{absorber}{swing}")
}

const fn body(kind: SubjectKind) -> &'static str {
    match kind {
        SubjectKind::Person => "height of the attachment above the feet",
        SubjectKind::Load => "underside of the load below the attachment",
    }
}

const fn standing(kind: SubjectKind) -> &'static str {
    match kind {
        SubjectKind::Person => "the standing surface",
        SubjectKind::Load => "the underside at the start",
    }
}

/// What is added below feet or underside: the allowance, and the largest reserve that an obstacle asks for.
fn below_the_body(scenario: &Scenario, e: &Elevations) -> Vec<(String, f64)> {
    let allowance = e.lowest_point_below_attachment_m - e.body_below_attachment_m;
    let reserve = scenario.obstacles.iter().filter_map(|o| Some((o.reserve?.si(), &o.name)));
    let largest = reserve.max_by(|a, b| a.0.total_cmp(&b.0));
    let mut terms = Vec::with_capacity(2);
    if allowance != 0.0 {
        terms.push(("stretch of the harness and shift of the attachment".to_owned(), allowance));
    }
    if let Some((metres, name)) = largest {
        terms.push((format!("reserve wanted above {name}"), metres));
    }
    terms
}

/// The steps and the sums as JSON, SI units.
pub fn working_object(report: &Report) -> Value {
    let term = |what: &str, value: f64| json!({ "what": what, "value": value, "unit": "m" });
    let steps: Vec<_> = report.estimate.working.iter().map(|s| term(&s.what, s.value_m)).collect();
    let sum = |sum: &Sum| {
        json!({
            "datum": format!("below {}", sum.datum),
            "terms": sum.terms.iter().map(|(what, value)| term(what, *value)).collect::<Vec<_>>(),
            "total": { "value": sum.total_m(), "unit": "m" },
        })
    };
    let sums = sums(&report.scenario, report.estimate.elevations.as_ref());
    json!({ "steps": steps, "clearance_sums": sums.iter().map(sum).collect::<Vec<_>>() })
}
