//! The view Vary: the chosen input across its range.
use super::plot::{Curve, GUTTER, Grows, Level, Plot, Stroke, draw_foot, place};
use super::state;
use super::units::Scale;
use crate::margin::{Verdict, worst};
use crate::quantity::format_unit;
use crate::study::{Crossing, Row};
use crate::tui::model::Model;
use crate::tui::studies::{Lane, Name, Varied};
use crate::tui::text::{cells, fit, put, put_right};
use ratatui::Frame;
use ratatui::layout::Rect;

/// Most rows for the values at which a verdict changes.
const MOST_CHANGES: u16 = 6;
/// Share of the rows at both ends of a margin's range that may leave the plot: a stroke used up sends forces far away.
const TAIL: f64 = 0.02;

/// Draws it.
pub fn draw(frame: &mut Frame, area: Rect, model: &Model) {
    let theme = model.theme;
    let Some(varied) = model.shelf.vary() else {
        put(frame.buffer_mut(), area, 0, 0, "Vary", theme.heading());
        let nothing = "choose a number among the inputs: this view moves it across its range";
        return state::draw(frame.buffer_mut(), area, model, Lane::Vary, nothing);
    };
    let unit = varied.input.measure.unit;
    let (low, high) = (format_unit(*varied.range.start(), unit), format_unit(*varied.range.end(), unit));
    let room = usize::from(area.width);
    let long = format!("Vary {} from {low} to {high}, the rest at typical values", varied.input.path);
    let short = format!("Vary {} {low} to {high}, typical", varied.input.path);
    let title = if cells(&long) <= area.width { long } else { short };
    put(frame.buffer_mut(), area, 0, 0, &fit(&title, room), theme.heading());
    let changes = change_lines(varied, area.width);
    let rows = u16::try_from(changes.len()).unwrap_or(MOST_CHANGES).min(MOST_CHANGES).min(area.height / 3).max(1);
    let plot = Rect { y: area.y + 1, height: area.height.saturating_sub(3 + rows), ..area };
    let strip = Rect { y: plot.bottom(), height: 1, ..area };
    let foot = Rect { y: strip.bottom(), height: 1, ..area };
    let below = Rect { y: foot.bottom(), height: rows, ..area };
    let Some(name) = chosen(model, varied) else { return };
    draw_plot(frame, plot, model, varied, name);
    draw_strip(frame, strip, model, varied);
    let across = shown_range(varied);
    draw_foot(frame, foot, across, unit.symbol(), theme.quiet());
    let hidden = changes.len().saturating_sub(usize::from(rows));
    for (row, (line, verdict)) in (0..rows).zip(&changes) {
        put(frame.buffer_mut(), below, 0, row, &fit(line, room), verdict.map_or(theme.plain(), |v| theme.verdict(v)));
    }
    if hidden > 0 {
        put_right(frame.buffer_mut(), below, rows - 1, &format!(" +{hidden} more"), theme.quiet());
    }
}

/// The check whose margin is drawn: the one chosen among the margins, else the first.
fn chosen<'v>(model: &Model, varied: &'v Varied) -> Option<&'v Name> {
    let id = model.answer.current().and_then(|report| report.margins.get(model.check)).map(|margin| &margin.id);
    varied.names.iter().find(|name| Some(&name.margin.id) == id).or_else(|| varied.names.first())
}

fn shown_range(varied: &Varied) -> (f64, f64) {
    let factor = varied.input.measure.unit.factor();
    (*varied.range.start() / factor, *varied.range.end() / factor)
}

fn draw_plot(frame: &mut Frame, area: Rect, model: &Model, varied: &Varied, name: &Name) {
    let theme = model.theme;
    let scale = Scale::of(name.margin.dimension, model.units);
    let factor = varied.input.measure.unit.factor();
    let margin = |row: &Row| row.run.check(name.kind).and_then(|check| check.margin).map(|room| scale.shown(room));
    let points: Vec<(f64, Option<f64>)> =
        varied.variation.rows.iter().map(|row| (row.value / factor, margin(row))).collect();
    let Some(along) = along(&points) else {
        put(frame.buffer_mut(), area, 1, 1, "this check has no margin anywhere in the range", theme.plain());
        return;
    };
    let here = varied.input.measure.si() / factor;
    let curves = points
        .split(|(_, room)| room.is_none())
        .map(|piece| Curve {
            points: piece.iter().filter_map(|&(x, room)| Some((x, room?.clamp(along.0, along.1)))).collect(),
            stroke: Stroke::Solid,
            color: theme.curve(),
        })
        .collect();
    let zero = Level { at: 0.0, name: "0: short below".to_owned(), color: theme.limit(), style: theme.quiet() };
    let now = format!(" now {}", format_unit(varied.input.measure.si(), varied.input.measure.unit));
    Plot {
        title: fit(&format!("margin of {}, {}", name.margin.label, scale.symbol), usize::from(area.width)),
        across: shown_range(varied),
        along,
        grows: Grows::Up,
        curves,
        levels: vec![zero],
        head: Some(here),
        head_style: theme.play_head(),
        tick_style: theme.quiet(),
        title_style: theme.plain(),
    }
    .draw(frame, area);
    put_right(frame.buffer_mut(), area, 0, &now, theme.play_head());
}

/// Range of the margins with zero in it; the farthest few at both ends may leave it.
#[expect(clippy::cast_precision_loss, clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "small, >= 0")]
fn along(points: &[(f64, Option<f64>)]) -> Option<(f64, f64)> {
    let mut rooms: Vec<f64> = points.iter().filter_map(|(_, room)| *room).collect();
    rooms.sort_by(f64::total_cmp);
    let tail = (rooms.len() as f64 * TAIL) as usize;
    let low = rooms.get(tail)?.min(0.0);
    let high = rooms.get(rooms.len() - 1 - tail)?.max(0.0);
    let gap = ((high - low) * 0.06).max(1e-9);
    Some((low - gap, high + gap))
}

/// The worst word of all checks under each column.
fn draw_strip(frame: &mut Frame, area: Rect, model: &Model, varied: &Varied) {
    let field = Rect { x: area.x + GUTTER.min(area.width), width: area.width.saturating_sub(GUTTER), ..area };
    put_right(frame.buffer_mut(), Rect { width: GUTTER, ..area }, 0, "all ", model.theme.quiet());
    let rows = &varied.variation.rows;
    for column in 0..field.width {
        let share = f64::from(column) / f64::from(field.width.saturating_sub(1).max(1));
        let last = u16::try_from(rows.len().saturating_sub(1)).unwrap_or(u16::MAX);
        let Some(row) = rows.get(usize::from(place(share, last + 1))) else { continue };
        let verdict = word(row);
        put(frame.buffer_mut(), field, column, 0, &verdict.symbol().to_string(), model.theme.verdict(verdict));
    }
}

fn word(row: &Row) -> Verdict {
    worst(row.run.checks.iter().map(|check| check.verdict))
}

/// One line for each value at which a check changes; those that change together share it.
fn change_lines(varied: &Varied, width: u16) -> Vec<(String, Option<Verdict>)> {
    if varied.variation.crossings.is_empty() {
        let words = "no verdict changes in this range";
        return crate::tui::text::wrap(words, usize::from(width)).into_iter().map(|line| (line, None)).collect();
    }
    let together = |a: &Crossing, b: &Crossing| (a.value, a.below, a.above) == (b.value, b.below, b.above);
    let line = |group: &[Crossing]| {
        let at = group.first()?;
        let value = format_unit(round(at, varied), varied.input.measure.unit);
        let labels: Vec<&str> = group.iter().map(|at| label(varied, at)).collect();
        let first = labels.first().copied().unwrap_or_default();
        let more = if labels.len() > 1 { format!(" and {} more", labels.len() - 1) } else { String::new() };
        let long = format!("{value}: {first}{more} {} below, {} above", at.below.word(), at.above.word());
        let short = format!("{value}: {first}{more} {} -> {}", at.below.symbol(), at.above.symbol());
        let words = if cells(&long) <= width { long } else { short };
        Some((words, Some(at.below.max(at.above))))
    };
    varied.variation.crossings.chunk_by(together).filter_map(line).collect()
}

/// Four digits, towards the side that holds.
fn round(at: &Crossing, varied: &Varied) -> f64 {
    let factor = varied.input.measure.unit.factor();
    let shown = at.value / factor;
    if shown == 0.0 {
        return at.value;
    }
    let step = 10_f64.powi(crate::sheet::ticks::floor_log10(shown.abs()) - 3);
    let up = at.value > at.beyond;
    let whole = if up { (shown / step).ceil() } else { (shown / step).floor() };
    whole * step * factor
}

fn label<'v>(varied: &'v Varied, at: &Crossing) -> &'v str {
    varied.names.iter().find(|name| name.kind == at.kind).map_or("a check", |name| &name.margin.label)
}
