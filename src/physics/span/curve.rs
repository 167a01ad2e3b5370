//! The static curve of a span: tension, load, energy and their inverses over the deflection.
use super::shape::{Shape, parabola_excess, rising_root};
use super::{InlineAbsorber, Span, SpanError, Tightness, check};
use crate::physics::knots::{self, Fit};

/// Load on one end support.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct EndLoad {
    /// Force, N: the cable tension.
    pub force_n: f64,
    /// Direction of the pull: angle of the cable below the horizontal, degrees (negative: it leaves upwards).
    pub below_horizontal_deg: f64,
}

/// The cable with its absorber while the deflection grows.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Loading {
    /// Deployed length of the in-line absorber, m.
    pub deployed_m: f64,
    /// Cable tension, N.
    pub tension_n: f64,
    /// Vertical load on the span, N.
    pub load_n: f64,
}

/// The static curve of a span, with the length its in-line absorber has deployed so far.
///
/// `T = T0 + (l - chord - s) / C`, `C = spans S0 / EA + 2 / ks`, never below 0; `P = T dl/d delta`, the vertical
/// balance. Accuracy: lengths are summed as `p^2 / (l + c)` along and across the chord, so that nothing cancels for a
/// nearly straight cable; relative errors are a few units in the last place of `T - T0` and `P`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SpanCurve {
    /// Horizontal distances from the load to the left and to the right support, m.
    runs_m: [f64; 2],
    /// Rise over run of the chord.
    slope: f64,
    /// Length over run of the chord.
    stretch: f64,
    unstretched_m: f64,
    /// Tension of the straight cable, N; negative: the cable is longer than the chord.
    straight_n: f64,
    /// Length the cables of all spans have beyond their chords, m, less the stretch by pretension.
    spare_m: f64,
    compliance_m_per_n: f64,
    absorber: Option<InlineAbsorber>,
    deployed_m: f64,
    workers: f64,
}

impl SpanCurve {
    /// Works out the unstretched length and the compliance.
    ///
    /// # Errors
    /// When an input is out of the range its field states.
    pub fn new(span: &Span) -> Result<Self, SpanError> {
        check(span)?;
        let slope = span.level_difference_m / span.length_m;
        let stretch = 1.0_f64.hypot(slope);
        let chord = span.length_m * stretch;
        let spans = f64::from(span.spans);
        let supports = span.support_stiffness_n_per_m.map_or(0.0, |k| 2.0 / k);
        let compliance = |unstretched: f64| spans * unstretched / span.modulus_n + supports;
        let (unstretched, spare) = match span.tightness {
            Tightness::Pretension { force_n } => {
                let unstretched = chord * span.modulus_n / (span.modulus_n + force_n);
                (unstretched, -force_n * compliance(unstretched))
            }
            Tightness::Sag { mid_m } => {
                let excess = parabola_excess(span.length_m, slope, mid_m);
                (chord + excess, spans * excess)
            }
        };
        let compliance_m_per_n = compliance(unstretched);
        Ok(Self {
            runs_m: [span.at_m, span.length_m - span.at_m],
            slope,
            stretch,
            unstretched_m: unstretched,
            straight_n: -spare / compliance_m_per_n,
            spare_m: spare,
            compliance_m_per_n,
            absorber: span.absorber,
            deployed_m: 0.0,
            workers: f64::from(span.workers),
        })
    }

    /// The same span after its in-line absorber has deployed this length for good, m.
    #[must_use]
    pub const fn with_deployed(self, deployed_m: f64) -> Self {
        Self { deployed_m, ..self }
    }

    /// Length its in-line absorber has deployed for good, m.
    #[must_use]
    pub const fn deployed_m(&self) -> f64 {
        self.deployed_m
    }

    /// Whether its in-line absorber has no stroke left.
    pub(super) fn is_used_up(&self) -> bool {
        self.absorber.is_none_or(|absorber| self.deployed_m >= absorber.stroke_m)
    }

    /// Work of the in-line absorber for a deployed length in m, shared by the workers, J.
    pub(super) fn slider_work_j(&self, deployed_m: f64) -> f64 {
        self.absorber.map_or(0.0, |a| a.force_n * deployed_m / self.workers)
    }

    /// Straight distance between the supports of one span, m.
    #[must_use]
    pub fn chord_m(&self) -> f64 {
        (self.runs_m[0] + self.runs_m[1]) * self.stretch
    }

    /// Unstretched length S0 of the cable of one span, m.
    #[must_use]
    pub const fn unstretched_m(&self) -> f64 {
        self.unstretched_m
    }

    /// Deflection below the chord at which the cable comes taut, m: what the slack adds to the free fall.
    #[must_use]
    pub fn slack_m(&self) -> f64 {
        self.deflection_at_excess(self.spare_m + self.deployed_m)
    }

    /// Length of the loaded span's cable path, m, at a deflection in m.
    #[must_use]
    pub fn path_m(&self, deflection_m: f64) -> f64 {
        self.chord_m() + self.shape(deflection_m).excess_m
    }

    /// Cable tension T, N, at a deflection in m.
    #[must_use]
    pub fn tension_n(&self, deflection_m: f64) -> f64 {
        self.tension_of(&self.shape(deflection_m))
    }

    /// Vertical load P of all workers together, N, at a deflection in m: `P = dU/d delta`.
    #[must_use]
    pub fn load_n(&self, deflection_m: f64) -> f64 {
        let shape = self.shape(deflection_m);
        self.tension_of(&shape) * shape.rate
    }

    /// Force in the line of each worker, N: the load shared equally.
    #[must_use]
    pub fn line_force_n(&self, deflection_m: f64) -> f64 {
        self.load_n(deflection_m) / self.workers
    }

    /// Elastic energy above that of the unloaded span, J, at a deflection in m.
    #[must_use]
    pub fn energy_j(&self, deflection_m: f64) -> f64 {
        let before = (-self.spare_m - self.deployed_m).max(0.0);
        let excess = self.shape(deflection_m).excess_m;
        let gained = if before > 0.0 { excess } else { (excess - self.spare_m - self.deployed_m).max(0.0) };
        gained * (0.5 * gained + before) / self.compliance_m_per_n
    }

    /// Deflection below the chord, m, under a static load of all workers together, N, `> 0`: the inverse of the load.
    #[must_use]
    pub fn deflection_m(&self, load_n: f64) -> f64 {
        let slack = self.slack_m();
        rising_root(slack, slack + 0.01 * self.chord_m(), |deflection| {
            let (load, stiffness) = self.load_and_stiffness(deflection);
            (load - load_n, stiffness)
        })
    }

    /// Deepest deflection, m, when each worker falls on a line that does not stretch.
    ///
    /// `U(delta) / workers = m g (h + delta - slack)`; mass of one worker in kg, `> 0`; gravity in m/s2, `> 0`; the free
    /// fall h in m, `>= 0`, holds the slack part. Undamped lines and absorbers in series stay below its force.
    #[must_use]
    pub fn rigid_line_deflection_m(&self, mass_kg: f64, gravity_m_per_s2: f64, free_fall_m: f64) -> f64 {
        let weight = self.workers * mass_kg * gravity_m_per_s2;
        let slack = self.slack_m();
        let hang = self.deflection_m(weight);
        rising_root(hang, hang + (hang - slack) + 0.01 * self.chord_m(), |deflection| {
            let spent = weight * (free_fall_m + deflection - slack);
            (self.energy_j(deflection) - spent, self.load_n(deflection) - weight)
        })
    }

    /// Cable tension over load, `T / P = 1 / (sin th1 + sin th2)`, at a deflection in m, `> 0`.
    #[must_use]
    pub fn amplification(&self, deflection_m: f64) -> f64 {
        1.0 / self.shape(deflection_m).rate
    }

    /// Loads on the left and on the right support of the loaded span at a deflection in m.
    #[must_use]
    pub fn end_loads(&self, deflection_m: f64) -> [EndLoad; 2] {
        let force_n = self.tension_n(deflection_m);
        let [left, right] = self.runs_m;
        [(left, -self.slope * left), (right, self.slope * right)].map(|(run, chord_drop)| EndLoad {
            force_n,
            below_horizontal_deg: (deflection_m + chord_drop).atan2(run).to_degrees(),
        })
    }

    /// The cable with its in-line absorber as the deflection grows to a value in m.
    ///
    /// `s' >= 0`, `T <= F` while `s < S`: what was deployed before stays, and the slider gives just as much as keeps the
    /// tension at F. The cable has no mass and no damper, so that this holds at every instant of a motion too: a solver
    /// keeps s as its state, takes the load from here at each deflection and never lets s shrink.
    #[must_use]
    pub fn loading(&self, deflection_m: f64) -> Loading {
        let excess = self.shape(deflection_m).excess_m;
        let deployed_m = self.absorber.map_or(self.deployed_m, |absorber| {
            let wanted = excess - self.spare_m - absorber.force_n * self.compliance_m_per_n;
            wanted.min(absorber.stroke_m).max(self.deployed_m)
        });
        let after = self.with_deployed(deployed_m);
        Loading { deployed_m, tension_n: after.tension_n(deflection_m), load_n: after.load_n(deflection_m) }
    }

    /// Force of one worker's line over the deflection past taut as a table for the series path.
    ///
    /// Knots follow the curvature; the force error stays below `share` (0.001 for 0.1 %) of `largest_n`, the largest
    /// force of one line, N; the last knot is on the curve and the energy up to it is exact. Beyond it the last slope
    /// goes on, so a run whose force passes `largest_n` needs a new table. Leaves the in-line absorber out.
    ///
    /// # Errors
    /// When the knots do not rise.
    pub fn table(&self, largest_n: f64, share: f64) -> Result<Fit, SpanError> {
        let elastic = Self { absorber: None, ..*self };
        elastic.envelope_table(largest_n, share)
    }

    /// Like [`SpanCurve::table`], with the in-line absorber deploying as the deflection grows.
    ///
    /// An approximation with hard limits: it holds while the deflection grows for the first time, that is for the first
    /// peak of forces, the deployed length and the lowest point of a line whose force does not fall before. On the way
    /// back it returns the absorber's work as if it were elastic: rebound, slack, settling and energy shares after the
    /// first peak are wrong, too large. For those integrate with [`SpanCurve::loading`]; for the hang position use
    /// [`SpanCurve::with_deployed`].
    ///
    /// # Errors
    /// When the knots do not rise.
    pub fn envelope_table(&self, largest_n: f64, share: f64) -> Result<Fit, SpanError> {
        let end = self.loading_deflection_m(largest_n * self.workers);
        let taut = self.slack_m();
        let kinks = self.deployment_bounds_m().into_iter().flatten().filter(|&at| at > taut && at < end);
        let bounds: Vec<f64> = std::iter::once(taut).chain(kinks).chain([end]).collect();
        let force = |deflection: f64| self.loading(deflection).load_n / self.workers;
        let work = |deflection: f64| self.loading_work_j(deflection) / self.workers;
        Ok(knots::fit(&bounds, force, work, share * largest_n)?)
    }

    /// Energy taken from the load as the deflection grows, J: elastic energy and the absorber's work.
    #[must_use]
    pub fn loading_work_j(&self, deflection_m: f64) -> f64 {
        let deployed = self.loading(deflection_m).deployed_m;
        let newly = deployed - self.deployed_m;
        if newly <= 0.0 {
            return self.energy_j(deflection_m);
        }
        let stored = |s: f64, at: f64| {
            let stretch = (self.shape(at).excess_m - self.spare_m - s).max(0.0);
            0.5 * stretch * stretch / self.compliance_m_per_n
        };
        let before = stored(self.deployed_m, 0.0);
        stored(deployed, deflection_m) - before + self.absorber.map_or(0.0, |a| a.force_n * newly)
    }

    /// Deflection, m, that a growing static load of all workers reaches, N, with the absorber deploying.
    #[must_use]
    pub fn loading_deflection_m(&self, load_n: f64) -> f64 {
        let elastic = self.deflection_m(load_n);
        let Some(absorber) = self.absorber.filter(|a| self.tension_n(elastic) > a.force_n) else { return elastic };
        let full = self.with_deployed(absorber.stroke_m.max(self.deployed_m)).deflection_m(load_n);
        // While the slider moves the tension is F, so the shape alone gives the load.
        let sliding = |deflection: f64| {
            let shape = self.shape(deflection);
            (absorber.force_n * shape.rate - load_n, absorber.force_n * shape.bend_per_m)
        };
        if sliding(full).0 < 0.0 { full } else { rising_root(elastic, full, sliding) }
    }

    /// Deflections at which the absorber starts and at which its stroke is used up, m.
    pub(super) fn deployment_bounds_m(&self) -> Option<[f64; 2]> {
        let absorber = self.absorber?;
        let start = self.spare_m + absorber.force_n * self.compliance_m_per_n;
        Some([self.deployed_m, absorber.stroke_m].map(|s| self.deflection_at_excess(start + s)))
    }

    fn load_and_stiffness(&self, deflection_m: f64) -> (f64, f64) {
        let shape = self.shape(deflection_m);
        let tension = self.tension_of(&shape);
        let stiffness = shape.rate * shape.rate / self.compliance_m_per_n + tension * shape.bend_per_m;
        (tension * shape.rate, stiffness)
    }

    fn tension_of(&self, shape: &Shape) -> f64 {
        let net = shape.excess_m - self.deployed_m;
        (self.straight_n + net / self.compliance_m_per_n).max(0.0)
    }

    fn shape(&self, deflection_m: f64) -> Shape {
        Shape::of(self.runs_m, self.slope, deflection_m)
    }

    /// Deflection at which `l - chord` has a value in m; 0 where that is not above 0.
    fn deflection_at_excess(&self, excess_m: f64) -> f64 {
        if excess_m <= 0.0 {
            return 0.0;
        }
        let first = (2.0 * excess_m / self.shape(0.0).bend_per_m).sqrt();
        rising_root(0.0, first, |deflection| {
            let shape = self.shape(deflection);
            (shape.excess_m - excess_m, shape.rate)
        })
    }
}
