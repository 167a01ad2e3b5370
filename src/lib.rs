//! First-pass estimate of fall arrest and suspended lines.
//!
//! The folders build on each other in one direction only; `tests/tidy.rs` holds the table of
//! who may import whom.
pub mod arrest;
pub mod cli;
pub mod estimate;
pub mod margin;
pub mod physics;
pub mod quantity;
pub mod scenario;
pub mod sheet;
pub mod study;
pub mod swing;
pub mod tui;
