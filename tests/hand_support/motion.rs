//! A mass on a spring with a damper, and a sliding absorber behind it, stepped through time by Runge and Kutta's fourth
//! order; what happens between two steps is found by halving the step.

/// What is falling on what, SI.
#[derive(Clone, Copy, Debug)]
pub struct Case {
    pub mass: f64,
    pub gravity: f64,
    pub free_fall: f64,
    pub stiffness: f64,
    pub damping: f64,
    /// Deployment force, onset force, stroke.
    pub absorber: Option<(f64, f64, f64)>,
}

#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Mode {
    Taut,
    Deploying,
    Slack,
}

/// Travel, speed, stretch, deployed length, work of the damper; and when.
#[derive(Clone, Copy, Debug)]
pub struct State {
    pub t: f64,
    pub y: [f64; 5],
}

#[derive(Clone, Copy, Debug)]
pub struct Piece {
    pub mode: Mode,
    pub start: State,
    pub end: State,
}

#[derive(Clone, Debug, Default)]
pub struct Run {
    pub pieces: Vec<Piece>,
    /// Where the speed passes zero: downward to upward, and back.
    pub lowest: Option<State>,
    pub highest: Option<State>,
    /// Largest force and when.
    pub peak: (f64, f64),
    pub longest_stretch: f64,
    pub above: [f64; 2],
    pub settled: Option<State>,
}

const STEP: f64 = 2e-5;
const LONGEST: f64 = 120.0;

impl Case {
    pub fn force(&self, mode: Mode, y: &[f64; 5]) -> f64 {
        match mode {
            Mode::Taut => self.stiffness * (y[0] - y[3]) + self.damping * y[1],
            Mode::Deploying => self.absorber.map_or(0.0, |a| a.0),
            Mode::Slack => 0.0,
        }
    }

    fn stretching(&self, mode: Mode, y: &[f64; 5]) -> f64 {
        match mode {
            Mode::Taut => y[1],
            mode => (self.force(mode, y) - self.stiffness * y[2]) / self.damping,
        }
    }

    fn slope(&self, mode: Mode, y: &[f64; 5]) -> [f64; 5] {
        let stretching = self.stretching(mode, y);
        let deploying = if mode == Mode::Deploying { y[1] - stretching } else { 0.0 };
        let pull = self.force(mode, y) / self.mass;
        [y[1], self.gravity - pull, stretching, deploying, self.damping * stretching * stretching]
    }

    fn step(&self, mode: Mode, from: &State, h: f64) -> State {
        let moved = |y: &[f64; 5], k: &[f64; 5], h: f64| std::array::from_fn(|i| y[i] + h * k[i]);
        let y = &from.y;
        let k1 = self.slope(mode, y);
        let k2 = self.slope(mode, &moved(y, &k1, 0.5 * h));
        let k3 = self.slope(mode, &moved(y, &k2, 0.5 * h));
        let k4 = self.slope(mode, &moved(y, &k3, h));
        let y = std::array::from_fn(|i| y[i] + h / 6.0 * (k1[i] + 2.0 * k2[i] + 2.0 * k3[i] + k4[i]));
        State { t: from.t + h, y }
    }

    /// The state inside one step where `f` first is no longer negative.
    fn find(&self, mode: Mode, from: &State, f: impl Fn(&[f64; 5]) -> f64) -> State {
        let (mut low, mut high) = (0.0, STEP);
        for _ in 0..60 {
            let middle = 0.5 * (low + high);
            if f(&self.step(mode, from, middle).y) < 0.0 { low = middle } else { high = middle }
        }
        self.step(mode, from, high)
    }

    /// Energy above the hang position for the length deployed so far.
    fn above_rest(&self, y: &[f64; 5]) -> f64 {
        let weight = self.mass * self.gravity;
        let rest = weight / self.stiffness;
        let elastic = 0.5 * self.stiffness * (y[2] * y[2] - rest * rest);
        0.5 * self.mass * y[1] * y[1] + elastic - weight * (y[0] - y[3] - rest)
    }

    /// The whole run until it is settled; the level of that needs the arrest distance, which a first pass finds.
    pub fn run(&self) -> Run {
        let first = self.pass(f64::INFINITY);
        let weight = self.mass * self.gravity;
        let deep = first.lowest.map_or(weight / self.stiffness, |low| low.y[0]);
        self.pass(1e-3 * weight * (self.free_fall + deep))
    }

    /// With an infinite level, up to a second after the first lowest point.
    fn pass(&self, level: f64) -> Run {
        let speed = (2.0 * self.gravity * self.free_fall).sqrt();
        let taut = State { t: speed / self.gravity, y: [0.0, speed, 0.0, 0.0, 0.0] };
        let mut run = Run::default();
        let mut mode = Mode::Taut;
        let mut start = taut;
        let mut now = taut;
        let mut deployed_before = false;
        let mut left = false;
        let mut went_slack = false;
        run.peak = (self.force(mode, &now.y), now.t);
        while now.t < taut.t + LONGEST {
            let next = self.step(mode, &now, STEP);
            let event = |y: &[f64; 5]| self.event(mode, y, deployed_before);
            left |= event(&now.y) < -1e-12;
            let ends = left && event(&next.y) >= 0.0;
            let next = if ends { self.find(mode, &now, event) } else { next };
            let is_settled = level.is_finite() && self.above_rest(&next.y) < level;
            let next = if is_settled { self.find(mode, &now, |y| level - self.above_rest(y)) } else { next };
            self.watch(&mut run, mode, &now, &next, went_slack);
            if is_settled {
                let settled = next;
                run.longest_stretch = run.longest_stretch.max(settled.y[2]);
                run.pieces.push(Piece { mode, start, end: settled });
                run.settled = Some(settled);
                break;
            }
            if level.is_infinite() && run.lowest.is_some_and(|low| next.t > low.t + 1.0) {
                break;
            }
            if !ends {
                now = next;
                continue;
            }
            self.offer(&mut run, mode, &next);
            run.pieces.push(Piece { mode, start, end: next });
            deployed_before |= mode == Mode::Deploying;
            mode = self.after(mode, &next.y);
            went_slack |= mode == Mode::Slack;
            left = false;
            (start, now) = (next, next);
            self.offer(&mut run, mode, &now);
        }
        run
    }

    /// Negative until the mode ends.
    fn event(&self, mode: Mode, y: &[f64; 5], deployed_before: bool) -> f64 {
        match mode {
            Mode::Taut => {
                let force = self.force(mode, y);
                let most = self.absorber.map_or(f64::INFINITY, |(f, onset, _)| if deployed_before { f } else { onset });
                (-force).max(force - most)
            }
            Mode::Deploying => {
                assert!(y[3] < self.absorber.expect("an absorber").2, "the stroke is used up: not worked here");
                self.stretching(mode, y) - y[1]
            }
            Mode::Slack => y[0] - y[2] - y[3],
        }
    }

    fn after(&self, mode: Mode, y: &[f64; 5]) -> Mode {
        match mode {
            Mode::Taut if self.force(mode, y) > 1.0 => Mode::Deploying,
            Mode::Taut => Mode::Slack,
            _ => Mode::Taut,
        }
    }

    fn offer(&self, run: &mut Run, mode: Mode, at: &State) {
        let force = self.force(mode, &at.y);
        if force > run.peak.0 * (1.0 + 1e-9) {
            run.peak = (force, at.t);
        }
        run.longest_stretch = run.longest_stretch.max(at.y[2]);
    }

    fn watch(&self, run: &mut Run, mode: Mode, now: &State, next: &State, went_slack: bool) {
        let speed = |y: &[f64; 5]| y[1];
        // At the very start of a mode the speed may be a rounding away from zero.
        if now.y[1] > 0.0 && speed(&next.y) <= 1e-9 && run.lowest.is_none() {
            let low = self.find(mode, now, |y| -speed(y));
            self.offer(run, mode, &low);
            run.lowest = Some(low);
        }
        if now.y[1] < 0.0 && next.y[1] >= 0.0 && run.lowest.is_some() && run.highest.is_none() {
            run.highest = Some(self.find(mode, now, speed));
        }
        let rise =
            |y: &[f64; 5]| self.stiffness * y[1] + self.damping * (self.gravity - self.force(mode, y) / self.mass);
        if mode == Mode::Taut && rise(&now.y) > 0.0 && rise(&next.y) <= 0.0 {
            let top = self.find(mode, now, |y| -rise(y));
            self.offer(run, mode, &top);
        }
        if !went_slack {
            for (above, limit) in run.above.iter_mut().zip([4000.0, 6000.0]) {
                *above += self.time_above(mode, now, next, limit);
            }
        }
    }

    fn time_above(&self, mode: Mode, now: &State, next: &State, limit: f64) -> f64 {
        let over = |y: &[f64; 5]| self.force(mode, y) - limit * (1.0 + 1e-9);
        match (over(&now.y) > 0.0, over(&next.y) > 0.0) {
            (true, true) => next.t - now.t,
            (false, false) => 0.0,
            (false, true) => next.t - self.find(mode, now, over).t.min(next.t),
            (true, false) => self.find(mode, now, |y| -over(y)).t.min(next.t) - now.t,
        }
    }
}
