//! How far a long command is, on stderr.
use super::interrupt::Interrupt;
use super::output;
use std::io::{self, IsTerminal};
use std::ops::ControlFlow;
use std::time::{Duration, Instant};

/// Nothing is told of a command that takes less.
const FIRST: Duration = Duration::from_secs(1);
/// On a terminal the line is written anew this often; elsewhere each line waits twice as long as the one before.
const AGAIN: Duration = Duration::from_millis(200);

/// Watches one long command.
#[derive(Debug)]
pub struct Progress {
    what: &'static str,
    start: Instant,
    next: Duration,
    is_terminal: bool,
    drawn: bool,
    interrupt: Interrupt,
}

impl Progress {
    /// Starts the clock and listens to Ctrl-C.
    pub fn new() -> Self {
        let is_terminal = io::stderr().is_terminal();
        let interrupt = Interrupt::listen();
        Self { what: "", start: Instant::now(), next: FIRST, is_terminal, drawn: false, interrupt }
    }

    /// Tells how much of what is done, and breaks off after Ctrl-C. Another `what` starts the clock anew.
    pub fn step(&mut self, what: &'static str, done: usize, total: usize) -> ControlFlow<()> {
        if what != self.what {
            (self.what, self.start, self.next) = (what, Instant::now(), FIRST);
        }
        let passed = self.start.elapsed();
        if passed >= self.next && done < total {
            self.tell(&format!("{done} of {total} {what}, {}", left(done, total, passed)), passed);
        }
        if self.is_interrupted() { ControlFlow::Break(()) } else { ControlFlow::Continue(()) }
    }

    /// Whether Ctrl-C was pressed.
    pub fn is_interrupted(&self) -> bool {
        self.interrupt.is_pressed()
    }

    fn tell(&mut self, words: &str, passed: Duration) {
        if self.is_terminal {
            output::diagnostics(&format!("\r{words}\u{1b}[K"));
            self.drawn = true;
            self.next = passed + AGAIN;
        } else {
            output::message(words);
            self.next = passed * 2;
        }
    }
}

impl Drop for Progress {
    fn drop(&mut self) {
        if self.drawn {
            output::diagnostics("\r\u{1b}[K");
        }
    }
}

/// The time left if the rest goes as fast as what is done, in whole seconds, rounded up.
fn left(done: usize, total: usize, passed: Duration) -> String {
    if done == 0 {
        return "time left not known yet".to_owned();
    }
    #[expect(clippy::cast_precision_loss, reason = "an estimate for reading")]
    let seconds = (passed.as_secs_f64() * (total - done) as f64 / done as f64).ceil();
    format!("about {seconds:.0} s left")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_time_left_goes_by_what_is_done() {
        assert_eq!(left(25, 100, Duration::from_secs(2)), "about 6 s left");
        assert_eq!(left(99, 100, Duration::from_secs(2)), "about 1 s left");
        assert_eq!(left(0, 100, Duration::from_secs(2)), "time left not known yet");
    }
}
