//! First rows: file, basis, units, play head; the caution.
use crate::quantity::UnitSystem;
use crate::sheet::CAUTION_LINE;
use crate::tui::command::{Command, key_name};
use crate::tui::model::Model;
use crate::tui::text::{fit, put, put_right, width, wrap};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

/// Draws the header row.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    let inner = Rect { x: area.x + 1, width: area.width.saturating_sub(2), ..area };
    let right = right_words(model);
    let mark = mark(model);
    let room = usize::from(inner.width).saturating_sub(width(&right) + width(&mark) + 4);
    let name = model.document.path().file_name().map_or_else(String::new, |name| name.to_string_lossy().into_owned());
    let name = fit(&name, room);
    put(buffer, inner, 0, 0, &name, model.theme.heading());
    let column = u16::try_from(width(&name) + 2).unwrap_or(u16::MAX);
    let style = if model.changed_on_disk { model.theme.fault() } else { model.theme.play_head() };
    put(buffer, inner, column, 0, &mark, style);
    put_right(buffer, inner, 0, &right, model.theme.plain());
}

fn mark(model: &Model) -> String {
    let edited = if model.is_edited() { "edited" } else { "" };
    let changed = if model.changed_on_disk { "changed on disk" } else { "" };
    [edited, changed].into_iter().filter(|word| !word.is_empty()).collect::<Vec<_>>().join(", ")
}

fn right_words(model: &Model) -> String {
    let basis = model.document.scenario().limits.basis.as_deref().unwrap_or("no limits");
    let units = match model.units {
        UnitSystem::Metric => "metric",
        UnitSystem::Us => "US units",
    };
    let clock = model.answer.report.as_ref().map_or_else(String::new, |report| {
        let ending = super::verdict::ending(&report.estimate);
        format!("{:.2} s of {:.2} s, {ending}", model.play.time_s, model.end_s())
    });
    format!("{}   {units}   {clock}   {} keys", fit(basis.trim(), 16), key_name(Command::Help))
}

/// Draws the caution over the whole width of its rows.
pub fn draw_caution(buffer: &mut Buffer, area: Rect, model: &Model) {
    let inner = Rect { x: area.x + 1, width: area.width.saturating_sub(2), ..area };
    buffer.set_style(area, model.theme.caution());
    for (row, line) in (0..).zip(wrap(CAUTION_LINE, usize::from(inner.width))) {
        put(buffer, inner, 0, row, &line, model.theme.caution());
    }
}
