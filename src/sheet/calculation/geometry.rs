//! The geometry step by step, the space that the fall takes, and where things are.
use super::formula::{Before, formula};
use super::value::{Block, Cell, Column, Kind, Row, Section, Table, column, digits};
use crate::quantity::{Dimension, UnitSystem, format_si};
use crate::sheet::Report;
use crate::sheet::places::{end_words, span_rows, stations, strike_words};
use crate::sheet::working::sums;

const STEPS: &[Column] = &[
    column("number", "step", Kind::Words),
    column("what", "what", Kind::Name),
    column("formula", "formula", Kind::Formula),
    column("numbers", "with numbers, SI", Kind::Formula),
    column("value", "value, SI", Kind::Number),
    column("shown", "in units of the sheet", Kind::Number),
];
const PLACES: &[Column] = &[
    column("what", "what", Kind::Name),
    column("offset", "offset from the fall line", Kind::Number),
    column("elevation", "elevation", Kind::Number),
];
const SPAN: &[Column] = &[column("what", "what", Kind::Name), column("value", "value", Kind::Number)];

/// How the last row of a sum begins.
const SUM: &str = "sum:";

/// The section of the geometry.
pub fn section(report: &Report, system: UnitSystem) -> Section {
    let estimate = &report.estimate;
    let mut blocks = Vec::new();
    if estimate.working.is_empty() {
        blocks.push(Block::words("The file states the free fall; there is no geometry to work out."));
    } else {
        let steps: Vec<_> = estimate.working.iter().map(|step| (step.what.clone(), step.value_m)).collect();
        blocks.push(table("geometry", "how the free fall is worked out", "G", &steps, system));
    }
    if report.scenario.place.anchor.is_none() && estimate.elevations.is_some_and(|e| e.anchor_m.is_some()) {
        blocks.push(Block::words(
            "The file states no elevation of the anchor: it is taken one length of the line above the attachment when taut.",
        ));
    }
    for (index, sum) in sums(&report.scenario, estimate.elevations.as_ref()).iter().enumerate() {
        let mut rows = sum.terms.clone();
        rows.push((format!("{SUM} clear space wanted below {}", sum.datum), sum.total_m()));
        let letter = if index == 0 { "A" } else { "B" };
        let caption = format!("space the fall takes, measured below {}", sum.datum);
        blocks.push(table(&format!("space_{}", index + 1), &caption, letter, &rows, system));
    }
    blocks.extend(span(report, system));
    blocks.extend(swing(report, system));
    Section::new("geometry", "Geometry, worked step by step", blocks)
}

fn table(id: &str, caption: &str, letter: &str, list: &[(String, f64)], system: UnitSystem) -> Block {
    let names: Vec<String> = (1..=list.len()).map(|n| format!("{letter}{n}")).collect();
    let all: Vec<Before<'_>> =
        list.iter().zip(&names).map(|((what, value_m), name)| Before { name, what, value_m: *value_m }).collect();
    let rows = all.iter().enumerate().map(|(index, step)| row(step, &all[..index], system)).collect();
    Block::Table(Table { id: id.to_owned(), caption: caption.to_owned(), columns: STEPS, rows })
}

fn row(step: &Before<'_>, before: &[Before<'_>], system: UnitSystem) -> Row {
    let [formula, numbers] = if step.what.starts_with(SUM) {
        let list = |show: &dyn Fn(&Before<'_>) -> String| before.iter().map(show).collect::<Vec<_>>().join(" + ");
        [list(&|step| step.name.to_owned()), list(&|step| digits(step.value_m))]
    } else {
        formula(step.what, before)
    };
    Row::new(vec![
        Cell::words(step.name),
        Cell::words(step.what),
        Cell::words(&formula),
        Cell::words(&numbers),
        Cell::si(step.value_m, "m"),
        Cell::shown(format_si(step.value_m, Dimension::Length, system), step.value_m, "m"),
    ])
}

fn span(report: &Report, system: UnitSystem) -> Option<Block> {
    let view = report.estimate.span.as_ref()?;
    let row = |what: &str, words: String| Row::new(vec![Cell::words(what), Cell::words(&words)]);
    let mut rows: Vec<Row> =
        span_rows(view).into_iter().map(|(what, value, of)| row(what, format_si(value, of, system))).collect();
    for (side, load) in ["left", "right"].iter().zip(&view.end_loads) {
        rows.push(row(&format!("load of the {side} support, towards the span and down"), end_words(load, system)));
    }
    let caption = "horizontal lifeline under the largest load".to_owned();
    Some(Block::Table(Table { id: "lifeline".to_owned(), caption, columns: SPAN, rows }))
}

fn swing(report: &Report, system: UnitSystem) -> Vec<Block> {
    let Some(view) = &report.estimate.plane else { return Vec::new() };
    let length = |m: f64| Cell::shown(format_si(m, Dimension::Length, system), m, "m");
    let rows = stations(view)
        .into_iter()
        .map(|(what, at)| Row::new(vec![Cell::words(what), length(at.offset_m), length(at.elevation_m)]))
        .collect();
    let caption = "places of the swing".to_owned();
    let strikes: Vec<String> = view.strikes.iter().map(|strike| strike_words(strike, system)).collect();
    let met = if strikes.is_empty() {
        Block::words("No face and no level is struck up to the first turn of the swing.")
    } else {
        Block::list(&strikes)
    };
    vec![Block::Table(Table { id: "swing".to_owned(), caption, columns: PLACES, rows }), met]
}
