//! Scenario to physics to arrest to numbers.
use super::{Event, Numbers, Trace};
use crate::scenario::Scenario;

/// Everything that one run says.
#[derive(Clone, Debug)]
pub struct Estimate {
    /// Numbers by id.
    pub numbers: Numbers,
    /// Sentences: what the model takes for granted in this run.
    pub assumptions: Vec<String>,
    /// Sentences: what the reader must know about these numbers.
    pub warnings: Vec<String>,
    /// The event log in order of time (the first dozen and the last: see `Trace` for all).
    pub events: Vec<Event>,
    /// The motion.
    pub trace: Trace,
    /// Elevations where the file gives `place.standing`.
    pub elevations: Option<Elevations>,
    /// The envelope for drawing: see its fields.
    pub envelope: Option<Envelope>,
    /// Whether the model is valid for this run.
    pub validity: Vec<Validity>,
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
}

impl Validity {
    /// The reason in words with both numbers.
    #[must_use]
    pub fn words(&self, _system: crate::quantity::UnitSystem) -> String {
        todo!()
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

/// Solves a scenario at its typical values.
///
/// # Errors
/// See [`EstimateError`].
pub fn estimate(_scenario: &Scenario) -> Result<Estimate, EstimateError> {
    todo!()
}
