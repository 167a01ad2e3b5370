//! The view History: travel with its envelope and line force over time, of a swing angle and speed too, with the modes
//! below.
use super::plot::{Curve, GUTTER, Grows, Level, Plot, Stroke, draw_foot, place};
use super::units::Scale;
use crate::estimate::{Envelope, Mode, Phase, Sample};
use crate::tui::command::{Command, key_name};
use crate::tui::play::Curves;
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
    /// What a swing shows beside travel and force.
    pub swing: Option<SwingPicture>,
}

/// What a swing shows beside travel and force.
#[derive(Clone, Debug)]
pub struct SwingPicture {
    /// Curves shown where there is no room for all.
    pub curves: Curves,
    /// Limit on the angle to either side, rad.
    pub limit_rad: Option<f64>,
    /// Largest angle after taut, rad.
    pub peak_rad: f64,
    /// Speed at the lowest point, m/s.
    pub lowest_m_per_s: f64,
    /// Scale of the angle axis.
    pub angle: Scale,
    /// Scale of the speed axis.
    pub speed: Scale,
}

/// Rows that a plot should have where all four of a swing are shown.
const EACH: u16 = 6;

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

/// Draws the plots, the strip of modes and the time axis.
pub fn draw(frame: &mut Frame, area: Rect, picture: &Picture, theme: Theme) {
    if area.height < 9 || area.width < GUTTER + 12 {
        put(frame.buffer_mut(), area, 0, 0, "no room to draw", theme.quiet());
        return;
    }
    let room = area.height - 3;
    let plots = plots(picture, theme, area.width, room);
    let count = u16::try_from(plots.len()).unwrap_or(1).max(1);
    let mut top = area.y;
    for (plot, index) in plots.iter().zip(0..) {
        let height = room / count + u16::from(index < room % count);
        plot.draw(frame, Rect { y: top, height, ..area });
        top += height;
    }
    let strip = Rect { y: area.y + room, height: 1, ..area };
    draw_modes(frame, strip, picture, theme);
    draw_foot(frame, Rect { y: strip.y + 1, ..strip }, picture.window_s, "s", theme.quiet());
    let hidden = picture.swing.as_ref().filter(|_| count < 4).map(|swing| swing.curves);
    draw_legend(frame, Rect { y: strip.y + 2, ..strip }, picture, hidden, theme);
}

/// Two plots, or all four of a swing where there is room.
fn plots(picture: &Picture, theme: Theme, columns: u16, rows: u16) -> Vec<Plot> {
    let first = [travel_plot(picture, theme, columns), force_plot(picture, theme)];
    let Some(swing) = &picture.swing else { return first.into() };
    let second = [angle_plot(picture, swing, theme, columns), speed_plot(picture, swing, theme, columns)];
    match swing.curves {
        _ if rows >= 4 * EACH => first.into_iter().chain(second).collect(),
        Curves::TravelForce => first.into(),
        Curves::AngleSpeed => second.into(),
    }
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

/// A plot of one curve that grows upwards.
fn single(picture: &Picture, theme: Theme, title: String, points: Vec<(f64, f64)>, levels: Vec<Level>) -> Plot {
    let along = range(points.iter().map(|point| point.1).chain(levels.iter().map(|level| level.at)));
    Plot {
        title,
        across: picture.window_s,
        along,
        grows: Grows::Up,
        curves: vec![Curve { points, stroke: Stroke::Solid, color: theme.curve() }],
        levels,
        head: Some(picture.now_s),
        head_style: theme.play_head(),
        tick_style: theme.quiet(),
        title_style: theme.heading(),
    }
}

fn angle_plot(picture: &Picture, swing: &SwingPicture, theme: Theme, columns: u16) -> Plot {
    let scale = &swing.angle;
    let point = |sample: &Sample| sample.plane.map(|plane| (sample.time_s, scale.shown(plane.angle_rad)));
    let level = |at: f64| Level {
        at: scale.shown(at),
        name: format!("limit {}", scale.text(at.abs())),
        color: theme.limit(),
        style: theme.plain(),
    };
    let short = format!("angle from plumb ({})", scale.symbol);
    let long = format!("angle of the line from plumb ({}), peak {}", scale.symbol, scale.text(swing.peak_rad));
    let title = if cells(&long) <= columns { long } else { short };
    let levels = swing.limit_rad.into_iter().flat_map(|limit| [level(limit), level(-limit)]).collect();
    single(picture, theme, title, picture.samples.iter().filter_map(point).collect(), levels)
}

fn speed_plot(picture: &Picture, swing: &SwingPicture, theme: Theme, columns: u16) -> Plot {
    let scale = &swing.speed;
    let point = |sample: &Sample| sample.plane.map(|plane| (sample.time_s, scale.shown(plane.speed_m_per_s)));
    let short = format!("speed ({})", scale.symbol);
    let long = format!("speed along the path ({}), {} lowest", scale.symbol, scale.text(swing.lowest_m_per_s));
    let title = if cells(&long) <= columns { long } else { short };
    let mut plot = single(picture, theme, title, picture.samples.iter().filter_map(point).collect(), Vec::new());
    plot.along.0 = 0.0;
    plot
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

/// The key that shows the curves that found no room.
fn curves_hint(shown: Curves) -> String {
    let others = match shown {
        Curves::TravelForce => "angle, speed",
        Curves::AngleSpeed => "travel, force",
    };
    format!("   {} {others}", key_name(Command::Curves))
}

fn draw_legend(frame: &mut Frame, area: Rect, picture: &Picture, hidden: Option<Curves>, theme: Theme) {
    let mut modes: Vec<Mode> = Vec::new();
    for phase in &picture.phases {
        if !modes.contains(&phase.mode) {
            modes.push(phase.mode);
        }
    }
    let words: Vec<String> = modes.iter().map(|&mode| format!("{} {}", mode_symbol(mode), mode.word())).collect();
    let all = words.join("  ");
    let later = words.iter().skip(1).cloned().collect::<Vec<_>>().join("  ");
    let hint = hidden.map_or_else(String::new, curves_hint);
    let choices =
        [format!("time from the start of the fall (s)   {all}{hint}"), format!("{all}{hint}"), all, later.clone()];
    let text = choices.into_iter().find(|text| cells(text) <= area.width).unwrap_or(later);
    put(frame.buffer_mut(), area, 0, 0, &text, theme.quiet());
}
