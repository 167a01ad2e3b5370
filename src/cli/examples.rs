//! The arguments with an example beside each command, for help and the manual.
use super::options::Arguments;
use clap::CommandFactory;

/// Examples of every command that reads a file or prints a choice, on shipped scenarios.
const EXAMPLES: &[(&str, &[&str])] = &[
    (
        "view",
        &["underfoot view scenarios/roof-foot-level.toml", "underfoot view scenarios/step-transfer.toml --units us"],
    ),
    (
        "run",
        &[
            "underfoot run scenarios/roof-foot-level.toml",
            "underfoot run scenarios/*.toml --json",
            "underfoot run scenarios/elastic-suspension.toml --csv > trace.csv",
        ],
    ),
    (
        "audit",
        &[
            "underfoot audit scenarios",
            "underfoot audit 'scenarios/*.toml' --brief --require thin",
            "underfoot audit scenarios --sarif > audit.sarif",
            "underfoot audit --explain reserve-missing",
        ],
    ),
    ("spread", &["underfoot spread scenarios/step-transfer.toml --samples 10000 --seed 7"]),
    (
        "vary",
        &[
            "underfoot vary scenarios/low-scaffold-short.toml --over line.length --from '0.5 m' --to '2 m'",
            "underfoot vary scenarios/low-scaffold-short.toml --over line.length --and place.anchor --svg > map.svg",
        ],
    ),
    (
        "remedy",
        &[
            "underfoot remedy scenarios/low-scaffold-short.toml",
            "underfoot remedy scenarios/step-transfer.toml --worst",
        ],
    ),
    ("compare", &["underfoot compare scenarios/low-scaffold-short.toml scenarios/roof-foot-level.toml"]),
    (
        "sheet",
        &[
            "underfoot sheet scenarios/roof-foot-level.toml -o sheet.html",
            "underfoot sheet scenarios/low-scaffold-short.toml --remedies --units us -o sheet.md",
        ],
    ),
    (
        "walk",
        &[
            "underfoot walk scenarios/walks/longer-or-shorter-lanyard.walk.toml",
            "underfoot walk scenarios/walks/stiffer-or-longer-rope.walk.toml --text",
        ],
    ),
    ("limits", &["underfoot limits --json"]),
    ("new", &["underfoot new -o my-roof.toml"]),
    ("schema", &["underfoot schema > scenario.schema.json"]),
    ("completions", &["underfoot completions bash > ~/.local/share/bash-completion/completions/underfoot"]),
    ("manual", &["underfoot manual > underfoot.1", "underfoot manual | man -l -"]),
];

/// Examples of the program as a whole.
const FIRST: &[&str] = &["underfoot scenarios/roof-foot-level.toml", "underfoot run scenarios/roof-foot-level.toml"];

/// The arguments with their examples.
pub fn command() -> clap::Command {
    let mut program = with_examples(Arguments::command(), FIRST);
    for (name, examples) in EXAMPLES {
        program = program.mut_subcommand(name, |command| with_examples(command, examples));
    }
    program
}

/// The examples below what already stands after the options.
fn with_examples(command: clap::Command, examples: &[&str]) -> clap::Command {
    let before = command.get_after_help().map(|text| format!("{text}\n\n")).unwrap_or_default();
    let head = if examples.len() == 1 { "Example:" } else { "Examples:" };
    command.after_help(format!("{before}{head}\n  {}", examples.join("\n  ")))
}
