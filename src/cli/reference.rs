//! `schema`, `completions` and `manual`: what editors, shells and readers need, all from the tables the program itself uses.
use super::examples::command;
use super::exit::Code;
use super::output;
use crate::scenario::schema;
use crate::sheet::{CAUTIONS, Layout, print};
use clap_complete::Shell;
use clap_mangen::Man;
use clap_mangen::roff::{Roff, bold, roman};
use std::io::{self, Write};

/// One key of the screen: the heading it stands below, its keys, what they do.
pub type KeyRow = (&'static str, String, &'static str);

/// Prints the JSON Schema of a scenario file.
pub fn print_schema() -> Code {
    output::results(&print(&schema(), Layout::Lines));
    Code::Holds
}

/// Prints the completions of a shell.
pub fn print_completions(shell: Shell) -> Code {
    let mut bytes = Vec::new();
    clap_complete::generate(shell, &mut command(), "underfoot", &mut bytes);
    output::results(&String::from_utf8_lossy(&bytes));
    Code::Holds
}

/// Prints the manual page; gives the exit code.
#[must_use]
pub fn print_manual(keys: &[KeyRow]) -> Code {
    match manual(keys) {
        Ok(text) => {
            output::results(&text);
            Code::Holds
        }
        Err(error) => {
            output::message(&format!("cannot lay the manual out: {error}"));
            Code::NotComputed
        }
    }
}

/// The manual page: the program, every command with its options, the keys of the screen and the cautions.
///
/// # Errors
/// When it cannot be laid out, which takes no more than memory.
pub fn manual(keys: &[KeyRow]) -> io::Result<String> {
    let mut program = command();
    program.build();
    let mut page = Vec::new();
    let main = Man::new(program.clone()).manual("scenario files and estimates");
    main.render_title(&mut page)?;
    main.render_name_section(&mut page)?;
    main.render_synopsis_section(&mut page)?;
    main.render_description_section(&mut page)?;
    for command in program.get_subcommands().filter(|command| command.get_name() != "help") {
        render_command(&mut page, command)?;
    }
    render_keys(&mut page, keys)?;
    main.render_extra_section(&mut page)?;
    main.render_version_section(&mut page)?;
    let mut cautions = Roff::new();
    cautions.control("SH", ["CAUTIONS"]);
    for caution in CAUTIONS {
        cautions.control("PP", []).text([roman(*caution)]);
    }
    cautions.to_writer(&mut page)?;
    Ok(String::from_utf8_lossy(&page).into_owned())
}

/// One command below a heading of its own; the headings inside are turned into lesser ones.
fn render_command(page: &mut impl Write, command: &clap::Command) -> io::Result<()> {
    let mut own = Vec::new();
    let man = Man::new(command.clone());
    man.render_description_section(&mut own)?;
    man.render_synopsis_section(&mut own)?;
    if command.get_arguments().any(|argument| argument.get_id() != "help") {
        man.render_options_section(&mut own)?;
    }
    if command.get_after_help().is_some() {
        man.render_extra_section(&mut own)?;
    }
    let mut head = Roff::new();
    head.control("SH", [format!("underfoot {}", command.get_name()).to_uppercase().as_str()]);
    head.to_writer(page)?;
    let own = String::from_utf8_lossy(&own).replace(".SH EXTRA", ".SH NOTES").replace(".SH ", ".SS ");
    // The lines that every rendering sets up again are in the page already.
    for line in own.lines().filter(|line| !line.starts_with(".ie ") && !line.starts_with(".el ")) {
        writeln!(page, "{line}")?;
    }
    Ok(())
}

fn render_keys(page: &mut impl Write, keys: &[KeyRow]) -> io::Result<()> {
    let mut roff = Roff::new();
    roff.control("SH", ["KEYS OF THE SCREEN"]);
    let mut heading = "";
    for (group, keys, help) in keys {
        if heading != *group {
            roff.control("SS", [*group]);
            heading = group;
        }
        roff.control("TP", []).text([bold(keys.as_str())]).text([roman(*help)]);
    }
    roff.to_writer(page)
}

/// The commands as the list that the read-me carries: one a line with its sentence.
#[must_use]
pub fn commands_markdown() -> String {
    let program = command();
    let rows: Vec<(String, String)> = program
        .get_subcommands()
        .map(|command| (usage(command), command.get_about().map(ToString::to_string).unwrap_or_default()))
        .collect();
    let width = rows.iter().map(|(usage, _)| usage.len()).max().unwrap_or(0);
    let lines: Vec<String> = rows.iter().map(|(usage, about)| format!("    {usage:width$}  {about}\n")).collect();
    lines.concat()
}

/// `underfoot vary FILE --over PATH`: the command with its files and what it cannot do without.
fn usage(command: &clap::Command) -> String {
    let needed = command.get_arguments().filter(|argument| argument.is_required_set() || argument.is_positional());
    let words = needed.map(|argument| {
        let value = argument.get_value_names().and_then(|names| names.first()).map(ToString::to_string);
        let value = value.unwrap_or_else(|| argument.get_id().as_str().to_uppercase());
        let many = argument.get_num_args().is_some_and(|range| range.max_values() > 1);
        let value = if many { format!("{value}..") } else { value };
        argument.get_long().map_or_else(|| value.clone(), |long| format!("--{long} {value}"))
    });
    std::iter::once(format!("underfoot {}", command.get_name())).chain(words).collect::<Vec<_>>().join(" ")
}
