//! The view Compare: a kept state against the present one.
use crate::estimate::{Number, Value, definition};
use crate::margin::Margin;
use crate::quantity::{UnitSystem, format_si};
use crate::study::{InputChange, NumberChange, VerdictChange};
use crate::tui::command::{Command, key_name};
use crate::tui::model::Model;
use crate::tui::text::{cells, wrap};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;

/// Column, words and style of a row.
type Row = (u16, String, Style);

const INDENT: u16 = 2;

fn rows(model: &Model, width: u16) -> Vec<Row> {
    let theme = model.theme;
    let mut rows = Vec::new();
    let who = if model.kept.by_hand { "the state kept last" } else { "the file as opened" };
    let lead = format!("before: {who}; now: the present inputs; {} keeps them", key_name(Command::Keep));
    rows.extend(wrap(&lead, usize::from(width.saturating_sub(1))).into_iter().map(|line| (0, line, theme.quiet())));
    let Some(found) = model.difference() else {
        rows.push((0, "one of the two states has no run to compare".to_owned(), theme.fault()));
        return rows;
    };
    let which = match (model.compares_bands(), model.has_bands()) {
        (true, _) => "verdicts that changed, bands included",
        (false, true) => "verdicts that changed at typical values",
        (false, false) => "verdicts that changed",
    };
    rows.push((0, which.to_owned(), theme.heading()));
    found.verdicts.iter().for_each(|change| rows.extend(verdict_rows(model, change, width)));
    none(&mut rows, found.verdicts.is_empty(), theme.plain());
    rows.push((0, "inputs that differ".to_owned(), theme.heading()));
    found.inputs.iter().for_each(|change| rows.extend(input_rows(model, change, width)));
    none(&mut rows, found.inputs.is_empty(), theme.plain());
    rows.push((0, "numbers that differ".to_owned(), theme.heading()));
    found.numbers.iter().for_each(|change| rows.extend(number_rows(model, change, width)));
    none(&mut rows, found.numbers.is_empty(), theme.plain());
    rows
}

fn none(rows: &mut Vec<Row>, is_empty: bool, style: Style) {
    if is_empty {
        rows.push((INDENT, "none".to_owned(), style));
    }
}

/// A label and what stands at the right end: beside each other where there is room, else below each other.
fn pair(label: &str, right: &str, width: u16, style: Style) -> Vec<Row> {
    let room = width.saturating_sub(INDENT + 1);
    if cells(label) + 2 + cells(right) <= room {
        let gap = usize::from(room - cells(label) - cells(right));
        return vec![(INDENT, format!("{label}{}{right}", " ".repeat(gap)), style)];
    }
    let mut rows: Vec<Row> = wrap(label, usize::from(room)).into_iter().map(|line| (INDENT, line, style)).collect();
    for line in wrap(right, usize::from(room.saturating_sub(2))) {
        let column = INDENT + room.saturating_sub(cells(&line));
        rows.push((column, line, style));
    }
    rows
}

fn verdict_rows(model: &Model, change: &VerdictChange, width: u16) -> Vec<Row> {
    let word = |margin: &Option<Margin>| {
        margin
            .as_ref()
            .map_or_else(|| "not made".to_owned(), |m| format!("{} {}", m.verdict.symbol(), m.verdict.word()))
    };
    let label = change.after.as_ref().or(change.before.as_ref()).map_or("", |margin| margin.label.as_str());
    let better = if change.is_worse() { "worse" } else { "better" };
    let style = change.after.as_ref().map_or(model.theme.plain(), |margin| model.theme.verdict(margin.verdict));
    pair(label, &format!("{} -> {} ({better})", word(&change.before), word(&change.after)), width, style)
}

fn input_rows(model: &Model, change: &InputChange, width: u16) -> Vec<Row> {
    let stated = |words: &Option<String>| words.clone().unwrap_or_else(|| "not stated".to_owned());
    pair(&change.path, &format!("{} -> {}", stated(&change.before), stated(&change.after)), width, model.theme.plain())
}

fn number_rows(model: &Model, change: &NumberChange, width: u16) -> Vec<Row> {
    let Some(any) = change.after.as_ref().or(change.before.as_ref()) else { return Vec::new() };
    let label = match (definition(&any.id), any.id.split_once('.')) {
        (Some(meaning), Some((_, name))) => format!("{}, {}", meaning.label, name.replace('_', " ")),
        (Some(meaning), None) => meaning.label.to_owned(),
        (None, _) => any.id.clone(),
    };
    let shown = |number: &Option<Number>| number.as_ref().map_or_else(|| "none".to_owned(), |n| value(n, model.units));
    let step = step(change, model.units).map_or_else(String::new, |step| format!(" ({step})"));
    let words = format!("{} -> {}{step}", shown(&change.before), shown(&change.after));
    pair(&label, &words, width, model.theme.plain())
}

fn value(number: &Number, units: UnitSystem) -> String {
    match &number.value {
        Value::Text(word) => word.clone(),
        Value::Number(si) => format_si(*si, number.dimension, units),
    }
}

/// The difference with its sign.
fn step(change: &NumberChange, units: UnitSystem) -> Option<String> {
    let (before, after) = (change.before.as_ref()?, change.after.as_ref()?);
    let (Value::Number(x), Value::Number(y)) = (&before.value, &after.value) else { return None };
    let sign = if y >= x { "+" } else { "" };
    Some(format!("{sign}{}", format_si(y - x, after.dimension, units)))
}

/// The last row that may stand first.
#[must_use]
pub fn last_first(model: &Model, area: Rect) -> usize {
    rows(model, area.width).len().saturating_sub(usize::from(area.height.saturating_sub(1)))
}

/// Draws it from the row that the model is scrolled to.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    let rows = rows(model, area.width);
    super::draw_text(buffer, area, "Compare", &rows, model.compare_row, model.theme);
}
