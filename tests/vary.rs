//! One input across a range: crossings against closed forms, and the command.
#![expect(clippy::unwrap_used, reason = "a test stops at what it cannot have")]
use assert_cmd::cargo::cargo_bin_cmd;
use predicates::prelude::*;
use std::fs;
use underfoot::margin::{CheckKind, Verdict};
use underfoot::scenario::read;
use underfoot::study::{Evaluator, vary};

const SHORT: &str = "scenarios/low-scaffold-short.toml";

fn evaluator() -> Evaluator {
    Evaluator::new(&read(SHORT, &fs::read_to_string(SHORT).unwrap()).unwrap()).unwrap()
}

#[test]
fn a_crossing_of_the_clearance_lies_where_the_linear_margin_is_zero() {
    let evaluator = evaluator();
    let top = evaluator.index_of("obstacle.1.top").unwrap();
    let check = *evaluator.typical().check(CheckKind::Clearance(0)).unwrap();
    // Raising the ground takes as much from the margin as it is raised.
    let expected = check.margin.unwrap();
    for rows in [2, 7, 500] {
        let found = vary(&evaluator, top, -4.0..=1.0, rows).unwrap();
        assert_eq!(found.rows.len(), rows);
        let at = found.crossings.iter().find(|c| c.kind == CheckKind::Clearance(0)).unwrap();
        assert!((at.value - expected).abs() < 1e-8, "{} is not {expected}", at.value);
        assert!(at.through_zero && at.below == Verdict::Holds && at.above == Verdict::Short);
    }
}

#[test]
fn every_crossing_holds_on_its_side_and_not_on_the_other() {
    let evaluator = evaluator();
    for path in ["line.length", "place.anchor", "absorber.deploy_force", "subject.mass"] {
        let input = evaluator.index_of(path).unwrap();
        let today = evaluator.inputs()[input].measure.si();
        let found = vary(&evaluator, input, today / 4.0..=today * 4.0, 5).unwrap();
        assert!(!found.crossings.is_empty(), "{path}");
        for at in &found.crossings {
            let verdict =
                |value| evaluator.at(&[(input, value)]).unwrap().check(at.kind).map_or(Verdict::Holds, |c| c.verdict);
            assert_eq!(verdict(at.value), Verdict::Holds, "{path} {at:?}");
            assert_ne!(verdict(at.beyond), Verdict::Holds, "{path} {at:?}");
            assert!((at.value - at.beyond).abs() <= 1e-12 * today.abs().max(1.0), "{path} {at:?}");
        }
    }
}

#[test]
fn the_table_is_printed_with_caution_and_crossings() {
    cargo_bin_cmd!("underfoot")
        .args(["vary", SHORT, "--over", "line.length", "--from", "0.5 m", "--to", "2.5 m", "--steps", "5"])
        .assert()
        .code(1)
        .stdout(
            predicate::str::contains("FIRST-PASS ESTIMATE")
                .and(predicate::str::contains("bands play no part"))
                .and(predicate::str::contains("through zero margin"))
                .and(predicate::str::contains("clearance ground"))
                .and(predicate::str::is_match(r"(?i)\bsafe\b").unwrap().not()),
        );
}

#[test]
fn csv_holds_every_row_and_the_caution_once() {
    let run = cargo_bin_cmd!("underfoot")
        .args(["vary", SHORT, "--over", "line.length", "--steps", "4", "--csv"])
        .output()
        .unwrap();
    let text = String::from_utf8(run.stdout).unwrap();
    assert_eq!(text.matches("FIRST-PASS ESTIMATE").count(), 1);
    assert_eq!(text.matches("Every row is one run with all other inputs at their typical values").count(), 1);
    // At 1 m the line does not reach from the anchor to the attachment; that row is told and not left out.
    assert_eq!(text.matches(",arrest_force_peak,").count(), 3);
    assert_eq!(text.matches("\nfailed,line.length,1,the line of ").count(), 1, "{text}");
    assert!(text.contains("\ncrossing,line.length,"), "{text}");
}

#[test]
fn a_wrong_path_range_or_unit_ends_with_2() {
    let wrong = [
        vec!["--over", "line.nothing"],
        vec!["--over", "line.length", "--from", "2 kN"],
        vec!["--over", "line.length", "--from", "3 m", "--to", "2 m"],
        vec!["--over", "line.length", "--steps", "1"],
        vec!["--over", "obstacle.1.top"],
    ];
    for more in wrong {
        cargo_bin_cmd!("underfoot").args(["vary", SHORT]).args(&more).assert().code(2);
    }
}

fn vary_text(more: &[&str]) -> String {
    let run = cargo_bin_cmd!("underfoot").args(["vary", SHORT]).args(more).output().unwrap();
    assert_eq!(run.status.code(), Some(1), "{}", String::from_utf8_lossy(&run.stderr));
    String::from_utf8(run.stdout).unwrap()
}

const MAP: [&str; 10] =
    ["--over", "line.length", "--and", "place.anchor", "--and-from", "3 m", "--and-to", "9 m", "--and-steps", "13"];

#[test]
fn no_line_of_a_table_or_a_map_is_wider_than_the_page() {
    for more in [&["--over", "line.length"][..], &MAP[..], &["--over", "line.length", "--units", "us"][..]] {
        let text = vary_text(more);
        let widest = text.lines().map(|line| line.chars().count()).max().unwrap();
        assert!(widest <= 100, "{widest} columns: {text}");
    }
}

#[test]
fn a_map_shows_verdicts_axes_the_file_and_the_line() {
    let text = vary_text(&MAP);
    assert!(text.contains("FIRST-PASS ESTIMATE") && text.contains("to the right") && text.contains("upwards"));
    assert_eq!(text.lines().filter(|line| line.contains(" | ")).count(), 13);
    let map: String = text.lines().filter_map(|line| line.split_once(" | ")).map(|(_, cells)| cells).collect();
    assert_eq!(map.len(), 13 * 61);
    assert_eq!(map.matches('@').count(), 1);
    for symbol in ['o', '?', 'x'] {
        assert!(map.contains(symbol), "{symbol}: {map}");
    }
    let words = text.split_whitespace().collect::<Vec<_>>().join(" ");
    assert!(words.contains("could not be run") && words.contains("lanyard length"), "{text}");
    let outside = vary_text(&["--over", "line.length", "--from", "1 m", "--to", "1.5 m", "--and", "place.anchor"]);
    assert!(outside.contains("outside of this map"), "{outside}");
}

#[test]
fn the_json_of_a_map_has_every_cell_and_the_line_with_units() {
    let text = vary_text(&[&MAP[..], &["--json"]].concat());
    let value: serde_json::Value = serde_json::from_str(&text).unwrap();
    assert_eq!(value["over"]["path"], "line.length");
    assert_eq!((&value["over"]["unit"], &value["and"]["unit"]), (&"m".into(), &"m".into()));
    let rows = value["cells"].as_array().unwrap();
    assert_eq!((rows.len(), rows[0].as_array().unwrap().len()), (13, 61));
    let count =
        |word: &str| rows.iter().flat_map(|row| row.as_array().unwrap()).filter(|cell| cell["verdict"] == word).count();
    for word in ["holds", "open", "short"] {
        assert_eq!(value["counts"][word], count(word), "{word}");
        assert!(count(word) > 0);
    }
    assert!(!value["line"].as_array().unwrap().is_empty());
    assert_eq!((&value["partial"], &value["file_within"]), (&false.into(), &true.into()));
    assert!(value["cautions"].as_array().unwrap().len() > 3);
}

#[test]
fn the_json_of_one_input_has_rows_numbers_and_crossings() {
    let text = vary_text(&["--over", "line.length", "--steps", "4", "--json"]);
    let value: serde_json::Value = serde_json::from_str(&text).unwrap();
    let rows = value["rows"].as_array().unwrap();
    assert_eq!(rows.len(), 4);
    let cautions = value["cautions"].as_array().unwrap();
    assert!(cautions.iter().any(|words| words.as_str().unwrap().starts_with("Every row is one run")));
    assert!(rows[0]["failed"].as_str().unwrap().contains("shorter than"));
    assert_eq!(rows[1]["numbers"]["arrest_force_peak"]["unit"], "N");
    assert!(rows[1]["margins"].as_array().unwrap().iter().all(|margin| margin["id"].is_string()));
    assert!(value["crossings"].as_array().unwrap().iter().any(|at| at["how"] == "zero"));
}

#[test]
fn the_csv_of_a_map_has_a_row_for_every_cell() {
    let text = vary_text(&[&MAP[..], &["--csv"]].concat());
    assert!(text.starts_with("row,line.length_si,place.anchor_si,name,margin_si,verdict,caution\n"));
    assert_eq!(text.lines().filter(|line| line.starts_with("cell,")).count(), 13 * 61);
    assert!(text.contains("\nzero,") && text.contains("\njump,") && text.contains("\nfailed,"));
    assert_eq!(text.matches("FIRST-PASS ESTIMATE").count(), 1);
}

#[test]
fn figures_are_the_same_bytes_each_time_and_carry_caution_and_alternative() {
    for more in [&["--over", "line.length", "--svg"][..], &[&MAP[..], &["--svg"]].concat()[..]] {
        let text = vary_text(more);
        assert_eq!(text, vary_text(more));
        assert!(text.starts_with("<svg ") && text.trim_end().ends_with("</svg>"));
        let desc = text.split_once("<desc").unwrap().1.split_once("</desc>").unwrap().0;
        assert_eq!(text.matches("bands play no part in it").count(), 2, "in the alternative and to be seen");
        assert!(desc.contains("FIRST-PASS ESTIMATE") && desc.contains(SHORT), "{desc}");
        assert!(text.contains(r#"role="img""#) && text.contains("prefers-color-scheme: dark"));
        assert!(text.matches("FIRST-PASS ESTIMATE").count() >= 2, "also to be seen");
        assert!(!text.contains("http://") || text.matches("http").count() == 1, "nothing but the name of the form");
        assert!(!text.contains("NaN") && !text.contains("inf"), "{text}");
    }
}

#[test]
fn a_file_is_written_by_its_ending_and_never_over_another_unasked() {
    let folder = tempfile::tempdir().unwrap();
    let at = |name: &str| folder.path().join(name).display().to_string();
    let run =
        |more: &[&str]| cargo_bin_cmd!("underfoot").args(["vary", SHORT, "--over", "line.length"]).args(more).assert();
    let svg = at("figure.svg");
    run(&["-o", &svg]).code(1).stdout("").stderr(predicate::str::contains("wrote"));
    assert!(fs::read_to_string(&svg).unwrap().starts_with("<svg "));
    run(&["-o", &svg, "--json"]).code(2).stderr(predicate::str::contains("--replace"));
    assert!(fs::read_to_string(&svg).unwrap().starts_with("<svg "));
    run(&["-o", &svg, "--json", "--replace"]).code(1);
    assert!(fs::read_to_string(&svg).unwrap().starts_with('{'));
    let text = at("table.txt");
    run(&["-o", &text]).code(1);
    assert!(!fs::read_to_string(&text).unwrap().contains('\u{1b}'));
    run(&["-o", &at("no/such/folder.csv")]).code(2).stderr(predicate::str::contains("cannot write"));
}

#[test]
fn nonsense_about_a_second_input_ends_with_2() {
    for more in [
        &["--and", "line.length"][..],
        &["--and", "place.nothing"][..],
        &["--and-steps", "5"][..],
        &["--and-from", "1 m"][..],
        &["--and", "place.anchor", "--and-from", "9 m", "--and-to", "3 m"][..],
        &["--and", "place.anchor", "--and-from", "9 kN"][..],
        &["--and", "place.anchor", "--steps", "90"][..],
        &["--and", "place.anchor", "--steps", "401", "--svg"][..],
        &["--and", "place.anchor", "--and-steps", "1"][..],
        &["--csv", "--svg"][..],
        &["--replace"][..],
        &["--steps", "-3"][..],
        &["--from", ""][..],
        &["--to", "nan m"][..],
    ] {
        cargo_bin_cmd!("underfoot")
            .args(["vary", SHORT, "--over", "line.length"])
            .args(more)
            .assert()
            .code(2)
            .stdout("");
    }
}
