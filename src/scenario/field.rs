//! What is known of one key of a file, and how a path finds it.
use super::keys::FIELDS;
use crate::quantity::Dimension;

/// One key of the file.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Field {
    /// Path with `*` for the number of an obstacle: `line.stiffness`, `obstacle.*.top`.
    pub path: &'static str,
    /// What it is, a short label for screens: `line stiffness`.
    pub label: &'static str,
    /// One sentence for `new`, help and the inputs list.
    pub doc: &'static str,
    /// Dimension of a quantity; none for words and names.
    pub dimension: Option<Dimension>,
    /// Dimensions of the two columns of a table of pairs; the range is that of the first column.
    pub columns: Option<[Dimension; 2]>,
    /// Smallest physical value, SI, itself allowed.
    pub least: f64,
    /// Largest physical value, SI, itself allowed.
    pub most: f64,
    /// When the key must stand in the file.
    pub need: Need,
    /// The words it may hold; empty for free text and quantities.
    pub words: &'static [&'static str],
    /// A value to start from, as it stands in a file.
    pub example: &'static str,
}

/// When a key must stand in the file.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Need {
    /// In every file.
    Always,
    /// Where its section stands.
    InSection,
    /// Only where another key makes it so; the reader says which.
    Sometimes,
    /// Never; the text is what its absence means.
    Default(&'static str),
}

pub(super) const fn text(path: &'static str, label: &'static str, doc: &'static str, example: &'static str) -> Field {
    Field {
        path,
        label,
        doc,
        dimension: None,
        columns: None,
        least: 0.0,
        most: 0.0,
        need: Need::Default("none"),
        words: &[],
        example,
    }
}

pub(super) const fn quantity(
    path: &'static str,
    label: &'static str,
    doc: &'static str,
    (dimension, least, most): (Dimension, f64, f64),
    example: &'static str,
) -> Field {
    Field { dimension: Some(dimension), least, most, ..text(path, label, doc, example) }
}

/// A whole number without a unit: an option, no input of the fall.
pub(super) const fn count(
    path: &'static str,
    label: &'static str,
    doc: &'static str,
    (least, most): (f64, f64),
    example: &'static str,
) -> Field {
    quantity(path, label, doc, (Dimension::Ratio, least, most), example)
}

pub(super) const fn table(
    path: &'static str,
    label: &'static str,
    doc: &'static str,
    columns: [Dimension; 2],
    example: &'static str,
) -> Field {
    Field { columns: Some(columns), ..text(path, label, doc, example) }
}

impl Field {
    pub(super) const fn needed(self, need: Need) -> Self {
        Self { need, ..self }
    }
    pub(super) const fn one_of(self, words: &'static [&'static str]) -> Self {
        Self { words, ..self }
    }
    /// True for a whole number of `[study]`.
    pub(super) fn is_count(&self) -> bool {
        self.path.starts_with("study.")
    }
    /// The part of the path after the last point: `stiffness`.
    #[must_use]
    pub fn key(&self) -> &'static str {
        self.path.rsplit('.').next().unwrap_or(self.path)
    }
}

/// Sections that may stand several times, each numbered from 1.
pub(super) const LISTS: [&str; 3] = ["obstacle", "face", ACCEPT];
/// The list of doubts that the file accepts: words for a reviewer, no inputs.
pub(super) const ACCEPT: &str = "accept";

/// The list that a path or a section of the table belongs to.
pub(super) fn list_of(path: &str) -> Option<&'static str> {
    let first = path.split('.').next()?;
    LISTS.into_iter().find(|list| *list == first)
}

/// Paths whose quantity may also be stated in a second dimension.
pub(super) fn other_dimension(field: &Field) -> Option<Dimension> {
    matches!(field.path, "line.static_elongation.from" | "line.static_elongation.to").then_some(Dimension::Mass)
}

/// The field of a concrete path (`obstacle.2.top` finds `obstacle.*.top`).
#[must_use]
pub fn field_for(path: &str) -> Option<&'static Field> {
    let pattern = pattern_of(path);
    FIELDS.iter().find(|field| field.path == pattern)
}

/// `obstacle.2.top` as `obstacle.*.top`.
pub(super) fn pattern_of(path: &str) -> String {
    let number = |part: &str| !part.is_empty() && part.bytes().all(|b| b.is_ascii_digit());
    path.split('.').map(|part| if number(part) { "*" } else { part }).collect::<Vec<_>>().join(".")
}
