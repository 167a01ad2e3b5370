//! First rows: file, basis, units, play head; the caution.
use crate::quantity::UnitSystem;
use crate::sheet::CAUTION_LINE;
use crate::tui::command::{Command, key_name};
use crate::tui::model::Model;
use crate::tui::text::{fit, put, put_right, width, wrap};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

/// Columns that the name of the file keeps at least.
const LEAST_NAME: usize = 14;

/// Draws the header row.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    let inner = Rect { x: area.x + 1, width: area.width.saturating_sub(2), ..area };
    let mark = mark(model);
    let all = usize::from(inner.width).saturating_sub(width(&mark) + 4);
    let right = right_words(model, all.saturating_sub(LEAST_NAME));
    let name = model.document.path().file_name().map_or_else(String::new, |name| name.to_string_lossy().into_owned());
    let name = fit(&name, all.saturating_sub(width(&right)));
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

/// Basis, units, play head and the key of the help, as much of it as there is room for.
fn right_words(model: &Model, room: usize) -> String {
    let basis = fit(model.document.scenario().limits.basis.as_deref().unwrap_or("no limits").trim(), 16);
    let units = match model.units {
        UnitSystem::Metric => "metric",
        UnitSystem::Us => "US units",
    };
    let (clock, short_clock) = clock(model);
    let help = format!("{} keys", key_name(Command::Help));
    let choices = [
        format!("{basis}   {units}   {clock}   {help}"),
        format!("{basis}   {units}   {short_clock}   {help}"),
        format!("{units}   {short_clock}   {help}"),
        format!("{units}   {help}"),
    ];
    let [.., last] = choices.clone();
    choices.into_iter().find(|words| width(words) <= room).unwrap_or(last)
}

/// Where the play head is, long and short.
fn clock(model: &Model) -> (String, String) {
    let Some(report) = model.answer.current() else { return ("no current run".to_owned(), "no run".to_owned()) };
    let ending = super::verdict::ending(&report.estimate);
    let short = format!("{:.2} s of {:.2} s", model.play.time_s, model.end_s());
    (format!("{short}, {ending}"), short)
}

/// Draws the caution over the whole width of its rows.
pub fn draw_caution(buffer: &mut Buffer, area: Rect, model: &Model) {
    let inner = Rect { x: area.x + 1, width: area.width.saturating_sub(2), ..area };
    buffer.set_style(area, model.theme.caution());
    for (row, line) in (0..).zip(wrap(CAUTION_LINE, usize::from(inner.width))) {
        put(buffer, inner, 0, row, &line, model.theme.caution());
    }
}
