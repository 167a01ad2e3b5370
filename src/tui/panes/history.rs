//! The view History: travel with its envelope and line force over time, with the modes below.
use super::plot::{Curve, GUTTER, Grows, Level, Plot, Stroke, draw_foot, place};
use super::units::Scale;
use crate::estimate::{Envelope, Mode, Phase, Sample};
use crate::tui::text::{cells, put};
use crate::tui::theme::Theme;
use ratatui::Frame;
use ratatui::layout::Rect;

/// Everything History draws.
#[derive(Clone, Debug)]
pub struct Picture {
    /// Samples within the window, in order.
    pub samples: Vec<Sample>,
    /// Phases of the run.
    pub phases: Vec<Phase>,
    /// Stretch of time shown, s.
    pub window_s: (f64, f64),
    /// Envelope, if the run has one.
    pub envelope: Option<Envelope>,
    /// Rest position, m past taut.
    pub hang_m: Option<f64>,
    /// Travel at the lowest point, m past taut.
    pub lowest_m: Option<f64>,
    /// Largest line force of the run, N.
    pub peak_n: f64,
    /// Limit of the line force, N.
    pub limit_n: Option<f64>,
    /// Play head, s.
    pub now_s: f64,
    /// Scale of the travel axis.
    pub length: Scale,
    /// Scale of the force axis.
    pub force: Scale,
}

/// The symbol that fills a mode's part of the strip; each mode has one of its own.
#[must_use]
pub const fn mode_symbol(mode: Mode) -> &'static str {
    match mode {
        Mode::Falling => ".",
        Mode::Taut => "=",
        Mode::Deploying => "#",
        Mode::Slack => "~",
    }
}

/// Draws the two plots, the strip of modes and the time axis.
pub fn draw(frame: &mut Frame, area: Rect, picture: &Picture, theme: Theme) {
    if area.height < 9 || area.width < GUTTER + 12 {
        put(frame.buffer_mut(), area, 0, 0, "no room to draw", theme.quiet());
        return;
    }
    let plots = area.height - 3;
    let upper = plots.div_ceil(2);
    let travel = Rect { height: upper, ..area };
    let force = Rect { y: area.y + upper, height: plots - upper, ..area };
    travel_plot(picture, theme, area.width).draw(frame, travel);
    force_plot(picture, theme).draw(frame, force);
    let strip = Rect { y: force.bottom(), height: 1, ..area };
    draw_modes(frame, strip, picture, theme);
    draw_foot(frame, Rect { y: strip.y + 1, ..strip }, picture.window_s, "s", theme.quiet());
    draw_legend(frame, Rect { y: strip.y + 2, ..strip }, picture, theme);
}

/// The cell column of a time in an area drawn by [`draw`], and back.
#[must_use]
pub fn time_at(area: Rect, column: u16, window_s: (f64, f64)) -> Option<f64> {
    let left = area.x + GUTTER;
    let width = area.width.checked_sub(GUTTER + 1).filter(|&width| width > 0)?;
    let cell = column.saturating_sub(left).min(width);
    Some(window_s.0 + (window_s.1 - window_s.0) * f64::from(cell) / f64::from(width))
}

fn range(values: impl Iterator<Item = f64>) -> (f64, f64) {
    let (low, high) = values.fold((0.0_f64, 0.0_f64), |(low, high), value| (low.min(value), high.max(value)));
    let pad = (high - low).max(1e-9) * 0.06;
    (low - pad, high + pad)
}

fn envelope_curves(picture: &Picture) -> Vec<(f64, f64, f64)> {
    let Some(envelope) = picture.envelope else { return Vec::new() };
    let (from, to) = (envelope.from_s.max(picture.window_s.0), envelope.to_s.min(picture.window_s.1));
    let steps = 240_u32;
    let point = |index: u32| {
        let time = from + (to - from) * f64::from(index) / f64::from(steps);
        let reach = envelope.amplitude_m * (-envelope.decay_per_s * (time - envelope.from_s)).exp();
        (time, envelope.hang_m - reach, envelope.hang_m + reach)
    };
    if to > from { (0..=steps).map(point).collect() } else { Vec::new() }
}

fn travel_plot(picture: &Picture, theme: Theme, columns: u16) -> Plot {
    let shown = |si: f64| picture.length.shown(si);
    let bounds = envelope_curves(picture);
    let ends = bounds.iter().flat_map(|&(_, above, below)| [shown(above), shown(below)]);
    let along = range(picture.samples.iter().map(|sample| shown(sample.travel_m)).chain(ends));
    let dotted = |points: Vec<(f64, f64)>| Curve { points, stroke: Stroke::Dotted, color: theme.helper() };
    let mut curves = vec![
        dotted(bounds.iter().map(|&(time, above, _)| (time, shown(above))).collect()),
        dotted(bounds.iter().map(|&(time, _, below)| (time, shown(below))).collect()),
    ];
    curves.push(Curve {
        points: picture.samples.iter().map(|sample| (sample.time_s, shown(sample.travel_m))).collect(),
        stroke: Stroke::Solid,
        color: theme.curve(),
    });
    let level = |at: f64, word: &str| Level {
        at: shown(at),
        name: format!("{word} {}", picture.length.text(at)),
        color: theme.helper(),
        style: theme.plain(),
    };
    let lowest = picture.lowest_m.map(|at| level(at, "lowest"));
    let hang = picture.hang_m.map(|at| level(at, "rest"));
    Plot {
        title: travel_title(picture, !bounds.is_empty(), columns),
        across: picture.window_s,
        along,
        grows: Grows::Down,
        curves,
        levels: lowest.into_iter().chain(hang).collect(),
        head: Some(picture.now_s),
        head_style: theme.play_head(),
        tick_style: theme.quiet(),
        title_style: theme.heading(),
    }
}

/// The longest title that there is room for.
fn travel_title(picture: &Picture, has_envelope: bool, columns: u16) -> String {
    let unit = picture.length.symbol;
    let envelope = if has_envelope { "   .. envelope" } else { "" };
    let short = format!("travel past taut ({unit})");
    let choices = [format!("travel past taut, downward ({unit}){envelope}"), format!("{short}{envelope}")];
    choices.into_iter().find(|title| cells(title) <= columns).unwrap_or(short)
}

fn force_plot(picture: &Picture, theme: Theme) -> Plot {
    let shown = |si: f64| picture.force.shown(si);
    let along = range(picture.samples.iter().map(|sample| shown(sample.force_n)).chain(picture.limit_n.map(shown)));
    let limit = picture.limit_n.map(|at| Level {
        at: shown(at),
        name: format!("limit {}", picture.force.text(at)),
        color: theme.limit(),
        style: theme.plain(),
    });
    Plot {
        title: format!("line force ({}), peak {}", picture.force.symbol, picture.force.text(picture.peak_n)),
        across: picture.window_s,
        along: (0.0, along.1),
        grows: Grows::Up,
        curves: vec![Curve {
            points: picture.samples.iter().map(|sample| (sample.time_s, shown(sample.force_n))).collect(),
            stroke: Stroke::Solid,
            color: theme.curve(),
        }],
        levels: limit.into_iter().collect(),
        head: Some(picture.now_s),
        head_style: theme.play_head(),
        tick_style: theme.quiet(),
        title_style: theme.heading(),
    }
}

/// One row: each phase filled with its symbol, and its word where there is room.
fn draw_modes(frame: &mut Frame, area: Rect, picture: &Picture, theme: Theme) {
    let field = Rect { x: area.x + GUTTER, width: area.width.saturating_sub(GUTTER), ..area };
    put(frame.buffer_mut(), area, 0, 0, "mode", theme.quiet());
    let (from, to) = picture.window_s;
    let column = |time: f64| place((time - from) / (to - from), field.width);
    for phase in picture.phases.iter().filter(|phase| phase.to_s >= from && phase.from_s <= to) {
        let (left, right) = (column(phase.from_s), column(phase.to_s));
        let wide = right.saturating_sub(left).max(1);
        let symbol = mode_symbol(phase.mode);
        put(frame.buffer_mut(), field, left, 0, &symbol.repeat(usize::from(wide)), theme.plain());
        let word = phase.mode.word();
        if cells(word) + 2 <= wide {
            put(frame.buffer_mut(), field, left + (wide - cells(word)) / 2, 0, word, theme.heading());
        }
    }
}

fn draw_legend(frame: &mut Frame, area: Rect, picture: &Picture, theme: Theme) {
    let mut modes: Vec<Mode> = Vec::new();
    for phase in &picture.phases {
        if !modes.contains(&phase.mode) {
            modes.push(phase.mode);
        }
    }
    let words: Vec<String> = modes.iter().map(|&mode| format!("{} {}", mode_symbol(mode), mode.word())).collect();
    let all = words.join("  ");
    let later = words.iter().skip(1).cloned().collect::<Vec<_>>().join("  ");
    let choices = [format!("time from the start of the fall (s)   {all}"), all, later.clone()];
    let text = choices.into_iter().find(|text| cells(text) <= area.width).unwrap_or(later);
    put(frame.buffer_mut(), area, 0, 0, &text, theme.quiet());
}
