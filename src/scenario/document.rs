//! A scenario file being edited: comments, order and layout stay.
use super::{Fault, Faults, LoadError, Scenario};
use std::path::{Path, PathBuf};

/// A file's text with the scenario it means; cheap to clone for undo.
#[derive(Clone, Debug)]
pub struct Document {
    path: PathBuf,
    text: String,
    disk_sha256: [u8; 32],
    scenario: Scenario,
}

impl Document {
    /// Reads a file.
    ///
    /// # Errors
    /// As [`super::load`].
    pub fn open(_path: &Path) -> Result<Self, LoadError> {
        todo!()
    }
    /// The scenario the present text means.
    #[must_use]
    pub const fn scenario(&self) -> &Scenario {
        &self.scenario
    }
    /// The present text.
    #[must_use]
    pub fn text(&self) -> &str {
        &self.text
    }
    /// Where it came from.
    #[must_use]
    pub fn path(&self) -> &Path {
        &self.path
    }
    /// The same file with one input (`line.stiffness`, `obstacle.2.top`) written anew as `value`
    /// (a text as it would stand in the file, such as `62 kN/m`). The unit may differ from the
    /// file's; comments, order and layout stay.
    ///
    /// # Errors
    /// The faults the file would have with that value.
    pub fn with_value(&self, _input: &str, _value: &str) -> Result<Self, Faults> {
        todo!()
    }
    /// Writes the text beside the file and renames it into place; the returned document is unmodified.
    ///
    /// # Errors
    /// When the file on disk is no longer what was read, or cannot be written.
    pub fn save(&mut self) -> Result<(), SaveError> {
        todo!()
    }
    /// True when the text differs from what is on disk as far as this program knows.
    #[must_use]
    pub fn is_edited(&self) -> bool {
        todo!()
    }
}

/// Why a file was not saved.
#[derive(Debug, thiserror::Error)]
pub enum SaveError {
    /// Somebody else wrote the file since it was read.
    #[error("`{0}` changed on disk since it was read; nothing was written")]
    ChangedOnDisk(PathBuf),
    /// The system refused.
    #[error("cannot write `{path}`: {source}")]
    Io {
        /// The file.
        path: PathBuf,
        /// The system's words.
        source: std::io::Error,
    },
}
