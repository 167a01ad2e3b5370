//! A calculation sheet as a value: sections of words, tables and figures, the same for every way it is written.
use super::drawing::Drawing;
use crate::margin::Verdict;
use crate::sheet::clean;

/// The whole sheet. Equal input gives an equal value.
#[derive(Clone, Debug, PartialEq)]
pub struct Sheet {
    /// The file's title, else its name.
    pub title: String,
    /// Name of the file as given.
    pub file: String,
    /// Hex SHA-256 of its bytes.
    pub scenario_sha256: String,
    /// The worst verdict.
    pub verdict: Verdict,
    /// Its sections in the order in which they are read.
    pub sections: Vec<Section>,
}

/// One section.
#[derive(Clone, Debug, PartialEq)]
pub struct Section {
    /// Stable id: `cautions`, `inputs`.
    pub id: &'static str,
    /// Heading.
    pub title: &'static str,
    /// What it holds.
    pub blocks: Vec<Block>,
}

impl Section {
    /// A section.
    #[must_use]
    pub const fn new(id: &'static str, title: &'static str, blocks: Vec<Block>) -> Self {
        Self { id, title, blocks }
    }
}

/// One part of a section.
#[derive(Clone, Debug, PartialEq)]
pub enum Block {
    /// A paragraph.
    Words(String),
    /// A verdict with its sentence.
    Verdict(Verdict, String),
    /// A heading within the section.
    Part(String),
    /// Sentences.
    List(Vec<String>),
    /// A table.
    Table(Table),
    /// A drawing.
    Figure(Figure),
    /// Lines to be filled in by hand.
    Blank(&'static [&'static str]),
}

impl Block {
    /// A paragraph, control characters made visible.
    #[must_use]
    pub fn words(words: &str) -> Self {
        Self::Words(clean(words))
    }
    /// Sentences, control characters made visible.
    #[must_use]
    pub fn list<S: AsRef<str>>(list: &[S]) -> Self {
        Self::List(list.iter().map(|words| clean(words.as_ref())).collect())
    }
    /// A heading within the section.
    #[must_use]
    pub fn part(words: &str) -> Self {
        Self::Part(clean(words))
    }
}

/// How the cells of a column are set.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Kind {
    /// Words, to the left.
    Words,
    /// The first column of a row that has its name there.
    Name,
    /// Numbers, to the right.
    Number,
    /// A formula or a key of the file.
    Formula,
}

/// One column.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Column {
    /// Stable key.
    pub key: &'static str,
    /// Head.
    pub head: &'static str,
    /// How its cells are set.
    pub kind: Kind,
}

/// A column of each kind in short.
pub const fn column(key: &'static str, head: &'static str, kind: Kind) -> Column {
    Column { key, head, kind }
}

/// A table.
#[derive(Clone, Debug, PartialEq)]
pub struct Table {
    /// Stable id: `inputs`, `margins`.
    pub id: String,
    /// What it shows.
    pub caption: String,
    /// Columns.
    pub columns: &'static [Column],
    /// Rows, each with a cell a column.
    pub rows: Vec<Row>,
}

/// A row; its verdict is in words in one of the cells as well.
#[derive(Clone, Debug, PartialEq)]
pub struct Row {
    /// Cells.
    pub cells: Vec<Cell>,
    /// The verdict it tells.
    pub verdict: Option<Verdict>,
}

impl Row {
    /// A row without a verdict.
    #[must_use]
    pub const fn new(cells: Vec<Cell>) -> Self {
        Self { cells, verdict: None }
    }
}

/// A cell: what it reads, and its number where it has one.
#[derive(Clone, Debug, PartialEq)]
pub struct Cell {
    /// As shown.
    pub words: String,
    /// The number in SI with its unit.
    pub si: Option<(f64, &'static str)>,
}

impl Cell {
    /// Words, control characters made visible.
    #[must_use]
    pub fn words(words: &str) -> Self {
        Self { words: clean(words), si: None }
    }
    /// A number to the digits of the working, with its SI unit.
    #[must_use]
    pub fn si(value: f64, unit: &'static str) -> Self {
        let words = if unit == "1" { digits(value) } else { format!("{} {unit}", digits(value)) };
        Self { words, si: Some((value, unit)) }
    }
    /// A number shown in other words.
    #[must_use]
    pub fn shown(words: String, value: f64, unit: &'static str) -> Self {
        Self { words, si: Some((value, unit)) }
    }
    /// Nothing.
    #[must_use]
    pub const fn none() -> Self {
        Self { words: String::new(), si: None }
    }
}

/// A drawing with its text alternative.
#[derive(Clone, Debug, PartialEq)]
pub struct Figure {
    /// Stable id: `elevation`.
    pub id: &'static str,
    /// Title.
    pub title: String,
    /// What it shows, in words with the numbers that matter.
    pub text: String,
    /// The drawing.
    pub drawing: Drawing,
}

/// Significant digits of the working.
const DIGITS: i32 = 6;
/// What is smaller is left by rounding.
const NOTHING: f64 = 1e-8;

/// A number to six significant digits, without a point where all of them stand before it; `0` below 1e-8, where only
/// rounding is left.
#[must_use]
pub fn digits(value: f64) -> String {
    if !value.is_finite() {
        return "not a number".to_owned();
    }
    if value.abs() < NOTHING {
        return "0".to_owned();
    }
    let scientific = format!("{value:.*e}", usize::try_from(DIGITS - 1).unwrap_or(0));
    let exponent = scientific.split('e').nth(1).and_then(|e| e.parse::<i32>().ok()).unwrap_or(0);
    if (-4..9).contains(&exponent) {
        let decimals = usize::try_from(DIGITS - 1 - exponent).unwrap_or(0);
        format!("{value:.decimals$}")
    } else {
        scientific
    }
}

/// A number as exactly as the file states it, to 12 digits.
#[must_use]
pub fn exact(value: f64) -> String {
    let cut: f64 = format!("{value:.11e}").parse().unwrap_or(value);
    if cut != 0.0 && !(1e-6..1e12).contains(&cut.abs()) { format!("{cut:e}") } else { format!("{}", cut + 0.0) }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn six_digits_are_kept_at_any_size() {
        for (value, words) in [
            (9.80665, "9.80665"),
            (0.000_123_456_7, "0.000123457"),
            (60_000.0, "60000.0"),
            (1_234_567.0, "1234567"),
            (-0.5, "-0.500000"),
            (3e-12, "0"),
            (999_999.6, "1000000"),
            (1.5e-7, "1.50000e-7"),
        ] {
            assert_eq!(digits(value), words);
        }
    }

    #[test]
    fn a_stated_number_reads_as_stated() {
        assert_eq!(exact(80.0 * 0.453_592_37), "36.2873896");
        assert_eq!(exact(0.1 + 0.2), "0.3");
        assert_eq!(exact(-0.0), "0");
    }
}
