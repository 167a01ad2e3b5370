//! Ctrl-C in commands that take long.
#![cfg(unix)]
#![expect(clippy::unwrap_used, reason = "a test stops at what it cannot have")]
use serde_json::Value;
use std::io::Read;
use std::process::{Command, Stdio};
use std::time::Duration;

const SWING: &str = "scenarios/swing-strikes-column.toml";

/// Runs a command that takes long, stops it after a while, and gives what it told and its results.
fn stopped(args: &[&str]) -> (String, Value) {
    let mut child = Command::new(env!("CARGO_BIN_EXE_underfoot"))
        .args(args)
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    std::thread::sleep(Duration::from_millis(1500));
    let id = child.id().to_string();
    assert!(Command::new("kill").args(["-INT", &id]).status().unwrap().success());
    let mut text = String::new();
    child.stdout.take().unwrap().read_to_string(&mut text).unwrap();
    let mut told = String::new();
    child.stderr.take().unwrap().read_to_string(&mut told).unwrap();
    assert_eq!(child.wait().unwrap().code(), Some(130), "{told}{text}");
    (told, serde_json::from_str(&text).unwrap())
}

#[test]
fn ctrl_c_ends_a_long_map_with_what_it_has() {
    let map = ["vary", SWING, "--over", "line.length", "--and", "place.anchor_offset", "--json"];
    let (told, value) = stopped(&[&map[..], &["--steps", "400", "--and-steps", "400"]].concat());
    assert!(told.contains("interrupted"), "{told}");
    assert_eq!(value["partial"], true);
    let rows = value["cells"].as_array().unwrap();
    assert!(!rows.is_empty() && rows.len() < 400);
    assert!(rows.iter().all(|row| row.as_array().unwrap().len() == 400));
    assert!(value["line"].as_array().unwrap().is_empty());
}

#[test]
fn ctrl_c_ends_a_search_for_remedies_with_what_it_has() {
    let (told, value) = stopped(&["remedy", SWING, "--worst", "--pairs", "--json"]);
    assert!(told.contains("interrupted"), "{told}");
    assert_eq!(value["partial"], true);
    assert!(value["cautions"][0].as_str().unwrap().contains("competent person"));
}
