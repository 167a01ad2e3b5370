//! Work that must not hold up a frame: one thread, the newest job wins, answers carry their generation.
use super::arrival::Arrival;
use super::lean::{Lean, leans};
use super::message::Message;
use super::studies::step_back;
use crate::scenario::{Input, Scenario};
use crate::sheet::Report;
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::sync::mpsc::{Sender, channel};
use std::thread;

/// The arrows of one state of the inputs.
#[derive(Clone, Debug)]
pub struct Job {
    /// Which state; the answer bears the same number.
    pub generation: u64,
    /// The scenario.
    pub scenario: Scenario,
    /// Its inputs in the order of the screen.
    pub inputs: Vec<Input>,
    /// Its report.
    pub report: Box<Report>,
}

impl Job {
    /// Works the job out; also what tests call instead of a thread.
    #[must_use]
    pub fn answer(self) -> Message {
        let leans = leans(&self.inputs, &self.scenario, Some(&self.report));
        Message::Leaned { generation: self.generation, leans }
    }

    /// As [`Job::answer`]; a panic becomes arrows that cannot be told.
    fn answer_or_unknown(self) -> Message {
        let (generation, count) = (self.generation, self.inputs.len());
        let answer = catch_unwind(AssertUnwindSafe(|| self.answer()));
        answer.unwrap_or_else(|_| Message::Leaned { generation, leans: vec![Lean::Unknown; count] })
    }
}

/// The thread and the channel to it.
#[derive(Debug)]
pub struct Worker {
    jobs: Sender<Job>,
}

impl Worker {
    /// Starts the thread, which sends its answers to `outbox`; it ends when this is dropped.
    ///
    /// # Errors
    /// When the system gives no thread.
    pub fn start(outbox: Sender<Arrival>) -> std::io::Result<Self> {
        let (jobs, inbox) = channel::<Job>();
        thread::Builder::new().name("arrows".to_owned()).spawn(move || {
            step_back();
            while let Ok(mut job) = inbox.recv() {
                while let Ok(newer) = inbox.try_recv() {
                    job = newer;
                }
                if outbox.send(Arrival::Message(job.answer_or_unknown())).is_err() {
                    break;
                }
            }
        })?;
        Ok(Self { jobs })
    }

    /// Hands a job over; a worker that is gone leaves the arrows blank.
    pub fn give(&self, job: Job) {
        let _ = self.jobs.send(job);
    }
}
