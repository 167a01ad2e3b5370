//! Two scenarios beside each other, as text and JSON.
use super::band_words::{report_margin_object, worst_words};
use super::json::si_unit;
use super::page::{Page, Paint, Tone, pad};
use super::words::margin_words;
use super::{CAUTION_LINE, CAUTIONS, Report};
use crate::estimate::{Number, Value as NumberValue, definition};
use crate::margin::Margin;
use crate::quantity::{Band, Measure, Shape, UnitSystem, format_si};
use crate::study::{Comparison, InputChange, NumberChange, Side, VerdictChange, compare};
use serde_json::{Value, json};

/// What differs between two reports; the texts are those of their files.
#[must_use]
pub fn comparison(a: (&str, &Report), b: (&str, &Report)) -> Comparison {
    compare(&side(a), &side(b))
}

fn side<'a>((text, report): (&'a str, &'a Report)) -> Side<'a> {
    Side { text, scenario: &report.scenario, numbers: &report.estimate.numbers, margins: &report.margins }
}

/// The comparison of `a` (first) and `b` (second) as text.
#[must_use]
pub fn compare_text(found: &Comparison, a: &Report, b: &Report, system: UnitSystem, paint: Paint) -> String {
    let mut page = Page::new(paint);
    page.wrapped("", CAUTION_LINE, Tone::Caution);
    page.gap();
    for (lead, report) in [("first  ", a), ("second ", b)] {
        let words = format!("{} {}  {}", report.verdict.symbol(), report.verdict.word(), report.file);
        page.wrapped(lead, &words, Tone::Verdict(report.verdict));
    }
    page.heading("inputs that differ");
    none(&mut page, found.inputs.is_empty());
    found.inputs.iter().for_each(|change| input_line(&mut page, change));
    page.heading("verdicts that changed");
    none(&mut page, found.verdicts.is_empty());
    found.verdicts.iter().for_each(|change| verdict_lines(&mut page, change, [a, b], system));
    page.heading("numbers that differ");
    none(&mut page, found.numbers.is_empty());
    found.numbers.iter().for_each(|change| number_line(&mut page, change, system));
    page.heading("cautions");
    for words in CAUTIONS {
        page.wrapped("  ", words, Tone::Plain);
    }
    page.finish()
}

fn none(page: &mut Page, empty: bool) {
    if empty {
        page.line("  none", Tone::Plain);
    }
}

fn input_line(page: &mut Page, change: &InputChange) {
    let side = |words: &Option<String>| words.clone().unwrap_or_else(|| "not stated".to_owned());
    let words = format!("{} -> {}", side(&change.before), side(&change.after));
    page.wrapped(&format!("  {} ", pad(&change.path, 34)), &words, Tone::Plain);
}

fn verdict_lines(page: &mut Page, change: &VerdictChange, reports: [&Report; 2], system: UnitSystem) {
    let word = |m: Option<&Margin>| {
        m.map_or_else(|| "not checked".to_owned(), |m| format!("{} {}", m.verdict.symbol(), m.verdict.word()))
    };
    let (before, after) = (change.before.as_ref(), change.after.as_ref());
    let label = after.or(before).map_or("", |m| m.label.as_str());
    let tone = after.map_or(Tone::Plain, |m| Tone::Verdict(m.verdict));
    page.wrapped(&format!("  {} ", pad(label, 34)), &format!("{} -> {}", word(before), word(after)), tone);
    for (lead, margin, report) in [("    first   ", before, reports[0]), ("    second  ", after, reports[1])] {
        if let Some(margin) = margin {
            let worst = worst_words(report, margin, system).map_or(String::new(), |words| format!("; {words}"));
            page.wrapped(lead, &format!("{}{worst}", margin_words(&report.scenario, margin, system)), Tone::Plain);
        }
    }
}

fn number_line(page: &mut Page, change: &NumberChange, system: UnitSystem) {
    let show = |number: &Option<Number>| match number {
        None => "none".to_owned(),
        Some(Number { value: NumberValue::Text(words), .. }) => words.clone(),
        Some(Number { value: NumberValue::Number(value), dimension, .. }) => format_si(*value, *dimension, system),
    };
    let id = number_id(change);
    let label = definition(id).map_or(id, |d| d.label);
    let name = id.split_once('.').map_or_else(|| label.to_owned(), |(_, of)| format!("{label} {of}"));
    let words = format!("{} -> {}", show(&change.before), show(&change.after));
    page.wrapped(&format!("  {} ", pad(&name, 34)), &words, Tone::Plain);
}

fn number_id(change: &NumberChange) -> &str {
    change.before.as_ref().or(change.after.as_ref()).map_or("", |n| n.id.as_str())
}

/// The comparison as a JSON object, SI units.
#[must_use]
pub fn compare_object(found: &Comparison, a: &Report, b: &Report) -> Value {
    let file =
        |r: &Report| json!({ "file": r.file, "scenario_sha256": r.scenario_sha256, "verdict": r.verdict.word() });
    let number = |n: &Option<Number>| match n.as_ref().map(|n| &n.value) {
        Some(NumberValue::Number(value)) => json!(value),
        Some(NumberValue::Text(words)) => json!(words),
        None => Value::Null,
    };
    json!({
        "first": file(a),
        "second": file(b),
        "version": env!("CARGO_PKG_VERSION"),
        "cautions": CAUTIONS,
        "second_is_worse": found.is_worse(),
        "inputs": found.inputs.iter().map(input_object).collect::<Vec<_>>(),
        "numbers": found.numbers.iter().map(|c| json!({
            "id": number_id(c),
            "unit": c.before.as_ref().or(c.after.as_ref()).map(|n| n.unit),
            "first": number(&c.before),
            "second": number(&c.after),
        })).collect::<Vec<_>>(),
        "verdicts": found.verdicts.iter().map(|c| json!({
            "first": c.before.as_ref().map(|m| report_margin_object(a, m)),
            "second": c.after.as_ref().map(|m| report_margin_object(b, m)),
            "worse": c.is_worse(),
        })).collect::<Vec<_>>(),
    })
}

/// One input that differs: as both files state it and, where it is a quantity, both bands in SI units.
fn input_object(change: &InputChange) -> Value {
    let shape = |shape: Shape| match shape {
        Shape::Uniform => "uniform",
        Shape::Triangular => "triangular",
        Shape::Normal => "normal",
    };
    let band = |measure: &Measure| {
        let Band { low, typical, high, shape: of } = measure.band;
        json!({ "low": low, "typical": typical, "high": high, "unit": si_unit(measure.dimension()), "shape": shape(of) })
    };
    let [first, second] = &change.measures;
    json!({
        "path": change.path,
        "first": change.before,
        "second": change.after,
        "first_band": first.as_ref().map(band),
        "second_band": second.as_ref().map(band),
    })
}
