//! The horizontal lifeline: its curve as a part of the path, and what it feels at the peak.
use super::calm::{Reach, calm_settings, first_look, forget_settling, was_calm};
use super::remark::both;
use super::{EndLoadView, EstimateError, SpanView};
use crate::arrest::{Fall, Outcome, Settings, solve, solve_on_span};
use crate::physics::{Elastic, Geometry, InlineAbsorber, SpanCurve, SpanError, Tightness, YieldingSpan, knots};
use crate::quantity::Dimension;
use crate::scenario::{Span, SpanTension};

/// Largest error of the force table as a share of the largest force.
const SHARE: f64 = 1e-3;

/// The same where an absorber in line lets the law change from turn to turn: the laws are joined at this error.
const FINE_SHARE: f64 = 2e-4;

/// Passes that fit the table to the largest force of the run before it counts as out of reach.
const PASSES: usize = 12;

/// A lifeline as it is rigged.
pub struct Rigging {
    /// Static curve.
    pub curve: SpanCurve,
    /// The span of the file, SI.
    span: crate::physics::Span,
    has_absorber: bool,
}

/// Numbers of the lifeline at the peak.
pub struct SpanPeak {
    /// Largest cable tension, N.
    pub tension_n: f64,
    /// Deflection then, from the chord, m.
    pub deflection_m: f64,
    /// Length the in-line absorber has deployed, m.
    pub deployed_m: f64,
}

impl Rigging {
    /// # Errors
    /// When the span contradicts itself or does not go with the rest.
    pub fn new(span: &Span, fall: &Fall, geometry: &Geometry) -> Result<Self, EstimateError> {
        // Also where the line runs over an edge on the fall line: the fall is straight, the pull on the span is not.
        if geometry.layout.is_some_and(|layout| layout.anchor.offset_m != 0.0 || layout.pivot.offset_m != 0.0) {
            return Err(refused(
                "a line beside the fall line pulls a horizontal lifeline sideways, and its place on the cable is solved \
                 moving up and down only",
                "leave out `place.anchor_offset` and `place.edge` for the lifeline; for the swing, put a fixed anchor \
                 where the cable carries the line under load",
                "anchor.kind",
            ));
        }
        if fall.path.other.is_damped() {
            return Err(refused(
                "damping of the harness is not solved beside a horizontal lifeline: joining the two to one damper needs \
                 one stiffness, and that of a lifeline rises with its load",
                "leave out `harness.damping`: nothing then takes that energy, and the fall goes deeper",
                "harness.damping",
            ));
        }
        let whole = |m: Option<crate::quantity::Measure>| m.map_or(1.0, |m| m.si().round());
        #[expect(
            clippy::cast_possible_truncation,
            clippy::cast_sign_loss,
            reason = "a whole number from 1, checked by the reader"
        )]
        let count = |m| whole(m).clamp(1.0, 1000.0) as u32;
        let given = crate::physics::Span {
            length_m: span.length.si(),
            level_difference_m: span.level_difference.map_or(0.0, |d| d.si()),
            at_m: span.at_m(),
            tightness: match &span.tension {
                SpanTension::Pretension(force) => Tightness::Pretension { force_n: force.si() },
                SpanTension::Sag(sag) => Tightness::Sag { mid_m: sag.si() },
            },
            modulus_n: span.modulus.si(),
            support_stiffness_n_per_m: span.support_stiffness.map(|k| k.si()),
            absorber: span
                .absorber
                .as_ref()
                .map(|a| InlineAbsorber { force_n: a.deploy_force.si(), stroke_m: a.stroke.si() }),
            workers: count(span.workers),
            spans: count(span.spans),
        };
        let curve = SpanCurve::new(&given).map_err(|e| clash(&e))?;
        Ok(Self { curve, span: given, has_absorber: span.absorber.is_some() })
    }

    /// Solves the fall with the span in its path. The table of the span is fitted to the largest force of the run, which
    /// is known only after the run: it is done again until the table reaches it, and once more with the table ending
    /// there. A first look at the peaks saves the settling of all but the last of these runs.
    ///
    /// # Errors
    /// As the solver, and when the span's law does not rise.
    pub fn solve(&self, fall: &Fall, reach: Reach) -> Result<Outcome, EstimateError> {
        let (mass, gravity) = (fall.mass_kg, fall.gravity_m_per_s2);
        let deepest = self.curve.rigid_line_deflection_m(mass, gravity, fall.free_fall_m);
        let first_n = self.curve.line_force_n(deepest).max(2.0 * fall.weight_n());
        let Ok((look, largest_n)) = self.fitted(fall, first_n, &first_look()) else {
            return self.fitted(fall, first_n, &Settings::default()).map(|(outcome, _)| outcome);
        };
        // What an absorber in line has given is no part of the path that the bound looks at.
        let calm = calm_settings(&look).filter(|_| reach == Reach::Peaks && !self.has_absorber);
        if let Some(settings) = calm {
            let (mut calm, _) = self.fitted(fall, largest_n, &settings)?;
            if was_calm(&calm, &settings) {
                forget_settling(&mut calm);
                return Ok(calm);
            }
        }
        self.fitted(fall, largest_n, &Settings::default()).map(|(outcome, _)| outcome)
    }

    /// A run whose table ends at its largest force, and the end of that table, N.
    fn fitted(&self, fall: &Fall, first_n: f64, settings: &Settings) -> Result<(Outcome, f64), EstimateError> {
        let mut largest_n = first_n;
        let mut outcome = self.pass(fall, largest_n, settings)?;
        for _ in 0..PASSES {
            let inside = outcome.peak_force_n <= largest_n;
            if inside && outcome.peak_force_n > 0.9 * largest_n {
                return Ok((outcome, largest_n));
            }
            largest_n = outcome.peak_force_n * if inside { 1.001 } else { 1.25 };
            outcome = self.pass(fall, largest_n, settings)?;
        }
        Err(EstimateError::Numerical { message: "the span's table does not settle on the largest force".to_owned() })
    }

    fn pass(&self, fall: &Fall, largest_n: f64, settings: &Settings) -> Result<Outcome, EstimateError> {
        if self.has_absorber {
            let spring = match fall.path.other.elastic {
                Elastic::Linear { stiffness_n_per_m } => Some(stiffness_n_per_m),
                _ => None,
            };
            let law = YieldingSpan::new(self.curve, spring, largest_n, FINE_SHARE).map_err(|e| clash(&e))?;
            return Ok(solve_on_span(fall, law, settings)?);
        }
        let table = self.curve.table(largest_n, SHARE).map_err(|e| clash(&e))?.table;
        let table = match fall.path.other.elastic {
            Elastic::Linear { stiffness_n_per_m } => {
                knots::with_spring(&table, stiffness_n_per_m).map_err(|e| clash(&SpanError::from(e)))?
            }
            _ => table,
        };
        let mut loaded = fall.clone();
        loaded.path.other.elastic = Elastic::Table(table);
        Ok(solve(&loaded, settings)?)
    }

    /// Stroke of the absorber in line with the cable, m.
    pub fn stroke_m(&self) -> Option<f64> {
        self.span.absorber.map(|absorber| absorber.stroke_m)
    }

    /// Tension and deflection under the largest line force of a run.
    pub fn peak(&self, outcome: &Outcome) -> SpanPeak {
        let load = outcome.peak_force_n * f64::from(self.span.workers);
        if !self.has_absorber {
            let deflection_m = self.curve.deflection_m(load);
            return SpanPeak { tension_n: self.curve.tension_n(deflection_m), deflection_m, deployed_m: 0.0 };
        }
        let deflection_m = self.curve.loading_deflection_m(load);
        let loading = self.curve.loading(deflection_m);
        let deployed_m = outcome.span.map_or(loading.deployed_m, |given| given.deployed_m);
        SpanPeak { tension_n: loading.tension_n, deflection_m, deployed_m }
    }

    /// For screens and sheets.
    pub fn view(&self, fall: &Fall, outcome: &Outcome) -> SpanView {
        let peak = self.peak(outcome);
        let held = self.curve.with_deployed(peak.deployed_m);
        let weight = fall.weight_n() * f64::from(self.span.workers);
        let end_loads = held
            .end_loads(peak.deflection_m)
            .map(|load| EndLoadView { force_n: load.force_n, below_horizontal_deg: load.below_horizontal_deg });
        SpanView {
            length_m: self.span.length_m,
            at_m: self.span.at_m,
            level_difference_m: self.span.level_difference_m,
            slack_m: self.curve.slack_m(),
            peak_deflection_m: peak.deflection_m,
            rest_deflection_m: held.deflection_m(weight),
            peak_tension_n: peak.tension_n,
            amplification: held.amplification(peak.deflection_m),
            end_loads,
            deployed_m: self.has_absorber.then_some(peak.deployed_m),
        }
    }

    /// What the reader must know about a run with this span.
    pub fn warnings(&self) -> Vec<String> {
        let mut list = Vec::new();
        if self.span.workers > 1 {
            list.push(format!(
                "{} workers fall together as equal masses at the same place of the span.",
                self.span.workers
            ));
        }
        list
    }

    /// Sentences that the model takes for granted.
    pub fn assumptions(&self) -> Vec<String> {
        let mut list = vec![
            "The lifeline is a massless elastic cable between its supports; its law is a table within 0.1 % of the largest \
             force."
                .to_owned(),
        ];
        if (self.span.at_m - 0.5 * self.span.length_m).abs() > 1e-9 * self.span.length_m {
            list.push(
                "The load stays at its place on the span and moves straight down; off the middle that is not in \
                 horizontal balance, and in truth it slides towards the middle."
                    .to_owned(),
            );
        }
        if self.has_absorber {
            list.push(
                "The absorber in line with the lifeline holds the tension at its force while the cable moves down, takes \
                 nothing back, and is rigid at its stroke; the cable stays longer by what it has deployed."
                    .to_owned(),
            );
        }
        if self.span.spans > 1 {
            list.push("The cable runs through the intermediate supports without friction.".to_owned());
        }
        let slack = both(self.curve.slack_m(), Dimension::Length);
        list.push(format!(
            "The lifeline hangs {slack} below its chord at the load before it takes any: part of the free fall."
        ));
        list
    }
}

fn clash(error: &SpanError) -> EstimateError {
    refused(&error.to_string(), "check `anchor.span`", "anchor.span")
}

fn refused(message: &str, hint: &str, path: &'static str) -> EstimateError {
    EstimateError::Geometry { message: message.to_owned(), hint: hint.to_owned(), path }
}
