//! Bands in the verdict: the worst found and the share short beside every margin, in text, JSON and exit codes.
#![allow(clippy::unwrap_used, clippy::panic, reason = "a test stops at what it cannot have")]
use approx::assert_relative_eq;
use assert_cmd::cargo::cargo_bin_cmd;
use serde_json::Value;
use std::ops::ControlFlow;
use std::path::{Path, PathBuf};
use underfoot::margin::Verdict;
use underfoot::quantity::UnitSystem;
use underfoot::scenario::{load, read};
use underfoot::sheet::{Layout, Paint, Report, json, report, report_bands, text, worst_words};
use underfoot::study::{Evaluator, Place, Progress, Step, unwatched};

fn shipped(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios").join(name)
}

/// The typical report of a text.
fn typical(text: &str) -> Report {
    let scenario = read("t.toml", text).unwrap_or_else(|faults| panic!("{}", faults.render(false)));
    report("t.toml", text, &scenario).unwrap()
}

/// The report with its bands.
fn judged(text: &str) -> Report {
    let mut report = typical(text);
    let bands = report_bands(&report, &unwatched).unwrap();
    if let Some(bands) = bands {
        report.add_bands(bands).unwrap();
    }
    report
}

fn step_transfer() -> String {
    std::fs::read_to_string(shipped("step-transfer.toml")).unwrap()
}

/// The file, small enough to be sampled many times over.
fn few(text: &str) -> String {
    format!("{text}\n[study]\nsamples = 600\nseed = 5\n")
}

fn margin<'r>(object: &'r Value, id: &str) -> &'r Value {
    object["margins"].as_array().unwrap().iter().find(|m| m["id"] == id).unwrap()
}

// By hand: a step onto an elastic line lifts its force to m g (1 + r), the same r for every mass but for the damping;
// 4 times that against 63 kN: 60.87 kN at 800 kg, so 828 kg is the limit and 840 kg is beyond it.
#[test]
fn a_part_that_may_be_heavier_than_the_plan_says_makes_its_line_thin() {
    let report = judged(&step_transfer());
    assert_eq!(report.verdict, Verdict::Thin);
    let governing = &report.margins[0];
    assert_eq!((governing.id.as_str(), governing.verdict), ("line_load", Verdict::Thin));
    assert!(governing.margin.unwrap() > 0.0, "its typical numbers stay: {governing:?}");
    let band = report.band_of(governing).unwrap();
    assert_eq!(band.typical, Some(Verdict::Holds));
    assert!(band.corner && band.worst.as_ref().unwrap().margin.unwrap() < 0.0);
    let [mass] = &band.inputs[..] else { panic!("{:?}", band.inputs) };
    assert_eq!((mass.path.as_str(), mass.value, mass.place), ("subject.mass", 840.0, Place::High));
    let share = band.short.unwrap();
    let limit_kg = 800.0 * 63e3 / governing.demand.unwrap();
    assert_relative_eq!(share.share, (840.0 - limit_kg) / 60.0, epsilon = 3e-3);
    assert!(share.low < share.share && share.share < share.high && share.of == 4096);
}

#[test]
fn the_worst_of_a_margin_that_falls_throughout_is_that_of_the_run_at_the_end() {
    let report = judged(&step_transfer());
    let heavy = typical(&step_transfer().replace("780..800..840 kg", "840 kg"));
    for margin in &report.margins {
        let worst = report.band_of(margin).unwrap().worst.as_ref().unwrap();
        let end = heavy.margins.iter().find(|m| m.id == margin.id).unwrap();
        assert_eq!(worst.margin, end.margin, "{}", margin.id);
    }
}

#[test]
fn the_typical_report_is_not_searched_and_a_file_without_bands_never_is() {
    let typical = typical(&step_transfer());
    assert!(typical.bands.is_none());
    assert_eq!(typical.verdict, Verdict::Holds);
    assert!(worst_words(&typical, &typical.margins[0], UnitSystem::Metric).is_none());
    let exact = step_transfer().replace("780..800..840 kg", "800 kg");
    let refuse = |_: Progress| panic!("a run was made");
    assert!(report_bands(&self::typical(&exact), &refuse).unwrap().is_none());
    assert!(!json(&judged(&exact), Layout::Lines).contains("share_short"));
    assert!(!text(&judged(&exact), UnitSystem::Metric, Paint::Plain).contains("within the bands"));
}

#[test]
fn text_says_where_the_worst_is_and_what_was_drawn() {
    let text = text(&judged(&few(&step_transfer())), UnitSystem::Metric, Paint::Plain);
    let words: String = text.split_whitespace().collect::<Vec<_>>().join(" ");
    for piece in [
        "~ THIN line force x 4",
        "to spare); at the worst found",
        "short (subject.mass 840 kg high)",
        "share short of 600 samples, seed 5, with the 95 % Wilson interval",
        "the inputs are taken as independent",
    ] {
        assert!(words.contains(piece), "{piece} is not in\n{text}");
    }
    assert!(text.lines().all(|line| line.chars().count() <= 100), "{text}");
}

#[test]
fn json_keeps_its_fields_and_gains_the_worst_and_the_share() {
    let object: Value = serde_json::from_str(&json(&judged(&few(&step_transfer())), Layout::Lines)).unwrap();
    assert_eq!(object["verdict"], "thin");
    let line = margin(&object, "line_load");
    assert_eq!((&line["verdict"], &line["typical_verdict"]), (&"thin".into(), &"holds".into()));
    assert!(line["margin"].as_f64().unwrap() > 0.0 && line["worst"]["margin"].as_f64().unwrap() < 0.0);
    assert_eq!(line["worst"]["inputs"][0]["path"], "subject.mass");
    assert_eq!(
        (&line["worst"]["inputs"][0]["at"], &line["worst"]["inputs"][0]["unit"]),
        (&"high".into(), &"kg".into())
    );
    let share = &line["share_short"];
    assert_eq!(share["of"], 600);
    assert_relative_eq!(
        share["count"].as_f64().unwrap() / 600.0,
        share["share"].as_f64().unwrap(),
        max_relative = 1e-15
    );
    let bands = &object["bands"];
    assert_eq!((&bands["partial"], &bands["sample"]["seed"]), (&false.into(), &5.into()));
    for key in ["label", "demand", "limit", "unit", "basis"] {
        assert!(!line[key].is_null(), "{key}");
    }
}

#[test]
fn run_audit_and_compare_use_the_joint_verdict() {
    let folder = tempfile::tempdir().unwrap();
    let write = |name: &str, text: String| {
        let path = folder.path().join(name);
        std::fs::write(&path, text).unwrap();
        path
    };
    let thin = write("thin.toml", few(&step_transfer()));
    let exact = write("exact.toml", step_transfer().replace("780..800..840 kg", "800 kg"));
    let of = |args: &[&str], paths: &[&PathBuf]| {
        let output = cargo_bin_cmd!("underfoot").args(args).args(paths).output().unwrap();
        (output.status.code().unwrap(), String::from_utf8(output.stdout).unwrap())
    };
    assert_eq!(of(&["run", "--json"], &[&thin]).0, 1);
    assert_eq!(of(&["run", "--json"], &[&exact]).0, 0);
    let (code, audit) = of(&["audit"], &[&thin, &exact]);
    assert_eq!(code, 1);
    assert!(audit.contains("~ THIN") && audit.contains("2 files: 1 holds, 1 thin"), "{audit}");
    let (code, audit) = of(&["audit", "--json"], &[&thin]);
    let object: Value = serde_json::from_str(&audit).unwrap();
    assert_eq!((code, &object["verdict"]), (1, &"thin".into()));
    let line = margin(&object, "line_load");
    assert!(line["worst"]["margin"].as_f64().unwrap() < 0.0 && line["share_short"].is_null(), "{line}");
    assert_eq!(object["bands"]["sample"]["asked"], 0);
    let (code, words) = of(&["compare"], &[&exact, &thin]);
    assert_eq!(code, 1);
    assert!(words.contains("o holds -> ~ thin") && words.contains("at the worst found"), "{words}");
    assert_eq!(of(&["compare"], &[&thin, &exact]).0, 0);
}

#[test]
fn a_search_that_is_broken_off_leaves_open_what_it_has_not_found_short() {
    let report = |steps: Step| {
        let mut report = typical(&few(&step_transfer()));
        let stop = move |p: Progress| if p.step == steps { ControlFlow::Break(()) } else { ControlFlow::Continue(()) };
        let bands = report_bands(&report, &stop).unwrap().unwrap();
        assert!(bands.is_partial());
        report.add_bands(bands).unwrap();
        report
    };
    let none = report(Step::Corners);
    assert!(none.margins.iter().all(|m| m.verdict == Verdict::Open), "{:?}", none.margins);
    assert!(none.bands.as_ref().unwrap().study.found.partial);
    // All corners were tried by then: the one that is short is known, no other check can be said to hold.
    let corners = report(Step::Refining);
    let of = |report: &Report, id: &str| report.margins.iter().find(|m| m.id == id).unwrap().verdict;
    assert_eq!(of(&corners, "line_load"), Verdict::Thin);
    // The search is whole and only the sample is a part.
    let searched = report(Step::Sample);
    assert_eq!(of(&searched, "line_load"), Verdict::Thin);
    assert!(searched.band_of(&searched.margins[0]).unwrap().short.is_none());
    let object: Value = serde_json::from_str(&json(&searched, Layout::Lines)).unwrap();
    assert_eq!((&object["bands"]["partial"], &object["bands"]["search"]["partial"]), (&true.into(), &false.into()));
    let words = text(&searched, UnitSystem::Metric, Paint::Plain);
    assert!(words.contains("STOPPED EARLY"), "{words}");
}

#[test]
fn where_no_band_changes_a_check_its_row_names_no_place() {
    let run = assert_cmd::cargo::cargo_bin_cmd!("underfoot").args(["run", "scenarios/roof-foot-level.toml"]).output();
    let words = String::from_utf8(run.unwrap().stdout).unwrap();
    assert!(words.contains("\n      no band changes it") && !words.contains("at  no band"), "{words}");
    assert!(words.contains("\n      at  "), "{words}");
}

/// Scenarios that are thin on purpose; every other one keeps the verdict of its typical values.
const THIN: &[&str] = &["step-transfer"];

#[test]
fn every_shipped_scenario_keeps_its_verdict_at_the_worst_found_but_the_thin_ones() {
    for entry in std::fs::read_dir(shipped("")).unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_none_or(|ending| ending != "toml") {
            continue;
        }
        let name = path.file_stem().unwrap().to_string_lossy().into_owned();
        let loaded = load(&path).unwrap();
        let scenario = loaded.scenario;
        let mut report = report(&name, &loaded.text, &scenario).unwrap();
        let before = report.verdict;
        // Two samples: only the search decides here.
        let sampling = underfoot::study::Sampling { samples: 2, seed: 1 };
        let bands = underfoot::study::bands(&Evaluator::new(&scenario).unwrap(), sampling, &unwatched).unwrap();
        if let Some(bands) = bands {
            report.add_bands(bands).unwrap();
        }
        let expected = if THIN.contains(&name.as_str()) { Verdict::Thin } else { before };
        assert_eq!(report.verdict, expected, "{name}");
        assert!(THIN.contains(&name.as_str()) || report.margins.iter().all(|m| m.verdict != Verdict::Thin), "{name}");
    }
}

#[test]
fn every_quantity_of_a_file_takes_a_band() {
    for name in ["overhead-anchor.toml", "timber-beam-harness.toml", "lifeline-with-sag.toml", "canopy-edge.toml"] {
        let path = shipped(name);
        let document = underfoot::scenario::Document::open(&path).unwrap();
        let whole = ["anchor.span.workers", "anchor.span.spans"];
        for input in underfoot::scenario::inputs(document.scenario()) {
            let typical = input.measure.si();
            if whole.contains(&input.path.as_str()) || input.path == "gravity" {
                continue;
            }
            let unit = input.measure.unit.symbol();
            let value = |factor: f64| typical * factor / input.measure.unit.factor();
            let (low, high) = if typical < 0.0 { (1.001, 0.999) } else { (0.999, 1.001) };
            let band = format!("{}..{}..{} {unit}", value(low), value(1.0), value(high));
            let wide = document.with_value(&input.path, band.trim()).unwrap_or_else(|f| panic!("{}", f.render(false)));
            let found = underfoot::scenario::inputs(wide.scenario());
            let found = found.iter().find(|i| i.path == input.path).unwrap();
            assert!(found.measure.band.is_wide() || typical == 0.0, "{} of {name}", input.path);
        }
    }
}
