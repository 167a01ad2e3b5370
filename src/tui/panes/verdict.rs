//! The verdict in a sentence.
use crate::estimate::{Estimate, EventKind};
use crate::margin::{Margin, Verdict};
use crate::quantity::{Dimension, UnitSystem, format_si};
use crate::sheet::{Report, governing_words, worst_words};
use crate::tui::command::{Command, key_name};
use crate::tui::joint::Word;
use crate::tui::model::{Model, View};
use crate::tui::text::{put, put_right, width, wrap};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

/// From this width on the sentence says where in the bands the worst found is.
const WORST_PLACE_FROM: u16 = 100;

/// Rows that the sentence and the peak force take.
#[must_use]
pub fn rows(model: &Model, columns: u16) -> u16 {
    let (sentence, peak) = words(model);
    u16::try_from(lines(&sentence, &peak, columns).len()).unwrap_or(1).min(4)
}

/// Draws it.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    let (sentence, peak) = words(model);
    let verdict = model.word_of_all().verdict();
    let lines = lines(&sentence, &peak, area.width);
    let inner = Rect { x: area.x + 1, width: area.width.saturating_sub(2), ..area };
    for (row, line) in (0..).zip(&lines) {
        put(buffer, inner, 0, row, line, model.theme.verdict(verdict));
    }
    if lines.len() == 1 {
        put_right(buffer, inner, 0, &peak, model.theme.heading());
    }
}

/// One line when sentence and peak fit beside each other, else the peak follows the wrapped sentence.
fn lines(sentence: &str, peak: &str, columns: u16) -> Vec<String> {
    let room = usize::from(columns.saturating_sub(2));
    if width(sentence) + width(peak) + 3 <= room {
        return vec![sentence.to_owned()];
    }
    let glue = if peak.is_empty() { "" } else { " - " };
    wrap(&format!("{sentence}{glue}{peak}"), room)
}

fn words(model: &Model) -> (String, String) {
    if let Some(fault) = &model.answer.fault {
        let rest = if model.answer.report.is_some() { "; the numbers below are of earlier inputs" } else { "" };
        return (format!("{}: {fault}{rest}", Word::Final(Verdict::Open).head()), String::new());
    }
    let Some(report) = &model.answer.report else { return (Word::Final(Verdict::Open).head(), String::new()) };
    let mut sentence = governing_words(&report.scenario, &report.margins, model.units);
    let moved = report.margins.first().filter(|margin| is_moved(report, margin));
    if let Some(worst) = moved.and_then(|margin| worst_words(report, margin, model.units)) {
        // Where it is narrow, Margins and Spread say at which ends of the bands that is.
        let brief = worst.split_once(" (").map_or(worst.as_str(), |(brief, _)| brief);
        let words = if model.size.width < WORST_PLACE_FROM { brief } else { &worst };
        sentence = format!("{sentence}; {words}");
    }
    (format!("{}  {sentence}", model.word_of_all().head()), peak(report, model.units))
}

/// Whether the bands change the margin at all.
fn is_moved(report: &Report, margin: &Margin) -> bool {
    let worst = report.band_of(margin).and_then(|band| band.worst.as_ref());
    worst.is_some_and(|worst| worst.margin != margin.margin)
}

fn peak(report: &Report, units: UnitSystem) -> String {
    let force = |si: f64| format_si(si, Dimension::Force, units);
    let Some(peak) = report.estimate.numbers.get("arrest_force_peak") else { return String::new() };
    let warnings = match report.estimate.warnings.len() {
        0 => String::new(),
        1 => format!(" (1 warning: key {})", key_name(Command::Show(View::Notes))),
        count => format!(" ({count} warnings: key {})", key_name(Command::Show(View::Notes))),
    };
    match force_limit(report) {
        Some(limit) => format!("peak {} of {}{warnings}", force(peak), force(limit)),
        None => format!("peak {}, no limit stated{warnings}", force(peak)),
    }
}

/// Limit of the arrest force, N.
#[must_use]
pub fn force_limit(report: &Report) -> Option<f64> {
    report.margins.iter().find(|margin| margin.id == "arrest_force")?.limit
}

/// The end of the run in a few words.
#[must_use]
pub fn ending(estimate: &Estimate) -> &'static str {
    let last = estimate.events.iter().rev().map(|event| event.kind);
    let mut told = last.filter_map(|kind| match kind {
        EventKind::TurnsBack => Some("turns back"),
        _ => None,
    });
    let settled = if estimate.numbers.get("settle_time").is_some() { "settled" } else { "not settled" };
    told.next().unwrap_or(settled)
}
