//! The table of every key a file may hold: feeds the reader, `new`, the inputs list and messages.
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
    /// Smallest physical value, SI, and whether it is itself allowed.
    pub least: f64,
    /// Largest physical value, SI.
    pub most: f64,
    /// False for a key that a later version will read: refused with a message that says so.
    pub ready: bool,
}

/// All keys, in file order.
pub const FIELDS: &[Field] = &[];

/// The field of a concrete path (`obstacle.2.top` finds `obstacle.*.top`).
#[must_use]
pub fn field_for(_path: &str) -> Option<&'static Field> {
    todo!()
}
