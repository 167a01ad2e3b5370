//! One arrest in plain numbers, for the solver under test and for the reference alike.
use underfoot::arrest::Fall;
use underfoot::physics::{Absorber, Elastic, Group, SeriesPath, Table};

/// Elastic law of one part.
#[derive(Clone, Debug, PartialEq)]
pub enum Law {
    /// Does not stretch.
    Rigid,
    /// N/m.
    Linear(f64),
    /// Knots, m over N, from (0, 0).
    Curve(Vec<(f64, f64)>),
}

/// Elastic law with a damper (N s/m) in parallel.
#[derive(Clone, Debug, PartialEq)]
pub struct Part {
    pub law: Law,
    pub damping: f64,
}

/// Plastic slider: force table, onset in N, stroke in m.
#[derive(Clone, Debug, PartialEq)]
pub struct Slider {
    pub force: Vec<(f64, f64)>,
    pub onset: f64,
    pub stroke: f64,
}

/// The whole case, SI.
#[derive(Clone, Debug, PartialEq)]
pub struct Case {
    pub mass: f64,
    pub gravity: f64,
    pub free_fall: f64,
    pub speed: Option<f64>,
    pub line: Part,
    pub other: Part,
    pub slider: Option<Slider>,
}

impl Part {
    pub fn rigid() -> Self {
        Self { law: Law::Rigid, damping: 0.0 }
    }

    pub fn spring(stiffness: f64) -> Self {
        Self::damped(stiffness, 0.0)
    }

    pub fn damped(stiffness: f64, damping: f64) -> Self {
        Self { law: Law::Linear(stiffness), damping }
    }

    fn group(&self) -> Group {
        let elastic = match &self.law {
            Law::Rigid => Elastic::Rigid,
            Law::Linear(k) => Elastic::Linear { stiffness_n_per_m: *k },
            Law::Curve(knots) => Elastic::Table(Table::elastic(knots.clone()).expect("a rising table")),
        };
        Group { elastic, damping_n_s_per_m: self.damping }
    }
}

impl Slider {
    pub fn constant(force: f64, onset: f64, stroke: f64) -> Self {
        Self { force: vec![(0.0, force), (stroke, force)], onset, stroke }
    }

    fn absorber(&self) -> Absorber {
        if self.force.iter().all(|knot| knot.1 == self.force[0].1) {
            return Absorber::constant(self.force[0].1, self.onset, self.stroke);
        }
        let force = Table::new(self.force.clone()).expect("a rising table");
        Absorber { force, onset_n: self.onset, stroke_m: self.stroke }
    }
}

impl Case {
    /// A mass on one part, standard gravity.
    pub fn on(mass: f64, free_fall: f64, line: Part) -> Self {
        Self { mass, gravity: 9.80665, free_fall, speed: None, line, other: Part::rigid(), slider: None }
    }

    pub fn with_other(self, other: Part) -> Self {
        Self { other, ..self }
    }

    pub fn with_slider(self, slider: Slider) -> Self {
        Self { slider: Some(slider), ..self }
    }

    /// An impact at a given speed under a given gravity.
    pub fn thrown(self, gravity: f64, speed: f64) -> Self {
        Self { gravity, speed: Some(speed), ..self }
    }

    pub fn speed_at_taut(&self) -> f64 {
        self.speed.unwrap_or_else(|| (2.0 * self.gravity * self.free_fall).sqrt())
    }

    /// The same case as the solver takes it.
    pub fn fall(&self) -> Fall {
        Fall {
            mass_kg: self.mass,
            gravity_m_per_s2: self.gravity,
            free_fall_m: self.free_fall,
            speed_at_taut_m_per_s: self.speed,
            path: SeriesPath {
                line: self.line.group(),
                other: self.other.group(),
                absorber: self.slider.as_ref().map(Slider::absorber),
            },
        }
    }
}
