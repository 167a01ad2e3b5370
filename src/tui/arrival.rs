//! What the loop waits for, and the threads that bring it.
use super::message::Message;
use crossterm::event::{self, Event, KeyEventKind};
use std::io;
use std::panic::catch_unwind;
use std::sync::mpsc::{Receiver, Sender, channel};
use std::thread;
use std::time::Duration;

/// Something that the loop must see.
#[derive(Debug)]
pub enum Arrival {
    /// For `update`.
    Message(Message),
    /// This signal asks the program to end.
    Signal(i32),
    /// No more keys will come.
    InputFailed(io::Error),
}

/// Where everything arrives.
#[derive(Debug)]
pub struct Inbox {
    sender: Sender<Arrival>,
    receiver: Receiver<Arrival>,
}

/// Most arrivals handled before the next frame.
const MOST: usize = 64;

impl Inbox {
    /// An empty one.
    #[must_use]
    #[expect(clippy::new_without_default, reason = "a channel is made on purpose, never by default")]
    pub fn new() -> Self {
        let (sender, receiver) = channel();
        Self { sender, receiver }
    }

    /// For a thread that brings something.
    #[must_use]
    pub fn sender(&self) -> Sender<Arrival> {
        self.sender.clone()
    }

    /// What has arrived, at the latest after this time.
    #[must_use]
    pub fn wait(&self, longest: Duration) -> Vec<Arrival> {
        let first = self.receiver.recv_timeout(longest).ok();
        let rest = if first.is_some() { MOST - 1 } else { 0 };
        first.into_iter().chain(self.receiver.try_iter().take(rest)).collect()
    }
}

/// Starts the thread that reads keys and mouse. The terminal library's reader may never return once the terminal has
/// gone away, so nobody waits for this thread; it ends with the program.
///
/// # Errors
/// When the system gives no thread.
pub fn read_events(outbox: Sender<Arrival>) -> io::Result<()> {
    thread::Builder::new().name("keys".to_owned()).spawn(move || {
        loop {
            let read = catch_unwind(event::read);
            let arrival = match read.unwrap_or_else(|_| Err(io::Error::other("reading the keys failed"))) {
                Ok(event) => match translate(event) {
                    Some(message) => Arrival::Message(message),
                    None => continue,
                },
                Err(error) => Arrival::InputFailed(error),
            };
            let is_last = matches!(arrival, Arrival::InputFailed(_));
            if outbox.send(arrival).is_err() || is_last {
                break;
            }
        }
    })?;
    Ok(())
}

fn translate(event: Event) -> Option<Message> {
    match event {
        Event::Key(key) if key.kind == KeyEventKind::Press => Some(Message::Key(key)),
        Event::Mouse(mouse) if mouse.kind != event::MouseEventKind::Moved => Some(Message::Mouse(mouse)),
        Event::Paste(text) => Some(Message::Paste(text)),
        Event::Resize(width, height) => Some(Message::Resize(width, height)),
        _ => None,
    }
}

/// True when the terminal has gone away, whether or not a signal said so.
#[cfg(unix)]
#[must_use]
pub fn hung_up() -> bool {
    use rustix::event::{PollFd, PollFlags, Timespec, poll};
    let stdin = io::stdin();
    // Hangup and error are reported whatever is asked for.
    let mut asked = [PollFd::new(&stdin, PollFlags::empty())];
    let at_once = Timespec { tv_sec: 0, tv_nsec: 0 };
    poll(&mut asked, Some(&at_once)).is_ok() && asked[0].revents().intersects(PollFlags::HUP | PollFlags::ERR)
}

/// Never known here.
#[cfg(not(unix))]
#[must_use]
pub fn hung_up() -> bool {
    false
}
