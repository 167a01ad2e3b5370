//! Picks the command line or the screen.
use std::io::Write;
use std::process::ExitCode;
use underfoot::cli::{self, Code, Next};
use underfoot::scenario::LoadError;
use underfoot::tui::{self, ScreenError};

fn main() -> color_eyre::Result<ExitCode> {
    color_eyre::install()?;
    // The hook has told of a panic already; to the shell it is one more run that could not be computed.
    std::panic::catch_unwind(start).unwrap_or_else(|_| Ok(ExitCode::from(NOT_COMPUTED)))
}

/// Exit code of a run that could not be computed.
const NOT_COMPUTED: u8 = Code::NotComputed.number();

fn start() -> color_eyre::Result<ExitCode> {
    match cli::parse_and_run(std::env::args_os()) {
        Next::Exit(code) => Ok(ExitCode::from(code.number())),
        Next::View { path, units } => screen(tui::run(&path, units)),
        Next::Walk { path, units } => screen(tui::walk(&path, units)),
        Next::Manual => Ok(ExitCode::from(cli::print_manual(&tui::key_rows()).number())),
    }
}

/// How the screen ended; a reason that the user knows, or can act on, is a line and a code and not a report.
fn screen(ended: color_eyre::Result<()>) -> color_eyre::Result<ExitCode> {
    let Err(report) = ended else { return Ok(ExitCode::SUCCESS) };
    if let Some(error) = report.downcast_ref::<ScreenError>() {
        if !error.is_silent() {
            say(&format!("underfoot: {error}"));
        }
        return Ok(ExitCode::from(error.exit_code()));
    }
    match report.downcast_ref::<LoadError>() {
        Some(LoadError::Refused(faults)) => say(&faults.render(false)),
        Some(error) => say(&format!("underfoot: {error}")),
        None => return Err(report),
    }
    Ok(ExitCode::from(2))
}

/// A line to standard error, which may be a terminal that has gone away.
fn say(words: &str) {
    let _ = writeln!(std::io::stderr(), "{words}");
}
