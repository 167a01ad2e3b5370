//! `run`: the estimate and its margins.
use super::exit::Code;
use super::interrupt::Interrupt;
use super::locate::{one_fault, unknown_basis};
use super::meter::Meter;
use super::options::RunArgs;
use super::output::{self, PAINT, Reader};
use crate::estimate::EstimateError;
use crate::margin::Rules;
use crate::scenario::{Faults, LoadError, Loaded, load, read};
use crate::sheet::{CAUTION_LINE, Layout, Report, ReportError, csv, json, report, report_bands, text};
use crate::study::StudyError;
use std::io::Read;
use std::path::Path;

/// Why a file gave no report.
#[derive(Debug, thiserror::Error)]
pub enum Failure {
    /// Not readable.
    #[error("{0}")]
    Unreadable(String),
    /// Read and refused.
    #[error("{} fault(s) in `{}`", .0.faults.len(), .0.file)]
    Refused(Faults),
    /// Not computed.
    #[error("`{file}`: {reason}")]
    NotComputed {
        /// The file.
        file: String,
        /// Why.
        reason: String,
    },
}

impl Failure {
    /// The exit code.
    pub const fn code(&self) -> Code {
        match self {
            Self::Unreadable(_) | Self::Refused(_) => Code::WrongInput,
            Self::NotComputed { .. } => Code::NotComputed,
        }
    }
    /// Tells it on stderr.
    pub fn print(&self) {
        match self {
            Self::Refused(faults) => output::diagnostics(&with_line_end(faults.render(output::stderr_has_colour()))),
            other => output::message(&other.to_string()),
        }
    }
}

fn with_line_end(mut text: String) -> String {
    if !text.ends_with('\n') {
        text.push('\n');
    }
    text
}

/// Prints every file; the largest exit code counts. After Ctrl-C the file at hand is the last.
pub fn run(args: &RunArgs) -> Code {
    if args.csv && args.files.len() > 1 {
        output::message("`--csv` takes one file; run it once for each");
        return Code::WrongInput;
    }
    let mut code = Code::Holds;
    let mut reader = Reader::Listens;
    let interrupt = Interrupt::listen();
    for (i, path) in args.files.iter().enumerate() {
        match load_and_judge(path, &interrupt) {
            Ok((_, report)) => {
                code = code.max(Code::from(report.verdict));
                if reader == Reader::Listens {
                    reader = output::results(&rendered(&report, args, i));
                }
            }
            Err(failure) => {
                failure.print();
                code = code.max(failure.code());
            }
        }
        if interrupt.is_pressed() {
            interrupt.tell();
            return Code::Interrupted;
        }
    }
    code
}

fn rendered(report: &Report, args: &RunArgs, place: usize) -> String {
    if args.json {
        return json(report, if args.files.len() > 1 { Layout::OneLine } else { Layout::Lines });
    }
    if args.csv {
        output::message(CAUTION_LINE);
        return csv(report).unwrap_or_default();
    }
    let gap = if place == 0 { "" } else { "\n" };
    format!("{gap}{}", text(report, args.units.system(), PAINT))
}

/// A file from disk or standard input (`-`) to its report.
///
/// # Errors
/// See [`Failure`].
pub fn load_and_report(path: &Path) -> Result<(Loaded, Report), Failure> {
    let piped = path == Path::new("-");
    let file = if piped { STANDARD_INPUT.to_owned() } else { path.display().to_string() };
    let loaded = if piped { standard_input()? } else { from_disk(path)? };
    match report(&file, &loaded.text, &loaded.scenario) {
        Ok(report) => Ok((loaded, report)),
        Err(error) => Err(no_report(file, &loaded.text, error)),
    }
}

/// As [`load_and_report`], with what the bands do to the checks; Ctrl-C leaves a part of that.
///
/// # Errors
/// See [`Failure`].
pub fn load_and_judge(path: &Path, interrupt: &Interrupt) -> Result<(Loaded, Report), Failure> {
    let (loaded, mut report) = load_and_report(path)?;
    let meter = Meter::new();
    let found = report_bands(&report, &|progress| interrupt.watch(&meter, progress));
    meter.clear();
    let put = found.and_then(|bands| bands.map_or(Ok(()), |bands| report.add_bands(bands)));
    let not_computed =
        |error: StudyError| Failure::NotComputed { file: report.file.clone(), reason: error.to_string() };
    put.map_err(not_computed)?;
    Ok((loaded, report))
}

/// Looks whether a file can be edited on the screen: it reads without a fault and its set of limits is known.
///
/// # Errors
/// See [`Failure`].
pub fn load_for_screen(path: &Path) -> Result<(), Failure> {
    let loaded = from_disk(path)?;
    let unknown = |basis| Failure::Refused(unknown_basis(&path.display().to_string(), &loaded.text, &basis));
    Rules::of(&loaded.scenario).map(|_| ()).map_err(unknown)
}

fn from_disk(path: &Path) -> Result<Loaded, Failure> {
    load(path).map_err(|error| match error {
        LoadError::Refused(faults) => Failure::Refused(faults),
        unreadable @ LoadError::Unreadable { .. } => Failure::Unreadable(unreadable.to_string()),
    })
}

/// The name of standard input in results and messages.
const STANDARD_INPUT: &str = "standard input";
/// Largest text read from standard input, as for files: 1 MiB.
const LARGEST_INPUT: u64 = 1 << 20;

fn standard_input() -> Result<Loaded, Failure> {
    let mut bytes = Vec::new();
    std::io::stdin()
        .lock()
        .take(LARGEST_INPUT + 1)
        .read_to_end(&mut bytes)
        .map_err(|e| Failure::Unreadable(format!("cannot read standard input: {e}")))?;
    if bytes.len() as u64 > LARGEST_INPUT {
        return Err(Failure::Unreadable("standard input is larger than 1 MiB; a scenario is a short file".to_owned()));
    }
    let text = String::from_utf8(bytes)
        .map_err(|_| Failure::Unreadable("standard input is not UTF-8 text; save the scenario as UTF-8".to_owned()))?;
    let scenario = read(STANDARD_INPUT, &text).map_err(Failure::Refused)?;
    Ok(Loaded { text, scenario })
}

fn no_report(file: String, text: &str, error: ReportError) -> Failure {
    match error {
        ReportError::Basis(unknown) => Failure::Refused(unknown_basis(&file, text, &unknown)),
        ReportError::Estimate(EstimateError::Geometry { message, hint, path }) => {
            Failure::Refused(one_fault(&file, text, path, message, "expected numbers that agree", hint))
        }
        ReportError::Estimate(other) => Failure::NotComputed { file, reason: other.to_string() },
    }
}
