//! A scenario file being edited: comments, order and layout stay.
use super::read::read_with_places;
use super::{Change, Fault, Faults, LoadError, Places, Scenario, Severity, edit, load};
use sha2::{Digest, Sha256};
use std::io::Write;
use std::path::{Path, PathBuf};

/// A file's text with the scenario it means; cheap to clone for undo.
#[derive(Clone, Debug)]
pub struct Document {
    path: PathBuf,
    text: String,
    disk_sha256: [u8; 32],
    edited: bool,
    scenario: Scenario,
    places: Places,
}

impl Document {
    /// Reads a file.
    ///
    /// # Errors
    /// As [`super::load`].
    pub fn open(path: &Path) -> Result<Self, LoadError> {
        let text = load(path)?.text;
        Self::of_text(path, text).map_err(LoadError::Refused)
    }

    /// A document of a text that a file is known to hold.
    ///
    /// # Errors
    /// The faults of the text.
    pub fn of_text(path: &Path, text: String) -> Result<Self, Faults> {
        let (scenario, places) = read_with_places(&path.display().to_string(), &text)?;
        let disk_sha256 = Sha256::digest(text.as_bytes()).into();
        Ok(Self { path: path.to_owned(), text, disk_sha256, edited: false, scenario, places })
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

    /// Where each key stands in the present text.
    #[must_use]
    pub const fn places(&self) -> &Places {
        &self.places
    }

    /// SHA-256 of the bytes on disk as this program read or wrote them last.
    #[must_use]
    pub const fn disk_sha256(&self) -> &[u8; 32] {
        &self.disk_sha256
    }

    /// The same file with one input (`line.stiffness`, `obstacle.2.top`) written anew as `value`
    /// (a text as it would stand in the file, such as `62 kN/m`). The unit may differ from the
    /// file's; comments, order and layout stay. A single value given for a band moves its typical value and keeps the
    /// ends where they still enclose it. A key that the file lacks is added to its section.
    ///
    /// # Errors
    /// The faults the file would have with that value.
    pub fn with_value(&self, input: &str, value: &str) -> Result<Self, Faults> {
        self.with_changes(&[Change::Set { path: input.to_owned(), value: value.to_owned() }])
    }

    /// The same file with several keys written anew or taken out at once; the file is judged when all are done, so
    /// that a kind can be changed together with the keys that belong to it.
    ///
    /// # Errors
    /// The faults the file would have with these changes.
    pub fn with_changes(&self, changes: &[Change]) -> Result<Self, Faults> {
        let file = self.path.display().to_string();
        let text = edit::with_changes(&self.text, changes).map_err(|message| {
            let hint = Some("choose an input that the file can hold".to_owned());
            let fault =
                Fault { severity: Severity::Error, span: 0..0, message, expected: "cannot be set".into(), hint };
            Faults::new(&file, &self.text, vec![fault])
        })?;
        let (scenario, places) = read_with_places(&file, &text)?;
        let edited = <[u8; 32]>::from(Sha256::digest(text.as_bytes())) != self.disk_sha256;
        Ok(Self { path: self.path.clone(), text, disk_sha256: self.disk_sha256, edited, scenario, places })
    }

    /// Writes the text beside the file and renames it into place; the returned document is unmodified.
    ///
    /// # Errors
    /// When the file on disk is no longer what was read, or cannot be written.
    pub fn save(&mut self) -> Result<(), SaveError> {
        let disk = match std::fs::read(&self.path) {
            Ok(disk) => disk,
            Err(error) if error.kind() == std::io::ErrorKind::NotFound => {
                return Err(SaveError::Vanished(self.path.clone()));
            }
            Err(source) => return Err(SaveError::Io { path: self.path.clone(), source }),
        };
        if <[u8; 32]>::from(Sha256::digest(&disk)) != self.disk_sha256 {
            return Err(SaveError::ChangedOnDisk(self.path.clone()));
        }
        self.replace().map_err(|source| SaveError::Io { path: self.path.clone(), source })?;
        self.disk_sha256 = Sha256::digest(self.text.as_bytes()).into();
        self.edited = false;
        Ok(())
    }

    /// Writes a neighbour with the file's permissions and renames it onto the file (the file itself, not a link to it).
    fn replace(&self) -> std::io::Result<()> {
        let target = self.path.canonicalize()?;
        let folder = target.parent().unwrap_or(Path::new("."));
        let permissions = std::fs::metadata(&target)?.permissions();
        if permissions.readonly() {
            return Err(std::io::Error::from(std::io::ErrorKind::PermissionDenied));
        }
        let mut beside = tempfile::NamedTempFile::new_in(folder)?;
        beside.write_all(self.text.as_bytes())?;
        beside.as_file().set_permissions(permissions)?;
        beside.as_file().sync_all()?;
        beside.persist(&target).map_err(|error| error.error)?;
        Ok(())
    }

    /// The same text judged against what another state of the same file knows to be on disk: after a save, states
    /// kept for undo can be saved again.
    #[must_use]
    pub fn on_disk_as(mut self, other: &Self) -> Self {
        self.disk_sha256 = other.disk_sha256;
        self.edited = <[u8; 32]>::from(Sha256::digest(self.text.as_bytes())) != self.disk_sha256;
        self
    }

    /// True when the text differs from what is on disk as far as this program knows.
    #[must_use]
    pub const fn is_edited(&self) -> bool {
        self.edited
    }
}

/// Why a file was not saved.
#[derive(Debug, thiserror::Error)]
pub enum SaveError {
    /// Somebody else wrote the file since it was read.
    #[error("`{0}` changed on disk since it was read; nothing was written")]
    ChangedOnDisk(PathBuf),
    /// The file is gone.
    #[error("`{0}` is no longer there; nothing was written")]
    Vanished(PathBuf),
    /// The system refused.
    #[error("cannot write `{path}`: {source}")]
    Io {
        /// The file.
        path: PathBuf,
        /// The system's words.
        source: std::io::Error,
    },
}
