//! Shared by the tests of the planar solver and its bench: random planes, and an independent reference.
#![allow(clippy::expect_used, reason = "a test fails by panicking")]
#![allow(dead_code, unused_imports, reason = "each test target uses its own part")]
pub mod planes;
pub mod reference;

pub use planes::{Setup, physical_plane, wild_plane};
pub use reference::{Record, run};
