//! The one place that reads files.
use super::{Faults, Scenario};
use std::path::{Path, PathBuf};

/// Why a file gave no scenario.
#[derive(Debug, thiserror::Error)]
pub enum LoadError {
    /// Not readable as a text file (missing, a folder, not UTF-8, over 1 MiB); the text says what and what to do.
    #[error("cannot read `{path}`: {reason}")]
    Unreadable {
        /// The file.
        path: PathBuf,
        /// Why, with a hint.
        reason: String,
    },
    /// Read, but refused.
    #[error("{} fault(s) in `{}`", .0.faults.len(), .0.file)]
    Refused(Faults),
}

/// A file's text and the scenario it means.
#[derive(Clone, Debug)]
pub struct Loaded {
    /// The text as read.
    pub text: String,
    /// Its meaning.
    pub scenario: Scenario,
}

/// Reads a scenario file of at most 1 MiB.
///
/// # Errors
/// When it cannot be read, or has faults.
pub fn load(_path: &Path) -> Result<Loaded, LoadError> {
    todo!()
}
