//! The row of tabs above the large view.
use crate::tui::command::{Command, key_name};
use crate::tui::model::{Model, View};
use crate::tui::text::{cells, put};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

/// The command that shows a view.
#[must_use]
pub const fn command(view: View) -> Command {
    match view {
        View::Elevation => Command::Elevation,
        View::History => Command::History,
        View::Margins => Command::Margins,
    }
}

fn title(view: View) -> String {
    format!(" {} {} ", key_name(command(view)), view.title())
}

/// Draws the tabs.
pub fn draw(buffer: &mut Buffer, area: Rect, views: &[View], model: &Model) {
    let mut column = 0;
    for &view in views {
        let text = title(view);
        let style = if view == model.view { model.theme.chosen(true) } else { model.theme.quiet() };
        put(buffer, area, column, 0, &text, style);
        column += cells(&text) + 1;
    }
    if model.answer.is_stale() {
        put(buffer, area, column, 0, "NOT CURRENT", model.theme.fault());
    }
}

/// The view whose tab holds a column.
#[must_use]
pub fn view_at(area: Rect, views: &[View], column: u16) -> Option<View> {
    let mut left = area.x;
    for &view in views {
        let right = left + cells(&title(view));
        if (left..right).contains(&column) {
            return Some(view);
        }
        left = right + 1;
    }
    None
}
