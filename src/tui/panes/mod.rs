//! What the panes show: each draws itself from the model and nothing else.
pub mod about;
pub mod elevation;
pub mod foot;
pub mod header;
pub mod help;
pub mod history;
pub mod inputs;
pub mod log;
pub mod margins;
pub mod notes;
pub mod plot;
pub mod scene;
pub mod side;
pub mod side_view;
pub mod strings;
pub mod tabs;
pub mod timeline;
pub mod units;
pub mod verdict;

/// How many rows of a list stand outside of what is shown: `3 above, 2 below`.
#[must_use]
pub(crate) fn more_words(above: usize, below: usize) -> String {
    match (above, below) {
        (0, 0) => String::new(),
        (0, below) => format!("{below} more below"),
        (above, 0) => format!("{above} more above"),
        (above, below) => format!("{above} above, {below} below"),
    }
}
