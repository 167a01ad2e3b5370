//! `audit --sarif` against the properties that SARIF 2.1.0 (OASIS, 27 March 2020) requires. The clauses are named from
//! memory: neither the standard nor its schema is at hand where these tests run.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
use assert_cmd::cargo::cargo_bin_cmd;
use serde_json::Value;
use std::collections::HashSet;
use std::fs;
use std::path::Path;
use std::sync::LazyLock;
use tempfile::TempDir;
use underfoot::sheet::file_uri;

/// Its band is narrow enough for every check to hold at its ends.
static HOLDS: LazyLock<String> =
    LazyLock::new(|| include_str!("../scenarios/step-transfer.toml").replace("780..800..840 kg", "795..800..801 kg"));
const SHORT: &str = include_str!("../scenarios/low-scaffold-short.toml");

/// A folder with one file of each kind, and the log of its audit.
fn log() -> (TempDir, Value) {
    let folder = tempfile::tempdir().unwrap();
    let write = |name: &str, text: &str| fs::write(folder.path().join(name), text).unwrap();
    write("holds.toml", &HOLDS);
    write("short é #1%.toml", &SHORT.replace("rated_free_fall = \"4 m\"", ""));
    write("thin.toml", &HOLDS.replace("795..800..801 kg", "700..800..1600 kg"));
    write("open.toml", &HOLDS.replace("strength = \"63 kN\"", "# no strength"));
    write("refused.toml", "[subject]\nkind = \"person\"\nmass = \"é\" # 1\nmas = 3\n");
    fs::write(folder.path().join("binary.toml"), [255_u8, 0]).unwrap();
    let accepted = HOLDS.replace("reserve = \"0.1 m\"", "")
        + "\n[[accept]]\ndoubt = \"reserve-missing\"\nwhy = \"the bench is moved first\"\n";
    write("accepted.toml", &accepted);
    let log = audit(folder.path());
    (folder, log)
}

fn audit(folder: &Path) -> Value {
    let output = cargo_bin_cmd!("underfoot").current_dir(folder).args(["audit", "--sarif", "."]).output().unwrap();
    serde_json::from_slice(&output.stdout).unwrap()
}

fn results(log: &Value) -> &Vec<Value> {
    log["runs"][0]["results"].as_array().unwrap()
}

fn of_file<'l>(log: &'l Value, uri: &str) -> Vec<&'l Value> {
    results(log).iter().filter(|result| uri_of(result) == uri).collect()
}

fn uri_of(result: &Value) -> &str {
    result["locations"][0]["physicalLocation"]["artifactLocation"]["uri"].as_str().unwrap()
}

fn region(result: &Value) -> [u64; 4] {
    let region = &result["locations"][0]["physicalLocation"]["region"];
    ["startLine", "startColumn", "endLine", "endColumn"].map(|key| region[key].as_u64().unwrap())
}

#[test]
fn the_log_has_what_the_standard_requires() {
    let (_folder, log) = log();
    // 3.13: version and runs; 3.14: tool; 3.18: driver; 3.19: name, rules of reportingDescriptor (3.49: id).
    assert_eq!(log["version"], "2.1.0");
    assert!(log["$schema"].as_str().unwrap().ends_with("sarif-schema-2.1.0.json"));
    let run = &log["runs"][0];
    assert_eq!(log["runs"].as_array().unwrap().len(), 1);
    let driver = &run["tool"]["driver"];
    assert_eq!((&driver["name"], &driver["version"]), (&"underfoot".into(), &env!("CARGO_PKG_VERSION").into()));
    assert!(driver["fullDescription"]["text"].as_str().unwrap().contains("FIRST-PASS ESTIMATE"));
    let rules = driver["rules"].as_array().unwrap();
    let ids: HashSet<&str> = rules.iter().map(|rule| rule["id"].as_str().unwrap()).collect();
    assert_eq!(ids.len(), rules.len());
    for rule in rules {
        for key in ["shortDescription", "fullDescription", "help"] {
            assert!(rule[key]["text"].as_str().is_some_and(|text| text.len() > 10), "{rule}");
        }
        assert!(["warning", "error"].contains(&rule["defaultConfiguration"]["level"].as_str().unwrap()));
    }
    // 3.14.17 columnKind says in what columns are counted; 3.20.14 executionSuccessful is required.
    assert_eq!(run["columnKind"], "unicodeCodePoints");
    assert_eq!(run["invocations"][0]["executionSuccessful"], true);
    assert_eq!(run["invocations"][0]["exitCode"], 2);
    let keys: HashSet<&str> = run.as_object().unwrap().keys().map(String::as_str).collect();
    assert_eq!(keys, HashSet::from(["tool", "columnKind", "properties", "results", "invocations"]));
}

#[test]
fn every_result_has_rule_level_message_place_fingerprint_and_suppressions() {
    let (folder, log) = log();
    let rules = log["runs"][0]["tool"]["driver"]["rules"].as_array().unwrap();
    let mut fingerprints = HashSet::new();
    assert!(results(&log).len() > 8);
    for result in results(&log) {
        // 3.27.5 ruleId, 3.27.6 ruleIndex, 3.27.10 level, 3.27.11 message, 3.27.12 locations.
        let index = usize::try_from(result["ruleIndex"].as_u64().unwrap()).unwrap();
        assert_eq!(rules[index]["id"], result["ruleId"]);
        assert!(["note", "warning", "error"].contains(&result["level"].as_str().unwrap()));
        assert!(!result["message"]["text"].as_str().unwrap().is_empty());
        let uri = uri_of(result);
        assert!(!uri.starts_with('/') && !uri.starts_with("./") && !uri.contains([' ', '#', '\\', 'é']), "{uri}");
        // 3.27.17: told apart within the log, and free of line numbers.
        assert!(fingerprints.insert(result["partialFingerprints"]["finding/v1"].as_str().unwrap().to_owned()));
        // 3.27.23: where one result has suppressions all have them.
        assert!(result["suppressions"].is_array());
        if result["ruleId"] != "file-unreadable" {
            inside(folder.path(), result);
        }
    }
}

/// The region lies in the file (3.30: lines and columns from 1, the end column after the last character).
fn inside(folder: &Path, result: &Value) {
    let name = uri_of(result).replace("%20", " ").replace("%23", "#").replace("%25", "%").replace("%C3%A9", "é");
    let text = fs::read_to_string(folder.join(name)).unwrap();
    let [line, column, end_line, end_column] = region(result);
    let width =
        |line: u64| text.lines().nth(usize::try_from(line).unwrap() - 1).map_or(0, |l| l.chars().count() as u64);
    assert!(line >= 1 && column >= 1 && (end_line, end_column) >= (line, column), "{result}");
    assert!(column <= width(line) + 1 && end_column <= width(end_line) + 1, "{result}");
}

#[test]
fn faults_and_short_checks_are_errors_doubts_warnings_accepted_ones_notes() {
    let (_folder, log) = log();
    let told = |uri: &str| -> Vec<(String, String)> {
        let words = |value: &Value| value.as_str().unwrap().to_owned();
        of_file(&log, uri).iter().map(|r| (words(&r["ruleId"]), words(&r["level"]))).collect()
    };
    let has = |uri: &str, rule: &str, level: &str| {
        assert!(told(uri).contains(&(rule.to_owned(), level.to_owned())), "{uri}: {:?}", told(uri));
    };
    assert_eq!(told("holds.toml"), []);
    has("short%20%C3%A9%20%231%25.toml", "check-short", "error");
    has("short%20%C3%A9%20%231%25.toml", "rated-free-fall-missing", "warning");
    has("thin.toml", "check-thin", "warning");
    has("open.toml", "check-open", "warning");
    has("open.toml", "strength-missing", "warning");
    has("refused.toml", "file-fault", "error");
    has("binary.toml", "file-unreadable", "error");
    has("accepted.toml", "reserve-missing", "note");
    let accepted = of_file(&log, "accepted.toml")[0];
    // 3.35: kind inSource, status accepted, justification.
    let suppression = &accepted["suppressions"][0];
    assert_eq!((&suppression["kind"], &suppression["status"]), (&"inSource".into(), &"accepted".into()));
    assert_eq!(suppression["justification"], "the bench is moved first");
    assert!(accepted["message"]["text"].as_str().unwrap().contains("accepted: the bench is moved first"));
    let thin = of_file(&log, "thin.toml").into_iter().find(|r| r["ruleId"] == "check-thin").unwrap();
    assert!(thin["message"]["text"].as_str().unwrap().contains("at the worst found"), "{thin}");
}

#[test]
fn a_region_counts_characters_and_ends_after_the_value() {
    let (_folder, log) = log();
    let faults = of_file(&log, "refused.toml");
    // `mass = "é" # 1`: the value stands at columns 8 to 10, or the character in its quotes at 9.
    let mass = faults.iter().find(|r| region(r)[0] == 3).unwrap();
    let [_, start, end_line, end] = region(mass);
    assert!(end_line == 3 && (start, end) == (8, 11) || (start, end) == (9, 10), "{mass}");
    let unknown = faults.iter().find(|r| region(r)[0] == 4).unwrap();
    assert_eq!(region(unknown), [4, 1, 4, 4], "{unknown}");
}

#[test]
fn fingerprints_stay_when_lines_move_and_change_with_the_place() {
    let (folder, before) = log();
    let path = folder.path().join("open.toml");
    let text = fs::read_to_string(&path).unwrap();
    fs::write(&path, format!("# a line more\n\n{text}")).unwrap();
    let after = audit(folder.path());
    let prints = |log: &Value| -> Vec<Value> {
        of_file(log, "open.toml").iter().map(|r| r["partialFingerprints"]["finding/v1"].clone()).collect()
    };
    let lines = |log: &Value| -> Vec<u64> { of_file(log, "open.toml").iter().map(|r| region(r)[0]).collect() };
    assert_eq!(prints(&before), prints(&after));
    assert_ne!(lines(&before), lines(&after));
}

#[test]
fn paths_become_references_that_any_reader_of_uris_takes() {
    for (path, uri) in [
        ("./a.toml", "a.toml"),
        ("sites/a b.toml", "sites/a%20b.toml"),
        ("../x/ü.toml", "../x/%C3%BC.toml"),
        ("C:x.toml", "C%3Ax.toml"),
        ("a?b#c%d[1].toml", "a%3Fb%23c%25d%5B1%5D.toml"),
        ("a-b_c~d.1.toml", "a-b_c~d.1.toml"),
    ] {
        if cfg!(unix) {
            assert_eq!(file_uri(Path::new(path)), uri, "{path}");
        }
    }
    #[cfg(unix)]
    {
        use std::os::unix::ffi::OsStrExt;
        assert_eq!(file_uri(Path::new("/a/b c.toml")), "file:///a/b%20c.toml");
        assert_eq!(file_uri(Path::new(std::ffi::OsStr::from_bytes(b"a\xff.toml"))), "a%FF.toml");
    }
}

#[test]
fn an_audit_of_nothing_that_was_found_is_still_a_whole_log() {
    let folder = tempfile::tempdir().unwrap();
    let log = audit(folder.path());
    assert_eq!(results(&log).len(), 0);
    assert_eq!(log["runs"][0]["invocations"][0]["exitCode"], 2);
}
