//! The view Ledger: the energy account, every number with its definition, and the working of the geometry.
use crate::estimate::{Estimate, Number, Value, definition};
use crate::quantity::{Dimension, UnitSystem, format_si};
use crate::sheet::Report;
use crate::tui::model::Model;
use crate::tui::text::{cells, wrap};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;

/// Column, words and style of a row.
type Row = (u16, String, Style);

/// Columns before an entry and before its definition.
const INDENT: u16 = 2;
const DEEP: u16 = 4;
/// Columns kept for a value with its unit.
const VALUE: usize = 14;

/// What the line, its fellows and the dampers took, in the order of the account.
const TAKEN: [&str; 5] = ["line_work", "other_work", "absorber_work", "span_absorber_work", "damper_work"];

fn rows(model: &Model, width: u16) -> Vec<Row> {
    let Some(report) = &model.answer.report else { return Vec::new() };
    let theme = model.theme;
    let (plain, quiet) = (theme.plain(), theme.quiet());
    let mut rows = Vec::new();
    let account = account(report);
    if !account.is_empty() {
        rows.push((0, "energy account at the lowest point".to_owned(), theme.heading()));
        for (words, joules) in &account {
            rows.extend(entry(words, &format_si(*joules, Dimension::Energy, model.units), width, plain));
        }
    }
    rows.push((0, "every number with its definition".to_owned(), theme.heading()));
    for number in report.estimate.numbers.iter() {
        let Some(meaning) = definition(&number.id) else { continue };
        rows.extend(entry(&label(report, number, meaning.label), &value(number, model.units), width, plain));
        let room = usize::from(width.saturating_sub(DEEP + 1));
        rows.extend(wrap(meaning.meaning, room).into_iter().map(|line| (DEEP, line, quiet)));
    }
    rows.extend(working(&report.estimate, model, width));
    rows
}

fn working(estimate: &Estimate, model: &Model, width: u16) -> Vec<Row> {
    let mut rows = Vec::new();
    if !estimate.working.is_empty() {
        rows.push((0, "how the free fall is worked out".to_owned(), model.theme.heading()));
    }
    for step in &estimate.working {
        let number = format_si(step.value_m, Dimension::Length, model.units);
        rows.extend(entry(&step.what, &number, width, model.theme.plain()));
    }
    rows
}

/// Words, wrapped, with the value at the right end of their last row.
fn entry(words: &str, value: &str, width: u16, style: Style) -> Vec<Row> {
    let room = usize::from(width.saturating_sub(INDENT + 1));
    let cell = usize::from(cells(value)).max(VALUE);
    let mut lines = wrap(words, room.saturating_sub(cell + 1));
    if let Some(last) = lines.last_mut() {
        let gap = room.saturating_sub(usize::from(cells(last)) + usize::from(cells(value)));
        *last = format!("{last}{}{value}", " ".repeat(gap.max(1)));
    }
    lines.into_iter().map(|line| (INDENT, line, style)).collect()
}

/// The label, with the name of the obstacle or face that the id ends in.
fn label(report: &Report, number: &Number, label: &str) -> String {
    let Some((_, id)) = number.id.split_once('.') else { return label.to_owned() };
    let obstacles = report.scenario.obstacles.iter().map(|obstacle| (obstacle.id(), &obstacle.name));
    let faces = report.scenario.faces.iter().map(|face| (face.id(), &face.name));
    let name = obstacles.chain(faces).find(|(known, _)| known == id).map_or(id, |(_, name)| name.trim());
    format!("{label}, {name}")
}

fn value(number: &Number, units: UnitSystem) -> String {
    match &number.value {
        Value::Text(word) => word.clone(),
        Value::Number(si) => format_si(*si, number.dimension, units),
    }
}

/// Given by gravity from the start down to the lowest point; what became of it; and what the account misses.
fn account(report: &Report) -> Vec<(String, f64)> {
    let numbers = &report.estimate.numbers;
    let drop = numbers.get("arrest_distance").or_else(|| numbers.get("swing_drop"));
    let (Some(fall_m), Some(drop_m)) = (numbers.get("free_fall_distance"), drop) else { return Vec::new() };
    let mass_kg = report.scenario.subject.mass.si();
    let given = mass_kg * report.scenario.gravity.si() * (fall_m + drop_m);
    let mut rows =
        vec![("given: weight times free fall and what follows it, down to the lowest point".to_owned(), given)];
    let mut left = given;
    for id in TAKEN {
        if let (Some(joules), Some(meaning)) = (numbers.get(id), definition(id)) {
            rows.push((format!("less {}", meaning.label), joules));
            left -= joules;
        }
    }
    if let Some(speed) = numbers.get("swing_speed_lowest") {
        let joules = 0.5 * mass_kg * speed * speed;
        rows.push(("less energy of motion at the lowest point of the swing".to_owned(), joules));
        left -= joules;
    }
    rows.push(("left over: what rounding and solver miss".to_owned(), left));
    rows
}

/// The last row that may stand first.
#[must_use]
pub fn last_first(model: &Model, area: Rect) -> usize {
    rows(model, area.width).len().saturating_sub(usize::from(area.height.saturating_sub(1)))
}

/// Draws the ledger from the row that the model is scrolled to.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    let rows = rows(model, area.width);
    super::draw_text(buffer, area, "Ledger", &rows, model.ledger_row, model.theme);
}
