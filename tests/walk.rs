//! Walk-throughs as a user meets them: the shipped ones with their numbers, text and JSON, and what folders make of them.
//!
//! The numbers of the shipped walks were not taken from this program. They come from an integration with a fixed step
//! (fourth order, 10 us) of a mass on a Kelvin-Voigt line with a rigid-plastic absorber, written apart from the solver
//! in another language. By hand: free fall and elevations as noted in the scenarios; stiffness of the rope
//! 100 kg g / (percent x length); margin of clearance = lowest feet - top - reserve.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
use assert_cmd::cargo::cargo_bin_cmd;
use serde_json::Value;
use std::fs;
use std::path::{Path, PathBuf};
use underfoot::scenario::{Stop, is_walk, load_walk};
use underfoot::sheet::report;

const LANYARD: &str = "scenarios/walks/longer-or-shorter-lanyard.walk.toml";
const ROPE: &str = "scenarios/walks/stiffer-or-longer-rope.walk.toml";

/// Verdict, governing check, its margin (SI), the margin of clearance (m), the peak force (N).
type Expected = (&'static str, &'static str, f64, f64, f64);

/// Stop by stop.
const LANYARD_STOPS: [Expected; 5] = [
    ("short", "clearance.ground", -0.938_378_505, -0.938_378_505, 4000.0),
    ("short", "clearance.ground", -1.599_966_878, -1.599_966_878, 4000.0),
    ("short", "clearance.ground", -0.936_783_527, -0.936_783_527, 4000.0),
    ("short", "clearance.ground", -0.409_374_544, -0.409_374_544, 4000.0),
    ("holds", "arrest_force", 2000.0, 1.043_678_224, 4000.0),
];
const ROPE_STOPS: [Expected; 5] = [
    ("holds", "arrest_force", 1_463.193_620, 0.735_494_791, 4_536.806_380),
    ("short", "arrest_force", -972.571_392, 0.948_422_922, 6_972.571_392),
    ("holds", "arrest_force", 2_483.633_597, 0.479_032_383, 3_516.366_403),
    ("short", "clearance.gantry_ring", -0.094_814_370, -0.094_814_370, 2_701.912_972),
    ("holds", "arrest_force", 4_002.682_669, 0.940_368_616, 1_997.317_331),
];

fn root() -> &'static Path {
    Path::new(env!("CARGO_MANIFEST_DIR"))
}

fn shipped() -> Vec<PathBuf> {
    let folder = fs::read_dir(root().join("scenarios/walks")).unwrap();
    let mut files: Vec<PathBuf> = folder.map(|entry| entry.unwrap().path()).collect();
    files.sort();
    files
}

fn near(found: f64, expected: f64) -> bool {
    (found - expected).abs() <= 1e-6 * expected.abs().max(1.0)
}

#[test]
fn the_shipped_walks_give_the_numbers_of_the_independent_integration_at_every_stop() {
    let expected = [(LANYARD, LANYARD_STOPS), (ROPE, ROPE_STOPS)];
    assert_eq!(shipped(), expected.map(|(file, _)| root().join(file)));
    for (file, stops) in expected {
        let walk = load_walk(&root().join(file)).unwrap();
        assert_eq!(walk.stops.len(), stops.len(), "{file}");
        for (stop, (verdict, id, margin, clearance, peak)) in walk.stops.iter().zip(stops) {
            let report = report(file, stop.document.text(), stop.document.scenario()).unwrap();
            let at = format!("{file}: {}", stop.say);
            assert_eq!(report.verdict.word(), verdict, "{at}");
            assert_eq!(report.margins[0].id, id, "{at}");
            let found = report.margins[0].margin.unwrap();
            assert!(near(found, margin), "{at} {found}");
            let found = report.margins.iter().find(|m| m.id.starts_with("clearance.")).unwrap().margin.unwrap();
            assert!(near(found, clearance), "{at} {found}");
            let found = report.estimate.numbers.get("arrest_force_peak").unwrap();
            assert!(near(found, peak), "{at} {found}");
        }
    }
}

fn may_be_so_long(stop: &Stop) -> bool {
    let report = report("walk", stop.document.text(), stop.document.scenario()).unwrap();
    report.margins.iter().all(|margin| margin.label != "lanyard length" || margin.verdict.word() == "holds")
}

/// What the sentences of the shipped walks claim, held against the numbers above.
#[test]
fn the_sentences_of_the_shipped_walks_say_what_the_numbers_say() {
    let clearance = |stop: usize| LANYARD_STOPS[stop].3 + 1.0;
    assert!((0.0..0.1).contains(&clearance(0)), "a few centimetres above the ground");
    assert!(clearance(0) - clearance(1) > 0.5 && clearance(1) < 0.0, "more than half a metre; hits the ground");
    assert!((clearance(2) - clearance(0)).abs() < 0.005, "hardly moves");
    assert!((0.5..0.6).contains(&(clearance(3) - clearance(0))), "half a metre of room is won");
    assert!(clearance(3) < 1.0, "still not there");
    assert!(clearance(4) > 2.0, "twice over");
    let walk = load_walk(&root().join(LANYARD)).unwrap();
    let holds: Vec<bool> = walk.stops.iter().map(may_be_so_long).collect();
    assert_eq!(holds, [true, false, true, true, true], "more than a lanyard may have");
    let (force, room) = (|stop: usize| ROPE_STOPS[stop].4, |stop: usize| ROPE_STOPS[stop].3);
    assert!(force(1) > 6000.0 && room(1) > room(0), "more room, above 6 kN");
    assert!(force(2) < force(0) && room(2) < room(0), "the force drops and some room goes");
    assert!(force(3) < force(2) && room(3) < 0.0, "lower still; too near");
    assert!(force(4) < force(3) && room(4) > room(3), "less fall helps both");
}

#[test]
fn a_walk_never_touches_its_scenario_and_says_nothing_is_safe() {
    for file in shipped() {
        let text = fs::read_to_string(&file).unwrap();
        let words = || text.split(|c: char| !c.is_alphanumeric());
        assert!(!words().any(|word| word.eq_ignore_ascii_case("safe")), "{}", file.display());
        let walk = load_walk(&file).unwrap();
        let before = fs::read(walk.start.path()).unwrap();
        cargo_bin_cmd!("underfoot").arg("walk").arg(&file).arg("--text").assert().code(1);
        assert_eq!(fs::read(walk.start.path()).unwrap(), before);
    }
}

fn told(file: &str, more: &[&str], code: i32) -> String {
    let run = cargo_bin_cmd!("underfoot").current_dir(root()).args(["walk", file]).args(more).assert().code(code);
    String::from_utf8(run.get_output().stdout.clone()).unwrap()
}

#[test]
fn text_tells_every_stop_with_its_sentence_change_verdict_margin_and_force() {
    let text = told(ROPE, &["--text"], 1);
    for words in [
        "FIRST-PASS ESTIMATE, NOT A DESIGN",
        "what a stiffer or a longer rope does where there is no absorber",
        "stop 2 of 5",
        "  changed     line.static_elongation.percent 3.4 % -> 1.2 %",
        "  margin      arrest force +1.46 kN -> -0.973 kN (-2.44 kN)",
        "  peak force  4.54 kN -> 6.97 kN (+2.44 kN)",
        "  verdict     o holds -> x short",
        "x SHORT  arrest force 6.97 kN of 6.00 kN allowed (0.973 kN short)",
        "  margin      arrest force +2.48 kN -> clearance gantry ring -0.0948 m",
        "cautions",
        "sha256 of the scenario",
    ] {
        assert!(text.contains(words), "no `{words}` in\n{text}");
    }
    for stop in load_walk(&root().join(ROPE)).unwrap().stops {
        let joined = text.split_whitespace().collect::<Vec<_>>().join(" ");
        assert!(joined.contains(&stop.say), "{}", stop.say);
    }
    assert!(text.lines().all(|line| line.chars().count() <= 100), "{text}");
}

#[test]
fn without_a_terminal_the_walk_is_text_and_the_same_bytes_each_time() {
    assert_eq!(told(LANYARD, &[], 1), told(LANYARD, &["--text"], 1));
}

#[test]
fn us_units_show_feet_and_pounds() {
    let text = told(LANYARD, &["--units", "us"], 1);
    assert!(text.contains("clearance ground -3.08 ft -> -5.25 ft") && text.contains("899 lbf"), "{text}");
}

#[test]
fn json_carries_the_stops_with_units_steps_and_cautions() {
    let object: Value = serde_json::from_str(&told(ROPE, &["--json"], 1)).unwrap();
    assert_eq!(object["verdict"], "short");
    assert_eq!(object["partial"], false);
    assert!(!object["cautions"].as_array().unwrap().is_empty());
    let stops = object["stops"].as_array().unwrap();
    assert_eq!(stops.len(), 5);
    assert_eq!(stops[1]["changes"][0]["input"], "line.static_elongation.percent");
    assert_eq!(
        (&stops[1]["changes"][0]["before"], &stops[1]["changes"][0]["after"]),
        (&"3.4 %".into(), &"1.2 %".into())
    );
    let number = |value: &Value| value.as_f64().unwrap();
    assert!(near(number(&stops[1]["margin_step"]), -972.571_392 - 1_463.193_620));
    assert!(near(number(&stops[1]["arrest_force_peak"]["value"]), 6_972.571_392));
    assert!(near(number(&stops[1]["arrest_force_peak_step"]), 6_972.571_392 - 4_536.806_380));
    assert_eq!(stops[3]["margin_step"], Value::Null, "another check governs");
    assert_eq!(stops[3]["governing"]["id"], "clearance.gantry_ring");
    assert_eq!(stops[3]["verdict"], "short");
}

/// A folder with a scenario and walks over it.
struct Folder(tempfile::TempDir);

impl Folder {
    fn of(scenario: &str, walk: &str) -> Self {
        let folder = tempfile::tempdir().unwrap();
        fs::write(folder.path().join("fall.toml"), scenario).unwrap();
        fs::write(folder.path().join("fall.walk.toml"), format!("scenario = \"fall.toml\"\n{walk}")).unwrap();
        Self(folder)
    }

    fn run(&self, arguments: &[&str]) -> (i32, String, String) {
        let run = cargo_bin_cmd!("underfoot").current_dir(self.0.path()).args(arguments).output().unwrap();
        let words = |bytes: Vec<u8>| String::from_utf8(bytes).unwrap();
        (run.status.code().unwrap(), words(run.stdout), words(run.stderr))
    }
}

fn foot_level() -> String {
    fs::read_to_string(root().join("scenarios/low-scaffold-short.toml")).unwrap()
}

#[test]
fn a_word_is_changed_together_with_what_it_needs_and_what_no_longer_applies_is_named() {
    let walk = "[[stop]]\nsay = \"An anchor that gives.\"\nchange = [{ input = \"anchor.kind\", value = \"sprung\" }, \
                { input = \"anchor.stiffness\", value = \"40 kN/m\" }]\n[[stop]]\nsay = \"Fixed again.\"\ninput = \
                \"anchor.kind\"\nvalue = \"fixed\"\n";
    let (code, text, _) = Folder::of(&foot_level(), walk).run(&["walk", "fall.walk.toml"]);
    assert_eq!(code, 1);
    assert!(text.contains("anchor.kind not stated -> sprung; anchor.stiffness not stated -> 40 kN/m"), "{text}");
    assert!(text.contains("anchor.kind sprung -> fixed; took out anchor.stiffness, which no longer applies"), "{text}");
}

#[test]
fn with_bands_the_verdict_is_that_of_the_worst_found_and_numbers_are_called_typical() {
    let scenario = foot_level()
        .replace("mass = \"100 kg\"", "mass = \"100..100..180 kg\"")
        .replace("top = \"0 m\"", "top = \"-1.5 m\"");
    let walk = "[[stop]]\nsay = \"Heavier people.\"\n";
    let (code, text, _) = Folder::of(&scenario, walk).run(&["walk", "fall.walk.toml"]);
    assert_eq!(code, 1);
    assert!(!text.contains("  verdict     "), "{text}");
    let lines: Vec<&str> = text.lines().collect();
    let typical = lines.iter().rposition(|line| line.starts_with("  typical     o holds")).unwrap();
    let after: Vec<&&str> = lines[typical + 1..].iter().filter(|line| !line.starts_with("   ")).collect();
    assert!(after[0].starts_with("~ THIN  "), "the last line is the verdict: {text}");
}

#[test]
fn a_stop_that_cannot_be_computed_is_open_and_ends_with_3() {
    let walk = "[[stop]]\nsay = \"Too short to reach.\"\ninput = \"line.length\"\nvalue = \"1 m\"\n";
    let (code, text, _) = Folder::of(&foot_level(), walk).run(&["walk", "fall.walk.toml"]);
    assert_eq!(code, 3);
    assert!(text.contains("? OPEN  cannot be computed"), "{text}");
}

#[test]
fn an_unknown_set_of_limits_is_a_fault_at_its_stop() {
    let walk = "[[stop]]\nsay = \"Other rules.\"\ninput = \"limits.basis\"\nvalue = \"eu-336\"\n";
    let (code, _, said) = Folder::of(&foot_level(), walk).run(&["walk", "fall.walk.toml"]);
    assert_eq!(code, 2);
    assert!(said.contains("fall.walk.toml:5:9") && said.contains("did you mean `eu-363`"), "{said}");
}

#[test]
fn a_folder_under_audit_passes_walks_over_and_says_so() {
    let folder = Folder::of(&foot_level(), "[[stop]]\nsay = \"Look.\"\n");
    let (code, text, said) = folder.run(&["audit", "."]);
    assert_eq!(code, 1);
    assert!(said.contains("fall.walk.toml") && said.contains("passed over"), "{said}");
    assert!(text.contains("fall.toml") && !text.contains("fall.walk.toml"), "{text}");
    assert!(is_walk(Path::new("a/fall.walk.toml")) && !is_walk(Path::new("a.walk.toml/fall.toml")));
}

#[test]
fn a_walk_is_no_scenario_whatever_its_name_and_a_scenario_is_no_walk() {
    let folder = Folder::of(&foot_level(), "[[stop]]\nsay = \"Look.\"\n");
    fs::copy(folder.0.path().join("fall.walk.toml"), folder.0.path().join("other.toml")).unwrap();
    for file in ["fall.walk.toml", "other.toml"] {
        let (code, _, said) = folder.run(&["run", file]);
        assert_eq!(code, 2);
        assert!(said.contains("it is a walk-through and no scenario") && !said.contains("is missing"), "{said}");
    }
    let (code, _, said) = folder.run(&["walk", "fall.toml"]);
    assert_eq!(code, 2);
    assert!(said.contains("belongs into the scenario file") && said.contains("there is no stop"), "{said}");
    let (code, _, said) = folder.run(&["walk", "none.walk.toml"]);
    assert_eq!(code, 2);
    assert!(said.contains("there is no such file"), "{said}");
}
