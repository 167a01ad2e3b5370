//! Where studies are worked out: few threads of low priority, so that keys and frames never wait for them.
use super::job::{Lane, Order};
use crate::study::Meter;
use crate::tui::arrival::Arrival;
use crate::tui::message::Message;
use rayon::{ThreadPool, ThreadPoolBuilder};
use std::io;
use std::sync::Arc;
use std::sync::mpsc::Sender;
use std::thread::available_parallelism;
use std::time::Instant;

/// How far below everything else the threads of studies stand, where the platform lets a thread stand apart.
#[cfg(target_os = "linux")]
const NICENESS: i32 = 10;

/// The threads and what runs on them.
#[derive(Debug)]
pub struct Desk {
    pool: ThreadPool,
    outbox: Sender<Arrival>,
    running: Vec<Running>,
}

/// A study that was handed out.
#[derive(Debug)]
struct Running {
    lane: Lane,
    ticket: u64,
    of: Option<usize>,
    meter: Arc<Meter>,
    /// When its first run was seen.
    since: Option<Instant>,
}

impl Desk {
    /// One thread fewer than the machine has cores, at least one.
    ///
    /// # Errors
    /// When the system gives no threads.
    pub fn start(outbox: Sender<Arrival>) -> io::Result<Self> {
        let cores = available_parallelism().map_or(1, usize::from);
        let pool = ThreadPoolBuilder::new()
            .num_threads(cores.saturating_sub(1).max(1))
            .thread_name(|index| format!("study {index}"))
            .start_handler(|_| step_back())
            .build()
            .map_err(io::Error::other)?;
        Ok(Self { pool, outbox, running: Vec::new() })
    }

    /// Hands a study over; an earlier one of its kind is dropped.
    pub fn give(&mut self, order: Order) {
        let lane = order.what.lane();
        self.drop_lane(lane);
        let meter = Arc::new(Meter::default());
        let running =
            Running { lane, ticket: order.ticket, of: order.expected(), meter: Arc::clone(&meter), since: None };
        self.running.push(running);
        let outbox = self.outbox.clone();
        self.pool.spawn(move || {
            let _ = outbox.send(Arrival::Message(order.answer(&meter)));
        });
    }

    /// Nobody wants the answer of this kind any more.
    pub fn drop_lane(&mut self, lane: Lane) {
        self.running.iter().filter(|running| running.lane == lane).for_each(|running| running.meter.drop_study());
        self.running.retain(|running| running.lane != lane);
    }

    /// The study of this kind is to answer with what it has.
    pub fn end_early(&self, lane: Lane) {
        self.running.iter().filter(|running| running.lane == lane).for_each(|running| running.meter.end_early());
    }

    /// How far each study is.
    pub fn progress(&mut self, now: Instant) -> Vec<Message> {
        // The thread lets go of its meter when it is done.
        self.running.retain(|running| Arc::strong_count(&running.meter) > 1);
        self.running.iter_mut().map(|running| running.message(now)).collect()
    }
}

impl Drop for Desk {
    fn drop(&mut self) {
        self.running.iter().for_each(|running| running.meter.drop_study());
    }
}

impl Running {
    fn message(&mut self, now: Instant) -> Message {
        let done = self.meter.runs();
        if done > 0 && self.since.is_none() {
            self.since = Some(now);
        }
        let passed = self.since.map_or_else(Default::default, |since| now.duration_since(since));
        let of = self.of.or_else(|| self.meter.share().map(|share| whole(done, share)));
        Message::Progress { lane: self.lane, ticket: self.ticket, done, of, passed }
    }
}

/// How much the whole is of which so much is this share.
#[expect(clippy::cast_precision_loss, clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "for the eye")]
fn whole(done: usize, share: f32) -> usize {
    (done as f32 / share).round() as usize
}

/// Lets every other thread go first; without leave from the system it stays as it is.
pub fn step_back() {
    #[cfg(target_os = "linux")]
    let _ = rustix::process::setpriority_process(None, NICENESS);
}
