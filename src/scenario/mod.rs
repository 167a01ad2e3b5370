//! The scenario file: from TOML text to a checked [`Scenario`], with every fault of the file at once.
mod diagnostic;
mod document;
mod field;
mod load;
mod model;
mod path;
mod read;
mod template;

pub use diagnostic::{Fault, Faults, Severity};
pub use document::{Document, SaveError};
pub use field::{FIELDS, Field, field_for};
pub use load::{LoadError, Loaded, load};
pub use model::*;
pub use path::{Input, inputs, with_value};
pub use read::read;
pub use template::new_file;
