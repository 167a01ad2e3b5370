//! The vertical arrest, exact from event to event.
//!
//! [`solve`] takes a [`Fall`] and gives an [`Outcome`]. Every mode of the path is affine and has a closed-form
//! solution; events are zeros of scalars of that solution, and no time is stepped.
pub mod drift;
pub mod fourth;
mod give;
mod hang;
mod ledger;
mod mode;
mod motion;
mod near;
mod next;
mod onset;
pub mod oscillator;
mod outcome;
pub(crate) mod poly;
mod quadrature;
mod record;
pub mod roots;
mod settle;
pub mod signal;
mod solve;
pub mod third;

pub use give::solve_on_span;
pub use hang::Hang;
pub use mode::{Mode, State, Stretch};
pub use motion::{Instant, Motion};
pub(crate) use next::Slider;
pub(crate) use onset::give_back;
pub use outcome::{
    ArrestError, Ended, EnergyAccount, Fall, Happening, Lowest, Outcome, Settings, SpanGiven, WorkCount,
};
pub use solve::solve;
