//! The list of inputs, in sections as the file has them.
use super::units::bare;
use crate::quantity::Measure;
use crate::scenario::Input;
use crate::tui::choice::Entry;
use crate::tui::edit::value_text;
use crate::tui::lean::Lean;
use crate::tui::model::{Mode, Model, Pane};
use crate::tui::text::{cells, fit, put, put_right, width};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;

/// One row of the list.
#[derive(Clone, Debug, PartialEq, Eq)]
enum Row {
    Section(String),
    Entry(usize),
}

/// `obstacle.2` and `top` of `obstacle.2.top`.
fn split(path: &str) -> (&str, &str) {
    path.rsplit_once('.').unwrap_or(("general", path))
}

/// The section in words, with the name of its obstacle or face.
fn section_title(section: &str, model: &Model) -> String {
    let words = section.replace(['.', '_'], " ");
    let scenario = model.document.scenario();
    let index = |number: &str| number.parse::<usize>().ok()?.checked_sub(1);
    let name = match section.split_once('.') {
        Some(("obstacle", number)) => index(number).and_then(|at| Some(&scenario.obstacles.get(at)?.name)),
        Some(("face", number)) => index(number).and_then(|at| Some(&scenario.faces.get(at)?.name)),
        _ => None,
    };
    name.map_or_else(|| words.clone(), |name| format!("{words}  {}", name.trim()))
}

fn rows(model: &Model) -> Vec<Row> {
    let mut rows = Vec::new();
    let mut last = "";
    for (index, entry) in model.entries.iter().enumerate() {
        let (section, _) = split(model.path_of(entry));
        if section != last {
            rows.push(Row::Section(section_title(section, model)));
            last = section;
        }
        rows.push(Row::Entry(index));
    }
    rows
}

fn first_shown(rows: &[Row], model: &Model, shown: usize) -> usize {
    let at = rows.iter().position(|row| *row == Row::Entry(model.input)).unwrap_or(0);
    crate::tui::layout::scroll(at, rows.len(), shown)
}

/// The entry in a terminal row.
#[must_use]
pub fn input_at(model: &Model, area: Rect, row: u16) -> Option<usize> {
    let line = usize::from(row.checked_sub(area.y + 1)?);
    let rows = rows(model);
    let first = first_shown(&rows, model, usize::from(area.height.saturating_sub(1)));
    match rows.get(first + line) {
        Some(Row::Entry(index)) => Some(*index),
        _ => None,
    }
}

/// Columns kept for values; a longer one takes from its label.
const MOST_VALUE: u16 = 10;

/// Columns of the list.
struct Columns {
    label: u16,
    value: u16,
    band: u16,
}

impl Columns {
    fn of(model: &Model, total: u16) -> Self {
        let widest = |texts: Vec<String>| texts.iter().map(|text| cells(text)).max().unwrap_or(0);
        let value = widest(model.entries.iter().map(|entry| entry_text(model, entry)).collect()).clamp(8, MOST_VALUE);
        let band = widest(model.inputs.iter().map(band_text).collect());
        let rest = total.saturating_sub(1 + value + 3);
        let band = if band > 0 && rest >= band + 1 + 20 { band + 1 } else { 0 };
        Self { label: rest - band, value, band }
    }
}

fn band_text(input: &Input) -> String {
    let Measure { band, unit, .. } = input.measure;
    if band.is_wide() { format!("{}..{}", bare(band.low, unit), bare(band.high, unit)) } else { String::new() }
}

/// Draws title and list.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    let columns = Columns::of(model, area.width);
    put(buffer, area, 0, 0, "Inputs", model.theme.heading());
    let rows = rows(model);
    let shown = usize::from(area.height.saturating_sub(1));
    let first = first_shown(&rows, model, shown);
    for (line, row) in (1..).zip(rows.iter().skip(first).take(shown)) {
        match row {
            Row::Section(title) => {
                put(buffer, area, 1, line, &fit(title, usize::from(area.width.saturating_sub(2))), model.theme.quiet());
            }
            Row::Entry(index) => {
                draw_entry(buffer, Rect { y: area.y + line, height: 1, ..area }, model, *index, &columns);
            }
        }
    }
    draw_scroll_marks(buffer, area, model, (first, shown, rows.len()));
}

/// How many rows stand above and below those shown.
fn draw_scroll_marks(buffer: &mut Buffer, area: Rect, model: &Model, (first, shown, count): (usize, usize, usize)) {
    let below = count.saturating_sub(first + shown);
    if first + below > 0 {
        put(buffer, area, 8, 0, &super::more_words(first, below), model.theme.quiet());
    }
}

/// The value of a number, or the word.
fn entry_text(model: &Model, entry: &Entry) -> String {
    match entry {
        Entry::Number(index) => model.inputs.get(*index).map_or_else(String::new, |input| value_text(&input.measure)),
        Entry::Word(choice) => choice.word.clone(),
    }
}

fn draw_entry(buffer: &mut Buffer, row: Rect, model: &Model, index: usize, columns: &Columns) {
    let Some(entry) = model.entries.get(index) else { return };
    let is_chosen = index == model.input;
    let style = if is_chosen { model.theme.chosen(model.pane == Pane::Inputs) } else { model.theme.plain() };
    if is_chosen {
        buffer.set_style(row, style);
        put(buffer, row, 0, 0, ">", style);
    }
    if let (true, Mode::Typing(typing)) = (is_chosen, &model.mode) {
        draw_label(buffer, row, &typing.path, columns.label.saturating_sub(1), style);
        let field = Rect { x: row.x + columns.label, width: row.width - columns.label, ..row };
        return draw_typing(buffer, field, model, typing);
    }
    let text = entry_text(model, entry);
    let values = Rect { width: 1 + columns.label + columns.value, ..row };
    put_right(buffer, values, 0, &text, style);
    draw_label(buffer, row, model.path_of(entry), values.width.saturating_sub(cells(&text) + 1), style);
    let Entry::Number(index) = *entry else { return };
    let band = Rect { x: values.right(), width: columns.band, ..row };
    put_right(buffer, band, 0, &model.inputs.get(index).map_or_else(String::new, band_text), style);
    let lean = model.leans.get(index).copied().unwrap_or(Lean::Unknown);
    put_right(buffer, row, 0, &format!("{} ", lean.symbol()), style);
}

/// The key in words, left of column `end`.
fn draw_label(buffer: &mut Buffer, row: Rect, path: &str, end: u16, style: Style) {
    let label = split(path).1.replace('_', " ");
    put(buffer, row, 2, 0, &fit(&label, usize::from(end.saturating_sub(2))), style);
}

fn draw_typing(buffer: &mut Buffer, area: Rect, model: &Model, typing: &crate::tui::model::Typing) {
    let plain = model.theme.plain();
    put(buffer, area, 0, 0, &" ".repeat(usize::from(area.width)), plain);
    buffer.set_style(area, Style::reset());
    let room = usize::from(area.width.saturating_sub(1));
    let text = typing.text.value();
    let skip = typing.text.visual_scroll(room.saturating_sub(1));
    let shown: String = text.chars().skip(skip).collect();
    put(buffer, area, 0, 0, &fit_hard(&shown, room), model.theme.heading());
    let cursor = u16::try_from(typing.text.visual_cursor().saturating_sub(skip)).unwrap_or(0);
    let under = text.chars().nth(typing.text.cursor()).unwrap_or(' ');
    put(buffer, area, cursor, 0, &under.to_string(), model.theme.chosen(true));
}

fn fit_hard(text: &str, room: usize) -> String {
    let mut kept = String::new();
    for symbol in text.chars() {
        if width(&kept) + 1 > room {
            break;
        }
        kept.push(symbol);
    }
    kept
}
