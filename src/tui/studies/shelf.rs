//! The answers of studies, each with what it was asked for; an answer to anything else is never shown.
use super::job::{Findings, Lane, Mapped, Ranked, Spreading, Varied, What};
use crate::study::{Remedies, Sampling, WorstFound};
use std::time::Duration;

/// How far a study is.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Progress {
    /// Runs made.
    pub done: usize,
    /// Of how many, about; none where that cannot be told.
    pub of: Option<usize>,
    /// Time since the first.
    pub passed: Duration,
}

impl Progress {
    /// Share done, 0 to 1.
    #[must_use]
    #[expect(clippy::cast_precision_loss, reason = "counts of runs are small")]
    pub fn share(&self) -> Option<f64> {
        self.of.map(|of| (self.done as f64 / of.max(1) as f64).min(0.99))
    }

    /// Time left if it goes on at the same pace, s.
    #[must_use]
    pub fn left_s(&self) -> Option<f64> {
        let share = self.share().filter(|&share| share > 0.0)?;
        Some(self.passed.as_secs_f64() * (1.0 - share) / share)
    }
}

/// Where one study is.
#[derive(Clone, Debug, Default)]
pub enum State {
    /// Not asked for.
    #[default]
    Idle,
    /// Being worked out.
    Running(Progress),
    /// Broken off by the user; nothing came of it.
    Stopped,
    /// There is no answer, and why.
    Failed(String),
    /// The answer.
    Done(Findings),
}

/// One kind of study.
#[derive(Clone, Debug, Default)]
pub struct Slot {
    /// What was asked last, and of which state of the inputs.
    pub ordered: Option<(u64, What)>,
    /// Number of that order.
    pub ticket: u64,
    /// Where it is.
    pub state: State,
}

/// All kinds.
#[derive(Clone, Debug)]
pub struct Shelf {
    slots: [Slot; Lane::ALL.len()],
    tickets: u64,
    /// How many times as many samples as the file states Spread asks for.
    times: usize,
}

/// Most samples of the screen; the command line takes more.
const MOST_SAMPLES: usize = 1 << 20;

impl Default for Shelf {
    fn default() -> Self {
        Self { slots: Default::default(), tickets: 0, times: 1 }
    }
}

impl Shelf {
    /// One kind.
    #[must_use]
    pub const fn slot(&self, lane: Lane) -> &Slot {
        &self.slots[lane as usize]
    }

    pub(super) const fn slot_mut(&mut self, lane: Lane) -> &mut Slot {
        &mut self.slots[lane as usize]
    }

    /// The number of the next order.
    pub(super) const fn ticket(&mut self) -> u64 {
        self.tickets += 1;
        self.tickets
    }

    /// Four times as many samples from now on, as far as that goes.
    pub fn more_samples(&mut self) {
        self.times = (4 * self.times).min(MOST_SAMPLES);
    }

    /// The sample that Spread asks for, from the one that the file states.
    #[must_use]
    pub fn sampling(&self, stated: Sampling) -> Sampling {
        let most = MOST_SAMPLES.max(stated.samples);
        Sampling { samples: stated.samples.saturating_mul(self.times).min(most), ..stated }
    }

    /// Takes an answer, unless it is not to the last question; true when it was taken.
    pub fn take(&mut self, lane: Lane, ticket: u64, result: Result<Option<Findings>, String>) -> bool {
        let slot = self.slot_mut(lane);
        let is_wanted = slot.ticket == ticket && matches!(slot.state, State::Running(_));
        if is_wanted {
            slot.state = match result {
                Ok(Some(found)) => State::Done(found),
                Ok(None) => State::Stopped,
                Err(why) => State::Failed(why),
            };
        }
        is_wanted
    }

    /// Takes note of how far a study is.
    pub fn note(&mut self, lane: Lane, ticket: u64, progress: Progress) {
        let slot = self.slot_mut(lane);
        if let State::Running(known) = &mut slot.state
            && slot.ticket == ticket
        {
            *known = progress;
        }
    }

    /// The kinds being worked out.
    pub fn running(&self) -> impl Iterator<Item = Lane> {
        Lane::ALL.into_iter().filter(|&lane| matches!(self.slot(lane).state, State::Running(_)))
    }

    /// The search of the bands.
    #[must_use]
    pub fn bands(&self) -> Option<&WorstFound> {
        if let State::Done(Findings::Bands(found)) = &self.slot(Lane::Bands).state { Some(found) } else { None }
    }

    /// The curve.
    #[must_use]
    pub fn vary(&self) -> Option<&Varied> {
        if let State::Done(Findings::Vary(found)) = &self.slot(Lane::Vary).state { Some(found) } else { None }
    }

    /// The map.
    #[must_use]
    pub fn map(&self) -> Option<&Mapped> {
        if let State::Done(Findings::Map(found)) = &self.slot(Lane::Map).state { Some(found) } else { None }
    }

    /// The sample.
    #[must_use]
    pub fn spread(&self) -> Option<&Spreading> {
        if let State::Done(Findings::Spread(found)) = &self.slot(Lane::Spread).state { Some(found) } else { None }
    }

    /// The ranking.
    #[must_use]
    pub fn ranking(&self) -> Option<&Ranked> {
        if let State::Done(Findings::Ranking(found)) = &self.slot(Lane::Ranking).state { Some(found) } else { None }
    }

    /// The remedies.
    #[must_use]
    pub fn remedies(&self) -> Option<&Remedies> {
        if let State::Done(Findings::Remedies(found)) = &self.slot(Lane::Remedies).state { Some(found) } else { None }
    }
}
