//! The view Remedies: for each input alone the nearest value at which every check holds.
use super::state;
use crate::margin::Verdict;
use crate::quantity::format_unit;
use crate::sheet::REMEDY_CAUTION;
use crate::study::{Held, Remedies, Remedy, Scale, Way, Without, Yard};
use crate::tui::command::{Command, key_name};
use crate::tui::edit::value_text;
use crate::tui::layout::scroll;
use crate::tui::model::{Model, Pane};
use crate::tui::studies::Lane;
use crate::tui::text::{cells, fit, put, put_right, put_wrapped, wrap};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

/// Rows of a remedy where the view is narrow and where it is wide.
const WIDE_FROM: u16 = 70;

fn rows_each(area: Rect) -> u16 {
    if area.width < WIDE_FROM { 2 } else { 1 }
}

/// The list between the title and the words below.
fn list_area(area: Rect) -> Rect {
    let words = words_rows(area);
    Rect { y: area.y + 1, height: area.height.saturating_sub(1 + words), ..area }
}

/// Rows of the caution with its key line; as many as it takes, but never more than half of the view.
fn words_rows(area: Rect) -> u16 {
    let lines = wrap(REMEDY_CAUTION, usize::from(area.width.saturating_sub(1))).len() + 1;
    u16::try_from(lines).unwrap_or(u16::MAX).min(area.height / 2)
}

/// The remedy in a terminal row.
#[must_use]
pub fn remedy_at(model: &Model, area: Rect, row: u16) -> Option<usize> {
    let found = model.shelf.remedies()?;
    let list = list_area(area);
    let line = usize::from(row.checked_sub(list.y).filter(|&line| line < list.height)? / rows_each(area));
    let first = scroll(model.remedy, found.list.len(), usize::from(list.height / rows_each(area)));
    (first + line < found.list.len()).then_some(first + line)
}

/// Draws it.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    let theme = model.theme;
    let title = match model.remedies_held() {
        Held::Typical => "Remedies at typical values",
        Held::Worst => "Remedies at the worst found",
    };
    let title = if area.width < WIDE_FROM { title.to_owned() } else { format!("{title}, one input alone") };
    put(buffer, area, 0, 0, &fit(&title, usize::from(area.width)), theme.heading());
    let words = Rect { y: area.bottom() - words_rows(area), height: words_rows(area), ..area };
    draw_caution(buffer, words, model);
    let list = list_area(area);
    match model.shelf.remedies() {
        None => {
            state::draw(buffer, Rect { height: list.height + 1, ..area }, model, Lane::Remedies, "nothing to work out");
        }
        Some(found) if found.today == Verdict::Holds => {
            let below = Rect { y: list.y + 1, height: list.height.saturating_sub(1), ..list };
            put_wrapped(buffer, below, &holding_words(model, found.wanted.held), theme.plain());
        }
        Some(found) => draw_list(buffer, list, model, found),
    }
}

/// Why there is no list: nothing falls short there.
fn holding_words(model: &Model, held: Held) -> String {
    match held {
        Held::Typical if model.has_bands() => {
            let key = key_name(Command::HeldAt);
            format!("every check holds at the typical values; `{key}` asks at the worst found")
        }
        Held::Typical => "every check holds at the typical values: no change is worked out".to_owned(),
        Held::Worst => "every check holds at the worst found in the bands: no change is worked out".to_owned(),
    }
}

/// The key that writes the chosen remedy, where there is one to write, and the caution.
fn draw_caution(buffer: &mut Buffer, area: Rect, model: &Model) {
    if model.chosen_way().is_some() {
        let [key, undo] = [Command::IntoInputs, Command::Undo].map(key_name);
        let long = format!("{key} writes the chosen one into the inputs, {undo} undoes");
        let short = format!("{key} writes it into the inputs, {undo} undoes");
        let keys = if cells(&long) <= area.width { long } else { short };
        put(buffer, area, 0, 0, &fit(&keys, usize::from(area.width)), model.theme.key());
    }
    let rest =
        Rect { y: area.y + 1, height: area.height.saturating_sub(1), width: area.width.saturating_sub(1), ..area };
    put_wrapped(buffer, rest, REMEDY_CAUTION, model.theme.quiet());
}

fn draw_list(buffer: &mut Buffer, area: Rect, model: &Model, found: &Remedies) {
    let each = rows_each(area);
    let shown = usize::from(area.height / each);
    let first = scroll(model.remedy, found.list.len(), shown);
    for (line, (index, remedy)) in (0..).zip(found.list.iter().enumerate().skip(first).take(shown)) {
        let row = Rect { y: area.y + line * each, height: each, ..area };
        draw_remedy(buffer, row, model, (remedy, found.yard.0), index == model.remedy);
    }
    let below = found.list.len().saturating_sub(first + shown);
    if first + below > 0 {
        let title = Rect { y: area.y - 1, height: 1, ..area };
        put_right(buffer, title, 0, &format!(" {}", super::more_words(first, below)), model.theme.quiet());
    }
}

/// The change, and how large it is or why there is none.
fn words(remedy: &Remedy, yard: Yard) -> (String, String) {
    let today = value_text(&remedy.input.measure);
    if let Some(way) = &remedy.way {
        let ways = if way.ways > 1 { format!(", nearest of {} ways", way.ways) } else { String::new() };
        if way.relative == 0.0 {
            return (format!("{today} -> {} exactly", way.shown), "its own band has to go".to_owned());
        }
        let exactly = if way.narrowed { " exactly" } else { "" };
        return (format!("{today} -> {}{exactly}", way.shown), format!("{}{ways}", share_words(way, yard)));
    }
    let unit = remedy.input.measure.unit;
    let (low, high) = (format_unit(remedy.range.0, unit), format_unit(remedy.range.1, unit));
    let why = match remedy.without {
        Some(Without::Unsettled) => format!("not settled in {low} to {high}"),
        Some(Without::Stopped) => "stopped".to_owned(),
        Some(Without::NoneInRange) | None => format!("none in {low} to {high}"),
    };
    (today, why)
}

/// What the change is a share of.
fn share_words(way: &Way, yard: Yard) -> String {
    let percent = way.relative * 100.0;
    match way.scale {
        Scale::Today(_) => format!("{percent:.1} % of its value"),
        Scale::Fall(size) => match yard {
            Yard::Line => format!("{percent:.1} % of the line's length"),
            Yard::TotalFall => format!("{percent:.1} % of the total fall"),
            Yard::Reach => format!("{percent:.1} % of {size:.0} m"),
        },
        Scale::One => format!("{percent:.1} % of 1"),
        Scale::Nothing => "from zero".to_owned(),
    }
}

fn draw_remedy(buffer: &mut Buffer, row: Rect, model: &Model, (remedy, yard): (&Remedy, Yard), is_chosen: bool) {
    let theme = model.theme;
    let base = if is_chosen { theme.chosen(model.pane == Pane::View) } else { theme.plain() };
    buffer.set_style(row, base);
    put(buffer, row, 0, 0, if is_chosen { ">" } else { " " }, base);
    let (change, note) = words(remedy, yard);
    let style = if remedy.way.is_some() { base } else { base.patch(theme.quiet()) };
    if row.height == 1 {
        put(buffer, row, 2, 0, &fit(&remedy.input.path, 22), style);
        put(buffer, row, 26, 0, &change, style);
        let start = 26 + cells(&change) + 2;
        let column = start.max(52);
        if column + cells(&note) <= row.width {
            put(buffer, row, column, 0, &note, style);
        }
        return;
    }
    let room = usize::from(row.width.saturating_sub(cells(&change) + 3));
    put(buffer, row, 2, 0, &fit(&remedy.input.path, room), style);
    put_right(buffer, row, 0, &change, style);
    put_right(buffer, row, 1, &note, style);
}
