//! Every check: its verdict, its open cases, and where its limit is said to come from.
#![expect(clippy::unwrap_used, clippy::panic, reason = "a test stops at what it cannot have")]

use underfoot::estimate::{Number, Numbers, Validity, Value};
use underfoot::margin::{CheckKind, Margin, Rules, UnknownBasis, Verdict, checks, judge, margins_from, remarks, worst};
use underfoot::quantity::{Dimension, Measure, Unit};
use underfoot::scenario::{
    Absorber, Anchor, AnchorKind, DampingLaw, Fall, Limits, Line, LineKind, Obstacle, OwnLimit, Place, Scenario,
    StretchLaw, Study, Subject, SubjectKind,
};

fn metres(value: f64) -> Measure {
    Measure::exact(value, Unit::Metre)
}

fn kilonewtons(value: f64) -> Measure {
    Measure::exact(value * 1000.0, Unit::Kilonewton)
}

fn kilograms(value: f64) -> Measure {
    Measure::exact(value, Unit::Kilogram)
}

/// A person on an absorbing lanyard of 2 m, everything stated.
fn scenario(basis: Option<&str>) -> Scenario {
    Scenario {
        title: None,
        notes: None,
        datum: None,
        gravity: Measure::exact(9.80665, Unit::MetrePerSecondSquared),
        subject: Subject {
            kind: SubjectKind::Person,
            mass: kilograms(100.0),
            attachment_above_feet: Some(metres(1.5)),
            underside_below_attachment: None,
            stretch_allowance: None,
            half_width: None,
            body_factor: None,
        },
        place: Place { standing: Some(metres(12.0)), ..Place::default() },
        fall: Fall { free_fall: Some(metres(1.8)) },
        line: Line {
            kind: LineKind::Lanyard,
            length: Some(metres(2.0)),
            stretch: StretchLaw::Stiffness(Measure::exact(60_000.0, Unit::KilonewtonPerMetre)),
            damping: DampingLaw::None,
            series_stiffness: None,
            strength: Some(kilonewtons(25.0)),
            mass_per_length: None,
            lock_travel: None,
            grab_slide: None,
            slack: None,
        },
        absorber: Some(Absorber {
            deploy_force: Some(kilonewtons(4.0)),
            force_table: None,
            onset_force: None,
            stroke: Some(metres(1.2)),
            wet_cold_factor: None,
            rated_mass: Some(kilograms(110.0)),
            rated_free_fall: Some(metres(4.0)),
            packed_length: None,
        }),
        harness: None,
        anchor: Anchor { kind: AnchorKind::Fixed, capacity: Some(kilonewtons(25.0)) },
        obstacles: vec![Obstacle {
            name: "Plant-room roof".to_owned(),
            top: metres(6.0),
            extent: None,
            reserve: Some(metres(1.0)),
        }],
        faces: Vec::new(),
        limits: Limits { basis: basis.map(str::to_owned), own: Vec::new() },
        study: Study::default(),
        accepted: Vec::new(),
    }
}

const USUAL: &[(&str, f64)] = &[
    ("free_fall_distance", 1.8),
    ("fall_factor", 0.9),
    ("arrest_force_peak", 5000.0),
    ("anchor_force_peak", 5000.0),
    ("line_elongation_peak", 0.08),
    ("deployed_length", 0.6),
    ("stroke_used_up", 0.0),
    ("arrest_distance", 0.7),
    ("total_fall_distance", 2.5),
    ("clearance.plant-room_roof", 3.5),
];

/// The usual run with some numbers replaced; a value that is not a number takes the id away.
fn numbers(changes: &[(&str, f64)]) -> Numbers {
    let value = |id: &str, usual: f64| changes.iter().find(|c| c.0 == id).map_or(usual, |c| c.1);
    USUAL
        .iter()
        .map(|(id, usual)| (*id, value(id, *usual)))
        .filter(|(_, value)| !value.is_nan())
        .map(|(id, value)| Number {
            id: id.to_owned(),
            value: Value::Number(value),
            dimension: Dimension::Ratio,
            unit: "1",
        })
        .collect()
}

fn all(scenario: &Scenario, changes: &[(&str, f64)]) -> Vec<Margin> {
    margins_from(scenario, &numbers(changes), &[]).unwrap()
}

fn one(scenario: &Scenario, changes: &[(&str, f64)], id: &str) -> Margin {
    all(scenario, changes).into_iter().find(|m| m.id == id).unwrap_or_else(|| panic!("no check {id}"))
}

fn has(scenario: &Scenario, id: &str) -> bool {
    all(scenario, &[]).iter().any(|m| m.id == id)
}

fn own(key: &str, value: Measure, why: Option<&str>) -> OwnLimit {
    OwnLimit { key: key.to_owned(), value, why: why.map(str::to_owned) }
}

const ABSENT: f64 = f64::NAN;

#[test]
fn everything_that_holds_gives_the_worst_verdict_holds() {
    let list = all(&scenario(Some("eu-363")), &[]);
    assert_eq!(worst(list.iter().map(|m| m.verdict)), Verdict::Holds, "{list:#?}");
    let ids: Vec<_> = list.iter().map(|m| m.id.as_str()).collect();
    for id in [
        "clearance.plant-room_roof",
        "arrest_force",
        "stroke",
        "deceleration_distance",
        "total_fall_distance",
        "anchor_load",
        "anchor_strength",
        "line_load",
        "line_strength",
        "rated_mass",
        "rated_free_fall",
        "lanyard_length",
    ] {
        assert!(ids.contains(&id), "{id} is not among {ids:?}");
    }
}

#[test]
fn clearance_is_short_below_the_reserve_and_open_without_elevations() {
    let mut file = scenario(None);
    let short = one(&file, &[("clearance.plant-room_roof", 0.42)], "clearance.plant-room_roof");
    assert_eq!(short.verdict, Verdict::Short);
    assert!((short.margin.unwrap() + 0.58).abs() < 1e-12);
    assert_eq!(one(&file, &[("clearance.plant-room_roof", 1.0)], "clearance.plant-room_roof").verdict, Verdict::Holds);
    file.place.standing = None;
    let open = one(&file, &[("clearance.plant-room_roof", ABSENT)], "clearance.plant-room_roof");
    assert_eq!(open.verdict, Verdict::Open);
    assert!(open.note.unwrap().contains("`place.standing`"));
}

#[test]
fn a_reserve_below_the_one_of_the_set_is_said() {
    let mut file = scenario(Some("eu-363"));
    assert_eq!(one(&file, &[], "clearance.plant-room_roof").note, None);
    file.obstacles[0].reserve = Some(metres(0.5));
    let note = one(&file, &[], "clearance.plant-room_roof").note.unwrap();
    assert!(note.contains("1 m") && note.contains("DGUV Regel 112-198 s.7.3"), "{note}");
    file.obstacles[0].reserve = None;
    assert!(one(&file, &[], "clearance.plant-room_roof").basis.words.contains("states no reserve"));
}

#[test]
fn arrest_force_is_judged_by_the_named_set() {
    let at = |basis, force| one(&scenario(Some(basis)), &[("arrest_force_peak", force)], "arrest_force");
    assert_eq!(at("eu-363", 6000.0).verdict, Verdict::Holds);
    assert_eq!(at("eu-363", 6001.0).verdict, Verdict::Short);
    assert_eq!(at("us-1926", 8006.0).verdict, Verdict::Holds);
    assert_eq!(at("us-1926", 8007.0).verdict, Verdict::Short);
    assert_eq!(at("ca-on", 7999.0).verdict, Verdict::Holds);
    assert_eq!(at("ca-ab", 6000.5).verdict, Verdict::Short);
    assert_eq!(at("au-qld", 6000.5).verdict, Verdict::Short);
    assert_eq!(at("us-1926", 5000.0).basis.words, "us-1926: 1800 lbf, 29 CFR 1926.502(d)(16)(ii) (published)");
    assert!(at("us-1926", 5000.0).note.unwrap().contains("other sets allow 6 kN"));
    assert_eq!(at("eu-363", 5000.0).note, None);
    assert_eq!(at("eu-363", 5000.0).basis.words, "eu-363: EN 363 as applied in DGUV Regel 112-198 s.5.1 (published)");
}

#[test]
fn the_body_factor_divides_only_the_arrest_force_demand() {
    let mut file = scenario(Some("eu-363"));
    file.subject.body_factor = Some(Measure::exact(1.25, Unit::One));
    let force = one(&file, &[("arrest_force_peak", 7000.0)], "arrest_force");
    assert_eq!(force.demand, Some(5600.0));
    assert!(force.note.unwrap().contains("1.25"));
    assert_eq!(one(&file, &[("arrest_force_peak", 7000.0)], "line_load").demand, Some(7000.0));
}

#[test]
fn deceleration_distance_is_the_absorber_travel_or_else_the_arrest_distance() {
    let mut file = scenario(Some("us-1926"));
    assert_eq!(one(&file, &[], "deceleration_distance").demand, Some(0.6));
    assert_eq!(one(&file, &[("deployed_length", 1.0669)], "deceleration_distance").verdict, Verdict::Short);
    assert_eq!(one(&file, &[("deployed_length", 3.5 * 0.3048)], "deceleration_distance").verdict, Verdict::Holds);
    file.absorber = None;
    let without = one(&file, &[], "deceleration_distance");
    assert_eq!(without.demand, Some(0.7));
    assert!(without.note.unwrap().contains("no absorber"));
}

#[test]
fn total_fall_of_the_european_set_needs_a_lanyard_with_absorber() {
    let mut file = scenario(Some("eu-363"));
    let check = one(&file, &[("total_fall_distance", 5.75)], "total_fall_distance");
    assert_eq!((check.limit, check.verdict), (Some(5.75), Verdict::Holds));
    assert_eq!(one(&file, &[("total_fall_distance", 5.76)], "total_fall_distance").verdict, Verdict::Short);
    file.line.length = Some(metres(2.1));
    assert_eq!(one(&file, &[], "lanyard_length").verdict, Verdict::Short);
    file.line.kind = LineKind::Webbing;
    assert!(!has(&file, "total_fall_distance") && !has(&file, "lanyard_length"));
    file.line.kind = LineKind::Lanyard;
    file.absorber = None;
    assert!(!has(&file, "total_fall_distance") && !has(&file, "deceleration_distance"));
}

#[test]
fn anchor_load_carries_the_factor_of_the_set_or_says_that_there_is_none() {
    let with = |basis| one(&scenario(Some(basis)), &[], "anchor_load");
    for basis in ["us-1926", "us-1910", "ca-ab", "ca-qc"] {
        let check = with(basis);
        assert_eq!((check.demand, check.label.as_str()), (Some(10_000.0), "anchor load x 2"), "{basis}");
    }
    for basis in ["eu-363", "au-qld", "ca-on", "sg-wsh"] {
        let check = with(basis);
        assert_eq!((check.demand, check.label.as_str()), (Some(5000.0), "anchor load"), "{basis}");
        assert!(check.basis.words.contains(&format!("factor 1: `{basis}` states none")), "{}", check.basis.words);
    }
    let mut file = scenario(Some("us-1926"));
    file.anchor.capacity = Some(kilonewtons(10.0));
    assert_eq!(one(&file, &[], "anchor_load").verdict, Verdict::Holds);
    file.anchor.capacity = Some(kilonewtons(9.9));
    assert_eq!(one(&file, &[], "anchor_load").verdict, Verdict::Short);
}

#[test]
fn an_anchor_without_a_capacity_is_open_and_names_the_key() {
    for basis in ["eu-363", "us-1926", "ca-on"] {
        let mut file = scenario(Some(basis));
        file.anchor.capacity = None;
        let check = one(&file, &[], "anchor_load");
        assert_eq!(check.verdict, Verdict::Open);
        assert!(check.note.unwrap().contains("`anchor.capacity`"));
        assert!(!has(&file, "anchor_strength"));
    }
    let mut file = scenario(None);
    file.anchor.capacity = None;
    assert!(!has(&file, "anchor_load"));
}

#[test]
fn anchor_strength_is_judged_and_its_other_rule_is_open() {
    let strength = |basis, capacity| {
        let mut file = scenario(Some(basis));
        file.anchor.capacity = Some(kilonewtons(capacity));
        one(&file, &[], "anchor_strength")
    };
    assert_eq!(strength("us-1926", 22.3).verdict, Verdict::Holds);
    let certified = strength("us-1926", 15.0);
    assert_eq!(certified.verdict, Verdict::Open);
    assert!(certified.note.unwrap().contains("qualified person"));
    assert_eq!(strength("us-1926", 9.0).verdict, Verdict::Short);
    assert_eq!(strength("ca-qc", 18.0).verdict, Verdict::Holds);
    assert_eq!(strength("ca-qc", 12.0).verdict, Verdict::Open);
    assert_eq!(strength("ca-ab", 9.0).verdict, Verdict::Short);
    assert_eq!(strength("au-qld", 15.0).verdict, Verdict::Holds);
    assert_eq!(strength("au-qld", 13.0).verdict, Verdict::Open);
    assert_eq!(strength("au-qld", 11.0).verdict, Verdict::Short);
    let metal = strength("eu-363", 12.0);
    assert_eq!(metal.verdict, Verdict::Holds);
    assert!(metal.note.unwrap().contains("18 kN"));
    assert_eq!(strength("eu-363", 11.0).verdict, Verdict::Short);
}

#[test]
fn line_strength_is_judged_against_the_set_and_against_the_force() {
    let with = |basis, kilo| {
        let mut file = scenario(Some(basis));
        file.line.strength = Some(kilonewtons(kilo));
        file
    };
    assert_eq!(one(&with("us-1926", 23.0), &[], "line_strength").verdict, Verdict::Holds);
    assert_eq!(one(&with("us-1926", 22.0), &[], "line_strength").verdict, Verdict::Short);
    assert_eq!(one(&with("us-1926", 23.0), &[], "line_load").label, "line force x 2");
    assert_eq!(one(&with("us-1926", 9.9), &[], "line_load").verdict, Verdict::Short);
    assert_eq!(one(&with("eu-363", 22.0), &[], "line_strength").verdict, Verdict::Holds);
    assert_eq!(one(&with("eu-363", 16.0), &[], "line_strength").verdict, Verdict::Open);
    assert_eq!(one(&with("eu-363", 14.0), &[], "line_strength").verdict, Verdict::Short);
    let mut cable = with("eu-363", 15.0);
    cable.line.kind = LineKind::Cable;
    assert_eq!(one(&cable, &[], "line_strength").verdict, Verdict::Holds);
}

#[test]
fn a_missing_line_strength_is_open_only_where_the_set_has_a_rule() {
    for (basis, id) in [("us-1926", Some("line_strength")), ("us-1910", Some("line_load")), ("ca-on", None)] {
        let mut file = scenario(Some(basis));
        file.line.strength = None;
        match id {
            Some(id) => {
                let check = one(&file, &[], id);
                assert_eq!(check.verdict, Verdict::Open, "{basis}");
                assert!(check.note.unwrap().contains("`line.strength`"));
            }
            None => assert!(!has(&file, "line_strength") && !has(&file, "line_load")),
        }
    }
}

#[test]
fn a_used_up_stroke_is_short_even_when_the_lengths_are_equal() {
    let file = scenario(None);
    assert_eq!(one(&file, &[("deployed_length", 1.2)], "stroke").verdict, Verdict::Holds);
    let locked = one(&file, &[("deployed_length", 1.2), ("stroke_used_up", 1.0)], "stroke");
    assert_eq!(locked.verdict, Verdict::Short);
    assert!(locked.note.unwrap().contains("used up"));
}

#[test]
fn ratings_of_the_absorber_are_judged() {
    let mut file = scenario(None);
    file.subject.mass = kilograms(111.0);
    assert_eq!(one(&file, &[], "rated_mass").verdict, Verdict::Short);
    assert_eq!(one(&file, &[("free_fall_distance", 4.1)], "rated_free_fall").verdict, Verdict::Short);
    assert_eq!(one(&file, &[("free_fall_distance", 4.0)], "rated_free_fall").verdict, Verdict::Holds);
}

#[test]
fn a_mass_from_memory_is_said_and_must_stay_below_the_limit() {
    let mut file = scenario(Some("us-1926"));
    let check = one(&file, &[], "subject_mass");
    assert!(check.basis.from_memory && check.basis.words.contains("from memory, unverified"));
    file.subject.mass = Measure::exact(310.0 * 0.453_592_37, Unit::Pound);
    let on_it = one(&file, &[], "subject_mass");
    assert_eq!((on_it.verdict, on_it.margin), (Verdict::Short, Some(0.0)));
    file.limits.basis = Some("us-1910".to_owned());
    let other = one(&file, &[], "subject_mass");
    assert_eq!(other.verdict, Verdict::Holds);
    assert!(!other.basis.from_memory);
}

#[test]
fn an_iso_absorber_outside_of_its_scope_never_holds() {
    let mut file = scenario(Some("iso-10333-1"));
    file.fall.free_fall = Some(metres(1.8));
    let inside = one(&file, &[("arrest_force_peak", 4000.0)], "arrest_force");
    assert_eq!(inside.verdict, Verdict::Holds);
    let far = [("arrest_force_peak", 3900.0), ("free_fall_distance", 2.0)];
    let outside = one(&file, &far, "arrest_force");
    assert_eq!(outside.verdict, Verdict::Open);
    assert!(outside.note.unwrap().contains("outside of what `iso-10333-1` was written for"));
    assert_eq!(one(&file, &far, "free_fall").verdict, Verdict::Short);
    let hard = [("arrest_force_peak", 4100.0), ("free_fall_distance", 2.0)];
    assert_eq!(one(&file, &hard, "arrest_force").verdict, Verdict::Short);
    file.subject.mass = kilograms(101.0);
    assert_eq!(one(&file, &[("arrest_force_peak", 3900.0)], "arrest_force").verdict, Verdict::Open);
    assert_eq!(one(&file, &[], "subject_mass").verdict, Verdict::Short);
    file.subject.mass = kilograms(100.0);
    file.absorber = None;
    assert_eq!(one(&file, &[("arrest_force_peak", 3900.0)], "arrest_force").verdict, Verdict::Open);
}

#[test]
fn a_low_stretch_rope_is_judged_up_to_its_fall_factor() {
    let mut file = scenario(Some("rope-1891"));
    file.line.kind = LineKind::Rope;
    file.absorber = None;
    let at = |file: &Scenario, factor| one(file, &[("fall_factor", factor)], "arrest_force").verdict;
    assert_eq!(at(&file, 0.1 + 0.2), Verdict::Holds);
    assert_eq!(at(&file, 0.31), Verdict::Open);
    assert_eq!(
        one(&file, &[("fall_factor", 0.3), ("arrest_force_peak", 6000.0)], "arrest_force").verdict,
        Verdict::Short
    );
    file.line.stretch = StretchLaw::StaticElongation {
        percent: Measure::exact(0.04, Unit::Percent),
        from: kilograms(50.0),
        to: kilograms(150.0),
    };
    let elongation = one(&file, &[], "static_elongation");
    assert!((elongation.demand.unwrap() - 0.04).abs() < 1e-12);
    assert_eq!(elongation.verdict, Verdict::Holds);
    file.line.stretch = StretchLaw::Modulus(kilonewtons(19.0));
    assert_eq!(one(&file, &[], "static_elongation").verdict, Verdict::Short);
    file.line.kind = LineKind::Lanyard;
    assert_eq!(at(&file, 0.3), Verdict::Open);
}

#[test]
fn a_dynamic_rope_is_judged_by_force_and_elongation_as_a_single_rope() {
    let mut file = scenario(Some("rope-892"));
    file.line.kind = LineKind::Rope;
    let force = one(&file, &[("arrest_force_peak", 11_000.0)], "arrest_force");
    assert_eq!(force.verdict, Verdict::Holds);
    assert!(force.note.unwrap().contains("half rope"));
    assert_eq!(one(&file, &[("line_elongation_peak", 0.81)], "dynamic_elongation").verdict, Verdict::Short);
}

#[test]
fn quebec_accepts_a_small_force_or_a_small_fall_and_says_so() {
    let file = scenario(Some("ca-qc"));
    assert_eq!(one(&file, &[], "free_fall").verdict, Verdict::Holds);
    let far = one(&file, &[("free_fall_distance", 3.0)], "free_fall");
    assert_eq!(far.verdict, Verdict::Open);
    assert!(far.note.unwrap().contains("6 kN"));
    let both = [("free_fall_distance", 3.0), ("arrest_force_peak", 6500.0)];
    assert_eq!(one(&file, &both, "free_fall").verdict, Verdict::Short);
    assert_eq!(one(&file, &both, "arrest_force").verdict, Verdict::Short);
}

#[test]
fn rules_for_persons_are_not_applied_to_loads() {
    let mut file = scenario(Some("us-1926"));
    file.subject.kind = SubjectKind::Load;
    file.subject.mass = kilograms(400.0);
    for id in ["arrest_force", "free_fall", "deceleration_distance", "subject_mass", "anchor_strength", "line_strength"]
    {
        assert!(!has(&file, id), "{id}");
    }
    let anchor = one(&file, &[], "anchor_load");
    assert_eq!(anchor.demand, Some(5000.0));
    assert!(anchor.basis.words.contains("is not applied to a load"), "{}", anchor.basis.words);
    let said = remarks(&Rules::of(&file).unwrap(), &file);
    assert!(said.iter().any(|r| r.contains("are not applied to a load")));
    file.limits.own.push(own("arrest_force", kilonewtons(4.5), Some("crane hook")));
    assert_eq!(one(&file, &[], "arrest_force").verdict, Verdict::Short);
}

#[test]
fn an_override_replaces_the_limit_and_shows_both_values_and_why() {
    let mut file = scenario(Some("eu-363"));
    file.limits.own.push(own("arrest_force", kilonewtons(4.0), Some("light workers")));
    let check = one(&file, &[], "arrest_force");
    assert_eq!((check.limit, check.verdict), (Some(4000.0), Verdict::Short));
    assert_eq!(
        check.basis.words,
        "the file: 4 kN instead of 6 kN of eu-363 (EN 363 as applied in DGUV Regel 112-198 s.5.1 (published)); why: \
         light workers"
    );
    file.limits.own.push(own("free_fall", metres(1.5), Some("site rule")));
    let added = one(&file, &[], "free_fall");
    assert_eq!(added.basis.words, "the file: 1.5 m; `eu-363` states none; why: site rule");
    let mut memory = scenario(Some("us-1926"));
    memory.limits.own.push(own("subject_mass", kilograms(150.0), Some("maker's letter")));
    let basis = one(&memory, &[], "subject_mass").basis;
    assert!(basis.from_memory && basis.words.contains("310 lb") && basis.words.contains("from memory, unverified"));
}

#[test]
fn an_override_of_a_factor_changes_demand_and_label() {
    let mut file = scenario(Some("us-1926"));
    file.limits.own.push(own("anchor_factor", Measure::exact(3.0, Unit::One), Some("old masonry")));
    let check = one(&file, &[], "anchor_load");
    assert_eq!((check.demand, check.label.as_str()), (Some(15_000.0), "anchor load x 3"));
    assert!(check.basis.words.contains("instead of 2 of us-1926") && check.basis.words.contains("old masonry"));
}

#[test]
fn own_limits_need_no_set() {
    let mut file = scenario(Some("own"));
    file.limits.own.push(own("arrest_distance", metres(2.4), None));
    let check = one(&file, &[], "total_fall_distance");
    assert_eq!((check.limit, check.verdict), (Some(2.4), Verdict::Short));
    assert_eq!(check.basis.words, "the file: 2.4 m (own limit)");
    assert!(!has(&file, "arrest_force"));
}

#[test]
fn without_limits_only_clearance_stroke_ratings_and_stated_capacities_are_checked() {
    let file = scenario(None);
    let mut ids: Vec<_> = all(&file, &[]).into_iter().map(|m| m.id).collect();
    ids.sort();
    assert_eq!(
        ids,
        ["anchor_load", "clearance.plant-room_roof", "line_load", "rated_free_fall", "rated_mass", "stroke"]
    );
    assert!(remarks(&Rules::of(&file).unwrap(), &file)[0].contains("no limits are stated"));
}

#[test]
fn a_run_outside_of_the_model_is_open_wherever_its_numbers_count() {
    let file = scenario(Some("us-1926"));
    let rules = Rules::of(&file).unwrap();
    let why = [Validity::FreeFallBeyondRating { free_fall_m: 5.0, rated_m: 4.0 }];
    let list = checks(&rules, &file, &numbers(&[("free_fall_distance", 5.0)]), &why);
    for check in &list {
        let expected = match check.kind {
            CheckKind::RatedFreeFall | CheckKind::FreeFall => Verdict::Short,
            CheckKind::RatedMass | CheckKind::SubjectMass | CheckKind::AnchorStrength | CheckKind::LineStrength => {
                Verdict::Holds
            }
            _ => Verdict::Open,
        };
        assert_eq!(check.verdict, expected, "{:?}", check.kind);
    }
}

#[test]
fn another_rule_of_a_set_helps_only_where_it_is_judged_to_hold() {
    let mut file = scenario(Some("us-1926"));
    file.anchor.capacity = Some(kilonewtons(15.0));
    let why = [Validity::FreeFallBeyondRating { free_fall_m: 5.0, rated_m: 4.0 }];
    let verdict = |file: &Scenario, kind| {
        let list = checks(&Rules::of(file).unwrap(), file, &numbers(&[("free_fall_distance", 5.0)]), &why);
        list.iter().find(|c| c.kind == kind).unwrap().verdict
    };
    assert_eq!(verdict(&file, CheckKind::AnchorStrength), Verdict::Short);
    file.limits.basis = Some("ca-qc".to_owned());
    assert_eq!(verdict(&file, CheckKind::FreeFall), Verdict::Short);
}

#[test]
fn an_unknown_set_is_an_error_with_the_nearest_name() {
    let nearest = |name: &str| match Rules::of(&scenario(Some(name))) {
        Err(UnknownBasis { nearest, .. }) => nearest,
        Ok(_) => panic!("{name} is known"),
    };
    assert_eq!(nearest("eu-336"), Some("eu-363"));
    assert_eq!(nearest("US-1926 "), Some("us-1926"));
    assert_eq!(nearest("completely different"), None);
}

#[test]
fn zero_holds_rounding_of_decimals_counts_as_zero_and_what_is_no_number_never_holds() {
    let force = |demand, limit| judge(CheckKind::ArrestForce, Some(demand), Some(limit)).verdict;
    assert_eq!(force(6000.0, 6000.0), Verdict::Holds);
    assert_eq!(force(6000.001, 6000.0), Verdict::Short);
    assert_eq!(force(f64::NAN, 6000.0), Verdict::Open);
    assert_eq!(force(6000.0, f64::NAN), Verdict::Open);
    assert_eq!(force(f64::INFINITY, f64::INFINITY), Verdict::Open);
    assert_eq!(force(f64::INFINITY, 6000.0), Verdict::Short);
    assert_eq!(judge(CheckKind::ArrestForce, None, Some(1.0)).verdict, Verdict::Open);
    assert_eq!(judge(CheckKind::FreeFall, Some(13.2 - 11.4), Some(1.8)).verdict, Verdict::Holds);
    assert_eq!(judge(CheckKind::Clearance(0), Some(-3e-16), Some(0.0)).verdict, Verdict::Holds);
    assert_eq!(judge(CheckKind::Clearance(0), Some(-1e-6), Some(0.0)).verdict, Verdict::Short);
}

#[test]
fn the_governing_check_comes_first() {
    let file = scenario(Some("eu-363"));
    let list = all(&file, &[("clearance.plant-room_roof", 0.42), ("arrest_force_peak", 6060.0)]);
    assert_eq!((list[0].id.as_str(), list[1].id.as_str()), ("clearance.plant-room_roof", "arrest_force"));
    let order: Vec<_> = list.iter().map(|m| m.verdict).collect();
    assert!(order.windows(2).all(|pair| pair[0] >= pair[1]), "{order:?}");
    let holding: Vec<(&str, f64)> =
        list[2..].iter().map(|m| (m.id.as_str(), m.margin.unwrap() / m.limit.unwrap())).collect();
    let stated = holding.iter().position(|(id, _)| *id == "lanyard_length").unwrap();
    assert_eq!(holding[stated].1, 0.0);
    for group in [&holding[..stated], &holding[stated..]] {
        assert!(group.len() > 2 && group.windows(2).all(|pair| pair[0].1 <= pair[1].1), "{holding:?}");
    }
    assert!(holding[..stated].iter().all(|(id, _)| !["rated_mass", "anchor_strength"].contains(id)), "{holding:?}");
}

#[test]
fn nothing_to_judge_is_open() {
    let mut file = scenario(None);
    file.obstacles.clear();
    file.absorber = None;
    file.anchor.capacity = None;
    file.line.strength = None;
    let list = all(&file, &[]);
    assert!(list.is_empty());
    assert_eq!(worst(list.iter().map(|m| m.verdict)), Verdict::Open);
}
