//! One input across a range, as text and CSV.
use super::page::{Page, Paint, Tone, pad, pad_left};
use super::{CAUTION_LINE, CAUTIONS, Report};
use crate::estimate::definition;
use crate::margin::{Check, Margin, Verdict, governing_first, worst};
use crate::quantity::{UnitSystem, format_si, format_unit};
use crate::study::{Crossing, Evaluator, Row, Variation};

/// Numbers of the text table with their heads.
const COLUMNS: [(&str, &str); 4] = [
    ("arrest_force_peak", "arrest force"),
    ("anchor_force_peak", "anchor force"),
    ("total_fall_distance", "total fall"),
    ("deployed_length", "deployed"),
];

/// What a row of verdicts is and is not.
pub const ROW_CAUTION: &str = "Every row is one run with all other inputs at their typical values: bands play no part in \
     it, so no row is `thin`.";

/// The table and the changes of verdict as text.
#[must_use]
pub fn vary_text(
    report: &Report,
    evaluator: &Evaluator,
    found: &Variation,
    system: UnitSystem,
    paint: Paint,
) -> String {
    let mut page = Page::new(paint);
    let Some(input) = evaluator.inputs().get(found.input) else { return String::new() };
    page.wrapped("", CAUTION_LINE, Tone::Caution);
    page.gap();
    page.wrapped("file   ", &report.file, Tone::Plain);
    let today = format_unit(input.measure.si(), input.measure.unit);
    page.wrapped("over   ", &format!("{} ({}), {today} in the file", input.path, input.field.label), Tone::Plain);
    page.wrapped("       ", ROW_CAUTION, Tone::Plain);
    page.gap();
    let heads: String = COLUMNS.iter().map(|(_, head)| pad_left(head, 14)).collect();
    page.line(&format!("{}{heads}  governing check", pad_left("value", 14)), Tone::Heading);
    found.rows.iter().for_each(|row| row_line(&mut page, evaluator, found, row, system));
    page.heading("where a verdict changes (refined, not read off the table)");
    if found.crossings.is_empty() {
        page.line("  nowhere in this range", Tone::Plain);
    }
    let alike = |a: &Crossing, b: &Crossing| shared(a) == shared(b);
    found.crossings.chunk_by(alike).for_each(|group| crossing_lines(&mut page, evaluator, found, group, system));
    page.wrapped("  ", "two changes of one check closer than a four-hundredth of the range can be missed", Tone::Faint);
    page.heading("cautions");
    for words in CAUTIONS {
        page.wrapped("  ", words, Tone::Plain);
    }
    page.finish()
}

fn shown(evaluator: &Evaluator, found: &Variation, value: f64, system: UnitSystem) -> String {
    let dimension = evaluator.inputs().get(found.input).and_then(|input| input.field.dimension);
    dimension.map_or_else(|| value.to_string(), |dimension| format_si(value, dimension, system))
}

fn row_line(page: &mut Page, evaluator: &Evaluator, found: &Variation, row: &Row, system: UnitSystem) {
    let mut line = pad_left(&shown(evaluator, found, row.value, system), 14);
    for (id, _) in COLUMNS {
        let dimension = definition(id).map(|d| d.dimension);
        let cell = row.run.numbers.get(id).zip(dimension).map_or("-".to_owned(), |(v, d)| format_si(v, d, system));
        line.push_str(&pad_left(&cell, 14));
    }
    let word = worst(row.run.checks.iter().map(|check| check.verdict));
    let verdict = format!("  {} {}  ", word.symbol(), pad(word.word(), 5));
    if let Some(failure) = &row.run.failure {
        let value = pad_left(&shown(evaluator, found, row.value, system), 14);
        return page.wrapped(&format!("{value}{verdict}"), &failure.to_string(), Tone::Verdict(word));
    }
    let why = governing(evaluator, row, system).map_or_else(|| "nothing to judge".to_owned(), |m| m.label);
    page.wrapped(&format!("{line}{verdict}"), &why, Tone::Verdict(word));
}

fn governing(evaluator: &Evaluator, row: &Row, system: UnitSystem) -> Option<Margin> {
    let first: Option<&Check> = row.run.checks.iter().min_by(|a, b| governing_first(a, b));
    first.map(|check| evaluator.margin(&row.run, check, system))
}

/// What checks have in common that change at one place for one reason, such as a run that fails.
fn shared(at: &Crossing) -> (u64, Verdict, Verdict, bool) {
    (at.value.to_bits(), at.below, at.above, at.through_zero)
}

fn crossing_lines(page: &mut Page, evaluator: &Evaluator, found: &Variation, group: &[Crossing], system: UnitSystem) {
    let Some(at) = group.first() else { return };
    let label = |at: &Crossing| {
        let nearest = found.rows.iter().find_map(|row| row.run.check(at.kind).map(|check| (row, check)));
        nearest.map_or(String::new(), |(row, check)| evaluator.margin(&row.run, check, system).label)
    };
    let labels = group.iter().map(label).collect::<Vec<_>>().join("; ");
    let how = if at.through_zero { "through zero margin" } else { "by a jump" };
    let words = format!("{labels}: {} below, {} above, {how}", at.below.word(), at.above.word());
    let value = pad_left(&shown(evaluator, found, at.value, system), 14);
    page.wrapped(&format!("{value}  "), &words, Tone::Plain);
}

/// Every row with all its numbers that are numbers, and margin and verdict of each check, SI units. Changes of verdict
/// stand as rows of their own kind, `crossing`, and so does a run that failed, with its reason.
///
/// # Errors
/// When the writer refuses a record, which a buffer in memory does not.
pub fn vary_csv(evaluator: &Evaluator, found: &Variation) -> Result<String, csv::Error> {
    let mut writer = csv::Writer::from_writer(Vec::new());
    writer.write_record(["row", "input", "value_si", "name", "number_si", "verdict", "caution"])?;
    let path = evaluator.inputs().get(found.input).map_or("", |input| input.path.as_str());
    let words = format!("{CAUTION_LINE} {ROW_CAUTION}");
    let mut caution = words.as_str();
    let mut line = |row: &str, value: f64, name: &str, number: String, verdict: Option<Verdict>| {
        let word = verdict.map_or("", Verdict::word);
        let record = [row, path, &value.to_string(), name, &number, word, std::mem::take(&mut caution)];
        writer.write_record(record)
    };
    for row in &found.rows {
        if let Some(failure) = &row.run.failure {
            line("failed", row.value, &failure.to_string(), String::new(), Some(Verdict::Open))?;
        }
        for number in row.run.numbers.iter() {
            if let Some(value) = row.run.numbers.get(&number.id) {
                line("number", row.value, &number.id, value.to_string(), None)?;
            }
        }
        for check in &row.run.checks {
            let id = evaluator.margin(&row.run, check, UnitSystem::Metric).id;
            let room = check.margin.map_or(String::new(), |room| room.to_string());
            line("margin", row.value, &id, room, Some(check.verdict))?;
        }
    }
    for at in &found.crossings {
        let known = found.rows.iter().find_map(|row| row.run.check(at.kind).map(|check| (row, check)));
        let id = known.map_or(String::new(), |(row, check)| evaluator.margin(&row.run, check, UnitSystem::Metric).id);
        line("crossing", at.value, &id, String::new(), Some(at.above))?;
    }
    let bytes = writer.into_inner().map_err(|e| csv::Error::from(e.into_error()))?;
    Ok(String::from_utf8_lossy(&bytes).into_owned())
}
