//! Results to bytes: text, JSON and CSV. Pure functions.
mod caution;
mod report;
pub mod ticks;

pub use caution::{CAUTION_LINE, CAUTIONS};
pub use report::{Report, ReportError, report};
