//! The view Elevation of a fall with things beside the fall line: one scale both ways, a cell counting twice as high as
//! wide.
use super::end_loads;
use super::scene::{Bar, Scene};
use super::side::{Mark, MarkKind, Side, Spot, Wall};
use super::strings::{Label, Rank, Rows, axis_ticks, draw_axis, draw_labels, draw_sum, title};
use crate::scenario::SubjectKind;
use crate::sheet::ticks::{Ticks, ticks};
use crate::tui::text::{cells, fit, put, put_right};
use crate::tui::theme::Theme;
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::{Color, Style};
use ratatui::symbols::Marker;
use ratatui::widgets::Widget;
use ratatui::widgets::canvas::{Canvas, Line, Points};

/// Columns of the words beside the drawing.
const LABELS: u16 = 36;
const LEAST_LABELS: u16 = 21;
/// Columns of the drawing below which nothing is drawn.
const LEAST_FIELD: u16 = 10;
/// Height of a cell over its width.
const CELL: f64 = 2.0;

/// Where the parts of the pane stand, and the scale.
struct Sheet {
    gutter: Rect,
    field: Rect,
    labels: Rect,
    foot: Rect,
    sum: Option<Rect>,
    rows: Rows,
    left_m: f64,
    per_column_m: f64,
}

impl Sheet {
    fn of(area: Rect, scene: &Scene, side: &Side) -> Self {
        let sum = u16::from(area.height >= 16);
        let body = Rect { y: area.y + 1, height: area.height.saturating_sub(2 + sum), ..area };
        let (high, low) = heights(scene, side);
        let (left, right) = side.extent();
        let least_row_m = (high - low).max(0.1) / f64::from(body.height.saturating_sub(3).max(1));
        let gutter = gutter_width(scene, (high, low), body.height, least_row_m);
        let most = area.width.saturating_sub(gutter + LEAST_LABELS);
        let wanted = whole((right - left) * CELL / least_row_m) + 5;
        let columns = wanted.clamp(area.width.saturating_sub(gutter + LABELS).min(most), most);
        let least_column_m = (right - left) / f64::from(columns.saturating_sub(4).max(1));
        let per_row_m = least_row_m.max(CELL * least_column_m);
        let per_column_m = per_row_m / CELL;
        let spare_m = per_row_m * f64::from(body.height) - (high - low);
        let field = Rect { x: area.x + gutter, width: columns, ..body };
        Self {
            gutter: Rect { width: gutter, ..body },
            field,
            labels: Rect { x: field.right(), width: area.width.saturating_sub(gutter + columns), ..body },
            foot: Rect { y: body.bottom(), height: 1, ..area },
            sum: (sum > 0).then_some(Rect { y: area.bottom() - 1, height: 1, ..area }),
            rows: Rows { high_m: high + 0.4 * spare_m, per_row_m, count: body.height },
            left_m: (left + right - per_column_m * f64::from(columns)) / 2.0,
            per_column_m,
        }
    }

    /// The cell of a place, where it is within the drawing.
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "checked to lie within the drawing")]
    fn cell(&self, (x, y): Spot) -> Option<(u16, u16)> {
        let column = ((x - self.left_m) / self.per_column_m).floor();
        let row = ((self.rows.high_m - y) / self.rows.per_row_m).floor();
        let inside =
            column >= 0.0 && row >= 0.0 && column < f64::from(self.field.width) && row < f64::from(self.field.height);
        inside.then_some((column as u16, row as u16))
    }

    /// The columns from one offset to another, cut at the drawing's edges.
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to the drawing")]
    fn columns(&self, from_m: f64, to_m: f64) -> (u16, u16) {
        let column = |x: f64| ((x - self.left_m) / self.per_column_m).round().clamp(0.0, f64::from(self.field.width));
        (column(from_m) as u16, column(to_m) as u16)
    }

    fn right_m(&self) -> f64 {
        self.left_m + self.per_column_m * f64::from(self.field.width)
    }
}

/// Highest and lowest place that the drawing must hold, m.
fn heights(scene: &Scene, side: &Side) -> Spot {
    let cable = side.cable.iter().flat_map(|cable| cable.supports.into_iter().chain([cable.peak]));
    let spots = side.path.iter().copied().chain(cable).chain([side.anchor]).chain(side.edge);
    spots.fold(scene.extent(), |(high, low), (_, y)| (high.max(y), low.min(y)))
}

fn gutter_width(scene: &Scene, (high, low): Spot, count: u16, per_row_m: f64) -> u16 {
    let reach = high - low;
    let widest = |high_m| axis_ticks(scene, &Rows { high_m, per_row_m, count }).widest();
    let labels = widest(high + 3.0 * per_row_m).max(widest(high - reach).max(widest(high + reach)));
    (u16::try_from(labels).unwrap_or(5) + 2).clamp(5, 12)
}

#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to the columns of a terminal")]
fn whole(columns: f64) -> u16 {
    columns.ceil().clamp(0.0, 10_000.0) as u16
}

/// Draws a scene with what stands beside the fall line.
pub fn draw(buffer: &mut Buffer, area: Rect, scene: &Scene, side: &Side, theme: Theme) {
    if area.height < 8 || area.width < LEAST_FIELD + LEAST_LABELS + 5 {
        put(buffer, area, 0, 0, "no room to draw", theme.quiet());
        return;
    }
    let sheet = Sheet::of(area, scene, side);
    draw_title(buffer, area, scene, theme);
    draw_axis(buffer, sheet.gutter, scene, &sheet.rows, theme);
    for bar in &scene.bars {
        draw_bar(buffer, &sheet, bar, theme);
    }
    draw_standing(buffer, &sheet, scene, side, theme);
    for wall in &side.walls {
        draw_wall(buffer, &sheet, wall, theme);
    }
    draw_curves(buffer, &sheet, side, theme);
    draw_fixed(buffer, &sheet, side, theme);
    draw_body(buffer, &sheet, scene, side, theme);
    let labels = draw_marks(buffer, &sheet, side, theme);
    name_walls(buffer, &sheet, side, theme);
    let ends = draw_ends(buffer, &sheet, scene, side, theme);
    let labels = [labels, ends, fixed_labels(&sheet, scene, side, theme)].concat();
    draw_labels(buffer, sheet.labels, scene, &sheet.rows, labels, theme);
    draw_foot(buffer, &sheet, scene, theme);
    if let Some(sum) = sheet.sum {
        draw_sum(buffer, sum, scene, theme);
    }
}

fn draw_title(buffer: &mut Buffer, area: Rect, scene: &Scene, theme: Theme) {
    let room = usize::from(area.width);
    let short = title(scene);
    let long = format!("{short}; one scale both ways");
    let text = if usize::from(cells(&long)) <= room { long } else { fit(&short, room) };
    put(buffer, area, 0, 0, &text, theme.quiet());
}

/// Hatching below the top over the extent, dots in the reserve above it.
fn draw_bar(buffer: &mut Buffer, sheet: &Sheet, bar: &Bar, theme: Theme) {
    let (from, to) = bar.extent_m.map_or((0, sheet.field.width), |(from, to)| sheet.columns(from, to));
    let wide = usize::from(to.saturating_sub(from).max(u16::from(from < sheet.field.width)));
    let top = sheet.rows.below(bar.top_m);
    for row in sheet.rows.below(bar.top_m + bar.reserve_m)..top {
        put(buffer, sheet.field, from, row, &"·".repeat(wide), theme.verdict(bar.verdict));
    }
    for row in top..sheet.rows.count.min(top + 2) {
        put(buffer, sheet.field, from, row, &"/".repeat(wide), theme.quiet());
    }
}

/// The standing surface: up to the edge, or a step wide about the fall line where nothing tells how far it goes.
fn draw_standing(buffer: &mut Buffer, sheet: &Sheet, scene: &Scene, side: &Side, theme: Theme) {
    let Some(standing) = scene.standing_m else { return };
    let (from, to) = match side.edge {
        Some((edge, _)) if side.anchor.0 < edge => sheet.columns(sheet.left_m, edge),
        Some((edge, _)) => sheet.columns(edge, sheet.right_m()),
        None => sheet.columns(-0.5, 0.5),
    };
    let wide = usize::from(to.saturating_sub(from).max(1));
    put(buffer, sheet.field, from, sheet.rows.below(standing), &"▀".repeat(wide), theme.quiet());
}

fn draw_wall(buffer: &mut Buffer, sheet: &Sheet, wall: &Wall, theme: Theme) {
    let (top, bottom) = (sheet.rows.below(wall.top_m), sheet.rows.below(wall.bottom_m));
    let Some(column) = wall_column(sheet, wall) else { return };
    for row in top..bottom.max(top + 1) {
        put(buffer, sheet.field, column, row, "▒", theme.plain());
    }
}

fn wall_column(sheet: &Sheet, wall: &Wall) -> Option<u16> {
    sheet.cell((wall.offset_m, sheet.rows.high_m)).map(|(column, _)| column)
}

/// Names along the faces, where they cross nothing.
fn name_walls(buffer: &mut Buffer, sheet: &Sheet, side: &Side, theme: Theme) {
    for wall in &side.walls {
        let Some(column) = wall_column(sheet, wall) else { continue };
        let (top, bottom) = (sheet.rows.below(wall.top_m), sheet.rows.below(wall.bottom_m));
        for row in top..bottom.min(sheet.rows.count) {
            if write_beside(buffer, sheet.field, (column, row), &wall.name, theme.plain()) {
                break;
            }
        }
    }
}

/// Cable, path and line as dots.
fn draw_curves(buffer: &mut Buffer, sheet: &Sheet, side: &Side, theme: Theme) {
    let half_x = sheet.per_column_m / 4.0;
    let half_y = sheet.rows.per_row_m / 8.0;
    let color = |style: Style| style.fg.unwrap_or(Color::Reset);
    let now = color(theme.play_head());
    Canvas::default()
        .marker(Marker::Braille)
        .x_bounds([sheet.left_m + half_x, sheet.right_m() - half_x])
        .y_bounds([sheet.rows.low_m() + half_y, sheet.rows.high_m - half_y])
        .paint(|context| {
            if let Some(cable) = &side.cable {
                let dots: Vec<Spot> = cable.unloaded.iter().step_by(4).copied().collect();
                context.draw(&Points { coords: &dots, color: theme.helper() });
                for support in cable.supports {
                    context.draw(&straight(support, cable.peak, theme.curve()));
                }
            }
            for pair in side.path.windows(2).filter(|_| side.swings) {
                context.draw(&straight(pair[0], pair[1], theme.curve()));
            }
            for pair in side.line.windows(2) {
                context.draw(&straight(pair[0], pair[1], now));
            }
        })
        .render(sheet.field, buffer);
}

const fn straight(from: Spot, to: Spot, color: Color) -> Line {
    Line { x1: from.0, y1: from.1, x2: to.0, y2: to.1, color }
}

/// Anchor, supports and edge.
fn draw_fixed(buffer: &mut Buffer, sheet: &Sheet, side: &Side, theme: Theme) {
    let mut point = |at: Spot, symbol: &str| {
        if let Some((column, row)) = sheet.cell(at) {
            put(buffer, sheet.field, column, row, symbol, theme.heading());
        }
    };
    match &side.cable {
        Some(cable) => cable.supports.into_iter().for_each(|at| point(at, "#")),
        None => point(side.anchor, "╤"),
    }
    if let Some(edge) = side.edge {
        point(edge, "+");
    }
}

/// The body at the play head, as wide as the file says.
fn draw_body(buffer: &mut Buffer, sheet: &Sheet, scene: &Scene, side: &Side, theme: Theme) {
    let Some(now) = side.marks.last() else { return };
    let foot_m = now.at.1 - scene.stations[4].body_m;
    let top = sheet.rows.below(now.at.1);
    let foot = sheet.rows.below(foot_m).max(top + 1);
    let Some((column, _)) = sheet.cell((now.at.0, sheet.rows.high_m)) else { return };
    let (left, right) = sheet.columns(now.at.0 - side.half_width_m, now.at.0 + side.half_width_m);
    let symbol = match scene.subject {
        SubjectKind::Load => "█",
        SubjectKind::Person => "▐",
    };
    for row in top..foot {
        let (from, wide) = if right > left { (left, right - left) } else { (column, 1) };
        put(buffer, sheet.field, from, row, &symbol.repeat(usize::from(wide)), theme.play_head());
    }
}

/// Draws every mark with its word beside it where nothing is in the way, and gives the labels of all whose time matters
/// or whose word found no room.
fn draw_marks(buffer: &mut Buffer, sheet: &Sheet, side: &Side, theme: Theme) -> Vec<Label> {
    let style = |mark: &Mark| match mark.kind {
        MarkKind::Station => theme.heading(),
        MarkKind::Strike => theme.fault(),
        MarkKind::Now => theme.play_head(),
    };
    for mark in &side.marks {
        if let Some((column, row)) = sheet.cell(mark.at) {
            put(buffer, sheet.field, column, row, mark.symbol, style(mark));
        }
    }
    let mut labels = Vec::new();
    for mark in &side.marks {
        let Some(cell) = sheet.cell(mark.at) else { continue };
        let is_named = write_beside(buffer, sheet.field, cell, &mark.word, style(mark));
        if side.swings || !is_named && mark.kind != MarkKind::Now {
            let rank = match (side.swings, mark.kind) {
                (false, _) => Rank::Level,
                (true, MarkKind::Station) => Rank::Dimension,
                (true, _) => Rank::First,
            };
            let text = mark_text(mark, sheet.labels.width.saturating_sub(2));
            labels.push(Label { row: cell.1, text, style: style(mark), rank });
        }
    }
    labels
}

fn mark_text(mark: &Mark, room: u16) -> String {
    let Mark { symbol, word, time_s, .. } = mark;
    let brief = word.split(' ').next().unwrap_or_default();
    let choices = [format!("{symbol} {word} {time_s:.2} s"), format!("{symbol} {brief} {time_s:.2} s")];
    choices.into_iter().find(|text| cells(text) <= room).unwrap_or_else(|| (*symbol).to_owned())
}

/// The pull on both ends of a lifeline under its largest load.
fn draw_ends(buffer: &mut Buffer, sheet: &Sheet, scene: &Scene, side: &Side, theme: Theme) -> Vec<Label> {
    let Some(cable) = &side.cable else { return Vec::new() };
    let supports = cable.supports.map(|at| sheet.cell(at));
    let room = sheet.labels.width.saturating_sub(2);
    end_loads::draw(buffer, sheet.field, room, supports, (&cable.end_loads, &scene.scale), theme.heading())
}

/// Writes a word right or left of a cell where all cells and one beyond are blank.
fn write_beside(buffer: &mut Buffer, field: Rect, (column, row): (u16, u16), word: &str, style: Style) -> bool {
    let wide = cells(word);
    let blank = |from: u16, to: u16| {
        (from..to).all(|x| buffer.cell((field.x + x, field.y + row)).is_some_and(|cell| cell.symbol() == " "))
    };
    let right = column + 1;
    if right + 1 + wide <= field.width && blank(right, (right + 2 + wide).min(field.width)) {
        put(buffer, field, right + 1, row, word, style);
        return true;
    }
    let Some(left) = column.checked_sub(wide + 1) else { return false };
    if blank(left.saturating_sub(1), column) {
        put(buffer, field, left, row, word, style);
        return true;
    }
    false
}

/// Labels of the edge and of the cable.
fn fixed_labels(sheet: &Sheet, scene: &Scene, side: &Side, theme: Theme) -> Vec<Label> {
    let last = sheet.rows.count.saturating_sub(1);
    let label = |height_m: f64, text: String, rank| Label {
        row: sheet.rows.below(height_m).min(last),
        text,
        style: theme.plain(),
        rank,
    };
    let mut labels = Vec::new();
    if let Some(edge) = side.edge {
        labels.push(label(edge.1, format!("+ {} edge", scene.scale.text(edge.1)), Rank::Level));
    }
    if let Some(cable) = &side.cable {
        let chord_m = cable.peak.1 + cable.peak_sag_m;
        let sag = |metres: f64, long: &str, short: &str| {
            let number = scene.scale.text(metres);
            let long = format!("{number} {long}");
            let fits = cells(&long) + 2 <= sheet.labels.width;
            if fits { long } else { format!("{number} {short}") }
        };
        labels.push(label(chord_m - cable.sag_m, sag(cable.sag_m, "sag without load", "sag empty"), Rank::First));
        labels.push(label(cable.peak.1, sag(cable.peak_sag_m, "sag at peak load", "sag peak"), Rank::First));
    }
    labels
}

/// Ticks of the offset from the fall line, and what they are.
fn draw_foot(buffer: &mut Buffer, sheet: &Sheet, scene: &Scene, theme: Theme) {
    let factor = scene.scale.factor;
    let (left, right) = (sheet.left_m / factor, sheet.right_m() / factor);
    let mut count = usize::from(sheet.field.width / 4).max(2);
    let fits = |found: &Ticks| {
        (found.widest() + 2) * found.values.len() <= usize::from(sheet.field.width) && !found.values.is_empty()
    };
    let found = loop {
        let found = ticks(left, right, count);
        if fits(&found) || count <= 2 {
            break found;
        }
        count -= 1;
    };
    let area = Rect { x: sheet.field.x, width: sheet.field.width, ..sheet.foot };
    for &value in &found.values {
        let text = found.label(value);
        let Some((column, _)) = sheet.cell((value * factor, sheet.rows.high_m)) else { continue };
        let start = column.saturating_sub(cells(&text) / 2);
        if start + cells(&text) <= area.width {
            put(buffer, area, start, 0, &text, theme.quiet());
        }
    }
    let symbol = scene.scale.symbol;
    put_right(buffer, Rect { width: sheet.gutter.width, ..sheet.foot }, 0, &format!("{symbol} └"), theme.quiet());
    let words = format!("{symbol} from the fall line");
    let beside = Rect { x: sheet.labels.x, width: sheet.labels.width, ..sheet.foot };
    put(buffer, beside, 1, 0, &fit(&words, usize::from(beside.width.saturating_sub(1))), theme.quiet());
}
