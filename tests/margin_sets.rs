//! The built-in limits: every row is there, with its value in the source's own units, its clause and its mark.
use underfoot::margin::{Mark, disagreements, limit_set, limit_sets};
use underfoot::quantity::Unit;
use underfoot::sheet::{Paint, limits_json, limits_text};

type Row = (&'static str, &'static str, f64, Unit, &'static str, Mark);

/// Set, part of the words, value, unit, part of the clause, mark.
const ROWS: &[Row] = &[
    ("us-1926", "arrest force, body harness", 1800.0, Unit::PoundForce, "1926.502(d)(16)(ii)", Mark::Published),
    ("us-1926", "free-fall distance", 6.0, Unit::Foot, "1926.502(d)(16)(iii)", Mark::Published),
    ("us-1926", "deceleration distance", 3.5, Unit::Foot, "1926.502(d)(16)(iv)", Mark::Published),
    ("us-1926", "factor on the arrest force", 2.0, Unit::One, "1926.502(d)(16)(v)", Mark::Secondary),
    ("us-1926", "anchorage, per person", 5000.0, Unit::PoundForce, "1926.502(d)(15)", Mark::Secondary),
    ("us-1926", "anchorage as part", 2.0, Unit::One, "1926.502(d)(15)", Mark::Secondary),
    ("us-1926", "lanyard or vertical lifeline", 5000.0, Unit::PoundForce, "1926.502(d)(9)", Mark::Secondary),
    ("us-1926", "self-retracting line", 3000.0, Unit::PoundForce, "1926.502(d)(12)", Mark::Secondary),
    ("us-1926", "horizontal lifeline", 2.0, Unit::One, "1926.502(d)(8)", Mark::Secondary),
    ("us-1926", "person with tools", 310.0, Unit::Pound, "note to 29 CFR 1926.502(d)(16)", Mark::Memory),
    ("us-1910", "arrest force", 1800.0, Unit::PoundForce, "1910.140(d)", Mark::Secondary),
    ("us-1910", "deceleration distance", 3.5, Unit::Foot, "1910.140(d)", Mark::Secondary),
    ("us-1910", "free-fall distance", 6.0, Unit::Foot, "1910.140(d)", Mark::Secondary),
    ("us-1910", "factor on the arrest force", 2.0, Unit::One, "1910.140(d)", Mark::Secondary),
    ("us-1910", "person with tools", 310.0, Unit::Pound, "1910.140(d)", Mark::Secondary),
    ("eu-363", "arrest force", 6.0, Unit::Kilonewton, "DGUV Regel 112-198 s.5.1", Mark::Published),
    ("eu-363", "absorber test, 100 kg falling 4 m: force", 6.0, Unit::Kilonewton, "EN 355:2002", Mark::Secondary),
    ("eu-363", "extension", 1.75, Unit::Metre, "EN 355:2002", Mark::Secondary),
    ("eu-363", "twice the lanyard's length plus", 1.75, Unit::Metre, "EN 355:2002", Mark::Secondary),
    ("eu-363", "length of a lanyard with absorber", 2.0, Unit::Metre, "EN 354/355", Mark::Secondary),
    ("eu-363", "lanyard static strength, textile", 22.0, Unit::Kilonewton, "EN 354:2010", Mark::Secondary),
    ("eu-363", "lanyard static strength, metal", 15.0, Unit::Kilonewton, "EN 354:2010", Mark::Secondary),
    ("eu-363", "retractable arrester: force", 6.0, Unit::Kilonewton, "EN 360", Mark::Secondary),
    ("eu-363", "retractable arrester: arrest distance", 2.0, Unit::Metre, "EN 360", Mark::Secondary),
    ("eu-363", "guided arrester on a flexible line: force", 6.0, Unit::Kilonewton, "EN 353-2", Mark::Secondary),
    ("eu-363", "guided arrester on a flexible line: arrest", 1.0, Unit::Metre, "EN 353-2", Mark::Secondary),
    ("eu-363", "anchor device, static, metal", 12.0, Unit::Kilonewton, "EN 795:2012", Mark::Secondary),
    ("eu-363", "anchor device, static, not of metal", 18.0, Unit::Kilonewton, "EN 795:2012", Mark::Secondary),
    ("eu-363", "reserve below the feet", 1.0, Unit::Metre, "DGUV Regel 112-198 s.7.3", Mark::Published),
    ("iso-10333-1", "free fall", 1.8, Unit::Metre, "ISO 10333-2:2000", Mark::Published),
    ("iso-10333-1", "force", 4.0, Unit::Kilonewton, "ISO 10333-2:2000", Mark::Published),
    ("iso-10333-1", "mass", 100.0, Unit::Kilogram, "ISO 10333-2:2000", Mark::Published),
    ("iso-10333-2", "free fall", 4.0, Unit::Metre, "ISO 10333-2:2000", Mark::Published),
    ("iso-10333-2", "force", 6.0, Unit::Kilonewton, "ISO 10333-2:2000", Mark::Published),
    ("iso-10333-2", "mass", 100.0, Unit::Kilogram, "ISO 10333-2:2000", Mark::Published),
    ("ca-on", "free-fall distance", 1.5, Unit::Metre, "Reg. 851, s.85", Mark::Secondary),
    ("ca-on", "arrest force", 8.0, Unit::Kilonewton, "Reg. 851, s.85", Mark::Secondary),
    ("ca-qc", "arrest force", 6.0, Unit::Kilonewton, "2.10.12", Mark::Published),
    ("ca-qc", "free-fall distance", 1.8, Unit::Metre, "s.347", Mark::Published),
    ("ca-qc", "anchor", 18.0, Unit::Kilonewton, "s.349.1", Mark::Published),
    ("ca-qc", "certified anchor", 2.0, Unit::One, "2.10.15", Mark::Published),
    ("ca-qc", "swing, distance", 3.0, Unit::Metre, "2.10.15", Mark::Published),
    ("ca-qc", "swing, angle", 22.0, Unit::Degree, "2.10.15", Mark::Published),
    ("ca-qc", "steel cable diameter", 12.0, Unit::Millimetre, "2.10.15(2)(a)", Mark::Published),
    ("ca-qc", "slack over span", 1.0 / 12.0, Unit::One, "2.10.15(2)(a)", Mark::Published),
    ("ca-qc", "lifeline: span", 12.0, Unit::Metre, "2.10.15(2)(a)", Mark::Published),
    ("ca-qc", "end anchors", 90.0, Unit::Kilonewton, "2.10.15(2)(a)", Mark::Published),
    ("ca-qc", "workers", 2.0, Unit::One, "2.10.15(2)(a)", Mark::Published),
    ("ca-ab", "arrest force", 6.0, Unit::Kilonewton, "s.828", Mark::Published),
    ("ca-ab", "anchor", 16.0, Unit::Kilonewton, "s.152", Mark::Published),
    ("ca-ab", "anchor: factor", 2.0, Unit::One, "s.152", Mark::Published),
    ("au-qld", "absorber holds", 6.0, Unit::Kilonewton, "s.306I", Mark::Published),
    ("au-qld", "anchor, free fall", 15.0, Unit::Kilonewton, "s.306I", Mark::Published),
    ("au-qld", "anchor, limited free fall", 12.0, Unit::Kilonewton, "s.306I", Mark::Published),
    ("au-qld", "anchor, two persons", 21.0, Unit::Kilonewton, "s.306I", Mark::Published),
    ("sg-wsh", "of wire", 2.0, Unit::One, "s.3.9.1", Mark::Published),
    ("sg-wsh", "of webbing or fibre", 3.0, Unit::One, "s.3.9.1", Mark::Published),
    ("rope-892", "single rope", 12.0, Unit::Kilonewton, "EN 892", Mark::Published),
    ("rope-892", "half rope", 8.0, Unit::Kilonewton, "EN 892", Mark::Published),
    ("rope-892", "twin rope", 12.0, Unit::Kilonewton, "EN 892", Mark::Published),
    ("rope-892", "elongation", 40.0, Unit::Percent, "EN 892", Mark::Published),
    ("rope-1891", "force at fall factor 0.3", 6.0, Unit::Kilonewton, "EN 1891", Mark::Secondary),
    ("rope-1891", "elongation from 50 kg", 5.0, Unit::Percent, "EN 1891", Mark::Secondary),
];

#[test]
fn every_row_is_there_with_value_unit_clause_and_mark() {
    for (set, quantity, value, unit, clause, mark) in ROWS {
        let found = limit_set(set).unwrap_or_else(|| panic!("no set {set}")).limits.iter().any(|l| {
            l.quantity.contains(quantity)
                && l.value == *value
                && l.unit == *unit
                && l.clause.contains(clause)
                && l.mark == *mark
        });
        assert!(found, "{set}: {quantity} {value} {unit:?} {clause} {mark:?}");
    }
}

#[test]
fn every_limit_of_every_set_is_a_row_of_the_table() {
    for set in limit_sets() {
        for limit in set.limits {
            let known = ROWS.iter().any(|(name, _, value, unit, clause, mark)| {
                *name == set.name
                    && *value == limit.value
                    && *unit == limit.unit
                    && limit.clause.contains(clause)
                    && *mark == limit.mark
            });
            assert!(known, "{}: {limit:?}", set.name);
        }
    }
}

#[test]
fn names_are_unique_and_each_set_says_what_it_was_written_for() {
    let mut names: Vec<_> = limit_sets().iter().map(|s| s.name).collect();
    assert_eq!(names.len(), 12);
    names.sort_unstable();
    names.dedup();
    assert_eq!(names.len(), 12);
    assert!(limit_sets().iter().all(|s| s.scope.len() > 20 && !s.limits.is_empty()));
    assert_eq!(limit_set("eu-364"), None);
}

#[test]
fn united_states_limits_convert_exactly() {
    let set = limit_set("us-1926").unwrap();
    let si = |words: &str| set.limits.iter().find(|l| l.quantity.starts_with(words)).unwrap().si();
    assert_eq!(si("arrest force"), 1800.0 * 4.448_221_615_260_5);
    assert_eq!(si("free-fall"), 6.0 * 0.3048);
    assert_eq!(si("deceleration"), 3.5 * 0.3048);
    assert_eq!(si("person with tools"), 310.0 * 0.453_592_37);
}

#[test]
fn the_list_says_which_values_are_from_memory() {
    let text = limits_text(Paint::Plain);
    let place = text.find("person with tools, for the presumption").unwrap();
    let next = text[place..].find("us-1910").unwrap();
    assert!(text[place..place + next].contains("from memory, unverified"), "{text}");
    let value: serde_json::Value = serde_json::from_str(&limits_json()).unwrap();
    let limits = value["sets"][0]["limits"].as_array().unwrap();
    assert!(limits.iter().any(|l| l["mark"] == "M" && l["confirmed"] == "from memory, unverified"));
}

#[test]
fn the_list_shows_where_sources_disagree() {
    let text = limits_text(Paint::Plain);
    assert_eq!(disagreements().len(), 5);
    for wanted in ["6 kN", "8 kN (1800 lbf)", "1.07 m", "1.08 m", "1.1 m", "2 ft", "3 ft", "1.5 m", "below the anchor"]
    {
        let shown = text.split("where the sources disagree").nth(1).unwrap();
        assert!(shown.contains(wanted), "{wanted}");
    }
    let value: serde_json::Value = serde_json::from_str(&limits_json()).unwrap();
    assert_eq!(value["disagreements"].as_array().unwrap().len(), 5);
}

#[test]
fn the_list_stays_within_a_hundred_columns_and_keeps_the_source_units() {
    let text = limits_text(Paint::Plain);
    for line in text.lines() {
        assert!(unicode_width::UnicodeWidthStr::width(line) <= 100, "{line}");
    }
    assert!(text.contains("<= 1800 lbf (8.01 kN)"), "{text}");
    assert!(text.contains("<= 3.5 ft (1.07 m)"));
    assert!(text.contains("< 310 lb (140.6 kg)"), "{text}");
    assert!(!text.contains('\u{1b}'));
}
