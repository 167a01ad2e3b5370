//! The command `sheet`: where it writes, what it refuses, what it tells.
#![allow(clippy::expect_used, clippy::panic, clippy::unwrap_used, reason = "a test fails by panicking")]
use assert_cmd::Command;
use std::fs;
use std::path::Path;

fn sheet(args: &[&str]) -> (Option<i32>, String, String) {
    let run = Command::cargo_bin("underfoot").unwrap().arg("sheet").args(args).output().unwrap();
    let text = |bytes: &[u8]| String::from_utf8_lossy(bytes).into_owned();
    (run.status.code(), text(&run.stdout), text(&run.stderr))
}

const FILE: &str = "scenarios/low-scaffold-short.toml";

fn names(folder: &Path) -> Vec<String> {
    let mut names: Vec<String> =
        fs::read_dir(folder).unwrap().map(|e| e.unwrap().file_name().into_string().unwrap()).collect();
    names.sort();
    names
}

#[test]
fn the_ending_says_what_is_written_and_the_exit_code_tells_the_verdict() {
    let folder = tempfile::tempdir().unwrap();
    for (name, start) in [("a.html", "<!DOCTYPE html>"), ("a.md", "# Calculation sheet"), ("a.json", "{")] {
        let out = folder.path().join(name);
        let (code, stdout, stderr) = sheet(&[FILE, "-o", out.to_str().unwrap()]);
        assert_eq!((code, stdout.as_str()), (Some(1), ""), "{stderr}");
        assert!(stderr.contains("short"), "{stderr}");
        assert!(fs::read_to_string(&out).unwrap().starts_with(start));
    }
    assert_eq!(names(folder.path()), ["a.html", "a.json", "a.md"], "something was left beside the sheets");
    let out = folder.path().join("b.md");
    assert_eq!(sheet(&["scenarios/overhead-anchor.toml", "-o", out.to_str().unwrap()]).0, Some(0));
}

#[test]
fn a_thin_sheet_tells_the_worst_found_and_that_remedies_are_of_typical_values() {
    let folder = tempfile::tempdir().unwrap();
    let out = folder.path().join("a.md");
    let (code, _, stderr) = sheet(&["scenarios/step-transfer.toml", "--remedies", "-o", out.to_str().unwrap()]);
    assert!(code == Some(1) && stderr.contains("thin"), "{code:?} {stderr}");
    let text = fs::read_to_string(&out).unwrap();
    let part = |head: &str| {
        let after = text.split_once(head).unwrap().1;
        after.split("\n## ").next().unwrap().to_owned()
    };
    assert!(part("Verdict\n").contains("; at the worst found "), "{}", part("Verdict\n"));
    let remedies = part("Nearest values at which every check holds\n");
    for words in ["Within the bands that is not so, the verdict is thin", "Spread and ranking", "remedy --worst"] {
        assert!(remedies.contains(words), "{words}: {remedies}");
    }
}

#[test]
fn a_sheet_goes_to_a_file_with_an_ending_that_is_known() {
    let folder = tempfile::tempdir().unwrap();
    let odd = folder.path().join("a.pdf");
    for args in [vec![FILE], vec![FILE, "-o", "-"], vec![FILE, "-o", odd.to_str().unwrap()]] {
        let (code, stdout, stderr) = sheet(&args);
        assert_eq!((code, stdout.as_str()), (Some(2), ""), "{args:?}");
        assert!(stderr.contains(".html"), "{stderr}");
    }
    assert!(names(folder.path()).is_empty());
}

#[test]
fn a_sheet_that_exists_is_left_unless_it_is_to_be_replaced() {
    let folder = tempfile::tempdir().unwrap();
    let out = folder.path().join("a.md");
    fs::write(&out, "mine").unwrap();
    let (code, _, stderr) = sheet(&[FILE, "-o", out.to_str().unwrap()]);
    assert_eq!(code, Some(2));
    assert!(stderr.contains("`--replace`"), "{stderr}");
    assert_eq!(fs::read_to_string(&out).unwrap(), "mine");
    assert_eq!(sheet(&[FILE, "-o", out.to_str().unwrap(), "--replace"]).0, Some(1));
    assert!(fs::read_to_string(&out).unwrap().starts_with("# Calculation sheet"));
    assert_eq!(names(folder.path()), ["a.md"]);
}

#[test]
fn a_place_that_cannot_be_written_is_told() {
    let (code, _, stderr) = sheet(&[FILE, "-o", "/nowhere/at/all/a.html"]);
    assert_eq!(code, Some(2));
    assert!(stderr.contains("cannot write `/nowhere/at/all/a.html`"), "{stderr}");
}

#[test]
fn a_file_with_faults_gives_no_sheet() {
    let folder = tempfile::tempdir().unwrap();
    let (bad, out) = (folder.path().join("bad.toml"), folder.path().join("a.html"));
    fs::write(&bad, "[subject]\nkind = \"person\"\n").unwrap();
    assert_eq!(sheet(&[bad.to_str().unwrap(), "-o", out.to_str().unwrap()]).0, Some(2));
    assert!(!out.exists());
}

#[test]
fn the_command_on_the_sheet_makes_it_again_under_any_name() {
    let folder = tempfile::tempdir().unwrap();
    let [a, b] = ["a.md", "b.md"].map(|name| folder.path().join(name));
    for out in [&a, &b] {
        sheet(&[FILE, "--units", "us", "--remedies", "-o", out.to_str().unwrap()]);
    }
    let text = fs::read_to_string(&a).unwrap();
    assert_eq!(text, fs::read_to_string(&b).unwrap());
    assert!(text.contains(&format!("underfoot sheet {FILE} --units us --remedies -o OUT.md")), "{text}");
}

#[cfg(unix)]
#[test]
fn a_sheet_may_be_read_by_those_who_may_read_any_new_file() {
    use std::os::unix::fs::PermissionsExt;
    let folder = tempfile::tempdir().unwrap();
    let [sheet_of, plain] = ["a.md", "plain"].map(|name| folder.path().join(name));
    sheet(&[FILE, "-o", sheet_of.to_str().unwrap()]);
    fs::write(&plain, "").unwrap();
    let mode = |path: &Path| fs::metadata(path).unwrap().permissions().mode();
    assert_eq!(mode(&sheet_of), mode(&plain));
}
