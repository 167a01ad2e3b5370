//! What a stop of a walk-through changed and what that did, in words.
use super::Report;
use super::words::{margin_value, signed};
use crate::margin::Margin;
use crate::quantity::{Dimension, UnitSystem, format_si};
use crate::scenario::Stop;

/// `line.length 2 m -> 1.2 m; took out line.slack`; none where the stop only speaks.
#[must_use]
pub fn stop_changes_words(stop: &Stop) -> Option<String> {
    let side = |words: &Option<String>| words.clone().unwrap_or_else(|| "not stated".to_owned());
    let change = |change: &crate::scenario::StopChange| {
        let same = if change.before.as_ref() == Some(&change.after) { " (as it was)" } else { "" };
        format!("{} {} -> {}{same}", change.path, side(&change.before), change.after)
    };
    let mut words: Vec<String> = stop.changes.iter().map(change).collect();
    if !stop.taken_out.is_empty() {
        words.push(format!("took out {}, which no longer applies", stop.taken_out.join(", ")));
    }
    if words.is_empty() { None } else { Some(words.join("; ")) }
}

/// The governing margin at typical values before and after: `clearance ground -0.938 m -> +0.123 m (+1.06 m)`, or with
/// both names where another check governs now.
#[must_use]
pub fn governing_step(before: Option<&Report>, after: &Report, system: UnitSystem) -> String {
    let Some(now) = after.margins.first() else { return "nothing to judge".to_owned() };
    let Some(then) = before.and_then(|report| report.margins.first()) else {
        return format!("{} {}", now.label, room(now, system));
    };
    if then.id != now.id {
        return format!("{} {} -> {} {}", then.label, room(then, system), now.label, room(now, system));
    }
    let step = then.margin.zip(now.margin).map_or_else(String::new, |(then, to)| {
        let step = to - then;
        format!(" ({})", signed(step, &margin_value(now, step, system)))
    });
    format!("{} {} -> {}{step}", now.label, room(then, system), room(now, system))
}

/// Room left with its sign; `open` where it cannot be told.
fn room(margin: &Margin, system: UnitSystem) -> String {
    margin.margin.map_or_else(|| "open".to_owned(), |room| signed(room, &margin_value(margin, room, system)))
}

/// The largest arrest force before and after: `4.00 kN -> 4.80 kN (+0.80 kN)`.
#[must_use]
pub fn peak_step(before: Option<&Report>, after: &Report, system: UnitSystem) -> String {
    let show = |si: f64| format_si(si, Dimension::Force, system);
    let peak = |report: &Report| report.estimate.numbers.get("arrest_force_peak");
    match (before.and_then(peak), peak(after)) {
        (Some(then), Some(now)) => {
            format!("{} -> {} ({})", show(then), show(now), signed(now - then, &show(now - then)))
        }
        (None, Some(now)) => show(now),
        (_, None) => "none".to_owned(),
    }
}

/// The verdicts at typical values before and after: `x short -> o holds`.
#[must_use]
pub fn verdict_step(before: Option<&Report>, after: &Report) -> String {
    let word = |report: &Report| format!("{} {}", report.verdict.symbol(), report.verdict.word());
    match before {
        Some(then) if then.verdict != after.verdict => format!("{} -> {}", word(then), word(after)),
        Some(_) => format!("{}, as before", word(after)),
        None => word(after),
    }
}
