//! The scenario file: from TOML text to a checked [`Scenario`], with every fault of the file at once.
mod build;
mod clash;
mod diagnostic;
mod document;
mod doubt;
mod edit;
mod field;
mod leaf;
mod load;
mod model;
mod path;
mod read;
mod rules;
mod template;
mod turn;
mod values;

pub use diagnostic::{Fault, FaultRow, Faults, Severity};
pub use document::{Document, SaveError};
pub use doubt::doubts;
pub use field::{FIELDS, Field, Need, field_for};
pub use load::{LoadError, Loaded, load};
pub use model::*;
pub use path::{Input, inputs, with_value};
pub use read::{Places, places, read, read_with_places};
pub use template::new_file;
pub use turn::Turn;
