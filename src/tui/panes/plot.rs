//! A plain plot: curves over round ticks, level lines with their names, a play head.
use crate::sheet::ticks::{Ticks, ticks};
use crate::tui::text::{cells, put, put_right};
use ratatui::Frame;
use ratatui::layout::Rect;
use ratatui::style::{Color, Style};
use ratatui::symbols::Marker;
use ratatui::widgets::Widget;
use ratatui::widgets::canvas::{Canvas, Line, Points};

/// How a curve is drawn; solid and dotted differ without colour too.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stroke {
    /// Joined points.
    Solid,
    /// The points alone.
    Dotted,
}

/// One curve in axis units.
#[derive(Clone, Debug)]
pub struct Curve {
    /// Points in rising order of the first coordinate.
    pub points: Vec<(f64, f64)>,
    /// Stroke.
    pub stroke: Stroke,
    /// Colour.
    pub color: Color,
}

/// A level line across the plot with its name.
#[derive(Clone, Debug)]
pub struct Level {
    /// Where, in axis units.
    pub at: f64,
    /// Name with its number and unit.
    pub name: String,
    /// Colour of the line.
    pub color: Color,
    /// Style of the name.
    pub style: Style,
}

/// Which way the second axis grows.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Grows {
    /// Larger values higher up.
    Up,
    /// Larger values lower down, as a fall does.
    Down,
}

/// Everything one plot shows.
#[derive(Clone, Debug)]
pub struct Plot {
    /// Title of the second axis with its unit, on the first row.
    pub title: String,
    /// Range of the first axis.
    pub across: (f64, f64),
    /// Range of the second axis.
    pub along: (f64, f64),
    /// Which way the second axis grows.
    pub grows: Grows,
    /// Curves, later ones on top.
    pub curves: Vec<Curve>,
    /// Level lines.
    pub levels: Vec<Level>,
    /// Play head on the first axis.
    pub head: Option<f64>,
    /// Style of the play head.
    pub head_style: Style,
    /// Style of tick labels.
    pub tick_style: Style,
    /// Style of the title.
    pub title_style: Style,
}

/// Width kept free at the left for tick labels; equal in plots that stand above each other.
pub const GUTTER: u16 = 7;

/// The part of `area` that the curves fill, below the title row and right of the tick labels.
#[must_use]
pub fn field(area: Rect) -> Rect {
    Rect {
        x: area.x + GUTTER.min(area.width),
        y: area.y + 1.min(area.height),
        width: area.width.saturating_sub(GUTTER),
        height: area.height.saturating_sub(1),
    }
}

impl Plot {
    /// Draws the title row, tick labels and curves.
    pub fn draw(&self, frame: &mut Frame, area: Rect) {
        let field = field(area);
        put(frame.buffer_mut(), area, 0, 0, &self.title, self.title_style);
        if field.width < 4 || field.height < 2 {
            return;
        }
        self.draw_ticks(frame, area, field);
        self.draw_head(frame, field);
        self.draw_curves(frame, field);
        self.draw_levels(frame, field);
    }

    fn draw_ticks(&self, frame: &mut Frame, area: Rect, field: Rect) {
        let found = ticks(self.along.0, self.along.1, usize::from(field.height / 3).clamp(2, 9));
        let gutter = Rect { width: GUTTER, ..area };
        for row in 0..field.height {
            put(frame.buffer_mut(), gutter, GUTTER - 1, row + 1, "│", self.tick_style);
        }
        for &value in &found.values {
            let row = self.row_of(value, field.height);
            let text = format!("{} ┤", found.label(value));
            put_right(frame.buffer_mut(), gutter, row + 1, &text, self.tick_style);
        }
    }

    fn row_of(&self, value: f64, rows: u16) -> u16 {
        let share = (value - self.along.0) / (self.along.1 - self.along.0);
        let down = match self.grows {
            Grows::Down => share,
            Grows::Up => 1.0 - share,
        };
        place(down, rows)
    }

    fn flip(&self, value: f64) -> f64 {
        match self.grows {
            Grows::Up => value,
            Grows::Down => -value,
        }
    }

    fn draw_curves(&self, frame: &mut Frame, field: Rect) {
        let (first, second) = (self.flip(self.along.0), self.flip(self.along.1));
        let bounds = [first.min(second), first.max(second)];
        Canvas::default()
            .marker(Marker::Braille)
            .x_bounds([self.across.0, self.across.1])
            .y_bounds(bounds)
            .paint(|context| {
                for level in &self.levels {
                    let (left, right) = self.across;
                    let dash = (right - left) / f64::from(field.width) / 2.0;
                    let points: Vec<(f64, f64)> = (0..u32::from(field.width) * 2)
                        .step_by(3)
                        .map(|index| (left + f64::from(index) * dash, self.flip(level.at)))
                        .collect();
                    context.draw(&Points { coords: &points, color: level.color });
                }
                for curve in &self.curves {
                    self.draw_curve(context, curve);
                }
            })
            .render(field, frame.buffer_mut());
    }

    fn draw_curve(&self, context: &mut ratatui::widgets::canvas::Context, curve: &Curve) {
        let points: Vec<(f64, f64)> = curve.points.iter().map(|&(x, y)| (x, self.flip(y))).collect();
        match curve.stroke {
            Stroke::Dotted => context.draw(&Points { coords: &points, color: curve.color }),
            Stroke::Solid => {
                for pair in points.windows(2) {
                    let [(x1, y1), (x2, y2)] = [pair[0], pair[1]];
                    context.draw(&Line { x1, y1, x2, y2, color: curve.color });
                }
            }
        }
    }

    /// Names stand at the right edge, each on a row of its own.
    fn draw_levels(&self, frame: &mut Frame, field: Rect) {
        let mut order: Vec<&Level> = self.levels.iter().collect();
        order.sort_by(|a, b| self.flip(b.at).total_cmp(&self.flip(a.at)));
        let wanted: Vec<u16> = order.iter().map(|level| self.row_of(level.at, field.height)).collect();
        for (level, row) in order.iter().zip(crate::tui::text::spread(&wanted, field.height)) {
            let (Some(row), true) = (row, cells(&level.name) + 2 <= field.width) else { continue };
            put_right(frame.buffer_mut(), field, row, &format!(" {}", level.name), level.style);
        }
    }

    fn draw_head(&self, frame: &mut Frame, field: Rect) {
        let Some(head) = self.head.filter(|&x| x >= self.across.0 && x <= self.across.1) else { return };
        let column = place((head - self.across.0) / (self.across.1 - self.across.0), field.width);
        for row in 0..field.height {
            put(frame.buffer_mut(), field, column, row, "│", self.head_style);
        }
    }
}

/// The cell out of `count` that holds a share 0..=1 of the way.
#[must_use]
#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to the cells of a terminal")]
pub fn place(share: f64, count: u16) -> u16 {
    let last = f64::from(count.saturating_sub(1));
    if share.is_nan() { 0 } else { (share * last).round().clamp(0.0, last) as u16 }
}

/// Tick labels under a plot: none touches its neighbour or leaves the row. Returns the ticks drawn.
pub fn draw_foot(frame: &mut Frame, area: Rect, across: (f64, f64), unit: &str, style: Style) -> Ticks {
    let field = Rect { x: area.x + GUTTER.min(area.width), width: area.width.saturating_sub(GUTTER), ..area };
    put(frame.buffer_mut(), area, 0, 0, unit, style);
    let mut count = usize::from(field.width / 8).max(1);
    loop {
        let found = ticks(across.0, across.1, count);
        let room = usize::from(field.width) / found.values.len().max(1);
        if found.widest() + 2 <= room || count == 1 {
            draw_labels(frame, field, across, &found, style);
            return found;
        }
        count -= 1;
    }
}

fn draw_labels(frame: &mut Frame, field: Rect, across: (f64, f64), found: &Ticks, style: Style) {
    let mut free = 0;
    for &value in &found.values {
        let text = found.label(value);
        let column = place((value - across.0) / (across.1 - across.0), field.width);
        let start = column.saturating_sub(cells(&text) / 2);
        if start < free || start + cells(&text) > field.width {
            continue;
        }
        put(frame.buffer_mut(), field, start, 0, &text, style);
        free = start + cells(&text) + 1;
    }
}
