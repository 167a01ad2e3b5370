//! The arguments and their help.
use crate::quantity::UnitSystem;
use crate::sheet::CAUTION_LINE;
use crate::study::MOST_SAMPLES;
use clap::{Args, Parser, Subcommand, ValueEnum};
use std::path::PathBuf;

const EXIT_CODES: &str = "Exit codes: 0 every check holds; 1 a check is thin, short or open; 2 the input is wrong; \
                          3 it could not be computed; 130 interrupted.";

const AUDIT_CODES: &str = "Exit codes: 0 every file passes, by default when every check holds; 1 a check is short or open, \
                           or thin unless `--require thin`; 2 the input is wrong; 3 it could not be computed; 130 \
                           interrupted. The largest of all files counts; doubts do not change it.";
const VARY_CODES: &str = "Exit codes: 0 every check holds in every row or cell; 1 a check is short or open in one; 2 \
                          the input is wrong; 3 it could not be computed; 130 interrupted, with what there was.";
const REMEDY_CODES: &str = "Exit codes: 0 every check holds today, at the typical values or with --worst at the worst \
                            found; 1 a check is short, thin or open today; 2 the input is wrong; 3 it could not be \
                            computed; 130 interrupted, with what there was.";
const COMPARE_CODES: &str = "Exit codes: 0 no check of the second file is worse than in the first; 1 one is worse, does \
                             not hold where the first has none, or is no longer made; 2 the input is wrong; 3 it could \
                             not be computed.";

const WALK_CODES: &str = "Exit codes of text and JSON: 0 every check holds at every stop; 1 one is thin, short or open at \
                          one; 2 the input is wrong; 3 a stop could not be computed; 130 interrupted, with what there was.";

/// First-pass estimate of fall arrest and suspended lines: clearance, force and margin.
#[derive(Debug, Parser)]
#[command(name = "underfoot", version, about, before_help = CAUTION_LINE, after_help = EXIT_CODES)]
#[command(args_conflicts_with_subcommands = true, arg_required_else_help = true, max_term_width = 100)]
pub struct Arguments {
    /// What to do; a file alone opens the screen.
    #[command(subcommand)]
    pub command: Option<Command>,
    /// The file for the screen.
    #[command(flatten)]
    pub view: Option<ViewArgs>,
}

/// Everything the program does.
#[derive(Debug, Subcommand)]
pub enum Command {
    /// Open the screen on a scenario file (the same as `underfoot FILE`)
    #[command(before_help = CAUTION_LINE)]
    View(ViewArgs),
    /// Print the estimate and its margins
    #[command(before_help = CAUTION_LINE)]
    Run(RunArgs),
    /// Review files, folders and patterns: one verdict a file, a gate by its exit code
    #[command(before_help = CAUTION_LINE, after_help = AUDIT_CODES)]
    Audit(AuditArgs),
    /// Over the bands of the inputs: worst found, share that falls short, which input matters
    #[command(before_help = CAUTION_LINE, after_help = EXIT_CODES)]
    Spread(SpreadArgs),
    /// Run one input across a range, or two across a map: verdicts, and where they change
    #[command(before_help = CAUTION_LINE, after_help = VARY_CODES)]
    Vary(VaryArgs),
    /// For each input alone, the nearest value at which every check holds, to be confirmed
    #[command(before_help = CAUTION_LINE, after_help = REMEDY_CODES)]
    Remedy(RemedyArgs),
    /// Tell what differs between two files: inputs, numbers, verdicts
    #[command(before_help = CAUTION_LINE, after_help = COMPARE_CODES)]
    Compare(CompareArgs),
    /// Write the calculation sheet: every step with its numbers, for whoever signs
    #[command(before_help = CAUTION_LINE, after_help = EXIT_CODES)]
    Sheet(SheetArgs),
    /// Lead a crew through a scenario: play a walk-through file stop by stop
    #[command(before_help = CAUTION_LINE, after_help = WALK_CODES)]
    Walk(WalkArgs),
    /// List the built-in published limits with clause, year and how each value was confirmed
    #[command(before_help = CAUTION_LINE)]
    Limits(LimitsArgs),
    /// Print an annotated scenario to start from
    #[command(before_help = CAUTION_LINE)]
    New(NewArgs),
    /// Print the JSON Schema of a scenario file, for editors that complete and check keys
    Schema,
    /// Print the completions of a shell
    Completions(CompletionsArgs),
    /// Print the manual page (roff): commands, options, exit codes and the keys of the screen
    Manual,
}

/// Units shown.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, ValueEnum)]
pub enum Units {
    /// m, kg, kN
    #[default]
    Metric,
    /// ft, lb, lbf
    Us,
}

impl Units {
    /// The system of units.
    pub const fn system(self) -> UnitSystem {
        match self {
            Self::Metric => UnitSystem::Metric,
            Self::Us => UnitSystem::Us,
        }
    }
}

/// Arguments of the screen.
#[derive(Args, Clone, Debug)]
pub struct ViewArgs {
    /// Scenario file
    pub file: PathBuf,
    /// Units shown
    #[arg(long, value_enum, default_value_t)]
    pub units: Units,
}

/// Arguments of `run`.
#[derive(Args, Clone, Debug)]
pub struct RunArgs {
    /// Scenario files; `-` reads standard input
    #[arg(required = true, value_name = "FILE")]
    pub files: Vec<PathBuf>,
    /// JSON, SI units: one object, or with several files one a line
    #[arg(long, conflicts_with = "csv")]
    pub json: bool,
    /// CSV of travel, speed, force and mode over time, SI units; one file only
    #[arg(long)]
    pub csv: bool,
    /// Units shown in text
    #[arg(long, value_enum, default_value_t)]
    pub units: Units,
}

/// The least verdict with which a file passes.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, ValueEnum)]
pub enum Require {
    /// Every check holds, also at the worst found in the bands
    #[default]
    Holds,
    /// Every check holds at the typical values
    Thin,
}

/// Arguments of `audit`.
#[derive(Args, Clone, Debug)]
pub struct AuditArgs {
    /// Scenario files, folders that are searched for `*.toml`, and patterns such as `sites/**/*.toml`
    #[arg(required_unless_present = "explain", value_name = "PATH")]
    pub paths: Vec<PathBuf>,
    /// The least verdict with which a file passes
    #[arg(long, value_enum, default_value_t, value_name = "VERDICT")]
    pub require: Require,
    /// The summary table alone, one line a file
    #[arg(long, conflicts_with_all = ["json", "sarif"])]
    pub brief: bool,
    /// JSON, one object a line and file
    #[arg(long, conflicts_with = "sarif")]
    pub json: bool,
    /// SARIF 2.1.0, for code hosts: faults, doubts, and checks that are short, thin or open
    #[arg(long)]
    pub sarif: bool,
    /// Explain a finding or doubt by its id; without an id list them all
    #[arg(long, value_name = "ID", num_args = 0..=1, default_missing_value = "", conflicts_with = "paths")]
    pub explain: Option<String>,
    /// Units shown in text
    #[arg(long, value_enum, default_value_t)]
    pub units: Units,
}

/// Arguments of `walk`.
#[derive(Args, Clone, Debug)]
pub struct WalkArgs {
    /// Walk-through file, by custom named `NAME.walk.toml`
    pub file: PathBuf,
    /// Print every stop as text instead of opening the screen; so it is where there is no terminal
    #[arg(long, conflicts_with = "json")]
    pub text: bool,
    /// JSON, SI units
    #[arg(long)]
    pub json: bool,
    /// Units shown
    #[arg(long, value_enum, default_value_t)]
    pub units: Units,
}

/// Arguments of `limits`.
#[derive(Args, Clone, Debug)]
pub struct LimitsArgs {
    /// JSON, each value in its source's unit
    #[arg(long)]
    pub json: bool,
}

/// Arguments of `new`.
#[derive(Args, Clone, Debug)]
pub struct NewArgs {
    /// Write to this file, which must not exist yet
    #[arg(short, long, value_name = "FILE")]
    pub output: Option<PathBuf>,
}

/// Arguments of `completions`.
#[derive(Args, Clone, Debug)]
pub struct CompletionsArgs {
    /// The shell
    pub shell: clap_complete::Shell,
}

/// Arguments of `spread`.
#[derive(Args, Clone, Debug)]
pub struct SpreadArgs {
    /// Scenario file; `-` reads standard input
    pub file: PathBuf,
    /// Runs of the sample [default: as the file says, else 4096]
    #[arg(long, value_name = "N", value_parser = sample_count)]
    pub samples: Option<usize>,
    /// Which sample is drawn; the same seed gives the same bytes [default: as the file says, else 1]
    #[arg(long, value_name = "N", value_parser = clap::value_parser!(u64).range(..=LARGEST_SEED))]
    pub seed: Option<u64>,
    /// JSON, SI units, with the ranking of every check
    #[arg(long, conflicts_with = "csv")]
    pub json: bool,
    /// CSV, one value a line, SI units
    #[arg(long)]
    pub csv: bool,
    /// Units shown in text
    #[arg(long, value_enum, default_value_t)]
    pub units: Units,
}

/// The largest seed that JSON keeps exactly: 2^53 - 1.
const LARGEST_SEED: u64 = (1 << 53) - 1;

fn sample_count(text: &str) -> Result<usize, String> {
    let fits = text.parse().ok().filter(|samples| (1..=MOST_SAMPLES).contains(samples));
    fits.ok_or_else(|| format!("expected 1 to {MOST_SAMPLES} samples"))
}

/// Arguments of `compare`.
#[derive(Args, Clone, Debug)]
pub struct CompareArgs {
    /// Scenario file
    #[arg(value_name = "A")]
    pub first: PathBuf,
    /// Scenario file that is judged against it
    #[arg(value_name = "B")]
    pub second: PathBuf,
    /// JSON, SI units
    #[arg(long)]
    pub json: bool,
    /// Units shown in text
    #[arg(long, value_enum, default_value_t)]
    pub units: Units,
}

/// Most rows of a table.
const MOST_ROWS: u64 = 10_000;

/// Arguments of `vary`.
#[derive(Args, Clone, Debug)]
pub struct VaryArgs {
    /// Scenario file; `-` reads standard input
    pub file: PathBuf,
    /// Path of the input, such as `line.length` or `obstacle.1.top`
    #[arg(long, value_name = "PATH")]
    pub over: String,
    /// Path of a second input: a map of verdicts over both
    #[arg(long, value_name = "PATH")]
    pub and: Option<String>,
    /// Smallest value with its unit [default: low end of its band, half of an exact value]
    #[arg(long, value_name = "VALUE", allow_hyphen_values = true)]
    pub from: Option<String>,
    /// Largest value with its unit [default: high end of its band, double of an exact value]
    #[arg(long, value_name = "VALUE", allow_hyphen_values = true)]
    pub to: Option<String>,
    /// Smallest value of the second input
    #[arg(long, value_name = "VALUE", allow_hyphen_values = true, requires = "and")]
    pub and_from: Option<String>,
    /// Largest value of the second input
    #[arg(long, value_name = "VALUE", allow_hyphen_values = true, requires = "and")]
    pub and_to: Option<String>,
    /// Values of the input, both ends included [default: 21, in a map 61]
    #[arg(long, value_name = "N", value_parser = row_count)]
    pub steps: Option<usize>,
    /// Values of the second input, both ends included [default: 21]
    #[arg(long, value_name = "N", value_parser = row_count, requires = "and")]
    pub and_steps: Option<usize>,
    /// CSV with every number and margin, one a line, SI units
    #[arg(long, group = "form")]
    pub csv: bool,
    /// JSON, SI units
    #[arg(long, group = "form")]
    pub json: bool,
    /// SVG figure that needs nothing beside it
    #[arg(long, group = "form")]
    pub svg: bool,
    /// Where to write
    #[command(flatten)]
    pub output: OutputArgs,
    /// Units shown in text and figure
    #[arg(long, value_enum, default_value_t)]
    pub units: Units,
}

/// Where results go.
#[derive(Args, Clone, Debug)]
pub struct OutputArgs {
    /// Write to this file, which must not exist yet; its ending csv, json or svg chooses the form where none is asked for
    #[arg(short, long, value_name = "FILE")]
    pub output: Option<PathBuf>,
    /// Write over the file where it exists
    #[arg(long, requires = "output")]
    pub replace: bool,
}

fn row_count(text: &str) -> Result<usize, String> {
    let fits = text.parse::<u64>().ok().filter(|rows| (2..=MOST_ROWS).contains(rows));
    fits.and_then(|rows| usize::try_from(rows).ok()).ok_or_else(|| format!("expected 2 to {MOST_ROWS} rows"))
}

/// Arguments of `remedy`.
#[derive(Args, Clone, Debug)]
pub struct RemedyArgs {
    /// Scenario file; `-` reads standard input
    pub file: PathBuf,
    /// Every check holds at the worst found over the bands of all other inputs, not at their typical values alone
    #[arg(long)]
    pub worst: bool,
    /// Pairs of inputs changed together as well
    #[arg(long)]
    pub pairs: bool,
    /// JSON, SI units
    #[arg(long)]
    pub json: bool,
    /// Units shown in text beside those of the file
    #[arg(long, value_enum)]
    pub units: Option<Units>,
}

/// Arguments of `sheet`.
#[derive(Args, Clone, Debug)]
pub struct SheetArgs {
    /// Scenario file
    pub file: PathBuf,
    /// Where the sheet goes: its ending says what it is, `.html`, `.md` or `.json`
    #[arg(short, long, value_name = "OUT")]
    pub output: Option<PathBuf>,
    /// Write over a sheet that exists
    #[arg(long)]
    pub replace: bool,
    /// Add the nearest values at which every check holds
    #[arg(long)]
    pub remedies: bool,
    /// Units of the results; inputs stand as the file states them
    #[arg(long, value_enum, default_value_t)]
    pub units: Units,
}
