//! What is printed for editors, shells and readers, and the lists that the read-me carries.
//!
//! With `UNDERFOOT_BLESS=1` in the environment the lists of the read-me are written anew, to be read before they are kept.
#![allow(clippy::unwrap_used, reason = "helpers of tests fail loudly")]
use assert_cmd::Command;
use std::fmt::Write as _;
use std::path::Path;
use underfoot::cli::{commands_markdown, manual};
use underfoot::tui::key_rows;

fn underfoot(arguments: &[&str]) -> (i32, String, String) {
    let output = Command::cargo_bin("underfoot").unwrap().args(arguments).output().unwrap();
    let text = |bytes: Vec<u8>| String::from_utf8(bytes).unwrap();
    (output.status.code().unwrap(), text(output.stdout), text(output.stderr))
}

fn keys_markdown() -> String {
    let mut text = String::new();
    let mut heading = "";
    let rows = key_rows();
    let width = rows.iter().map(|(_, keys, _)| keys.len()).max().unwrap_or(0);
    for (group, keys, help) in &rows {
        if heading != *group {
            let gap = if heading.is_empty() { "" } else { "\n" };
            writeln!(text, "{gap}    {group}").unwrap();
            heading = group;
        }
        writeln!(text, "      {keys:width$}  {help}").unwrap();
    }
    text
}

/// The text between two marks of the read-me must be this; the marks stay.
fn stands_in_the_read_me(name: &str, expected: &str) {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("README.md");
    let text = std::fs::read_to_string(&path).unwrap();
    let (from, to) = (format!("<!-- {name} -->\n\n"), format!("\n<!-- end of {name} -->"));
    let start = text.find(&from).unwrap() + from.len();
    let end = start + text[start..].find(&to).unwrap();
    if std::env::var_os("UNDERFOOT_BLESS").is_some() && &text[start..end] != expected {
        std::fs::write(&path, format!("{}{expected}{}", &text[..start], &text[end..])).unwrap();
        return;
    }
    assert!(
        &text[start..end] == expected,
        "run the tests with UNDERFOOT_BLESS=1 and read the diff of README.md:\n{expected}"
    );
}

// One test for both, since both may write the same file.
#[test]
fn the_read_me_lists_every_command_and_every_key_as_the_program_has_them() {
    stands_in_the_read_me("commands", &commands_markdown());
    stands_in_the_read_me("keys", &keys_markdown());
}

#[test]
fn the_manual_has_every_command_every_key_and_the_cautions() {
    let (code, printed, _) = underfoot(&["manual"]);
    assert_eq!(code, 0);
    assert_eq!(printed, manual(&key_rows()).unwrap());
    assert!(printed.contains(".TH underfoot 1"));
    for command in
        ["VIEW", "RUN", "AUDIT", "VARY", "REMEDY", "COMPARE", "LIMITS", "NEW", "SCHEMA", "COMPLETIONS", "MANUAL"]
    {
        assert!(printed.contains(&format!(".SH \"UNDERFOOT {command}\"")), "{command}");
    }
    for (_, _, help) in key_rows() {
        let roff = help.replace('-', "\\-").replace('\'', "\\*(Aq");
        assert!(printed.contains(&roff), "{help}");
    }
    assert!(printed.contains(".SH CAUTIONS"));
}

// The examples of the help name files of this repository.
#[test]
fn every_file_of_an_example_is_shipped() {
    let (_, manual, _) = underfoot(&["manual"]);
    let plain = manual.replace("\\-", "-");
    let files: Vec<&str> = plain.split_whitespace().filter(|word| word.starts_with("scenarios/")).collect();
    assert!(files.len() >= 8, "{files:?}");
    for file in files.iter().filter(|file| !file.contains('*')) {
        assert!(Path::new(env!("CARGO_MANIFEST_DIR")).join(file).is_file(), "{file}");
    }
}

#[test]
fn every_shell_has_completions_that_name_the_commands() {
    for shell in ["bash", "zsh", "fish", "elvish", "powershell"] {
        let (code, printed, _) = underfoot(&["completions", shell]);
        assert_eq!(code, 0, "{shell}");
        for word in ["remedy", "compare", "vary", "audit"] {
            assert!(printed.contains(word), "{shell} lacks {word}");
        }
    }
}

#[test]
fn completions_of_an_unknown_shell_are_refused_with_the_known_ones() {
    let (code, printed, told) = underfoot(&["completions", "tcl"]);
    assert_eq!((code, printed.as_str()), (2, ""));
    assert!(told.contains("bash") && told.contains("fish"), "{told}");
}

#[test]
fn the_schema_command_prints_the_committed_schema() {
    let (code, printed, _) = underfoot(&["schema"]);
    let copy = Path::new(env!("CARGO_MANIFEST_DIR")).join("src/scenario/scenario.schema.json");
    assert_eq!(code, 0);
    assert_eq!(printed, std::fs::read_to_string(copy).unwrap());
}

#[test]
fn every_help_carries_the_caution_and_an_example() {
    let (_, listed, _) = underfoot(&["--help"]);
    assert!(listed.contains("underfoot run scenarios/"), "{listed}");
    for line in commands_markdown().lines() {
        let command = line.split_whitespace().nth(1).unwrap();
        let (code, help, _) = underfoot(&[command, "--help"]);
        assert_eq!(code, 0);
        let prints_no_number = ["schema", "completions", "manual"].contains(&command);
        assert!(help.contains("FIRST-PASS ESTIMATE") || prints_no_number, "{command}");
        assert!(help.contains("Example"), "{command}: {help}");
        assert!(help.contains(&format!("underfoot {command}")), "{command}");
    }
}
