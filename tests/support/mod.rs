//! Shared by the tests of the arrest and its bench: cases, an independent reference, random cases.
#![allow(dead_code, unused_imports, reason = "each test target uses its own part")]
#![allow(clippy::expect_used, reason = "test support fails by panicking")]
pub mod case;
pub mod compare;
pub mod flow;
pub mod numbers;
pub mod printed;
pub mod random;
pub mod reference;

pub use case::{Case, Law, Part, Slider};
pub use numbers::{Numbers, numbers};
pub use reference::{Event, Fineness};
