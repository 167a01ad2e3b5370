//! Ctrl-C ends a long study with what it has; a second one ends the program.
use super::meter::Meter;
use super::output;
use crate::study::Progress;
use std::ops::ControlFlow;
use std::sync::Arc;
use std::sync::atomic::{AtomicBool, Ordering};

/// Listens to Ctrl-C from its making on.
#[derive(Debug)]
pub struct Interrupt {
    flag: Arc<AtomicBool>,
}

impl Interrupt {
    /// Begins to listen. Where the system gives no handler, Ctrl-C ends the program at once, as before.
    pub fn listen() -> Self {
        let flag = Arc::new(AtomicBool::new(false));
        catch(&flag);
        Self { flag }
    }

    /// Whether Ctrl-C was pressed.
    pub fn is_pressed(&self) -> bool {
        self.flag.load(Ordering::Relaxed)
    }

    /// Says what an interrupted run means.
    pub fn tell(&self) {
        if self.is_pressed() {
            output::message("interrupted: what was not finished is marked, and files after it were not looked at");
        }
    }

    /// Goes on until Ctrl-C is pressed.
    pub fn watch(&self, meter: &Meter, progress: Progress) -> ControlFlow<()> {
        meter.tell(progress);
        self.flow()
    }

    /// Goes on until Ctrl-C is pressed, and shows nothing.
    pub fn flow(&self) -> ControlFlow<()> {
        if self.is_pressed() { ControlFlow::Break(()) } else { ControlFlow::Continue(()) }
    }
}

#[cfg(unix)]
fn catch(flag: &Arc<AtomicBool>) {
    use signal_hook::{consts::SIGINT, flag};
    let code = i32::from(super::Code::Interrupted.number());
    // In this order: the second Ctrl-C finds the flag of the first.
    if flag::register_conditional_shutdown(SIGINT, code, Arc::clone(flag)).is_ok() {
        let _ = flag::register(SIGINT, Arc::clone(flag));
    }
}

#[cfg(not(unix))]
fn catch(_: &Arc<AtomicBool>) {}
