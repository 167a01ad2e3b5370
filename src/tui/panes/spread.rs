//! The view Spread: what the bands do to the checks, how the governing number spreads, and which band matters.
use super::state::{self, grouped};
use crate::margin::{Margin, Verdict};
use crate::quantity::{Dimension, UnitSystem, format_si};
use crate::sheet::place_words;
use crate::study::{CheckSpread, Importance, NumberSpread, Place, QUANTILE_SHARES, Share};
use crate::tui::model::Model;
use crate::tui::studies::{Lane, Ranked, Spreading};
use crate::tui::text::{cells, wrap};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;

/// Column, words and style of a row.
type Row = (u16, String, Style);

const INDENT: u16 = 2;
/// From this width on counts and worst stand beside histogram and ranking.
const TWO_FROM: u16 = 84;
/// Bars of the histogram that are joined into one row.
const JOINED: usize = 4;

/// The rows of the left and the right column; all in the left one where there is room for one only.
fn columns(model: &Model, width: u16) -> (Vec<Row>, Vec<Row>) {
    if !model.has_bands() {
        let words = "no input is a band: type one such as 80..100..120 kg to see what it does";
        let rows = wrap(words, usize::from(width.saturating_sub(2))).into_iter();
        return (rows.map(|line| (1, line, model.theme.plain())).collect(), Vec::new());
    }
    if width < TWO_FROM {
        let mut rows = left(model, width);
        rows.extend(right(model, width));
        return (rows, Vec::new());
    }
    let half = width / 2;
    // Two blank columns stand between them.
    (left(model, half - 1), right(model, width - half))
}

fn left(model: &Model, width: u16) -> Vec<Row> {
    let mut rows = lane_rows(model, Lane::Spread, width);
    if let Some(found) = model.shelf.spread() {
        rows.extend(share_rows(model, found, width));
    }
    rows.extend(lane_rows(model, Lane::Bands, width));
    rows.extend(worst_rows(model, width));
    rows
}

fn right(model: &Model, width: u16) -> Vec<Row> {
    let mut rows = Vec::new();
    if let Some(found) = model.shelf.spread() {
        rows.extend(histogram_rows(model, found, width));
    }
    rows.extend(lane_rows(model, Lane::Ranking, width));
    if let Some(found) = model.shelf.ranking() {
        rows.extend(ranking_rows(model, found, width));
    }
    rows
}

fn lane_rows(model: &Model, lane: Lane, width: u16) -> Vec<Row> {
    let Some((words, style)) = state::words(model, lane) else { return Vec::new() };
    wrap(&words, usize::from(width.saturating_sub(1))).into_iter().map(|line| (0, line, style)).collect()
}

fn plain(rows: &mut Vec<Row>, words: &str, width: u16, style: Style) {
    rows.extend(
        wrap(words, usize::from(width.saturating_sub(INDENT + 1))).into_iter().map(|line| (INDENT, line, style)),
    );
}

/// A heading, wrapped.
fn heading(words: &str, width: u16, style: Style) -> Vec<Row> {
    wrap(words, usize::from(width.saturating_sub(1))).into_iter().map(|line| (0, line, style)).collect()
}

fn percent(share: f64) -> String {
    let percent = share * 100.0;
    let rest = 100.0 - percent;
    if percent > 0.0 && percent < 10.0 {
        format!("{percent:.*}", decimals(percent).max(2))
    } else if rest > 1e-9 && rest < 1.0 {
        format!("{percent:.*}", decimals(rest))
    } else {
        format!("{percent:.0}")
    }
}

/// Decimals that show the first digit of something small; at most nine.
#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to 0 to 9")]
fn decimals(small: f64) -> usize {
    (-small.log10()).ceil().clamp(0.0, 9.0) as usize
}

/// `3.1 % (2.8 to 3.4 %)`.
fn share_words(share: &Share) -> String {
    format!("{} % ({} to {} %)", percent(share.share), percent(share.low), percent(share.high))
}

fn share_rows(model: &Model, found: &Spreading, width: u16) -> Vec<Row> {
    let (theme, spread) = (model.theme, &found.spread);
    let mut rows = heading("how often short, with 95 % interval", width, theme.heading());
    let part =
        if spread.is_partial() { format!(" of {}, stopped: a part", grouped(spread.asked)) } else { String::new() };
    let failed =
        if spread.failed > 0 { format!("; {} failed, counted as open", grouped(spread.failed)) } else { String::new() };
    let lead = format!("{} samples{part}, seed {}{failed}", grouped(spread.samples), spread.seed);
    let style = if spread.is_partial() || spread.failed > 0 { theme.fault() } else { theme.quiet() };
    plain(&mut rows, &lead, width, style);
    let matters = |check: &&CheckSpread| check.short.count > 0 || check.open > 0;
    let mut listed: Vec<&CheckSpread> = spread.checks.iter().filter(matters).collect();
    listed.sort_by_key(|check| std::cmp::Reverse(check.not_held.count));
    for check in &listed {
        let label = label(found.names.iter().find(|name| name.kind == check.kind).map(|name| &name.margin));
        let open = if check.open > 0 {
            format!(", open {} %", percent(ratio(check.open, spread.samples)))
        } else {
            String::new()
        };
        let verdict = if check.short.count > 0 { Verdict::Short } else { Verdict::Open };
        rows.extend(pair(&label, &format!("{}{open}", share_words(&check.short)), width, theme.verdict(verdict)));
    }
    let never = spread.checks.len() - listed.len();
    if never > 0 {
        let most = spread.checks.iter().find(|check| check.short.count == 0).map_or(0.0, |check| check.short.high);
        let words = format!("{never} checks never short or open: 0 % (0 to {} %)", percent(most));
        plain(&mut rows, &words, width, theme.plain());
    }
    rows
}

#[expect(clippy::cast_precision_loss, reason = "counts of samples are small")]
fn ratio(count: usize, of: usize) -> f64 {
    count as f64 / of.max(1) as f64
}

fn label(margin: Option<&Margin>) -> String {
    margin.map_or_else(|| "a check within the bands".to_owned(), |margin| margin.label.clone())
}

/// A label and what stands at the right end, in one row or two.
fn pair(label: &str, right: &str, width: u16, style: Style) -> Vec<Row> {
    let room = width.saturating_sub(INDENT + 1);
    if cells(label) + 2 + cells(right) <= room {
        let gap = usize::from(room - cells(label) - cells(right));
        return vec![(INDENT, format!("{label}{}{right}", " ".repeat(gap)), style)];
    }
    let first = wrap(label, usize::from(room)).into_iter().map(|line| (INDENT, line, style));
    let second = wrap(right, usize::from(room))
        .into_iter()
        .map(|line| (INDENT + room.saturating_sub(cells(&line)), line, style));
    first.chain(second).collect()
}

fn worst_rows(model: &Model, width: u16) -> Vec<Row> {
    let (Some(report), Some(bands)) = (model.answer.current(), model.bands()) else { return Vec::new() };
    let (theme, found) = (model.theme, &bands.study.found);
    let mut rows = heading("worst found in the bands, room at typical -> worst", width, theme.heading());
    let how = if found.all_corners { "every corner, and inside" } else { "a part of the corners, and inside" };
    let failed = if found.failed > 0 { format!("; {} failed, counted as open", found.failed) } else { String::new() };
    plain(&mut rows, &format!("{} runs: {how}{failed}", grouped(found.runs)), width, theme.quiet());
    let mut same = 0;
    for (margin, band) in report.margins.iter().zip(&bands.margins) {
        let room =
            |of: Option<f64>| of.map_or_else(|| "open".to_owned(), |si| signed(si, margin.dimension, model.units));
        let worst = band.worst.as_ref().and_then(|worst| worst.margin);
        if worst == margin.margin && band.typical == Some(margin.verdict) {
            same += 1;
            continue;
        }
        let head = format!("{} {} {}", margin.verdict.symbol(), margin.verdict.word(), margin.label);
        let rooms = format!("{} -> {}", room(margin.margin), room(worst));
        rows.extend(pair(&head, &rooms, width, theme.verdict(margin.verdict)));
        let open = if band.open_runs > 0 { format!("; {} runs open", grouped(band.open_runs)) } else { String::new() };
        let inside = if band.corner { "" } else { ", inside the bands" };
        let at = if band.inputs.iter().all(|input| input.place == Place::Anywhere) { "" } else { "at " };
        let place = format!("{at}{}{inside}{open}", place_words(band, model.units));
        let room = usize::from(width.saturating_sub(INDENT + 3));
        rows.extend(wrap(&place, room).into_iter().map(|line| (INDENT + 2, line, theme.quiet())));
    }
    if same > 0 {
        plain(&mut rows, &format!("{same} checks do not depend on the bands"), width, theme.plain());
    }
    rows
}

fn signed(si: f64, dimension: Dimension, units: UnitSystem) -> String {
    format!("{}{}", if si >= 0.0 { "+" } else { "" }, format_si(si, dimension, units))
}

/// The number behind the chosen check, with its limit where that limits this very number.
fn governing<'s>(model: &Model, found: &'s Spreading) -> Option<(&'s NumberSpread, Option<f64>)> {
    let margin = model.answer.current().and_then(|report| report.margins.get(model.check))?;
    let id = number_id(&margin.id).unwrap_or(&margin.id);
    let number = found.spread.numbers.iter().find(|number| number.id == id);
    let other = || found.spread.numbers.iter().find(|number| number.id == "arrest_force_peak");
    match number {
        Some(number) => {
            // A check with a factor compares a multiple of the number: its limit is not one of this number.
            let own = model.answer.current().and_then(|report| report.estimate.numbers.get(id));
            Some((number, margin.limit.filter(|_| own == margin.demand)))
        }
        None => other().map(|number| (number, None)),
    }
}

/// The key number that a check looks at, where it has another name.
fn number_id(check: &str) -> Option<&'static str> {
    match check {
        "arrest_force" | "line_force" => Some("arrest_force_peak"),
        "anchor_load" => Some("anchor_force_peak"),
        "arrest_distance" => Some("total_fall_distance"),
        "free_fall" => Some("free_fall_distance"),
        "absorber_stroke" | "deceleration_distance" => Some("deployed_length"),
        _ => None,
    }
}

fn histogram_rows(model: &Model, found: &Spreading, width: u16) -> Vec<Row> {
    let theme = model.theme;
    let Some((number, limit)) = governing(model, found) else { return Vec::new() };
    let show = |si: f64| format_si(si, number.dimension, model.units);
    let (name, about) = number.id.split_once('.').unwrap_or((&number.id, ""));
    let title = format!("{} {}", name.replace('_', " "), about.replace('_', " "));
    let title = format!("how {} spreads", title.trim());
    let mut rows = heading(&title, width, theme.heading());
    let [least, .., most] = number.quantiles;
    if show(least) == show(most) {
        plain(&mut rows, &format!("{} in every sample that gives it", show(least)), width, theme.plain());
        return rows;
    }
    let joined: Vec<usize> = number.bars.chunks(JOINED).map(|bars| bars.iter().sum()).collect();
    let tallest = joined.iter().copied().max().unwrap_or(1).max(1);
    let room = width.saturating_sub(49).clamp(5, 24);
    let step = (most - least) / f64::from(u32::try_from(joined.len()).unwrap_or(1).max(1));
    let mut from = least;
    for count in &joined {
        let bar = super::plot::place(ratio(*count, tallest), room + 1);
        let bar = if *count > 0 { bar.max(1) } else { 0 };
        let ends = format!("{} to {}", show(from), show(from + step));
        let is_last = from + 1.5 * step > most;
        let holds = |limit: &f64| (from..from + step).contains(limit) || is_last && *limit == most;
        let mark = limit.filter(holds).map_or_else(String::new, |limit| format!(" < limit {}", show(limit)));
        let bars = "#".repeat(usize::from(bar));
        let line = format!("{ends:<20} {:>5} % {bars}{mark}", percent(ratio(*count, number.count)));
        rows.push((INDENT, line, theme.plain()));
        from += step;
    }
    let at = |share: f64| QUANTILE_SHARES.iter().position(|known| *known == share).map(|at| show(number.quantiles[at]));
    if let (Some(low), Some(middle), Some(high)) = (at(0.05), at(0.5), at(0.95)) {
        plain(&mut rows, &format!("half below {middle}; 90 % between {low} and {high}"), width, theme.quiet());
    }
    if number.missing > 0 {
        plain(&mut rows, &format!("{} samples do not give it", grouped(number.missing)), width, theme.fault());
    }
    rows
}

fn ranking_rows(model: &Model, found: &Ranked, width: u16) -> Vec<Row> {
    let theme = model.theme;
    let margin = &found.name.margin;
    let title = format!("which band moves the margin of {}", margin.label);
    let mut rows = heading(&title, width, theme.heading());
    plain(&mut rows, "one band at a time, low to high:", width, theme.quiet());
    let reach = |bar: &crate::study::Bar| bar.reach();
    let longest = found.ranking.bars.iter().filter_map(reach).fold(0.0, f64::max);
    for bar in &found.ranking.bars {
        let Some(input) = found.inputs.get(bar.input) else { continue };
        let end =
            |si: Option<f64>| si.map_or_else(|| "open".to_owned(), |si| signed(si, margin.dimension, model.units));
        let length =
            bar.reach().map_or(0, |reach| super::plot::place(if longest > 0.0 { reach / longest } else { 0.0 }, 9));
        let words = format!("{} to {} {:<8}", end(bar.low), end(bar.high), "#".repeat(usize::from(length)));
        rows.extend(pair(&input.path, &words, width, theme.plain()));
    }
    let Some(shares) = &found.ranking.shares else {
        plain(&mut rows, "one band alone: there are no shares to compare", width, theme.quiet());
        return rows;
    };
    if shares.inputs.is_empty() {
        plain(&mut rows, "the margin does not vary over the bands", width, theme.plain());
        return rows;
    }
    plain(&mut rows, "share of the variance, alone | with others (95 %):", width, theme.quiet());
    let mut listed: Vec<&Importance> = shares.inputs.iter().collect();
    listed.sort_by(|a, b| b.total.value.total_cmp(&a.total.value));
    for importance in listed {
        let Some(input) = found.inputs.get(importance.input) else { continue };
        let part = |part: crate::study::Part| format!("{:.2} ({:.2} to {:.2})", part.value, part.low, part.high);
        let words = format!("{} | {}", part(importance.first), part(importance.total));
        rows.extend(pair(&input.path, &words, width, theme.plain()));
    }
    if shares.without_value > 0 {
        let words = format!("{} of {} points left out: no margin there", shares.without_value, shares.points);
        plain(&mut rows, &words, width, theme.fault());
    }
    rows
}

/// The last row that may stand first.
#[must_use]
pub fn last_first(model: &Model, area: Rect) -> usize {
    let (left, right) = columns(model, area.width);
    left.len().max(right.len()).saturating_sub(usize::from(area.height.saturating_sub(1)))
}

/// Draws it from the row that the model is scrolled to.
pub fn draw(buffer: &mut Buffer, area: Rect, model: &Model) {
    let (left, right) = columns(model, area.width);
    if right.is_empty() {
        return super::draw_text(buffer, area, "Spread", &left, model.spread_row, model.theme);
    }
    let half = area.width / 2;
    let rows = usize::from(area.height.saturating_sub(1));
    let first = model.spread_row.min(left.len().max(right.len()).saturating_sub(rows));
    super::draw_text(buffer, Rect { width: half, ..area }, "Spread", &left, first, model.theme);
    let area = Rect { x: area.x + half, width: area.width - half, ..area };
    for (line, (indent, text, style)) in (1..area.height).zip(right.iter().skip(first)) {
        crate::tui::text::put(buffer, area, *indent, line, text, *style);
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn shares_near_all_and_near_none_show_what_is_left() {
        let shares = [0.0, 0.000_03, 0.0312, 0.632, 0.995, 0.999_77, 0.999_996, 1.0];
        assert_eq!(shares.map(percent), ["0", "0.003", "3.12", "63", "99.5", "99.98", "99.9996", "100"]);
    }
}
