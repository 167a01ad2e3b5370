//! How far a long study is and how long it still takes, on stderr while that is a terminal.
use crate::study::{Progress, Step};
use indicatif::{ProgressBar, ProgressDrawTarget, ProgressStyle};
use std::sync::Mutex;
use std::time::{Duration, Instant};

/// What takes less shows nothing.
const PATIENCE: Duration = Duration::from_secs(1);
/// The line while a step runs.
const LINE: &str = "{msg} [{bar:30}] {pos} of {len}, about {eta} left; Ctrl-C stops with what there is";

/// The line of a study.
#[derive(Debug)]
pub struct Meter {
    bar: ProgressBar,
    began: Instant,
    step: Mutex<Option<&'static str>>,
}

impl Meter {
    /// Shows nothing yet.
    pub fn new() -> Self {
        let bar = ProgressBar::hidden();
        if let Ok(style) = ProgressStyle::with_template(LINE) {
            bar.set_style(style.progress_chars("#-"));
        }
        Self { bar, began: Instant::now(), step: Mutex::new(None) }
    }

    /// Takes a step in.
    pub fn tell(&self, progress: Progress) {
        self.count(words(progress.step), progress.done, progress.of);
    }

    /// Takes in how many of what are done.
    pub fn count(&self, what: &'static str, done: usize, of: usize) {
        if self.began.elapsed() < PATIENCE {
            return;
        }
        self.begin(what, done, of);
        self.bar.set_position(done as u64);
    }

    /// Does something on the terminal with the line out of its way.
    pub fn aside<T>(&self, what: impl FnOnce() -> T) -> T {
        self.bar.suspend(what)
    }

    /// A step that was not shown yet.
    fn begin(&self, what: &'static str, done: usize, of: usize) {
        let Ok(mut step) = self.step.try_lock() else { return };
        if *step == Some(what) {
            return;
        }
        if step.is_none() {
            // Draws only where stderr is a terminal.
            self.bar.set_draw_target(ProgressDrawTarget::stderr());
        }
        *step = Some(what);
        self.bar.set_length(of as u64);
        self.bar.set_position(done as u64);
        self.bar.reset_eta();
        self.bar.set_message(what);
    }

    /// Takes the line away.
    pub fn clear(&self) {
        self.bar.finish_and_clear();
    }
}

const fn words(step: Step) -> &'static str {
    match step {
        Step::Corners => "corners of the bands",
        Step::Refining => "refining the worst found",
        Step::Sample => "samples",
        Step::Ranking => "ranking",
        Step::Cells => "cells of the map",
        Step::Remedies => "inputs",
        Step::Pairs => "pairs of inputs",
    }
}
