//! The one place that reads files.
use super::read::MOST_BYTES;
use super::{Faults, Scenario, Walk, is_walk, read, read_walk};
use std::io::Read;
use std::path::{Path, PathBuf};
use toml::de::DeTable;

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
pub fn load(path: &Path) -> Result<Loaded, LoadError> {
    let text = read_text(path).map_err(|reason| LoadError::Unreadable { path: path.to_owned(), reason })?;
    match read(&path.display().to_string(), &text) {
        Ok(scenario) => Ok(Loaded { text, scenario }),
        Err(_) if is_walk(path) || has_stops(&text) => {
            let reason = "it is a walk-through and no scenario; `underfoot walk` opens it".to_owned();
            Err(LoadError::Unreadable { path: path.to_owned(), reason })
        }
        Err(faults) => Err(LoadError::Refused(faults)),
    }
}

/// True for a text with the stops of a walk-through.
fn has_stops(text: &str) -> bool {
    let (document, _) = DeTable::parse_recoverable(text);
    let table = document.get_ref();
    table.keys().any(|key| key.get_ref() == "stop") && table.keys().any(|key| key.get_ref() == "scenario")
}

/// Reads a walk-through of at most 1 MiB, and the scenario that it names.
///
/// # Errors
/// When it cannot be read, or has faults; faults of the scenario are told at the place that names it.
pub fn load_walk(path: &Path) -> Result<Walk, LoadError> {
    let text = read_text(path).map_err(|reason| LoadError::Unreadable { path: path.to_owned(), reason })?;
    let folder = path.parent().unwrap_or(Path::new(""));
    read_walk(&path.display().to_string(), folder, &text).map_err(LoadError::Refused)
}

/// The text of a file, never more than the limit read into memory.
fn read_text(path: &Path) -> Result<String, String> {
    if path.is_dir() {
        return Err("it is a folder; name a scenario file in it".to_owned());
    }
    let file = std::fs::File::open(path).map_err(|error| reason(&error))?;
    let mut bytes = Vec::new();
    file.take(MOST_BYTES as u64 + 1).read_to_end(&mut bytes).map_err(|error| reason(&error))?;
    if bytes.len() > MOST_BYTES {
        return Err("it is larger than 1 MiB; a scenario file is a few kilobytes of text".to_owned());
    }
    String::from_utf8(bytes).map_err(|error| {
        let at = error.utf8_error().valid_up_to();
        format!("byte {} is not UTF-8 text; save the file as UTF-8", at + 1)
    })
}

fn reason(error: &std::io::Error) -> String {
    match error.kind() {
        std::io::ErrorKind::NotFound => "there is no such file; check the path".to_owned(),
        std::io::ErrorKind::PermissionDenied => "reading it is not permitted; check its permissions".to_owned(),
        _ => error.to_string(),
    }
}
