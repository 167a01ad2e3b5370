//! Studies of the screen: what is asked for, who works it out, and where the answers lie.
mod desk;
mod job;
mod name;
mod plan;
mod shelf;

pub use desk::{Desk, step_back};
pub use job::{Findings, Lane, Mapped, Order, Ranked, Spreading, VARY_ROWS, Varied, What};
pub use name::{Name, names};
pub use plan::{again, plan, stop};
pub use shelf::{Progress, Shelf, Slot, State};
