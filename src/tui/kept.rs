//! The state that Compare holds the present one against.
use super::model::Model;
use crate::scenario::Document;
use crate::sheet::{Report, comparison};
use crate::study::Comparison;

/// A kept state.
#[derive(Clone, Debug)]
pub struct Kept {
    /// The file with its values.
    pub document: Document,
    /// Its report; none where it could not be computed.
    pub report: Option<Report>,
    /// Which state of the inputs it is.
    pub generation: u64,
    /// Whether the user kept it; else it is the state as opened.
    pub by_hand: bool,
}

impl Kept {
    /// The state as opened.
    #[must_use]
    pub fn opened(document: &Document) -> Self {
        Self { document: document.clone(), report: None, generation: 1, by_hand: false }
    }
}

impl Model {
    /// Keeps the present state to compare with.
    pub fn keep(&mut self) {
        let Some(report) = self.answer.current() else {
            return self.complain("the present inputs give no run to keep");
        };
        self.kept = Kept {
            document: self.document.clone(),
            report: Some(report.clone()),
            generation: self.generation,
            by_hand: true,
        };
        self.say("kept this state; Compare holds it against whatever comes next");
    }

    /// The kept state against the present one; none where one of them has no run.
    #[must_use]
    pub fn difference(&self) -> Option<Comparison> {
        let (before, after) = (self.kept.report.as_ref()?, self.answer.current()?);
        Some(comparison((self.kept.document.text(), before), (self.document.text(), after)))
    }
}
