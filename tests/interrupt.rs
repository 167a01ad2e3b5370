//! Ctrl-C and progress of a command that takes long.
#![cfg(unix)]
#![expect(clippy::unwrap_used, reason = "a test stops at what it cannot have")]
use std::io::{BufRead, BufReader, Read};
use std::process::{Command, Stdio};

/// A map of planar runs takes minutes; it is stopped as soon as it tells how far it is.
const LONG: [&str; 11] = [
    "vary",
    "scenarios/swing-strikes-column.toml",
    "--over",
    "line.length",
    "--and",
    "place.anchor_offset",
    "--steps",
    "400",
    "--and-steps",
    "400",
    "--json",
];

#[test]
fn ctrl_c_ends_a_long_map_with_what_it_has() {
    let mut child = Command::new(env!("CARGO_BIN_EXE_underfoot"))
        .args(LONG)
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    let mut told = String::new();
    BufReader::new(child.stderr.take().unwrap()).read_line(&mut told).unwrap();
    assert!(told.contains("of 160000 cells, about ") && told.contains(" s left"), "{told}");
    let id = child.id().to_string();
    assert!(Command::new("kill").args(["-INT", &id]).status().unwrap().success());
    let mut text = String::new();
    child.stdout.take().unwrap().read_to_string(&mut text).unwrap();
    assert_eq!(child.wait().unwrap().code(), Some(130));
    let value: serde_json::Value = serde_json::from_str(&text).unwrap();
    assert_eq!(value["partial"], true);
    let rows = value["cells"].as_array().unwrap();
    assert!(!rows.is_empty() && rows.len() < 400);
    assert!(rows.iter().all(|row| row.as_array().unwrap().len() == 400));
    assert!(value["line"].as_array().unwrap().is_empty());
}
