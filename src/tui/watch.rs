//! Notices when somebody else changes the open file.
use std::path::{Path, PathBuf};
use std::time::{Duration, Instant, SystemTime};

const EVERY: Duration = Duration::from_secs(1);

/// Time of change and length of a file.
type Stamp = Option<(SystemTime, u64)>;

/// Looks at the file about once a second; reads it only when its time or length changed.
#[derive(Debug)]
pub struct Watch {
    path: PathBuf,
    stamp: Stamp,
    next: Option<Instant>,
}

impl Watch {
    /// Watches a file that was just read.
    #[must_use]
    pub fn of(path: &Path) -> Self {
        Self { path: path.to_owned(), stamp: stamp(path), next: None }
    }

    /// After writing or reading the file: what it is now is known.
    pub fn look_again(&mut self) {
        self.stamp = stamp(&self.path);
    }

    /// True about once a second.
    pub fn is_due(&mut self, now: Instant) -> bool {
        if self.next.is_some_and(|next| now < next) {
            return false;
        }
        self.next = Some(now + EVERY);
        true
    }

    /// True once for each change that made the file differ from `known`.
    pub fn changed(&mut self, known: &str) -> bool {
        let now = stamp(&self.path);
        if now == self.stamp {
            return false;
        }
        self.stamp = now;
        std::fs::read(&self.path).map_or(true, |bytes| bytes != known.as_bytes())
    }
}

fn stamp(path: &Path) -> Stamp {
    let found = std::fs::metadata(path).ok()?;
    Some((found.modified().ok()?, found.len()))
}
