//! What a search has tried already, and how far it is.
use super::evaluate::{Run, StudyError};
use super::watch::{Progress, Step, Watch};
use crate::margin::{Check, CheckKind};
use std::collections::HashMap;
use std::sync::atomic::{AtomicBool, AtomicUsize, Ordering};
use std::sync::{Arc, Mutex, PoisonError};

/// The checks of one run.
#[derive(Debug)]
pub(super) struct Outcome {
    pub checks: Vec<Check>,
    failed: bool,
}

impl Outcome {
    pub fn of(run: Run) -> Self {
        Self { failed: run.failure.is_some(), checks: run.checks }
    }

    pub fn check(&self, kind: CheckKind) -> Option<&Check> {
        self.checks.iter().find(|check| check.kind == kind)
    }
}

/// Runs by their values: checks are refined side by side and often ask for the same run. What is in it at the end does
/// not depend on which thread came first.
#[derive(Debug, Default)]
pub(super) struct Memory(Mutex<HashMap<Vec<u64>, Arc<Outcome>>>);

impl Memory {
    /// The outcome of a run, made once for each set of values.
    pub fn outcome(
        &self,
        values: &[(usize, f64)],
        run: impl FnOnce() -> Result<Run, StudyError>,
    ) -> Result<Arc<Outcome>, StudyError> {
        let key: Vec<u64> = values.iter().map(|(_, value)| value.to_bits()).collect();
        let known = self.map().get(&key).cloned();
        if let Some(known) = known {
            return Ok(known);
        }
        let made = Arc::new(Outcome::of(run()?));
        Ok(self.map().entry(key).or_insert(made).clone())
    }

    /// How many different runs there were, and how many of them failed.
    pub fn counts(&self) -> (usize, usize) {
        let map = self.map();
        (map.len(), map.values().filter(|outcome| outcome.failed).count())
    }

    fn map(&self) -> std::sync::MutexGuard<'_, HashMap<Vec<u64>, Arc<Outcome>>> {
        self.0.lock().unwrap_or_else(PoisonError::into_inner)
    }
}

/// Tells the watch how far a search is; once it breaks off, it stays so.
pub(super) struct Count<'w> {
    watch: &'w Watch<'w>,
    refining: AtomicBool,
    done: AtomicUsize,
    of: AtomicUsize,
    stopped: AtomicBool,
}

impl<'w> Count<'w> {
    pub fn new(watch: &'w Watch<'w>) -> Self {
        let zero = AtomicUsize::new(0);
        Self {
            watch,
            refining: AtomicBool::new(false),
            done: AtomicUsize::new(0),
            of: zero,
            stopped: AtomicBool::new(false),
        }
    }

    /// Runs are counted from now on.
    pub fn corners(&self, of: usize) {
        self.begin(of, false);
    }

    /// Checks are counted from now on.
    pub fn refining(&self, of: usize) {
        self.begin(of, true);
    }

    fn begin(&self, of: usize, refining: bool) {
        self.done.store(0, Ordering::Relaxed);
        self.of.store(of, Ordering::Relaxed);
        self.refining.store(refining, Ordering::Relaxed);
    }

    /// One run is about to start; true when it must not.
    pub fn tell_run(&self) -> bool {
        let refining = self.refining.load(Ordering::Relaxed);
        let done = if refining { self.done.load(Ordering::Relaxed) } else { self.done.fetch_add(1, Ordering::Relaxed) };
        let step = if refining { Step::Refining } else { Step::Corners };
        self.tell(Progress { step, done, of: self.of.load(Ordering::Relaxed) })
    }

    /// One check is refined.
    pub fn refined(&self) {
        self.done.fetch_add(1, Ordering::Relaxed);
    }

    fn tell(&self, progress: Progress) -> bool {
        if !self.is_stopped() && (self.watch)(progress).is_break() {
            self.stopped.store(true, Ordering::Relaxed);
        }
        self.is_stopped()
    }

    pub fn is_stopped(&self) -> bool {
        self.stopped.load(Ordering::Relaxed)
    }
}
