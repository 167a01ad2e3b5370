//! The motion in one mode as power series in time.
use super::law::{Force, Law};
use super::poly::{LEN, ORDER, Poly, stretched, value};

/// State at one instant; the position is from the pivot, up positive.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct State {
    pub position: [f64; 2],
    pub velocity: [f64; 2],
    /// Stretch of the groups, m.
    pub e: [f64; 2],
    /// Deployed length, m.
    pub s: f64,
    /// Work of the dampers so far, J.
    pub damper_j: f64,
}

impl State {
    /// Distance from the pivot, m.
    pub fn distance(&self) -> f64 {
        self.position[0].hypot(self.position[1])
    }

    /// Rate of the distance from the pivot, m/s.
    pub fn radial_speed(&self) -> f64 {
        let [x, z] = self.position;
        (x * self.velocity[0] + z * self.velocity[1]) / self.distance()
    }

    /// Speed across the line, m/s.
    pub fn tangential_speed(&self) -> f64 {
        let [x, z] = self.position;
        ((x * self.velocity[1] - z * self.velocity[0]) / self.distance()).abs()
    }

    /// Speed, m/s.
    pub fn speed(&self) -> f64 {
        self.velocity[0].hypot(self.velocity[1])
    }
}

/// What moves.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Body {
    pub mass: f64,
    pub gravity: f64,
}

/// Power series from one state on.
#[derive(Clone, Debug)]
pub struct Series {
    pub x: Poly,
    pub z: Poly,
    pub vx: Poly,
    pub vz: Poly,
    /// Distance from the pivot; not worked out while slack.
    pub rho: Poly,
    /// Stretches that have a motion of their own.
    pub a: [Poly; 2],
    pub force: Poly,
    /// Work of the dampers so far.
    pub damper: Poly,
}

/// Coefficient `k` of a product of two series.
fn product(p: &Poly, q: &Poly, k: usize) -> f64 {
    p[..=k].iter().zip(q[..=k].iter().rev()).map(|(a, b)| a * b).sum()
}

impl Series {
    fn start(state: &State) -> Self {
        let from = |value: f64| {
            let mut p = [0.0; LEN];
            p[0] = value;
            p
        };
        Self {
            x: from(state.position[0]),
            z: from(state.position[1]),
            vx: from(state.velocity[0]),
            vz: from(state.velocity[1]),
            rho: from(state.distance()),
            a: state.e.map(from),
            force: [0.0; LEN],
            damper: from(state.damper_j),
        }
    }

    /// Without force: exact positions; the stretches as far as their relaxation allows.
    pub fn slack(law: &Law, body: Body, state: &State) -> Self {
        let mut series = Self::start(state);
        series.x[1] = state.velocity[0];
        series.z[1] = state.velocity[1];
        series.z[2] = -0.5 * body.gravity;
        series.vz[1] = -body.gravity;
        for (i, relaxation) in law.relaxation.iter().enumerate() {
            let mut term = state.e[i] - relaxation.rest;
            let mut factor = 1.0;
            for c in &mut series.a[i][1..] {
                term *= -relaxation.rate / factor;
                factor += 1.0;
                *c = term;
            }
            let rate = super::poly::derivative(&series.a[i]);
            series.add_damper_work(law.damping[i], &rate);
        }
        series
    }

    fn add_damper_work(&mut self, damping: f64, rate: &Poly) {
        if damping == 0.0 {
            return;
        }
        let mut factor = 1.0;
        for k in 0..ORDER {
            self.damper[k + 1] += damping * product(rate, rate, k) / factor;
            factor += 1.0;
        }
    }

    /// Under the line force: `m r'' = m g - T r / rho`, order by order.
    ///
    /// # Reference
    /// Hairer, Norsett and Wanner, Solving Ordinary Differential Equations I, 2nd ed. 1993, section I.8 (recursive
    /// Taylor coefficients); Jorba and Zou, Experimental Mathematics 14 (2005), 99-117.
    pub fn taut(law: &Law, body: Body, state: &State) -> Self {
        let mut y = Self::start(state);
        let mut pull = [0.0; LEN];
        let mut rates = [[0.0; LEN]; 2];
        let mut factor = 1.0;
        for k in 0..ORDER {
            y.x[k + 1] = y.vx[k] / factor;
            y.z[k + 1] = y.vz[k] / factor;
            y.next_distance(k);
            y.force[k] = y.force_at(law, body, k, factor);
            pull[k] = if let Force::Held(radius) = law.force {
                y.force[k] / (body.mass * radius)
            } else {
                (y.force[k] / body.mass - product(&pull, &y.rho, k)) / y.rho[0]
            };
            for (i, rate) in rates.iter_mut().enumerate() {
                y.a[i][k + 1] = law.drift[i].coefficient(k, factor, &y.rho, &y.a) / factor;
                if law.damping[i] > 0.0 {
                    rate[k] = law.e_rate[i].coefficient(k, factor, &y.rho, &y.a);
                }
            }
            y.vx[k + 1] = -product(&pull, &y.x, k) / factor;
            y.vz[k + 1] = -product(&pull, &y.z, k) / factor;
            if k == 0 {
                y.vz[1] -= body.gravity;
            }
            factor += 1.0;
        }
        for (damping, rate) in law.damping.into_iter().zip(&rates) {
            y.add_damper_work(damping, rate);
        }
        y
    }

    /// `rho^2 = x^2 + z^2`, next coefficient.
    fn next_distance(&mut self, k: usize) {
        let square = product(&self.x, &self.x, k + 1) + product(&self.z, &self.z, k + 1);
        self.rho[k + 1] = 0.0;
        self.rho[k + 1] = (square - product(&self.rho, &self.rho, k + 1)) / (2.0 * self.rho[0]);
    }

    fn force_at(&self, law: &Law, body: Body, k: usize, factor: f64) -> f64 {
        match law.force {
            Force::Slack => 0.0,
            Force::Along(force) => force.coefficient(k, factor, &self.rho, &self.a),
            Force::Held(radius) => {
                let square = product(&self.vx, &self.vx, k) + product(&self.vz, &self.vz, k);
                body.mass * (square - body.gravity * self.z[k]) / radius
            }
        }
    }

    /// The same series over the unit interval, for a step of `h` s.
    pub fn over(&self, h: f64) -> Self {
        Self {
            x: stretched(&self.x, h),
            z: stretched(&self.z, h),
            vx: stretched(&self.vx, h),
            vz: stretched(&self.vz, h),
            rho: stretched(&self.rho, h),
            a: [stretched(&self.a[0], h), stretched(&self.a[1], h)],
            force: stretched(&self.force, h),
            damper: stretched(&self.damper, h),
        }
    }

    /// State at a share of the step.
    pub fn state(&self, law: &Law, t: f64) -> State {
        let at = |p: &Poly| value(p, t);
        let (rho, a) = (at(&self.rho), [at(&self.a[0]), at(&self.a[1])]);
        State {
            position: [at(&self.x), at(&self.z)],
            velocity: [at(&self.vx), at(&self.vz)],
            e: [law.e[0].value(rho, 0.0, a), law.e[1].value(rho, 0.0, a)],
            s: law.s.value(rho, 0.0, a),
            damper_j: at(&self.damper),
        }
    }
}
