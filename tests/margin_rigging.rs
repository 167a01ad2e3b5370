//! Checks of what a line hangs from and where it runs: lifelines, swings, edges, retractable and guided lines.
#![expect(clippy::unwrap_used, clippy::panic, reason = "a test stops at what it cannot have")]

use underfoot::estimate::{Number, Numbers, Value};
use underfoot::margin::{Margin, Rules, Verdict, margins_from, remarks};
use underfoot::quantity::{Dimension, UnitSystem};
use underfoot::scenario::{Scenario, read};
use underfoot::sheet::margin_words;

const SPAN: &str = r#"
[subject]
kind = "person"
mass = "100 kg"
attachment_above_feet = "1.5 m"
[fall]
free_fall = "1.5 m"
[line]
kind = "lanyard"
length = "2 m"
stiffness = "60 kN/m"
strength = "25 kN"
[anchor]
kind = "span"
capacity = "40 kN"
[anchor.span]
length = "12 m"
sag = "1 m"
modulus = "4000 kN"
strength = "40 kN"
"#;

const SWING: &str = r#"
[subject]
kind = "person"
mass = "100 kg"
attachment_above_feet = "1.5 m"
half_width = "0.3 m"
[place]
standing = "12 m"
anchor = "15 m"
anchor_offset = "2 m"
[line]
kind = "rope"
length = "3 m"
stiffness = "20 kN/m"
strength = "25 kN"
[[obstacle]]
name = "Yard"
top = "0 m"
reserve = "1 m"
[[face]]
name = "North wall"
offset = "6 m"
bottom = "0 m"
top = "20 m"
"#;

const RETRACTABLE: &str = r#"
[subject]
kind = "person"
mass = "100 kg"
attachment_above_feet = "1.5 m"
[place]
standing = "12 m"
anchor = "15 m"
[line]
kind = "retractable"
lock_travel = "0.4 m"
stiffness = "40 kN/m"
strength = "14 kN"
"#;

fn scenario(text: &str, basis: &str) -> Scenario {
    let limits = if basis.is_empty() { String::new() } else { format!("[limits]\nbasis = \"{basis}\"\n") };
    let text = format!("{text}{limits}");
    read("hand.toml", &text).unwrap_or_else(|faults| panic!("{}", faults.render(false)))
}

fn numbers(values: &[(&str, f64)]) -> Numbers {
    let number = |&(id, value): &(&str, f64)| Number {
        id: id.to_owned(),
        value: Value::Number(value),
        dimension: Dimension::Ratio,
        unit: "1",
    };
    values.iter().map(number).collect()
}

fn all(file: &Scenario, values: &[(&str, f64)]) -> Vec<Margin> {
    margins_from(file, &numbers(values), &[]).unwrap()
}

fn one(file: &Scenario, values: &[(&str, f64)], id: &str) -> Margin {
    all(file, values).into_iter().find(|m| m.id == id).unwrap_or_else(|| panic!("no check {id}"))
}

fn ids(file: &Scenario, values: &[(&str, f64)]) -> Vec<String> {
    all(file, values).into_iter().map(|m| m.id).collect()
}

fn tension(newton: f64) -> [(&'static str, f64); 4] {
    [
        ("span_end_force", newton),
        ("span_tension_peak", newton),
        ("anchor_force_peak", newton),
        ("arrest_force_peak", 4000.0),
    ]
}

#[test]
fn supports_and_cable_of_a_lifeline_carry_the_factor_of_the_set() {
    let file = scenario(SPAN, "us-1926");
    for (id, label) in [("span_end_load", "lifeline end load x 2"), ("span_tension", "lifeline tension x 2")] {
        let holds = one(&file, &tension(20_000.0), id);
        assert_eq!((holds.label.as_str(), holds.demand), (label, Some(40_000.0)));
        assert_eq!(holds.verdict, Verdict::Holds);
        assert!(holds.basis.words.contains("29 CFR 1926.502(d)(8)"), "{}", holds.basis.words);
        assert_eq!(one(&file, &tension(20_001.0), id).verdict, Verdict::Short);
        assert_eq!(one(&file, &[], id).verdict, Verdict::Open);
    }
}

#[test]
fn a_lifeline_is_not_judged_as_a_plain_anchor_as_well() {
    for basis in ["us-1926", "eu-363", "ca-ab", "au-qld"] {
        let file = scenario(SPAN, basis);
        let ids = ids(&file, &tension(10_000.0));
        assert!(ids.contains(&"span_end_load".to_owned()), "{ids:?}");
        assert!(!ids.iter().any(|id| id == "anchor_load" || id == "anchor_strength"), "{basis}: {ids:?}");
        let said = remarks(&Rules::of(&file).unwrap(), &file);
        assert!(said.iter().any(|words| words.contains("not applied to a horizontal lifeline")), "{basis}: {said:?}");
    }
}

#[test]
fn a_set_without_a_factor_for_lifelines_lends_its_own_or_says_that_there_is_none() {
    let ab = scenario(SPAN, "ca-ab");
    assert_eq!(one(&ab, &tension(10_000.0), "span_end_load").demand, Some(20_000.0));
    let eu = scenario(SPAN, "eu-363");
    for id in ["span_end_load", "span_tension"] {
        let check = one(&eu, &tension(10_000.0), id);
        assert_eq!(check.demand, Some(10_000.0));
        assert!(check.basis.words.contains("factor 1: `eu-363` states none"), "{}", check.basis.words);
    }
    let us = scenario(SPAN, "us-1910");
    assert_eq!(one(&us, &tension(10_000.0), "span_tension").demand, Some(20_000.0));
}

#[test]
fn a_lifeline_of_unknown_material_holds_by_the_larger_factor_only() {
    let file = scenario(SPAN, "sg-wsh");
    let at = |newton| one(&file, &tension(newton), "span_tension");
    assert_eq!((at(13_000.0).demand, at(13_000.0).verdict), (Some(39_000.0), Verdict::Holds));
    let open = at(15_000.0);
    assert_eq!(open.verdict, Verdict::Open);
    assert!(open.note.unwrap().contains("2 for a lifeline of wire"));
    assert_eq!(at(20_001.0).verdict, Verdict::Short);
}

#[test]
fn a_lifeline_without_stated_strengths_is_open_and_names_the_keys() {
    let bare = SPAN
        .replace("capacity = \"40 kN\"\n", "")
        .replace("modulus = \"4000 kN\"\nstrength = \"40 kN\"", "modulus = \"4000 kN\"");
    let file = scenario(&bare, "eu-363");
    for (id, key) in [("span_end_load", "`anchor.capacity`"), ("span_tension", "`anchor.span.strength`")] {
        let check = one(&file, &tension(10_000.0), id);
        assert_eq!(check.verdict, Verdict::Open);
        assert!(check.note.unwrap().contains(key));
    }
    let none = ids(&scenario(&bare, ""), &tension(10_000.0));
    assert!(!none.iter().any(|id| id.starts_with("span_")), "{none:?}");
}

#[test]
fn the_file_can_replace_the_factor_of_the_supports() {
    let text = format!("{SPAN}[limits]\nbasis = \"us-1926\"\nanchor_factor = {{ value = 3, why = \"old masonry\" }}\n");
    let check = one(&scenario(&text, ""), &tension(10_000.0), "span_end_load");
    assert_eq!((check.label.as_str(), check.demand), ("lifeline end load x 3", Some(30_000.0)));
    assert!(check.basis.words.contains("instead of 2 of us-1926") && check.basis.words.contains("old masonry"));
}

#[test]
fn a_prescribed_lifeline_is_judged_by_its_geometry() {
    let verdict = |text: &str, id: &str| one(&scenario(text, "ca-qc"), &tension(10_000.0), id).verdict;
    assert_eq!(verdict(SPAN, "span_length"), Verdict::Holds);
    let longer = SPAN.replace("length = \"12 m\"", "length = \"12.1 m\"");
    assert_eq!(verdict(&longer, "span_length"), Verdict::Short);
    assert_eq!(verdict(SPAN, "span_slack"), Verdict::Holds);
    assert_eq!(verdict(&longer, "span_slack"), Verdict::Short);
    let tight = SPAN.replace("sag = \"1 m\"", "pretension = \"1 kN\"");
    assert_eq!(verdict(&tight, "span_slack"), Verdict::Short);
    assert_eq!(verdict(SPAN, "span_workers"), Verdict::Holds);
    let crowd = SPAN.replace("sag = \"1 m\"", "sag = \"1 m\"\nworkers = 3");
    assert_eq!(verdict(&crowd, "span_workers"), Verdict::Short);
    assert_eq!(verdict(SPAN, "span_anchor_strength"), Verdict::Short);
    let strong = SPAN.replace("capacity = \"40 kN\"", "capacity = \"90 kN\"");
    assert_eq!(verdict(&strong, "span_anchor_strength"), Verdict::Holds);
    assert_eq!(verdict(&SPAN.replace("capacity = \"40 kN\"\n", ""), "span_anchor_strength"), Verdict::Open);
    assert_eq!(verdict(SPAN, "span_cable_diameter"), Verdict::Open);
}

#[test]
fn a_prescribed_geometry_belongs_to_its_set_and_to_lifelines() {
    let prescribed = ["span_length", "span_slack", "span_workers", "span_anchor_strength", "span_cable_diameter"];
    let us = ids(&scenario(SPAN, "us-1926"), &[]);
    let fixed = SPAN.split("[anchor]").next().unwrap();
    let plain = ids(&scenario(fixed, "ca-qc"), &[]);
    for id in prescribed {
        assert!(!us.iter().any(|i| i == id) && !plain.iter().any(|i| i == id), "{id}");
    }
    assert!(plain.contains(&"anchor_load".to_owned()));
}

#[test]
fn people_on_a_lifeline_are_counted_without_decimals() {
    let crowd = scenario(&SPAN.replace("sag = \"1 m\"", "sag = \"1 m\"\nworkers = 3"), "ca-qc");
    let words = margin_words(&crowd, &one(&crowd, &[], "span_workers"), UnitSystem::Metric);
    assert_eq!(words, "lifeline workers 3 of 2 allowed (1 short)");
}

/// A swing that misses everything, with some numbers replaced; what is not a number is taken away.
fn swung(changes: &[(&'static str, f64)]) -> Vec<(&'static str, f64)> {
    let usual = [
        ("free_fall_distance", 0.7),
        ("arrest_force_peak", 5000.0),
        ("anchor_force_peak", 5000.0),
        ("swing_drop", 0.9),
        ("swing_offset_peak", 4.0),
        ("swing_angle_peak", 0.9),
        ("lowest_attachment", 11.9),
        ("lowest_foot", 10.4),
        ("clearance.yard", 10.4),
        ("closest_approach.yard", 10.4),
        ("closest_approach.north_wall", 1.7),
    ];
    let kept = usual.into_iter().filter(|(id, _)| !changes.iter().any(|c| c.0 == *id));
    kept.chain(changes.iter().copied().filter(|c| !c.1.is_nan())).collect()
}

const ABSENT: f64 = f64::NAN;

#[test]
fn a_swing_that_meets_a_face_or_a_level_is_short_and_tells_how_hard() {
    let file = scenario(SWING, "");
    assert_eq!(one(&file, &swung(&[]), "swing_strike.north_wall").verdict, Verdict::Holds);
    assert_eq!(
        one(&file, &swung(&[("closest_approach.north_wall", 0.0)]), "swing_strike.north_wall").verdict,
        Verdict::Holds
    );
    let hit =
        swung(&[("closest_approach.north_wall", -0.2), ("strike_speed", 5.0), ("strike_drop_equivalent", 1.2746)]);
    let strike = one(&file, &hit, "swing_strike.north_wall");
    assert_eq!(
        (strike.label.as_str(), strike.demand, strike.limit),
        ("swing strike North wall", Some(-0.2), Some(0.0))
    );
    assert_eq!(strike.verdict, Verdict::Short);
    assert!(strike.note.unwrap().contains("5.00 m/s, the speed of a straight fall of 1.27 m"));
    assert_eq!(one(&file, &hit, "swing_strike.yard").verdict, Verdict::Holds);
    let level = one(&file, &swung(&[("closest_approach.yard", -0.01)]), "swing_strike.yard");
    assert_eq!((level.label.as_str(), level.verdict), ("swing strike Yard", Verdict::Short));
}

#[test]
fn a_strike_is_told_in_words_with_the_name_of_the_face() {
    let file = scenario(SWING, "");
    let hit =
        swung(&[("closest_approach.north_wall", -0.2), ("strike_speed", 5.0), ("strike_drop_equivalent", 1.2746)]);
    let words = margin_words(&file, &one(&file, &hit, "swing_strike.north_wall"), UnitSystem::Metric);
    assert!(words.starts_with("the swing strikes North wall: it would go 0.200 m past it; first strike"), "{words}");
    let miss = margin_words(&file, &one(&file, &swung(&[]), "swing_strike.north_wall"), UnitSystem::Metric);
    assert_eq!(miss, "the swing passes North wall with 1.70 m left");
}

#[test]
fn what_a_swing_never_comes_near_holds_without_a_number_and_a_run_without_numbers_is_open() {
    let away = swung(&[("closest_approach.yard", ABSENT), ("clearance.yard", ABSENT)]);
    let file = scenario(SWING, "");
    for id in ["swing_strike.yard", "clearance.yard"] {
        let check = one(&file, &away, id);
        assert_eq!((check.verdict, check.margin), (Verdict::Holds, None));
        assert!(check.note.as_deref().unwrap().contains("never above or beside it"));
        assert!(margin_words(&file, &check, UnitSystem::Metric).contains(" holds: "));
        assert_eq!(one(&file, &[], id).verdict, Verdict::Open);
    }
    assert_eq!(one(&file, &[], "swing_strike.north_wall").verdict, Verdict::Open);
    assert_ne!(all(&file, &away)[0].id, "clearance.yard", "out of reach governs nothing");
}

#[test]
fn a_face_below_the_attachment_is_open_where_the_legs_come_past_it() {
    let away = swung(&[("closest_approach.north_wall", ABSENT)]);
    let face = |top: &str, offset: &str| {
        let text = SWING.replace("top = \"20 m\"", top).replace("offset = \"6 m\"", offset);
        one(&scenario(&text, ""), &away, "swing_strike.north_wall").verdict
    };
    assert_eq!(face("top = \"11 m\"", "offset = \"4 m\""), Verdict::Open);
    assert_eq!(face("top = \"10 m\"", "offset = \"4 m\""), Verdict::Holds);
    assert_eq!(face("top = \"11 m\"", "offset = \"4.4 m\""), Verdict::Holds);
}

#[test]
fn a_body_without_width_is_said_beside_a_strike() {
    let thin = scenario(&SWING.replace("half_width = \"0.3 m\"\n", ""), "");
    assert!(one(&thin, &swung(&[]), "swing_strike.north_wall").note.unwrap().contains("`subject.half_width`"));
    assert_eq!(one(&scenario(SWING, ""), &swung(&[]), "swing_strike.north_wall").note, None);
}

#[test]
fn a_straight_fall_has_no_checks_of_a_swing() {
    let straight = scenario(&SWING.replace("anchor_offset = \"2 m\"\n", ""), "ca-qc");
    let ids = ids(&straight, &[("clearance.yard", 8.0)]);
    assert!(!ids.iter().any(|id| id.starts_with("swing")), "{ids:?}");
}

#[test]
fn an_obstacle_beside_a_straight_fall_is_not_met_and_says_why() {
    let text = SWING
        .replace("anchor_offset = \"2 m\"\n", "")
        .replace("top = \"0 m\"", "top = \"0 m\"\nfrom = \"3 m\"\nto = \"5 m\"");
    let check = one(&scenario(&text, ""), &[], "clearance.yard");
    assert_eq!(check.verdict, Verdict::Holds);
    assert!(check.note.unwrap().contains("beside the fall line"));
}

#[test]
fn a_swing_to_the_side_holds_by_distance_or_by_angle() {
    let file = scenario(SWING, "ca-qc");
    let degrees = |angle: f64| angle.to_radians();
    let at = |metres, angle| {
        let run = swung(&[("swing_offset_peak", metres), ("swing_angle_peak", angle)]);
        ["swing_distance", "swing_angle"].map(|id| one(&file, &run, id).verdict)
    };
    assert_eq!(at(3.0, degrees(22.0)), [Verdict::Holds, Verdict::Holds]);
    assert_eq!(at(3.1, degrees(21.0)), [Verdict::Open, Verdict::Holds]);
    assert_eq!(at(2.9, degrees(23.0)), [Verdict::Holds, Verdict::Open]);
    assert_eq!(at(3.1, degrees(23.0)), [Verdict::Short, Verdict::Short]);
    assert!(!ids(&scenario(SWING, "eu-363"), &swung(&[])).iter().any(|id| id == "swing_angle"));
}

#[test]
fn a_swing_is_judged_by_what_it_has_where_a_straight_fall_has_an_arrest_distance() {
    let file = scenario(SWING, "us-1926");
    let check = one(&file, &swung(&[("swing_drop", 1.1)]), "deceleration_distance");
    assert_eq!((check.demand, check.verdict), (Some(1.1), Verdict::Short));
    assert!(check.note.unwrap().contains("the turn about the pivot"));
    let retractable = RETRACTABLE.replace("anchor = \"15 m\"", "anchor = \"15 m\"\nanchor_offset = \"1 m\"");
    let file = scenario(&retractable, "eu-363");
    let total = |drop| one(&file, &swung(&[("swing_drop", drop)]), "total_fall_distance");
    assert!((total(1.2).demand.unwrap() - 1.9).abs() < 1e-12);
    assert_eq!((total(1.2).verdict, total(1.4).verdict), (Verdict::Holds, Verdict::Short));
    assert!(total(1.2).note.unwrap().contains("lowest point of the swing"));
    assert_eq!(one(&file, &swung(&[("swing_drop", ABSENT)]), "total_fall_distance").verdict, Verdict::Open);
}

#[test]
fn an_edge_takes_its_stated_share_of_the_line_strength_and_is_said_where_it_states_none() {
    let edge = |more: &str| {
        let edge = format!("anchor_offset = \"2 m\"\nedge = {{ offset = \"1 m\", elevation = \"13 m\"{more} }}");
        scenario(&SWING.replace("anchor_offset = \"2 m\"", &edge), "us-1926")
    };
    let halved = edge(", strength_factor = 2");
    let check = one(&halved, &swung(&[]), "line_load");
    assert_eq!((check.demand, check.limit, check.verdict), (Some(10_000.0), Some(12_500.0), Verdict::Holds));
    assert!(check.basis.words.contains("divided by 2, its `place.edge.strength_factor`"), "{}", check.basis.words);
    assert_eq!(one(&halved, &swung(&[("arrest_force_peak", 6251.0)]), "line_load").verdict, Verdict::Short);
    assert_eq!(one(&halved, &swung(&[]), "line_strength").demand, Some(25_000.0), "what is bought stays what it is");
    let untold = one(&edge(""), &swung(&[]), "line_load");
    assert_eq!(untold.limit, Some(25_000.0));
    assert!(untold.note.unwrap().contains("state `place.edge.strength_factor`"));
}

#[test]
fn a_retractable_line_is_judged_by_the_rows_of_its_kind() {
    let file = scenario(RETRACTABLE, "eu-363");
    let run =
        |total, force| [("free_fall_distance", 0.4), ("total_fall_distance", total), ("arrest_force_peak", force)];
    let total = one(&file, &run(2.0, 6000.0), "total_fall_distance");
    assert_eq!((total.limit, total.verdict), (Some(2.0), Verdict::Holds));
    assert!(total.basis.words.contains("EN 360"), "{}", total.basis.words);
    assert_eq!(one(&file, &run(2.01, 6000.0), "total_fall_distance").verdict, Verdict::Short);
    assert_eq!(one(&file, &run(2.0, 6000.0), "arrest_force").verdict, Verdict::Holds);
    assert_eq!(one(&file, &run(2.0, 6001.0), "arrest_force").verdict, Verdict::Short);
    assert!(!ids(&file, &run(2.0, 6000.0)).iter().any(|id| id == "line_strength"), "a lanyard's rule");
}

#[test]
fn a_guided_arrester_is_judged_by_the_rows_of_its_kind() {
    let text = RETRACTABLE.replace("anchor = \"15 m\"\n", "").replace(
        "kind = \"retractable\"\nlock_travel = \"0.4 m\"",
        "kind = \"vertical\"\nlength = \"8 m\"\ngrab_slide = \"0.2 m\"",
    );
    let file = scenario(&format!("{text}[fall]\nfree_fall = \"0.3 m\"\n"), "eu-363");
    let at = |metres| one(&file, &[("total_fall_distance", metres)], "total_fall_distance");
    assert_eq!((at(1.0).limit, at(1.0).verdict), (Some(1.0), Verdict::Holds));
    assert!(at(1.0).basis.words.contains("EN 353-2"));
    assert_eq!(at(1.01).verdict, Verdict::Short);
    assert_eq!(one(&file, &[], "total_fall_distance").verdict, Verdict::Open);
}

#[test]
fn a_retractable_line_needs_less_strength_only_where_it_keeps_the_free_fall_within_two_feet() {
    let file = scenario(RETRACTABLE, "us-1926");
    let at = |fall| one(&file, &[("free_fall_distance", fall)], "line_strength");
    let near = at(2.0 * 0.3048);
    assert_eq!((near.verdict, near.limit), (Verdict::Holds, Some(3000.0 * 4.448_221_615_260_5)));
    assert!(near.basis.words.contains("29 CFR 1926.502(d)(12)"), "{}", near.basis.words);
    let far = at(0.62);
    assert_eq!((far.verdict, far.limit), (Verdict::Short, Some(5000.0 * 4.448_221_615_260_5)));
    assert!(far.basis.words.contains("29 CFR 1926.502(d)(9)"), "{}", far.basis.words);
    assert_eq!(one(&file, &[], "line_strength").limit, far.limit, "an unknown fall is not a short one");
    let lanyard =
        RETRACTABLE.replace("kind = \"retractable\"\nlock_travel = \"0.4 m\"", "kind = \"lanyard\"\nlength = \"3 m\"");
    let check = one(&scenario(&lanyard, "us-1926"), &[("free_fall_distance", 0.3)], "line_strength");
    assert_eq!(check.limit, far.limit);
}

#[test]
fn a_rope_with_a_table_is_judged_by_what_the_table_says_between_its_two_loads() {
    let rope = |last: &str| {
        let text = SWING.replace(
            "stiffness = \"20 kN/m\"",
            &format!("curve = [[\"0 m\", \"0 N\"], [\"0.05 m\", \"490.3325 N\"], [\"{last}\", \"1470.9975 N\"]]"),
        );
        one(&scenario(&text, "rope-1891"), &swung(&[]), "static_elongation")
    };
    let holds = rope("0.17 m");
    assert!((holds.demand.unwrap() - 0.04).abs() < 1e-9, "{holds:?}");
    assert_eq!(holds.verdict, Verdict::Holds);
    assert_eq!(rope("0.23 m").verdict, Verdict::Short);
    let text = SWING.replace("stiffness = \"20 kN/m\"", "curve = [[\"0 m\", \"0 N\"], [\"0.05 m\", \"1 kN\"]]");
    let beyond = one(&scenario(&text, "rope-1891"), &swung(&[]), "static_elongation");
    assert_eq!(beyond.verdict, Verdict::Open);
}

#[test]
fn the_stroke_of_an_absorber_in_line_is_judged_and_short_once_it_is_used_up() {
    let file =
        scenario(&format!("{SPAN}\n[anchor.span.absorber]\ndeploy_force = \"8 kN\"\nstroke = \"0.8 m\"\n"), "eu-363");
    let given = |m: f64, used_up: f64| [("span_deployed_length", m), ("span_stroke_used_up", used_up)];
    let holds = one(&file, &given(0.5, 0.0), "span_stroke");
    assert_eq!((holds.demand, holds.limit, holds.verdict), (Some(0.5), Some(0.8), Verdict::Holds));
    assert!(holds.basis.words.contains("`anchor.span.absorber.stroke`"), "{}", holds.basis.words);
    let short = one(&file, &given(0.8, 1.0), "span_stroke");
    assert_eq!(short.verdict, Verdict::Short);
    assert!(short.note.unwrap().contains("stroke is used up"));
    assert_eq!(one(&file, &[], "span_stroke").verdict, Verdict::Open);
    assert!(!ids(&scenario(SPAN, "eu-363"), &[]).contains(&"span_stroke".to_owned()));
}
