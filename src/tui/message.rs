//! What comes in and what goes out of `update`.
use super::command::Command;
use super::lean::Lean;
use super::model::Exit;
use super::studies::{Findings, Lane, Order};
use super::worker::Job;
use crate::scenario::Document;
use crossterm::event::{KeyEvent, MouseEvent};
use std::path::PathBuf;
use std::time::Duration;

/// Something happened.
#[derive(Clone, Debug)]
pub enum Message {
    /// A key was pressed.
    Key(KeyEvent),
    /// The mouse did something.
    Mouse(MouseEvent),
    /// A text was pasted.
    Paste(String),
    /// The terminal has this many columns and rows.
    Resize(u16, u16),
    /// So much time has passed.
    Tick(Duration),
    /// A command, however it was given.
    Command(Command),
    /// A save ended: the document as written, or why it was not.
    Saved(Result<Box<Document>, String>),
    /// The file was read again, or why it was not.
    Reloaded(Result<Box<Document>, String>),
    /// Somebody else changed the file.
    ChangedOnDisk,
    /// The arrows of a state of the inputs are worked out.
    Leaned {
        /// Which state.
        generation: u64,
        /// In the order of the inputs.
        leans: Vec<Lean>,
    },
    /// A study ended.
    Studied {
        /// Which kind.
        lane: Lane,
        /// Number of its order.
        ticket: u64,
        /// The answer, none where it was stopped before there was any, or why there is none.
        result: Result<Option<Findings>, String>,
    },
    /// How far a study is.
    Progress {
        /// Which kind.
        lane: Lane,
        /// Number of its order.
        ticket: u64,
        /// Runs made.
        done: usize,
        /// Of how many, about.
        of: Option<usize>,
        /// Time since the first.
        passed: Duration,
    },
}

/// Something to do outside of `update`.
#[derive(Clone, Debug)]
pub enum Effect {
    /// Write this document; answer with [`Message::Saved`].
    Save(Box<Document>),
    /// Read this file again; answer with [`Message::Reloaded`].
    Reload(PathBuf),
    /// Work out the arrows beside this; answer with [`Message::Leaned`].
    Lean(Box<Job>),
    /// Make this study; answer with [`Message::Studied`].
    Study(Box<Order>),
    /// End this kind of study with what it has.
    EndStudy(Lane),
    /// Drop this kind of study.
    DropStudy(Lane),
    /// Leave the screen.
    Quit(Exit),
}
