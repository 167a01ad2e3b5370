//! The choices of a new file: made one by one, each gives a file that reads, solves and is judged.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
use underfoot::estimate::{Estimate, Validity, estimate};
use underfoot::margin::{Verdict, margins};
use underfoot::scenario::{FIELDS, Scenario, new_file, read};

/// The section that a header opens, made or still a comment: `place.edge` of `# [place.edge]`.
fn opened(line: &str) -> Option<&str> {
    let header = line.trim_start_matches("# ");
    header.strip_prefix('[').map(|rest| rest.trim_start_matches('[').trim_end_matches(']'))
}

/// The key of a line, made or still a comment.
fn key_of(line: &str) -> Option<&str> {
    let (key, _) = line.trim_start_matches("# ").split_once(" = ")?;
    (!key.contains(' ')).then_some(key)
}

/// A new file with keys uncommented (their sections with them) and others taken out, by path (`line.curve`).
fn made(keys: &[&str], out: &[&str]) -> String {
    let mut left: Vec<&str> = keys.iter().chain(out).copied().collect();
    let mut section = String::new();
    let mut lines: Vec<String> = Vec::new();
    for line in new_file().lines() {
        if let Some(name) = opened(line) {
            name.clone_into(&mut section);
            let wanted = keys.iter().any(|key| key.rsplit_once('.').is_some_and(|(own, _)| own == name));
            lines.push(if wanted { line.trim_start_matches("# ").to_owned() } else { line.to_owned() });
            continue;
        }
        let path = key_of(line).map(|key| if section.is_empty() { key.to_owned() } else { format!("{section}.{key}") });
        let path = path.as_deref().unwrap_or_default();
        left.retain(|key| *key != path);
        if keys.contains(&path) {
            lines.push(line.trim_start_matches("# ").to_owned());
        } else if !out.contains(&path) {
            lines.push(line.to_owned());
        }
    }
    assert!(left.is_empty(), "the new file has no {left:?}");
    lines.join("\n")
}

fn scenario(text: &str) -> Scenario {
    read("new.toml", text).unwrap_or_else(|faults| panic!("{}\n{text}", faults.render(false)))
}

/// Solves and judges; the model must be valid for it.
fn solved(text: &str) -> Estimate {
    let scenario = scenario(text);
    let run = estimate(&scenario).unwrap_or_else(|error| panic!("{error}\n{text}"));
    assert!(run.validity.is_empty(), "{:?}\n{text}", run.validity);
    assert!(!margins(&scenario, &run).unwrap().is_empty());
    assert!(run.numbers.get("arrest_force_peak").is_some_and(|force| force > 980.0), "no force\n{text}");
    run
}

fn with_kind(text: &str, from: &str, to: &str) -> String {
    let changed = text.replacen(&format!("kind = \"{from}\""), &format!("kind = \"{to}\""), 1);
    assert_ne!(changed, text);
    changed
}

const SPAN: &[&str] = &[
    "anchor.kind",
    "anchor.span.length",
    "anchor.span.at",
    "anchor.span.pretension",
    "anchor.span.modulus",
    "anchor.span.support_stiffness",
    "anchor.span.level_difference",
    "anchor.span.workers",
    "anchor.span.spans",
    "anchor.span.strength",
];

fn span(text: &str) -> String {
    with_kind(text, "fixed", "span")
}

#[test]
fn a_new_file_solves_and_every_check_has_its_numbers() {
    solved(&new_file());
}

#[test]
fn every_single_choice_beside_the_others_solves() {
    for key in [
        "notes",
        "gravity",
        "subject.half_width",
        "subject.body_factor",
        "place.anchor_offset",
        "line.series_stiffness",
        "line.mass_per_length",
        "absorber.onset_force",
        "absorber.packed_length",
        "absorber.wet_cold_factor",
        "harness.stiffness",
        "anchor.kind",
    ] {
        solved(&made(&[key], &[]));
    }
}

#[test]
fn every_choice_instead_of_another_solves() {
    for (choice, instead_of) in [
        ("fall.free_fall", "place.anchor"),
        ("line.modulus", "line.stiffness"),
        ("line.rated_impact", "line.stiffness"),
        ("line.static_elongation", "line.stiffness"),
        ("line.curve", "line.stiffness"),
        ("line.damping", "line.damping_ratio"),
        ("absorber.force_table", "absorber.deploy_force"),
    ] {
        solved(&made(&[choice], &[instead_of]));
    }
}

#[test]
fn an_edge_with_an_anchor_beside_the_fall_line_and_a_face_solves() {
    let keys = [
        "subject.half_width",
        "place.anchor_offset",
        "place.edge.offset",
        "place.edge.elevation",
        "place.edge.strength_factor",
        "face.*.name",
        "face.*.offset",
        "face.*.bottom",
        "face.*.top",
        "obstacle.*.from",
        "obstacle.*.to",
    ]
    .map(|key| key.replace(".*", ""));
    let run = solved(&made(&keys.each_ref().map(String::as_str), &[]));
    assert!(run.numbers.get("swing_drop").is_some_and(|drop| drop > 0.0));
    assert!(run.plane.is_some_and(|plane| plane.edge.is_some()));
}

#[test]
fn a_sprung_anchor_and_a_harness_with_their_dampers_solve() {
    let keys = ["harness.stiffness", "harness.damping", "anchor.kind", "anchor.stiffness", "anchor.damping"];
    let run = solved(&with_kind(&made(&keys, &[]), "fixed", "sprung"));
    assert!(run.numbers.get("other_elongation_peak").is_some_and(|stretch| stretch > 0.0));
}

#[test]
fn a_span_with_pretension_or_sag_with_or_without_an_absorber_solves() {
    let sag: Vec<&str> =
        SPAN.iter().map(|key| if key.ends_with("pretension") { "anchor.span.sag" } else { *key }).collect();
    let absorber = ["anchor.span.absorber.deploy_force", "anchor.span.absorber.stroke"];
    for keys in [SPAN, &sag] {
        for keys in [keys.to_vec(), [keys, &absorber].concat()] {
            let run = solved(&span(&made(&keys, &[])));
            assert!(run.numbers.get("span_tension_peak").is_some_and(|tension| tension > 1_000.0));
        }
    }
}

#[test]
fn a_retractable_line_a_vertical_line_and_a_load_solve() {
    let retractable = made(&["line.lock_travel", "line.slack"], &["line.length"]);
    let run = solved(&with_kind(&retractable, "lanyard", "retractable"));
    assert!((run.numbers.get("free_fall_distance").unwrap() - 0.6).abs() < 1e-12);
    let vertical = made(&["line.grab_slide"], &[]);
    let run = solved(&with_kind(&vertical, "lanyard", "vertical"));
    let without = solved(&new_file()).numbers.get("free_fall_distance").unwrap();
    assert!((run.numbers.get("free_fall_distance").unwrap() - without - 0.3).abs() < 1e-12);
    let load =
        made(&["subject.underside_below_attachment"], &["subject.attachment_above_feet", "subject.stretch_allowance"]);
    assert!(solved(&with_kind(&load, "person", "load")).numbers.get("lowest_underside").is_some());
}

#[test]
fn every_key_of_the_new_file_is_made_by_one_of_these_tests_or_wants_a_word_of_its_own() {
    let source = include_str!("new_file_solves.rs");
    let shown: Vec<String> = made(&[], &[]).lines().filter(|line| !line.starts_with('#')).map(str::to_owned).collect();
    for field in FIELDS.iter().filter(|field| !field.path.starts_with("limits.")) {
        let inside = ["line.rated_impact.", "line.static_elongation."].iter().any(|own| field.path.starts_with(own));
        let plain = shown.iter().any(|line| key_of(line) == Some(field.key()));
        assert!(inside || plain || source.contains(&format!("\"{}\"", field.path)), "{} is never made", field.path);
    }
}

#[test]
fn the_section_of_studies_is_read_and_changes_no_number() {
    let text = made(&["study.seed", "study.samples"], &[]);
    let study = scenario(&text).study;
    assert_eq!((study.seed, study.samples), (Some(1), Some(4096)));
    assert_eq!(solved(&text).numbers, solved(&new_file()).numbers);
}

#[test]
fn an_accepted_doubt_is_read_and_changes_no_number() {
    let keys = ["accept.*.doubt", "accept.*.at", "accept.*.why"].map(|path| path.replace(".*", ""));
    let text = made(&keys.each_ref().map(String::as_str), &[]);
    let [accepted] = &scenario(&text).accepted[..] else { panic!("not read\n{text}") };
    assert_eq!((accepted.doubt.as_str(), accepted.at.as_deref()), ("reserve-missing", Some("obstacle.1")));
    assert!(accepted.why.contains("plan 4"));
    assert_eq!(solved(&text).numbers, solved(&new_file()).numbers);
    assert_eq!(underfoot::scenario::inputs(&scenario(&text)), underfoot::scenario::inputs(&scenario(&new_file())));
}

#[test]
fn a_limit_over_a_published_set_asks_for_its_reason() {
    let text = made(&["limits.arrest_force"], &[]);
    assert!(read("new.toml", &text).unwrap_err().faults[0].message.contains("without a reason"));
    solved(&text.replacen("why = \"\"", "why = \"the harness's maker says so\"", 1));
}

#[test]
fn a_line_stretched_beyond_its_table_is_open_and_not_judged_as_if_the_table_went_on() {
    let text = made(&["line.curve"], &["line.stiffness", "line.damping_ratio"]);
    let short = text.replacen(", [\"0.3 m\", \"12 kN\"]", "", 1);
    assert_ne!(text, short);
    let scenario = scenario(&short);
    let run = estimate(&scenario).unwrap();
    // Undamped: 4 kN on 30 kN/m.
    assert!((run.numbers.get("line_elongation_peak").unwrap() - 4.0 / 30.0).abs() < 1e-9);
    let [Validity::LineBeyondTable { elongation_m, last_m }] = run.validity[..] else {
        panic!("{:?}", run.validity);
    };
    assert!((elongation_m - 4.0 / 30.0).abs() < 1e-9 && last_m == 0.1);
    let told = "line elongation of 0.133 m (0.437 ft) is beyond the 0.100 m (0.328 ft) where the line's table ends";
    assert!(run.warnings[0].contains(told) && run.warnings[0].contains("open"), "{:?}", run.warnings);
    let forces: Vec<_> = margins(&scenario, &run).unwrap().into_iter().filter(|m| m.id == "arrest_force").collect();
    assert_eq!(forces[0].verdict, Verdict::Open);
    assert!(forces[0].note.as_ref().is_some_and(|note| note.contains("0.133 m is beyond the 0.100 m")), "{forces:?}");
}
