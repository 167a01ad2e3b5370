//! The command line as a user or a script meets it: exit codes, streams, several files, closed pipes.
#![expect(clippy::unwrap_used, reason = "a test stops at what it cannot have")]

use assert_cmd::cargo::cargo_bin_cmd;
use predicates::prelude::*;
use std::fs;
use std::path::PathBuf;
use std::process::{Command, Stdio};
use tempfile::TempDir;

/// A person on an absorbing lanyard above a roof; `{…}` are replaced.
const FILE: &str = r#"
title = "Roof edge"
datum = "finished floor of level 0"

[subject]
kind = "person"
mass = "100 kg"
attachment_above_feet = "1.5 m"
stretch_allowance = "0.3 m"

[place]
standing = "12.0 m"
anchor = "13.5 m"

[line]
kind = "lanyard"
length = "2.0 m"
stiffness = "60 kN/m"
damping_ratio = 0.05
strength = "25 kN"

[absorber]
deploy_force = "4.0 kN"
stroke = "1.75 m"
rated_mass = "110 kg"
rated_free_fall = "4 m"

[anchor]
capacity = "25 kN"

[[obstacle]]
name = "plant-room roof"
top = "{top}"
reserve = "1 m"

[limits]
basis = "{basis}"
"#;

struct Folder(TempDir);

impl Folder {
    fn new() -> Self {
        Self(tempfile::tempdir().unwrap())
    }
    fn write(&self, name: &str, text: &str) -> PathBuf {
        let path = self.0.path().join(name);
        fs::create_dir_all(path.parent().unwrap()).unwrap();
        fs::write(&path, text).unwrap();
        path
    }
    fn holds(&self) -> PathBuf {
        self.write("holds.toml", &file("5 m", "eu-363"))
    }
    fn short(&self) -> PathBuf {
        self.write("short.toml", &file("8.5 m", "eu-363"))
    }
    fn faulty(&self) -> PathBuf {
        self.write("faulty.toml", &file("5 m", "eu-363").replace("100 kg", "100"))
    }
}

fn file(top: &str, basis: &str) -> String {
    FILE.replace("{top}", top).replace("{basis}", basis)
}

fn underfoot() -> assert_cmd::Command {
    let mut command = cargo_bin_cmd!("underfoot");
    command.env_remove("NO_COLOR").env_remove("CLICOLOR_FORCE");
    command
}

#[test]
fn run_ends_with_0_when_every_check_holds() {
    let folder = Folder::new();
    underfoot()
        .arg("run")
        .arg(folder.holds())
        .assert()
        .code(0)
        .stdout(predicate::str::contains("FIRST-PASS ESTIMATE").and(predicate::str::contains("o HOLDS")))
        .stderr("");
}

#[test]
fn run_ends_with_1_when_a_check_is_short_and_says_it_in_words() {
    let folder = Folder::new();
    underfoot().arg("run").arg(folder.short()).assert().code(1).stdout(
        predicate::str::contains("x SHORT  feet stop")
            .and(predicate::str::contains("above the plant-room roof, 1.00 m wanted"))
            .and(predicate::str::contains("m short)")),
    );
}

#[test]
fn run_ends_with_1_when_a_check_is_open() {
    let folder = Folder::new();
    let path = folder.write("open.toml", &file("5 m", "eu-363").replace("capacity = \"25 kN\"", ""));
    let open = predicate::str::contains("? OPEN").and(predicate::str::contains("`anchor.capacity`"));
    underfoot().arg("run").arg(path).assert().code(1).stdout(open);
}

#[test]
fn run_ends_with_2_for_faults_and_shows_the_place_on_stderr() {
    let folder = Folder::new();
    underfoot()
        .arg("run")
        .arg(folder.faulty())
        .assert()
        .code(2)
        .stdout("")
        .stderr(predicate::str::contains("faulty.toml:7:9").and(predicate::str::contains("mass = \"100\"")));
}

#[test]
fn an_unknown_set_is_a_fault_at_its_line_with_the_nearest_name() {
    let folder = Folder::new();
    let path = folder.write("basis.toml", &file("5 m", "eu-336"));
    for command in ["run", "audit"] {
        let output = underfoot().arg(command).arg(&path).assert().code(2).get_output().clone();
        let all = String::from_utf8([output.stdout, output.stderr].concat()).unwrap();
        assert!(all.contains("basis.toml:37:9") && all.contains("`eu-363`") && all.contains("`eu-336`"), "{all}");
    }
}

#[test]
fn what_cannot_be_read_ends_with_2_and_one_message() {
    let folder = Folder::new();
    let missing = folder.0.path().join("missing.toml");
    let bytes = folder.0.path().join("bytes.toml");
    fs::write(&bytes, [0xff, 0xfe, 0x00]).unwrap();
    for path in [missing, folder.0.path().to_owned(), bytes] {
        underfoot()
            .arg("run")
            .arg(&path)
            .assert()
            .code(2)
            .stdout("")
            .stderr(predicate::str::contains("cannot read").and(predicate::str::contains("panicked").not()));
    }
}

#[test]
fn an_empty_file_is_refused() {
    let folder = Folder::new();
    let path = folder.write("empty.toml", "");
    underfoot().arg("run").arg(path).assert().code(2).stdout("").stderr(predicate::str::contains("subject"));
}

#[test]
fn numbers_out_of_range_are_refused_or_said_never_passed() {
    let folder = Folder::new();
    for bad in ["nan kg", "inf kg", "1e308 kg", "-1 kg", "0 kg", "1e-300 kg"] {
        let path = folder.write("bad.toml", &file("5 m", "eu-363").replace("100 kg", bad));
        let output = underfoot().arg("run").arg(path).output().unwrap();
        let code = output.status.code().unwrap();
        assert!(code == 2 || code == 3, "{bad}: {code}");
        assert!(output.stdout.is_empty(), "{bad}");
        assert!(!String::from_utf8_lossy(&output.stderr).contains("panicked"), "{bad}");
    }
}

#[test]
fn several_files_are_all_processed_and_the_worst_code_counts() {
    let folder = Folder::new();
    let files = [folder.faulty(), folder.short(), folder.holds()];
    let output = underfoot().arg("run").arg("--json").args(&files).assert().code(2).get_output().clone();
    let text = String::from_utf8(output.stdout).unwrap();
    let verdicts: Vec<String> = text
        .lines()
        .map(|line| serde_json::from_str::<serde_json::Value>(line).unwrap()["verdict"].as_str().unwrap().to_owned())
        .collect();
    assert_eq!(verdicts, ["short", "holds"]);
    underfoot().arg("run").args(&files[1..]).assert().code(1).stdout(predicate::str::contains("FIRST-PASS").count(2));
}

#[test]
fn a_scenario_may_come_from_standard_input() {
    underfoot()
        .args(["run", "--json", "-"])
        .write_stdin(file("5 m", "eu-363"))
        .assert()
        .code(0)
        .stdout(predicate::str::contains("\"file\": \"standard input\""));
    underfoot().args(["run", "-"]).write_stdin("").assert().code(2).stderr(predicate::str::contains("standard input"));
}

#[test]
fn us_units_are_shown_when_asked_for() {
    let folder = Folder::new();
    let us = underfoot().args(["run", "--units", "us"]).arg(folder.short()).assert().code(1).get_output().clone();
    let text = String::from_utf8(us.stdout).unwrap();
    assert!(text.contains("3.28 ft wanted") && text.contains("lbf"), "{text}");
    underfoot().args(["run", "--units", "cubits"]).arg(folder.short()).assert().code(2);
}

#[test]
fn the_trace_is_csv_with_one_row_an_instant() {
    let folder = Folder::new();
    let output = underfoot().args(["run", "--csv"]).arg(folder.short()).assert().code(1).get_output().clone();
    let text = String::from_utf8(output.stdout).unwrap();
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let heads = reader.headers().unwrap().clone();
    assert_eq!(heads, vec!["time_s", "travel_m", "speed_m_per_s", "line_force_n", "mode", "deployed_m", "caution"]);
    let rows: Vec<csv::StringRecord> = reader.records().map(Result::unwrap).collect();
    assert!(rows.len() > 500 && rows.len() < 2500, "{}", rows.len());
    let times: Vec<f64> = rows.iter().map(|r| r[0].parse().unwrap()).collect();
    assert!(times.windows(2).all(|pair| pair[0] <= pair[1]));
    assert_eq!(times[0], 0.0);
    assert!(rows[0][6].contains("FIRST-PASS ESTIMATE"));
    for mode in ["falling", "taut", "deploying"] {
        assert!(rows.iter().any(|r| &r[4] == mode), "{mode}");
    }
    let falling = rows.iter().find(|r| &r[4] == "falling" && r[0].parse::<f64>().unwrap() > 0.1).unwrap();
    let (time, speed): (f64, f64) = (falling[0].parse().unwrap(), falling[2].parse().unwrap());
    assert!((speed - 9.80665 * time).abs() < 1e-9);
    underfoot().args(["run", "--csv"]).args([folder.short(), folder.holds()]).assert().code(2).stdout("");
    underfoot().args(["run", "--csv", "--json"]).arg(folder.short()).assert().code(2);
}

#[test]
fn audit_searches_folders_gives_one_verdict_a_file_and_counts() {
    let folder = Folder::new();
    folder.holds();
    folder.write("deep/er/short.toml", &file("8.5 m", "eu-363"));
    folder.faulty();
    folder.write("notes.txt", "not a scenario");
    let output = underfoot().arg("audit").arg(folder.0.path()).assert().code(2).get_output().clone();
    let text = String::from_utf8(output.stdout).unwrap();
    assert!(text.starts_with("FIRST-PASS ESTIMATE"), "{text}");
    assert_eq!(text.lines().last(), Some("3 files: 1 holds, 1 short, 1 refused"));
    assert!(text.contains("! REFUSED") && text.contains("x SHORT") && text.contains("o HOLDS"), "{text}");
    assert!(!text.contains("notes.txt"));
}

#[test]
fn audit_json_is_one_line_a_file_with_faults_doubts_and_margins() {
    let folder = Folder::new();
    let doubtful =
        folder.write("doubtful.toml", &file("5 m", "eu-363").replace("damping_ratio = 0.05", "damping_ratio = 1.5"));
    let missing = folder.0.path().join("missing.toml");
    let output = underfoot()
        .args(["audit", "--json"])
        .args([&doubtful, &folder.faulty(), &missing])
        .assert()
        .code(2)
        .stderr(predicate::str::contains("3 files:"))
        .get_output()
        .clone();
    let text = String::from_utf8(output.stdout).unwrap();
    let rows: Vec<serde_json::Value> = text.lines().map(|line| serde_json::from_str(line).unwrap()).collect();
    assert_eq!(rows.len(), 3);
    let doubts = rows[0]["doubts"].as_array().unwrap();
    assert!(doubts.iter().any(|d| d["message"].as_str().unwrap().contains("damping ratio")), "{doubts:?}");
    assert!(!rows[0]["margins"].as_array().unwrap().is_empty());
    assert_eq!(rows[1]["verdict"], "refused");
    assert_eq!((&rows[1]["faults"][0]["line"], &rows[1]["faults"][0]["column"]), (&7.into(), &9.into()));
    assert_eq!(rows[2]["verdict"], "unreadable");
    assert!(rows.iter().all(|row| !row["cautions"].as_array().unwrap().is_empty()));
}

#[test]
fn an_audit_of_a_folder_without_scenarios_is_wrong_input() {
    let folder = Folder::new();
    underfoot().arg("audit").arg(folder.0.path()).assert().code(2).stderr(predicate::str::contains("no `*.toml`"));
}

#[test]
fn limits_prints_text_and_json() {
    underfoot().arg("limits").assert().code(0).stdout(
        predicate::str::contains("eu-363")
            .and(predicate::str::contains("from memory, unverified"))
            .and(predicate::str::contains("where the sources disagree")),
    );
    let output = underfoot().args(["limits", "--json"]).output().unwrap();
    let value: serde_json::Value = serde_json::from_slice(&output.stdout).unwrap();
    assert_eq!(value["sets"].as_array().unwrap().len(), 12);
}

#[test]
fn new_prints_a_scenario_that_runs_and_never_overwrites() {
    let folder = Folder::new();
    let path = folder.0.path().join("fresh.toml");
    underfoot().args(["new", "-o"]).arg(&path).assert().code(0).stdout("");
    let written = fs::read_to_string(&path).unwrap();
    underfoot().arg("new").assert().code(0).stdout(written.clone());
    assert!(written.contains("FIRST-PASS ESTIMATE"));
    let code = underfoot().arg("run").arg(&path).output().unwrap().status.code();
    assert!(matches!(code, Some(0 | 1)), "{code:?}");
    fs::write(&path, "mine").unwrap();
    underfoot().args(["new", "-o"]).arg(&path).assert().code(2).stderr(predicate::str::contains("exists"));
    assert_eq!(fs::read_to_string(&path).unwrap(), "mine");
}

#[test]
fn a_closed_pipe_ends_quietly_with_the_code_of_the_verdict() {
    let folder = Folder::new();
    let (short, holds) = (folder.short(), folder.holds());
    let cases: [(&[&str], Option<&PathBuf>, i32); 5] = [
        (&["run"], Some(&short), 1),
        (&["run", "--csv"], Some(&holds), 0),
        (&["audit"], Some(&short), 1),
        (&["limits"], None, 0),
        (&["--help"], None, 0),
    ];
    for (args, path, code) in cases {
        let (reader, writer) = std::io::pipe().unwrap();
        drop(reader);
        let output = Command::new(assert_cmd::cargo::cargo_bin!("underfoot"))
            .args(args)
            .args(path)
            .stdout(writer)
            .stderr(Stdio::piped())
            .output()
            .unwrap();
        let messages = String::from_utf8(output.stderr).unwrap();
        assert_eq!(output.status.code(), Some(code), "{args:?}: {messages}");
        assert!(!messages.contains("panicked") && !messages.contains("pipe"), "{args:?}: {messages}");
    }
}

#[test]
fn colour_appears_only_when_it_is_forced_and_no_color_wins_over_a_pipe() {
    let folder = Folder::new();
    let short = folder.short();
    let plain = underfoot().arg("run").arg(&short).output().unwrap().stdout;
    assert!(!plain.contains(&0x1b));
    let forced = underfoot().env("CLICOLOR_FORCE", "1").arg("run").arg(&short).output().unwrap().stdout;
    assert!(forced.contains(&0x1b));
    let none = underfoot().env("NO_COLOR", "1").arg("run").arg(&short).output().unwrap().stdout;
    assert_eq!(none, plain);
}

#[test]
fn wrong_arguments_end_with_2_and_help_with_0() {
    underfoot().assert().code(2).stdout("");
    underfoot().arg("run").assert().code(2);
    underfoot().args(["audit", "--fast", "x"]).assert().code(2);
    underfoot().arg("--help").assert().code(0).stdout(predicate::str::contains("Exit codes"));
    underfoot().arg("--version").assert().code(0).stdout(predicate::str::contains(env!("CARGO_PKG_VERSION")));
}

#[test]
fn the_screen_without_a_terminal_points_to_run() {
    let folder = Folder::new();
    for args in [vec![], vec!["view"]] {
        let words = predicate::str::contains("needs a terminal").and(predicate::str::contains("underfoot run"));
        underfoot().args(args).arg(folder.holds()).assert().code(2).stdout("").stderr(words);
    }
}

#[test]
fn every_output_carries_a_caution_and_none_says_safe() {
    let folder = Folder::new();
    let (holds, short) = (folder.holds(), folder.short());
    let cases: [(&[&str], Option<&PathBuf>); 12] = [
        (&["run"], Some(&holds)),
        (&["run", "--units", "us"], Some(&short)),
        (&["run", "--json"], Some(&holds)),
        (&["run", "--csv"], Some(&holds)),
        (&["audit"], Some(&holds)),
        (&["audit", "--json"], Some(&short)),
        (&["limits"], None),
        (&["limits", "--json"], None),
        (&["new"], None),
        (&["--help"], None),
        (&["run", "--help"], None),
        (&["audit", "--help"], None),
    ];
    for (args, path) in cases {
        let output = underfoot().args(args).args(path).output().unwrap();
        let text = String::from_utf8(output.stdout).unwrap();
        let lower = text.to_lowercase();
        assert!(lower.contains("first-pass estimate"), "no caution: {args:?}");
        assert!(lower.contains("competent person"), "no caution: {args:?}");
        assert!(!lower.split(|c: char| !c.is_alphabetic()).any(|word| word == "safe" || word == "safely"), "{args:?}");
    }
}

#[test]
fn words_of_a_file_cannot_steer_the_terminal() {
    let folder = Folder::new();
    let evil = file("8.5 m", "eu-363")
        .replace("plant-room roof", "roof \\u001b[2J\\u0007")
        .replace("Roof edge", "a\\u001b[31m");
    let path = folder.write("evil.toml", &evil);
    for command in ["run", "audit"] {
        let output = underfoot().env("CLICOLOR_FORCE", "1").arg(command).arg(&path).output().unwrap();
        let text = String::from_utf8(output.stdout).unwrap();
        assert_eq!(output.status.code(), Some(1), "{command}");
        assert!(text.contains("roof \u{fffd}[2J"), "{command}: {text}");
        assert!(!text.contains("\u{1b}[2J") && !text.contains('\u{7}'), "{command}");
    }
}
