//! Geometry that contradicts itself, from the file to the exit code; and swings that become straight falls.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
use assert_cmd::cargo::cargo_bin_cmd;
use proptest::prelude::*;
use std::fmt::Write as _;
use underfoot::estimate::{Estimate, estimate};
use underfoot::scenario::read;

/// An anchor 3 m beside the fall line and 1 m above the attachment: sqrt(10) m away from it.
const FILE: &str = r#"datum = "yard"
[subject]
kind = "person"
mass = "100 kg"
attachment_above_feet = "1.5 m"
half_width = "0.25 m"
[place]
standing = "10 m"
anchor = "12.5 m"
anchor_offset = "3 m"
[line]
kind = "rope"
length = "4 m"
stiffness = "60 kN/m"
damping_ratio = 0.1
"#;

/// A span right above the fall line.
const SPAN: &str = "[anchor]\nkind = \"span\"\nspan = { length = \"8 m\", sag = \"0.2 m\", modulus = \"3000 kN\" }\n";

fn edge(offset: &str, elevation: &str) -> String {
    let beside = format!("anchor_offset = \"3 m\"\nedge = {{ offset = \"{offset}\", elevation = \"{elevation}\" }}");
    FILE.replace("anchor_offset = \"3 m\"", &beside)
}

fn on_a_span() -> String {
    FILE.replace("anchor_offset = \"3 m\"\n", "") + SPAN
}

/// What `run` says on standard error; the exit code is 2 and nothing is printed as a result.
fn refusal(text: &str) -> String {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("clash.toml");
    std::fs::write(&path, text).unwrap();
    let mut run = cargo_bin_cmd!("underfoot");
    run.env_remove("CLICOLOR_FORCE").env("NO_COLOR", "1").timeout(std::time::Duration::from_secs(60));
    let output = run.arg("run").arg(&path).assert().code(2).stdout("").get_output().clone();
    String::from_utf8(output.stderr).unwrap()
}

/// Holds a refusal to every piece of its text and to the line it points at.
fn refused(text: &str, pieces: &[&str], at: &str) {
    let said = refusal(text);
    for piece in pieces {
        assert!(said.contains(piece), "no `{piece}` in\n{said}");
    }
    let line = 1 + text.lines().position(|line| line.starts_with(at)).unwrap();
    assert!(said.contains(&format!("clash.toml:{line}:")), "not at line {line}\n{said}");
    assert!(said.contains("= help: "), "no hint in\n{said}");
}

#[test]
fn the_file_that_the_others_are_made_from_solves_and_so_does_its_span() {
    solved(FILE);
    solved(&on_a_span());
    solved(&edge("1 m", "11.5 m"));
}

#[test]
fn a_line_shorter_than_the_distance_to_the_attachment_is_refused() {
    // sqrt(3^2 + 1^2).
    let text = FILE.replace("length = \"4 m\"", "length = \"3.1 m\"");
    refused(&text, &["the line of `3.100` m", "shorter than the distance of `3.162` m"], "length =");
}

#[test]
fn a_line_within_a_nanometre_of_the_distance_is_taut_and_solves() {
    let text = FILE.replace("length = \"4 m\"", "length = \"3.16227766016837952 m\"");
    assert_eq!(solved(&text).numbers.get("free_fall_distance"), Some(0.0));
}

#[test]
fn an_edge_above_the_way_from_the_anchor_to_the_attachment_is_refused() {
    // The straight way at 1 m: 11.5 + 1/3.
    let text = edge("1 m", "12 m");
    refused(&text, &["the edge at elevation `12.000` m is above", "there at `11.833` m"], "edge =");
}

#[test]
fn an_edge_out_of_the_lines_reach_is_refused() {
    // sqrt(2^2 + 4.5^2).
    let text = edge("1 m", "8 m");
    refused(&text, &["the line of `4.000` m", "the distance of `4.924` m", "to the edge"], "edge =");
}

#[test]
fn an_edge_on_the_far_side_of_the_fall_line_is_refused() {
    refused(
        &edge("-1 m", "11 m"),
        &["edge at offset `-1.000` m is not between the anchor at offset `3.000` m"],
        "edge =",
    );
}

#[test]
fn an_edge_that_the_taut_line_passes_above_is_refused() {
    // The line of 4 m is taut on the fall line at 12.5 - sqrt(7) = 9.854; at 1 m its way is at 10.736.
    refused(
        &edge("1 m", "10.5 m"),
        &["the edge at elevation `10.500` m is not touched", "there at `10.736` m"],
        "edge =",
    );
}

#[test]
fn a_span_shorter_than_its_sag_or_level_difference_allows_is_refused() {
    let sag = on_a_span().replace("sag = \"0.2 m\"", "sag = \"4 m\"");
    refused(&sag, &["a span of `8 m` is too short for a sag of `4 m`"], "span =");
    let level = on_a_span().replace("sag =", "level_difference = \"-8 m\", sag =");
    refused(&level, &["a span of `8 m` is too short for a level difference of `-8 m`"], "span =");
}

#[test]
fn a_load_outside_of_its_span_is_refused() {
    let text = on_a_span().replace("sag =", "at = \"8.5 m\", sag =");
    refused(&text, &["a load at `8.5 m`", "a span of `8 m`"], "span =");
}

#[test]
fn an_absorber_in_the_cable_below_the_pretension_is_refused() {
    let absorber = "pretension = \"5 kN\", absorber = { deploy_force = \"4 kN\", stroke = \"0.5 m\" }";
    let text = on_a_span().replace("sag = \"0.2 m\"", absorber);
    refused(&text, &["an absorber of `4 kN` deploys under the pretension of `5 kN`"], "span =");
}

#[test]
fn an_anchor_below_the_obstacle_it_must_clear_is_refused() {
    let text = FILE.to_owned() + "[[obstacle]]\nname = \"upper roof\"\ntop = \"13 m\"\n";
    refused(&text, &["the anchor at `12.5 m` lies below the top of `upper roof` at `13 m`"], "top =");
    let beside = text + "from = \"4 m\"\nto = \"6 m\"\n";
    solved(&beside);
}

#[test]
fn a_span_with_a_damped_harness_is_refused_and_with_a_plain_one_solved() {
    let text = on_a_span() + "[harness]\nstiffness = \"80 kN/m\"\ndamping = \"900 N s/m\"\n";
    refused(
        &text,
        &["damping of the harness is not solved beside a horizontal lifeline", "leave out `harness.damping`"],
        "damping =",
    );
    solved(&text.replace("damping = \"900 N s/m\"\n", ""));
}

#[test]
fn a_span_with_its_line_beside_the_fall_line_is_refused() {
    let text = FILE.to_owned() + SPAN;
    let pieces = ["a line beside the fall line pulls a horizontal lifeline sideways", "`place.anchor_offset`"];
    refused(&text, &pieces, "kind = \"span\"");
    refused(&(edge("1 m", "11.5 m") + SPAN), &pieces, "kind = \"span\"");
    // Over an edge on the fall line itself the fall is straight, but the line still pulls the span aside.
    refused(&(edge("0 m", "11.4 m") + SPAN), &pieces, "kind = \"span\"");
}

fn solved(text: &str) -> Estimate {
    let scenario = read("geometry.toml", text).unwrap_or_else(|faults| panic!("{}", faults.render(false)));
    estimate(&scenario).unwrap_or_else(|error| panic!("{error}\n{text}"))
}

/// Inputs of a straight fall; `anchor_offset` is added to make a swing of it.
#[derive(Clone, Debug)]
struct Straight {
    mass_kg: f64,
    length_m: f64,
    anchor_above_m: f64,
    stiffness_kn_per_m: f64,
    damping_ratio: f64,
    absorber_kn: Option<f64>,
    sprung_kn_per_m: Option<f64>,
}

impl Straight {
    fn text(&self, place: &str) -> String {
        let Self { mass_kg, length_m, stiffness_kn_per_m, damping_ratio, .. } = self;
        let anchor_m = 21.5 + self.anchor_above_m;
        let mut text = format!(
            "[subject]\nkind = \"person\"\nmass = \"{mass_kg} kg\"\nattachment_above_feet = \"1.5 m\"\n\
             [place]\nstanding = \"20 m\"\nanchor = \"{anchor_m} m\"\n{place}\n\
             [line]\nkind = \"lanyard\"\nlength = \"{length_m} m\"\nstiffness = \"{stiffness_kn_per_m} kN/m\"\n\
             damping_ratio = {damping_ratio}\n",
        );
        if let Some(force) = self.absorber_kn {
            write!(text, "[absorber]\ndeploy_force = \"{force} kN\"\nstroke = \"1.5 m\"\n").unwrap();
        }
        if let Some(stiffness) = self.sprung_kn_per_m {
            write!(text, "[anchor]\nkind = \"sprung\"\nstiffness = \"{stiffness} kN/m\"\n").unwrap();
        }
        text
    }
}

fn straight() -> impl Strategy<Value = Straight> {
    let absorber = prop_oneof![Just(None), (2.5..5.0).prop_map(Some)];
    let sprung = prop_oneof![Just(None), (100.0..900.0).prop_map(Some)];
    (60.0..130.0, 1.0..4.0, -0.95..0.9, 20.0..90.0, 0.02..0.3, absorber, sprung).prop_map(
        |(mass_kg, length_m, share, stiffness_kn_per_m, damping_ratio, absorber_kn, sprung_kn_per_m)| Straight {
            mass_kg,
            length_m,
            anchor_above_m: share * length_m,
            stiffness_kn_per_m,
            damping_ratio,
            absorber_kn,
            sprung_kn_per_m,
        },
    )
}

/// Where the swing's numbers leave those of the straight fall.
fn apart(swing: &Estimate, fall: &Estimate) -> Vec<String> {
    let ids = ["free_fall_distance", "speed_at_taut", "arrest_force_peak", "lowest_attachment", "lowest_foot"];
    let apart = |id: &&str| {
        let [a, b] = [swing, fall].map(|run| run.numbers.get(id).unwrap_or(f64::NAN));
        a.is_nan() || b.is_nan() || (a - b).abs() > 1e-5 * b.abs().max(1.0)
    };
    ids.into_iter()
        .filter(apart)
        .map(|id| format!("{id}: {:?}, straight {:?}", swing.numbers.get(id), fall.numbers.get(id)))
        .collect()
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(200))]

    #[test]
    fn with_an_offset_that_vanishes_the_swing_becomes_the_straight_fall(case in straight(), left in any::<bool>()) {
        let fall = solved(&case.text(""));
        let offset = if left { "-0.000001 m" } else { "0.000001 m" };
        let swing = solved(&case.text(&format!("anchor_offset = \"{offset}\"")));
        prop_assert!(fall.plane.is_none() && swing.plane.is_some());
        prop_assert_eq!(apart(&swing, &fall), Vec::<String>::new());
    }

    #[test]
    fn over_an_edge_whose_offset_vanishes_too(case in straight(), share in 0.1..0.9_f64) {
        let case = Straight { anchor_above_m: case.anchor_above_m.max(0.05), ..case };
        // Behind the edge: a share of the line, 0.3 of it aside; the edge is never above the way to the attachment.
        let (aside, behind) = (0.3 * case.length_m * share, case.length_m * share);
        let elevation = 21.5 + case.anchor_above_m - (behind * behind - aside * aside).sqrt();
        let edge = |offset: f64| format!(
            "anchor_offset = \"{:.9} m\"\nedge = {{ offset = \"{offset:.9} m\", elevation = \"{elevation} m\" }}",
            aside + offset
        );
        let over = |offset| read("edge.toml", &case.text(&edge(offset))).ok().and_then(|s| estimate(&s).ok());
        let (Some(swing), Some(fall)) = (over(1e-6), over(0.0)) else { return Err(TestCaseError::reject("refused")) };
        prop_assert!(fall.plane.is_none() && swing.plane.is_some());
        prop_assert_eq!(apart(&swing, &fall), Vec::<String>::new());
    }
}
