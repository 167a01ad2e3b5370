//! The play bar below the view.
use super::plot::place;
use crate::tui::model::Model;
use crate::tui::text::put;
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

/// Columns of the words before the bar.
pub const WORDS: u16 = 26;

/// Draws words and bar.
pub fn draw(buffer: &mut Buffer, area: Rect, bar: Rect, model: &Model) {
    if area.height == 0 || model.answer.report.is_none() {
        return;
    }
    let state = if model.play.running { "playing" } else { "paused " };
    let words = format!("{state} {:>5} {:>8.3} s", model.play.rate().1, model.play.time_s);
    put(buffer, area, 0, 0, &words, model.theme.plain());
    let window = model.window_s();
    let column = |time: f64| place((time - window.0) / (window.1 - window.0), bar.width);
    put(buffer, bar, 0, 0, &"─".repeat(usize::from(bar.width)), model.theme.quiet());
    for event in model.answer.report.iter().flat_map(|report| &report.estimate.events) {
        if (window.0..=window.1).contains(&event.time_s) {
            put(buffer, bar, column(event.time_s), 0, "┼", model.theme.quiet());
        }
    }
    put(buffer, bar, column(model.play.time_s), 0, "█", model.theme.play_head());
}
