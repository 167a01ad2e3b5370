//! The word of a check while the bands are being searched: none is called final before the worst is found.
use super::model::Model;
use super::studies::{Lane, State};
use crate::margin::{Margin, Verdict};
use crate::sheet::ReportBands;
use crate::study::{Bands, Spread};

/// What may be said of a check.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Word {
    /// Its verdict.
    Final(Verdict),
    /// Holds at the typical values; the bands are being searched.
    Searching,
    /// Holds at the typical values; the bands were not searched.
    Unsearched,
}

impl Word {
    /// The verdict whose look it has: no better than open as long as the worst is not known.
    #[must_use]
    pub const fn verdict(self) -> Verdict {
        match self {
            Self::Final(verdict) => verdict,
            Self::Searching | Self::Unsearched => Verdict::Open,
        }
    }

    /// The word beside a check.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Final(verdict) => verdict.word(),
            Self::Searching | Self::Unsearched => "bands",
        }
    }

    /// The words at the head of the verdict line.
    #[must_use]
    pub fn head(self) -> String {
        let symbol = self.verdict().symbol();
        match self {
            Self::Final(verdict) => format!("{symbol} {}", verdict.word().to_uppercase()),
            Self::Searching => format!("{symbol} HOLDS AT TYPICAL, BANDS BEING SEARCHED"),
            Self::Unsearched => format!("{symbol} HOLDS AT TYPICAL, BANDS NOT SEARCHED"),
        }
    }
}

impl Model {
    /// Whether any input is a band.
    #[must_use]
    pub fn has_bands(&self) -> bool {
        self.inputs.iter().any(|input| input.measure.band.is_wide())
    }

    /// What may be said of a check of the present report.
    #[must_use]
    pub fn word_of(&self, margin: &Margin) -> Word {
        self.word(margin.verdict)
    }

    /// What may be said of all checks together.
    #[must_use]
    pub fn word_of_all(&self) -> Word {
        self.answer.current().map_or(Word::Final(Verdict::Open), |report| self.word(report.verdict))
    }

    fn word(&self, verdict: Verdict) -> Word {
        let is_known = !self.has_bands() || self.bands().is_some();
        match (verdict, is_known, &self.shelf.slot(Lane::Bands).state) {
            (Verdict::Holds, false, State::Stopped | State::Failed(_)) => Word::Unsearched,
            (Verdict::Holds, false, _) => Word::Searching,
            _ => Word::Final(verdict),
        }
    }

    /// What the bands do to the checks of the present report, where it is known.
    #[must_use]
    pub fn bands(&self) -> Option<&ReportBands> {
        self.answer.current()?.bands.as_ref()
    }

    /// Puts what is known of the bands into the present report; the chosen check stays chosen.
    pub fn add_bands(&mut self) {
        let Some(found) = self.shelf.bands().cloned() else { return };
        let seed = self.sampling().seed;
        let spread = self.shelf.spread().map_or_else(|| Spread::empty(0, seed), |found| found.spread.clone());
        let Some(report) = self.answer.report.as_mut().filter(|_| self.answer.fault.is_none()) else { return };
        let chosen = report.margins.get(self.check).map(|margin| margin.id.clone());
        let is_governing = self.check == 0;
        if let Err(error) = report.add_bands(Bands { found, spread }) {
            return self.complain(error.to_string());
        }
        let at = report.margins.iter().position(|margin| Some(&margin.id) == chosen.as_ref());
        self.check = if is_governing { 0 } else { at.unwrap_or(0) };
        if self.kept.generation == self.generation {
            self.kept.report = Some(report.clone());
        }
    }
}
