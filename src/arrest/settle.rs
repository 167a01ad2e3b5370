//! The first instant at which the energy above the hang position is small.
use super::mode::{Mode, Stretch};
use super::record::Record;
use super::signal::Signal;
use super::solve::{Close, Run};

/// When the run settles, s from the start of the fall, if it does so up to the end of `stretch`; `last` says that no
/// event ends that stretch. Also the travel that the settled level was taken from, m.
///
/// The settled level is a share of `m g (h + x)` at the deepest turning point, so it is known only once the motion has
/// turned, or is known never to turn: then `x` is the travel at rest. Stretches before that are looked at again.
pub fn time(run: &Run, stretch: &Stretch, close: &Close, last: bool) -> Option<(f64, f64)> {
    let deepest = deepest(run, stretch, close, last)?;
    let earlier = run.record.lowest.is_none().then(|| run.hidden()).into_iter().flatten();
    if let Some(time_s) = first(run, earlier, deepest) {
        return Some((time_s, deepest));
    }
    let above_j = run.fall.held_above_j(close.held_j, &close.state, run.hang_j);
    let t = within(run, stretch, above_j, level_j(run, deepest));
    t.map(|t| (stretch.start_s + t, deepest))
}

fn level_j(run: &Run, travel_m: f64) -> f64 {
    run.settings.settled_share * run.fall_energy_j(travel_m)
}

/// When the first of some stretches settles, for a level taken from a travel in m.
pub fn first(run: &Run, mut stretches: impl Iterator<Item = Stretch>, travel_m: f64) -> Option<f64> {
    let level_j = level_j(run, travel_m);
    stretches.find_map(|s| {
        let end_j = run.fall.energy_above_j(&s.state(s.length_s), run.hang_j);
        within(run, &s, end_j, level_j).map(|t| s.start_s + t)
    })
}

/// When the energy first is below a level in a stretch, s from its start, for an energy at its end in J. It never
/// rises while taut or slack.
fn within(run: &Run, stretch: &Stretch, end_j: f64, level_j: f64) -> Option<f64> {
    if end_j >= level_j {
        return None;
    }
    // The energy falls nearly as an exponential: its logarithm is nearly straight.
    let share = |energy_j: f64| (energy_j / level_j).max(f64::MIN_POSITIVE).ln();
    let start = share(run.fall.energy_above_j(&stretch.state(0.0), run.hang_j));
    if start < 0.0 {
        return Some(0.0);
    }
    if let (Signal::Swing(x), Mode::Stuck, true) = (&stretch.x, stretch.mode, run.fall.path.is_linear()) {
        let energy = |t: f64| {
            let (travel, speed) = x.value_slope(t);
            let away = travel - x.rest;
            0.5 * run.fall.mass_kg * (speed * speed + x.of.stiffness * away * away)
        };
        return Some(falling_zero(|t| share(energy(t)), start, stretch.length_s, share(end_j)));
    }
    let energy = |t: f64| run.fall.energy_above_j(&stretch.state(t), run.hang_j);
    Some(falling_zero(|t| share(energy(t)), start, stretch.length_s, share(end_j)))
}

fn deepest(run: &Run, stretch: &Stretch, close: &Close, last: bool) -> Option<f64> {
    let mut record = Record { lowest: run.record.lowest, ..Record::new() };
    if record.lowest.is_none() {
        record.turnings(&run.shown(stretch), &close.at, |_| {});
    }
    match record.lowest {
        Some(lowest) => Some(lowest.travel_m),
        None => last.then(|| run.fall.hang_travel_m(close.state.s) + run.shift_m()),
    }
}

/// Zero of a function that never rises, by false position with the weight of a stuck end halved (Illinois).
///
/// # Reference
/// Dowell and Jarratt, BIT 11 (1971), 168-174.
fn falling_zero(f: impl Fn(f64) -> f64, mut flo: f64, to: f64, mut fhi: f64) -> f64 {
    let (mut lo, mut hi, mut t) = (0.0, to, 0.0_f64);
    let mut side = 0_i8;
    for _ in 0..200 {
        let before = t;
        let secant = lo + (hi - lo) * flo / (flo - fhi);
        t = if secant > lo && secant < hi { secant } else { 0.5 * (lo + hi) };
        let value = f(t);
        if value == 0.0 || (t - before).abs() <= 2.0 * f64::EPSILON * t || t <= lo || t >= hi {
            break;
        }
        if value > 0.0 {
            (lo, flo) = (t, value);
            if side == 1 {
                fhi *= 0.5;
            }
            side = 1;
        } else {
            (hi, fhi) = (t, value);
            if side == -1 {
                flo *= 0.5;
            }
            side = -1;
        }
    }
    t
}
