//! Scenario files: reading, inputs by path, doubts, and no panic on any text.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
use proptest::prelude::*;
use underfoot::quantity::{Dimension, Shape};
use underfoot::scenario::{
    AnchorKind, DampingLaw, FIELDS, StretchLaw, SubjectKind, doubts, field_for, inputs, new_file, places, read,
    with_value,
};

/// A complete file with one key a line, to build others from.
const ROOF: &str = r#"title = "roof edge"
datum = "yard"
[subject]
kind = "person"
mass = "80..100..120 kg"   # with tools
attachment_above_feet = "1.5 m"
[place]
standing = "10 m"
anchor = "12 m"
[line]
kind = "lanyard"
length = "6 ft 6 in"
stiffness = "60 kN/m"
damping_ratio = 0.08
strength = "22 kN"
[absorber]
deploy_force = "4 kN"
stroke = "1.1 m"
rated_mass = "140 kg"
rated_free_fall = "4 m"
[anchor]
kind = "sprung"
stiffness = "500 kN/m"
capacity = "15 kN"
[[obstacle]]
name = "Plant-room  roof"
top = "4 m"
reserve = "1 m"
from = "-1 m"
to = "2 m"
[[obstacle]]
name = "yard"
top = "0 m"
reserve = "1 m"
[limits]
basis = "eu-363"
arrest_force = { value = "5 kN", why = "house rule" }
"#;

fn scenario(text: &str) -> underfoot::scenario::Scenario {
    read("test.toml", text).unwrap_or_else(|faults| panic!("{}", faults.render(false)))
}

#[test]
fn a_complete_file_reads_into_si() {
    let s = scenario(ROOF);
    assert_eq!(s.subject.kind, SubjectKind::Person);
    assert_eq!((s.subject.mass.band.low, s.subject.mass.band.high), (80.0, 120.0));
    assert_eq!(s.line.length.unwrap().si(), 78.0 * 0.0254);
    assert!(matches!(&s.line.stretch, StretchLaw::Stiffness(k) if k.si() == 60_000.0));
    assert!(matches!(&s.line.damping, DampingLaw::Ratio(r) if r.si() == 0.08));
    assert!(matches!(&s.anchor.kind, AnchorKind::Sprung(c) if c.stiffness.si() == 500_000.0));
    assert_eq!(s.gravity.si(), 9.80665);
    assert_eq!(s.obstacles[0].id(), "plant-room_roof");
    assert_eq!(s.obstacles[0].extent.unwrap().0.si(), -1.0);
    assert_eq!(s.limits.own[0].why.as_deref(), Some("house rule"));
}

#[test]
fn other_ways_to_state_a_line_read_too() {
    let law = |line: &str| scenario(&ROOF.replace("stiffness = \"60 kN/m\"", line)).line.stretch;
    assert!(matches!(law("modulus = \"5600 lbf\""), StretchLaw::Modulus(_)));
    assert!(matches!(
        law("rated_impact = { force = \"9 kN\", mass = \"80 kg\", fall_factor = 1.77 }"),
        StretchLaw::RatedImpact { fall_factor, .. } if fall_factor.si() == 1.77
    ));
    for percent in ["5", "5.0", "\"5 %\"", "\"5\""] {
        let text = format!("static_elongation = {{ percent = {percent}, from = \"50 kg\", to = \"1.5 kN\" }}");
        let StretchLaw::StaticElongation { percent, from, to } = law(&text) else { panic!("{text}") };
        assert_eq!(percent.si(), 0.05, "{text}");
        assert_eq!((from.dimension(), to.dimension()), (Dimension::Mass, Dimension::Force));
    }
}

#[test]
fn a_band_reads_in_its_long_form_with_a_shape() {
    let text = ROOF.replace(
        "\"80..100..120 kg\"",
        "{ low = \"80 kg\", typical = \"210 lb\", high = \"120 kg\", shape = \"triangular\" }",
    );
    let band = scenario(&text).subject.mass.band;
    assert_eq!(band.shape, Shape::Triangular);
    assert_eq!((band.low, band.typical, band.high), (80.0, 210.0 * 0.453_592_37, 120.0));
}

#[test]
fn free_fall_may_be_stated_with_or_without_a_standing_surface() {
    let bare = ROOF.replace("standing = \"10 m\"\nanchor = \"12 m\"", "");
    assert!(read("t", &bare).is_err());
    let stated = bare.replace("[line]", "[fall]\nfree_fall = \"1.2 m\"\n[line]");
    assert_eq!(scenario(&stated).fall.free_fall.unwrap().si(), 1.2);
    let both = stated.replace("[place]\n", "[place]\nstanding = \"10 m\"\n");
    assert_eq!(scenario(&both).place.standing.unwrap().si(), 10.0);
    let short = "[subject]\nkind = \"load\"\nmass = \"50 kg\"\n[fall]\nfree_fall = \"0 m\"\n[line]\nkind = \"cable\"\nstiffness = \"9 kN/m\"\n";
    assert_eq!(scenario(short).line.length, None);
}

#[test]
fn an_anchor_offset_of_zero_is_accepted() {
    scenario(&ROOF.replace("anchor = \"12 m\"", "anchor = \"12 m\"\nanchor_offset = \"0 m\""));
}

#[test]
fn the_new_file_reads_without_a_fault_and_names_every_key() {
    let text = new_file();
    let s = scenario(&text);
    assert!(doubts("new", &text, &s).faults.is_empty(), "{}", doubts("new", &text, &s).render(false));
    for field in FIELDS {
        assert!(text.contains(&format!("{} = ", field.key())), "{} is absent", field.path);
    }
    let longest = text.lines().max_by_key(|line| line.len()).unwrap();
    assert!(longest.len() <= 140, "a line is too long: {longest}");
}

#[test]
fn every_field_of_a_file_is_an_input_with_its_place() {
    let s = scenario(ROOF);
    let paths: Vec<String> = inputs(&s).into_iter().map(|input| input.path).collect();
    let expected = [
        "gravity",
        "subject.mass",
        "subject.attachment_above_feet",
        "place.standing",
        "place.anchor",
        "line.length",
        "line.stiffness",
        "line.damping_ratio",
        "line.strength",
        "absorber.deploy_force",
        "absorber.stroke",
        "absorber.rated_mass",
        "absorber.rated_free_fall",
        "anchor.stiffness",
        "anchor.capacity",
        "obstacle.1.top",
        "obstacle.1.from",
        "obstacle.1.to",
        "obstacle.1.reserve",
        "obstacle.2.top",
        "obstacle.2.reserve",
    ];
    assert_eq!(paths, expected);
    let places = places(ROOF);
    assert_eq!(&ROOF[places.of("obstacle.2.top")], "\"0 m\"");
    assert_eq!(&ROOF[places.of("limits.basis")], "\"eu-363\"");
    assert_eq!(&ROOF[places.of("subject.half_width")], "subject");
}

#[test]
fn a_value_is_replaced_by_its_path_within_its_range_only() {
    let s = scenario(ROOF);
    for input in inputs(&s) {
        let value = input.measure.si() * 1.001 + 1e-6;
        let changed = with_value(&s, &input.path, value).unwrap_or_else(|| panic!("{}", input.path));
        let now = inputs(&changed).into_iter().find(|other| other.path == input.path).unwrap();
        assert_eq!(now.measure.si(), value, "{}", input.path);
        assert_eq!(with_value(&s, &input.path, 1e308), None, "{}", input.path);
        assert_eq!(with_value(&s, &input.path, f64::NAN), None, "{}", input.path);
    }
    let band = with_value(&s, "subject.mass", 90.0).unwrap().subject.mass.band;
    assert_eq!((band.low, band.typical, band.high), (80.0, 90.0, 120.0));
    let band = with_value(&s, "subject.mass", 130.0).unwrap().subject.mass.band;
    assert_eq!((band.low, band.typical, band.high), (80.0, 130.0, 130.0));
    assert_eq!(with_value(&s, "line.modulus", 5000.0), None);
    assert_eq!(with_value(&s, "obstacle.3.top", 1.0), None);
    assert_eq!(with_value(&s, "obstacle.1.to", -2.0), None, "an extent turned round");
}

#[test]
fn a_concrete_path_finds_its_field() {
    assert_eq!(field_for("obstacle.12.top").unwrap().path, "obstacle.*.top");
    assert_eq!(field_for("line.stiffness").unwrap().dimension, Some(Dimension::Stiffness));
    assert!(field_for("line.colour").is_none());
}

#[test]
fn limits_of_the_model_and_of_the_table_are_the_same() {
    for (key, dimension, _) in underfoot::scenario::LIMIT_KEYS {
        assert_eq!(field_for(&format!("limits.{key}")).map(|f| f.dimension), Some(Some(*dimension)), "{key}");
    }
}

#[test]
fn every_example_of_the_table_lies_within_its_range() {
    use underfoot::quantity::parse_measure;
    for field in FIELDS {
        let Some(dimension) = field.dimension else { continue };
        let text = field.example.trim_matches('"');
        let Ok(measure) = parse_measure(text, dimension).or_else(|_| parse_measure(text, Dimension::Mass)) else {
            panic!("{}: {text}", field.path)
        };
        let value = if field.path.ends_with("percent") { measure.si() / 100.0 } else { measure.si() };
        assert!((field.least..=field.most).contains(&value), "{}", field.path);
    }
}

fn doubt_messages(text: &str) -> Vec<String> {
    doubts("t", text, &scenario(text)).faults.into_iter().map(|fault| fault.message).collect()
}

#[test]
fn a_sound_file_raises_no_doubt() {
    let sound = ROOF.replace("[place]", "stretch_allowance = \"0.3 m\"\n[place]");
    assert_eq!(doubt_messages(&sound), Vec::<String>::new());
    assert_eq!(doubt_messages(ROOF), ["nothing is allowed for the stretch of the harness"]);
}

#[test]
fn each_doubt_is_raised_by_the_statement_it_is_about() {
    let cases: &[(&str, &str, &str)] = &[
        ("80..100..120 kg", "80..100..210 kg", "above 200 kg"),
        ("80..100..120 kg", "35 kg", "below 40 kg"),
        ("\"1.5 m\"", "\"11.5 m\"", "above the feet"),
        ("damping_ratio = 0.08", "damping_ratio = 1.5", "above critical"),
        ("damping_ratio = 0.08", "damping = \"9 kN s/m\"", "above critical"),
        ("anchor = \"12 m\"", "anchor = \"9.5 m\"", "below the standing surface"),
        ("deploy_force = \"4 kN\"", "deploy_force = \"1 kN\"", "does not exceed the weight"),
        ("rated_mass = \"140 kg\"\n", "", "no `rated_mass`"),
        ("rated_free_fall = \"4 m\"\n", "", "no `rated_free_fall`"),
        ("strength = \"22 kN\"", "strength = \"3 kN\"", "before the absorber starts"),
        ("datum = \"yard\"\n", "", "what elevation 0 is"),
        ("top = \"0 m\"\nreserve = \"1 m\"", "top = \"0 m\"", "obstacle 2 has no reserve"),
        ("top = \"4 m\"", "top = \"11 m\"", "above the start"),
        ("basis = \"eu-363\"\n", "", "without a basis"),
        ("[anchor]", "[harness]\nstiffness = \"80 kN/m\"\n[anchor]", ""),
        (
            "stiffness = \"60 kN/m\"",
            "static_elongation = { percent = 0.034, from = \"50 kg\", to = \"150 kg\" }",
            "of a steel bar",
        ),
        ("title", "gravity = \"1.62 m/s2\"\ntitle", "gravity is"),
        ("attachment_above_feet = \"1.5 m\"", "attachment_above_feet = \"1.5 m\"\nbody_factor = 1.3", "body factor"),
    ];
    for (from, to, message) in cases {
        let text = ROOF.replace(from, to);
        assert_ne!(text, ROOF, "`{from}` is not in the file");
        let found = doubt_messages(&text);
        if message.is_empty() {
            assert_eq!(found, Vec::<String>::new(), "{to}");
        } else {
            assert!(found.iter().any(|m| m.contains(message)), "{to}: {found:?}");
        }
    }
    let twice = ROOF.replace("[place]", "stretch_allowance = \"0.3 m\"\n[harness]\nstiffness = \"80 kN/m\"\n[place]");
    assert!(doubt_messages(&twice).iter().any(|m| m.contains("both count its stretch")));
    let bare = "[subject]\nkind = \"load\"\nmass = \"50 kg\"\n[fall]\nfree_fall = \"0 m\"\n[line]\nkind = \"cable\"\nstiffness = \"9 kN/m\"\n[harness]\nstiffness = \"9 kN/m\"";
    let found = doubt_messages(bare).join("\n");
    for message in ["a load has a harness", "no limits are stated", "no obstacle is stated"] {
        assert!(found.contains(message), "{found}");
    }
}

#[test]
fn more_than_two_hundred_obstacles_and_large_files_are_refused() {
    let obstacle = |n: usize| format!("[[obstacle]]\nname = \"o{n}\"\ntop = \"0 m\"\nreserve = \"1 m\"\n");
    let many = ROOF.to_owned() + &(0..198).map(obstacle).collect::<String>();
    scenario(&many);
    let faults = read("t", &(many + &obstacle(999))).unwrap_err();
    assert_eq!(faults.faults[0].message, "more than 200 obstacles and faces");
    let large = format!("{ROOF}\n# {}", "x".repeat(1 << 20));
    assert!(read("t", &large).unwrap_err().faults[0].message.contains("more than 1 MiB"));
}

#[test]
fn nesting_without_end_is_refused_and_does_not_overflow() {
    let deep = format!("title = {}", "[".repeat(200_000));
    assert!(read("t", &deep).is_err());
    let tables = format!("title = {}", "{a=".repeat(50_000));
    assert!(read("t", &tables).is_err());
}

#[test]
fn rows_carry_line_column_and_words_for_machines() {
    let text = ROOF.replace("stiffness = \"60 kN/m\"", "stifness = \"60 kN/m\"");
    let rows = read("t", &text).unwrap_err().rows();
    assert_eq!(rows.len(), 1, "{rows:?}");
    let row = rows.iter().find(|row| row.message.contains("stifness")).unwrap();
    assert_eq!((row.line, row.column), (13, 1));
    assert_eq!(row.hint.as_deref(), Some("did you mean `stiffness`?"));
    assert!(serde_json::to_string(&rows).unwrap().contains("\"severity\":\"error\""));
}

proptest! {
    #[test]
    fn no_text_panics_and_every_fault_renders(text in "\\PC{0,200}|[\\[\\]a-z=\"'.#\n{}, 0-9-]{0,200}") {
        if let Err(faults) = read("any", &text) {
            prop_assert!(!faults.faults.is_empty());
            prop_assert!(!faults.render(false).is_empty() && !faults.render(true).is_empty());
        }
        let _ = places(&text);
    }

    #[test]
    fn no_damaged_file_panics(at in 0_usize..900, cut in 0_usize..40, put in "\\PC{0,8}") {
        let start = (0..=at.min(ROOF.len())).rev().find(|at| ROOF.is_char_boundary(*at)).unwrap_or(0);
        let end = (start + cut).min(ROOF.len());
        let text = format!("{}{put}{}", &ROOF[..start], &ROOF[end..]);
        match read("damaged", &text) {
            Ok(scenario) => { let _ = doubts("damaged", &text, &scenario).render(false); }
            Err(faults) => prop_assert!(!faults.render(false).is_empty()),
        }
    }
}
