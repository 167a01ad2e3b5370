//! A walk-through on the screen: which stop is shown, what it did, and the keys that lead through it.
use super::command::{Command, key_name};
use super::layout::views;
use super::model::{Model, View};
use super::update::show_margins;
use crate::quantity::UnitSystem;
use crate::scenario::{Document, Stop, WALK_VIEWS, Walk};
use crate::sheet::{Report, report};

/// The open walk.
#[derive(Clone, Debug)]
pub struct Walking {
    /// The walk.
    pub walk: Walk,
    /// The stop on show, from 1; 0 is the start.
    pub at: usize,
    /// The runs at typical values before the stop and at it, or why there is none.
    pub runs: [Result<Box<Report>, String>; 2],
    /// Whether saving was asked for with the key before.
    asked_to_save: bool,
}

impl Walking {
    fn of(walk: Walk) -> Self {
        let run = solve(&walk.start);
        Self { walk, at: 0, runs: [run.clone(), run], asked_to_save: false }
    }

    /// The stop on show; none at the start.
    #[must_use]
    pub fn stop(&self) -> Option<&Stop> {
        self.walk.stops.get(self.at.checked_sub(1)?)
    }

    fn go(&mut self, at: usize) {
        self.at = at;
        self.runs = [at.saturating_sub(1), at].map(|at| solve(self.walk.state(at)));
    }
}

fn solve(document: &Document) -> Result<Box<Report>, String> {
    let file = document.path().display().to_string();
    report(&file, document.text(), document.scenario()).map(Box::new).map_err(|error| error.to_string())
}

/// The view of a word in a walk.
#[must_use]
pub fn view_of(word: &str) -> Option<View> {
    WALK_VIEWS.iter().zip(View::ALL).find(|(name, _)| **name == word).map(|(_, view)| view)
}

impl Model {
    /// The screen of a walk just read, at its start.
    #[must_use]
    pub fn on_walk(walk: Walk, units: UnitSystem) -> Self {
        let mut model = Self::new(walk.start.clone(), units);
        model.walking = Some(Box::new(Walking::of(walk)));
        model
    }

    /// Whether the inputs are exactly those of the stop on show.
    #[must_use]
    pub fn is_at_stop(&self) -> bool {
        let walking = self.walking.as_ref();
        walking.is_some_and(|walking| walking.walk.state(walking.at).text() == self.document.text())
    }

    /// Puts the values of a stop, its view and the row of what it changes on show; undo brings the former values back.
    fn go_to_stop(&mut self, at: usize) {
        let Some(walking) = &mut self.walking else { return };
        walking.go(at);
        let document = walking.walk.state(at).clone();
        let stop = walking.stop();
        let view = stop.and_then(|stop| stop.view).and_then(view_of);
        let path = stop.and_then(|stop| stop.changes.first()).map(|change| change.path.clone());
        if document.text() != self.document.text() {
            self.take(document.on_disk_as(&self.saved.clone()));
        }
        let row = self.entries.iter().position(|entry| Some(self.path_of(entry)) == path.as_deref());
        self.input = row.unwrap_or(self.input);
        match view {
            Some(View::Margins) => show_margins(self),
            Some(view) if views(self.size).contains(&view) => self.show(view),
            _ => {}
        }
    }

    /// Asks once before the values of a walk are written into the scenario's file.
    pub(super) fn may_save(&mut self) -> bool {
        let name = self.document.path().display().to_string();
        let Some(walking) = &mut self.walking else { return true };
        if std::mem::replace(&mut walking.asked_to_save, true) {
            walking.asked_to_save = false;
            return true;
        }
        let key = key_name(Command::Save);
        self.say(format!(
            "{key} again writes the values on show into the scenario {name}; any other key leaves it as it is"
        ));
        false
    }

    /// Takes the walk over to the file as it now is on disk.
    pub(super) fn walk_on_saved(&mut self) {
        let Some(walking) = &self.walking else { return };
        if walking.walk.start.text() == self.saved.text() {
            return;
        }
        match walking.walk.over(self.saved.clone()) {
            Ok(walk) => {
                let at = walking.at;
                let mut fresh = Walking::of(walk);
                fresh.go(at);
                self.walking = Some(Box::new(fresh));
            }
            Err(faults) => {
                self.walking = None;
                let first = super::edit::first_fault(&faults);
                self.complain(format!("left the walk-through, which does not fit the file any more: {first}"));
            }
        }
    }
}

/// Every command but save takes the question about saving back.
pub(super) fn note(model: &mut Model, command: Command) {
    if let (Some(walking), true) = (&mut model.walking, command != Command::Save) {
        walking.asked_to_save = false;
    }
}

/// The keys of the walk.
pub(super) fn command(model: &mut Model, command: Command) {
    let Some(walking) = &model.walking else {
        return model.say("no walk-through is open; `underfoot walk FILE` opens one");
    };
    let (at, last) = (walking.at, walking.walk.stops.len());
    match command {
        Command::WalkOn if at == last => {
            let [back, start, leave] = [Command::WalkBack, Command::WalkStart, Command::WalkLeave].map(key_name);
            model
                .say(format!("this was the last stop: {back} goes back, {start} starts over, {leave} leaves the walk"));
        }
        Command::WalkOn => model.go_to_stop(at + 1),
        Command::WalkBack if at == 0 => model.say("this is the start of the walk"),
        Command::WalkBack => model.go_to_stop(at - 1),
        Command::WalkStart => model.go_to_stop(0),
        _ => leave(model),
    }
}

fn leave(model: &mut Model) {
    model.walking = None;
    let undo = key_name(Command::Undo);
    let file = if model.is_edited() { "; they differ from the file, which was not written" } else { "" };
    model.say(format!("left the walk-through; the values stay on show{file}; {undo} takes changes back"));
}
