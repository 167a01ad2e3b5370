//! Signals that end the program, also when the loop cannot.
use super::arrival::Arrival;
#[cfg(unix)]
use super::terminal;
use std::io;
use std::sync::mpsc::Sender;
#[cfg(unix)]
use std::sync::mpsc::{Receiver, RecvTimeoutError, channel};
#[cfg(unix)]
use std::time::Duration;

/// How long the loop has to end, and the terminal to take its restoring.
#[cfg(unix)]
const PATIENCE: Duration = Duration::from_millis(500);

/// Listens until dropped.
#[derive(Debug)]
pub struct Signals {
    #[cfg(unix)]
    handle: signal_hook::iterator::Handle,
    /// Closed when this is dropped: the loop has ended in time.
    #[cfg(unix)]
    _running: Sender<()>,
}

impl Signals {
    /// Listens to SIGINT, SIGTERM and SIGHUP: tells the loop, and ends the program itself where the loop does not
    /// within half a second.
    ///
    /// # Errors
    /// When the system refuses a handler or a thread.
    #[cfg(unix)]
    pub fn listen(outbox: Sender<Arrival>) -> io::Result<Self> {
        use signal_hook::consts::{SIGHUP, SIGINT, SIGTERM};
        let mut caught = signal_hook::iterator::Signals::new([SIGINT, SIGTERM, SIGHUP])?;
        let handle = caught.handle();
        let (running, ended) = channel();
        std::thread::Builder::new().name("signals".to_owned()).spawn(move || {
            if let Some(signal) = caught.forever().next() {
                end(signal, &outbox, &ended);
            }
        })?;
        Ok(Self { handle, _running: running })
    }

    /// No signals here.
    ///
    /// # Errors
    /// Never.
    #[cfg(not(unix))]
    pub fn listen(_outbox: Sender<Arrival>) -> io::Result<Self> {
        Ok(Self {})
    }
}

#[cfg(unix)]
impl Drop for Signals {
    fn drop(&mut self) {
        self.handle.close();
    }
}

/// Asks the loop to end; where it has not after a while, gives the terminal back as far as it takes it and ends the
/// program without waiting for anybody.
#[cfg(unix)]
fn end(signal: i32, outbox: &Sender<Arrival>, ended: &Receiver<()>) {
    let _ = outbox.send(Arrival::Signal(signal));
    if ended.recv_timeout(PATIENCE) == Err(RecvTimeoutError::Disconnected) {
        return;
    }
    let (restored, is_restored) = channel();
    // A terminal that takes no output holds up whoever writes to it, hence a thread of its own.
    let restoring = std::thread::Builder::new().name("restore".to_owned()).spawn(move || {
        terminal::restore_input();
        terminal::restore();
        let _ = restored.send(());
    });
    if restoring.is_ok() {
        let _ = is_restored.recv_timeout(PATIENCE);
    }
    signal_hook::low_level::exit(128 + signal);
}
