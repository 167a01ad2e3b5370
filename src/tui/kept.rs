//! The state that Compare holds the present one against.
use super::model::Model;
use crate::margin::Margin;
use crate::scenario::{Document, inputs};
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

    /// Whether the bands are known on both sides of Compare; else it speaks of the typical values alone.
    #[must_use]
    pub fn compares_bands(&self) -> bool {
        let is_known = |report: &Report| {
            report.bands.is_some() || inputs(&report.scenario).iter().all(|input| !input.measure.band.is_wide())
        };
        let has_any = |report: &Report| report.bands.is_some();
        let sides = [self.kept.report.as_ref(), self.answer.current()];
        sides.iter().flatten().all(|report| is_known(report)) && sides.iter().flatten().any(|report| has_any(report))
    }

    /// The kept state against the present one; none where one of them has no run.
    #[must_use]
    pub fn difference(&self) -> Option<Comparison> {
        let (before, after) = (self.kept.report.as_ref()?, self.answer.current()?);
        let texts = (self.kept.document.text(), self.document.text());
        if self.compares_bands() {
            return Some(comparison((texts.0, before), (texts.1, after)));
        }
        Some(comparison((texts.0, &at_typical(before)), (texts.1, &at_typical(after))))
    }
}

/// The report with the verdicts of its typical values.
fn at_typical(report: &Report) -> Report {
    let mut typical = report.clone();
    if let Some(bands) = typical.bands.take() {
        let both = typical.margins.drain(..).zip(bands.margins);
        typical.margins = both.filter_map(|(margin, band)| Some(Margin { verdict: band.typical?, ..margin })).collect();
    }
    typical
}
