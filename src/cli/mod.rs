//! The command line: arguments in, results to stdout, messages to stderr, one exit code out.
mod audit;
mod examples;
mod exit;
mod gather;
mod interrupt;
mod locate;
mod meter;
mod new;
mod options;
mod output;
mod reference;
mod run;
mod sheet;
mod spread;
mod study;
mod vary;
mod walk;

pub use exit::Code;
pub use reference::{KeyRow, commands_markdown, manual, print_manual};

use crate::quantity::UnitSystem;
use clap::FromArgMatches;
use options::{Arguments, Command, ViewArgs};
use std::ffi::OsString;
use std::io::IsTerminal;
use std::path::PathBuf;

/// What is to happen after the arguments were read.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Next {
    /// All is done: end with this code.
    Exit(Code),
    /// Open the screen on a file that reads without a fault.
    View {
        /// The file.
        path: PathBuf,
        /// The units shown.
        units: UnitSystem,
    },
    /// Open the screen on a walk-through that reads without a fault.
    Walk {
        /// The file.
        path: PathBuf,
        /// The units shown.
        units: UnitSystem,
    },
    /// Print the manual, which lists the keys of the screen too.
    Manual,
}

/// Reads the arguments (the first is the program's name) and does what they ask for, except for the screen.
pub fn parse_and_run(args: impl IntoIterator<Item = impl Into<OsString> + Clone>) -> Next {
    let read = examples::command().try_get_matches_from(args);
    match read.and_then(|matches| Arguments::from_arg_matches(&matches)) {
        Ok(arguments) => dispatch(arguments),
        Err(refusal) => {
            // A closed pipe while help is printed is not worth a message.
            let _ = refusal.print();
            Next::Exit(if refusal.use_stderr() { Code::WrongInput } else { Code::Holds })
        }
    }
}

fn dispatch(arguments: Arguments) -> Next {
    match (arguments.command, arguments.view) {
        (Some(Command::View(view)), _) | (None, Some(view)) => screen(view),
        (Some(Command::Run(args)), _) => Next::Exit(run::run(&args)),
        (Some(Command::Audit(args)), _) => Next::Exit(audit::audit(&args)),
        (Some(Command::Compare(args)), _) => Next::Exit(study::compare(&args)),
        (Some(Command::Vary(args)), _) => Next::Exit(vary::vary_inputs(&args)),
        (Some(Command::Remedy(args)), _) => Next::Exit(study::remedy(&args)),
        (Some(Command::Sheet(args)), _) => Next::Exit(sheet::sheet(&args)),
        (Some(Command::Spread(args)), _) => Next::Exit(spread::spread(&args)),
        (Some(Command::Walk(args)), _) => walk::walk(&args),
        (Some(Command::Limits(args)), _) => Next::Exit(new::limits(&args)),
        (Some(Command::New(args)), _) => Next::Exit(new::new(&args)),
        (Some(Command::Schema), _) => Next::Exit(reference::print_schema()),
        (Some(Command::Completions(args)), _) => Next::Exit(reference::print_completions(args.shell)),
        (Some(Command::Manual), _) => Next::Manual,
        (None, None) => {
            output::message("no file is given; `underfoot --help` lists what there is");
            Next::Exit(Code::WrongInput)
        }
    }
}

/// The screen needs a terminal and a file without faults; both are looked at before anything is drawn. What cannot be
/// computed is shown on the screen, where it can be put right.
fn screen(view: ViewArgs) -> Next {
    if !(std::io::stdout().is_terminal() && std::io::stdin().is_terminal()) {
        output::message("the screen needs a terminal; use `underfoot run FILE` for text, or `--json` for JSON");
        return Next::Exit(Code::WrongInput);
    }
    match run::load_for_screen(&view.file) {
        Ok(()) => Next::View { path: view.file, units: view.units.system() },
        Err(failure) => {
            failure.print();
            Next::Exit(failure.code())
        }
    }
}
