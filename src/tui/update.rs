//! From a message to the next state, and what to do outside.
use super::command::{Command, command_for};
use super::edit::Nudge;
use super::layout::{Panes, has_margins_below, views};
use super::message::{Effect, Message};
use super::model::{Exit, Mode, Model, Pane, Play, View, Window};
use super::panes::{compare, ledger, notes, spread};
use super::play::Curves;
use super::pointer;
use super::studies::{self, Progress};
use super::study;
use super::walking;
use crate::quantity::UnitSystem;
use crate::scenario::Document;
use crossterm::event::{Event, KeyCode, KeyEvent, KeyEventKind, KeyModifiers};
use ratatui::layout::Size;
use std::time::Duration;
use tui_input::InputRequest;
use tui_input::backend::crossterm::EventHandler;

/// Takes one message. Reads no clock, file or terminal; the caller carries the effects out.
#[must_use]
pub fn update(model: &mut Model, message: Message) -> Vec<Effect> {
    let mut effects = take(model, message);
    effects.extend(model.job.take().map(Effect::Lean));
    effects.extend(studies::plan(model));
    effects
}

fn take(model: &mut Model, message: Message) -> Vec<Effect> {
    match message {
        Message::Key(key) if key.kind == KeyEventKind::Press => press(model, key),
        Message::Key(_) => Vec::new(),
        Message::Mouse(event) => pointer::point(model, event),
        Message::Paste(text) => paste(model, &text),
        Message::Resize(width, height) => {
            model.size = Size::new(width, height);
            if !views(model.size).contains(&model.view) {
                model.view = View::default();
            }
            Vec::new()
        }
        Message::Tick(passed) => tick(model, passed),
        Message::Command(command) => run(model, command),
        Message::Saved(result) => saved(model, result),
        Message::Reloaded(result) => reloaded(model, result),
        Message::Leaned { generation, leans } => {
            if generation == model.generation {
                model.leans = leans;
            }
            Vec::new()
        }
        Message::Studied { lane, ticket, result } => {
            study::studied(model, lane, ticket, result);
            Vec::new()
        }
        Message::Progress { lane, ticket, done, of, passed } => {
            model.shelf.note(lane, ticket, Progress { done, of, passed });
            Vec::new()
        }
        Message::ChangedOnDisk => {
            model.changed_on_disk = true;
            model.complain("the file changed on disk; r reads it again, undo then brings your changes back");
            Vec::new()
        }
    }
}

fn press(model: &mut Model, key: KeyEvent) -> Vec<Effect> {
    let command = command_for(key);
    match &model.mode {
        Mode::Typing(_) => type_key(model, key),
        Mode::Leaving(exit) => leaving(model, *exit, command),
        Mode::Help(row) => help_key(model, *row, command),
        Mode::Commands => {
            model.notice = None;
            command.map_or_else(Vec::new, |command| run(model, command))
        }
    }
}

fn type_key(model: &mut Model, key: KeyEvent) -> Vec<Effect> {
    match (key.code, key.modifiers) {
        (KeyCode::Enter, _) => model.finish_typing(),
        (KeyCode::Esc, _) => model.mode = Mode::Commands,
        (KeyCode::Char('c'), KeyModifiers::CONTROL) => return run(model, Command::Interrupt),
        _ => {
            if let Mode::Typing(typing) = &mut model.mode {
                typing.text.handle_event(&Event::Key(key));
            }
            model.judge_typing();
        }
    }
    Vec::new()
}

fn paste(model: &mut Model, text: &str) -> Vec<Effect> {
    if let Mode::Typing(typing) = &mut model.mode {
        for symbol in text.chars().filter(|symbol| !symbol.is_control()).take(200) {
            typing.text.handle(InputRequest::InsertChar(symbol));
        }
        model.judge_typing();
    }
    Vec::new()
}

fn leaving(model: &mut Model, exit: Exit, command: Option<Command>) -> Vec<Effect> {
    model.mode = Mode::Commands;
    match command {
        Some(Command::Quit) => vec![Effect::Quit(exit)],
        Some(Command::Interrupt) => vec![Effect::Quit(Exit::Interrupted)],
        Some(Command::Save) => run(model, Command::Save),
        _ => Vec::new(),
    }
}

fn help_key(model: &mut Model, row: u16, command: Option<Command>) -> Vec<Effect> {
    model.mode = match command {
        Some(Command::Down) => Mode::Help(row.saturating_add(1)),
        Some(Command::Up) => Mode::Help(row.saturating_sub(1)),
        Some(Command::PageDown) => Mode::Help(row.saturating_add(10)),
        Some(Command::PageUp) => Mode::Help(row.saturating_sub(10)),
        _ => Mode::Commands,
    };
    if command == Some(Command::Interrupt) { run(model, Command::Interrupt) } else { Vec::new() }
}

fn run(model: &mut Model, command: Command) -> Vec<Effect> {
    walking::note(model, command);
    match command {
        Command::Save => return save(model),
        Command::Reload => return vec![Effect::Reload(model.path())],
        Command::Quit => return leave(model, Exit::Done),
        Command::Interrupt => return leave(model, Exit::Interrupted),
        Command::Help => model.mode = Mode::Help(0),
        Command::Raise | Command::Lower | Command::RaiseMuch | Command::LowerMuch | Command::Up | Command::Down
            if model.pane == Pane::View =>
        {
            study::view_key(model, command);
        }
        Command::Raise | Command::Lower | Command::RaiseMuch | Command::LowerMuch => side_key(model, command),
        Command::Type if model.pane == Pane::View => study::into_inputs(model),
        Command::Type => model.start_typing(),
        Command::IntoInputs => study::into_inputs(model),
        Command::AxisAcross => model.set_axis(0),
        Command::AxisUp => model.set_axis(1),
        Command::HeldAt => model.switch_remedies(),
        Command::Keep => model.keep(),
        Command::Stop => return studies::stop(model),
        Command::Again => studies::again(model),
        Command::Restore => model.restore(),
        Command::Undo => model.undo(),
        Command::Redo => model.redo(),
        Command::PageUp | Command::PageDown if model.view.is_text() => scroll_text(model, command, 10),
        Command::Up | Command::Down | Command::PageUp | Command::PageDown => walk(model, command),
        Command::NextPane | Command::PreviousPane => other_pane(model, command),
        Command::Units | Command::Window | Command::Curves => switch(model, command),
        Command::Show(View::Margins) => show_margins(model),
        Command::Show(view) => model.show(view),
        Command::WalkOn | Command::WalkBack | Command::WalkStart | Command::WalkLeave => {
            walking::command(model, command);
        }
        Command::NextView => next_view(model),
        _ => play(model, command),
    }
    Vec::new()
}

fn side_key(model: &mut Model, command: Command) {
    model.nudge(match command {
        Command::Raise => Nudge::Raise,
        Command::Lower => Nudge::Lower,
        Command::RaiseMuch => Nudge::RaiseMuch,
        _ => Nudge::LowerMuch,
    });
}

fn switch(model: &mut Model, command: Command) {
    match command {
        Command::Units => {
            model.units = match model.units {
                UnitSystem::Metric => UnitSystem::Us,
                UnitSystem::Us => UnitSystem::Metric,
            };
        }
        Command::Curves => {
            model.curves = match model.curves {
                Curves::TravelForce => Curves::AngleSpeed,
                Curves::AngleSpeed => Curves::TravelForce,
            };
        }
        _ => {
            model.window = match model.window {
                Window::FirstCatch => Window::Whole,
                Window::Whole => Window::FirstCatch,
            };
        }
    }
}

/// Moves the chosen row of the pane that has the keys.
pub(super) fn walk(model: &mut Model, command: Command) {
    let checks = model.answer.report.as_ref().map_or(0, |report| report.margins.len());
    let (chosen, count) = match model.pane {
        Pane::Inputs => (&mut model.input, model.entries.len()),
        Pane::Margins | Pane::View => (&mut model.check, checks),
    };
    let moved = match command {
        Command::Up => chosen.saturating_sub(1),
        Command::Down => *chosen + 1,
        Command::PageUp => chosen.saturating_sub(10),
        _ => *chosen + 10,
    };
    *chosen = moved.min(count.saturating_sub(1));
}

/// Moves the text on show by some rows, no further than its end.
pub(super) fn scroll_text(model: &mut Model, command: Command, rows: usize) {
    let Some(area) = Panes::of(model.size, model).map(|panes| panes.view) else { return };
    let most = match model.view {
        View::Ledger => ledger::last_first(model, area),
        View::Spread => spread::last_first(model, area),
        View::Compare => compare::last_first(model, area),
        _ => notes::last_first(model, area),
    };
    let first = match model.view {
        View::Ledger => &mut model.ledger_row,
        View::Spread => &mut model.spread_row,
        View::Compare => &mut model.compare_row,
        _ => &mut model.notes_row,
    };
    let moved = if command == Command::PageUp { first.saturating_sub(rows) } else { (*first).min(most) + rows };
    *first = moved.min(most);
}

fn other_pane(model: &mut Model, command: Command) {
    let view = model.view.takes_keys().then_some(Pane::View);
    let next = match (model.pane, command) {
        (Pane::Inputs, Command::NextPane) | (Pane::View, Command::PreviousPane) => Pane::Margins,
        (Pane::Inputs, _) => view.unwrap_or(Pane::Margins),
        (Pane::Margins, Command::NextPane) => view.unwrap_or(Pane::Inputs),
        (Pane::Margins | Pane::View, _) => Pane::Inputs,
    };
    if next == Pane::Margins { show_margins(model) } else { model.pane = next }
}

/// Gives the keys to the margins, and the large view where they stand nowhere else.
pub(super) fn show_margins(model: &mut Model) {
    model.pane = Pane::Margins;
    if !has_margins_below(model.size) {
        model.view = View::Margins;
    }
}

fn next_view(model: &mut Model) {
    let all = views(model.size);
    let here = all.iter().position(|&view| view == model.view).unwrap_or(0);
    model.show(all[(here + 1) % all.len()]);
}

/// Shares of the shown stretch of time for one step of the play head.
const STEP_SHARE: f64 = 0.005;

fn play(model: &mut Model, command: Command) {
    let end = model.end_s();
    let (from, to) = model.window_s();
    let step = (to - from) * STEP_SHARE;
    let now = model.play.time_s;
    model.play.running = command == Command::Play && !model.play.running
        || matches!(command, Command::Slower | Command::Faster) && model.play.running;
    match command {
        Command::Play if model.play.running && now >= end => model.play.time_s = 0.0,
        Command::Slower => model.play.speed = model.play.speed.saturating_sub(1),
        Command::Faster => model.play.speed = (model.play.speed + 1).min(Play::SPEEDS.len() - 1),
        Command::StepBack => model.play.time_s = (now - step).max(0.0),
        Command::StepOn => model.play.time_s = (now + step).min(end),
        Command::EventBack => model.play.time_s = event_before(model, now),
        Command::EventOn => model.play.time_s = event_after(model, now),
        Command::ToStart => model.play.time_s = 0.0,
        Command::ToEnd => model.play.time_s = end,
        _ => {}
    }
}

/// Times nearer than this count as the same event, s.
const SAME_S: f64 = 1e-9;

fn event_times(model: &Model) -> impl DoubleEndedIterator<Item = f64> {
    model.answer.report.iter().flat_map(|report| report.estimate.events.iter().map(|event| event.time_s))
}

fn event_before(model: &Model, now: f64) -> f64 {
    event_times(model).rfind(|&time| time < now - SAME_S).unwrap_or(0.0)
}

fn event_after(model: &Model, now: f64) -> f64 {
    let end = model.end_s();
    event_times(model).find(|&time| time > now + SAME_S).unwrap_or(end).min(end)
}

fn tick(model: &mut Model, passed: Duration) -> Vec<Effect> {
    if model.play.running {
        let end = model.end_s();
        model.play.time_s = (model.play.time_s + passed.as_secs_f64() * model.play.rate().0).min(end);
        model.play.running = model.play.time_s < end;
    }
    Vec::new()
}

fn save(model: &mut Model) -> Vec<Effect> {
    if model.is_edited() {
        let save = model.may_save().then(|| Effect::Save(Box::new(model.document.clone())));
        return save.into_iter().collect();
    }
    model.say("nothing to save: the file holds these values");
    Vec::new()
}

fn saved(model: &mut Model, result: Result<Box<Document>, String>) -> Vec<Effect> {
    match result {
        Ok(written) => {
            model.say(format!("saved {}", written.path().display()));
            model.adopt(&written);
            model.changed_on_disk = false;
        }
        Err(words) => model.complain(words),
    }
    Vec::new()
}

fn reloaded(model: &mut Model, result: Result<Box<Document>, String>) -> Vec<Effect> {
    match result {
        Ok(document) => {
            model.changed_on_disk = false;
            let differs = document.text() != model.document.text();
            model.saved = (*document).clone();
            if differs {
                model.take(*document);
                model.say("read again from disk; undo brings the former values back");
            } else {
                model.say("the file on disk holds these values");
            }
            let saved = model.saved.clone();
            model.adopt(&saved);
            model.walk_on_saved();
        }
        Err(words) => model.complain(words),
    }
    Vec::new()
}

fn leave(model: &mut Model, exit: Exit) -> Vec<Effect> {
    if model.is_edited() && !model.is_at_stop() {
        model.mode = Mode::Leaving(exit);
        return Vec::new();
    }
    vec![Effect::Quit(exit)]
}
