//! Where the fall starts: which case of the geometry a file states.
use crate::estimate::EstimateError;
use crate::physics::{
    Geometry, GeometryError, GeometryStep, Point, Positions, hanging, retractable, stated, vertical_lifeline,
};
use crate::scenario::{LineKind, Scenario};

/// The free fall and everything around it.
///
/// # Errors
/// When a value it needs is missing or two lengths clash; the message has both.
pub fn geometry(scenario: &Scenario, attachment_m: Option<f64>) -> Result<Geometry, EstimateError> {
    let length = scenario.line.length.map(|l| l.si());
    let slide = scenario.line.grab_slide.map_or(0.0, |s| s.si());
    let worked = match (scenario.fall.free_fall, scenario.line.kind) {
        (Some(free_fall), LineKind::Vertical) => vertical_lifeline(needed_length(length)?, free_fall.si(), slide),
        (Some(free_fall), _) => stated(free_fall.si(), length),
        (None, LineKind::Retractable) => {
            let zero = |m: Option<crate::quantity::Measure>| m.map_or(0.0, |m| m.si());
            retractable(&positions(scenario, attachment_m)?, zero(scenario.line.slack), zero(scenario.line.lock_travel))
        }
        (None, _) => hanging(&positions(scenario, attachment_m)?, needed_length(length)?),
    };
    let mut geometry = worked.map_err(|error| clash(&error))?;
    if scenario.line.kind == LineKind::Vertical && scenario.fall.free_fall.is_none() {
        slide_on(&mut geometry, slide);
    }
    Ok(geometry)
}

/// A grab slides before it holds: that much more free fall, and taut that much lower.
fn slide_on(geometry: &mut Geometry, slide_m: f64) {
    geometry.free_fall_m += slide_m;
    if let Some(layout) = &mut geometry.layout {
        layout.attachment_taut_m -= slide_m;
    }
    geometry.steps.push(GeometryStep { what: "slide of the grab before it holds, as stated", value_m: slide_m });
    let what = "free fall: until the line is taut, and the slide of the grab";
    geometry.steps.push(GeometryStep { what, value_m: geometry.free_fall_m });
}

fn needed_length(length: Option<f64>) -> Result<f64, EstimateError> {
    length.ok_or_else(|| missing("`line.length`", "line.length"))
}

fn missing(what: &str, path: &'static str) -> EstimateError {
    EstimateError::Geometry {
        message: format!("the free fall cannot be worked out without {what}"),
        hint: "state it, or state `fall.free_fall` instead".to_owned(),
        path,
    }
}

fn positions(scenario: &Scenario, attachment_m: Option<f64>) -> Result<Positions, EstimateError> {
    let place = &scenario.place;
    let elevation = place.anchor.ok_or_else(|| missing("`place.anchor`", "place.anchor"))?.si();
    let offset = place.anchor_offset.map_or(0.0, |o| o.si());
    Ok(Positions {
        attachment_m: attachment_m.ok_or_else(|| missing("the height of the attachment", "place.standing"))?,
        anchor: Point { offset_m: offset, elevation_m: elevation },
        edge: place.edge.as_ref().map(|e| Point { offset_m: e.offset.si(), elevation_m: e.elevation.si() }),
    })
}

fn clash(error: &GeometryError) -> EstimateError {
    let path = match error {
        GeometryError::Input { .. } | GeometryError::LineTooShort { .. } => "line.length",
        _ => "place.edge",
    };
    EstimateError::Geometry { message: error.to_string(), hint: error.hint().to_owned(), path }
}
