//! The last row: a message, a question, or the keys.
use crate::tui::command::{COMMANDS, Command, Entry};
use crate::tui::model::{Mode, Model};
use crate::tui::text::{cells, fit, put, put_right};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

/// Draws it.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    let inner = Rect { x: area.x + 1, width: area.width.saturating_sub(2), ..area };
    let room = usize::from(inner.width);
    match (&model.mode, &model.notice) {
        (Mode::Leaving(_), _) => {
            let words = "unsaved changes: q again drops them and leaves, s saves, any other key stays";
            put(buffer, inner, 0, 0, &fit(words, room), model.theme.fault());
        }
        (Mode::Typing(typing), _) => {
            let words = typing.fault.as_deref().unwrap_or("enter takes the value, esc leaves it");
            let style = if typing.fault.is_some() { model.theme.fault() } else { model.theme.plain() };
            put(buffer, inner, 0, 0, &fit(words, room), style);
        }
        (_, Some(notice)) => {
            let style = if notice.is_fault { model.theme.fault() } else { model.theme.heading() };
            put(buffer, inner, 0, 0, &fit(&notice.words, room), style);
        }
        _ => draw_keys(buffer, inner, model),
    }
}

fn is_last(entry: &Entry) -> bool {
    matches!(entry.command, Command::Help | Command::Quit)
}

fn text(entry: &Entry) -> (String, &'static str) {
    (entry.keys.first().map_or_else(String::new, |key| key.name()), entry.label)
}

/// Help and quit stand at the right, always; the others as far as there is room.
fn draw_keys(buffer: &mut Buffer, area: Rect, model: &Model) {
    let last: Vec<String> = COMMANDS
        .iter()
        .filter(|entry| is_last(entry))
        .map(|entry| {
            let (key, label) = text(entry);
            format!("{key} {label}")
        })
        .collect();
    let last = last.join("   ");
    put_right(buffer, area, 0, &last, model.theme.key());
    let room = area.width.saturating_sub(cells(&last) + 2);
    let mut column = 0;
    for entry in COMMANDS.iter().filter(|entry| !entry.label.is_empty() && !is_last(entry)) {
        let (key, label) = text(entry);
        let wide = cells(&key) + 1 + cells(label);
        if column + wide > room {
            break;
        }
        put(buffer, area, column, 0, &key, model.theme.key());
        put(buffer, area, column + cells(&key) + 1, 0, label, model.theme.plain());
        column += wide + 3;
    }
}
