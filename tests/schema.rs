//! The JSON Schema: the committed copy, the shipped scenarios, and what it refuses.
//!
//! With `UNDERFOOT_BLESS=1` in the environment the committed copy is written anew, to be read before it is kept.
#![allow(clippy::unwrap_used, reason = "helpers of tests fail loudly")]
use jsonschema::Validator;
use serde_json::Value;
use std::path::{Path, PathBuf};
use underfoot::scenario::{new_file, schema};

fn root() -> &'static Path {
    Path::new(env!("CARGO_MANIFEST_DIR"))
}

fn validator() -> Validator {
    jsonschema::draft202012::new(&schema()).unwrap()
}

fn files(folder: &str) -> Vec<PathBuf> {
    let entries = std::fs::read_dir(root().join(folder)).unwrap();
    let mut files: Vec<PathBuf> = entries.map(|entry| entry.unwrap().path()).collect();
    files.retain(|path| path.extension().is_some_and(|ending| ending == "toml"));
    files.sort();
    files
}

/// A TOML text as JSON; none where it is no TOML.
fn json(text: &str) -> Option<Value> {
    let table: toml::Table = text.parse().ok()?;
    serde_json::to_value(table).ok()
}

fn faults(validator: &Validator, value: &Value) -> Vec<String> {
    validator.iter_errors(value).map(|error| format!("{error} at {}", error.instance_path())).collect()
}

#[test]
fn the_committed_schema_is_the_one_that_is_printed() {
    let copy = root().join("src/scenario/scenario.schema.json");
    let printed = format!("{}\n", serde_json::to_string_pretty(&schema()).unwrap());
    if std::env::var_os("UNDERFOOT_BLESS").is_some() {
        std::fs::write(&copy, &printed).unwrap();
    }
    assert!(
        std::fs::read_to_string(&copy).unwrap() == printed,
        "run the tests with UNDERFOOT_BLESS=1 and read the diff"
    );
}

#[test]
fn the_schema_is_valid_by_the_schema_of_its_draft() {
    assert!(jsonschema::meta::is_valid(&schema()));
}

#[test]
fn every_shipped_scenario_and_the_new_one_are_valid() {
    let validator = validator();
    let mut texts: Vec<(String, String)> =
        files("scenarios").iter().map(|p| (p.display().to_string(), std::fs::read_to_string(p).unwrap())).collect();
    assert!(texts.len() >= 20);
    texts.push(("new".to_owned(), new_file()));
    for (name, text) in texts {
        assert_eq!(faults(&validator, &json(&text).unwrap()), Vec::<String>::new(), "{name}");
    }
}

#[test]
fn every_way_to_write_a_quantity_is_valid() {
    let validator = validator();
    let (_, head) = new_file().split_once("[subject]").map(|(a, b)| (a.to_owned(), b.to_owned())).unwrap();
    let base = format!("[subject]{head}");
    let ways = [
        ("1.8 m", "\"6 ft 6 in\""),
        ("1.8 m", "\"6ft6in\""),
        ("1.8 m", "\"1.5..1.8 m\""),
        ("1.8 m", "\"1.5 m .. 1.8 m .. 2e0 m\""),
        ("1.8 m", "{ low = \"1 m\", typical = \"180 cm\", high = \"2 m\", shape = \"normal\" }"),
        ("60 kN/m", "\"60000 N/m\""),
        ("60 kN/m", "\"+4.1e3 lbf/ft\""),
    ];
    for (today, way) in ways {
        let text = base.replace(&format!("\"{today}\""), way);
        assert_ne!(text, base, "`{today}` stands in the new file");
        assert!(underfoot::scenario::read("way.toml", &text).is_ok(), "the reader takes {way}");
        assert_eq!(faults(&validator, &json(&text).unwrap()), Vec::<String>::new(), "{way}");
    }
}

#[test]
fn faults_of_a_single_value_or_key_are_refused_by_the_schema_too() {
    let validator = validator();
    let mut refused = Vec::new();
    for path in files("tests/bad") {
        let text = std::fs::read_to_string(&path).unwrap();
        let input = text.split("# must say:").next().unwrap();
        if json(input).is_some_and(|value| !validator.is_valid(&value)) {
            refused.push(path.file_stem().unwrap().to_string_lossy().into_owned());
        }
    }
    let must = [
        "bare_number",
        "band_of_four",
        "curve_band",
        "curve_bare_numbers",
        "curve_one_row",
        "digit_separator",
        "edge_incomplete",
        "edge_unknown_key",
        "face_is_table",
        "face_unknown_key",
        "limit_band",
        "limit_without_value",
    ];
    for name in must {
        assert!(refused.iter().any(|found| found == name), "{name} is not refused: {refused:?}");
    }
    assert!(refused.len() >= 35, "only {} bad files are refused: {refused:?}", refused.len());
}
