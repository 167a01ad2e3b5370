//! The bands of a report in words and as JSON.
use super::json::margin as margin_json;
use super::page::{Page, Tone, pad, pad_left};
use super::words::{margin_value, signed};
use super::{InputAt, MarginBand, Report, ReportBands};
use crate::margin::{Margin, Verdict};
use crate::quantity::{UnitSystem, format_si};
use crate::scenario::inputs;
use crate::study::{Place, Share};
use serde_json::{Value, json};

/// What was searched and drawn, in one sentence.
#[must_use]
pub fn bands_sentence(bands: &ReportBands) -> String {
    let (found, spread) = (&bands.study.found, &bands.study.spread);
    let corners = if found.all_corners { "every corner of the bands" } else { "a part of the corners of the bands" };
    let failed = found.failed + spread.failed;
    let failed = if failed > 0 { format!("; {failed} runs failed and count as open") } else { String::new() };
    let partial = if bands.study.is_partial() { "STOPPED EARLY, a part only: " } else { "" };
    let asked = if spread.is_partial() { format!(" of {} asked for", spread.asked) } else { String::new() };
    if spread.asked == 0 {
        return format!(
            "{partial}worst found in {} runs ({corners}, and inside); no sample was drawn, `underfoot spread` tells how \
             often a check falls short{failed}",
            found.runs
        );
    }
    format!(
        "{partial}worst found in {} runs ({corners}, and inside); share short of {} samples{asked}, seed {}, with the \
         95 % Wilson interval; the inputs are taken as independent{failed}",
        found.runs, spread.samples, spread.seed
    )
}

/// The worst found of a margin: `at the worst found 0.21 m short (subject mass 120 kg high, line stiffness any)`; none
/// where the report has no bands or no run judged it.
#[must_use]
pub fn worst_words(report: &Report, margin: &Margin, system: UnitSystem) -> Option<String> {
    let band = report.band_of(margin)?;
    let worst = band.worst.as_ref()?;
    let room = worst.margin?;
    let amount = margin_value(worst, room.abs(), system);
    let word = if worst.verdict == Verdict::Short { "short" } else { "to spare" };
    Some(format!("at the worst found {amount} {word} ({})", place_words(band, system)))
}

/// Stands for the place where no input has a part in it.
const UNMOVED: &str = "no band changes it";

/// Whether any input of the file is a wide band.
pub(super) fn has_bands(report: &Report) -> bool {
    inputs(&report.scenario).iter().any(|input| input.measure.band.is_wide())
}

/// Which inputs are at which end.
#[must_use]
pub fn place_words(band: &MarginBand, system: UnitSystem) -> String {
    let moved: Vec<String> =
        band.inputs.iter().filter(|i| i.place != Place::Anywhere).map(|i| input_words(i, system)).collect();
    if moved.is_empty() { UNMOVED.to_owned() } else { moved.join(", ") }
}

fn input_words(input: &InputAt, system: UnitSystem) -> String {
    let value = format_si(input.value, input.measure.dimension(), system);
    format!("{} {value} {}", input.path, place_word(input.place))
}

/// `low`, `high`, `inside`, `anywhere`.
#[must_use]
pub const fn place_word(place: Place) -> &'static str {
    match place {
        Place::Low => "low",
        Place::High => "high",
        Place::Inside => "inside",
        Place::Anywhere => "anywhere",
    }
}

/// `12.1 % (11.1 to 13.2)`.
#[must_use]
pub fn share_words(share: &Share) -> String {
    let percent = |value: f64| format!("{:.1}", 100.0 * value);
    format!("{} % ({} to {})", percent(share.share), percent(share.low), percent(share.high))
}

/// The table of what the bands do: worst demand, room there, share short; below each row where that is.
pub(super) fn band_table(page: &mut Page, report: &Report, system: UnitSystem) {
    let Some(bands) = &report.bands else { return };
    page.heading("within the bands");
    page.wrapped("  ", &bands_sentence(bands), Tone::Plain);
    let head = [("worst demand", 15), ("room", 15), ("share short", 25)].map(|(h, w)| pad_left(h, w)).concat();
    page.line(&format!("  {}{head}", pad("", 42)), Tone::Faint);
    for (margin, band) in report.margins.iter().zip(&bands.margins) {
        let lead = format!("  {}", pad(&format!("{} {}", margin.verdict.symbol(), margin.verdict.word()), 9));
        super::text::row(page, &lead, (&margin.label, 33), &cells(band, system), Tone::Verdict(margin.verdict));
        let place = if band.corner { "" } else { ", inside the bands" };
        let open = if band.open_runs > 0 {
            format!("; {} runs of the search are open", band.open_runs)
        } else {
            String::new()
        };
        let words = place_words(band, system);
        let lead = if words == UNMOVED { "      " } else { "      at  " };
        page.wrapped(lead, &format!("{words}{place}{open}"), Tone::Faint);
    }
}

fn cells(band: &MarginBand, system: UnitSystem) -> String {
    let none = || "-".to_owned();
    let show = |value: Option<f64>, sign: bool| {
        let (Some(value), Some(worst)) = (value, &band.worst) else { return none() };
        let words = margin_value(worst, value, system);
        if sign { signed(value, &words) } else { words }
    };
    let worst = band.worst.as_ref();
    let share = band.short.as_ref().map_or_else(none, share_words);
    let demand = pad_left(&show(worst.and_then(|m| m.demand), false), 15);
    let room = pad_left(&show(worst.and_then(|m| m.margin), true), 15);
    format!("{demand}{room}{}", pad_left(&share, 25))
}

/// One margin of a report as a JSON object, with `typical_verdict`, `worst`, `share_short` and `share_not_held` where the
/// report has bands.
#[must_use]
pub fn report_margin_object(report: &Report, margin: &Margin) -> Value {
    let mut object = margin_json(margin);
    let Some(band) = report.band_of(margin) else { return object };
    object["typical_verdict"] = json!(band.typical.map(Verdict::word));
    object["worst"] = worst_object(band);
    object["share_short"] = json!(band.short.as_ref().map(share_object));
    object["share_not_held"] = json!(band.not_held.as_ref().map(share_object));
    object
}

fn worst_object(band: &MarginBand) -> Value {
    let worst = band.worst.as_ref();
    json!({
        "demand": worst.and_then(|m| m.demand),
        "limit": worst.and_then(|m| m.limit),
        "margin": worst.and_then(|m| m.margin),
        "verdict": worst.map(|m| m.verdict.word()),
        "corner": band.corner,
        "open_runs": band.open_runs,
        "inputs": band.inputs.iter().map(input_object).collect::<Vec<_>>(),
    })
}

fn input_object(input: &InputAt) -> Value {
    let unit = super::json::si_unit(input.measure.dimension());
    json!({ "path": input.path, "value": input.value, "unit": unit, "at": place_word(input.place) })
}

/// A share as a JSON object.
#[must_use]
pub fn share_object(share: &Share) -> Value {
    json!({ "count": share.count, "of": share.of, "share": share.share, "low": share.low, "high": share.high })
}

/// What was searched and drawn, as a JSON object.
#[must_use]
pub fn bands_object(bands: &ReportBands) -> Value {
    let (found, spread) = (&bands.study.found, &bands.study.spread);
    json!({
        "partial": bands.study.is_partial(),
        "search": {
            "runs": found.runs,
            "failed": found.failed,
            "all_corners": found.all_corners,
            "partial": found.partial,
        },
        "sample": {
            "seed": spread.seed,
            "asked": spread.asked,
            "samples": spread.samples,
            "failed": spread.failed,
            "partial": spread.is_partial(),
            "interval": "95 % Wilson",
        },
    })
}
