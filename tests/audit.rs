//! `audit` as a gate: which files, in which order, what passes, what is written, and what nonsense does.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
use assert_cmd::cargo::cargo_bin_cmd;
use serde_json::Value;
use std::fs;
use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};
use std::sync::LazyLock;
use tempfile::TempDir;

/// Its band is narrow enough for every check to hold at its ends.
static HOLDS: LazyLock<String> =
    LazyLock::new(|| include_str!("../scenarios/step-transfer.toml").replace("780..800..840 kg", "795..800..801 kg"));
const SHORT: &str = include_str!("../scenarios/low-scaffold-short.toml");

fn thin() -> String {
    HOLDS.replace("795..800..801 kg", "700..800..1600 kg")
}

struct Run {
    code: i32,
    out: String,
    err: String,
}

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
    /// Runs inside of the folder.
    fn audit(&self, args: &[&str]) -> Run {
        let output = cargo_bin_cmd!("underfoot").current_dir(self.0.path()).arg("audit").args(args).output().unwrap();
        Run {
            code: output.status.code().unwrap(),
            out: String::from_utf8(output.stdout).unwrap(),
            err: String::from_utf8(output.stderr).unwrap(),
        }
    }
    fn files(&self, args: &[&str]) -> Vec<String> {
        let lines = self.audit(&[&["--json"], args].concat()).out;
        lines.lines().map(|line| object(line)["file"].as_str().unwrap().to_owned()).collect()
    }
}

fn object(line: &str) -> Value {
    serde_json::from_str(line).unwrap_or_else(|error| panic!("{error}: {line}"))
}

#[test]
fn folders_patterns_and_files_are_looked_at_in_order_and_once() {
    let folder = Folder::new();
    for name in ["b.toml", "a.toml", "sub/c.toml", "sub/deep/d.toml", ".hidden/e.toml", "notes.txt"] {
        folder.write(name, &HOLDS);
    }
    assert_eq!(
        folder.files(&["sub", "b.toml", "."]),
        ["sub/c.toml", "sub/deep/d.toml", "b.toml", "./.hidden/e.toml", "./a.toml"]
    );
    assert_eq!(folder.files(&["*.toml"]), ["a.toml", "b.toml"]);
    assert_eq!(folder.files(&["**/*.toml"]), ["a.toml", "b.toml", "sub/c.toml", "sub/deep/d.toml"]);
    assert_eq!(folder.files(&["s*", "[ab].toml"]), ["sub/c.toml", "sub/deep/d.toml", "a.toml", "b.toml"]);
    assert_eq!(folder.files(&["sub/*"]), ["sub/c.toml", "sub/deep/d.toml"]);
    assert_eq!(folder.files(&["./sub/d?ep/"]), ["./sub/deep/d.toml"]);
    assert_eq!(folder.files(&["**"]), ["a.toml", "b.toml", "notes.txt", "sub/c.toml", "sub/deep/d.toml"]);
    assert_eq!(folder.files(&["a.toml", "./a.toml", "sub/../a.toml", "a.t?ml"]), ["a.toml"]);
    // A file of that very name is no pattern.
    folder.write("x[1].toml", &HOLDS);
    assert_eq!(folder.files(&["x[1].toml"]), ["x[1].toml"]);
}

#[test]
fn what_gives_no_file_is_told_and_is_wrong_input() {
    let folder = Folder::new();
    fs::create_dir(folder.0.path().join("empty")).unwrap();
    folder.write("a.toml", &HOLDS);
    for (path, words) in [
        ("empty", "no `*.toml` below `empty`"),
        ("*.nothing", "no file matches `*.nothing`"),
        ("a**b/[", "is no pattern"),
        ("absent.toml", ""),
    ] {
        let run = folder.audit(&[path, "a.toml"]);
        assert_eq!(run.code, 2, "{path}: {}", run.err);
        assert!(run.err.contains(words), "{path}: {}", run.err);
        assert!(run.out.contains("o HOLDS"), "{path}: the other file was not looked at");
    }
    assert!(folder.audit(&["absent.toml"]).out.contains("there is no such file"));
}

#[test]
fn a_thin_file_passes_only_where_thin_is_enough_and_a_short_one_never() {
    let folder = Folder::new();
    folder.write("holds.toml", &HOLDS);
    folder.write("thin.toml", &thin());
    folder.write("short.toml", SHORT);
    let code = |args: &[&str]| folder.audit(args).code;
    assert_eq!(code(&["holds.toml"]), 0);
    assert_eq!(code(&["thin.toml"]), 1);
    assert_eq!(code(&["thin.toml", "--require", "holds"]), 1);
    assert_eq!(code(&["thin.toml", "--require", "thin"]), 0);
    assert_eq!(code(&["short.toml", "--require", "thin"]), 1);
    assert_eq!(code(&["thin.toml", "absent.toml", "--require", "thin"]), 2);
    assert_eq!(code(&["thin.toml", "--require", "short"]), 2);
    assert_eq!(code(&[]), 2);
}

#[test]
fn the_table_at_the_end_has_one_line_a_file_and_the_counts() {
    let folder = Folder::new();
    folder.write("1 holds.toml", &HOLDS);
    folder.write("2 thin.toml", &thin());
    folder.write("3 short.toml", &SHORT.replace("rated_free_fall = \"4 m\"", ""));
    folder.write("4 refused.toml", "[subject]\nkind = \"person\"\n");
    let run = folder.audit(&["."]);
    assert_eq!(run.code, 2);
    let table = run.out.split("summary (governing check of each file)").nth(1).unwrap();
    let rows: Vec<&str> = table.lines().filter(|line| line.contains("./")).collect();
    assert_eq!(rows.len(), 4, "{table}");
    for (row, words) in rows.iter().zip([
        ["o holds", "line force x 4", "1 holds.toml"],
        ["~ thin", "-", "2 thin.toml"],
        ["x short", "clearance ground", "3 short.toml"],
        ["! refused", "-", "4 refused.toml"],
    ]) {
        assert!(words.iter().all(|word| row.contains(word)), "{row}");
    }
    assert!(table.contains("4 files: 1 holds, 1 thin, 1 short, 1 refused; "), "{table}");
    let brief = folder.audit(&["--brief", "."]);
    assert_eq!(brief.code, 2);
    assert!(brief.out.contains("FIRST-PASS ESTIMATE") && brief.out.contains(table.trim()), "{}", brief.out);
    assert!(!brief.out.contains("O HOLDS") && brief.out.lines().count() < 12, "{}", brief.out);
}

#[test]
fn the_bands_are_searched_where_the_typical_values_hold_and_no_sample_is_drawn() {
    let folder = Folder::new();
    folder.write("thin.toml", &thin());
    folder.write("short.toml", &SHORT.replace("\"100 kg\"", "\"80..100..120 kg\""));
    let run = folder.audit(&["--json", "thin.toml", "short.toml"]);
    let lines: Vec<Value> = run.out.lines().map(object).collect();
    assert_eq!((&lines[0]["verdict"], &lines[0]["bands_searched"]), (&"thin".into(), &true.into()));
    assert!(lines[0]["bands"]["search"]["runs"].as_u64().unwrap() > 100);
    assert_eq!(lines[0]["bands"]["sample"]["samples"], 0);
    assert_eq!((&lines[1]["verdict"], &lines[1]["bands_searched"]), (&"short".into(), &false.into()));
    assert!(lines[1]["bands"].is_null());
    for (line, searched) in lines.iter().zip([true, false]) {
        let margins = line["margins"].as_array().unwrap();
        assert!(!margins.is_empty() && margins.iter().all(|margin| margin["bands_searched"] == searched), "{line}");
    }
    assert!(
        folder
            .audit(&["short.toml"])
            .out
            .contains("the bands were not searched: the typical values do not hold, or cannot be judged")
    );
    assert!(folder.audit(&["thin.toml"]).out.contains("no sample was drawn"));
}

#[test]
fn accepted_doubts_are_listed_with_their_reason_in_text_and_json() {
    let folder = Folder::new();
    let text = HOLDS.replace("reserve = \"0.1 m\"", "")
        + "\n[[accept]]\ndoubt = \"reserve-missing\"\nwhy = \"the bench is moved first\"\n";
    folder.write("a.toml", &text);
    let run = folder.audit(&["a.toml"]);
    assert!(run.out.contains("doubts that the file accepts: 1"), "{}", run.out);
    assert!(run.out.contains("reserve-missing at obstacle.1") && run.out.contains("the bench is moved first"));
    assert!(!run.out.contains("doubtful inputs"), "{}", run.out);
    let line = object(&folder.audit(&["--json", "a.toml"]).out);
    let doubt = &line["doubts"][0];
    assert_eq!((&doubt["id"], &doubt["accepted"]), (&"reserve-missing".into(), &"the bench is moved first".into()));
    assert_eq!(doubt["path"], "obstacle.1");
}

#[test]
fn explain_prints_one_lists_all_and_helps_with_a_near_miss() {
    let folder = Folder::new();
    let one = folder.audit(&["--explain", "reserve-missing"]);
    assert_eq!((one.code, one.err.as_str()), (0, ""));
    assert!(one.out.contains("FIRST-PASS ESTIMATE") && one.out.contains("[[accept]]"), "{}", one.out);
    let all = folder.audit(&["--explain"]);
    assert_eq!(all.code, 0);
    for rule in underfoot::scenario::DOUBT_RULES {
        assert!(all.out.contains(rule.id), "{}", rule.id);
    }
    let wrong = folder.audit(&["--explain", "reserve-mising"]);
    assert_eq!(wrong.code, 2);
    assert!(wrong.err.contains("did you mean `reserve-missing`?") && wrong.out == all.out, "{}", wrong.err);
    assert_eq!(folder.audit(&["--explain", "x", "y.toml"]).code, 2);
    assert!(folder.audit(&["--explain", "check-thin"]).out.contains("worst found"));
}

#[test]
fn the_same_files_give_the_same_bytes_on_any_number_of_threads() {
    let folder = Folder::new();
    for n in 0..40 {
        let mass = 700 + n * 10;
        folder.write(
            &format!("{n:02}.toml"),
            &HOLDS.replace("795..800..801", &format!("{mass}..{}..{}", mass + 9, mass + 200)),
        );
    }
    for form in [&["."][..], &["--json", "."], &["--sarif", "."], &["--brief", "."]] {
        let of = |threads: &str| {
            let mut command = cargo_bin_cmd!("underfoot");
            command.current_dir(folder.0.path()).env("RAYON_NUM_THREADS", threads).arg("audit").args(form);
            command.output().unwrap().stdout
        };
        assert!(!of("1").is_empty() && of("1") == of("3"), "{form:?}");
    }
}

#[test]
fn nonsense_is_told_and_ends_nothing() {
    let folder = Folder::new();
    folder.write("good.toml", &HOLDS);
    folder.write("huge.toml", &HOLDS.replace("\"6 m\"", "\"1e308 m\""));
    fs::write(folder.0.path().join("binary.toml"), [0_u8, 159, 146, 150, 255, 0, 10]).unwrap();
    folder.write("empty.toml", "");
    folder.write("folder.toml/inside.toml", &HOLDS);
    let run = folder.audit(&["--json", "."]);
    assert_eq!(run.code, 2, "{}", run.err);
    let verdicts: Vec<(String, String)> = run
        .out
        .lines()
        .map(|line| {
            (object(line)["file"].as_str().unwrap().to_owned(), object(line)["verdict"].as_str().unwrap().to_owned())
        })
        .collect();
    let expected = [
        ("./binary.toml", "unreadable"),
        ("./empty.toml", "refused"),
        ("./folder.toml/inside.toml", "holds"),
        ("./good.toml", "holds"),
        ("./huge.toml", "refused"),
    ];
    assert_eq!(verdicts, expected.map(|(file, verdict)| (file.to_owned(), verdict.to_owned())));
}

#[cfg(unix)]
#[test]
fn links_pipes_and_what_is_not_permitted_do_not_hang_or_end_the_audit() {
    use std::os::unix::fs::{PermissionsExt, symlink};
    let folder = Folder::new();
    let root = folder.0.path();
    let good = folder.write("good.toml", &HOLDS);
    symlink("loop.toml", root.join("loop.toml")).unwrap();
    symlink(root, root.join("again")).unwrap();
    symlink(root, root.join("again.toml")).unwrap();
    symlink(&good, root.join("same.toml")).unwrap();
    assert!(Command::new("mkfifo").arg(root.join("pipe.toml")).status().unwrap().success());
    let secret = folder.write("secret.toml", &HOLDS);
    fs::set_permissions(&secret, fs::Permissions::from_mode(0o000)).unwrap();
    let run = folder.audit(&["--json", "."]);
    assert_eq!(run.code, 2);
    assert!(run.err.contains("`./pipe.toml` is no regular file"), "{}", run.err);
    let of = |file: &str| {
        let line = run.out.lines().map(object).find(|line| line["file"] == file);
        line.map(|line| line["verdict"].as_str().unwrap().to_owned())
    };
    assert_eq!(of("./good.toml").as_deref(), Some("holds"));
    assert_eq!(of("./same.toml"), None);
    // A pattern that searches below follows no link to a folder, one that names its depth does.
    assert_eq!(folder.files(&["**/good.toml"]), ["good.toml"]);
    assert_eq!(folder.files(&["**/g*.toml", "a*/good.toml"]), ["good.toml"]);
    assert_eq!(folder.files(&["a*n/good.toml"]), ["again/good.toml"]);
    assert_eq!(of("./loop.toml").as_deref(), Some("unreadable"));
    assert_eq!(of("./again.toml").as_deref(), Some("unreadable"));
    // A superuser may read it all the same.
    let readable = fs::read(&secret).is_ok();
    assert_eq!(of("./secret.toml").as_deref(), Some(if readable { "holds" } else { "unreadable" }));
}

#[test]
fn a_closed_pipe_ends_quietly_with_the_code_of_the_files() {
    let folder = Folder::new();
    folder.write("short.toml", SHORT);
    for form in [&["short.toml"][..], &["--sarif", "short.toml"], &["--json", "short.toml"]] {
        let mut child = Command::new(assert_cmd::cargo::cargo_bin!("underfoot"))
            .current_dir(folder.0.path())
            .arg("audit")
            .args(form)
            .stdout(Stdio::piped())
            .stderr(Stdio::piped())
            .spawn()
            .unwrap();
        drop(child.stdout.take());
        let output = child.wait_with_output().unwrap();
        let words = String::from_utf8(output.stderr).unwrap();
        assert_eq!(output.status.code(), Some(1), "{form:?} {words}");
        assert!(!words.contains("panic") && !words.contains("pipe"), "{words}");
    }
}

#[test]
fn of_very_many_files_only_those_that_do_not_hold_are_listed() {
    use underfoot::quantity::UnitSystem;
    use underfoot::sheet::{AuditTable, Audited, Finding, MOST_LISTED, Paint, Summary, report};
    let scenario = underfoot::scenario::read("t", &HOLDS).unwrap();
    let report = report("t", &HOLDS, &scenario).unwrap();
    let review = underfoot::scenario::review("t", &HOLDS, &scenario, None);
    let of = |name: &str, finding: Finding| {
        Summary::of(&Audited { file: name.to_owned(), uri: name.to_owned(), finding }, UnitSystem::Metric)
    };
    let mut table = AuditTable::default();
    for _ in 0..MOST_LISTED + 500 {
        table.push(of("holds.toml", Finding::Judged(Box::new(report.clone()), review.clone())));
    }
    table.push(of("bad.toml", Finding::Unreadable("x".to_owned())));
    let text = table.text(MOST_LISTED + 501, Paint::Plain);
    assert_eq!(text.matches("holds.toml").count(), MOST_LISTED);
    assert!(text.contains("bad.toml") && text.contains("500 more files are counted below and not listed"), "{text}");
    assert!(!text.contains("PARTIAL"));
    assert!(table.text(9999, Paint::Plain).contains("PARTIAL: interrupted after 1501 of 9999 files"));
}

#[cfg(unix)]
#[test]
fn ctrl_c_writes_what_is_finished_marks_it_and_ends_with_130() {
    let folder = Folder::new();
    let wide = HOLDS
        .replace("795..800..801 kg", "700..800..840 kg")
        .replace("\"6 m\"", "\"5..6..7 m\"")
        .replace("0.02", "\"0.01..0.02..0.03\"");
    for n in 0..1000 {
        folder.write(&format!("{n:04}.toml"), &wide);
    }
    let spawn = |form: &str| {
        Command::new(assert_cmd::cargo::cargo_bin!("underfoot"))
            .current_dir(folder.0.path())
            .args(["audit", form, "."])
            .env("RAYON_NUM_THREADS", "1")
            .stdout(Stdio::piped())
            .stderr(Stdio::piped())
            .spawn()
            .unwrap()
    };
    for form in ["--brief", "--sarif", "--json"] {
        let mut child = spawn(form);
        // The first bytes are written once Ctrl-C is listened to.
        let mut first = [0_u8; 1];
        std::io::Read::read_exact(child.stdout.as_mut().unwrap(), &mut first).unwrap();
        let pressed = Command::new("kill").args(["-INT", &child.id().to_string()]).status().unwrap();
        assert!(pressed.success());
        let output = child.wait_with_output().unwrap();
        let out = String::from_utf8([&first[..], &output.stdout].concat()).unwrap();
        let err = String::from_utf8(output.stderr).unwrap();
        assert_eq!(output.status.code(), Some(130), "{form}: {err}");
        assert!(err.contains("of 1000 files were looked at, the results are a part only"), "{err}");
        if form == "--brief" {
            assert!(out.contains("PARTIAL: interrupted after"), "{out}");
        } else if form == "--json" {
            let last = object(out.lines().last().unwrap());
            assert_eq!((&last["interrupted"], &last["of"]), (&true.into(), &1000.into()));
            assert_eq!(last["files"].as_u64().unwrap() + 1, out.lines().count() as u64);
        } else {
            let invocation = &object(&out)["runs"][0]["invocations"][0];
            assert_eq!((&invocation["executionSuccessful"], &invocation["exitCode"]), (&false.into(), &130.into()));
        }
    }
}

#[test]
fn the_shipped_scenarios_pass_the_gate_where_they_should() {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR"));
    let output =
        cargo_bin_cmd!("underfoot").current_dir(folder).args(["audit", "--brief", "scenarios/*.toml"]).output();
    let output = output.unwrap();
    let out = String::from_utf8(output.stdout).unwrap();
    assert_eq!(output.status.code(), Some(1), "{out}");
    assert!(out.contains("x short") && !out.contains("! ") && !out.contains("? open"), "{out}");
}
