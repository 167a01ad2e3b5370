//! The bar of a walk-through: the stop, its sentence, what it changed and what that did.
use crate::scenario::Stop;
use crate::sheet::{Report, governing_step, peak_step, stop_changes_words, verdict_step};
use crate::tui::command::{Command, key_name};
use crate::tui::model::Model;
use crate::tui::text::{put, width, wrap};
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
    let mut lines = vec![(head(model, walking, room), theme.play_head())];
    let mut put = |text: &str, style: Style| lines.extend(wrap(text, room).into_iter().map(|line| (line, style)));
    let is_roomy = model.size.height >= ROOMY_FROM;
    if is_roomy {
        put("", theme.plain());
    }
    put(&sentence(walking), theme.heading());
    if is_roomy {
        put("", theme.plain());
    }
    did(model, walking).iter().for_each(|line| put(line, theme.plain()));
    put(&file_words(model, walking), if model.is_edited() { theme.fault() } else { theme.quiet() });
    lines
}

/// `stop 2 of 6: a low scaffold`, over the whole width.
fn head(model: &Model, walking: &Walking, room: usize) -> String {
    let count = walking.walk.stops.len();
    let place =
        if walking.at == 0 { format!("start, {count} stops") } else { format!("stop {} of {count}", walking.at) };
    let title = walking.walk.title.as_ref().map_or_else(String::new, |title| format!(": {title}"));
    let by_hand = if model.is_at_stop() { "" } else { "  (changed by hand since)" };
    let fitted = crate::tui::text::fit(&title, room.saturating_sub(width(&place) + width(by_hand)));
    let words = format!("{place}{fitted}{by_hand}");
    let blanks = room.saturating_sub(width(&words));
    words + &" ".repeat(blanks)
}

fn sentence(walking: &Walking) -> String {
    walking.stop().map_or_else(
        || format!("The scenario as its file has it; {} goes to the first stop.", key_name(Command::WalkOn)),
        |stop| stop.say.clone(),
    )
}

/// What was changed and what that did, at typical values.
fn did(model: &Model, walking: &Walking) -> Vec<String> {
    let mut lines = Vec::new();
    let [before, own] = &walking.runs;
    let is_changing = walking.stop().is_some_and(Stop::is_changing);
    let before = before.as_deref().ok().filter(|_| is_changing);
    if let Some(stop) = walking.stop() {
        lines.push(
            stop_changes_words(stop)
                .map_or_else(|| "changed nothing here".to_owned(), |words| format!("changed {words}")),
        );
    }
    match own {
        Ok(report) => lines.push(steps(model, before, report)),
        Err(why) => lines.push(format!("cannot be computed here: {why}")),
    }
    lines
}

fn steps(model: &Model, before: Option<&Report>, own: &Report) -> String {
    let (margin, peak) = (governing_step(before, own, model.units), peak_step(before, own, model.units));
    let at = if model.has_bands() { " at typical values" } else { "" };
    format!("margin {margin}   peak {peak}   {}{at}", verdict_step(before, own))
}

fn file_words(model: &Model, walking: &Walking) -> String {
    let name =
        walking.walk.start.path().file_name().map_or_else(String::new, |name| name.to_string_lossy().into_owned());
    if model.is_edited() {
        format!("the values on show differ from {name}, which is not written unless you save")
    } else {
        format!("the values on show are those of {name}")
    }
}
