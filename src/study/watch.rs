//! How far a long study is, and whether to go on.
use std::ops::ControlFlow;
use std::sync::atomic::{AtomicBool, AtomicUsize, Ordering};

/// A part of a study that is counted on its own.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Step {
    /// Runs at the corners and spread over the inside of the band box.
    Corners,
    /// Checks whose worst is being refined.
    Refining,
    /// Runs of the sample.
    Sample,
    /// Base points of the ranking.
    Ranking,
    /// Cells of a map.
    Cells,
    /// Inputs whose nearest value is searched.
    Remedies,
    /// Pairs of inputs whose nearest joint change is searched.
    Pairs,
}

/// How far one step is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Progress {
    /// Which step.
    pub step: Step,
    /// How much of it is done.
    pub done: usize,
    /// Of how much.
    pub of: usize,
}

/// Is told often how far a study is, from any of its threads, and may break it off.
pub type Watch<'w> = dyn Fn(Progress) -> ControlFlow<()> + Sync + 'w;

/// Lets a study run to its end.
pub const fn unwatched(_: Progress) -> ControlFlow<()> {
    ControlFlow::Continue(())
}

/// A step of several questions that are answered side by side: tells the watch how many are done, also while one takes
/// long, and keeps that it broke off.
pub(super) struct Pulse<'w> {
    watch: &'w Watch<'w>,
    step: Step,
    done: AtomicUsize,
    of: usize,
    stopped: AtomicBool,
}

impl<'w> Pulse<'w> {
    pub fn new(watch: &'w Watch<'w>, step: Step, of: usize) -> Self {
        Self { watch, step, done: AtomicUsize::new(0), of, stopped: AtomicBool::new(false) }
    }

    /// One question is answered.
    pub fn answered(&self) {
        self.done.fetch_add(1, Ordering::Relaxed);
        self.beat();
    }

    /// Tells the watch; true once it broke off.
    pub fn beat(&self) -> bool {
        let progress = Progress { step: self.step, done: self.done.load(Ordering::Relaxed), of: self.of };
        if !self.is_stopped() && (self.watch)(progress).is_break() {
            self.stopped.store(true, Ordering::Relaxed);
        }
        self.is_stopped()
    }

    pub fn is_stopped(&self) -> bool {
        self.stopped.load(Ordering::Relaxed)
    }
}
