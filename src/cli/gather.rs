//! Which files an audit looks at: files, folders and patterns, in a fixed order, each file once.
use super::exit::Code;
use super::output;
use glob::{MatchOptions, glob_with};
use std::collections::HashSet;
use std::io;
use std::path::{Path, PathBuf};

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

    fn matched(&mut self, pattern: &str) {
        let paths = match glob_with(pattern, AS_SHELLS) {
            Ok(paths) => paths,
            Err(error) => {
                return self.complain(&format!("`{pattern}` is no pattern: {error}; put it right or name files"));
            }
        };
        let mut found = Vec::new();
        for path in paths {
            match path {
                Ok(path) if path.is_dir() => self.search(&path, &mut found),
                Ok(path) => found.push(path),
                Err(error) => self.complain(&format!("cannot search `{}`: {}", error.path().display(), error.error())),
            }
        }
        if found.is_empty() {
            self.complain(&format!("no file matches `{pattern}`; `**` searches the folders below"));
        }
        self.add_sorted(found);
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

/// Whether a link leads to something that is there and neither a file nor a folder.
fn is_special(path: &Path) -> bool {
    std::fs::metadata(path).is_ok_and(|to| !to.is_file() && !to.is_dir())
}

/// A pattern, where no file has this very name.
fn pattern_of(path: &Path) -> Option<String> {
    let text = path.to_str()?;
    let has_signs = text.contains(['*', '?', '[']);
    (has_signs && path.symlink_metadata().is_err()).then(|| text.to_owned())
}
