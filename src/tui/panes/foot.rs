//! The last rows: a message, a question, or the keys.
use crate::study::Held;
use crate::tui::command::{COMMANDS, Command, Entry, Group};
use crate::tui::model::{Mode, Model, View};
use crate::tui::text::{cells, put, put_right, wrap};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;

/// Rows it takes: a long message takes up to three.
#[must_use]
pub fn rows(model: &Model, columns: u16) -> u16 {
    let (words, _) = words(model);
    crate::tui::layout::rows(&words, columns).min(3)
}

/// Draws it.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    let inner = Rect { x: area.x + 1, width: area.width.saturating_sub(2), ..area };
    let (words, style) = words(model);
    if words.is_empty() {
        return draw_keys(buffer, inner, model);
    }
    for (row, line) in (0..).zip(wrap(&words, usize::from(inner.width))) {
        put(buffer, inner, 0, row, &line, style);
    }
}

/// The message; none when the keys are to be shown.
fn words(model: &Model) -> (String, Style) {
    let theme = model.theme;
    match (&model.mode, &model.notice) {
        (Mode::Leaving(_), _) => {
            ("unsaved changes: q again drops them and leaves, s saves, any other key stays".to_owned(), theme.fault())
        }
        (Mode::Typing(typing), _) => match &typing.fault {
            Some(fault) => (fault.clone(), theme.fault()),
            None if !typing.before.is_empty() => {
                (format!("{}; enter takes it, esc leaves all as it was", super::about::wanted(typing)), theme.heading())
            }
            None => ("enter takes the value, esc leaves it".to_owned(), theme.plain()),
        },
        (_, Some(notice)) if notice.is_fault => (notice.words.clone(), theme.fault()),
        (_, Some(notice)) => (notice.words.clone(), theme.heading()),
        _ => (String::new(), theme.plain()),
    }
}

fn is_last(entry: &Entry) -> bool {
    matches!(entry.command, Command::Help | Command::Quit)
}

/// Whether a command of studies does something in the view on show.
fn is_of_view(model: &Model, entry: &Entry) -> bool {
    let is_running = model.shelf.running().next().is_some();
    match entry.command {
        Command::IntoInputs => model.view == View::Map || model.view == View::Remedies && model.chosen_way().is_some(),
        Command::AxisAcross | Command::AxisUp => model.view == View::Map,
        Command::HeldAt => model.view == View::Remedies && model.remedies_elsewhere().is_some(),
        Command::Keep => model.view == View::Compare,
        Command::Stop => is_running,
        Command::Again => !is_running && model.view == View::Spread && model.has_bands(),
        _ => false,
    }
}

fn text(entry: &Entry) -> (String, &'static str) {
    (entry.keys.first().map_or_else(String::new, |key| key.name()), entry.label)
}

/// Where the key of Remedies leads.
fn led_to(model: &Model) -> &'static str {
    if model.remedies_elsewhere() == Some(Held::Typical) { "at typical" } else { "at the worst" }
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
    let last = last.join("  ");
    put_right(buffer, area, 0, &last, model.theme.key());
    let room = area.width.saturating_sub(cells(&last) + 2);
    let mut column = 0;
    let named = |entry: &&Entry| !entry.label.is_empty() && !is_last(entry);
    let own = COMMANDS.iter().filter(named).filter(|entry| entry.group == Group::Study && is_of_view(model, entry));
    let walk = COMMANDS.iter().filter(named).filter(|entry| entry.group == Group::Walk && model.walking.is_some());
    let is_general = |entry: &&Entry| !matches!(entry.group, Group::Study | Group::Walk);
    let others = COMMANDS.iter().filter(named).filter(is_general);
    for entry in walk.chain(own).chain(others) {
        let (key, label) = text(entry);
        let label = if entry.command == Command::HeldAt { led_to(model) } else { label };
        let wide = cells(&key) + 1 + cells(label);
        if column + wide > room {
            break;
        }
        put(buffer, area, column, 0, &key, model.theme.key());
        put(buffer, area, column + cells(&key) + 1, 0, label, model.theme.plain());
        column += wide + 2;
    }
}
