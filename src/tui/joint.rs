//! The word of a check while the bands are being searched: none is called final before the worst is found.
use super::model::Model;
use super::studies::{Lane, State};
use crate::margin::{Margin, Verdict};

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
        let is_known = !self.has_bands() || self.bands_are_in();
        match (verdict, is_known, &self.shelf.slot(Lane::Bands).state) {
            (Verdict::Holds, false, State::Stopped | State::Failed(_)) => Word::Unsearched,
            (Verdict::Holds, false, _) => Word::Searching,
            _ => Word::Final(verdict),
        }
    }

    /// Whether the present report speaks of the bands.
    fn bands_are_in(&self) -> bool {
        self.shelf.bands().is_some()
    }
}
