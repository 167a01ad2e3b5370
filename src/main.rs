//! Picks the command line or the screen.
use std::process::ExitCode;
use underfoot::cli::{self, Next};

fn main() -> color_eyre::Result<ExitCode> {
    color_eyre::install()?;
    match cli::parse_and_run(std::env::args_os()) {
        Next::Exit(code) => Ok(ExitCode::from(code.number())),
        Next::View { path, units } => screen(&path, units),
    }
}

fn screen(_path: &std::path::Path, _units: underfoot::quantity::UnitSystem) -> color_eyre::Result<ExitCode> {
    Err(color_eyre::eyre::eyre!("the screen is not part of this build yet; use `underfoot run FILE`"))
}
