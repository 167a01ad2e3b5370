//! The loop: events in, frames out, effects carried out.
use super::error::ScreenError;
use super::lean::Lean;
use super::message::{Effect, Message};
use super::model::{Exit, Model};
use super::terminal::Guard;
use super::update::update;
use super::view::view;
use super::watch::Watch;
use super::worker::Worker;
use crate::scenario::{Document, LoadError};
use crossterm::event::{self, Event, KeyEventKind};
use std::path::Path;
use std::time::{Duration, Instant};

/// Wait for an event while the fall plays: about thirty frames a second.
const PLAYING: Duration = Duration::from_millis(33);
/// Wait for an event otherwise: how soon a signal is noticed.
const WAITING: Duration = Duration::from_millis(100);

/// Runs until the user leaves or a signal comes.
///
/// # Errors
/// When the terminal fails, a signal came or the user interrupted.
pub fn run_loop(guard: &mut Guard, model: &mut Model, signals: &Signals) -> color_eyre::Result<()> {
    let mut watch = Watch::of(model.document.path());
    let worker = Worker::start()?;
    let mut before = Instant::now();
    let mut stale = true;
    loop {
        if let Some(signal) = signals.caught() {
            return Err(ScreenError::Signal { signal, unsaved: model.is_edited() }.into());
        }
        if stale {
            guard.screen().draw(|frame| view(model, frame))?;
            std::io::Write::flush(guard.screen().backend_mut())?;
        }
        let is_waited_for = model.play.running || model.leans.contains(&Lean::Pending);
        let mut messages = wait(if is_waited_for { PLAYING } else { WAITING })?;
        messages.extend(worker.answers());
        let now = Instant::now();
        if model.play.running {
            messages.push(Message::Tick(now - before));
        }
        before = now;
        if watch.is_due(now) && watch.changed(model.saved.text()) {
            messages.push(Message::ChangedOnDisk);
        }
        stale = !messages.is_empty();
        for message in messages {
            if let Some(exit) = handle(model, message, &mut watch, &worker) {
                return leave(exit);
            }
        }
    }
}

fn leave(exit: Exit) -> color_eyre::Result<()> {
    match exit {
        Exit::Done => Ok(()),
        Exit::Interrupted => Err(ScreenError::Interrupted.into()),
    }
}

/// Everything that has arrived, at least after the given time.
fn wait(longest: Duration) -> std::io::Result<Vec<Message>> {
    let mut messages = Vec::new();
    let mut patience = longest;
    while messages.len() < 64 && event::poll(patience)? {
        messages.extend(translate(event::read()?));
        patience = Duration::ZERO;
    }
    Ok(messages)
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

/// One message and all that follows from it.
fn handle(model: &mut Model, message: Message, watch: &mut Watch, worker: &Worker) -> Option<Exit> {
    let mut queue = vec![message];
    while let Some(message) = queue.pop() {
        for effect in update(model, message) {
            match carry_out(effect, watch, worker) {
                Outcome::Message(message) => queue.push(message),
                Outcome::Exit(exit) => return Some(exit),
                Outcome::Later => {}
            }
        }
    }
    None
}

enum Outcome {
    Message(Message),
    Later,
    Exit(Exit),
}

fn carry_out(effect: Effect, watch: &mut Watch, worker: &Worker) -> Outcome {
    match effect {
        Effect::Lean(job) => {
            worker.give(*job);
            Outcome::Later
        }
        Effect::Quit(exit) => Outcome::Exit(exit),
        Effect::Save(mut document) => {
            let written = document.save();
            watch.look_again();
            Outcome::Message(Message::Saved(written.map(|()| document).map_err(|error| error.to_string())))
        }
        Effect::Reload(path) => {
            watch.look_again();
            Outcome::Message(Message::Reloaded(reload(&path)))
        }
    }
}

fn reload(path: &Path) -> Result<Box<Document>, String> {
    Document::open(path).map(Box::new).map_err(|error| match &error {
        LoadError::Refused(faults) => {
            let first = super::edit::first_fault(faults);
            format!("the file on disk has {} fault(s): {first}", faults.faults.len())
        }
        LoadError::Unreadable { .. } => error.to_string(),
    })
}

/// Signals that end the screen, noted by their handlers and looked at by the loop.
#[derive(Debug)]
pub struct Signals {
    #[cfg(unix)]
    flags: Vec<(i32, std::sync::Arc<std::sync::atomic::AtomicBool>)>,
}

impl Signals {
    /// Listens to SIGINT, SIGTERM and SIGHUP.
    ///
    /// # Errors
    /// When the system refuses a handler.
    #[cfg(unix)]
    pub fn listen() -> std::io::Result<Self> {
        use signal_hook::consts::{SIGHUP, SIGINT, SIGTERM};
        let mut flags = Vec::new();
        for signal in [SIGINT, SIGTERM, SIGHUP] {
            let flag = std::sync::Arc::new(std::sync::atomic::AtomicBool::new(false));
            signal_hook::flag::register(signal, std::sync::Arc::clone(&flag))?;
            flags.push((signal, flag));
        }
        Ok(Self { flags })
    }

    /// No signals here.
    ///
    /// # Errors
    /// Never.
    #[cfg(not(unix))]
    pub fn listen() -> std::io::Result<Self> {
        Ok(Self {})
    }

    #[cfg(unix)]
    fn caught(&self) -> Option<i32> {
        let caught = self.flags.iter().find(|(_, flag)| flag.load(std::sync::atomic::Ordering::SeqCst));
        caught.map(|&(signal, _)| signal)
    }

    #[cfg(not(unix))]
    fn caught(&self) -> Option<i32> {
        None
    }
}
