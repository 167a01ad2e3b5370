//! The view Notes: what must be read beside the numbers.
use crate::sheet::CAUTIONS;
use crate::tui::model::Model;
use crate::tui::text::{put, wrap};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;

/// Columns before a sentence.
const INDENT: u16 = 2;

fn rows(model: &Model, width: u16) -> Vec<(u16, String, Style)> {
    let Some(report) = &model.answer.report else { return Vec::new() };
    let theme = model.theme;
    let validity: Vec<String> = report.estimate.validity.iter().map(|v| v.words(model.units)).collect();
    let cautions: Vec<String> = CAUTIONS.iter().map(|&words| words.to_owned()).collect();
    let parts = [
        ("warnings", &report.estimate.warnings, theme.fault()),
        ("not valid here", &validity, theme.fault()),
        ("limits", &report.limit_remarks, theme.plain()),
        ("assumptions", &report.estimate.assumptions, theme.plain()),
        ("cautions", &cautions, theme.plain()),
    ];
    let mut rows = Vec::new();
    for (title, sentences, style) in parts.into_iter().filter(|(_, sentences, _)| !sentences.is_empty()) {
        rows.push((0, title.to_owned(), theme.heading()));
        for sentence in sentences {
            let lines = wrap(sentence, usize::from(width.saturating_sub(INDENT + 2)));
            for (index, line) in lines.into_iter().enumerate() {
                let mark = if index == 0 { "- " } else { "  " };
                rows.push((INDENT, format!("{mark}{line}"), style));
            }
        }
    }
    rows
}

/// The last row that may stand first.
#[must_use]
pub fn last_first(model: &Model, area: Rect) -> usize {
    rows(model, area.width).len().saturating_sub(usize::from(area.height.saturating_sub(1)))
}

/// Draws the sentences from the row that the model is scrolled to.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    let rows = rows(model, area.width.saturating_sub(INDENT));
    let shown = usize::from(area.height.saturating_sub(1));
    let first = model.notes_row.min(rows.len().saturating_sub(shown));
    let below = rows.len().saturating_sub(first + shown);
    put(buffer, area, 0, 0, "Notes", model.theme.heading());
    let more = super::more_words(first, below);
    let words = if more.is_empty() { more } else { format!("{more} (page-up, page-down)") };
    put(buffer, area, 7, 0, &words, model.theme.quiet());
    for (line, (indent, text, style)) in (1..area.height).zip(rows.iter().skip(first)) {
        put(buffer, area, *indent, line, text, *style);
    }
}
