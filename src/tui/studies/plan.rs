//! Which studies the present state calls for.
use super::job::{Lane, Order, What};
use super::shelf::State;
use crate::tui::message::Effect;
use crate::tui::model::{Model, View};

/// Orders what the screen needs and has not asked for, and drops what belongs to earlier inputs.
pub fn plan(model: &mut Model) -> Vec<Effect> {
    let mut wanted = wanted(model);
    let mut effects = Vec::new();
    for lane in Lane::ALL {
        let what = wanted.iter().position(|what| what.lane() == lane).map(|at| wanted.swap_remove(at));
        effects.extend(settle(model, lane, what));
    }
    effects
}

fn settle(model: &mut Model, lane: Lane, what: Option<What>) -> Option<Effect> {
    let generation = model.generation;
    let ticket = model.shelf.ticket();
    let slot = model.shelf.slot_mut(lane);
    let is_running = matches!(slot.state, State::Running(_));
    let asked = what.map(|what| (generation, what));
    if asked.is_some() && asked == slot.ordered {
        return None;
    }
    if let Some((_, what)) = asked.clone() {
        slot.ordered = asked;
        slot.ticket = ticket;
        slot.state = State::Running(super::Progress::default());
        let scenario = model.document.scenario().clone();
        return Some(Effect::Study(Box::new(Order { ticket, scenario, what })));
    }
    let is_current = slot.ordered.as_ref().is_some_and(|(of, _)| *of == generation);
    if is_current && (lane.stays() || !is_running) {
        return None;
    }
    slot.ordered = None;
    slot.ticket = ticket;
    slot.state = State::Idle;
    is_running.then_some(Effect::DropStudy(lane))
}

/// The studies of the present inputs and view.
fn wanted(model: &Model) -> Vec<What> {
    let Some(report) = model.answer.current() else { return Vec::new() };
    let has_bands = model.has_bands();
    let mut wanted = Vec::new();
    if has_bands {
        wanted.push(What::Bands);
    }
    match model.view {
        View::Vary => wanted.extend(model.varied_path().map(|path| What::Vary { path: path.to_owned() })),
        View::Map => wanted.extend(model.map_question()),
        View::Spread if has_bands => {
            wanted.push(What::Spread { sampling: model.sampling() });
            let check = report.margins.get(model.check).map(|margin| margin.id.clone());
            wanted.extend(check.map(|check| What::Ranking { check }));
        }
        View::Remedies => wanted.push(What::Remedies { held: model.remedies_held() }),
        _ => {}
    }
    wanted
}

/// Breaks off whatever runs: those that can give a part do.
pub fn stop(model: &mut Model) -> Vec<Effect> {
    let running: Vec<Lane> = model.shelf.running().collect();
    if running.is_empty() {
        model.say("no study is running");
        return Vec::new();
    }
    let titles: Vec<&str> = running.iter().map(|lane| lane.title()).collect();
    model.say(format!("stopped: {}; g starts again", titles.join(", ")));
    let mut effects = Vec::new();
    for lane in running {
        if lane.gives_part() {
            effects.push(Effect::EndStudy(lane));
        } else {
            let ticket = model.shelf.ticket();
            let slot = model.shelf.slot_mut(lane);
            slot.state = State::Stopped;
            slot.ticket = ticket;
            effects.push(Effect::DropStudy(lane));
        }
    }
    effects
}

/// Asks again for what was stopped or failed; a whole sample is made again four times as large.
pub fn again(model: &mut Model) {
    let is_whole = model.view == View::Spread && model.shelf.spread().is_some_and(|found| !found.spread.is_partial());
    if is_whole {
        model.shelf.more_samples();
    }
    for lane in Lane::ALL {
        let is_part = match lane {
            Lane::Map => model.shelf.map().is_some_and(|found| found.field.partial),
            Lane::Spread => model.shelf.spread().is_some_and(|found| found.spread.is_partial()),
            _ => false,
        };
        let slot = model.shelf.slot_mut(lane);
        if is_part || matches!(slot.state, State::Stopped | State::Failed(_)) {
            slot.ordered = None;
        }
    }
}
