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
    step: Mutex<Option<Step>>,
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
        if self.began.elapsed() < PATIENCE {
            return;
        }
        self.begin(progress);
        self.bar.set_position(progress.done as u64);
    }

    /// A step that was not shown yet.
    fn begin(&self, progress: Progress) {
        let Ok(mut step) = self.step.try_lock() else { return };
        if *step == Some(progress.step) {
            return;
        }
        if step.is_none() {
            // Draws only where stderr is a terminal.
            self.bar.set_draw_target(ProgressDrawTarget::stderr());
        }
        *step = Some(progress.step);
        self.bar.set_length(progress.of as u64);
        self.bar.set_position(progress.done as u64);
        self.bar.reset_eta();
        self.bar.set_message(words(progress.step));
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
