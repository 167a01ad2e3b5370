//! The checks: demand, limit, a bar about the zero line, margin and verdict.
use crate::margin::{Margin, Rules, Sense, Verdict, checks, margin_of};
use crate::quantity::{UnitSystem, format_si};
use crate::sheet::{Report, margin_words, share_words, worst_words};
use crate::tui::joint::Word;
use crate::tui::model::{Model, Pane};
use crate::tui::text::{cells, fit, put, put_right, put_wrapped};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;

/// Narrower than this a check takes two rows.
const ONE_ROW_FROM: u16 = 70;
/// Narrowest bar worth drawing.
const LEAST_BAR: u16 = 13;
/// Widest bar.
const MOST_BAR: u16 = 61;
const NUMBER: u16 = 12;
/// From this width on the worst found has a column of its own.
const WORST_FROM: u16 = 100;
const WORD: u16 = 8;

fn listed(model: &Model) -> &[Margin] {
    model.answer.report.as_ref().map_or(&[], |report| &report.margins)
}

fn rows_each(area: Rect) -> u16 {
    if area.width < ONE_ROW_FROM { 2 } else { 1 }
}

fn shown(area: Rect) -> usize {
    usize::from(area.height.saturating_sub(1) / rows_each(area))
}

/// The check in a terminal row.
#[must_use]
pub fn check_at(model: &Model, area: Rect, row: u16) -> Option<usize> {
    let line = usize::from(row.checked_sub(area.y + 1)? / rows_each(area));
    let first = crate::tui::layout::scroll(model.check, listed(model).len(), shown(area));
    (first + line < listed(model).len()).then_some(first + line)
}

/// Draws title and checks.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    let all = listed(model);
    let first = crate::tui::layout::scroll(model.check, all.len(), shown(area));
    let below = all.len().saturating_sub(first + shown(area));
    draw_title(buffer, area, model, (first, below));
    let each = rows_each(area);
    for (line, (index, margin)) in (0..).zip(all.iter().enumerate().skip(first).take(shown(area))) {
        let row = Rect { y: area.y + 1 + line * each, height: each, ..area };
        let look = Look::of(model, margin, index == model.check);
        if each == 1 {
            draw_row(buffer, row, margin, &look, &Columns::of(model, area.width));
        } else {
            draw_pair(buffer, row, margin, &look);
        }
    }
}

fn draw_title(buffer: &mut Buffer, area: Rect, model: &Model, (above, below): (usize, usize)) {
    put(buffer, area, 0, 0, "Margins", model.theme.heading());
    if model.answer.is_stale() {
        let words = "NOT CURRENT: of earlier inputs";
        return put(buffer, area, 9, 0, words, model.theme.fault());
    }
    if above + below > 0 {
        put(buffer, area, 9, 0, &super::more_words(above, below), model.theme.quiet());
    }
    if rows_each(area) == 1 {
        let columns = Columns::of(model, area.width);
        let quiet = model.theme.quiet();
        put_right(buffer, columns.demand(area), 0, "demand", quiet);
        put_right(buffer, columns.limit(area), 0, "limit", quiet);
        put_right(buffer, columns.margin(area), 0, "margin", quiet);
        put_right(buffer, columns.worst(area), 0, "worst", quiet);
        let bar = columns.bar(area);
        if bar.width >= 25 {
            put(buffer, bar, bar.width / 2 - 8, 0, "short <-|-> room", quiet);
        }
    }
}

/// How a check is shown.
struct Look<'m> {
    /// The worst found in the bands.
    worst: Option<&'m Margin>,
    word: &'static str,
    mark: &'static str,
    units: UnitSystem,
    verdict: Verdict,
    style: Style,
    verdict_style: Style,
}

impl<'m> Look<'m> {
    /// Checks of earlier inputs are open, whatever they were.
    fn of(model: &'m Model, margin: &Margin, is_chosen: bool) -> Self {
        let stale = model.answer.is_stale();
        let word = if stale { Word::Final(Verdict::Open) } else { model.word_of(margin) };
        let verdict = word.verdict();
        let band = model.answer.current().and_then(|report| report.band_of(margin));
        let worst = band.and_then(|band| band.worst.as_ref());
        let base = match (is_chosen, stale) {
            (true, _) => model.theme.chosen(model.pane == Pane::Margins),
            (false, true) => model.theme.quiet(),
            (false, false) => model.theme.plain(),
        };
        let mark = if is_chosen { ">" } else { " " };
        let verdict_style = base.patch(model.theme.verdict(verdict));
        Self { worst, word: word.word(), mark, units: model.units, verdict, style: base, verdict_style }
    }
}

/// Columns of the one-row form.
struct Columns {
    label: u16,
    bar: u16,
    /// Width of the worst found; none where there are no bands.
    worst: u16,
}

impl Columns {
    fn of(model: &Model, total: u16) -> Self {
        let all = listed(model);
        let worst = if model.has_bands() && total >= WORST_FROM { NUMBER } else { 0 };
        let label = all.iter().map(|margin| cells(&margin.label)).max().unwrap_or(0).clamp(16, 40);
        let fixed = 3 + 3 * NUMBER + 3 + WORD + worst;
        let label = label.min(total.saturating_sub(fixed + 1));
        let rest = total.saturating_sub(fixed + label + 2);
        let bar = if rest < LEAST_BAR { 0 } else { rest.min(MOST_BAR) };
        Self { label, bar: if bar % 2 == 0 { bar.saturating_sub(1) } else { bar }, worst }
    }

    fn demand(&self, row: Rect) -> Rect {
        Rect { x: row.x + 3 + self.label, width: NUMBER, ..row }
    }

    fn limit(&self, row: Rect) -> Rect {
        Rect { x: self.demand(row).right() + 3, width: NUMBER, ..row }
    }

    fn bar(&self, row: Rect) -> Rect {
        Rect { x: self.limit(row).right() + 2, width: self.bar, ..row }
    }

    fn margin(&self, row: Rect) -> Rect {
        Rect { x: self.bar(row).right(), width: NUMBER, ..row }
    }

    fn worst(&self, row: Rect) -> Rect {
        Rect { x: self.margin(row).right(), width: self.worst, ..row }
    }
}

fn number(value: Option<f64>, margin: &Margin, units: UnitSystem) -> String {
    value.map_or_else(|| "not known".to_owned(), |value| format_si(value, margin.dimension, units))
}

fn signed(margin: &Margin, units: UnitSystem) -> String {
    let sign = if margin.margin.is_some_and(|margin| margin >= 0.0) { "+" } else { "" };
    margin.margin.map_or_else(String::new, |value| format!("{sign}{}", format_si(value, margin.dimension, units)))
}

const fn side(sense: Sense) -> &'static str {
    match sense {
        Sense::AtMost => "<=",
        Sense::AtLeast => ">=",
    }
}

fn draw_row(buffer: &mut Buffer, row: Rect, margin: &Margin, look: &Look, columns: &Columns) {
    buffer.set_style(row, look.style);
    put(buffer, row, 0, 0, look.mark, look.style);
    let symbol = look.verdict.symbol().to_string();
    put(buffer, row, 1, 0, &symbol, look.verdict_style);
    put(buffer, row, 3, 0, &fit(&margin.label, usize::from(columns.label)), look.style);
    put_right(buffer, columns.demand(row), 0, &number(margin.demand, margin, look.units), look.style);
    put(buffer, columns.limit(row), 0, 0, side(margin.sense), look.style);
    put_right(buffer, columns.limit(row), 0, &number(margin.limit, margin, look.units), look.style);
    draw_bar(buffer, columns.bar(row), margin, look);
    put_right(buffer, columns.margin(row), 0, &signed(margin, look.units), look.style);
    let end = columns.worst(row);
    if let Some(worst) = look.worst.filter(|_| end.width > 0) {
        put_right(buffer, end, 0, &signed(worst, look.units), look.style);
    }
    let words = format!("{symbol} {}", look.word);
    put(buffer, Rect { x: end.right() + 1, width: WORD, ..row }, 0, 0, &words, look.verdict_style);
}

/// Two rows for a narrow pane: label and word, then the numbers.
fn draw_pair(buffer: &mut Buffer, row: Rect, margin: &Margin, look: &Look) {
    buffer.set_style(row, look.style);
    put(buffer, row, 0, 0, look.mark, look.style);
    let words = format!("{} {}", look.verdict.symbol(), look.word);
    let room = usize::from(row.width.saturating_sub(WORD + 2));
    put(buffer, row, 1, 0, &fit(&margin.label, room), look.style);
    put_right(buffer, row, 0, &format!("{words} "), look.verdict_style);
    let sides = format!(
        "{} {} {}",
        number(margin.demand, margin, look.units),
        side(margin.sense),
        number(margin.limit, margin, look.units)
    );
    let own = signed(margin, look.units);
    let room = look.worst.map_or(own.clone(), |worst| format!("{own}, worst {}", signed(worst, look.units)));
    // The blanks at both ends give way to the worst found, then the sides.
    let room = if 2 + cells(&sides) + 2 + cells(&room) <= row.width { format!("{room} ") } else { room };
    let indent = row.width.saturating_sub(cells(&sides) + 1 + cells(&room)).min(2);
    if indent > 0 {
        put(buffer, row, indent, 1, &sides, look.style);
    }
    put_right(buffer, row, 1, &room, look.style);
}

/// Margin as a share of the limit (of the demand where the limit is zero); full scale is one.
#[must_use]
pub fn share(margin: &Margin) -> Option<f64> {
    let room = margin.margin?;
    let size = margin.limit.filter(|limit| limit.abs() > 0.0).or(margin.demand)?.abs();
    (size > 0.0).then(|| room / size)
}

/// `#` from the zero line to the margin; `<` or `>` at the end where it is longer than the bar.
fn draw_bar(buffer: &mut Buffer, area: Rect, margin: &Margin, look: &Look) {
    if area.width == 0 {
        return;
    }
    let half = area.width / 2;
    put(buffer, area, half, 0, "|", look.style);
    let Some(share) = share(margin) else { return };
    let length = super::plot::place(share.abs(), half + 1);
    let length = if share == 0.0 { 0 } else { length.clamp(1, half) };
    let bar = "#".repeat(usize::from(length));
    let start = if share < 0.0 { half - length } else { half + 1 };
    put(buffer, area, start, 0, &bar, look.verdict_style);
    if share < -1.0 {
        put(buffer, area, 0, 0, "<", look.verdict_style);
    } else if share > 1.0 {
        put(buffer, area, area.width - 1, 0, ">", look.verdict_style);
    }
}

/// Draws the source and the note of the chosen check.
pub fn draw_basis(buffer: &mut Buffer, area: Rect, model: &Model) {
    let Some(margin) = listed(model).get(model.check) else { return };
    let mut words = match &model.answer.report {
        Some(report) if margin.verdict != Verdict::Open && !model.answer.is_stale() => {
            let words = margin_words(&report.scenario, margin, model.units);
            format!("{words}{}: {}", bands_words(model, report, margin), margin.basis.words)
        }
        _ => format!("{}: {}", margin.label, margin.basis.words),
    };
    if margin.basis.from_memory {
        words += " - from memory, unverified";
    }
    if let Some(note) = note(model, margin) {
        words = format!("{words} - {note}");
    }
    let inner = Rect { x: area.x + 1, width: area.width.saturating_sub(2), ..area };
    let style = if margin.basis.from_memory { model.theme.play_head() } else { model.theme.quiet() };
    put_wrapped(buffer, inner, &words, style);
}

/// The worst found of a check, and the share that falls short once a sample was made.
fn bands_words(model: &Model, report: &Report, margin: &Margin) -> String {
    let worst = worst_words(report, margin, model.units).map_or_else(String::new, |words| format!("; {words}"));
    let share = report.band_of(margin).and_then(|band| band.short.as_ref());
    share.map_or_else(|| worst.clone(), |share| format!("{worst}; short in {} of the sample", share_words(share)))
}

/// The note of a check in the units of display.
fn note(model: &Model, margin: &Margin) -> Option<String> {
    let report = model.answer.report.as_ref()?;
    let (scenario, estimate) = (&report.scenario, &report.estimate);
    let rules = Rules::of(scenario).ok()?;
    let found = checks(&rules, scenario, &estimate.numbers, &estimate.validity);
    let same = |check| margin_of(&rules, scenario, &estimate.validity, check, model.units);
    found.iter().map(same).find(|found| found.id == margin.id)?.note
}
