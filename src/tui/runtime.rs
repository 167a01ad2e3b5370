//! The loop: arrivals in, frames out, effects carried out.
//!
//! The loop waits on a channel and nowhere else. Keys, signals and worked-out arrows are put into it by threads of their
//! own, so that nothing that holds one of them up keeps the loop from noticing that the terminal went away.
use super::arrival::{Arrival, Inbox, hung_up, read_events};
use super::error::ScreenError;
use super::message::{Effect, Message};
use super::model::{Exit, Model};
use super::studies::Desk;
use super::terminal::Guard;
use super::update::update;
use super::view::view;
use super::watch::Watch;
use super::worker::Worker;
use crate::scenario::{Document, LoadError};
use std::path::Path;
use std::time::{Duration, Instant};

/// Wait for an arrival while the fall plays: about thirty frames a second.
const PLAYING: Duration = Duration::from_millis(33);
/// Wait for an arrival otherwise: how soon a terminal that went away is noticed.
const WAITING: Duration = Duration::from_millis(100);

/// Runs until the user leaves, a signal comes or the terminal goes away.
///
/// # Errors
/// When the terminal fails or goes away, a signal came or the user interrupted.
pub fn run_loop(guard: &mut Guard, model: &mut Model, inbox: &Inbox) -> color_eyre::Result<()> {
    let mut watch = Watch::of(model.document.path());
    let mut hands = Hands { worker: Worker::start(inbox.sender())?, desk: Desk::start(inbox.sender())? };
    start(model, &mut watch, &mut hands);
    read_events(inbox.sender())?;
    let mut before = Instant::now();
    let mut stale = true;
    loop {
        if hung_up() {
            return Err(gone(model).into());
        }
        if stale {
            draw(guard, model)?;
        }
        let mut messages = messages(inbox.wait(if model.play.running { PLAYING } else { WAITING }), model)?;
        let now = Instant::now();
        if model.play.running {
            messages.push(Message::Tick(now - before));
        }
        before = now;
        if watch.is_due(now) && watch.changed(model.saved.text()) {
            messages.push(Message::ChangedOnDisk);
        }
        messages.extend(hands.desk.progress(now));
        stale = !messages.is_empty();
        for message in messages {
            if let Some(exit) = handle(model, message, &mut watch, &mut hands) {
                return leave(exit);
            }
        }
    }
}

/// One frame; a write that fails because the terminal went away says so.
fn draw(guard: &mut Guard, model: &Model) -> color_eyre::Result<()> {
    let drawn = guard.screen().draw(|frame| view(model, frame)).map(|_| ());
    let drawn = drawn.and_then(|()| std::io::Write::flush(guard.screen().backend_mut()));
    drawn.map_err(|error| if hung_up() { gone(model).into() } else { error.into() })
}

fn gone(model: &Model) -> ScreenError {
    ScreenError::HungUp { unsaved: model.is_edited() }
}

/// The messages among the arrivals.
///
/// # Errors
/// An arrival that ends the screen.
fn messages(arrivals: Vec<Arrival>, model: &Model) -> color_eyre::Result<Vec<Message>> {
    let mut messages = Vec::new();
    for arrival in arrivals {
        match arrival {
            Arrival::Message(message) => messages.push(message),
            Arrival::Signal(signal) => {
                return Err(ScreenError::Signal { signal, unsaved: model.is_edited() }.into());
            }
            Arrival::InputFailed(_) if hung_up() => return Err(gone(model).into()),
            Arrival::InputFailed(error) => return Err(error.into()),
        }
    }
    Ok(messages)
}

fn leave(exit: Exit) -> color_eyre::Result<()> {
    match exit {
        Exit::Done => Ok(()),
        Exit::Interrupted => Err(ScreenError::Interrupted.into()),
    }
}

/// Whoever works beside the loop.
struct Hands {
    worker: Worker,
    desk: Desk,
}

/// Hands out what the first state of the screen calls for.
fn start(model: &mut Model, watch: &mut Watch, hands: &mut Hands) {
    let (width, height) = (model.size.width, model.size.height);
    let _ = handle(model, Message::Resize(width, height), watch, hands);
}

/// One message and all that follows from it.
fn handle(model: &mut Model, message: Message, watch: &mut Watch, hands: &mut Hands) -> Option<Exit> {
    let mut queue = vec![message];
    while let Some(message) = queue.pop() {
        for effect in update(model, message) {
            match carry_out(effect, watch, hands) {
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

fn carry_out(effect: Effect, watch: &mut Watch, hands: &mut Hands) -> Outcome {
    match effect {
        Effect::Lean(job) => {
            hands.worker.give(*job);
            Outcome::Later
        }
        Effect::Study(order) => {
            hands.desk.give(*order);
            Outcome::Later
        }
        Effect::EndStudy(lane) => {
            hands.desk.end_early(lane);
            Outcome::Later
        }
        Effect::DropStudy(lane) => {
            hands.desk.drop_lane(lane);
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
