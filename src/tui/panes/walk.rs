//! The bar of a walk-through: the stop, its sentence, what it changed and what that did.
use crate::scenario::Stop;
use crate::sheet::{Report, governing_step, peak_step, stop_changes_words, verdict_step};
use crate::tui::command::{Command, key_name};
use crate::tui::model::Model;
use crate::tui::text::{fit, put, width, wrap};
use crate::tui::walking::Walking;
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;

/// From this height on blank rows set the sentence apart.
const ROOMY_FROM: u16 = 32;

/// Rows of the bar; none without a walk.
#[must_use]
pub fn rows(model: &Model) -> u16 {
    let count = lines(model).len();
    u16::try_from(count).unwrap_or(u16::MAX).min(model.size.height / 2)
}

/// Draws it.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    let inner = Rect { x: area.x + 1, width: area.width.saturating_sub(2), ..area };
    for (row, (line, style)) in (0..area.height).zip(lines(model)) {
        put(buffer, inner, 0, row, &line, style);
    }
}

fn lines(model: &Model) -> Vec<(String, Style)> {
    let Some(walking) = &model.walking else { return Vec::new() };
    let room = usize::from(model.size.width.saturating_sub(2));
    let theme = model.theme;
    let gap = (model.size.height >= ROOMY_FROM).then(|| (String::new(), theme.plain()));
    let mut lines = vec![(head(model, walking, room), theme.play_head())];
    lines.extend(gap.clone());
    lines.extend(wrap(&sentence(walking), room).into_iter().map(|line| (line, theme.heading())));
    lines.extend(gap);
    lines.extend(filled(&did(model, walking), room).into_iter().map(|line| (line, theme.plain())));
    lines
}

/// Texts beside each other as long as there is room; one that is too long is wrapped on its own.
fn filled(texts: &[String], room: usize) -> Vec<String> {
    let mut rows: Vec<String> = Vec::new();
    for text in texts {
        match rows.last_mut() {
            Some(last) if width(last) + 3 + width(text) <= room => {
                last.push_str("   ");
                last.push_str(text);
            }
            _ => rows.extend(wrap(text, room)),
        }
    }
    rows
}

/// `stop 2 of 6: a low scaffold`, and at the right end how the values stand to the file.
fn head(model: &Model, walking: &Walking, room: usize) -> String {
    let count = walking.walk.stops.len();
    let place = if walking.at == 0 {
        format!("start, {count} stop{}", if count == 1 { "" } else { "s" })
    } else {
        format!("stop {} of {count}", walking.at)
    };
    let title = walking.walk.title.as_ref().map_or_else(String::new, |title| format!(": {title}"));
    let taken = width(&place) + 2;
    let right = file_words(model, walking, [room.saturating_sub(taken + width(&title)), room.saturating_sub(taken)]);
    let left = format!("{place}{}", fit(&title, room.saturating_sub(width(&place) + width(&right) + 2)));
    let blanks = room.saturating_sub(width(&left) + width(&right));
    format!("{left}{}{right}", " ".repeat(blanks))
}

fn sentence(walking: &Walking) -> String {
    walking.stop().map_or_else(
        || format!("The scenario as its file has it; {} goes to the first stop.", key_name(Command::WalkOn)),
        |stop| stop.say.clone(),
    )
}

/// What was changed and what that did, at typical values.
fn did(model: &Model, walking: &Walking) -> Vec<String> {
    let stop = walking.stop();
    let mut texts = Vec::new();
    if let Some(stop) = stop {
        let words = stop_changes_words(stop).unwrap_or_else(|| "nothing".to_owned());
        texts.push(format!("changed {words}"));
    }
    let [before, own] = &walking.runs;
    let is_changing = stop.is_some_and(Stop::is_changing);
    let before = before.as_deref().ok().filter(|_| is_changing);
    match own {
        Ok(report) => texts.extend(steps(model, before, report)),
        Err(why) => texts.push(format!("cannot be computed here: {why}")),
    }
    texts
}

fn steps(model: &Model, before: Option<&Report>, own: &Report) -> [String; 3] {
    let at = if model.has_bands() { " (at typical values)" } else { "" };
    [
        format!("margin {}", governing_step(before, own, model.units)),
        format!("peak {}", peak_step(before, own, model.units)),
        format!("{}{at}", verdict_step(before, own)),
    ]
}

/// How the values on show stand to the file and to the stop: with the file's name where there is room for it beside the
/// title as well.
fn file_words(model: &Model, walking: &Walking, [beside_title, room]: [usize; 2]) -> String {
    let path = walking.walk.start.path();
    let name = path.file_name().map_or_else(String::new, |name| name.to_string_lossy().into_owned());
    let by_hand = if model.is_at_stop() { "" } else { "changed by hand; " };
    let (verb, rest) = if model.is_edited() { ("differs from", ", which is not written") } else { ("as in", "") };
    let long = format!("{by_hand}{verb} {name}{rest}");
    let middle = format!("{by_hand}{verb} the file{rest}");
    match (width(&long) <= beside_title, width(&middle) <= room) {
        (true, _) => long,
        (_, true) => middle,
        _ => format!("{by_hand}{verb} the file"),
    }
}
