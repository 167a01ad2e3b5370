//! The numbers of an arrest, read off a reference run.
use super::case::Case;
use super::flow::{DAMPER_WORK, Flow, Mode, S, SLIDER_WORK, X};
use super::reference::{Event, Fineness, Piece, Record, root, run};

/// What both sides must agree on. Times run from taut; `None` means it does not occur.
#[derive(Clone, Debug)]
pub struct Numbers {
    pub record: Record,
    pub peak_force: f64,
    pub time_peak: f64,
    /// Deepest turning point: time and travel.
    pub lowest: Option<(f64, f64)>,
    pub arrest_distance: f64,
    pub hang_travel: f64,
    pub rebound_rise: Option<f64>,
    pub first_slack: Option<f64>,
    pub slack_episodes: usize,
    pub deployed: f64,
    pub used_up: bool,
    pub stretch_peak: [f64; 2],
    pub time_above: Option<[f64; 2]>,
    pub settled: Option<f64>,
    /// At the lowest point: line, other, slider, damper, J.
    pub works: Option<[f64; 4]>,
    /// Whether the motion only creeps towards rest.
    pub creeps: bool,
}

/// Solves a case with the reference and reads off its numbers.
pub fn numbers(case: &Case, fineness: Fineness, levels: [f64; 2]) -> Numbers {
    let record = run(case, fineness);
    let weight = case.mass * case.gravity;
    let deployed = record.end[S];
    let hang_travel = deployed + case.line.law.stretch(weight) + case.other.law.stretch(weight);
    let deepest = record.lows.iter().copied().reduce(|a, b| if b.1[X] > a.1[X] * (1.0 + 1e-9) { b } else { a });
    let creeps = deepest.is_none_or(|low| low.1[X] < hang_travel);
    let low = deepest.filter(|_| !creeps);
    let arrest_distance = low.map_or(hang_travel, |low| low.1[X]);
    let settled = settling(case, fineness, &record, 1e-3 * weight * (case.free_fall + arrest_distance));
    let over = |time: f64| settled.is_some_and(|settled| settled < time);
    let next = low.and_then(|low| record.highs.iter().find(|high| high.0 > low.0));
    let slacks: Vec<f64> = record.events.iter().filter(|e| e.1 == Event::Slack).map(|e| e.0).collect();
    Numbers {
        peak_force: record.peak.1,
        time_peak: record.peak.0,
        lowest: low.map(|low| (low.0, low.1[X])),
        arrest_distance,
        hang_travel,
        rebound_rise: next.filter(|high| !over(high.0)).map(|high| arrest_distance - high.1),
        first_slack: slacks.first().copied(),
        slack_episodes: slacks.iter().filter(|time| !over(**time)).count(),
        deployed,
        used_up: record.used_up,
        stretch_peak: record.stretch_peak,
        time_above: slacks
            .first()
            .copied()
            .or(settled)
            .map(|end| levels.map(|level| time_above(case, fineness, &record, end, level * (1.0 + 1e-9)))),
        settled,
        works: low.map(|low| {
            let [line, other] = low.2.stretch;
            [case.line.law.energy(line), case.other.law.energy(other), low.1[SLIDER_WORK], low.1[DAMPER_WORK]]
        }),
        creeps,
        record,
    }
}

fn flow_of(case: &Case, fineness: Fineness, mode: Mode) -> Flow<'_> {
    let mut flow = Flow::new(case, fineness.relative_tolerance);
    flow.mode = mode;
    flow
}

/// First instant at which the energy above the hang position is below the threshold.
fn settling(case: &Case, fineness: Fineness, record: &Record, threshold: f64) -> Option<f64> {
    record.pieces.iter().find_map(|piece| {
        let flow = flow_of(case, fineness, piece.mode);
        let above = |span: f64| {
            let state = flow.advance(&piece.state, span);
            flow.energy_above_hang(&state, &flow.look(&state)) - threshold
        };
        if above(piece.span) >= 0.0 {
            return None;
        }
        Some(piece.start + if above(0.0) <= 0.0 { 0.0 } else { root(0.0, piece.span, above) })
    })
}

/// Time the force spends above a level up to `end`.
fn time_above(case: &Case, fineness: Fineness, record: &Record, end: f64, level: f64) -> f64 {
    let within = record.pieces.iter().filter(|piece| piece.start < end);
    within.map(|piece| time_above_in(case, fineness, piece, end, level)).sum()
}

fn time_above_in(case: &Case, fineness: Fineness, piece: &Piece, end: f64, level: f64) -> f64 {
    let flow = flow_of(case, fineness, piece.mode);
    let excess = |span: f64| flow.look(&flow.advance(&piece.state, span)).force - level;
    let span = piece.span.min(end - piece.start);
    let mut marks: Vec<f64> = piece.turn.into_iter().filter(|turn| *turn < span).collect();
    marks.push(span);
    let mut low = 0.0;
    let mut sum = 0.0;
    for high in marks {
        sum += match (excess(low) > 0.0, excess(high) > 0.0) {
            (true, true) => high - low,
            (false, false) => 0.0,
            (true, false) => root(low, high, excess) - low,
            (false, true) => high - root(low, high, excess),
        };
        low = high;
    }
    sum
}
