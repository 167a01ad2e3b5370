//! Which files an audit looks at: files, folders and patterns, in a fixed order, each file once.
use super::exit::Code;
use super::output;
use crate::scenario::is_walk;
use glob::{MatchOptions, Pattern};
use std::collections::HashSet;
use std::io;
use std::path::{Component, Path, PathBuf};

/// As shells have it: `*` stops at a folder's end and does not find hidden names.
const AS_SHELLS: MatchOptions =
    MatchOptions { case_sensitive: true, require_literal_separator: true, require_literal_leading_dot: true };

/// The files in the order of the arguments, those of a folder or a pattern by path.
#[derive(Debug, Default)]
pub struct Gathered {
    /// The files.
    pub files: Vec<PathBuf>,
    seen: HashSet<PathBuf>,
    wrong: bool,
}

impl Gathered {
    /// Looks the arguments up; what gives no file is told on stderr.
    pub fn of(paths: &[PathBuf]) -> Self {
        let mut gathered = Self::default();
        for path in paths {
            match pattern_of(path) {
                Some(pattern) => gathered.matched(&pattern),
                None => gathered.named(path),
            }
        }
        gathered
    }

    /// [`Code::WrongInput`] where an argument gave no file or a folder could not be searched.
    pub const fn code(&self) -> Code {
        if self.wrong { Code::WrongInput } else { Code::Holds }
    }

    fn complain(&mut self, words: &str) {
        output::message(words);
        self.wrong = true;
    }

    /// A file that is there already, under whatever name, is not taken again.
    fn add(&mut self, file: PathBuf) {
        let itself = file.canonicalize().unwrap_or_else(|_| file.clone());
        if self.seen.insert(itself) {
            self.files.push(file);
        }
    }

    fn add_sorted(&mut self, mut files: Vec<PathBuf>) {
        files.sort();
        for file in files {
            self.add(file);
        }
    }

    fn named(&mut self, path: &Path) {
        if !path.is_dir() {
            return self.add(path.to_owned());
        }
        let mut found = Vec::new();
        self.search(path, &mut found);
        if found.is_empty() {
            self.complain(&format!("no `*.toml` below `{}`; name the files themselves", path.display()));
        }
        self.add_sorted(found);
    }

    fn matched(&mut self, text: &str) {
        let text = text.trim_end_matches('/');
        let pattern = match Pattern::new(text) {
            Ok(pattern) => pattern,
            Err(error) => {
                return self.complain(&format!("`{text}` is no pattern: {error}; put it right or name files"));
            }
        };
        let names: Vec<Component<'_>> = Path::new(text).components().collect();
        let plain = names.iter().take_while(|name| !has_signs(&name.as_os_str().to_string_lossy())).count();
        let depth = (!text.contains("**")).then_some(names.len() - plain);
        let mut found = Vec::new();
        self.walk(&names[..plain].iter().collect::<PathBuf>(), &pattern, depth, &mut found);
        if found.is_empty() {
            self.complain(&format!("no file matches `{text}`; `**` searches the folders below"));
        }
        self.add_sorted(found);
    }

    /// Takes what matches in a folder; folders that match are searched. Goes down `depth` folders, or without end where
    /// it follows no links, so that a loop of links ends.
    fn walk(&mut self, folder: &Path, pattern: &Pattern, depth: Option<usize>, found: &mut Vec<PathBuf>) {
        if depth == Some(0) {
            return;
        }
        let place = if folder.as_os_str().is_empty() { Path::new(".") } else { folder };
        let entries = match std::fs::read_dir(place) {
            Ok(entries) => entries,
            Err(error) if error.kind() == io::ErrorKind::NotFound => return,
            Err(error) => return self.complain(&format!("cannot search `{}`: {error}", place.display())),
        };
        for entry in entries {
            let Ok(entry) = entry else {
                self.complain(&format!("cannot read all names in `{}`", place.display()));
                continue;
            };
            let path = folder.join(entry.file_name());
            let link = entry.file_type().is_ok_and(|kind| kind.is_symlink());
            let is_folder = path.is_dir() && (depth.is_some() || !link);
            match (pattern.matches_path_with(&path, AS_SHELLS), is_folder) {
                (true, true) => self.search(&path, found),
                (true, false) if is_walk(&path) => pass_over(&path),
                (true, false) if !path.is_dir() => found.push(path),
                (false, true) => self.walk(&path, pattern, depth.map(|depth| depth - 1), found),
                _ => {}
            }
        }
    }

    /// Takes every `*.toml` below a folder. Links to folders are not followed, so that no folder is searched twice.
    fn search(&mut self, folder: &Path, found: &mut Vec<PathBuf>) {
        if let Err(error) = self.entries(folder, found) {
            self.complain(&format!("cannot search `{}`: {error}", folder.display()));
        }
    }

    fn entries(&mut self, folder: &Path, found: &mut Vec<PathBuf>) -> io::Result<()> {
        for entry in std::fs::read_dir(folder)? {
            let entry = entry?;
            let (path, kind) = (entry.path(), entry.file_type()?);
            if kind.is_dir() {
                self.search(&path, found);
            } else if is_walk(&path) {
                pass_over(&path);
            } else if path.extension().is_some_and(|ending| ending == "toml") {
                // Reading a pipe would wait for whoever writes into it.
                if kind.is_file() || (kind.is_symlink() && !is_special(&path)) {
                    found.push(path);
                } else {
                    self.complain(&format!("`{}` is no regular file; name it itself to have it read", path.display()));
                }
            }
        }
        Ok(())
    }
}

fn pass_over(path: &Path) {
    output::message(&format!(
        "`{0}` is a walk-through and was passed over; `underfoot walk {0} --text` checks it",
        path.display()
    ));
}

/// Whether a link leads to something that is there and neither a file nor a folder.
fn is_special(path: &Path) -> bool {
    std::fs::metadata(path).is_ok_and(|to| !to.is_file() && !to.is_dir())
}

fn has_signs(text: &str) -> bool {
    text.contains(['*', '?', '['])
}

/// A pattern, where no file has this very name.
fn pattern_of(path: &Path) -> Option<String> {
    let text = path.to_str()?;
    (has_signs(text) && path.symlink_metadata().is_err()).then(|| text.to_owned())
}
