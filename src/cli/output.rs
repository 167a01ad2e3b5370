//! Results to stdout and messages to stderr; a closed pipe ends quietly.
use super::exit::Code;
use super::options::OutputArgs;
use crate::sheet::{Paint, clean};
use std::fs::OpenOptions;
use std::io::{self, ErrorKind, Write};
use std::path::Path;

/// Whether there is still somebody who reads the results.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Reader {
    /// Go on.
    Listens,
    /// The pipe is closed, or the device is full (which was said): further results go nowhere.
    Gone,
}

/// Writes results. Colour codes are taken out where stdout is no terminal or `NO_COLOR` is set.
pub fn results(text: &str) -> Reader {
    let mut stdout = anstream::stdout().lock();
    match stdout.write_all(text.as_bytes()).and_then(|()| stdout.flush()) {
        Ok(()) => Reader::Listens,
        Err(error) if error.kind() == io::ErrorKind::BrokenPipe => Reader::Gone,
        Err(error) => {
            message(&format!("cannot write the results: {error}; look at the device they go to"));
            Reader::Gone
        }
    }
}

/// Writes results to the file asked for, or to stdout. The code is that of the results, or [`Code::WrongInput`] where the
/// file cannot be written.
pub fn deliver(text: &str, to: &OutputArgs, code: Code) -> Code {
    let Some(path) = &to.output else {
        results(text);
        return code;
    };
    match write_file(path, text, to.replace) {
        Ok(()) => {
            message(&format!("wrote `{}`", path.display()));
            code
        }
        Err(error) if error.kind() == ErrorKind::AlreadyExists => {
            message(&format!(
                "`{}` exists and was left as it is; choose another name, or say `--replace`",
                path.display()
            ));
            Code::WrongInput
        }
        Err(error) => {
            message(&format!("cannot write `{}`: {error}; choose another place", path.display()));
            Code::WrongInput
        }
    }
}

/// Colour codes never go into a file.
fn write_file(path: &Path, text: &str, replace: bool) -> io::Result<()> {
    let mut options = OpenOptions::new();
    options.write(true);
    if replace {
        options.create(true).truncate(true)
    } else {
        options.create_new(true)
    };
    options.open(path)?.write_all(anstream::adapter::strip_str(text).to_string().as_bytes())
}

/// How results are painted: always with colour, see [`results`].
pub const PAINT: Paint = Paint::Colour;

/// Writes one message of the program.
pub fn message(words: &str) {
    diagnostics(&format!("underfoot: {}\n", clean(words)));
}

/// Writes diagnostics that are already laid out.
pub fn diagnostics(text: &str) {
    // Nobody left to read the messages: nothing more can be said.
    let _ = anstream::stderr().lock().write_all(text.as_bytes());
}

/// Whether diagnostics on stderr are painted.
pub fn stderr_has_colour() -> bool {
    anstream::AutoStream::choice(&io::stderr()) != anstream::ColorChoice::Never
}
