//! The vertical arrest, exact from event to event.
//!
//! `solve(&Fall, &Settings) -> Result<Outcome, ArrestError>` is the entry.
mod outcome;

pub use outcome::{ArrestError, Ended, EnergyAccount, Fall, Happening, Lowest, Outcome, Settings, WorkCount};
