//! The loads of a lifeline's end supports on a drawing: an arrow the way each is pulled, with its force and its angle.
use super::strings::{Label, Rank};
use super::units::Scale;
use crate::estimate::EndLoadView;
use crate::tui::text::{cells, put};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;

/// A cell of the drawing: column and row.
pub type Cell = (u16, u16);
/// Rows above and below a support that may hold its load, the nearest first.
const ROWS: [i32; 4] = [-1, -2, 1, 2];
/// Half the sector of an arrow, degrees.
const HALF_SECTOR: f64 = 22.5;

/// Draws both loads near their supports where nothing is in the way, and gives the labels of those that found no room.
pub fn draw(
    buffer: &mut Buffer,
    field: Rect,
    room: u16,
    supports: [Option<Cell>; 2],
    (loads, scale): (&[EndLoadView; 2], &Scale),
    style: Style,
) -> Vec<Label> {
    let mut left_over = Vec::new();
    for (end, (load, support)) in [End::Left, End::Right].into_iter().zip(loads.iter().zip(supports)) {
        let words = words(load, scale);
        let arrow = arrow(load.below_horizontal_deg, end);
        let is_drawn = support.is_some_and(|cell| beside(buffer, field, cell, end, &end.joined(arrow, &words), style));
        if !is_drawn {
            let name = if end == End::Left { "left end" } else { "right end" };
            let long = format!("{arrow} {words} {name}");
            let text = if cells(&long) <= room { long } else { format!("{arrow} {words}") };
            let row = support.map_or(0, |cell| cell.1);
            left_over.push(Label { row, text, style, rank: Rank::First });
        }
    }
    left_over
}

#[derive(Clone, Copy, PartialEq, Eq)]
enum End {
    Left,
    Right,
}

impl End {
    /// The arrow stands at the support.
    fn joined(self, arrow: &str, words: &str) -> String {
        match self {
            Self::Left => format!("{arrow} {words}"),
            Self::Right => format!("{words} {arrow}"),
        }
    }
}

/// Force, and the angle from the horizontal; an end that is pulled upwards says so.
fn words(load: &EndLoadView, scale: &Scale) -> String {
    let up = if load.below_horizontal_deg < 0.0 { " up" } else { "" };
    format!("{} {:.1} deg{up}", scale.force(load.force_n), load.below_horizontal_deg.abs())
}

/// The arrow nearest to the pull.
const fn arrow(below_horizontal_deg: f64, end: End) -> &'static str {
    let sector = below_horizontal_deg / (2.0 * HALF_SECTOR);
    match end {
        _ if sector > 1.5 => "↓",
        _ if sector < -1.5 => "↑",
        End::Left if sector > 0.5 => "↘",
        End::Left if sector < -0.5 => "↗",
        End::Left => "→",
        End::Right if sector > 0.5 => "↙",
        End::Right if sector < -0.5 => "↖",
        End::Right => "←",
    }
}

/// Writes words near a support, its arrow in the column of the support, where all cells and one on each side are blank.
fn beside(buffer: &mut Buffer, field: Rect, (column, row): Cell, end: End, words: &str, style: Style) -> bool {
    let wide = cells(words);
    let from = match end {
        End::Left => Some(column),
        End::Right => (column + 1).checked_sub(wide),
    };
    let Some(from) = from.filter(|from| from + wide <= field.width) else { return false };
    let rows = ROWS.iter().filter_map(|by| u16::try_from(i32::from(row) + by).ok()).filter(|&row| row < field.height);
    for row in rows {
        let mut span = from.saturating_sub(1)..(from + wide + 1).min(field.width);
        let is_blank = span.all(|x| buffer.cell((field.x + x, field.y + row)).is_some_and(|cell| cell.symbol() == " "));
        if is_blank {
            put(buffer, field, from, row, words, style);
            return true;
        }
    }
    false
}
