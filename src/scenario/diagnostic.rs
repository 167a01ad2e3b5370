//! Faults of a file: where, what was expected, what to do; all at once.
use annotate_snippets::{AnnotationKind, Level, Renderer, Snippet};
use std::ops::Range;

/// How bad a finding is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, serde::Serialize)]
#[serde(rename_all = "lowercase")]
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

/// One finding with its place as numbers, for machine-readable output.
#[derive(Clone, Debug, PartialEq, Eq, serde::Serialize)]
pub struct FaultRow {
    /// How bad.
    pub severity: Severity,
    /// Line, from 1.
    pub line: usize,
    /// Column in characters, from 1.
    pub column: usize,
    /// What is wrong.
    pub message: String,
    /// What was expected.
    pub expected: String,
    /// What to do next.
    pub hint: Option<String>,
}

/// The findings without colour, as [`Faults::render`] lays them out.
impl std::fmt::Display for Faults {
    fn fmt(&self, formatter: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        formatter.write_str(&self.render(false))
    }
}

impl std::error::Error for Faults {}

impl Faults {
    /// Findings of a text, brought into the order of their places.
    #[must_use]
    pub fn new(file: &str, text: &str, mut faults: Vec<Fault>) -> Self {
        faults.sort_by_key(|fault| (fault.span.start, fault.span.end));
        faults.dedup();
        Self { file: file.to_owned(), text: text.to_owned(), faults }
    }

    /// Renders every finding with line, column, source line and marker; one finding after the other, each with a
    /// line end after its last line, a blank line between two.
    #[must_use]
    pub fn render(&self, color: bool) -> String {
        let renderer = if color { Renderer::styled() } else { Renderer::plain() };
        let texts: Vec<String> = self.faults.iter().map(|fault| self.render_one(&renderer, fault, None)).collect();
        texts.join("\n\n") + if texts.is_empty() { "" } else { "\n" }
    }

    pub(super) fn render_one(&self, renderer: &Renderer, fault: &Fault, id: Option<&str>) -> String {
        let level = match fault.severity {
            Severity::Error => Level::ERROR,
            Severity::Doubt => Level::WARNING.with_name("doubt"),
        };
        let marker = AnnotationKind::Primary.span(self.shown_span(&fault.span)).label(fault.expected.as_str());
        let snippet = Snippet::source(self.text.as_str()).path(self.file.as_str()).annotation(marker);
        let title = level.primary_title(fault.message.as_str());
        let title = if let Some(id) = id { title.id(id) } else { title };
        let mut group = title.element(snippet);
        if let Some(hint) = &fault.hint {
            group = group.element(Level::HELP.message(hint.as_str()));
        }
        renderer.render(&[group])
    }

    /// The span cut to the text, to character boundaries and to its first line.
    fn shown_span(&self, span: &Range<usize>) -> Range<usize> {
        let inside = |mut at: usize| {
            at = at.min(self.text.len());
            while !self.text.is_char_boundary(at) {
                at -= 1;
            }
            at
        };
        let (start, end) = (inside(span.start), inside(span.end));
        let line_end = self.text[start..].find('\n').map_or(self.text.len(), |n| start + n);
        start..end.clamp(start, line_end)
    }

    /// Line and column where a finding begins and where it ends (the column after its last character, on its first
    /// line), all from 1, columns in characters.
    #[must_use]
    pub fn region(&self, fault: &Fault) -> ((usize, usize), (usize, usize)) {
        let span = self.shown_span(&fault.span);
        (self.line_column(span.start), self.line_column(span.end))
    }

    /// Line and column (both from 1, columns in characters) of a byte offset.
    #[must_use]
    pub fn line_column(&self, offset: usize) -> (usize, usize) {
        let before = &self.text[..self.shown_span(&(offset..offset)).start];
        let line_start = before.rfind('\n').map_or(0, |n| n + 1);
        (before.matches('\n').count() + 1, before[line_start..].chars().count() + 1)
    }

    /// The findings with line and column, for machine-readable output.
    #[must_use]
    pub fn rows(&self) -> Vec<FaultRow> {
        self.faults.iter().map(|fault| self.row(fault)).collect()
    }

    pub(super) fn row(&self, fault: &Fault) -> FaultRow {
        let (line, column) = self.line_column(fault.span.start);
        let Fault { severity, message, expected, hint, .. } = fault.clone();
        FaultRow { severity, line, column, message, expected, hint }
    }
}
