//! First-pass estimate of fall arrest and suspended lines: who falls, from where, on what, how hard the stop is and
//! what is in the way.
//!
//! It is an estimate and not a design: local code and a licensed or competent person decide. Whoever shows its numbers
//! shows its cautions beside them ([`sheet::CAUTIONS`]).
//!
//! # From a file to its margins
//!
//! ```
//! use underfoot::{estimate, margin, scenario};
//!
//! let text = r#"
//!     [subject]
//!     kind = "person"
//!     mass = "100 kg"
//!     attachment_above_feet = "1.5 m"
//!     [place]
//!     standing = "10 m"
//!     anchor = "12 m"
//!     [line]
//!     kind = "lanyard"
//!     length = "1.8 m"
//!     stiffness = "60 kN/m"
//!     damping_ratio = 0.08
//!     [absorber]
//!     deploy_force = "4 kN"
//!     stroke = "1.1 m"
//!     [[obstacle]]
//!     name = "lower roof"
//!     top = "4 m"
//!     reserve = "1 m"
//!     [limits]
//!     basis = "eu-363"
//! "#;
//! let scenario = scenario::read("roof.toml", text)?;
//! let estimate = estimate::estimate(&scenario)?;
//!
//! // Every number has an id, a unit and a definition; SI throughout.
//! let free_fall_m = estimate.numbers.get("free_fall_distance").ok_or("no free fall")?;
//! assert!((free_fall_m - 1.3).abs() < 1e-12);
//! assert!(estimate.numbers.get("arrest_force_peak").is_some_and(|force_n| force_n < 6000.0));
//!
//! // Every check with its limit, the clause it comes from and its verdict.
//! for margin in margin::margins(&scenario, &estimate)? {
//!     println!("{}: {} ({})", margin.label, margin.verdict.word(), margin.basis.words);
//! }
//! # Ok::<(), Box<dyn std::error::Error>>(())
//! ```
//!
//! # Features
//!
//! `commands` (the command line) and `screen` are on unless turned off; without them the library needs neither a terminal
//! nor arguments: `underfoot = { version = "0.1", default-features = false }`.
//!
//! # Versions
//!
//! Semantic versions (semver.org, 2.0.0). Before 1.0 a new minor version may change the library; a patch does not.
//! The stable surface is [`quantity`], [`scenario`], [`estimate`], [`margin`], [`study`] and [`sheet`], the ids of numbers
//! and checks, the keys of the scenario file and of JSON, and the exit codes. [`physics`], [`arrest`] and [`swing`] are
//! open to be used and tested but may change in any version. A number that changes beyond its printed digits is a change
//! of behaviour and stands in the change log.
//!
//! The folders build on each other in one direction only; `tests/tidy.rs` holds the table of
//! who may import whom.
pub mod arrest;
#[cfg(feature = "commands")]
pub mod cli;
pub mod estimate;
pub mod margin;
pub mod physics;
pub mod quantity;
pub mod scenario;
pub mod sheet;
pub mod study;
pub mod swing;
#[cfg(feature = "screen")]
pub mod tui;
