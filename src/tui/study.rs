//! What keys and mouse do in the views of studies, and what becomes of their answers.
use super::command::Command;
use super::map::Step;
use super::model::{Model, Pane, View};
use super::panes::{map, remedies};
use super::studies::{Findings, Lane};
use crate::margin::{Verdict, worst};
use crate::scenario::Input;
use crate::sheet::Report;
use crate::study::{Held, Remedy, Sampling, Way};
use ratatui::layout::{Position, Rect};

/// Cells that the point of Map moves with shift.
const MUCH: i32 = 5;

impl Model {
    /// Shows a view, and gives it the keys where it takes them.
    pub fn show(&mut self, view: View) {
        self.view = view;
        if view.takes_keys() {
            self.pane = Pane::View;
        } else if self.pane == Pane::View {
            self.pane = Pane::Inputs;
        }
    }

    /// Where a remedy must hold: at the worst found where every check holds at the typical values already, or where the
    /// user asks for it.
    #[must_use]
    pub fn remedies_held(&self) -> Held {
        let is_worst = self.has_bands() && (self.remedies_at_worst || self.holds_at_typical());
        if is_worst { Held::Worst } else { Held::Typical }
    }

    /// Where remedies may be asked for instead: nowhere without bands, and where nothing falls short at the typical values.
    #[must_use]
    pub fn remedies_elsewhere(&self) -> Option<Held> {
        let other = if self.remedies_held() == Held::Worst { Held::Typical } else { Held::Worst };
        (self.has_bands() && (other == Held::Worst || !self.holds_at_typical())).then_some(other)
    }

    fn holds_at_typical(&self) -> bool {
        self.answer.current().map_or(Verdict::Open, typical_verdict) == Verdict::Holds
    }

    /// The chosen remedy, where it has a value to write.
    #[must_use]
    pub fn chosen_way(&self) -> Option<(&Input, &Way)> {
        let remedy = self.shelf.remedies()?.list.get(self.remedy)?;
        Some((&remedy.input, remedy.way.as_ref()?))
    }

    /// Remedies at the typical values or at the worst found.
    pub fn switch_remedies(&mut self) {
        if !self.has_bands() {
            return self.say("no input is a band: the typical values are all there is");
        }
        let before = self.remedies_held();
        self.remedies_at_worst = !self.remedies_at_worst;
        if self.remedies_held() == before {
            self.say("every check holds at the typical values: remedies are for the worst found");
        }
    }

    /// The sample that Spread draws: as the file states it, or a multiple where the user asked for more.
    #[must_use]
    pub fn sampling(&self) -> Sampling {
        self.shelf.sampling(Sampling::of(self.document.scenario()))
    }

    /// The input that Vary moves: the chosen one.
    #[must_use]
    pub fn varied_path(&self) -> Option<&str> {
        self.chosen().map(|input| input.path.as_str())
    }
}

/// The worst word at the typical values.
fn typical_verdict(report: &Report) -> Verdict {
    match &report.bands {
        Some(bands) => worst(bands.margins.iter().filter_map(|band| band.typical)),
        None => report.verdict,
    }
}

/// Takes the answer of a study.
pub(super) fn studied(model: &mut Model, lane: Lane, ticket: u64, result: Result<Option<Findings>, String>) {
    if !model.shelf.take(lane, ticket, result) {
        return;
    }
    match lane {
        Lane::Bands | Lane::Spread => model.add_bands(),
        Lane::Map => model.look_at_point(),
        Lane::Remedies => model.remedy = 0,
        _ => {}
    }
}

/// A key for the view.
pub(super) fn view_key(model: &mut Model, command: Command) {
    if model.view == View::Remedies {
        return walk_remedies(model, command);
    }
    let (across, up) = match command {
        Command::Raise => (1, 0),
        Command::Lower => (-1, 0),
        Command::RaiseMuch => (MUCH, 0),
        Command::LowerMuch => (-MUCH, 0),
        Command::Up => (0, 1),
        _ => (0, -1),
    };
    model.step_point(Step { across, up });
}

/// The remedy above or below.
pub(super) fn walk_remedies(model: &mut Model, command: Command) {
    let count = model.shelf.remedies().map_or(0, |found| found.list.len());
    model.remedy = match command {
        Command::Up => model.remedy.saturating_sub(1),
        Command::Down => (model.remedy + 1).min(count.saturating_sub(1)),
        _ => model.remedy,
    };
}

/// Writes the point of Map or the chosen remedy into the inputs.
pub(super) fn into_inputs(model: &mut Model) {
    match model.view {
        View::Map => model.take_point(),
        View::Remedies => take_remedy(model),
        _ => model.say("Map and Remedies have something to write into the inputs"),
    }
}

fn take_remedy(model: &mut Model) {
    let chosen = model.shelf.remedies().and_then(|found| found.list.get(model.remedy)).cloned();
    match chosen {
        Some(Remedy { input, way: Some(way), .. }) => {
            if model.write(&input.path, &way.written) {
                model.say(format!(
                    "{} = {} is now an input; confirm it with the competent person; u takes it back",
                    input.path, way.written
                ));
            }
        }
        Some(Remedy { input, .. }) => model.complain(format!("`{}` has no value within its range", input.path)),
        None => model.say("no remedy is chosen"),
    }
}

/// The mouse in the view.
pub(super) fn point(model: &mut Model, area: Rect, at: Position) {
    match model.view {
        View::Map => {
            if let Some((across, up)) = map::cell_at(area, at) {
                model.put_point(across, up);
            }
        }
        _ => {
            if let Some(index) = remedies::remedy_at(model, area, at.y) {
                model.remedy = index;
            }
        }
    }
}
