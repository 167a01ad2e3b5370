//! How a scenario spreads over its bands, as JSON and CSV, SI units.
use super::band_words::{bands_object, place_word, report_margin_object};
use super::json::si_unit;
use super::spread::{NO_BAND, SpreadSheet, shape_word, verdict_counts};
use super::{CAUTION_LINE, CAUTIONS, ReportBands};
use crate::margin::Margin;
use crate::quantity::Dimension;
use crate::study::{Bar, CheckRanking, Importance, NumberSpread, Part, QUANTILE_SHARES};
use serde_json::{Map, Value, json};

/// The whole spread as a JSON object.
#[must_use]
pub fn spread_object(sheet: &SpreadSheet<'_>) -> Value {
    let report = sheet.report;
    let mut object = json!({
        "file": report.file,
        "title": report.scenario.title,
        "scenario_sha256": report.scenario_sha256,
        "version": env!("CARGO_PKG_VERSION"),
        "verdict": report.verdict.word(),
        "partial": sheet.is_partial(),
        "cautions": CAUTIONS,
        "inputs": sheet.evaluator.wide().into_iter().filter_map(|input| input_object(sheet, input)).collect::<Vec<_>>(),
        "margins": report.margins.iter().map(|margin| margin_object(sheet, margin)).collect::<Vec<_>>(),
    });
    match &report.bands {
        Some(bands) => {
            object["bands"] = bands_object(bands);
            object["numbers"] = bands
                .study
                .spread
                .numbers
                .iter()
                .map(|n| (n.id.clone(), number_object(n)))
                .collect::<Map<_, _>>()
                .into();
            object["ranking"] = sheet.ranking.iter().filter_map(|r| ranking_object(sheet, r)).collect();
        }
        None => object["hint"] = json!(NO_BAND),
    }
    object
}

fn input_object(sheet: &SpreadSheet<'_>, input: usize) -> Option<Value> {
    let input = sheet.evaluator.inputs().get(input)?;
    let band = input.measure.band;
    Some(json!({
        "path": input.path,
        "low": band.low,
        "typical": band.typical,
        "high": band.high,
        "shape": shape_word(band.shape),
        "unit": si_unit(input.measure.dimension()),
    }))
}

fn margin_object(sheet: &SpreadSheet<'_>, margin: &Margin) -> Value {
    let mut object = report_margin_object(sheet.report, margin);
    let bands = sheet.report.bands.as_ref().zip(sheet.report.band_of(margin));
    let check = bands.and_then(|(bands, band)| bands.study.spread.checks.iter().find(|c| c.kind == band.kind));
    if let Some(check) = check {
        object["samples"] =
            verdict_counts(check).map(|(name, count)| (name.to_owned(), json!(count))).into_iter().collect();
    }
    object
}

fn number_object(number: &NumberSpread) -> Value {
    let quantile = |(share, value): (&f64, &f64)| json!({ "share": share, "value": value });
    json!({
        "unit": number.unit,
        "count": number.count,
        "missing": number.missing,
        "mean": number.mean,
        "quantiles": QUANTILE_SHARES.iter().zip(&number.quantiles).map(quantile).collect::<Vec<_>>(),
        "histogram": { "from": number.quantiles[0], "to": number.quantiles[6], "counts": number.bars },
    })
}

fn ranking_object(sheet: &SpreadSheet<'_>, ranking: &CheckRanking) -> Option<Value> {
    let margin = sheet.margin_of(ranking)?;
    let bar = |bar: &Bar| {
        let path = sheet.path(bar.input);
        json!({ "path": path, "low": bar.low, "typical": bar.typical, "high": bar.high, "reach": bar.reach() })
    };
    let part = |part: &Part| json!({ "value": part.value, "low": part.low, "high": part.high });
    let share = |input: &Importance| json!({ "path": sheet.path(input.input), "first_order": part(&input.first), "total": part(&input.total) });
    let shares = ranking.shares.as_ref().map(|shares| {
        json!({
            "base_points": shares.points,
            "asked": shares.asked,
            "partial": shares.points < shares.asked,
            "without_value": shares.without_value,
            "inputs": shares.inputs.iter().map(share).collect::<Vec<_>>(),
        })
    });
    Some(json!({
        "id": margin.id,
        "unit": si_unit(margin.dimension),
        "bars": ranking.bars.iter().map(bar).collect::<Vec<_>>(),
        "variance_shares": shares,
    }))
}

/// One line of the CSV: kind of row, id, item, value, unit.
type Line = [String; 5];

/// The whole spread as CSV, one value a line.
///
/// # Errors
/// When the writer refuses a record, which a buffer in memory does not.
pub fn spread_csv(sheet: &SpreadSheet<'_>) -> Result<String, csv::Error> {
    let mut writer = csv::Writer::from_writer(Vec::new());
    writer.write_record(["row", "id", "item", "value", "unit", "caution"])?;
    let mut caution = CAUTION_LINE;
    for line in lines(sheet) {
        writer.write_record(line.iter().map(String::as_str).chain([std::mem::take(&mut caution)]))?;
    }
    let bytes = writer.into_inner().map_err(|e| csv::Error::from(e.into_error()))?;
    Ok(String::from_utf8_lossy(&bytes).into_owned())
}

#[expect(clippy::needless_pass_by_value, reason = "numbers and words alike, most of them made for the line")]
fn line(row: &str, id: &str, item: &str, value: impl ToString, unit: &str) -> Line {
    [row.to_owned(), id.to_owned(), item.to_owned(), value.to_string(), unit.to_owned()]
}

fn lines(sheet: &SpreadSheet<'_>) -> Vec<Line> {
    let mut lines = vec![
        line("study", "", "partial", sheet.is_partial(), ""),
        line("study", "", "verdict", sheet.report.verdict.word(), ""),
    ];
    let Some(bands) = &sheet.report.bands else {
        lines.push(line("study", "", "hint", NO_BAND, ""));
        return lines;
    };
    let spread = &bands.study.spread;
    lines.extend([
        line("study", "", "seed", spread.seed, ""),
        line("study", "", "samples_asked", spread.asked, ""),
        line("study", "", "samples", spread.samples, ""),
        line("study", "", "samples_failed", spread.failed, ""),
        line("study", "", "search_runs", bands.study.found.runs, ""),
    ]);
    sheet.report.margins.iter().for_each(|margin| check_lines(&mut lines, sheet, bands, margin));
    spread.numbers.iter().for_each(|number| number_lines(&mut lines, number));
    sheet.ranking.iter().for_each(|ranking| ranking_lines(&mut lines, sheet, ranking));
    lines
}

fn check_lines(lines: &mut Vec<Line>, sheet: &SpreadSheet<'_>, bands: &ReportBands, margin: &Margin) {
    let (id, unit) = (margin.id.as_str(), si_unit(margin.dimension));
    lines.push(line("check", id, "verdict", margin.verdict.word(), ""));
    let Some(band) = sheet.report.band_of(margin) else { return };
    if let Some(word) = band.typical {
        lines.push(line("check", id, "typical_verdict", word.word(), ""));
    }
    let worst = band.worst.as_ref();
    let numbers = [
        ("typical_demand", margin.demand),
        ("limit", margin.limit),
        ("typical_margin", margin.margin),
        ("worst_demand", worst.and_then(|m| m.demand)),
        ("worst_margin", worst.and_then(|m| m.margin)),
    ];
    lines.extend(numbers.into_iter().filter_map(|(item, value)| Some(line("check", id, item, value?, unit))));
    for input in &band.inputs {
        let unit = si_unit(input.measure.dimension());
        lines.push(line("worst_at", id, &input.path, input.value, unit));
        lines.push(line("worst_place", id, &input.path, place_word(input.place), ""));
    }
    let Some(check) = bands.study.spread.checks.iter().find(|check| check.kind == band.kind) else { return };
    lines.extend(verdict_counts(check).map(|(name, count)| line("samples", id, name, count, "")));
    for (name, share) in [("share_short", &check.short), ("share_not_held", &check.not_held)] {
        let ends = [("", share.share), ("_low", share.low), ("_high", share.high)];
        lines.extend(ends.map(|(end, value)| line("check", id, &format!("{name}{end}"), value, "1")));
    }
}

fn number_lines(lines: &mut Vec<Line>, number: &NumberSpread) {
    let (id, unit) = (number.id.as_str(), number.unit);
    lines.push(line("number", id, "count", number.count, ""));
    lines.push(line("number", id, "missing", number.missing, ""));
    lines.push(line("number", id, "mean", number.mean, unit));
    for (share, value) in QUANTILE_SHARES.iter().zip(&number.quantiles) {
        lines.push(line("quantile", id, &share.to_string(), value, unit));
    }
    for (place, count) in number.bars.iter().enumerate() {
        lines.push(line("histogram", id, &(place + 1).to_string(), count, ""));
    }
}

fn ranking_lines(lines: &mut Vec<Line>, sheet: &SpreadSheet<'_>, ranking: &CheckRanking) {
    let Some(margin) = sheet.margin_of(ranking) else { return };
    let (id, unit) = (margin.id.as_str(), si_unit(margin.dimension));
    for bar in &ranking.bars {
        let path = sheet.path(bar.input);
        let ends = [("bar_low", bar.low), ("bar_typical", bar.typical), ("bar_high", bar.high)];
        lines.extend(ends.into_iter().filter_map(|(row, value)| Some(line(row, id, path, value?, unit))));
    }
    for input in ranking.shares.iter().flat_map(|shares| &shares.inputs) {
        let path = sheet.path(input.input);
        for (row, part) in [("first_order", &input.first), ("total", &input.total)] {
            let ends = [("", part.value), ("_low", part.low), ("_high", part.high)];
            lines.extend(
                ends.map(|(end, value)| line(&format!("{row}{end}"), id, path, value, si_unit(Dimension::Ratio))),
            );
        }
    }
}
