//! The command `spread`: its three formats, threads, options, Ctrl-C.
#![allow(clippy::unwrap_used, clippy::panic, reason = "a test stops at what it cannot have")]
use assert_cmd::cargo::cargo_bin_cmd;
use predicates::prelude::*;
use serde_json::Value;
use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};
use std::time::Duration;

fn shipped(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios").join(name)
}

/// Exit code and standard output.
fn spread(name: &str, args: &[&str]) -> (i32, String) {
    let output = cargo_bin_cmd!("underfoot").arg("spread").arg(shipped(name)).args(args).output().unwrap();
    (output.status.code().unwrap(), String::from_utf8(output.stdout).unwrap())
}

fn object(text: &str) -> Value {
    serde_json::from_str(text).unwrap_or_else(|error| panic!("{error}: {text}"))
}

#[test]
fn one_two_and_eight_threads_print_the_same_bytes_in_every_format() {
    for format in [&["--json"][..], &["--csv"], &[]] {
        let on = |threads: &str| {
            let mut command = cargo_bin_cmd!("underfoot");
            command.env("RAYON_NUM_THREADS", threads).arg("spread").arg(shipped("timber-beam-harness.toml"));
            let output = command.args(["--samples", "1500", "--seed", "3"]).args(format).output().unwrap();
            assert_eq!(output.status.code(), Some(0));
            output.stdout
        };
        let one = on("1");
        assert!(!one.is_empty());
        assert_eq!(one, on("2"), "{format:?}");
        assert_eq!(one, on("8"), "{format:?}");
    }
}

#[test]
fn another_seed_is_another_sample_and_is_said() {
    let (_, a) = spread("overhead-anchor.toml", &["--json", "--samples", "300", "--seed", "1"]);
    let (_, b) = spread("overhead-anchor.toml", &["--json", "--samples", "300", "--seed", "9007199254740991"]);
    let (a, b) = (object(&a), object(&b));
    assert_eq!(b["bands"]["sample"]["seed"], 9_007_199_254_740_991_u64);
    assert_ne!(a["numbers"]["arrest_distance"], b["numbers"]["arrest_distance"]);
    assert_eq!(a["margins"][0]["worst"], b["margins"][0]["worst"], "the search has no seed");
}

#[test]
fn json_counts_every_sample_and_ranks_every_check() {
    let (code, text) = spread("overhead-anchor.toml", &["--json", "--samples", "2048"]);
    let object = object(&text);
    assert_eq!((code, &object["verdict"], &object["partial"]), (0, &"holds".into(), &false.into()));
    assert!(object["cautions"].as_array().unwrap().len() > 2);
    let margins = object["margins"].as_array().unwrap();
    for margin in margins {
        let counts = margin["samples"].as_object().unwrap();
        let sum: u64 = counts.values().map(|count| count.as_u64().unwrap()).sum();
        assert_eq!((sum, counts.len()), (2048, 4), "{margin}");
    }
    for (id, number) in object["numbers"].as_object().unwrap() {
        let bars = number["histogram"]["counts"].as_array().unwrap();
        let sum: u64 = bars.iter().map(|bar| bar.as_u64().unwrap()).sum();
        assert_eq!(sum + number["missing"].as_u64().unwrap(), 2048, "{id}");
    }
    let ranking = object["ranking"].as_array().unwrap();
    assert_eq!(ranking.len(), margins.len());
    // The arrest force is that of the absorber: nothing else moves it.
    let force = ranking.iter().find(|r| r["id"] == "arrest_force").unwrap();
    assert_eq!(force["bars"][0]["path"], "absorber.deploy_force");
    let shares = force["variance_shares"]["inputs"].as_array().unwrap();
    let absorber = shares.iter().find(|share| share["path"] == "absorber.deploy_force").unwrap();
    assert!((absorber["first_order"]["value"].as_f64().unwrap() - 1.0).abs() < 1e-2, "{absorber}");
    assert!((absorber["total"]["value"].as_f64().unwrap() - 1.0).abs() < 1e-2, "{absorber}");
}

#[test]
fn a_thin_scenario_ends_with_one_and_text_shows_all_parts() {
    let (code, text) = spread("step-transfer.toml", &["--samples", "512"]);
    assert_eq!(code, 1);
    for part in [
        "FIRST-PASS ESTIMATE",
        "~ THIN",
        "subject.mass                       780 kg .. 800 kg .. 840 kg uniform",
        "within the bands",
        "samples by verdict",
        "0 of 512 samples gave no numbers",
        "key numbers over the samples",
        "which input matters to the room of: line force x 4",
        "one band only",
        "cautions",
    ] {
        assert!(text.contains(part), "{part} is not in\n{text}");
    }
    assert!(text.lines().all(|line| line.chars().count() <= 100), "{text}");
}

#[test]
fn csv_has_one_value_a_line_and_carries_the_caution() {
    let (_, text) = spread("overhead-anchor.toml", &["--csv", "--samples", "256"]);
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let rows: Vec<csv::StringRecord> = reader.records().map(Result::unwrap).collect();
    assert!(rows[0][5].contains("NOT A DESIGN") && rows[1][5].is_empty());
    let count = |row: &str| rows.iter().filter(|r| &r[0] == row).count();
    assert!(rows.iter().any(|r| &r[2] == "samples" && &r[3] == "256"));
    for row in
        ["check", "worst_at", "samples", "number", "quantile", "histogram", "bar_low", "first_order", "total_high"]
    {
        assert!(count(row) > 0, "{row}");
    }
}

#[test]
fn a_file_without_a_band_says_what_to_do() {
    let (code, text) = spread("low-stretch-rope.toml", &[]);
    let words: String = text.split_whitespace().collect::<Vec<_>>().join(" ");
    assert_eq!(code, 0);
    assert!(words.contains("no input is a band, so nothing spreads; write what is not known"), "{text}");
    let (_, json) = spread("low-stretch-rope.toml", &["--json"]);
    assert!(object(&json)["hint"].as_str().unwrap().contains("no input is a band"));
    assert_eq!(object(&json)["partial"], false);
}

#[test]
fn nonsense_options_are_refused() {
    for args in [
        &["--samples", "0"][..],
        &["--samples", "1000001"],
        &["--samples", "-5"],
        &["--samples", "1e3"],
        &["--seed", "-1"],
        &["--seed", "9007199254740992"],
        &["--json", "--csv"],
    ] {
        let mut command = cargo_bin_cmd!("underfoot");
        let assert = command.arg("spread").arg(shipped("overhead-anchor.toml")).args(args).assert();
        assert.code(2).stdout(predicate::str::is_empty());
    }
}

#[test]
fn the_file_states_the_sample_and_the_option_goes_before_it() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("stated.toml");
    let text = std::fs::read_to_string(shipped("overhead-anchor.toml")).unwrap();
    std::fs::write(&path, format!("{text}\n[study]\nsamples = 333\nseed = 44\n")).unwrap();
    let sample = |args: &[&str]| {
        let output = cargo_bin_cmd!("underfoot").arg("spread").arg(&path).arg("--json").args(args).output().unwrap();
        let sample = object(&String::from_utf8(output.stdout).unwrap())["bands"]["sample"].clone();
        (sample["samples"].as_u64().unwrap(), sample["seed"].as_u64().unwrap())
    };
    assert_eq!(sample(&[]), (333, 44));
    assert_eq!(sample(&["--samples", "100", "--seed", "2"]), (100, 2));
}

#[test]
fn a_closed_pipe_ends_quietly() {
    let binary = assert_cmd::cargo::cargo_bin!("underfoot");
    let mut child = Command::new(binary)
        .args(["spread", "--samples", "200"])
        .arg(shipped("overhead-anchor.toml"))
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    drop(child.stdout.take());
    let output = child.wait_with_output().unwrap();
    assert_eq!(output.status.code(), Some(0));
    assert_eq!(String::from_utf8(output.stderr).unwrap(), "");
}

/// Starts a sample far longer than the test, interrupts it, and gives exit code, standard output and messages.
#[cfg(unix)]
fn interrupted(args: &[&str]) -> (Option<i32>, String, String) {
    let binary = assert_cmd::cargo::cargo_bin!("underfoot");
    let child = Command::new(binary).args(args).stdout(Stdio::piped()).stderr(Stdio::piped()).spawn().unwrap();
    std::thread::sleep(Duration::from_secs(2));
    let sent = Command::new("kill").args(["-INT", &child.id().to_string()]).status().unwrap();
    assert!(sent.success());
    let output = child.wait_with_output().unwrap();
    let text = |bytes| String::from_utf8(bytes).unwrap();
    (output.status.code(), text(output.stdout), text(output.stderr))
}

#[cfg(unix)]
#[test]
fn ctrl_c_prints_what_there_is_and_marks_it() {
    let file = shipped("timber-beam-harness.toml").display().to_string();
    let start = |format: &[&str]| interrupted(&[&["spread", &file, "--samples", "1000000"][..], format].concat());
    let (code, json, message) = start(&["--json"]);
    assert_eq!(code, Some(130), "{message}");
    assert!(message.contains("interrupted"), "{message}");
    let object = object(&json);
    assert_eq!((&object["partial"], &object["bands"]["partial"]), (&true.into(), &true.into()));
    let sample = &object["bands"]["sample"];
    assert!(sample["samples"].as_u64().unwrap() < 1_000_000 && sample["asked"] == 1_000_000, "{sample}");
    let (code, text, _) = start(&[]);
    assert_eq!(code, Some(130));
    assert!(text.contains("PARTIAL: stopped early"), "{text}");
    let (code, csv, _) = start(&["--csv"]);
    assert_eq!(code, Some(130));
    assert!(csv.contains("study,,partial,true"), "{csv}");
}

#[cfg(unix)]
#[test]
fn ctrl_c_stops_a_run_and_the_files_after_it() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("long.toml");
    let text = std::fs::read_to_string(shipped("timber-beam-harness.toml")).unwrap();
    std::fs::write(&path, format!("{text}\n[study]\nsamples = 1000000\n")).unwrap();
    let file = path.display().to_string();
    let (code, json, message) = interrupted(&["run", "--json", &file, &file]);
    assert_eq!(code, Some(130), "{message}");
    assert_eq!(json.lines().count(), 1, "the second file was still run");
    assert_eq!(object(&json)["bands"]["partial"], true);
}
