//! How far a long study is, and whether to go on.
use std::ops::ControlFlow;

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
