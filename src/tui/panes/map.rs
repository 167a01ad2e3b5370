//! The view Map: the verdict over two inputs, the line along which it changes, the present values and a movable point.
use super::plot::{self, GUTTER, draw_foot, place};
use super::state;
use crate::margin::{Margin, Verdict};
use crate::quantity::{UnitSystem, format_si};
use crate::sheet::ticks::ticks;
use crate::study::{Axis, Field};
use crate::tui::command::{Command, key_name};
use crate::tui::map::text;
use crate::tui::model::{Model, Pane};
use crate::tui::studies::{Lane, Mapped};
use crate::tui::text::{fit, put, put_right, put_wrapped, wrap};
use ratatui::Frame;
use ratatui::layout::{Position, Rect};

/// Rows below the field: ticks, legend, point in two rows.
const BELOW: u16 = 4;
/// The present values.
const NOW: &str = "@";
/// The movable point.
const POINT: &str = "+";
/// The line between holding and not holding.
const LINE: &str = "#";

/// The cells of the field.
#[must_use]
pub fn field(area: Rect) -> Rect {
    let field = plot::field(area);
    Rect { height: field.height.saturating_sub(BELOW), ..field }
}

/// The cell under the mouse, counted from the lower left.
#[must_use]
pub fn cell_at(area: Rect, at: Position) -> Option<(usize, usize)> {
    let field = field(area);
    field.contains(at).then(|| (usize::from(at.x - field.x), usize::from(field.bottom() - 1 - at.y)))
}

/// Room with its sign and unit.
#[must_use]
pub fn room(margin: &Margin, units: UnitSystem) -> String {
    let shown =
        |value: f64| format!("{}{}", if value >= 0.0 { "+" } else { "" }, format_si(value, margin.dimension, units));
    margin.margin.map_or_else(|| margin.verdict.word().to_owned(), shown)
}

/// Draws it.
pub fn draw(frame: &mut Frame, area: Rect, model: &Model) {
    let theme = model.theme;
    let Some(mapped) = model.shelf.map() else {
        put(frame.buffer_mut(), area, 0, 0, "Map", theme.heading());
        let nothing = "the file has no two numbers that can be moved across a range";
        return state::draw(frame.buffer_mut(), area, model, Lane::Map, nothing);
    };
    let [across, up] = &mapped.inputs;
    let part = if mapped.field.partial { ", STOPPED: a part" } else { "" };
    let unit = up.measure.unit.symbol();
    let long = format!("Map of {} upwards, {unit}, the rest at typical values{part}", up.path);
    let short = format!("Map {} up, {unit}, typical{part}", up.path);
    let title = if wrap(&long, usize::from(area.width)).len() == 1 { long } else { short };
    put(frame.buffer_mut(), area, 0, 0, &fit(&title, usize::from(area.width)), theme.heading());
    let cells = field(area);
    draw_gutter(frame, area, cells, model, mapped);
    draw_cells(frame, cells, model, &mapped.field);
    draw_line(frame, cells, model, &mapped.field);
    draw_points(frame, cells, model, mapped);
    let foot = Rect { y: cells.bottom(), height: 1, ..area };
    let factor = across.measure.unit.factor();
    let range = &mapped.field.across.range;
    draw_foot(frame, foot, (range.start() / factor, range.end() / factor), across.measure.unit.symbol(), theme.quiet());
    draw_words(frame, Rect { y: foot.bottom(), height: BELOW - 1, ..area }, model, mapped);
}

fn draw_gutter(frame: &mut Frame, area: Rect, cells: Rect, model: &Model, mapped: &Mapped) {
    let axis = &mapped.field.up;
    let factor = mapped.inputs[1].measure.unit.factor();
    let (low, high) = (axis.range.start() / factor, axis.range.end() / factor);
    let found = ticks(low, high, usize::from(cells.height / 3).clamp(2, 9));
    let gutter = Rect { width: GUTTER, y: cells.y, height: cells.height, ..area };
    for row in 0..cells.height {
        put(frame.buffer_mut(), gutter, GUTTER - 1, row, "│", model.theme.quiet());
    }
    for &value in &found.values {
        let row = place(1.0 - (value - low) / (high - low), cells.height);
        put_right(frame.buffer_mut(), gutter, row, &format!("{} ┤", found.label(value)), model.theme.quiet());
    }
}

fn draw_cells(frame: &mut Frame, cells: Rect, model: &Model, field: &Field) {
    for row in 0..cells.height {
        for column in 0..cells.width {
            let up = usize::from(cells.height - 1 - row);
            let Some(cell) = field.cell(usize::from(column), up) else { continue };
            let verdict = cell.verdict();
            let symbol = verdict.symbol().to_string();
            put(frame.buffer_mut(), cells, column, row, &symbol, model.theme.verdict(verdict));
        }
    }
}

fn share(axis: &Axis, value: f64) -> f64 {
    (value - axis.range.start()) / (axis.range.end() - axis.range.start())
}

fn draw_line(frame: &mut Frame, cells: Rect, model: &Model, field: &Field) {
    // The points of the line stand on the grid, which has a cell of the screen for each of its own.
    for edge in field.line.iter().flatten() {
        let column = place(share(&field.across, edge.x), cells.width);
        let row = place(1.0 - share(&field.up, edge.y), cells.height);
        put(frame.buffer_mut(), cells, column, row, LINE, model.theme.heading());
    }
}

fn draw_points(frame: &mut Frame, cells: Rect, model: &Model, mapped: &Mapped) {
    let axes = [&mapped.field.across, &mapped.field.up];
    let mut mark = |values: [f64; 2], symbol: &str, style| {
        let shares = [share(axes[0], values[0]), share(axes[1], values[1])];
        if shares.iter().all(|share| (0.0..=1.0).contains(share)) {
            let (column, row) = (place(shares[0], cells.width), place(1.0 - shares[1], cells.height));
            put(frame.buffer_mut(), cells, column, row, symbol, style);
        }
    };
    mark([0, 1].map(|axis| mapped.inputs[axis].measure.si()), NOW, model.theme.play_head());
    if model.map.at.is_some() {
        mark(model.map_point(mapped), POINT, model.theme.chosen(true));
    }
}

/// What the axis to the right is, the legend, and the point.
fn draw_words(frame: &mut Frame, area: Rect, model: &Model, mapped: &Mapped) {
    let theme = model.theme;
    let [across, up] = &mapped.inputs;
    let width = usize::from(area.width);
    let long = format!(
        "{} to the right, {}   {NOW} now  {POINT} point  {LINE} where a verdict changes",
        across.path,
        across.measure.unit.symbol()
    );
    let short = format!("{} ->  {NOW} now {POINT} point {LINE} change", across.path);
    let line = if wrap(&long, width).len() == 1 { long } else { fit(&short, width) };
    put(frame.buffer_mut(), area, 0, 0, &line, theme.quiet());
    let point = model.map_point(mapped);
    let Some(seen) = &model.map.seen else { return };
    let who = if model.map.at.is_some() { "point" } else { "now" };
    let values = format!("{}, {}", text(across, point[0]), text(up, point[1]));
    let keys = match (model.map.at.is_some(), model.pane == Pane::View) {
        (true, _) => format!("; {} writes it into the inputs", key_name(Command::IntoInputs)),
        (false, true) => "; arrows move a point".to_owned(),
        (false, false) => String::new(),
    };
    let verdict: Verdict = seen.verdict;
    let words = format!("{who} {values}: {} {} {}{keys}", verdict.symbol(), verdict.word(), seen.words);
    let rest = Rect { y: area.y + 1, height: area.height.saturating_sub(1), ..area };
    put_wrapped(frame.buffer_mut(), rest, &words, theme.verdict(verdict));
}
