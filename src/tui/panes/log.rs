//! The event log: what the fall does, in the words every output uses.
use crate::estimate::Event;
use crate::tui::model::Model;
use crate::tui::text::{put, wrap};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

/// Columns of marker, time and unit.
const TIME: u16 = 12;

/// One row: the event it belongs to and its text.
struct Row {
    event: usize,
    text: String,
    is_first: bool,
}

fn events(model: &Model) -> &[Event] {
    model.answer.report.as_ref().map_or(&[], |report| &report.estimate.events)
}

fn rows(model: &Model, width: u16) -> Vec<Row> {
    let room = usize::from(width.saturating_sub(TIME));
    let mut rows = Vec::new();
    for (event, entry) in events(model).iter().enumerate() {
        for (line, text) in wrap(&entry.words(model.units), room).into_iter().enumerate() {
            rows.push(Row { event, text, is_first: line == 0 });
        }
    }
    rows
}

/// The event at or before the play head.
fn current(model: &Model) -> Option<usize> {
    events(model).iter().rposition(|event| event.time_s <= model.play.time_s + 1e-9)
}

fn first_shown(rows: &[Row], current: Option<usize>, shown: usize) -> usize {
    let at = rows.iter().position(|row| Some(row.event) == current).unwrap_or(0);
    crate::tui::layout::scroll(at, rows.len(), shown)
}

/// Draws title and rows.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    if area.height < 2 {
        return;
    }
    put(buffer, area, 0, 0, "what the fall does", model.theme.heading());
    let rows = rows(model, area.width);
    let current = current(model);
    let shown = usize::from(area.height - 1);
    let first = first_shown(&rows, current, shown);
    for (line, row) in (1..).zip(rows.iter().skip(first).take(shown)) {
        let is_current = Some(row.event) == current;
        let style = if is_current { model.theme.play_head() } else { model.theme.plain() };
        if row.is_first {
            let mark = if is_current { '>' } else { ' ' };
            let time = format!("{mark}{:>8.3} s", events(model)[row.event].time_s);
            put(buffer, area, 0, line, &time, style);
        }
        put(buffer, area, TIME, line, &row.text, style);
    }
}

/// The time of the event in a terminal row.
#[must_use]
pub fn time_at(model: &Model, area: Rect, row: u16) -> Option<f64> {
    let line = usize::from(row.checked_sub(area.y + 1)?);
    let rows = rows(model, area.width);
    let first = first_shown(&rows, current(model), usize::from(area.height.saturating_sub(1)));
    let found = rows.get(first + line)?;
    Some(events(model)[found.event].time_s)
}
