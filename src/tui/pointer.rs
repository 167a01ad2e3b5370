//! The mouse: choosing rows and tabs, scrubbing, the wheel.
use super::command::Command;
use super::edit::Nudge;
use super::layout::{Panes, views};
use super::message::{Effect, Message};
use super::model::{Mode, Model, Pane, Scrubbing, View};
use super::panes::{history, inputs, log, margins, tabs};
use super::study;
use super::update::{scroll_text, show_margins, update, walk};
use crossterm::event::{MouseButton, MouseEvent, MouseEventKind};
use ratatui::layout::{Position, Rect};

/// Takes one mouse event.
pub(super) fn point(model: &mut Model, event: MouseEvent) -> Vec<Effect> {
    let Some(panes) = Panes::of(model.size, model) else { return Vec::new() };
    if !matches!(model.mode, Mode::Commands) {
        return Vec::new();
    }
    let at = Position::new(event.column, event.row);
    match event.kind {
        MouseEventKind::Down(MouseButton::Left) => press(model, &panes, at),
        MouseEventKind::Drag(MouseButton::Left) if model.view == View::Map => study::point(model, panes.view, at),
        MouseEventKind::Drag(MouseButton::Left) => scrub(model, &panes, at.x),
        MouseEventKind::Up(_) => model.scrubbing = None,
        MouseEventKind::ScrollUp => return wheel(model, &panes, at, true),
        MouseEventKind::ScrollDown => return wheel(model, &panes, at, false),
        _ => {}
    }
    Vec::new()
}

fn press(model: &mut Model, panes: &Panes, at: Position) {
    model.notice = None;
    if panes.inputs.contains(at) {
        model.pane = Pane::Inputs;
        if let Some(index) = inputs::input_at(model, panes.inputs, at.y) {
            model.input = index;
        }
    } else if panes.tabs.contains(at) {
        if let Some(view) = tabs::view_at(panes.tabs, views(model.size), model.view, at.x) {
            model.show(view);
        }
    } else if let Some(area) = margins_area(model, panes).filter(|area| area.contains(at)) {
        show_margins(model);
        if let Some(index) = margins::check_at(model, area, at.y) {
            model.check = index;
        }
    } else if model.view.takes_keys() && panes.view.contains(at) {
        model.pane = Pane::View;
        study::point(model, panes.view, at);
    } else if panes.log.contains(at) {
        if let Some(time) = log::time_at(model, panes.log, at.y) {
            model.play.time_s = time;
        }
    } else {
        model.scrubbing = time_axis(model, panes, at);
        scrub(model, panes, at.x);
    }
}

/// The time axis under the mouse.
fn time_axis(model: &Model, panes: &Panes, at: Position) -> Option<Scrubbing> {
    if panes.bar().contains(at) {
        return Some(Scrubbing::Bar);
    }
    (model.view == View::History && panes.view.contains(at)).then_some(Scrubbing::Plot)
}

/// Where the margins are listed, below or as the view.
fn margins_area(model: &Model, panes: &Panes) -> Option<Rect> {
    if panes.margins.height > 0 {
        return Some(panes.margins);
    }
    (model.view == View::Margins).then_some(panes.view)
}

/// Puts the play head under the mouse on the time axis that it holds, wherever it has been moved to.
fn scrub(model: &mut Model, panes: &Panes, column: u16) {
    let window = model.window_s();
    let bar = panes.bar();
    let time = match model.scrubbing {
        Some(Scrubbing::Bar) => {
            let share = f64::from(column.saturating_sub(bar.x)) / f64::from(bar.width.saturating_sub(1).max(1));
            Some(window.0 + share.min(1.0) * (window.1 - window.0))
        }
        Some(Scrubbing::Plot) => history::time_at(panes.view, column, window),
        None => None,
    };
    if let Some(time) = time {
        model.play.running = false;
        model.play.time_s = time.clamp(0.0, model.end_s());
    }
}

fn wheel(model: &mut Model, panes: &Panes, at: Position, up: bool) -> Vec<Effect> {
    let row = if up { Command::Up } else { Command::Down };
    if panes.inputs.contains(at) {
        model.pane = Pane::Inputs;
        walk(model, row);
    } else if panes.about.contains(at) {
        model.nudge(if up { Nudge::Raise } else { Nudge::Lower });
    } else if margins_area(model, panes).is_some_and(|area| area.contains(at)) {
        show_margins(model);
        walk(model, row);
    } else if model.view == View::Remedies && panes.view.contains(at) {
        study::walk_remedies(model, row);
    } else if model.view.is_text() && panes.view.contains(at) {
        scroll_text(model, if up { Command::PageUp } else { Command::PageDown }, 1);
    } else if panes.view.contains(at) || panes.timeline.contains(at) {
        return update(model, Message::Command(if up { Command::StepBack } else { Command::StepOn }));
    }
    Vec::new()
}
