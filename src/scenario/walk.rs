//! A walk-through: stops that lead a crew through one scenario, each with a sentence and what is changed there.
use super::{Document, Fault, Faults, Severity, inputs};
use crate::quantity::format_measure;
use std::ops::Range;
use std::path::{Path, PathBuf};

/// The ending that tells a walk-through from a scenario where folders are searched.
pub const WALK_ENDING: &str = ".walk.toml";

/// Views that a stop may ask for, as a file writes them.
pub const WALK_VIEWS: [&str; 10] =
    ["elevation", "history", "margins", "notes", "ledger", "vary", "map", "spread", "remedies", "compare"];

/// True for a file that is a walk-through by its name.
#[must_use]
pub fn is_walk(path: &Path) -> bool {
    path.file_name().is_some_and(|name| name.to_string_lossy().ends_with(WALK_ENDING))
}

/// A walk-through with the scenario's state at every stop.
#[derive(Clone, Debug)]
pub struct Walk {
    /// Name of the file as given.
    pub file: String,
    /// The folder from which the scenario's path is taken.
    pub folder: PathBuf,
    /// Its text.
    pub text: String,
    /// What it is about.
    pub title: Option<String>,
    /// The scenario as its file has it.
    pub start: Document,
    /// The stops, at least one.
    pub stops: Vec<Stop>,
}

/// One stop.
#[derive(Clone, Debug)]
pub struct Stop {
    /// The sentence, in the user's own words.
    pub say: String,
    /// What is changed here; nothing where the stop only speaks.
    pub changes: Vec<StopChange>,
    /// Keys that a changed word has no use for and that were taken out, by path.
    pub taken_out: Vec<String>,
    /// The view to show, one of [`WALK_VIEWS`].
    pub view: Option<&'static str>,
    /// The scenario with all changes up to here.
    pub document: Document,
    /// Where its first value stands in the text, else its sentence.
    pub at: Range<usize>,
}

/// One input changed at a stop.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct StopChange {
    /// Concrete path.
    pub path: String,
    /// As it was before the stop, with its unit; none where it was not stated.
    pub before: Option<String>,
    /// As it is from the stop on.
    pub after: String,
}

impl Stop {
    /// False where the stop only speaks.
    #[must_use]
    pub const fn is_changing(&self) -> bool {
        !self.changes.is_empty()
    }
}

impl Walk {
    /// The state at a stop, counted from 1; 0 is the start, and beyond the last stop the last state counts.
    #[must_use]
    pub fn state(&self, at: usize) -> &Document {
        at.checked_sub(1)
            .and_then(|index| self.stops.get(index.min(self.stops.len().saturating_sub(1))))
            .map_or(&self.start, |stop| &stop.document)
    }

    /// The same walk over a scenario that was read anew.
    ///
    /// # Errors
    /// The faults that the walk has over it.
    pub fn over(&self, start: Document) -> Result<Self, Faults> {
        super::walk_read::read(&self.file, &self.folder, &self.text, Some(start))
    }

    /// A fault found at a stop (counted from 1) after reading.
    #[must_use]
    pub fn refused_at(&self, stop: usize, message: String, expected: &str, hint: String) -> Faults {
        let span = stop.checked_sub(1).and_then(|index| self.stops.get(index)).map_or(0..0, |stop| stop.at.clone());
        let expected = expected.to_owned();
        let fault = Fault { severity: Severity::Error, span, message, expected, hint: Some(hint) };
        Faults::new(&self.file, &self.text, vec![fault])
    }
}

/// An input as a document states it: a quantity with its unit, a word, else the text that stands there.
pub(super) fn stated(document: &Document, path: &str) -> Option<String> {
    let quantity = inputs(document.scenario()).into_iter().find(|input| input.path == path);
    let written = || document.text().get(document.places().exactly(path)?).map(str::to_owned);
    quantity.map(|input| format_measure(&input.measure)).or_else(|| document.word(path)).or_else(written)
}
