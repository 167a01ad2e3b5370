//! One report as JSON, SI units.
use super::band_words::{bands_object, report_margin_object};
use super::places::{span_object, swing_object};
use super::working::working_object;
use super::{CAUTIONS, Report};
use crate::estimate::{Event, Number, Value as NumberValue};
use crate::margin::{Margin, Sense};
use crate::quantity::{Dimension, Unit, UnitSystem};
use serde_json::{Map, Value, json};

/// How JSON is laid out.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Layout {
    /// For reading: one object over many lines.
    Lines,
    /// One object a line.
    OneLine,
}

/// The whole report as one JSON object with a line end.
#[must_use]
pub fn json(report: &Report, layout: Layout) -> String {
    print(&object(report), layout)
}

/// A JSON value as text with a line end.
#[must_use]
pub fn print(value: &Value, layout: Layout) -> String {
    match layout {
        Layout::Lines => format!("{value:#}\n"),
        Layout::OneLine => format!("{value}\n"),
    }
}

/// The whole report as a JSON object.
#[must_use]
pub fn object(report: &Report) -> Value {
    let mut object = json!({
        "file": report.file,
        "title": report.scenario.title,
        "datum": report.scenario.datum,
        "scenario_sha256": report.scenario_sha256,
        "version": env!("CARGO_PKG_VERSION"),
        "verdict": report.verdict.word(),
        "cautions": CAUTIONS,
        "warnings": report.estimate.warnings,
        "assumptions": report.estimate.assumptions,
        "limits": { "basis": report.scenario.limits.basis, "remarks": report.limit_remarks },
        "margins": report.margins.iter().map(|m| report_margin_object(report, m)).collect::<Vec<_>>(),
        "numbers": report.estimate.numbers.iter().map(number).collect::<Map<_, _>>(),
        "events": report.estimate.events.iter().map(event).collect::<Vec<_>>(),
        "working": working_object(report),
    });
    if let Some(bands) = &report.bands {
        object["bands"] = bands_object(bands);
    }
    if let Some(view) = &report.estimate.span {
        object["span"] = span_object(view);
    }
    if let Some(view) = &report.estimate.plane {
        object["swing"] = swing_object(view);
    }
    object
}

/// One check as a JSON object.
#[must_use]
pub fn margin(margin: &Margin) -> Value {
    json!({
        "id": margin.id,
        "label": margin.label,
        "demand": margin.demand,
        "limit": margin.limit,
        "unit": si_unit(margin.dimension),
        "sense": match margin.sense { Sense::AtMost => "at most", Sense::AtLeast => "at least" },
        "margin": margin.margin,
        "verdict": margin.verdict.word(),
        "basis": margin.basis.words,
        "from_memory": margin.basis.from_memory,
        "note": margin.note,
    })
}

fn number(number: &Number) -> (String, Value) {
    let value = match &number.value {
        NumberValue::Number(value) => json!(value),
        NumberValue::Text(words) => json!(words),
    };
    (number.id.clone(), json!({ "value": value, "unit": number.unit }))
}

fn event(event: &Event) -> Value {
    json!({ "time": event.time_s, "unit": "s", "words": event.words(UnitSystem::Metric) })
}

/// The SI unit of a dimension as JSON writes it; `1` for a plain number.
#[must_use]
pub fn si_unit(dimension: Dimension) -> &'static str {
    let symbol =
        Unit::for_dimension(dimension).into_iter().find(|u| u.factor() == 1.0).map_or("", |unit| unit.symbol());
    if symbol.is_empty() { "1" } else { symbol }
}
