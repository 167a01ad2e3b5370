//! What comes in and what goes out of `update`.
use super::command::Command;
use super::model::Exit;
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
}

/// Something to do outside of `update`.
#[derive(Clone, Debug)]
pub enum Effect {
    /// Write this document; answer with [`Message::Saved`].
    Save(Box<Document>),
    /// Read this file again; answer with [`Message::Reloaded`].
    Reload(PathBuf),
    /// Leave the screen.
    Quit(Exit),
}
