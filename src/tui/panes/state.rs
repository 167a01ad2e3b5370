//! Where a study is, in a line: how far, how long still, or why there is nothing.
use crate::tui::command::{Command, key_name};
use crate::tui::model::Model;
use crate::tui::studies::{Lane, Progress, State};
use crate::tui::text::{put, put_wrapped};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;

/// The words for a study that is not done; none when it is.
#[must_use]
pub fn words(model: &Model, lane: Lane) -> Option<(String, Style)> {
    let (theme, title) = (model.theme, lane.title());
    let (stop, again) = (key_name(Command::Stop), key_name(Command::Again));
    match &model.shelf.slot(lane).state {
        State::Done(_) | State::Idle => None,
        State::Running(progress) => Some((format!("{title}: {}; {stop} stops it", far(progress)), theme.play_head())),
        State::Stopped => Some((format!("{title} stopped: {again} starts it again"), theme.heading())),
        State::Failed(why) => Some((format!("no {title}: {why}"), theme.fault())),
    }
}

/// `43 % done, about 2 s left`.
fn far(progress: &Progress) -> String {
    if progress.done == 0 {
        return "waiting for its turn".to_owned();
    }
    match (progress.share(), progress.left_s()) {
        (Some(share), Some(left)) => format!("{:.0} % done, about {} left", share * 100.0, duration(left)),
        _ => format!("{} runs so far", grouped(progress.done)),
    }
}

fn duration(seconds: f64) -> String {
    if seconds < 1.5 {
        "1 s".to_owned()
    } else if seconds < 100.0 {
        format!("{seconds:.0} s")
    } else {
        format!("{:.0} min", seconds / 60.0)
    }
}

/// A count with a comma between thousands.
#[must_use]
pub fn grouped(count: usize) -> String {
    let digits = count.to_string();
    let mut text = String::new();
    for (index, digit) in digits.chars().enumerate() {
        if index > 0 && (digits.len() - index).is_multiple_of(3) {
            text.push(',');
        }
        text.push(digit);
    }
    text
}

/// Draws it below the title of a view that has nothing else to show yet.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model, lane: Lane, nothing: &str) {
    let inner = Rect {
        x: area.x + 1.min(area.width),
        y: area.y + 2.min(area.height),
        width: area.width.saturating_sub(2),
        height: area.height.saturating_sub(2),
    };
    let (text, style) = words(model, lane).unwrap_or_else(|| (nothing.to_owned(), model.theme.plain()));
    put_wrapped(buffer, inner, &text, style);
    let State::Running(progress) = &model.shelf.slot(lane).state else { return };
    if let (Some(share), true) = (progress.share(), inner.height > 3) {
        let room = inner.width.min(42).saturating_sub(2);
        let full = usize::from(super::plot::place(share, room));
        let bar = format!("[{}{}]", "#".repeat(full), ".".repeat(usize::from(room).saturating_sub(full)));
        put(buffer, inner, 0, 3, &bar, model.theme.plain());
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::time::Duration;

    #[test]
    fn counts_are_grouped_by_thousands() {
        assert_eq!([7, 999, 1000, 16384, 1_048_576].map(grouped), ["7", "999", "1,000", "16,384", "1,048,576"]);
    }

    #[test]
    fn the_time_left_follows_from_the_pace() {
        let progress = Progress { done: 250, of: Some(1000), passed: Duration::from_secs(2) };
        assert_eq!(far(&progress), "25 % done, about 6 s left");
        assert_eq!(far(&Progress { of: None, ..progress }), "250 runs so far");
        assert_eq!(far(&Progress::default()), "waiting for its turn");
    }
}
