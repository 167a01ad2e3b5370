//! The live screen.
//!
//! [`update`](update::update) takes a message to the next [`Model`](model::Model) and says what to do outside;
//! [`view`](view::view) draws a model. Both are pure, so tests and benches drive them without a terminal.
//! [`run`] connects them to one.
pub mod arrival;
pub mod choice;
pub mod command;
pub mod edit;
pub mod error;
pub mod joint;
pub mod kept;
pub mod key;
pub mod layout;
pub mod lean;
pub mod map;
pub mod message;
pub mod model;
pub mod panes;
pub mod play;
mod pointer;
pub mod runtime;
pub mod signals;
pub mod studies;
mod study;
pub mod table;
pub mod terminal;
pub mod text;
pub mod theme;
pub mod update;
pub mod view;
pub mod views;
pub mod walking;
pub mod watch;
pub mod worker;

pub use error::ScreenError;
pub use panes::help::key_rows;

use crate::quantity::UnitSystem;
use crate::scenario::{Document, load_walk};
use std::io::IsTerminal;
use std::path::Path;

/// Opens a file and shows it until the user leaves.
///
/// The file is read before the terminal is touched, so that its faults can be printed as text.
///
/// # Errors
/// [`crate::scenario::LoadError`] when the file cannot be read or has faults; [`ScreenError`] when there is no
/// terminal, it went away, a signal came or the user interrupted; an I/O error when the terminal fails.
pub fn run(path: &Path, units: UnitSystem) -> color_eyre::Result<()> {
    let document = Document::open(path)?;
    show(model::Model::new(document, units))
}

/// Opens a walk-through and shows it over its scenario until the user leaves.
///
/// # Errors
/// As [`run`].
pub fn walk(path: &Path, units: UnitSystem) -> color_eyre::Result<()> {
    let walk = load_walk(path)?;
    show(model::Model::on_walk(walk, units))
}

fn show(mut model: model::Model) -> color_eyre::Result<()> {
    need_terminal()?;
    let theme = theme::Theme::for_no_color(std::env::var_os("NO_COLOR").as_deref());
    // With NO_COLOR the terminal library would drop reverse video together with colours; the theme uses none.
    crossterm::style::force_color_output(true);
    let inbox = arrival::Inbox::new();
    let _signals = signals::Signals::listen(inbox.sender())?;
    model.theme = theme;
    let (width, height) = crossterm::terminal::size()?;
    model.size = ratatui::layout::Size::new(width, height);
    let mut guard = terminal::Guard::take()?;
    runtime::run_loop(&mut guard, &mut model, &inbox)
}

fn need_terminal() -> Result<(), ScreenError> {
    if !std::io::stdin().is_terminal() {
        return Err(ScreenError::NoTerminal { stream: "standard input" });
    }
    if !std::io::stdout().is_terminal() {
        return Err(ScreenError::NoTerminal { stream: "standard output" });
    }
    Ok(())
}
