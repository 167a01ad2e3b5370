//! What the panes show: each draws itself from the model and nothing else.
pub mod about;
pub mod compare;
pub mod elevation;
pub mod end_loads;
pub mod foot;
pub mod header;
pub mod help;
pub mod history;
pub mod inputs;
pub mod ledger;
pub mod log;
pub mod map;
pub mod margins;
pub mod notes;
pub mod plot;
pub mod remedies;
pub mod scene;
pub mod side;
pub mod side_view;
pub mod spread;
pub mod state;
pub mod strings;
pub mod tabs;
pub mod timeline;
pub mod units;
pub mod vary;
pub mod verdict;
pub mod walk;

use crate::tui::text::{cells, put};
use crate::tui::theme::Theme;
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;

/// Draws a title and the rows of a text (column, words, style) from the row it is scrolled to.
pub(crate) fn draw_text(
    buffer: &mut Buffer,
    area: Rect,
    title: &str,
    rows: &[(u16, String, Style)],
    scrolled: usize,
    theme: Theme,
) {
    let shown = usize::from(area.height.saturating_sub(1));
    let first = scrolled.min(rows.len().saturating_sub(shown));
    let below = rows.len().saturating_sub(first + shown);
    put(buffer, area, 0, 0, title, theme.heading());
    let more = more_words(first, below);
    let words = if more.is_empty() { more } else { format!("{more} (page-up, page-down)") };
    put(buffer, area, cells(title) + 2, 0, &words, theme.quiet());
    for (line, (indent, text, style)) in (1..area.height).zip(rows.iter().skip(first)) {
        put(buffer, area, *indent, line, text, *style);
    }
}

/// How many rows of a list stand outside of what is shown: `3 above, 2 below`.
#[must_use]
pub(crate) fn more_words(above: usize, below: usize) -> String {
    match (above, below) {
        (0, 0) => String::new(),
        (0, below) => format!("{below} more below"),
        (above, 0) => format!("{above} more above"),
        (above, below) => format!("{above} above, {below} below"),
    }
}
