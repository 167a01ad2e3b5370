//! What is read off each stretch: peaks, the lowest point, times above a level.
use super::mode::{Mode, State, Stretch};
use super::oscillator::Swing;
use super::outcome::Lowest;
use super::roots::Passage;
use super::signal::{Moment, Signal};

/// A later peak replaces an earlier one only when larger by more than this share.
const LARGER: f64 = 1e-9;

/// A largest value and when it was reached.
#[derive(Clone, Copy, Debug)]
pub struct Peak {
    /// The value.
    pub value: f64,
    /// Time from the start of the fall, s.
    pub time_s: f64,
}

impl Peak {
    /// No value yet.
    pub const NONE: Self = Self { value: f64::NEG_INFINITY, time_s: 0.0 };

    /// Takes a later value in.
    pub fn offer(&mut self, value: f64, time_s: f64) {
        if self.value == f64::NEG_INFINITY || value > self.value + LARGER * self.value.abs() {
            *self = Self { value, time_s };
        }
    }

    /// Takes in the largest value of a signal from the start of its stretch to a moment.
    fn offer_largest(&mut self, signal: &Signal, start_s: f64, end: &Moment) {
        if !signal.stays_below(self.value) {
            let (largest, at) = signal.largest(end);
            self.offer(largest, start_s + at);
        }
    }
}

/// What has been read off so far.
#[derive(Clone, Debug)]
pub struct Record {
    /// Line force, N.
    pub force: Peak,
    /// Stretch of the groups, m.
    pub stretch: [Peak; 2],
    /// Deepest turning point so far.
    pub lowest: Option<Lowest>,
    /// Next highest point after the lowest: its time from the start of the fall in s, and travel in m.
    pub highest: Option<(f64, f64)>,
    /// First slack, s.
    pub first_slack_s: Option<f64>,
}

impl Record {
    /// Nothing read yet.
    pub const fn new() -> Self {
        Self { force: Peak::NONE, stretch: [Peak::NONE; 2], lowest: None, highest: None, first_slack_s: None }
    }

    /// Reads the peaks off a stretch up to its end.
    pub fn read(&mut self, stretch: &Stretch, end: &Moment, previous: &State) {
        self.force.offer_largest(&stretch.force, stretch.start_s, end);
        for (peak, (signal, before)) in self.stretch.iter_mut().zip(stretch.e.iter().zip(previous.e)) {
            peak.offer(before, stretch.start_s);
            peak.offer_largest(signal, stretch.start_s, end);
        }
    }

    /// Time of the deepest point of a stretch that is deeper than all before, s from the start of the fall.
    pub fn new_lowest_s(&self, stretch: &Stretch, end: &Moment) -> Option<f64> {
        let mut deepest = None;
        self.clone().turnings(stretch, end, |t| deepest = Some(stretch.start_s + t));
        deepest
    }

    /// Reads turning points off a stretch up to a moment and calls `on_lowest` for each new lowest one.
    pub fn turnings(&mut self, stretch: &Stretch, end: &Moment, mut on_lowest: impl FnMut(f64)) {
        let until = end.t;
        let none_new = self.highest.is_some() && self.lowest.is_some_and(|l| stretch.x.stays_below(l.travel_m));
        if none_new || stretch.x.monotone_ends(end).is_some() {
            return;
        }
        if let Signal::Swing(x) = &stretch.x {
            return self.swing_turnings(stretch, x, end, on_lowest);
        }
        let mut from = 0.0;
        while let Some(t) = stretch.v.first_passage(0.0, Passage::Down, from, until) {
            self.turned_down(stretch, t, &mut on_lowest);
            from = t;
            if let Some(top) = stretch.v.first_passage(0.0, Passage::Up, t, until) {
                self.turned_up(stretch, top);
                from = top;
            }
            let Signal::Wave(x) = &stretch.x else { return };
            let deepest = self.lowest.map_or(f64::NEG_INFINITY, |l| l.travel_m);
            if from <= t || x.rest + x.distance_bound(from) <= deepest {
                return;
            }
        }
    }

    /// A swing's turning points are in closed form, and its later lowest points are higher.
    fn swing_turnings(&mut self, stretch: &Stretch, x: &Swing, end: &Moment, mut on_lowest: impl FnMut(f64)) {
        let until = end.t;
        // At the very end a speed of zero is a turn only away from rest: a motion that has died away has no speed either.
        let speed = stretch.v.value_at(end);
        let turns_last = speed < 0.0 || (speed == 0.0 && stretch.x.value_at(end) > x.rest);
        let last = (stretch.v.value(0.0) > 0.0 && turns_last).then_some(until);
        let Some(t) = x.first_maximum(0.0, until).or(last) else { return };
        self.turned_down(stretch, t, &mut on_lowest);
        if let Some(top) = x.scaled(-1.0, 0.0).first_maximum(t, until) {
            self.turned_up(stretch, top);
        }
    }

    /// Reads the first highest point off a stretch that starts upward.
    pub fn first_highest(&mut self, stretch: &Stretch, end: &Moment) {
        if self.highest.is_none()
            && stretch.v.value(0.0) <= 0.0
            && stretch.x.monotone_ends(end).is_none()
            && let Some(top) = stretch.v.first_passage(0.0, Passage::Up, 0.0, end.t)
        {
            self.turned_up(stretch, top);
        }
    }

    fn turned_down(&mut self, stretch: &Stretch, t: f64, on_lowest: &mut impl FnMut(f64)) {
        let travel_m = stretch.x.value(t);
        let deeper = |old: Lowest| travel_m > old.travel_m + LARGER * old.travel_m.abs();
        if self.lowest.is_none_or(deeper) {
            self.lowest = Some(Lowest { time_s: stretch.start_s + t, travel_m });
            self.highest = None;
            on_lowest(t);
        }
    }

    fn turned_up(&mut self, stretch: &Stretch, t: f64) {
        if self.lowest.is_some() && self.highest.is_none() {
            self.highest = Some((stretch.start_s + t, stretch.x.value(t)));
        }
    }
}

/// Times from taut to the first slack, or else to `end_s`, that the line force spends strictly above each level.
pub fn times_above_s(stretches: &[Stretch], levels_n: [f64; 2], end_s: f64) -> [f64; 2] {
    let mut times = [0.0; 2];
    for stretch in stretches.iter().take_while(|s| s.mode != Mode::Slack && s.start_s < end_s) {
        let end = stretch.moment(stretch.length_s.min(end_s - stretch.start_s));
        let (largest, _) = stretch.force.largest(&end);
        for (time, level) in times.iter_mut().zip(levels_n.map(|level| level * (1.0 + LARGER))) {
            *time += match stretch.force.monotone_ends(&end) {
                _ if largest <= level => 0.0,
                Some([a, b]) if a.min(b) > level => end.t,
                _ => time_above(&stretch.force, level, end.t),
            };
        }
    }
    times
}

/// Time that a signal spends above a level in `0..length`.
fn time_above(signal: &Signal, level: f64, length: f64) -> f64 {
    let mut total = 0.0;
    let mut from = 0.0;
    let mut above = signal.value(0.0) > level;
    loop {
        let passage = if above { Passage::Down } else { Passage::Up };
        let next = signal.first_passage(level, passage, from, length).filter(|&t| t > from);
        let to = next.unwrap_or(length);
        if above {
            total += to - from;
        }
        if next.is_none() {
            return total;
        }
        above = !above;
        from = to;
    }
}
