//! The row of tabs above the large view.
use crate::tui::command::{Command, key_name};
use crate::tui::model::{Model, View};
use crate::tui::text::{cells, put};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

/// The tabs with their first columns; without padding, then without the blank after the key, then with short names, then
/// with the key alone beside the chosen one, where the row is too short.
fn placed(area: Rect, views: &[View], chosen: View) -> Vec<(View, String, u16)> {
    let bare: Vec<String> = views.iter().map(|&view| title(view)).collect();
    let padded: Vec<String> = bare.iter().map(|text| format!(" {text} ")).collect();
    let wide = |texts: &[String]| texts.iter().map(|text| cells(text) + 1).sum::<u16>();
    let close: Vec<String> =
        views.iter().map(|&view| format!("{}{}", key_name(Command::Show(view)), view.title())).collect();
    let brief: Vec<String> =
        views.iter().map(|&view| format!("{}{}", key_name(Command::Show(view)), view.short_title())).collect();
    let short = |&view: &View| if view == chosen { title(view) } else { key_name(Command::Show(view)) };
    let texts = match area.width {
        width if wide(&padded) <= width => padded,
        width if wide(&bare) <= width + 1 => bare,
        width if wide(&close) <= width + 1 => close,
        width if wide(&brief) <= width + 1 => brief,
        _ => views.iter().map(short).collect(),
    };
    let mut column = area.x;
    let mut tabs = Vec::new();
    for (&view, text) in views.iter().zip(texts) {
        let next = column + cells(&text) + 1;
        tabs.push((view, text, column));
        column = next;
    }
    tabs
}

fn title(view: View) -> String {
    format!("{} {}", key_name(Command::Show(view)), view.title())
}

/// Draws the tabs.
pub fn draw(buffer: &mut Buffer, area: Rect, views: &[View], model: &Model) {
    for (view, text, column) in placed(area, views, model.view) {
        let style = if view == model.view { model.theme.chosen(true) } else { model.theme.plain() };
        put(buffer, area, column - area.x, 0, &text, style);
    }
}

/// The view whose tab holds a column.
#[must_use]
pub fn view_at(area: Rect, views: &[View], chosen: View, column: u16) -> Option<View> {
    let tabs = placed(area, views, chosen);
    tabs.into_iter().find(|(_, text, left)| (*left..left + cells(text)).contains(&column)).map(|(view, ..)| view)
}
