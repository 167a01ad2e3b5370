//! Fitting text into cells: nothing is cut inside a number.
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::Style;
use unicode_width::{UnicodeWidthChar, UnicodeWidthStr};

/// Width in cells.
#[must_use]
pub fn width(text: &str) -> usize {
    text.width()
}

/// Terminal coordinates are 16 bit; longer texts count as the longest row.
#[must_use]
pub fn cells(text: &str) -> u16 {
    u16::try_from(text.width()).unwrap_or(u16::MAX)
}

/// The text itself, or its head with `..` where it does not fit. For words only, never for numbers.
#[must_use]
pub fn fit(text: &str, room: usize) -> String {
    if text.width() <= room {
        return text.to_owned();
    }
    let mut kept = String::new();
    let mut used = 0;
    for symbol in text.chars() {
        let wide = symbol.width().unwrap_or(0);
        if used + wide + 2 > room {
            break;
        }
        used += wide;
        kept.push(symbol);
    }
    let dots = room.saturating_sub(used).min(2);
    kept.trim_end().to_owned() + &"..".as_bytes().iter().take(dots).map(|&b| char::from(b)).collect::<String>()
}

/// Breaks at blanks into rows of at most `room` cells; a word longer than that is broken.
#[must_use]
pub fn wrap(text: &str, room: usize) -> Vec<String> {
    let room = room.max(1);
    let mut rows = vec![String::new()];
    for word in text.split_whitespace().flat_map(|word| pieces(word, room)) {
        let Some(last) = rows.last_mut() else { break };
        if last.is_empty() {
            last.push_str(&word);
        } else if last.width() + 1 + word.width() <= room {
            last.push(' ');
            last.push_str(&word);
        } else {
            rows.push(word);
        }
    }
    rows
}

fn pieces(word: &str, room: usize) -> Vec<String> {
    let mut found = vec![String::new()];
    for symbol in word.chars() {
        let Some(last) = found.last_mut() else { break };
        if last.width() + symbol.width().unwrap_or(0) > room && !last.is_empty() {
            found.push(symbol.to_string());
        } else {
            last.push(symbol);
        }
    }
    found
}

/// Writes `text` at a cell of `area` (column and row counted from its corner), cut at the area's edge.
pub fn put(buffer: &mut Buffer, area: Rect, column: u16, row: u16, text: &str, style: Style) {
    if column >= area.width || row >= area.height {
        return;
    }
    let room = usize::from(area.width - column);
    buffer.set_stringn(area.x + column, area.y + row, text, room, style);
}

/// Writes `text` so that it ends at the right edge of `area`.
pub fn put_right(buffer: &mut Buffer, area: Rect, row: u16, text: &str, style: Style) {
    put(buffer, area, area.width.saturating_sub(cells(text)), row, text, style);
}

/// Writes `text` wrapped into `area`; what finds no room is announced by `..` at the end of the last row.
pub fn put_wrapped(buffer: &mut Buffer, area: Rect, text: &str, style: Style) {
    let rows = wrap(text, usize::from(area.width));
    let shown = usize::from(area.height);
    for (row, line) in (0..area.height).zip(&rows) {
        let is_cut = usize::from(row) + 1 == shown && rows.len() > shown;
        let line = if is_cut { with_dots(line, usize::from(area.width)) } else { line.clone() };
        put(buffer, area, 0, row, &line, style);
    }
}

/// The line with ` ..` after it, in place of its last words where there is no room.
fn with_dots(line: &str, room: usize) -> String {
    let mut words: Vec<&str> = line.split(' ').collect();
    while !words.is_empty() && words.join(" ").width() + 3 > room {
        words.pop();
    }
    format!("{} ..", words.join(" "))
}

/// Moves rows that want to stand at `wanted` (rising) so that each has a row of its own within `0..rows`.
///
/// Rows stay in order and as near to their wish as that allows; those that find no room are `None`.
#[must_use]
pub fn spread(wanted: &[u16], rows: u16) -> Vec<Option<u16>> {
    let mut places: Vec<i32> = Vec::new();
    for &want in wanted {
        let least = places.last().map_or(0, |&last| last + 1);
        places.push(i32::from(want).max(least));
    }
    let mut most = i32::from(rows) - 1;
    for place in places.iter_mut().rev() {
        *place = (*place).min(most);
        most = *place - 1;
    }
    places.into_iter().map(|place| u16::try_from(place).ok()).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_text_that_fits_is_kept() {
        assert_eq!(fit("anchor", 6), "anchor");
        assert_eq!(fit("attachment above feet", 12), "attachment..");
        assert_eq!(fit("anchor", 1), ".");
        assert_eq!(fit("anchor", 0), "");
    }

    #[test]
    fn wrapping_keeps_every_word() {
        let text = "local code and a licensed or competent person decide";
        for room in 1..60 {
            let rows = wrap(text, room);
            assert!(rows.iter().all(|row| row.width() <= room), "{room}: {rows:?}");
            assert_eq!(rows.concat().replace(' ', ""), text.replace(' ', ""));
        }
    }

    #[test]
    fn a_text_too_long_for_its_rows_says_so_and_cuts_no_word() {
        let area = Rect::new(0, 0, 12, 2);
        let mut buffer = Buffer::empty(area);
        put_wrapped(&mut buffer, area, "one two three four five six", Style::new());
        let rows: Vec<String> =
            buffer.content.chunks(12).map(|row| row.iter().map(ratatui::buffer::Cell::symbol).collect()).collect();
        assert_eq!(rows, ["one two     ", "three .."].map(|row| format!("{row:12}")));
    }

    #[test]
    fn spread_rows_never_share_a_row() {
        assert_eq!(spread(&[3, 3, 3], 10), [Some(3), Some(4), Some(5)]);
        assert_eq!(spread(&[8, 9, 9], 10), [Some(7), Some(8), Some(9)]);
        assert_eq!(spread(&[0, 0, 0], 2), [None, Some(0), Some(1)]);
        assert_eq!(spread(&[2, 7], 10), [Some(2), Some(7)]);
    }
}
