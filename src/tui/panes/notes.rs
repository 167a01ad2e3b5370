//! The view Notes: what must be read beside the numbers.
use crate::sheet::CAUTIONS;
use crate::tui::model::Model;
use crate::tui::text::wrap;
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
            let lines = wrap(sentence, usize::from(width.saturating_sub(2 * INDENT + 2)));
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
    let rows = rows(model, area.width);
    super::draw_text(buffer, area, "Notes", &rows, model.notes_row, model.theme);
}
