//! From a scenario to every number of the arrest, with units, definitions and provenance.
mod assess;
mod cables;
mod calm;
mod collect;
mod definition;
mod event;
mod log;
mod number;
mod planar;
mod remark;
mod rigging;
mod setup;
mod solved;
mod trace;
mod view;

pub use assess::{Elevations, Envelope, Estimate, EstimateError, Figures, Validity, estimate, figures, peaks};
pub use cables::typical_cables;
pub use definition::{DEFINITIONS, Definition, definition};
pub use event::{Event, EventKind};
pub use number::{Number, Numbers, Value};
pub use solved::{CubicView, Form, ModeView, PartView, SliderView, Solved};
pub use trace::{Mode, Phase, PlanePoint, Sample, Trace};
pub use view::{EndLoadView, PlacePoint, PlaneView, SpanView, StrikeView, WorkStep};
