//! How a scenario spreads over its bands, as text.
use super::band_words::band_table;
use super::page::{Page, Paint, Tone, pad, pad_left};
use super::text::{row, sentences, verdict_line};
use super::words::margin_value;
use super::{CAUTION_LINE, CAUTIONS, Report, ReportBands};
use crate::estimate::definition;
use crate::margin::Margin;
use crate::quantity::{Shape, UnitSystem, format_si};
use crate::study::{Bar, CheckRanking, CheckSpread, Evaluator, Importance, NumberSpread, Part, Ranking};

/// A report with its bands, and which input matters to each check.
#[derive(Clone, Copy, Debug)]
pub struct SpreadSheet<'a> {
    /// The report; without bands where no input is wide.
    pub report: &'a Report,
    /// The inputs by number.
    pub evaluator: &'a Evaluator,
    /// The ranking of each check; empty where there is none.
    pub ranking: &'a [CheckRanking],
}

impl SpreadSheet<'_> {
    /// True when a part of it was broken off.
    #[must_use]
    pub fn is_partial(&self) -> bool {
        let ranked = |ranking: &CheckRanking| ranking.shares.as_ref().is_some_and(|s| s.points < s.asked);
        let wide = self.report.bands.is_some();
        self.report.bands.as_ref().is_some_and(|bands| bands.study.is_partial())
            || self.ranking.iter().any(ranked)
            || (wide && self.ranking.is_empty())
    }

    /// The path of an input.
    pub(super) fn path(&self, input: usize) -> &str {
        self.evaluator.inputs().get(input).map_or("", |input| input.path.as_str())
    }

    /// The margin of a ranking.
    pub(super) fn margin_of(&self, ranking: &CheckRanking) -> Option<&Margin> {
        let bands = self.report.bands.as_ref()?;
        let at = bands.margins.iter().position(|band| band.kind == ranking.kind)?;
        self.report.margins.get(at)
    }

    /// The ranking of the governing margin; where that has none, of the first that has.
    pub(super) fn governing(&self) -> Option<(&CheckRanking, &Margin)> {
        let bands = self.report.bands.as_ref()?;
        let of = |kind| self.ranking.iter().find(|ranking| ranking.kind == kind);
        bands.margins.iter().zip(&self.report.margins).find_map(|(band, margin)| Some((of(band.kind)?, margin)))
    }
}

/// What to do where no input is a band.
pub const NO_BAND: &str = "no input is a band, so nothing spreads; write what is not known exactly as \
                           `low..typical..high`, such as mass = \"80..100..120 kg\"";

/// The whole spread as text.
#[must_use]
pub fn spread_text(sheet: &SpreadSheet<'_>, system: UnitSystem, paint: Paint) -> String {
    let mut page = Page::new(paint);
    let report = sheet.report;
    page.wrapped("", CAUTION_LINE, Tone::Caution);
    page.gap();
    page.wrapped("file   ", &report.file, Tone::Plain);
    let margins = report.margins_in(system);
    verdict_line(&mut page, report, &margins, system);
    match &report.bands {
        None => page.wrapped("", NO_BAND, Tone::Plain),
        Some(bands) => spread_pages(&mut page, sheet, bands, system),
    }
    sentences(&mut page, "cautions", CAUTIONS);
    page.finish()
}

fn spread_pages(page: &mut Page, sheet: &SpreadSheet<'_>, bands: &ReportBands, system: UnitSystem) {
    if sheet.is_partial() {
        page.wrapped("", "PARTIAL: stopped early; what stands here is what there was by then", Tone::Caution);
    }
    page.heading("bands");
    sheet.evaluator.wide().into_iter().for_each(|input| band_line(page, sheet, input, system));
    band_table(page, sheet.report, system);
    counts(page, sheet, bands);
    numbers(page, bands, system);
    match sheet.governing() {
        Some((ranking, margin)) => ranking_pages(page, sheet, ranking, margin, system),
        None => page.wrapped("  ", "not ranked: stopped before", Tone::Plain),
    }
}

fn band_line(page: &mut Page, sheet: &SpreadSheet<'_>, input: usize, system: UnitSystem) {
    let Some(input) = sheet.evaluator.inputs().get(input) else { return };
    let show = |value| format_si(value, input.measure.dimension(), system);
    let band = input.measure.band;
    let words = format!("{} .. {} .. {}", show(band.low), show(band.typical), show(band.high));
    page.wrapped(&format!("  {} ", pad(&input.path, 34)), &format!("{words}  {}", shape_word(band.shape)), Tone::Plain);
}

/// `uniform`, `triangular`, `normal`.
#[must_use]
pub const fn shape_word(shape: Shape) -> &'static str {
    match shape {
        Shape::Uniform => "uniform",
        Shape::Triangular => "triangular",
        Shape::Normal => "normal",
    }
}

/// How many samples hold, are open and fall short, for every check.
fn counts(page: &mut Page, sheet: &SpreadSheet<'_>, bands: &ReportBands) {
    let spread = &bands.study.spread;
    page.heading("samples by verdict");
    let head = ["holds", "short", "open", "absent"].map(|h| pad_left(h, 10)).concat();
    page.line(&format!("  {}{head}", pad("", 42)), Tone::Faint);
    for (band, margin) in bands.margins.iter().zip(&sheet.report.margins) {
        let Some(check) = spread.checks.iter().find(|check| check.kind == band.kind) else { continue };
        let cells = verdict_counts(check).map(|(_, count)| pad_left(&count.to_string(), 10)).concat();
        row(page, "  ", (&margin.label, 42), &cells, Tone::Plain);
    }
    page.wrapped("  ", &format!("{} of {} samples gave no numbers", spread.failed, spread.samples), Tone::Faint);
}

/// The four counts of a check with their names.
pub(super) fn verdict_counts(check: &CheckSpread) -> [(&'static str, usize); 4] {
    [("holds", check.holds), ("short", check.short.count), ("open", check.open), ("absent", check.absent)]
}

fn numbers(page: &mut Page, bands: &ReportBands, system: UnitSystem) {
    page.heading("key numbers over the samples");
    let head = ["least", "5 %", "half", "95 %", "most"].map(|h| pad_left(h, 11)).concat();
    page.line(&format!("  {}{head}", pad("", 36)), Tone::Faint);
    for number in &bands.study.spread.numbers {
        let label = number_label(&number.id);
        let show = |at: usize| pad_left(&format_si(number.quantiles[at], number.dimension, system), 11);
        let cells = [0, 1, 3, 5, 6].map(show).concat();
        row(page, "  ", (&label, 36), &cells, Tone::Plain);
        let missing = if number.missing > 0 { format!("  {} without it", number.missing) } else { String::new() };
        page.line(&format!("      |{}|{missing}", columns(number)), Tone::Faint);
    }
    let words = "each strip is a histogram from least to most: the higher, the more samples; blank where there is none";
    page.wrapped("  ", words, Tone::Faint);
}

/// `clearance, lower_roof`.
fn number_label(id: &str) -> String {
    let (stem, place) = id.split_once('.').map_or((id, ""), |(stem, place)| (stem, place));
    let label = definition(id).map_or(stem, |d| d.label);
    if place.is_empty() { label.to_owned() } else { format!("{label}, {place}") }
}

/// Heights of a histogram's columns; a column that is not empty is never blank.
const HEIGHTS: [char; 8] = ['▁', '▂', '▃', '▄', '▅', '▆', '▇', '█'];

fn columns(number: &NumberSpread) -> String {
    let most = number.bars.iter().copied().max().unwrap_or(0);
    let column = |&count: &usize| match count {
        0 => ' ',
        count => HEIGHTS[((count * HEIGHTS.len()).div_ceil(most.max(1)) - 1).min(HEIGHTS.len() - 1)],
    };
    let width = if number.bars.len() == 1 { crate::study::BARS } else { 1 };
    number.bars.iter().map(|count| column(count).to_string().repeat(width)).collect()
}

fn ranking_pages(
    page: &mut Page,
    sheet: &SpreadSheet<'_>,
    ranking: &CheckRanking,
    margin: &Margin,
    system: UnitSystem,
) {
    page.heading(&format!("which input matters to the room of: {}", margin.label));
    page.wrapped("  ", "one input at a time over its band, all others at typical:", Tone::Plain);
    let head = ["room at low", "at typical", "at high"].map(|h| pad_left(h, 13)).concat();
    page.line(&format!("  {}{head}", pad("", 36)), Tone::Faint);
    let longest = ranking.bars.iter().filter_map(Bar::reach).fold(0.0, f64::max);
    for bar in &ranking.bars {
        let show = |value: Option<f64>| value.map_or_else(|| "none".to_owned(), |v| margin_value(margin, v, system));
        let cells = [bar.low, bar.typical, bar.high].map(|value| pad_left(&show(value), 13)).concat();
        row(page, "  ", (sheet.path(bar.input), 36), &format!("{cells}  {}", strip(bar, longest)), Tone::Plain);
    }
    match &ranking.shares {
        Some(shares) => shares_table(page, sheet, shares),
        None => page.wrapped("  ", "one band only: all of the spread is its", Tone::Plain),
    }
}

/// The reach of a bar against the longest, at most 20 columns.
#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "0 to 20")]
fn strip(bar: &Bar, longest: f64) -> String {
    let share = bar.reach().filter(|_| longest > 0.0).map_or(0.0, |reach| (reach / longest).clamp(0.0, 1.0));
    "#".repeat((20.0 * share).round() as usize)
}

fn shares_table(page: &mut Page, sheet: &SpreadSheet<'_>, shares: &Ranking) {
    page.gap();
    if shares.inputs.is_empty() {
        page.wrapped("  ", "shares of the variance: none, no sample moves it", Tone::Plain);
        return;
    }
    page.wrapped("  ", "shares of its variance (Sobol' indices), with 95 % confidence:", Tone::Plain);
    let head = ["alone", "with others"].map(|h| pad_left(h, 26)).concat();
    page.line(&format!("  {}{head}", pad("", 36)), Tone::Faint);
    let mut inputs: Vec<&Importance> = shares.inputs.iter().collect();
    inputs.sort_by(|a, b| b.total.value.total_cmp(&a.total.value));
    for input in inputs {
        let cells = [input.first, input.total].map(|part| pad_left(&part_words(&part), 26)).concat();
        row(page, "  ", (sheet.path(input.input), 36), &cells, Tone::Plain);
    }
    let left = match shares.without_value {
        0 => String::new(),
        n => format!("; {n} left out, where a run had no number: the shares speak of the rest only"),
    };
    page.wrapped("  ", &format!("from {} base points{left}", shares.points), Tone::Faint);
}

fn part_words(part: &Part) -> String {
    let show = |value: f64| format!("{:.3}", (1e3 * value).round() / 1e3 + 0.0);
    format!("{} ({} to {})", show(part.value), show(part.low), show(part.high))
}
