//! Counts the runs of a study from outside, and breaks it off.
use std::sync::atomic::{AtomicU8, AtomicU32, AtomicUsize, Ordering};

/// Shared between a study that runs and whoever watches it.
#[derive(Debug, Default)]
pub struct Meter {
    runs: AtomicUsize,
    stop: AtomicU8,
    /// Share done as the study tells it, in bits; 0 where it tells none.
    share: AtomicU32,
}

const END_EARLY: u8 = 1;
const DROP: u8 = 2;

impl Meter {
    /// How many runs were started.
    #[must_use]
    pub fn runs(&self) -> usize {
        self.runs.load(Ordering::Relaxed)
    }

    /// The study tells which share of it is done, 0 to 1.
    pub fn tell_share(&self, share: f32) {
        self.share.store(share.to_bits(), Ordering::Relaxed);
    }

    /// The share told last; none where none was.
    #[must_use]
    pub fn share(&self) -> Option<f32> {
        Some(f32::from_bits(self.share.load(Ordering::Relaxed))).filter(|share| *share > 0.0)
    }

    /// Asks the study to end with what it has; studies that can give a part look at it in their `watch`.
    pub fn end_early(&self) {
        self.stop.fetch_max(END_EARLY, Ordering::Relaxed);
    }

    /// Refuses every later run with [`StudyError::Stopped`](super::StudyError::Stopped): nobody wants the answer.
    pub fn drop_study(&self) {
        self.stop.fetch_max(DROP, Ordering::Relaxed);
    }

    /// True after [`Self::end_early`] and [`Self::drop_study`].
    #[must_use]
    pub fn is_ending(&self) -> bool {
        self.stop.load(Ordering::Relaxed) >= END_EARLY
    }

    /// True after [`Self::drop_study`].
    #[must_use]
    pub fn is_dropped(&self) -> bool {
        self.stop.load(Ordering::Relaxed) >= DROP
    }

    /// One more run; false when it is refused.
    pub(super) fn count(&self) -> bool {
        self.runs.fetch_add(1, Ordering::Relaxed);
        !self.is_dropped()
    }
}
