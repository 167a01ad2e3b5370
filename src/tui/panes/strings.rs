//! Words beside a drawing of heights: levels, the dimension string and its sum.
use super::scene::{Origin, Part, Scene};
use crate::sheet::ticks::{Ticks, ticks};
use crate::tui::text::{cells, fit, put, put_right, spread};
use crate::tui::theme::Theme;
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;

/// Heights to rows of the drawing.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Rows {
    /// Height of the upper edge, m.
    pub high_m: f64,
    /// Height of one row, m.
    pub per_row_m: f64,
    /// Rows.
    pub count: u16,
}

impl Rows {
    /// Rows that hold a scene with a free row above and two below.
    #[must_use]
    pub fn of(scene: &Scene, count: u16) -> Self {
        let (high, low) = scene.extent();
        let inner = f64::from(count.saturating_sub(3).max(1));
        let per_row_m = ((high - low) / inner).max(1e-6);
        Self { high_m: high + per_row_m, per_row_m, count }
    }

    /// The boundary between rows nearest to a height: the first row below it.
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to the rows of a terminal")]
    #[must_use]
    pub fn below(&self, height_m: f64) -> u16 {
        let row = ((self.high_m - height_m) / self.per_row_m).round();
        row.clamp(0.0, f64::from(self.count)) as u16
    }

    /// Height of the lower edge, m.
    #[must_use]
    pub fn low_m(&self) -> f64 {
        self.high_m - self.per_row_m * f64::from(self.count)
    }
}

/// What the heights count from, and in which unit.
#[must_use]
pub fn title(scene: &Scene) -> String {
    match &scene.origin {
        Origin::Datum(Some(datum)) => format!("{} above datum: {}", scene.scale.symbol, datum.trim()),
        Origin::Datum(None) => format!("{} above the file's datum", scene.scale.symbol),
        Origin::Taut => format!("{} past taut, downward (the file states no elevation)", scene.scale.symbol),
    }
}

/// Ticks of the upright axis.
#[must_use]
pub fn axis_ticks(scene: &Scene, rows: &Rows) -> Ticks {
    let factor = scene.scale.factor;
    ticks(rows.low_m() / factor, rows.high_m / factor, usize::from(rows.count / 2).clamp(2, 12))
}

/// Draws the upright axis with its labels at the right edge of `gutter`.
pub fn draw_axis(buffer: &mut Buffer, gutter: Rect, scene: &Scene, rows: &Rows, theme: Theme) {
    let factor = scene.scale.factor;
    let found = axis_ticks(scene, rows);
    for row in 0..rows.count {
        put_right(buffer, gutter, row, "│", theme.quiet());
    }
    for &value in &found.values {
        let row = rows.below(value * factor);
        let shown = if scene.origin == Origin::Taut { -value } else { value };
        if row < rows.count {
            put_right(buffer, gutter, row, &format!("{} ┤", found.label(shown)), theme.quiet());
        }
    }
}

/// Which labels give way first where rows are short.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Rank {
    /// What a reader looks for first.
    First,
    /// A dimension of the string.
    Dimension,
    /// The name of a level, which gives way to those.
    Level,
    /// What a clearance should be, in a row of its own: only where rows are plenty.
    Wanted,
}

/// One text beside the drawing.
#[derive(Clone, Debug)]
pub struct Label {
    /// The row it belongs to.
    pub row: u16,
    /// The text; it has to fit.
    pub text: String,
    /// Its style.
    pub style: Style,
    /// Whether it gives way.
    pub rank: Rank,
}

/// Draws the dimension string at the left edge of `area` and all labels beside it, each on a row of its own.
pub fn draw_labels(buffer: &mut Buffer, area: Rect, scene: &Scene, rows: &Rows, mut labels: Vec<Label>, theme: Theme) {
    let string = string_marks(scene);
    draw_string(buffer, area, &string, rows, theme);
    labels.extend(level_labels(scene, rows, theme));
    labels.extend(part_labels(scene, &string, rows, area.width.saturating_sub(2), theme));
    if 3 * labels.len() > 2 * usize::from(rows.count) {
        labels.retain(|label| label.rank != Rank::Wanted);
    }
    while labels.len() > usize::from(rows.count) {
        let worst = labels.iter().map(|label| label.rank).max();
        let Some(index) = labels.iter().position(|label| Some(label.rank) == worst) else { break };
        labels.remove(index);
    }
    labels.sort_by_key(|label| label.row);
    let wanted: Vec<u16> = labels.iter().map(|label| label.row).collect();
    let inner = Rect { x: area.x + 2, width: area.width.saturating_sub(2), ..area };
    for (label, row) in labels.iter().zip(spread(&wanted, rows.count)) {
        if let Some(row) = row {
            put(buffer, inner, 0, row, &fit(&label.text, usize::from(inner.width)), label.style);
        }
    }
}

fn level_labels(scene: &Scene, rows: &Rows, theme: Theme) -> Vec<Label> {
    let mut labels = Vec::new();
    let mut level = |height_m: f64, row: u16, name: &str| {
        let text = format!("{} {name}", scene.scale.text(height_m));
        labels.push(Label {
            row: row.min(rows.count.saturating_sub(1)),
            text,
            style: theme.quiet(),
            rank: Rank::Level,
        });
    };
    if let Some(anchor) = scene.anchor_m {
        level(anchor, rows.below(anchor).saturating_sub(1), "anchor");
    }
    for bar in &scene.bars {
        level(bar.top_m, rows.below(bar.top_m), &bar.name);
    }
    labels
}

/// Heights of the marks of the dimension string, m, from the attachment at the start downwards.
fn string_marks(scene: &Scene) -> Vec<f64> {
    let mut height = scene.stations[0].attachment_m;
    let mut marks = vec![height];
    for part in &scene.parts {
        height -= part.length_m;
        marks.push(height);
    }
    marks
}

fn draw_string(buffer: &mut Buffer, area: Rect, marks: &[f64], rows: &Rows, theme: Theme) {
    let bounds: Vec<u16> = marks.iter().map(|&mark| rows.below(mark)).collect();
    let (Some(&first), Some(&last)) = (bounds.iter().min(), bounds.iter().max()) else { return };
    for row in first..last {
        let symbol = if bounds.contains(&row) { "├" } else { "│" };
        put(buffer, area, 0, row, symbol, theme.plain());
    }
    put(buffer, area, 0, last, "┴", theme.plain());
}

/// Numbers of the parts as printed, which add up to the printed total.
///
/// Free fall, clearance and total are rounded on their own, as everywhere else on the screen; what rounding leaves over
/// goes to the parts between, where it is nearest to a half already.
fn part_numbers(scene: &Scene, marks: &[f64]) -> Vec<f64> {
    let scale = &scene.scale;
    let unit = 10_f64.powi(-i32::try_from(scale.decimals).unwrap_or(0));
    let mut numbers: Vec<f64> = scene.parts.iter().map(|part| scale.rounded(part.length_m)).collect();
    let total =
        scale.rounded(marks.iter().copied().next().unwrap_or(0.0) - marks.iter().copied().last().unwrap_or(0.0));
    let mut between: Vec<usize> = (0..numbers.len()).filter(|&index| !is_kept(&scene.parts[index])).collect();
    let left = total - numbers.iter().sum::<f64>();
    let error =
        |index: usize| (scale.shown(scene.parts[index].length_m) - scale.rounded(scene.parts[index].length_m)) * left;
    between.sort_by(|&a, &b| error(b).total_cmp(&error(a)));
    let mut over = (left / unit).round();
    for &index in between.iter().cycle().take(4 * between.len()) {
        if over == 0.0 {
            break;
        }
        numbers[index] += unit * over.signum();
        over -= over.signum();
    }
    numbers
}

fn is_kept(part: &Part) -> bool {
    part.verdict.is_some() || part.name == "free fall"
}

fn part_labels(scene: &Scene, marks: &[f64], rows: &Rows, room: u16, theme: Theme) -> Vec<Label> {
    let numbers = part_numbers(scene, marks);
    let mut labels = Vec::new();
    for ((part, number), pair) in scene.parts.iter().zip(numbers).zip(marks.windows(2)) {
        let (from, to) = (rows.below(pair[0].max(pair[1])), rows.below(pair[0].min(pair[1])));
        let wanted = wanted(scene, part);
        let whole = wanted.as_ref().map(|wanted| format!("{} {}, {wanted}", scene.scale.print(number), part.name));
        let whole = whole.filter(|text| cells(text) <= room);
        let short = format!("{} {}", scene.scale.print(number), part.name);
        let brief = format!("{} {}", scene.scale.print(number), part.name.rsplit(' ').next().unwrap_or_default());
        let is_apart = whole.is_none();
        let text = whole.into_iter().chain([short]).find(|text| cells(text) <= room).unwrap_or(brief);
        let style = part.verdict.map_or(theme.plain(), |verdict| theme.verdict(verdict));
        let row = ((from + to.max(from + 1) - 1) / 2).min(rows.count - 1);
        let rank = if part.verdict.is_some() { Rank::First } else { Rank::Dimension };
        labels.push(Label { row, text, style, rank });
        labels.extend(wanted.filter(|_| is_apart).map(|text| Label { row, text, style, rank: Rank::Wanted }));
    }
    labels
}

/// What a clearance should be: beside it, or in a row of its own where that is too wide.
fn wanted(scene: &Scene, part: &Part) -> Option<String> {
    let bar = scene.bars.iter().find(|bar| part.verdict.is_some() && scene.string_end.as_deref() == Some(&bar.name));
    bar.map(|bar| format!("{} wanted", scene.scale.text(bar.reserve_m)))
}

/// Draws the sum of the string in the one row of `area`.
pub fn draw_sum(buffer: &mut Buffer, area: Rect, scene: &Scene, theme: Theme) {
    let numbers = part_numbers(scene, &string_marks(scene));
    let terms: Vec<String> = numbers.iter().map(|&n| crate::sheet::ticks::fixed(n, scene.scale.decimals)).collect();
    let total = scene.scale.print(numbers.iter().sum());
    let sum = format!("{} = {total}", terms.join(" + ").replace("+ -", "- "));
    let goal = scene.string_end.as_ref().map_or_else(String::new, |name| format!("{total} down to {name}"));
    let long = format!("{sum} down to {}", scene.string_end.as_deref().unwrap_or("the lowest point"));
    let room = usize::from(area.width);
    let fits = |text: &String| usize::from(cells(text)) <= room;
    let text = [long, sum, goal].into_iter().find(fits).unwrap_or(total);
    put(buffer, area, 0, 0, &fit(&text, room), theme.plain());
}
