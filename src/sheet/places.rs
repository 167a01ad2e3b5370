//! A horizontal lifeline and a swing: where things are, and what they meet.
use super::page::{Page, Tone, pad_left};
use super::text::row;
use crate::estimate::{EndLoadView, Estimate, PlacePoint, PlaneView, SpanView, StrikeView};
use crate::quantity::{Dimension, UnitSystem, format_si};
use serde_json::{Value, json};

/// Columns of the words.
const WORDS: usize = 62;

/// The lifeline under the largest load, where there is one.
pub fn span(page: &mut Page, estimate: &Estimate, system: UnitSystem) {
    let Some(view) = &estimate.span else { return };
    page.heading("horizontal lifeline");
    for (words, value, dimension) in span_rows(view) {
        line(page, words, &format_si(value, dimension, system));
    }
    for (side, load) in ["left", "right"].iter().zip(&view.end_loads) {
        line(page, &format!("load of the {side} support, towards the span and down"), &end_words(load, system));
    }
}

pub(super) fn span_rows(view: &SpanView) -> Vec<(&'static str, f64, Dimension)> {
    let mut rows = vec![
        ("distance of the supports", view.length_m, Dimension::Length),
        ("load from the left support", view.at_m, Dimension::Length),
        ("right support above the left one", view.level_difference_m, Dimension::Length),
        ("deflection at the load before it takes any, from the chord", view.slack_m, Dimension::Length),
        ("deflection under the largest load, from the chord", view.peak_deflection_m, Dimension::Length),
        ("deflection at rest, from the chord", view.rest_deflection_m, Dimension::Length),
        ("largest cable tension", view.peak_tension_n, Dimension::Force),
        ("tension over load", view.amplification, Dimension::Ratio),
    ];
    rows.extend(view.deployed_m.map(|m| ("deployed by the absorber in line with the cable", m, Dimension::Length)));
    rows
}

pub(super) fn end_words(load: &EndLoadView, system: UnitSystem) -> String {
    let force = format_si(load.force_n, Dimension::Force, system);
    format!("{force}, {:.1} deg below level", load.below_horizontal_deg)
}

/// The places of a swing and every strike, where there is one.
pub fn swing(page: &mut Page, estimate: &Estimate, system: UnitSystem) {
    let Some(view) = &estimate.plane else { return };
    page.heading("swing: offset from the fall line, elevation");
    for (words, place) in stations(view) {
        line(page, words, &place_words(place, system));
    }
    for strike in &view.strikes {
        page.wrapped("  x ", &strike_words(strike, system), Tone::Plain);
    }
    if view.strikes.is_empty() {
        page.line("  no face and no level is struck up to the first turn of the swing", Tone::Plain);
    }
}

pub(super) fn stations(view: &PlaneView) -> Vec<(&'static str, PlacePoint)> {
    let mut list = vec![("anchor", view.anchor)];
    list.extend(view.edge.map(|edge| ("edge, about which the line turns", edge)));
    list.extend([
        ("attachment at the start", view.start),
        ("attachment when the line comes taut", view.taut),
        ("attachment at the lowest point", view.lowest),
    ]);
    list
}

fn place_words(place: PlacePoint, system: UnitSystem) -> String {
    let length = |m: f64| format_si(m, Dimension::Length, system);
    format!("{}, {}", length(place.offset_m), length(place.elevation_m))
}

pub(super) fn strike_words(strike: &StrikeView, system: UnitSystem) -> String {
    format!(
        "strikes {} {} at {:.3} s: attachment at {}, speed {}, that of a straight fall of {}",
        if strike.is_face { "the face" } else { "the level" },
        strike.name,
        strike.time_s,
        place_words(strike.at, system),
        format_si(strike.speed_m_per_s, Dimension::Speed, system),
        format_si(strike.drop_equivalent_m, Dimension::Length, system)
    )
}

fn line(page: &mut Page, words: &str, cell: &str) {
    row(page, "  ", (words, WORDS), &pad_left(cell, 32), Tone::Plain);
}

/// The lifeline as JSON, SI units.
pub fn span_object(view: &SpanView) -> Value {
    let metres = |value: f64| json!({ "value": value, "unit": "m" });
    let end = |load: &EndLoadView| json!({ "value": load.force_n, "unit": "N", "below_horizontal_deg": load.below_horizontal_deg });
    let [left, right] = &view.end_loads;
    let mut object = json!({
        "length": metres(view.length_m),
        "at": metres(view.at_m),
        "level_difference": metres(view.level_difference_m),
        "slack_deflection": metres(view.slack_m),
        "peak_deflection": metres(view.peak_deflection_m),
        "rest_deflection": metres(view.rest_deflection_m),
        "peak_tension": { "value": view.peak_tension_n, "unit": "N" },
        "amplification": { "value": view.amplification, "unit": "1" },
        "left_end_load": end(left),
        "right_end_load": end(right),
    });
    if let Some(deployed) = view.deployed_m {
        object["deployed_length"] = metres(deployed);
    }
    object
}

/// The swing as JSON, SI units.
pub fn swing_object(view: &PlaneView) -> Value {
    let place = |p: PlacePoint| json!({ "offset": p.offset_m, "elevation": p.elevation_m, "unit": "m" });
    let strike = |s: &StrikeView| {
        json!({
            "name": s.name,
            "kind": if s.is_face { "face" } else { "level" },
            "time": { "value": s.time_s, "unit": "s" },
            "at": place(s.at),
            "speed": { "value": s.speed_m_per_s, "unit": "m/s" },
            "drop_equivalent": { "value": s.drop_equivalent_m, "unit": "m" },
        })
    };
    let mut object = json!({
        "anchor": place(view.anchor),
        "pivot": place(view.pivot),
        "start": place(view.start),
        "taut": place(view.taut),
        "lowest": place(view.lowest),
        "strikes": view.strikes.iter().map(strike).collect::<Vec<_>>(),
    });
    if let Some(edge) = view.edge {
        object["edge"] = place(edge);
    }
    object
}
