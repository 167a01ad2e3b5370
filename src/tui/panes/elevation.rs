//! The view Elevation: the fall to scale, its marks side by side, the dimension string.
use super::scene::{Bar, Origin, Part, Scene, Station};
use crate::scenario::SubjectKind;
use crate::sheet::ticks::{Ticks, ticks};
use crate::tui::text::{cells, fit, put, put_right, spread};
use crate::tui::theme::Theme;
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;

/// Least columns of the tick labels and the axis.
const GUTTER: u16 = 5;
/// Least columns of one station: its name and a blank.
const STATION: u16 = 6;
/// Columns of the names beside the dimension string, with and without what is wanted.
const LABELS: u16 = 34;
const LEAST_LABELS: u16 = 21;

/// Heights to rows of the drawing.
struct Rows {
    high_m: f64,
    per_row_m: f64,
    count: u16,
}

impl Rows {
    fn of(scene: &Scene, count: u16) -> Self {
        let (high, low) = scene.extent();
        let inner = f64::from(count.saturating_sub(3).max(1));
        let per_row_m = ((high - low) / inner).max(1e-6);
        Self { high_m: high + per_row_m, per_row_m, count }
    }

    /// The boundary between rows nearest to a height: the first row below it.
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to the rows of a terminal")]
    fn below(&self, height_m: f64) -> u16 {
        let row = ((self.high_m - height_m) / self.per_row_m).round();
        row.clamp(0.0, f64::from(self.count)) as u16
    }

    fn low_m(&self) -> f64 {
        self.high_m - self.per_row_m * f64::from(self.count)
    }
}

/// Where the parts of the pane stand.
struct Places {
    gutter: Rect,
    figures: Rect,
    labels: Rect,
    names: Rect,
    title: Rect,
    sum: Option<Rect>,
}

impl Places {
    fn of(area: Rect, scene: &Scene) -> Self {
        let sum = u16::from(area.height >= 16);
        let body = Rect { y: area.y + 2, height: area.height.saturating_sub(2 + sum), ..area };
        let found = axis_ticks(scene, &Rows::of(scene, body.height));
        let ticks = u16::try_from(found.widest()).unwrap_or(GUTTER) + 2;
        let gutter = Rect { width: ticks.clamp(GUTTER, 12), ..body };
        let spare = area.width.saturating_sub(gutter.width + 5 * STATION);
        let labels = spare.clamp(LEAST_LABELS, LABELS).min(area.width.saturating_sub(gutter.width + STATION));
        let figures_width = area.width.saturating_sub(gutter.width + labels);
        let figures = Rect { x: gutter.right(), width: figures_width, ..body };
        Self {
            gutter,
            figures,
            labels: Rect { x: figures.right(), width: labels, ..body },
            names: Rect { x: gutter.right(), y: area.y + 1, width: figures_width, height: 1 },
            title: Rect { height: 1, ..area },
            sum: (sum > 0).then_some(Rect { y: area.bottom() - 1, height: 1, ..area }),
        }
    }
}

/// Draws a scene.
pub fn draw(buffer: &mut Buffer, area: Rect, scene: &Scene, theme: Theme) {
    if area.height < 6 || area.width < GUTTER + STATION + 8 {
        put(buffer, area, 0, 0, "no room to draw", theme.quiet());
        return;
    }
    let places = Places::of(area, scene);
    let rows = Rows::of(scene, places.figures.height);
    draw_title(buffer, &places, scene, theme);
    draw_axis(buffer, &places, scene, &rows, theme);
    for bar in &scene.bars {
        draw_bar(buffer, places.figures, bar, &rows, theme);
    }
    draw_levels(buffer, places.figures, scene, &rows, theme);
    draw_stations(buffer, &places, scene, &rows, theme);
    draw_labels(buffer, &places, scene, &rows, theme);
    draw_sum(buffer, &places, scene, theme);
}

fn draw_title(buffer: &mut Buffer, places: &Places, scene: &Scene, theme: Theme) {
    let words = match &scene.origin {
        Origin::Datum(Some(datum)) => format!("{} above datum: {}", scene.scale.symbol, datum.trim()),
        Origin::Datum(None) => format!("{} above the file's datum", scene.scale.symbol),
        Origin::Taut => format!("{} past taut, downward (the file states no elevation)", scene.scale.symbol),
    };
    put(buffer, places.title, 0, 0, &fit(&words, usize::from(places.title.width)), theme.quiet());
}

fn axis_ticks(scene: &Scene, rows: &Rows) -> Ticks {
    let factor = scene.scale.factor;
    ticks(rows.low_m() / factor, rows.high_m / factor, usize::from(rows.count / 2).clamp(2, 12))
}

fn draw_axis(buffer: &mut Buffer, places: &Places, scene: &Scene, rows: &Rows, theme: Theme) {
    let factor = scene.scale.factor;
    let found = axis_ticks(scene, rows);
    for row in 0..rows.count {
        put_right(buffer, places.gutter, row, "│", theme.quiet());
    }
    for &value in &found.values {
        let row = rows.below(value * factor);
        let shown = if scene.origin == Origin::Taut { -value } else { value };
        if row < rows.count {
            put_right(buffer, places.gutter, row, &format!("{} ┤", found.label(shown)), theme.quiet());
        }
    }
}

/// Hatching below the top, dots in the reserve above it.
fn draw_bar(buffer: &mut Buffer, area: Rect, bar: &Bar, rows: &Rows, theme: Theme) {
    let top = rows.below(bar.top_m);
    for row in rows.below(bar.top_m + bar.reserve_m)..top {
        put(buffer, area, 0, row, &"·".repeat(usize::from(area.width)), theme.verdict(bar.verdict));
    }
    for row in top..rows.count.min(top + 2) {
        put(buffer, area, 0, row, &"/".repeat(usize::from(area.width)), theme.quiet());
    }
}

/// The anchor as a beam, the standing surface as a ledge at the left.
fn draw_levels(buffer: &mut Buffer, area: Rect, scene: &Scene, rows: &Rows, theme: Theme) {
    if let Some(standing) = scene.standing_m {
        let ledge = "▀".repeat(usize::from(STATION.min(area.width)));
        put(buffer, area, 0, rows.below(standing), &ledge, theme.plain());
    }
    if let Some(anchor) = scene.anchor_m {
        let row = rows.below(anchor).saturating_sub(1);
        put(buffer, area, 0, row, &"═".repeat(usize::from(area.width)), theme.quiet());
    }
}

/// Which stations fit, the most telling ones first.
fn chosen(room: u16) -> &'static [usize] {
    match room / STATION {
        0 | 1 => &[4],
        2 => &[2, 4],
        3 => &[0, 2, 4],
        4 => &[0, 1, 2, 4],
        _ => &[0, 1, 2, 3, 4],
    }
}

fn draw_stations(buffer: &mut Buffer, places: &Places, scene: &Scene, rows: &Rows, theme: Theme) {
    let shown = chosen(places.figures.width);
    let count = u16::try_from(shown.len()).unwrap_or(1);
    let pitch = (places.figures.width / count).max(1);
    for (slot, &index) in (0..).zip(shown) {
        let station = &scene.stations[index];
        let column = slot * pitch + pitch / 2;
        let style = if station.name == "now" { theme.play_head() } else { theme.plain() };
        let start = column.saturating_sub((cells(station.name) - 1) / 2);
        put(buffer, places.names, start, 0, station.name, style);
        draw_line(buffer, places.figures, column, scene, station, rows, style);
        draw_body(buffer, places.figures, column, scene, station, rows, (style, theme));
    }
}

fn draw_line(
    buffer: &mut Buffer,
    area: Rect,
    column: u16,
    scene: &Scene,
    station: &Station,
    rows: &Rows,
    style: Style,
) {
    let attachment = rows.below(station.attachment_m);
    let Some(anchor_m) = scene.anchor_m else { return };
    let anchor = rows.below(anchor_m).saturating_sub(1);
    put(buffer, area, column, anchor, "╤", style);
    let deployed = rows.below(station.attachment_m + station.deployed_m);
    for row in (anchor + 1).min(attachment)..anchor.max(attachment) {
        let symbol = match station.taut {
            false => ":",
            true if row >= deployed => "#",
            true => "│",
        };
        put(buffer, area, column, row, symbol, style);
    }
}

fn draw_body(
    buffer: &mut Buffer,
    area: Rect,
    column: u16,
    scene: &Scene,
    station: &Station,
    rows: &Rows,
    (style, theme): (Style, Theme),
) {
    let top = rows.below(station.attachment_m);
    let foot_m = station.attachment_m - station.body_m;
    let foot = rows.below(foot_m).max(top + 1);
    let middle = top + (foot - top) / 2;
    let struck = scene.bars.iter().any(|bar| foot_m < bar.top_m);
    for row in top..foot {
        let symbol = match scene.subject {
            SubjectKind::Load => "███",
            SubjectKind::Person if row == top => "▐O▌",
            SubjectKind::Person if row <= middle => "▐█▌",
            SubjectKind::Person => "▐ ▌",
        };
        let style = if struck { theme.fault() } else { style };
        put(buffer, area, column.saturating_sub(1), row, symbol, style);
    }
}

/// One text beside the drawing.
struct Label {
    row: u16,
    text: String,
    style: Style,
    /// The name of a level, which gives way to a dimension where rows are short.
    is_level: bool,
}

fn draw_labels(buffer: &mut Buffer, places: &Places, scene: &Scene, rows: &Rows, theme: Theme) {
    let mut labels = level_labels(scene, rows, theme);
    let string = string_marks(scene);
    draw_string(buffer, places.labels, &string, rows, theme);
    labels.extend(part_labels(scene, &string, rows, places.labels.width.saturating_sub(2), theme));
    while labels.len() > usize::from(rows.count) {
        let Some(index) = labels.iter().position(|label| label.is_level) else { break };
        labels.remove(index);
    }
    labels.sort_by_key(|label| label.row);
    let wanted: Vec<u16> = labels.iter().map(|label| label.row).collect();
    let area = Rect { x: places.labels.x + 2, width: places.labels.width.saturating_sub(2), ..places.labels };
    for (label, row) in labels.iter().zip(spread(&wanted, rows.count)) {
        if let Some(row) = row {
            put(buffer, area, 0, row, &fit(&label.text, usize::from(area.width)), label.style);
        }
    }
}

fn level_labels(scene: &Scene, rows: &Rows, theme: Theme) -> Vec<Label> {
    let mut labels = Vec::new();
    let mut level = |height_m: f64, row: u16, name: &str| {
        let text = format!("{} {name}", scene.scale.text(height_m));
        labels.push(Label { row: row.min(rows.count.saturating_sub(1)), text, style: theme.quiet(), is_level: true });
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
        let long = format!("{} {}{}", scene.scale.print(number), part.name, wanted(scene, part));
        let short = format!("{} {}", scene.scale.print(number), part.name);
        let brief = format!("{} {}", scene.scale.print(number), part.name.rsplit(' ').next().unwrap_or_default());
        let text = [long, short].into_iter().find(|text| cells(text) <= room).unwrap_or(brief);
        let style = part.verdict.map_or(theme.plain(), |verdict| theme.verdict(verdict));
        labels.push(Label {
            row: ((from + to.max(from + 1) - 1) / 2).min(rows.count - 1),
            text,
            style,
            is_level: false,
        });
    }
    labels
}

/// What a clearance should be.
fn wanted(scene: &Scene, part: &Part) -> String {
    let bar = scene.bars.iter().find(|bar| part.verdict.is_some() && scene.string_end.as_deref() == Some(&bar.name));
    bar.map_or_else(String::new, |bar| format!(" of {}", scene.scale.text(bar.reserve_m)))
}

fn draw_sum(buffer: &mut Buffer, places: &Places, scene: &Scene, theme: Theme) {
    let Some(area) = places.sum else { return };
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
