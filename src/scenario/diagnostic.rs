//! Faults of a file: where, what was expected, what to do; all at once.
use std::ops::Range;

/// How bad a finding is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Severity {
    /// The file is refused.
    Error,
    /// The file is read; a reviewer should look.
    Doubt,
}

/// One finding at one place of a file.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Fault {
    /// How bad.
    pub severity: Severity,
    /// Byte range in the file's text.
    pub span: Range<usize>,
    /// What is wrong: lower case, no full stop, values in back-quotes.
    pub message: String,
    /// What was expected, shown at the marker.
    pub expected: String,
    /// What to do next.
    pub hint: Option<String>,
}

/// All findings of one file, sorted by place, with the text they point into.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Faults {
    /// Name of the file as given.
    pub file: String,
    /// Its text.
    pub text: String,
    /// The findings.
    pub faults: Vec<Fault>,
}

impl Faults {
    /// Renders every finding with line, column, source line and marker.
    #[must_use]
    pub fn render(&self, _color: bool) -> String {
        todo!()
    }
    /// Line and column (both from 1, columns in characters) of a byte offset.
    #[must_use]
    pub fn line_column(&self, _offset: usize) -> (usize, usize) {
        todo!()
    }
}
