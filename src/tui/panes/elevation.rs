//! The view Elevation: the fall to scale, its marks side by side, the dimension string.
use super::scene::{Bar, Scene, Station};
use super::strings::{Rows, axis_ticks, draw_axis, draw_labels, draw_sum, title};
use crate::scenario::SubjectKind;
use crate::tui::text::{cells, fit, put};
use crate::tui::theme::Theme;
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;

/// Least columns of the tick labels and the axis.
const GUTTER: u16 = 5;
/// Least columns of one station: its name and a blank.
const STATION: u16 = 6;
/// Columns of the names beside the dimension string, with and without what is wanted.
const LABELS: u16 = 36;
const LEAST_LABELS: u16 = 21;

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
    put(buffer, places.title, 0, 0, &fit(&title(scene), usize::from(places.title.width)), theme.quiet());
    draw_axis(buffer, places.gutter, scene, &rows, theme);
    for bar in &scene.bars {
        draw_bar(buffer, places.figures, bar, &rows, theme);
    }
    draw_levels(buffer, places.figures, scene, &rows, theme);
    draw_stations(buffer, &places, scene, &rows, theme);
    draw_labels(buffer, places.labels, scene, &rows, Vec::new(), theme);
    if let Some(sum) = places.sum {
        draw_sum(buffer, sum, scene, theme);
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
