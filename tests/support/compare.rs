//! Side-by-side comparison of the solver and the reference, number by number.
use super::case::Case;
use super::numbers::Numbers;
use underfoot::arrest::{Ended, Outcome};

/// One number on both sides.
#[derive(Clone, Debug)]
pub struct Row {
    pub id: &'static str,
    pub solver: Option<f64>,
    pub reference: Option<f64>,
    /// Difference over the size of the number.
    pub difference: f64,
}

struct Table {
    rows: Vec<Row>,
}

impl Table {
    /// `scale` is the size below which a difference does not matter more.
    fn row(&mut self, id: &'static str, solver: Option<f64>, reference: Option<f64>, scale: f64) {
        let difference = match (solver, reference) {
            (None, None) => 0.0,
            (Some(a), Some(b)) => {
                let off = (a - b).abs() / b.abs().max(scale);
                if off.is_nan() { f64::INFINITY } else { off }
            }
            _ => f64::INFINITY,
        };
        self.rows.push(Row { id, solver, reference, difference });
    }
}

/// Every number both sides give. Where the reference stopped early (no damper: it would never settle) the numbers
/// that need the end of the run are left out.
pub fn rows(case: &Case, outcome: &Outcome, numbers: &Numbers) -> Vec<Row> {
    let mut table = Table { rows: Vec::new() };
    let fall_time = if case.speed.is_some() { 0.0 } else { (2.0 * case.free_fall / case.gravity).sqrt() };
    let period = numbers.record.pieces.iter().map(|piece| piece.span).fold(0.0, f64::max);
    let time = |from_taut: f64| Some(from_taut + fall_time);
    let size = numbers.arrest_distance;
    let weight = case.mass * case.gravity;
    let energy = weight * (case.free_fall + size);
    table.row("time_taut", Some(outcome.time_taut_s), time(0.0), period);
    table.row("peak_force", Some(outcome.peak_force_n), Some(numbers.peak_force), 0.0);
    if !numbers.creeps {
        table.row("time_peak_force", Some(outcome.time_peak_force_s), time(numbers.time_peak), period);
        // A stretch that peaks only after the run has settled and stood lowest is no part of it.
        let end = numbers.settled.unwrap_or(f64::INFINITY).max(numbers.lowest.map_or(0.0, |low| low.0));
        let peaks = [outcome.line_elongation_peak_m, outcome.other_elongation_peak_m];
        for (i, id) in ["line_elongation", "other_elongation"].into_iter().enumerate() {
            if numbers.record.stretch_peak_time[i] <= end {
                table.row(id, Some(peaks[i]), Some(numbers.stretch_peak[i]), 1e-3 * size);
            }
        }
    }
    // A last turn that misses rest by less than rounding shows is as good as none.
    let at_rest = |travel: f64| (travel / numbers.hang_travel - 1.0).abs() < 1e-9;
    if !(numbers.creeps && outcome.lowest.is_some_and(|low| at_rest(low.travel_m))) {
        table.row("time_lowest", outcome.lowest.map(|l| l.time_s), numbers.lowest.and_then(|l| time(l.0)), period);
        table.row("travel_lowest", outcome.lowest.map(|l| l.travel_m), numbers.lowest.map(|l| l.1), 0.0);
    }
    table.row("arrest_distance", Some(outcome.arrest_distance_m), Some(numbers.arrest_distance), 0.0);
    table.row("hang_travel", Some(outcome.hang_travel_m), Some(numbers.hang_travel), 0.0);
    table.row("rebound_rise", outcome.rebound_rise_m, numbers.rebound_rise, 1e-3 * size);
    table.row("time_first_slack", outcome.time_first_slack_s, numbers.first_slack.and_then(time), period);
    table.row("deployed", Some(outcome.deployed_m), Some(numbers.deployed), 1e-3 * size);
    table.row("stroke_used_up", Some(outcome.stroke_used_up.into()), Some(numbers.used_up.into()), 1.0);
    if let Some(above) = numbers.time_above {
        table.row("time_above_first", Some(outcome.time_above_s[0]), Some(above[0]), period);
        table.row("time_above_second", Some(outcome.time_above_s[1]), Some(above[1]), period);
    }
    if let Some([line, other, absorber, damper]) = numbers.works {
        let account = outcome.energy;
        table.row("line_work", Some(account.line_j), Some(line), 1e-3 * energy);
        table.row("other_work", Some(account.other_j), Some(other), 1e-3 * energy);
        table.row("absorber_work", Some(account.absorber_j), Some(absorber), 1e-3 * energy);
        table.row("damper_work", Some(account.damper_j), Some(damper), 1e-3 * energy);
    }
    if numbers.record.complete && numbers.settled.is_some() {
        let settled = match outcome.ended {
            Ended::Settled { time_s } => Some(time_s),
            Ended::TimeLimit => None,
        };
        table.row("settle_time", settled, numbers.settled.and_then(time), period);
        #[expect(clippy::cast_precision_loss, reason = "a small count")]
        let slacks = numbers.slack_episodes as f64;
        table.row("slack_episodes", Some(f64::from(outcome.slack_episodes)), Some(slacks), 1.0);
    }
    table.rows
}
