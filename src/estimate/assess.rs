//! Scenario to physics to arrest to numbers.
use super::calm::Reach;
use super::setup::{Setup, allowance, body_below_attachment};
use super::{Event, Numbers, PlaneView, Solved, SpanView, Trace, WorkStep, collect, log, planar, remark};
use crate::arrest::{ArrestError, Outcome, Settings, solve};
use crate::physics::Layout;
use crate::quantity::{Dimension, UnitSystem, format_si};
use crate::scenario::{AnchorKind, Scenario, StretchLaw};

/// Everything that one run says.
#[derive(Clone, Debug)]
pub struct Estimate {
    /// Numbers by id.
    pub numbers: Numbers,
    /// Sentences: what the model takes for granted in this run.
    pub assumptions: Vec<String>,
    /// Sentences: what the reader must know about these numbers.
    pub warnings: Vec<String>,
    /// The event log in order of time: what counts by itself, the earliest others up to a dozen, how many more, the end.
    pub events: Vec<Event>,
    /// The motion.
    pub trace: Trace,
    /// Elevations where the file gives `place.standing`.
    pub elevations: Option<Elevations>,
    /// The envelope for drawing.
    pub envelope: Option<Envelope>,
    /// Whether the model is valid for this run.
    pub validity: Vec<Validity>,
    /// The working of the geometry, step by step.
    pub working: Vec<WorkStep>,
    /// Places of a planar run.
    pub plane: Option<PlaneView>,
    /// The horizontal lifeline under the largest load.
    pub span: Option<SpanView>,
    /// What was solved, part by part and mode by mode.
    pub solved: Solved,
}

/// Why numbers of this run are open rather than judged.
#[derive(Clone, Debug, PartialEq)]
pub enum Validity {
    /// Free fall beyond the absorber's rating, both m.
    FreeFallBeyondRating {
        /// Free fall of this run.
        free_fall_m: f64,
        /// Rating of the absorber.
        rated_m: f64,
    },
    /// Line stretched beyond the last row of its force-elongation table, both m.
    LineBeyondTable {
        /// Largest elongation of this run.
        elongation_m: f64,
        /// Elongation of the last row.
        last_m: f64,
    },
}

impl Validity {
    /// The reason in words with both numbers.
    #[must_use]
    pub fn words(&self, system: UnitSystem) -> String {
        self.told(|m| format_si(m, Dimension::Length, system))
    }

    /// The reason in words with both numbers as `length` writes metres.
    pub(super) fn told(&self, length: impl Fn(f64) -> String) -> String {
        match self {
            Self::FreeFallBeyondRating { free_fall_m, rated_m } => format!(
                "free fall of {} is beyond the {} that the absorber is rated for",
                length(*free_fall_m),
                length(*rated_m)
            ),
            Self::LineBeyondTable { elongation_m, last_m } => format!(
                "line elongation of {} is beyond the {} where the line's table ends",
                length(*elongation_m),
                length(*last_m)
            ),
        }
    }
}

/// Elevations of the run above the file's datum, m.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Elevations {
    /// Anchor: stated, or worked out upward from the taut position where only the free fall is stated.
    pub anchor_m: Option<f64>,
    /// Standing surface or underside of the load at the start.
    pub standing_m: f64,
    /// Attachment at the start.
    pub attachment_start_m: f64,
    /// Attachment when the line comes taut.
    pub attachment_taut_m: f64,
    /// Attachment at the lowest point.
    pub attachment_lowest_m: f64,
    /// Attachment at rest after the arrest.
    pub attachment_rest_m: f64,
    /// From the attachment down to the feet (with stretch allowance) or to the underside.
    pub lowest_point_below_attachment_m: f64,
    /// From the attachment down to the feet or underside, without allowance.
    pub body_below_attachment_m: f64,
}

impl Elevations {
    /// Elevation of the feet (with allowance) or of the underside at the lowest point, m.
    #[must_use]
    pub fn lowest_point_m(&self) -> f64 {
        self.attachment_lowest_m - self.lowest_point_below_attachment_m
    }

    fn of(scenario: &Scenario, setup: &Setup, outcome: &Outcome) -> Option<Self> {
        let start = setup.attachment_start_m?;
        let body = body_below_attachment(&scenario.subject)?;
        let taut = start - setup.fall.free_fall_m;
        let length = scenario.line.length.map(|l| l.si());
        Some(Self {
            anchor_m: scenario.place.anchor.map(|a| a.si()).or_else(|| length.map(|l| taut + l)),
            standing_m: scenario.place.standing?.si(),
            attachment_start_m: start,
            attachment_taut_m: taut,
            attachment_lowest_m: taut - outcome.arrest_distance_m,
            attachment_rest_m: taut - outcome.hang_travel_m,
            lowest_point_below_attachment_m: body + allowance(&scenario.subject),
            body_below_attachment_m: body,
        })
    }
}

/// `hang +- amplitude * exp(-decay * (t - from))` bounds the travel in the phase it is drawn for.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Envelope {
    /// Hang position, m of travel past taut.
    pub hang_m: f64,
    /// Amplitude at `from_s`, m.
    pub amplitude_m: f64,
    /// Decay, 1/s.
    pub decay_per_s: f64,
    /// Start of its phase, s from the start of the fall.
    pub from_s: f64,
    /// End of its phase, s.
    pub to_s: f64,
}

/// Why there is no estimate.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum EstimateError {
    /// The geometry contradicts itself; the two numbers are in the text.
    #[error("{message}")]
    Geometry {
        /// The message with the numbers that clash.
        message: String,
        /// What to do.
        hint: String,
        /// The input to look at first.
        path: &'static str,
    },
    /// The energy account does not balance: no number of this run can be trusted.
    #[error("the energy account is off by `{residual:e}` of the fall energy")]
    Energy {
        /// Largest imbalance over the fall energy.
        residual: f64,
    },
    /// A value left the range of floating-point numbers or the event count ran away.
    #[error("the arrest could not be computed: {message}")]
    Numerical {
        /// What happened.
        message: String,
    },
}

impl From<ArrestError> for EstimateError {
    fn from(error: ArrestError) -> Self {
        match error {
            ArrestError::Energy { residual } => Self::Energy { residual },
            error => Self::Numerical { message: error.to_string() },
        }
    }
}

/// Solves a scenario at its typical values.
///
/// # Errors
/// See [`EstimateError`].
pub fn estimate(scenario: &Scenario) -> Result<Estimate, EstimateError> {
    let setup = Setup::of(scenario)?;
    match setup.geometry.layout.filter(|_| setup.is_planar()) {
        Some(layout) => planar_estimate(scenario, &setup, &layout),
        None => vertical_estimate(scenario, &setup),
    }
}

/// The numbers of a run without words, events and drawings: what a study of many runs needs.
#[derive(Clone, Debug, PartialEq)]
pub struct Figures {
    /// Numbers by id.
    pub numbers: Numbers,
    /// Whether the model is valid for this run.
    pub validity: Vec<Validity>,
}

/// Solves a scenario at its typical values for its numbers alone; they equal those of [`estimate`].
///
/// # Errors
/// See [`EstimateError`].
pub fn figures(scenario: &Scenario) -> Result<Figures, EstimateError> {
    figures_to(scenario, Reach::Settled)
}

/// As [`figures`], without the numbers that only the settling of a horizontal lifeline tells: such a run ends as soon as
/// nothing that it has reached can be reached again. Every number that a check asks for is there and the same.
///
/// # Errors
/// See [`EstimateError`].
pub fn peaks(scenario: &Scenario) -> Result<Figures, EstimateError> {
    let mut figures = figures_to(scenario, Reach::Peaks)?;
    if matches!(scenario.anchor.kind, AnchorKind::Span(_)) {
        figures.numbers.forget(SETTLING);
    }
    Ok(figures)
}

/// Numbers that a run tells only when it is followed until it has settled.
const SETTLING: &[&str] = &[
    "time_above_4kn",
    "time_above_6kn",
    "time_first_slack",
    "rebound_rise",
    "slack_episodes",
    "settle_time",
    "envelope_amplitude",
    "envelope_decay",
    "envelope_bound_coarse",
    "envelope_bound_tight",
    "energy_residual",
];

fn figures_to(scenario: &Scenario, reach: Reach) -> Result<Figures, EstimateError> {
    let setup = Setup::of(scenario)?;
    let numbers = if let Some(layout) = setup.geometry.layout.filter(|_| setup.is_planar()) {
        let outcome = planar::solve(scenario, &setup, &layout)?;
        let elevations = planar::elevations(scenario, &setup, &layout, &outcome);
        let strikes = planar::strikes(scenario, &outcome);
        planar::numbers(scenario, &setup, &outcome, elevations.as_ref(), &strikes)
    } else {
        let outcome = solve_vertical(&setup, reach)?;
        let elevations = Elevations::of(scenario, &setup, &outcome);
        collect::numbers(scenario, &setup, &outcome, elevations.as_ref())
    };
    let validity = validity(scenario, &setup, &numbers);
    Ok(Figures { numbers, validity })
}

fn solve_vertical(setup: &Setup, reach: Reach) -> Result<Outcome, EstimateError> {
    match &setup.span {
        Some(span) => span.solve(&setup.fall, reach),
        None => Ok(solve(&setup.fall, &Settings::default())?),
    }
}

fn vertical_estimate(scenario: &Scenario, setup: &Setup) -> Result<Estimate, EstimateError> {
    let outcome = solve_vertical(setup, Reach::Settled)?;
    let elevations = Elevations::of(scenario, setup, &outcome);
    let numbers = collect::numbers(scenario, setup, &outcome, elevations.as_ref());
    let validity = validity(scenario, setup, &numbers);
    let warnings = remark::warnings(scenario, setup, Some(&outcome), outcome.stroke_used_up);
    Ok(Estimate {
        assumptions: remark::assumptions(scenario, setup),
        warnings: remark::with_open(warnings, &validity),
        events: log::events(setup, &outcome),
        envelope: collect::envelope(&outcome),
        validity,
        numbers,
        elevations,
        working: working(setup),
        plane: None,
        span: setup.span.as_ref().map(|span| span.view(&setup.fall, &outcome)),
        solved: Solved::of(setup, &outcome.fall.path, Some(&outcome.motion)),
        trace: Trace::new(outcome.motion),
    })
}

fn planar_estimate(scenario: &Scenario, setup: &Setup, layout: &Layout) -> Result<Estimate, EstimateError> {
    let outcome = planar::solve(scenario, setup, layout)?;
    let elevations = planar::elevations(scenario, setup, layout, &outcome);
    let view = planar::view(scenario, layout, &outcome);
    let numbers = planar::numbers(scenario, setup, &outcome, elevations.as_ref(), &view.strikes);
    let validity = validity(scenario, setup, &numbers);
    let warnings = remark::warnings(scenario, setup, None, outcome.stroke_used_up);
    Ok(Estimate {
        assumptions: remark::assumptions(scenario, setup),
        warnings: remark::with_open(warnings, &validity),
        events: planar::events(setup, &outcome, &view.strikes),
        envelope: None,
        validity,
        numbers,
        elevations,
        working: working(setup),
        plane: Some(view),
        span: None,
        solved: Solved::of(setup, &setup.fall.path, None),
        trace: Trace::planar(outcome.trajectory, outcome.taut_at.elevation_m, &outcome.happenings),
    })
}

fn working(setup: &Setup) -> Vec<WorkStep> {
    let step = |what: &str, value_m: f64| WorkStep { what: what.to_owned(), value_m };
    let mut steps: Vec<_> = setup.geometry.steps.iter().map(|s| step(s.what, s.value_m)).collect();
    if let Some(span) = &setup.span {
        steps.push(step("deflection of the lifeline before it takes any load", span.curve.slack_m()));
        steps.push(step("free fall: the line's own, and that deflection", setup.fall.free_fall_m));
    }
    steps
}

fn validity(scenario: &Scenario, setup: &Setup, numbers: &Numbers) -> Vec<Validity> {
    // Rounding of decimal inputs is no more of a fall or a stretch.
    let beyond = |value: f64, most: f64| value > most * (1.0 + 1e-9);
    let rated = scenario.absorber.as_ref().and_then(|a| a.rated_free_fall).map(|r| r.si());
    let free_fall_m = setup.fall.free_fall_m;
    let rating = rated
        .filter(|&rated_m| beyond(free_fall_m, rated_m))
        .map(|rated_m| Validity::FreeFallBeyondRating { free_fall_m, rated_m });
    let last = match &scenario.line.stretch {
        StretchLaw::Curve(rows) => rows.last().map(|row| row.0),
        _ => None,
    };
    let table = last
        .zip(numbers.get("line_elongation_peak"))
        .filter(|&(last_m, elongation_m)| beyond(elongation_m, last_m))
        .map(|(last_m, elongation_m)| Validity::LineBeyondTable { elongation_m, last_m });
    rating.into_iter().chain(table).collect()
}
