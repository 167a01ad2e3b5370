//! From a scenario to every number of the arrest, with units, definitions and provenance.
mod assess;
mod event;
mod number;
mod trace;

pub use assess::{Elevations, Envelope, Estimate, EstimateError, Validity, estimate};
pub use event::{Event, EventKind};
pub use number::{DEFINITIONS, Definition, Number, Numbers, Value};
pub use trace::{Mode, Phase, Sample, Trace};
