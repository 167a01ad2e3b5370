//! Draws the whole screen from the model.
use super::layout::{LEAST_HEIGHT, LEAST_WIDTH, Panes, views};
use super::model::{Mode, Model, View};
use super::panes::history::{Picture, SwingPicture};
use super::panes::scene::Scene;
use super::panes::side::Side;
use super::panes::units::Scale;
use super::panes::{
    about, compare, elevation, foot, header, help, history, inputs, ledger, log, map, margins, notes, remedies,
    side_view, spread, tabs, timeline, vary, verdict, walk,
};
use super::text::put;
use crate::quantity::Dimension;
use crate::sheet::Report;
use ratatui::Frame;
use ratatui::layout::Rect;

/// Draws one frame; reads nothing but the model.
pub fn view(model: &Model, frame: &mut Frame) {
    let area = frame.area();
    let Some(panes) = Panes::of(area.as_size(), model) else {
        return too_small(model, frame, area);
    };
    draw_top(model, frame, &panes);
    if let Mode::Help(row) = model.mode {
        let top = panes.verdict.bottom();
        help::draw(frame, Rect { y: top, height: area.height.saturating_sub(top), ..area }, model, row);
        return;
    }
    walk::draw(frame.buffer_mut(), panes.walk, model);
    draw_lists(model, frame, &panes);
    draw_rules(model, frame, &panes);
    draw_view(model, frame, &panes);
    foot::draw(frame.buffer_mut(), panes.foot, model);
}

fn too_small(model: &Model, frame: &mut Frame, area: Rect) {
    let words =
        format!("the screen needs {LEAST_WIDTH}x{LEAST_HEIGHT} (columns x rows), has {}x{}", area.width, area.height);
    let room = usize::from(area.width);
    for (row, line) in (0..).zip(super::text::wrap(&words, room)) {
        put(frame.buffer_mut(), area, 0, row, &line, model.theme.heading());
    }
}

fn draw_top(model: &Model, frame: &mut Frame, panes: &Panes) {
    let buffer = frame.buffer_mut();
    header::draw(buffer, panes.header, model);
    header::draw_caution(buffer, panes.caution, model);
    verdict::draw(buffer, panes.verdict, model);
}

fn draw_lists(model: &Model, frame: &mut Frame, panes: &Panes) {
    let size = frame.area().as_size();
    let buffer = frame.buffer_mut();
    inputs::draw(buffer, panes.inputs, model);
    about::draw(buffer, panes.about, model);
    tabs::draw(buffer, panes.tabs, views(size), model);
    log::draw(buffer, panes.log, model);
    if panes.margins.height > 0 {
        margins::draw(buffer, panes.margins, model);
        margins::draw_basis(buffer, panes.basis, model);
    }
}

/// Upright rules between the columns.
fn draw_rules(model: &Model, frame: &mut Frame, panes: &Panes) {
    let buffer = frame.buffer_mut();
    let top = panes.inputs.y;
    let bottom = panes.about.bottom();
    let columns = [Some(panes.inputs.right()), (panes.log.width > 0).then(|| panes.log.x - 1)];
    for column in columns.into_iter().flatten() {
        for row in top..bottom {
            buffer.set_string(column, row, "│", model.theme.quiet());
        }
    }
}

fn draw_view(model: &Model, frame: &mut Frame, panes: &Panes) {
    let area = panes.view;
    let Some(report) = &model.answer.report else {
        put(frame.buffer_mut(), area, 1, 1, "nothing to draw: see the message above", model.theme.quiet());
        return;
    };
    match model.view {
        View::Elevation => {
            let scene = Scene::of(report, model.play.time_s, model.units);
            match Side::of(report, &scene, model.play.time_s) {
                Some(side) => side_view::draw(frame.buffer_mut(), area, &scene, &side, model.theme),
                None => elevation::draw(frame.buffer_mut(), area, &scene, model.theme),
            }
        }
        View::History => history::draw(frame, area, &picture(report, model, area.width), model.theme),
        View::Margins if panes.margins.height == 0 => draw_margins_view(model, frame, area),
        View::Margins => {}
        View::Notes => notes::draw(frame.buffer_mut(), area, model),
        View::Ledger => ledger::draw(frame.buffer_mut(), area, model),
        View::Vary => vary::draw(frame, area, model),
        View::Map => map::draw(frame, area, model),
        View::Spread => spread::draw(frame.buffer_mut(), area, model),
        View::Remedies => remedies::draw(frame.buffer_mut(), area, model),
        View::Compare => compare::draw(frame.buffer_mut(), area, model),
    }
    timeline::draw(frame.buffer_mut(), panes.timeline, panes.bar(), model);
    if model.answer.is_stale() {
        mark_stale(model, frame, panes);
    }
}

/// Nothing of earlier inputs may pass for current: words above the drawing and the log, and all of both dimmed.
fn mark_stale(model: &Model, frame: &mut Frame, panes: &Panes) {
    let words = "NOT CURRENT: of earlier inputs";
    for area in [panes.view, panes.log] {
        frame.buffer_mut().set_style(area, model.theme.quiet());
        let blank = " ".repeat(usize::from(area.width));
        put(frame.buffer_mut(), area, 0, 0, &blank, model.theme.plain());
        put(frame.buffer_mut(), area, 0, 0, words, model.theme.fault());
    }
}

fn draw_margins_view(model: &Model, frame: &mut Frame, area: Rect) {
    let basis = Rect { y: area.bottom().saturating_sub(3), height: 3.min(area.height), ..area };
    let table = Rect { height: area.height.saturating_sub(3), ..area };
    margins::draw(frame.buffer_mut(), table, model);
    margins::draw_basis(frame.buffer_mut(), basis, model);
}

/// Two samples for each column of dots, ten for each swing, eight for each phase; at most 6,000, which still fill the
/// whole height of a motion too quick for the columns.
fn sample_count(report: &Report, columns: u16, span_s: f64) -> f64 {
    let omega = report.estimate.numbers.get("natural_frequency").unwrap_or(0.0);
    let swings = span_s * omega / std::f64::consts::TAU;
    let phases = u32::try_from(report.estimate.trace.phases().len()).unwrap_or(u32::MAX);
    let share = span_s / report.estimate.trace.end_s().max(1e-9);
    let wanted = (10.0 * swings).max(8.0 * f64::from(phases) * share);
    wanted.max(4.0 * f64::from(columns.max(10))).min(6000.0)
}

/// What History draws of a report.
#[must_use]
pub fn picture(report: &Report, model: &Model, columns: u16) -> Picture {
    let window = model.window_s();
    let estimate = &report.estimate;
    let step = (window.1 - window.0) / sample_count(report, columns, window.1 - window.0);
    Picture {
        samples: estimate.trace.samples(window.0, window.1.min(estimate.trace.end_s()), step),
        phases: estimate.trace.phases().to_vec(),
        window_s: window,
        envelope: estimate.envelope,
        hang_m: estimate.numbers.get("hang_travel"),
        lowest_m: estimate.numbers.get("time_lowest").map(|time| estimate.trace.at(time).travel_m),
        peak_n: estimate.numbers.get("arrest_force_peak").unwrap_or(0.0),
        limit_n: verdict::force_limit(report),
        now_s: model.play.time_s,
        length: Scale::of(Dimension::Length, model.units),
        force: Scale::of(Dimension::Force, model.units),
        swing: estimate.plane.is_some().then(|| swing(report, model)),
    }
}

fn swing(report: &Report, model: &Model) -> SwingPicture {
    let number = |id: &str| report.estimate.numbers.get(id).unwrap_or(0.0);
    let limit = report.margins.iter().find(|margin| margin.dimension == Dimension::Angle);
    SwingPicture {
        curves: model.curves,
        limit_rad: limit.and_then(|margin| margin.limit),
        peak_rad: number("swing_angle_peak"),
        lowest_m_per_s: number("swing_speed_lowest"),
        angle: Scale::of(Dimension::Angle, model.units),
        speed: Scale::of(Dimension::Speed, model.units),
    }
}
