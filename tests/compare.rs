//! Two files beside each other, as a user meets it.
#![expect(clippy::unwrap_used, reason = "a test stops at what it cannot have")]
use assert_cmd::cargo::cargo_bin_cmd;
use serde_json::Value;
use std::fs;
use std::path::PathBuf;
use tempfile::TempDir;

const SHORT: &str = "scenarios/low-scaffold-short.toml";

fn shipped() -> String {
    fs::read_to_string(SHORT).unwrap()
}

fn write(folder: &TempDir, name: &str, text: &str) -> PathBuf {
    let path = folder.path().join(name);
    fs::write(&path, text).unwrap();
    path
}

fn compared(a: &str, b: &str, code: i32, more: &[&str]) -> String {
    let folder = tempfile::tempdir().unwrap();
    let (a, b) = (write(&folder, "a.toml", a), write(&folder, "b.toml", b));
    let run = cargo_bin_cmd!("underfoot").arg("compare").args([a, b]).args(more).assert().code(code);
    String::from_utf8(run.get_output().stdout.clone()).unwrap()
}

fn higher() -> String {
    shipped().replace("top = \"0 m\"", "top = \"-3 m\"")
}

#[test]
fn a_file_does_not_differ_from_itself() {
    let text = compared(&shipped(), &shipped(), 0, &[]);
    assert_eq!(text.matches("  none\n").count(), 3, "{text}");
    assert!(text.contains("FIRST-PASS ESTIMATE"), "{text}");
}

#[test]
fn the_same_length_in_another_unit_is_no_difference() {
    let inches = shipped().replace("length = \"2 m\"", "length = \"200 cm\"");
    assert_ne!(inches, shipped());
    assert_eq!(compared(&shipped(), &inches, 0, &[]).matches("  none\n").count(), 3);
}

#[test]
fn a_check_that_becomes_worse_ends_with_1_and_one_that_becomes_better_with_0() {
    let better = compared(&shipped(), &higher(), 0, &[]);
    assert!(better.contains("x short -> o holds") && better.contains("0 m -> -3 m"), "{better}");
    let worse = compared(&higher(), &shipped(), 1, &[]);
    assert!(worse.contains("o holds -> x short"), "{worse}");
    let said = |text: &str| text.split(|c: char| !c.is_alphanumeric()).any(|w| w.eq_ignore_ascii_case("safe"));
    assert!(!said(&worse) && !said(&better));
}

#[test]
fn a_check_that_is_no_longer_made_is_told_and_ends_with_1() {
    let without = higher().split("[[obstacle]]").next().unwrap().to_owned() + "[limits]\nbasis = \"eu-363\"\n";
    assert!(compared(&higher(), &without, 1, &[]).contains("-> not checked"));
}

#[test]
fn a_change_of_words_and_of_own_limits_is_told() {
    let other = shipped().replace("kind = \"lanyard\"", "kind = \"webbing\"")
        + "arrest_force = { value = \"5 kN\", why = \"site rule\" }\n";
    let folder = tempfile::tempdir().unwrap();
    let (a, b) = (write(&folder, "a.toml", &shipped()), write(&folder, "b.toml", &other));
    let run = cargo_bin_cmd!("underfoot").arg("compare").args([a, b]).output().unwrap();
    let text = String::from_utf8(run.stdout).unwrap();
    assert!(
        text.contains("lanyard -> webbing") && text.contains("limits.arrest_force") && text.contains("site rule"),
        "{text}"
    );
}

#[test]
fn json_carries_the_same_differences_with_units_and_cautions() {
    let object: Value = serde_json::from_str(&compared(&higher(), &shipped(), 1, &["--json"])).unwrap();
    assert_eq!(object["second_is_worse"], true);
    assert_eq!(object["inputs"][0]["path"], "obstacle.1.top");
    let numbers = object["numbers"].as_array().unwrap();
    let clearance = numbers.iter().find(|n| n["id"] == "clearance.ground").unwrap();
    let rise = clearance["first"].as_f64().unwrap() - clearance["second"].as_f64().unwrap();
    assert!((rise - 3.0).abs() < 1e-9 && clearance["unit"] == "m", "{clearance}");
    assert!(numbers.iter().all(|n| n["id"] != "arrest_force_peak"), "an obstacle does not change the force");
    assert!(!object["cautions"].as_array().unwrap().is_empty());
}

#[test]
fn a_faulty_file_ends_with_2() {
    compared(&shipped(), "gravity = 3", 2, &[]);
}

#[test]
fn bands_and_their_shapes_are_differences_of_their_own() {
    let with = |mass: &str| shipped().replace("mass = \"100 kg\"", &format!("mass = {mass}"));
    assert_ne!(with("\"90..110 kg\""), shipped());
    let wide = compared(&shipped(), &with("\"90..110 kg\""), 0, &[]);
    assert!(wide.contains("100 kg -> 90..110 kg"), "{wide}");
    let shaped = with("{ low = \"90 kg\", typical = \"100 kg\", high = \"110 kg\", shape = \"triangular\" }");
    let text = compared(&with("\"90..110 kg\""), &shaped, 0, &[]);
    assert!(text.contains("90..110 kg -> 90..110 kg (triangular)"), "{text}");
    let json: Value = serde_json::from_str(&compared(&shipped(), &shaped, 0, &["--json"])).unwrap();
    let change = &json["inputs"][0];
    assert_eq!((&change["path"], &change["second_band"]["shape"]), (&"subject.mass".into(), &"triangular".into()));
    assert_eq!((&change["first_band"]["high"], &change["second_band"]["high"]), (&100.0.into(), &110.0.into()));
    assert_eq!(change["second_band"]["unit"], "kg");
}

#[test]
fn a_band_that_makes_a_check_thin_is_a_changed_verdict() {
    let at = |mass: &str| {
        higher()
            .replace("top = \"-3 m\"", "top = \"-1.5 m\"")
            .replace("mass = \"100 kg\"", &format!("mass = \"{mass}\""))
    };
    let run = compared(&at("100 kg"), &at("100..100..180 kg"), 1, &[]);
    assert!(run.contains("o holds -> ~ thin"), "{run}");
}
