//! Outputs as bytes: the shape of JSON, the width of text, the sentences about margins.
#![expect(clippy::unwrap_used, clippy::panic, reason = "a test stops at what it cannot have")]

use serde_json::Value;
use underfoot::margin::{Basis, Margin, Sense, Verdict};
use underfoot::quantity::{Dimension, UnitSystem};
use underfoot::scenario::{Scenario, read};
use underfoot::sheet::{CAUTIONS, Layout, Paint, Report, governing_words, json, margin_words, report, text};
use unicode_width::UnicodeWidthStr;

const FILE: &str = r#"
title = "Roof edge"
datum = "finished floor of level 0"

[subject]
kind = "person"
mass = "100 kg"
attachment_above_feet = "1.5 m"

[place]
standing = "12.0 m"
anchor = "13.5 m"

[line]
kind = "lanyard"
length = "2.0 m"
stiffness = "60 kN/m"
damping_ratio = 0.05
strength = "25 kN"

[absorber]
deploy_force = "4.0 kN"
stroke = "1.75 m"
rated_mass = "110 kg"
rated_free_fall = "4 m"

[anchor]
capacity = "25 kN"

[[obstacle]]
name = "plant-room roof"
top = "5 m"
reserve = "1 m"

[limits]
basis = "eu-363"
arrest_force = { value = "5 kN", why = "apprentices on site" }
"#;

fn scenario(text: &str) -> Scenario {
    read("roof-edge.toml", text).unwrap_or_else(|faults| panic!("{}", faults.render(false)))
}

fn reported(text: &str) -> Report {
    report("roof-edge.toml", text, &scenario(text)).unwrap()
}

/// Every number becomes `0` and every sentence of a list its own kind, so that the shape alone is left.
fn shape(value: &Value) -> Value {
    match value {
        Value::Number(_) => Value::from(0),
        Value::Array(list) if list.iter().all(Value::is_string) => Value::from("list of sentences"),
        Value::Array(list) => list.iter().take(1).map(shape).collect(),
        Value::Object(map) => map.iter().map(|(key, value)| (key.clone(), shape(value))).collect(),
        other => other.clone(),
    }
}

#[test]
fn json_has_the_agreed_shape() {
    let mut value: Value = serde_json::from_str(&json(&reported(FILE), Layout::Lines)).unwrap();
    value["version"] = "x.y.z".into();
    value["scenario_sha256"] = "64 hex digits".into();
    value["events"][0]["words"] = "words".into();
    value["verdict"] = "one of the four words".into();
    let margins = value["margins"].as_array().unwrap();
    value["margins"] = margins.iter().filter(|m| m["id"] == "arrest_force").cloned().collect();
    let ids: Vec<String> = value["numbers"].as_object().unwrap().keys().cloned().collect();
    value["numbers"] = value["numbers"]["free_fall_distance"].clone();
    insta::assert_snapshot!("json_shape", format!("{:#}", shape(&value)));
    for id in ["arrest_force_peak", "clearance.plant-room_roof", "margin.plant-room_roof", "damping_regime"] {
        assert!(ids.contains(&id.to_owned()), "{id} is not among {ids:?}");
    }
}

#[test]
fn every_json_number_has_a_value_and_a_unit() {
    let value: Value = serde_json::from_str(&json(&reported(FILE), Layout::OneLine)).unwrap();
    for (id, number) in value["numbers"].as_object().unwrap() {
        assert!(number["value"].is_number() || number["unit"] == "text", "{id}: {number}");
        assert!(number["unit"].as_str().is_some_and(|unit| !unit.is_empty()), "{id}: {number}");
    }
    for margin in value["margins"].as_array().unwrap() {
        assert!(margin["basis"].as_str().is_some_and(|basis| !basis.is_empty()), "{margin}");
        assert!(["m", "N", "kg", "1"].contains(&margin["unit"].as_str().unwrap()), "{margin}");
    }
    assert_eq!(value["cautions"].as_array().unwrap().len(), CAUTIONS.len());
}

#[test]
fn one_line_json_is_one_line_and_says_the_same() {
    let report = reported(FILE);
    let (long, short) = (json(&report, Layout::Lines), json(&report, Layout::OneLine));
    assert_eq!(short.matches('\n').count(), 1);
    assert_eq!(serde_json::from_str::<Value>(&long).unwrap(), serde_json::from_str::<Value>(&short).unwrap());
}

#[test]
fn the_hash_is_that_of_the_file() {
    let abc = underfoot::sheet::sha256_hex("abc");
    assert_eq!(abc, "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad");
    assert_eq!(reported(FILE).scenario_sha256, underfoot::sheet::sha256_hex(FILE));
}

#[test]
fn an_override_shows_both_values_and_its_reason_in_text_and_json() {
    let report = reported(FILE);
    for output in [text(&report, UnitSystem::Metric, Paint::Plain), json(&report, Layout::Lines)] {
        let words = output.split_whitespace().collect::<Vec<_>>().join(" ");
        assert!(words.contains("5 kN instead of 6 kN of eu-363"), "{output}");
        assert!(words.contains("why: apprentices on site"), "{output}");
    }
}

#[test]
fn a_value_from_memory_says_so_in_text_and_json() {
    let report = reported(&FILE.replace("eu-363", "us-1926"));
    for output in [text(&report, UnitSystem::Us, Paint::Plain), json(&report, Layout::Lines)] {
        assert!(output.contains("from memory, unverified"), "{output}");
    }
}

#[test]
fn text_stays_within_a_hundred_columns_even_with_long_names() {
    let long = "a very long name of an obstacle that nobody would write but somebody will some day, twice as long";
    for file in [FILE.to_owned(), FILE.replace("plant-room roof", long).replace("Roof edge", &"x".repeat(300))] {
        for system in [UnitSystem::Metric, UnitSystem::Us] {
            for line in text(&reported(&file), system, Paint::Plain).lines() {
                assert!(line.width() <= 100, "{} columns: {line}", line.width());
            }
        }
    }
}

#[test]
fn text_starts_with_the_caution_and_names_version_hash_and_datum() {
    let report = reported(FILE);
    let page = text(&report, UnitSystem::Metric, Paint::Plain);
    assert!(page.starts_with("FIRST-PASS ESTIMATE, NOT A DESIGN"));
    let tail =
        [env!("CARGO_PKG_VERSION"), &report.scenario_sha256, "elevation 0 is: finished floor of level 0", "Left out"];
    for words in tail {
        assert!(page.contains(words), "{words}");
    }
    let (title, verdict) = (page.find("Roof edge").unwrap(), page.find("HOLDS").or(page.find("SHORT")).unwrap());
    assert!(title < verdict);
}

#[test]
fn every_verdict_is_told_by_symbol_and_word_without_colour() {
    let report = reported(FILE);
    let page = text(&report, UnitSystem::Metric, Paint::Plain);
    for margin in &report.margins {
        let row = format!("{} {}", margin.verdict.symbol(), margin.verdict.word());
        assert!(page.lines().any(|l| l.contains(&row) && l.contains(&margin.label)), "{}", margin.label);
    }
    let colour = text(&report, UnitSystem::Metric, Paint::Colour);
    assert!(colour.contains('\u{1b}') && !page.contains('\u{1b}'));
    assert_eq!(anstream::adapter::strip_str(&colour).to_string(), page);
}

#[test]
fn every_shipped_scenario_gives_complete_outputs() {
    let folder = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios");
    let mut count = 0;
    for entry in std::fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_none_or(|ending| ending != "toml") {
            continue;
        }
        let file = std::fs::read_to_string(path).unwrap();
        let report = reported(&file);
        for system in [UnitSystem::Metric, UnitSystem::Us] {
            let page = text(&report, system, Paint::Plain);
            assert!(page.lines().all(|line| line.width() <= 100), "{page}");
            assert!(page.contains("FIRST-PASS ESTIMATE") && !page.contains("not a number"), "{page}");
        }
        let value: Value = serde_json::from_str(&json(&report, Layout::OneLine)).unwrap();
        assert_eq!(value["verdict"], report.verdict.word());
        assert_eq!(value["margins"][0]["verdict"], report.verdict.word(), "the governing one is not the worst");
        // 2000 rows, the head, and each phase with both its borders; a knot of a table is a border too.
        let borders = 2 * report.estimate.trace.phases().len();
        assert!(underfoot::sheet::csv(&report).unwrap().lines().count() <= 2001 + borders);
        count += 1;
    }
    assert!(count >= 8, "{count}");
}

/// The file's lanyard on an anchor beside the fall line, a wall in the way of its swing.
fn swinging() -> Report {
    let file = FILE.replace("anchor = \"13.5 m\"", "anchor = \"14 m\"\nanchor_offset = \"1.2 m\"");
    reported(&format!(
        "{file}\n[[face]]\nname = \"North wall\"\noffset = \"1.5 m\"\nbottom = \"0 m\"\ntop = \"14 m\"\n"
    ))
}

fn spanned() -> Report {
    let span = "kind = \"span\"\ncapacity = \"25 kN\"\n[anchor.span]\nlength = \"12 m\"\nat = \"4 m\"\nsag = \"0.3 m\"\nmodulus = \"4000 kN\"";
    reported(&FILE.replace("capacity = \"25 kN\"", span))
}

#[test]
fn the_working_is_told_step_by_step_and_ends_at_the_free_fall() {
    for report in [reported(FILE), swinging(), spanned()] {
        let page = text(&report, UnitSystem::Metric, Paint::Plain);
        let value: Value = serde_json::from_str(&json(&report, Layout::Lines)).unwrap();
        let steps = value["working"]["steps"].as_array().unwrap();
        let last = steps.last().unwrap();
        assert!(last["what"].as_str().unwrap().starts_with("free fall"), "{last}");
        let free_fall = value["numbers"]["free_fall_distance"]["value"].as_f64().unwrap();
        assert!((last["value"].as_f64().unwrap() - free_fall).abs() < 1e-12, "{last} is not {free_fall}");
        let joined = page.split_whitespace().collect::<Vec<_>>().join(" ");
        for step in steps {
            assert!(joined.contains(step["what"].as_str().unwrap()), "{step} is not on {page}");
        }
    }
}

#[test]
fn both_sums_of_space_name_their_datum_and_end_at_the_same_elevation() {
    let reports = [reported(FILE), swinging(), spanned(), reported(&FILE.replace("reserve = \"1 m\"", ""))];
    for (report, reserve) in reports.iter().zip([1.0, 1.0, 1.0, 0.0]) {
        let value: Value = serde_json::from_str(&json(report, Layout::Lines)).unwrap();
        let sums = value["working"]["clearance_sums"].as_array().unwrap();
        let e = report.estimate.elevations.unwrap();
        let ends: Vec<f64> = [e.anchor_m.unwrap(), e.standing_m]
            .iter()
            .zip(sums)
            .map(|(datum, sum)| datum - sum["total"]["value"].as_f64().unwrap())
            .collect();
        assert_eq!([&sums[0]["datum"], &sums[1]["datum"]], ["below the anchor", "below the standing surface"]);
        let lowest = report.estimate.numbers.get("lowest_foot").unwrap();
        for end in ends {
            assert!((lowest - reserve - end).abs() < 1e-9, "{end} is not {lowest} less {reserve}");
        }
    }
    let page = text(&reports[0], UnitSystem::Metric, Paint::Plain);
    assert!(page.contains("measured below the anchor") && page.contains("measured below the standing surface"));
    let without = FILE
        .replace("standing = \"12.0 m\"\nanchor = \"13.5 m\"", "")
        .replace("[place]", "[fall]\nfree_fall = \"1 m\"");
    let value: Value = serde_json::from_str(&json(&reported(&without), Layout::Lines)).unwrap();
    assert_eq!(value["working"]["clearance_sums"].as_array().unwrap().len(), 0);
}

#[test]
fn a_swing_shows_its_places_its_strike_and_the_name_of_the_face() {
    let report = swinging();
    let page = text(&report, UnitSystem::Metric, Paint::Plain);
    for words in ["attachment at the lowest point", "x strikes the face North wall at", "closest approach, North wall"]
    {
        assert!(page.contains(words), "{words}: {page}");
    }
    assert!(page.lines().all(|line| line.width() <= 100));
    let value: Value = serde_json::from_str(&json(&report, Layout::Lines)).unwrap();
    let strike = &value["swing"]["strikes"][0];
    assert_eq!((&strike["name"], &strike["kind"]), (&"North wall".into(), &"face".into()));
    assert_eq!(strike["speed"]["value"], value["numbers"]["strike_speed"]["value"]);
    assert!(value.get("span").is_none());
    let straight: Value = serde_json::from_str(&json(&reported(FILE), Layout::Lines)).unwrap();
    assert!(straight.get("swing").is_none() && straight.get("span").is_none());
}

#[test]
fn a_lifeline_shows_tension_sag_and_both_end_loads_with_direction() {
    let report = spanned();
    let page = text(&report, UnitSystem::Metric, Paint::Plain);
    for words in ["load of the left support", "load of the right support", "deg below level", "largest cable tension"] {
        assert!(page.contains(words), "{words}: {page}");
    }
    let value: Value = serde_json::from_str(&json(&report, Layout::Lines)).unwrap();
    let span = &value["span"];
    assert_eq!(span["peak_tension"]["value"], value["numbers"]["span_tension_peak"]["value"]);
    assert_eq!(span["at"]["value"], 4.0);
    let angle = |side: &str| span[side]["below_horizontal_deg"].as_f64().unwrap();
    assert!(angle("left_end_load") > angle("right_end_load"), "the nearer support is pulled down more steeply");
    assert!(span.get("deployed_length").is_none());
}

#[test]
fn the_trace_of_a_swing_has_columns_for_its_plane_and_that_of_a_straight_fall_has_not() {
    let report = swinging();
    let csv = underfoot::sheet::csv(&report).unwrap();
    let mut lines = csv.lines();
    assert_eq!(
        lines.next().unwrap(),
        "time_s,travel_m,speed_m_per_s,line_force_n,mode,deployed_m,offset_m,elevation_m,swing_angle_deg,\
         path_speed_m_per_s,caution"
    );
    let cell = |line: &str, n: usize| line.split(',').nth(n).unwrap().parse::<f64>().unwrap();
    let first = lines.next().unwrap();
    assert_eq!((cell(first, 6), cell(first, 7)), (0.0, 13.5));
    let degrees = (-1.2_f64).atan2(0.5).to_degrees();
    assert!((cell(first, 8) - degrees).abs() < 1e-9, "{first}");
    let fastest = lines.map(|line| cell(line, 9)).fold(0.0, f64::max);
    assert!(fastest > report.estimate.numbers.get("speed_at_taut").unwrap());
    let straight = underfoot::sheet::csv(&reported(FILE)).unwrap();
    assert_eq!(straight.lines().next().unwrap(), "time_s,travel_m,speed_m_per_s,line_force_n,mode,deployed_m,caution");
}

#[test]
fn notes_follow_the_units_of_the_page() {
    let report = swinging();
    let metric = text(&report, UnitSystem::Metric, Paint::Plain);
    let us = text(&report, UnitSystem::Us, Paint::Plain);
    let note = |page: &str| {
        let joined = page.split_whitespace().collect::<Vec<_>>().join(" ");
        joined
            .split("note first strike of this run at ")
            .nth(1)
            .unwrap()
            .split(", the speed")
            .next()
            .unwrap()
            .to_owned()
    };
    assert!(note(&metric).ends_with(" m/s") && note(&us).ends_with(" ft/s"), "{} {}", note(&metric), note(&us));
    let without_notes =
        |list: &[Margin]| -> Vec<Margin> { list.iter().map(|m| Margin { note: None, ..m.clone() }).collect() };
    assert_eq!(without_notes(&report.margins_in(UnitSystem::Us)), without_notes(&report.margins));
}

#[test]
fn counts_are_whole_numbers() {
    let page = text(&reported(FILE), UnitSystem::Metric, Paint::Plain);
    let row = page.lines().find(|line| line.trim_start().starts_with("slack episodes")).unwrap();
    assert!(row.split_whitespace().last().unwrap().parse::<u32>().is_ok(), "{row}");
}

#[test]
fn the_same_file_gives_the_same_bytes() {
    assert_eq!(json(&reported(FILE), Layout::Lines), json(&reported(FILE), Layout::Lines));
}

fn clearance(demand: f64, limit: f64, verdict: Verdict) -> Margin {
    Margin {
        id: "clearance.plant-room_roof".to_owned(),
        label: "clearance plant-room roof".to_owned(),
        demand: Some(demand),
        limit: Some(limit),
        dimension: Dimension::Length,
        sense: Sense::AtLeast,
        margin: Some(demand - limit),
        verdict,
        basis: Basis { words: String::new(), from_memory: false },
        note: None,
    }
}

#[test]
fn the_governing_margin_is_told_in_words() {
    let file = scenario(FILE);
    let say = |demand, limit, verdict| margin_words(&file, &clearance(demand, limit, verdict), UnitSystem::Metric);
    let words = say(0.42, 1.0, Verdict::Short).replace("0.420", "0.42").replace("0.580", "0.58");
    assert_eq!(words, "feet stop 0.42 m above the plant-room roof, 1.00 m wanted (0.58 m short)");
    assert!(say(3.0, 1.0, Verdict::Holds).ends_with("(2.00 m to spare)"));
    assert!(
        say(-1.25, 1.0, Verdict::Short).starts_with("feet would reach 1.25 m below the top of the plant-room roof")
    );
    let load = FILE
        .replace("kind = \"person\"", "kind = \"load\"")
        .replace("attachment_above_feet", "underside_below_attachment");
    let words = margin_words(&scenario(&load), &clearance(2.0, 1.0, Verdict::Holds), UnitSystem::Metric);
    assert!(words.starts_with("underside stops 2.00 m above"), "{words}");
}

#[test]
fn an_open_margin_says_why_and_nothing_to_judge_says_what_to_state() {
    let file = scenario(FILE);
    let mut open = clearance(1.0, 1.0, Verdict::Open);
    open.demand = None;
    open.note = Some("state `place.standing`".to_owned());
    let words = margin_words(&file, &open, UnitSystem::Metric);
    assert_eq!(words, "clearance plant-room roof cannot be judged: state `place.standing`");
    assert!(governing_words(&file, &[], UnitSystem::Metric).contains("`limits`"));
}

#[test]
fn the_count_names_every_verdict_that_occurs() {
    use underfoot::sheet::{AuditTable, Audited, Finding, Summary};
    let mut table = AuditTable::default();
    assert_eq!(table.tally(), "0 files: none judged");
    let why = || "why".to_owned();
    for (finding, words) in [
        (Finding::NotComputed(why()), "1 file: 1 not computed"),
        (Finding::Unreadable(why()), "2 files: 1 unreadable, 1 not computed"),
        (Finding::NotComputed(why()), "3 files: 1 unreadable, 2 not computed"),
    ] {
        table.push(Summary::of(&Audited { file: why(), uri: why(), finding }, UnitSystem::Metric));
        assert_eq!(table.tally(), words);
    }
}

#[test]
fn the_limits_list_typical_cables_with_the_state_of_their_source() {
    let page = underfoot::sheet::limits_text(Paint::Plain);
    let tail = page.split("typical stiffness of cables").nth(1).unwrap();
    let tail = tail.split_whitespace().collect::<Vec<_>>().join(" ");
    assert!(tail.contains("steel wire rope, 7x7") && tail.contains("metallic area"), "{tail}");
    assert!(tail.contains("polyamide rope") && tail.contains("nominal area"), "{tail}");
    assert!(tail.matches("from memory, unverified").count() >= 6, "{tail}");
}
