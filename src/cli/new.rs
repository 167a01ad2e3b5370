//! `new` and `limits`: what is printed without a scenario.
use super::exit::Code;
use super::options::{LimitsArgs, NewArgs};
use super::output::{self, PAINT};
use crate::scenario::new_file;
use crate::sheet::{CAUTION_LINE, limits_json, limits_text};
use std::fs::OpenOptions;
use std::io::{self, ErrorKind, Write};
use std::path::Path;

/// Prints the published limits.
pub fn limits(args: &LimitsArgs) -> Code {
    output::results(&if args.json { limits_json() } else { limits_text(PAINT) });
    Code::Holds
}

/// Prints the annotated scenario or writes it to a file that does not exist yet.
pub fn new(args: &NewArgs) -> Code {
    let text = format!("# {CAUTION_LINE}\n\n{}", new_file());
    let Some(path) = &args.output else {
        output::results(&text);
        return Code::Holds;
    };
    match write_new(path, &text) {
        Ok(()) => {
            output::message(&format!("wrote `{}`; `underfoot run` prints its estimate", path.display()));
            Code::Holds
        }
        Err(error) if error.kind() == ErrorKind::AlreadyExists => {
            output::message(&format!("`{}` exists and was left as it is; choose another name", path.display()));
            Code::WrongInput
        }
        Err(error) => {
            output::message(&format!("cannot write `{}`: {error}; choose another place", path.display()));
            Code::WrongInput
        }
    }
}

fn write_new(path: &Path, text: &str) -> io::Result<()> {
    OpenOptions::new().write(true).create_new(true).open(path)?.write_all(text.as_bytes())
}
