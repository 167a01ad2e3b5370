//! What the bands do, which input matters, and the nearest values at which every check holds.
use super::value::{Block, Cell, Column, Kind, Row, Section, Table, column};
use crate::margin::{Margin, Verdict};
use crate::quantity::{UnitSystem, format_measure, format_si, format_unit};
use crate::sheet::json::si_unit;
use crate::sheet::words::{margin_value, signed};
use crate::sheet::{REMEDY_CAUTION, Report, ReportBands, bands_sentence, place_words, share_words};
use crate::study::{Bar, Evaluator, NumberSpread, QUANTILE_SHARES, Remedies, Remedy, StudyError, Target, bars};

const CHECKS: &[Column] = &[
    column("verdict", "verdict", Kind::Words),
    column("check", "check", Kind::Name),
    column("demand", "worst demand found", Kind::Number),
    column("room", "room there", Kind::Number),
    column("inputs", "inputs there", Kind::Words),
    column("short", "samples short, 95 % interval", Kind::Number),
];
const QUANTILES: &[Column] = &[
    column("number", "number", Kind::Name),
    column("least", "least", Kind::Number),
    column("p05", "5 %", Kind::Number),
    column("p50", "50 %", Kind::Number),
    column("p95", "95 %", Kind::Number),
    column("most", "most", Kind::Number),
];
const BARS: &[Column] = &[
    column("path", "input", Kind::Formula),
    column("band", "its band", Kind::Number),
    column("low", "room at low", Kind::Number),
    column("typical", "room at typical", Kind::Number),
    column("high", "room at high", Kind::Number),
];
const REMEDIES: &[Column] = &[
    column("path", "input", Kind::Formula),
    column("today", "today", Kind::Number),
    column("value", "nearest value", Kind::Number),
    column("change", "change", Kind::Words),
];

/// The bars of the margin that governs.
#[derive(Clone, Debug, PartialEq)]
pub struct Ranking {
    /// The margin.
    pub margin: Margin,
    /// Path and band of each input with its bar, the longest first.
    pub bars: Vec<(String, String, Bar)>,
}

/// Moves each wide input over its band for the governing margin; none where nothing governs by a number or no input is
/// wide.
///
/// # Errors
/// See [`bars`].
pub fn ranking(report: &Report) -> Result<Option<Ranking>, StudyError> {
    let evaluator = Evaluator::new(&report.scenario)?;
    let found = report.bands.as_ref().and_then(|bands| bands.margins.first()).zip(report.margins.first());
    let Some((band, margin)) = found else { return Ok(None) };
    let list = bars(&evaluator, &Target::Margin(band.kind))?;
    let named = list.into_iter().filter_map(|bar| {
        let input = evaluator.inputs().get(bar.input)?;
        Some((input.path.clone(), format_measure(&input.measure), bar))
    });
    Ok(Some(Ranking { margin: margin.clone(), bars: named.collect() }))
}

/// What the bands do to the checks and the numbers.
pub fn spread(report: &Report, ranking: Option<&Ranking>, system: UnitSystem) -> Section {
    let mut blocks = Vec::new();
    if let Some(bands) = &report.bands {
        blocks.push(Block::words(&format!("{}.", bands_sentence(bands))));
        blocks.push(table("spread_checks", "checks within the bands", CHECKS, check_rows(report, bands, system)));
        let rows = bands.study.spread.numbers.iter().map(|n| quantile_row(n, report, system)).collect();
        blocks.push(table("spread_numbers", "numbers over the samples", QUANTILES, rows));
    } else {
        blocks.push(Block::words(
            "No input of the file is a band: every number above is of exact inputs, and none is sampled.",
        ));
    }
    if let Some(ranking) = ranking {
        blocks.push(Block::part("Which input matters"));
        let caption = format!("{}: one input moved over its band, all others typical", ranking.margin.label);
        blocks.push(table(
            "ranking",
            &caption,
            BARS,
            ranking.bars.iter().map(|bar| bar_row(ranking, bar, system)).collect(),
        ));
    }
    Section::new("spread", "Spread and ranking", blocks)
}

fn table(id: &str, caption: &str, columns: &'static [Column], rows: Vec<Row>) -> Block {
    Block::Table(Table { id: id.to_owned(), caption: crate::sheet::clean(caption), columns, rows })
}

fn check_rows(report: &Report, bands: &ReportBands, system: UnitSystem) -> Vec<Row> {
    let row = |(margin, band): (&Margin, &crate::sheet::MarginBand)| {
        let unit = si_unit(margin.dimension);
        let cell = |value: Option<f64>, plus: bool| match (value, &band.worst) {
            (Some(value), Some(worst)) => {
                let words = margin_value(worst, value, system);
                Cell::shown(if plus { signed(value, &words) } else { words }, value, unit)
            }
            _ => Cell::words("-"),
        };
        let worst = band.worst.as_ref();
        Row {
            cells: vec![
                Cell::words(&format!("{} {}", margin.verdict.symbol(), margin.verdict.word())),
                Cell::words(&margin.label),
                cell(worst.and_then(|w| w.demand), false),
                cell(worst.and_then(|w| w.margin), true),
                Cell::words(&place_words(band, system)),
                band.short.as_ref().map_or_else(|| Cell::words("-"), |share| Cell::words(&share_words(share))),
            ],
            verdict: Some(margin.verdict),
        }
    };
    report.margins.iter().zip(&bands.margins).map(row).collect()
}

fn quantile_row(number: &NumberSpread, report: &Report, system: UnitSystem) -> Row {
    let shown = |share: f64| {
        let at = QUANTILE_SHARES.iter().position(|s| *s == share).and_then(|at| number.quantiles.get(at));
        at.map_or_else(Cell::none, |v| Cell::shown(format_si(*v, number.dimension, system), *v, number.unit))
    };
    let mut cells = vec![Cell::words(&crate::sheet::text::number_label(&number.id, &report.scenario))];
    cells.extend([0.0, 0.05, 0.5, 0.95, 1.0].map(shown));
    Row::new(cells)
}

fn bar_row(ranking: &Ranking, (path, band, bar): &(String, String, Bar), system: UnitSystem) -> Row {
    let unit = si_unit(ranking.margin.dimension);
    let cell = |value: Option<f64>| match value {
        Some(value) => Cell::shown(signed(value, &margin_value(&ranking.margin, value, system)), value, unit),
        None => Cell::words("-"),
    };
    Row::new(vec![Cell::words(path), Cell::words(band), cell(bar.low), cell(bar.typical), cell(bar.high)])
}

/// The nearest values at which every check holds.
pub fn remedies(report: &Report, found: &Remedies) -> Section {
    let mut blocks = vec![Block::words(REMEDY_CAUTION)];
    if found.list.is_empty() {
        blocks.push(Block::words(&no_remedy_words(report)));
    } else {
        blocks.push(Block::words(
            "All other inputs at their typical values: their bands play no part in these values; `underfoot remedy --worst` \
             works them out at the worst found in the bands.",
        ));
        let rows = found.list.iter().map(remedy_row).collect();
        blocks.push(table("remedies", "one input changed alone, at typical values", REMEDIES, rows));
    }
    Section::new("remedies", "Nearest values at which every check holds", blocks)
}

fn no_remedy_words(report: &Report) -> String {
    let typical = "Every check holds at the typical values of today: no change is worked out";
    match report.verdict {
        Verdict::Holds => format!("{typical}."),
        word => format!(
            "{typical}. Within the bands that is not so, the verdict is {}: see the section \"Spread and ranking\", and \
             `underfoot remedy --worst` for changes at the worst found in the bands.",
            word.word()
        ),
    }
}

fn remedy_row(remedy: &Remedy) -> Row {
    let measure = &remedy.input.measure;
    let unit = si_unit(measure.dimension());
    let (value, change) = if let Some(way) = &remedy.way {
        let by = way.value - measure.si();
        let plus = if by > 0.0 { "+" } else { "" };
        let ways = if way.ways > 1 { format!("; {} separate stretches hold", way.ways) } else { String::new() };
        let words = format!("{plus}{}{ways}", format_unit(by, measure.unit));
        (Cell::shown(way.shown.clone(), way.value, unit), Cell::shown(words, by, unit))
    } else {
        let [low, high] = [remedy.range.0, remedy.range.1].map(|v| format_unit(v, measure.unit));
        (Cell::words("none"), Cell::words(&format!("no value from {low} to {high}")))
    };
    let today = Cell::shown(format_measure(measure), measure.si(), unit);
    Row::new(vec![Cell::words(&remedy.input.path), today, value, change])
}
