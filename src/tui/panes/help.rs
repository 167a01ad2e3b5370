//! The help screen, generated from the table of commands.
use crate::margin::Verdict;
use crate::tui::command::{COMMANDS, Entry, Group};
use crate::tui::lean::Lean;
use crate::tui::model::Model;
use crate::tui::text::wrap;
use ratatui::Frame;
use ratatui::layout::Rect;
use ratatui::text::{Line, Span};
use ratatui::widgets::{Block, Clear, Paragraph};

/// Columns of the key names.
const KEYS: usize = 22;

/// Draws the list over everything below the verdict, scrolled by `row`.
pub fn draw(frame: &mut Frame, below: Rect, model: &Model, row: u16) {
    let width = below.width.min(100);
    let area = Rect { x: below.x + (below.width - width) / 2, width, ..below };
    let block = Block::bordered().title(" keys ").title_bottom(" up and down scroll, any other key closes ");
    let inner = block.inner(area);
    let lines = lines(model, usize::from(inner.width));
    let most = lines.len().saturating_sub(usize::from(inner.height));
    let row = row.min(u16::try_from(most).unwrap_or(0));
    frame.render_widget(Clear, area);
    frame.render_widget(Paragraph::new(lines).scroll((row, 0)).block(block), area);
}

fn lines(model: &Model, width: usize) -> Vec<Line<'static>> {
    let mut lines = Vec::new();
    for group in Group::ALL {
        lines.push(Line::from(Span::styled(group.title(), model.theme.heading())));
        for entry in COMMANDS.iter().filter(|entry| entry.group == group) {
            let keys: Vec<String> = entry.keys.iter().map(|key| key.name()).collect();
            push(&mut lines, &keys.join(", "), entry.help, width, model);
        }
    }
    lines.push(Line::from(Span::styled("mouse", model.theme.heading())));
    let mouse = [
        ("click", "choose an input, a check, a tab or an event"),
        ("drag", "on the play bar or in History: scrub; in Map: move the point"),
        ("wheel", "walk a list; over the text below the inputs: nudge; over the view: step in time"),
    ];
    for (name, words) in mouse {
        push(&mut lines, name, words, width, model);
    }
    lines.push(Line::from(Span::styled("symbols", model.theme.heading())));
    for lean in [Lean::More, Lean::Less, Lean::None, Lean::Unknown] {
        push(&mut lines, &format!("{} after an input", lean.symbol()), lean.words(), width, model);
    }
    for verdict in [Verdict::Holds, Verdict::Thin, Verdict::Short, Verdict::Open] {
        push(&mut lines, &format!("{} {}", verdict.symbol(), verdict.word()), meaning(verdict), width, model);
    }
    push(&mut lines, "? bands", "holds at the typical values; the worst in the bands is not known yet", width, model);
    lines
}

/// Every command of the screen in the order of this list: its heading, its keys, what they do.
#[must_use]
pub fn key_rows() -> Vec<(&'static str, String, &'static str)> {
    let names = |entry: &Entry| entry.keys.iter().map(|key| key.name()).collect::<Vec<_>>().join(", ");
    let rows = |group: Group| COMMANDS.iter().filter(move |entry| entry.group == group);
    let row = |group: Group| rows(group).map(move |entry| (group.title(), names(entry), entry.help));
    Group::ALL.into_iter().flat_map(row).collect()
}

const fn meaning(verdict: Verdict) -> &'static str {
    match verdict {
        Verdict::Holds => "the check holds",
        Verdict::Thin => "typical holds, the worst found in the bands does not",
        Verdict::Open => "cannot be judged: an input is missing or the model is not valid there",
        Verdict::Short => "typical does not hold",
    }
}

fn push(lines: &mut Vec<Line<'static>>, keys: &str, words: &str, width: usize, model: &Model) {
    let mut keys = format!("  {keys}");
    for text in wrap(words, width.saturating_sub(KEYS + 1)) {
        let head = Span::styled(format!("{keys:<KEYS$} "), model.theme.key());
        lines.push(Line::from(vec![head, Span::raw(text)]));
        keys.clear();
    }
}
