//! The nearest values at which every check holds, as text and JSON.
use super::page::{Page, Paint, Tone, pad};
use super::{CAUTION_LINE, CAUTIONS, Report};
use crate::margin::Verdict;
use crate::quantity::{format_measure, format_unit};
use crate::study::{Remedies, Remedy, Way};
use serde_json::{Value, json};

/// What these values are and are not.
pub const REMEDY_CAUTION: &str = "This is arithmetic on one input at a time at its typical values, not advice to buy, \
     lengthen, soften or move anything: each change must be confirmed by the competent person, for the real equipment \
     and place, and run again.";

/// The answers as text, smallest change first.
#[must_use]
pub fn remedy_text(report: &Report, found: &Remedies, paint: Paint) -> String {
    let mut page = Page::new(paint);
    page.wrapped("", CAUTION_LINE, Tone::Caution);
    page.wrapped("", REMEDY_CAUTION, Tone::Caution);
    page.gap();
    page.wrapped("file   ", &report.file, Tone::Plain);
    let lead = format!("{} {}  ", found.today.symbol(), found.today.word());
    let words = match found.today {
        Verdict::Holds => "every check holds at today's typical values: no change is worked out",
        _ => "at today's typical values; each line below changes one input alone so that every check holds",
    };
    page.wrapped(&lead, words, Tone::Verdict(found.today));
    page.gap();
    found.list.iter().for_each(|remedy| remedy_line(&mut page, remedy));
    page.heading("cautions");
    for words in CAUTIONS {
        page.wrapped("  ", words, Tone::Plain);
    }
    page.finish()
}

fn remedy_line(page: &mut Page, remedy: &Remedy) {
    let input = &remedy.input;
    let unit = input.measure.unit;
    let today = format_measure(&input.measure);
    let words = if let Some(way) = &remedy.way {
        let of = if way.of_range { "the range searched" } else { "today's value" };
        format!("{today} -> {} (changes by {:.1} % of {of}){}", way.written, way.relative * 100.0, others(way))
    } else {
        let (low, high) = (format_unit(remedy.range.0, unit), format_unit(remedy.range.1, unit));
        format!("{today}: none within its range, {low} to {high}")
    };
    page.wrapped(&format!("  {} ", pad(&input.path, 24)), &words, Tone::Plain);
}

fn others(way: &Way) -> String {
    if way.ways > 1 {
        format!("; every check holds in {} separate stretches of its range, this is the nearest", way.ways)
    } else {
        String::new()
    }
}

/// The answers as a JSON object, SI units.
#[must_use]
pub fn remedy_object(report: &Report, found: &Remedies) -> Value {
    let cautions: Vec<&str> = std::iter::once(REMEDY_CAUTION).chain(CAUTIONS.iter().copied()).collect();
    json!({
        "file": report.file,
        "scenario_sha256": report.scenario_sha256,
        "version": env!("CARGO_PKG_VERSION"),
        "verdict": found.today.word(),
        "cautions": cautions,
        "remedies": found.list.iter().map(remedy_json).collect::<Vec<_>>(),
    })
}

fn remedy_json(remedy: &Remedy) -> Value {
    let way = remedy.way.as_ref();
    json!({
        "path": remedy.input.path,
        "today": remedy.input.measure.si(),
        "unit": super::json::si_unit(remedy.input.measure.dimension()),
        "range": [remedy.range.0, remedy.range.1],
        "value": way.map(|w| w.value),
        "written": way.map(|w| w.written.clone()),
        "relative_change": way.map(|w| w.relative),
        "relative_to": way.map(|w| if w.of_range { "range" } else { "today" }),
        "ways": way.map_or(0, |w| w.ways),
    })
}
