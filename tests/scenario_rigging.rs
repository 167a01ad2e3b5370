//! What a line runs over and hangs from: edges, spans, faces, tables, lines that move.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
use std::path::Path;
use underfoot::scenario::{
    AnchorKind, Change, Document, LineKind, Scenario, SpanTension, StretchLaw, doubts, inputs, kind_changes, new_file,
    places, read, with_value,
};

/// A swing from a span over an edge, with everything of it stated.
const FULL: &str = r#"datum = "yard"
[subject]
kind = "person"
mass = "100 kg"
attachment_above_feet = "1.5 m"
stretch_allowance = "0.3 m"
half_width = "0.3 m"
[place]
standing = "10 m"
anchor = "12 m"
anchor_offset = "1 m"   # right of the fall line
edge = { offset = "0.5 m", elevation = "11.5 m", strength_factor = 2 } # coping
[line]
kind = "rope"
length = "3 m"
curve = [
    ["0 m", "0 kN"], # slack
    ["10 cm", "1.1 kN"],
    ["0.3 m", "9000 N"],
]
strength = "22 kN"
[absorber]
force_table = [["0 m", "3 kN"], ["0.5 m", "3 kN"], ["1.1 m", "4 kN"]]
onset_force = "3.2 kN"
wet_cold_factor = 1.25
rated_mass = "140 kg"
rated_free_fall = "4 m"
[anchor]
kind = "span"
capacity = "22 kN"
span = { length = "12 m", at = "4 m", sag = "0.3 m", modulus = "4000 kN", support_stiffness = "2000 kN/m", level_difference = "-0.5 m", workers = 2, spans = 3, strength = "40 kN", absorber = { deploy_force = "8 kN", stroke = "0.6 m" } } # wire
[[obstacle]]
name = "yard"
top = "0 m"
reserve = "1 m"
[[face]]
name = "Stair  tower"
offset = "-3 m"
bottom = "0 m"
top = "14 m"
[limits]
basis = "eu-363"
"#;

/// A retractable line overhead.
const RETRACTABLE: &str = r#"datum = "yard"
[subject]
kind = "person"
mass = "100 kg"
attachment_above_feet = "1.5 m"
[place]
standing = "10 m"
anchor = "13 m"
[line]
kind = "retractable"
modulus = "400 kN"
lock_travel = "0.6 m"
slack = "0.1 m"
[[obstacle]]
name = "yard"
top = "0 m"
reserve = "1 m"
[limits]
basis = "eu-363"
"#;

fn scenario(text: &str) -> Scenario {
    read("test.toml", text).unwrap_or_else(|faults| panic!("{}", faults.render(false)))
}

fn doubt_messages(text: &str) -> Vec<String> {
    doubts("t", text, &scenario(text)).faults.into_iter().map(|fault| fault.message).collect()
}

#[test]
fn edge_span_face_and_tables_read_into_si() {
    let s = scenario(FULL);
    assert_eq!(s.place.anchor_offset.unwrap().si(), 1.0);
    let edge = s.place.edge.unwrap();
    assert_eq!((edge.offset.si(), edge.elevation.si(), edge.strength_factor.unwrap().si()), (0.5, 11.5, 2.0));
    assert_eq!(s.line.stretch, StretchLaw::Curve(vec![(0.0, 0.0), (0.1, 1100.0), (0.3, 9000.0)]));
    let absorber = s.absorber.unwrap();
    assert_eq!(absorber.force_table, Some(vec![(0.0, 3000.0), (0.5, 3000.0), (1.1, 4000.0)]));
    assert_eq!((absorber.stroke_m(), absorber.first_force_n(), absorber.force_factor()), (1.1, [3000.0; 3], 1.25));
    let AnchorKind::Span(span) = s.anchor.kind else { panic!("no span") };
    assert!(matches!(&span.tension, SpanTension::Sag(sag) if sag.si() == 0.3));
    assert_eq!((span.at_m(), span.workers.unwrap().si(), span.spans.unwrap().si()), (4.0, 2.0, 3.0));
    assert_eq!(span.chord_m(), 12.0_f64.hypot(0.5));
    assert_eq!(span.absorber.unwrap().deploy_force.si(), 8000.0);
    assert_eq!((s.faces[0].id().as_str(), s.faces[0].offset.si(), s.faces[0].top.si()), ("stair_tower", -3.0, 14.0));
}

#[test]
fn a_span_in_sections_is_the_span_in_braces() {
    let (before, rest) = FULL.split_once("span = { ").unwrap();
    let (inside, after) = rest.split_once(" } } # wire\n").unwrap();
    let (own, absorber) = inside.split_once(", absorber = { ").unwrap();
    let lines = |text: &str| text.replace(", ", "\n");
    let sections =
        format!("{before}[anchor.span]\n{}\n[anchor.span.absorber]\n{}\n{after}", lines(own), lines(absorber));
    assert_eq!(scenario(&sections), scenario(FULL));
}

#[test]
fn what_is_left_out_has_its_stated_meaning() {
    let span = "span = { length = \"10 m\", pretension = \"0 kN\", modulus = \"4500 kN\" }";
    let (before, rest) = FULL.split_once("span = { ").unwrap();
    let text = format!("{before}{span} # wire{}", rest.split_once("# wire").unwrap().1);
    let AnchorKind::Span(span) = scenario(&text).anchor.kind else { panic!("no span") };
    assert_eq!((span.at_m(), span.chord_m()), (5.0, 10.0));
    assert_eq!((span.workers, span.spans, span.absorber), (None, None, None));
    let short = FULL.replace("onset_force", "stroke = \"0.8 m\"\nonset_force");
    assert_eq!(scenario(&short).absorber.unwrap().stroke_m(), 0.8);
}

#[test]
fn a_retractable_line_has_no_length_and_a_vertical_one_has_a_grab() {
    let line = scenario(RETRACTABLE).line;
    assert_eq!((line.kind, line.length), (LineKind::Retractable, None));
    assert_eq!((line.lock_travel.unwrap().si(), line.slack.unwrap().si()), (0.6, 0.1));
    for law in ["stiffness = \"60 kN/m\"", "static_elongation = { percent = 2, from = \"50 kg\", to = \"150 kg\" }"] {
        scenario(&RETRACTABLE.replace("modulus = \"400 kN\"", law));
    }
    let vertical = FULL
        .replace("kind = \"rope\"", "kind = \"vertical\"\ngrab_slide = \"0.3 m\"")
        .replace("edge = {", "# edge = {")
        .replace("anchor_offset", "# anchor_offset")
        .replace("anchor = \"12 m\"\n", "[fall]\nfree_fall = \"0.5 m\"\n");
    let line = scenario(&vertical).line;
    assert_eq!((line.kind, line.grab_slide.unwrap().si()), (LineKind::Vertical, 0.3));
}

#[test]
fn every_number_of_edge_span_and_face_is_an_input_that_can_be_changed() {
    for text in [FULL, RETRACTABLE] {
        let s = scenario(text);
        let places = places(text);
        for input in inputs(&s) {
            assert!(input.path == "gravity" || places.exactly(&input.path).is_some(), "{} has no place", input.path);
            let whole = input.path.ends_with("workers") || input.path.ends_with("spans");
            let value = if whole { input.measure.si() + 1.0 } else { input.measure.si() * 1.001 + 1e-6 };
            let changed = with_value(&s, &input.path, value).unwrap_or_else(|| panic!("{}", input.path));
            let now = inputs(&changed).into_iter().find(|other| other.path == input.path).unwrap();
            assert_eq!(now.measure.si(), value, "{}", input.path);
            assert_eq!(inputs(&changed).iter().zip(inputs(&s)).filter(|(a, b)| *a != b).count(), 1, "{}", input.path);
        }
    }
    let paths: Vec<String> = inputs(&scenario(FULL)).into_iter().map(|input| input.path).collect();
    for path in [
        "place.anchor_offset",
        "place.edge.strength_factor",
        "absorber.wet_cold_factor",
        "anchor.span.at",
        "anchor.span.sag",
        "anchor.span.absorber.stroke",
        "face.1.offset",
    ] {
        assert!(paths.iter().any(|found| found == path), "{path} is not among {paths:?}");
    }
    let s = scenario(FULL);
    let impossible = [
        ("anchor.span.at", 12.0),
        ("anchor.span.sag", 6.0),
        ("anchor.span.workers", 1.5),
        ("anchor.span.spans", 0.0),
        ("anchor.span.level_difference", 12.0),
        ("absorber.onset_force", 2999.0),
        ("face.1.bottom", 14.0),
        ("place.anchor", -0.5),
        ("anchor.span.pretension", 100.0),
        ("face.2.offset", 1.0),
    ];
    for (path, value) in impossible {
        assert_eq!(with_value(&s, path, value), None, "{path} = {value}");
    }
}

#[test]
fn an_edit_inside_braces_keeps_every_other_byte() {
    let document = Document::of_text(Path::new("f.toml"), FULL.to_owned()).unwrap();
    let cases = [
        ("anchor.span.length", "13 m", "length = \"12 m\", at", "length = \"13 m\", at"),
        ("anchor.span.workers", "3", "workers = 2", "workers = 3"),
        ("anchor.span.absorber.stroke", "0.7 m", "stroke = \"0.6 m\"", "stroke = \"0.7 m\""),
        ("place.edge.elevation", "11..11.5 m", "\"11.5 m\"", "\"11..11.5 m\""),
        ("place.edge.strength_factor", "1.5", "strength_factor = 2", "strength_factor = 1.5"),
        ("place.anchor_offset", "2 ft", "\"1 m\"   # right", "\"2 ft\"   # right"),
        ("face.1.offset", "-4 m", "offset = \"-3 m\"", "offset = \"-4 m\""),
        ("absorber.wet_cold_factor", "1.5", "= 1.25", "= 1.5"),
        (
            "absorber.force_table",
            "[[\"0 m\", \"3 kN\"], [\"1.2 m\", \"4 kN\"]]",
            "[[\"0 m\", \"3 kN\"], [\"0.5 m\", \"3 kN\"], [\"1.1 m\", \"4 kN\"]]",
            "[[\"0 m\", \"3 kN\"], [\"1.2 m\", \"4 kN\"]]",
        ),
    ];
    for (input, value, old, new) in cases {
        let changed = document.with_value(input, value).unwrap_or_else(|faults| panic!("{}", faults.render(false)));
        assert_eq!(changed.text(), FULL.replacen(old, new, 1), "{input} = {value}");
    }
    let refused = document.with_value("absorber.force_table", "steep").unwrap_err();
    assert_eq!(refused.faults[0].message, "force table cannot be of type string");
}

#[test]
fn an_absent_key_is_added_inside_the_braces_and_beside_them() {
    let bare = FULL.replace(", strength_factor = 2", "").replace(", at = \"4 m\"", "");
    let document = Document::of_text(Path::new("f.toml"), bare.clone()).unwrap();
    let changed = document.with_value("place.edge.strength_factor", "2").unwrap();
    assert!(changed.text().contains("elevation = \"11.5 m\", strength_factor = 2 } # coping"), "{}", changed.text());
    let changed = changed.with_value("anchor.span.at", "5 m").unwrap();
    let AnchorKind::Span(span) = &changed.scenario().anchor.kind else { panic!("no span") };
    assert_eq!(span.at_m(), 5.0);
    let braces = "anchor = { kind = \"sprung\", stiffness = \"9 kN/m\" } # wire\n".to_owned()
        + &RETRACTABLE.replace("[place]\nstanding = \"10 m\"\nanchor = \"13 m\"\n", "");
    let braces = "place = { standing = \"10 m\", anchor = \"13 m\" }\n".to_owned() + &braces;
    let document = Document::of_text(Path::new("f.toml"), braces).unwrap_or_else(|f| panic!("{}", f.render(false)));
    let changed = document.with_value("anchor.capacity", "22 kN").unwrap();
    assert!(changed.text().contains("stiffness = \"9 kN/m\", capacity = \"22 kN\" } # wire"), "{}", changed.text());
    let faults = document.with_value("place.edge.offset", "1 m").unwrap_err();
    assert_eq!(faults.faults[0].message, "`place.edge.elevation` is missing", "the offset went in");
    let plain = FULL.replace(", absorber = { deploy_force = \"8 kN\", stroke = \"0.6 m\" }", "");
    let document = Document::of_text(Path::new("f.toml"), plain).unwrap();
    let faults = document.with_value("anchor.span.absorber.deploy_force", "8 kN").unwrap_err();
    assert_eq!(faults.faults[0].message, "`anchor.span.absorber.stroke` is missing");
}

#[test]
fn the_choices_of_a_new_file_read_when_they_are_made() {
    let mut text = new_file().replace("# kind = \"fixed\"", "kind = \"span\"");
    for section in ["[place.edge]", "[anchor.span]", "[anchor.span.absorber]", "[[face]]"] {
        let (before, rest) = text.split_once(&format!("# {section}\n")).unwrap();
        let (keys, after) = rest.split_once("\n\n").unwrap();
        let made: Vec<&str> = keys
            .lines()
            .map(|line| line.strip_prefix("# ").unwrap())
            .filter(|line| line.contains(" = ") && !line.starts_with("sag"))
            .collect();
        let made = made.join("\n");
        text = format!("{before}{section}\n{made}\n\n{after}");
    }
    let s = scenario(&text);
    assert!(matches!(&s.anchor.kind, AnchorKind::Span(span) if span.absorber.is_some()));
    assert!(s.place.edge.is_some() && s.faces.len() == 1);
}

#[test]
fn a_table_of_a_thousand_rows_is_read_and_one_more_is_refused() {
    let with_rows = |count: usize| {
        let rows: Vec<String> = (0..count).map(|n| format!("[\"{n} mm\", \"{} N\"]", 40 * n)).collect();
        let (before, rest) = FULL.split_once("curve = [\n").unwrap();
        format!("{before}curve = [{}]\n{}", rows.join(","), rest.split_once("\n]\n").unwrap().1)
    };
    scenario(&with_rows(1000));
    let faults = read("t", &with_rows(1001)).unwrap_err();
    assert_eq!(faults.faults[0].message, "the force-elongation table has 1001 rows");
}

#[test]
fn obstacles_and_faces_together_are_at_most_two_hundred() {
    let face = |n: usize| format!("[[face]]\nname = \"f{n}\"\noffset = \"-4 m\"\nbottom = \"0 m\"\ntop = \"9 m\"\n");
    let many = FULL.to_owned() + &(0..198).map(face).collect::<String>();
    scenario(&many);
    let faults = read("t", &(many + &face(999))).unwrap_err();
    assert_eq!(faults.faults[0].message, "more than 200 obstacles and faces");
}

#[test]
fn sound_rigging_raises_no_doubt() {
    assert_eq!(doubt_messages(FULL), Vec::<String>::new());
    let strong = RETRACTABLE.replace("lock_travel", "strength = \"15 kN\"\nlock_travel").replacen(
        "[[obstacle]]",
        "[anchor]\ncapacity = \"15 kN\"\n[[obstacle]]",
        1,
    );
    assert_eq!(doubt_messages(&strong), Vec::<String>::new());
}

#[test]
fn each_doubt_of_rigging_is_raised_by_the_statement_it_is_about() {
    let cases: &[(&str, &str, &str, &str)] = &[
        (RETRACTABLE, "lock_travel = \"0.6 m\"", "lock_travel = \"0.6..1.2 m\"", "is long"),
        (RETRACTABLE, "anchor = \"13 m\"", "anchor = \"11 m\"", "below the attachment"),
        (FULL, "kind = \"rope\"", "kind = \"vertical\"", "the grab has no slide"),
        (FULL, ", strength_factor = 2", "", "did it no harm"),
        (FULL, "elevation = \"11.5 m\"", "elevation = \"12.5 m\"", "is above the anchor"),
        (FULL, "half_width = \"0.3 m\"\n", "", "the body has no width"),
        (FULL, "offset = \"-3 m\"", "offset = \"-0.2 m\"", "touches the fall line"),
        (FULL, "[\"0.3 m\", \"9000 N\"]", "[\"0.3 m\", \"3.9 kN\"]", "this fall takes more"),
        (FULL, "wet_cold_factor = 1.25", "wet_cold_factor = 0.9", "lowers the absorber's forces"),
        (FULL, "sag = \"0.3 m\"", "sag = \"0.1 m\"", "below 1 %"),
        (FULL, "sag = \"0.3 m\"", "pretension = \"7 kN\"", ""),
        (FULL, "capacity = \"22 kN\"\n", "", "no capacity"),
        (FULL, "onset_force = \"3.2 kN\"", "stroke = \"1 m\"", ""),
        (FULL, "strength = \"22 kN\"", "strength = \"3.1 kN\"", "before the absorber starts"),
        (FULL, "strength = \"22 kN\"", "damping = \"9 kN s/m\"\nstrength = \"22 kN\"", "above critical"),
    ];
    for (base, from, to, message) in cases {
        let text = base.replacen(from, to, 1);
        assert_ne!(&text, base, "`{from}` is not in the file");
        let found = doubt_messages(&text);
        if message.is_empty() {
            assert_eq!(found, Vec::<String>::new(), "{to}");
        } else {
            assert!(found.iter().any(|m| m.contains(message)), "{to}: {found:?}");
        }
    }
    let (before, after) = FULL.split_once("[[face]]").unwrap();
    let no_face = format!("{before}[limits]{}", after.split_once("[limits]").unwrap().1);
    assert!(doubt_messages(&no_face).iter().any(|m| m.contains("nothing says what stands beside it")));
    let still = FULL.replace("anchor_offset = \"1 m\"", "anchor_offset = \"0 m\"").replace("edge = {", "# edge = {");
    assert!(doubt_messages(&still).iter().any(|m| m.contains("no face is judged")));
    let unknown = FULL.replace(", support_stiffness = \"2000 kN/m\"", "").replace(", strength = \"40 kN\"", "");
    assert!(doubt_messages(&unknown).iter().any(|m| m.contains("neither `strength` nor `support_stiffness`")));
    let tight = FULL.replace("sag = \"0.3 m\"", "pretension = \"7 kN\"").replace("4000 kN", "300 kN");
    assert!(doubt_messages(&tight).iter().any(|m| m.contains("by more than 2 %")));
    let weak = FULL.replace(
        "[[\"0 m\", \"3 kN\"], [\"0.5 m\", \"3 kN\"], [\"1.1 m\", \"4 kN\"]]",
        "[[\"0 m\", \"0.5 kN\"], [\"1 m\", \"0.9 kN\"]]",
    );
    assert!(doubt_messages(&weak).iter().any(|m| m.contains("not above the weight")));
}

#[test]
fn every_kind_can_be_changed_into_every_other_with_its_keys() {
    let kinds = |path: &str| underfoot::scenario::field_for(path).unwrap().words;
    for text in [FULL, RETRACTABLE] {
        for path in ["line.kind", "anchor.kind"] {
            for word in kinds(path) {
                let document = Document::of_text(Path::new("f.toml"), text.to_owned()).unwrap();
                let changes = kind_changes(document.places(), path, word);
                let changed = document
                    .with_changes(&changes)
                    .unwrap_or_else(|faults| panic!("{path} = {word}:\n{}", faults.render(false)));
                assert_eq!(&changed.text()[changed.places().exactly(path).unwrap()], format!("\"{word}\""));
                for again in kinds(path) {
                    let changes = kind_changes(changed.places(), path, again);
                    changed.with_changes(&changes).unwrap_or_else(|faults| panic!("{}", faults.render(false)));
                }
            }
        }
    }
}

#[test]
fn a_change_of_kind_keeps_what_is_not_about_it() {
    let document = Document::of_text(Path::new("f.toml"), FULL.to_owned()).unwrap();
    let changed = document.with_changes(&kind_changes(document.places(), "anchor.kind", "fixed")).unwrap();
    let (before, rest) = FULL.split_once("span = {").unwrap();
    let expected = before.replace("kind = \"span\"", "kind = \"fixed\"") + rest.split_once("# wire\n").unwrap().1;
    assert_eq!(changed.text(), expected);
    let same = kind_changes(document.places(), "anchor.kind", "span");
    assert_eq!(same, [Change::Set { path: "anchor.kind".into(), value: "span".into() }]);
    let gone = [Change::Remove { path: "harness.damping".into() }];
    assert_eq!(document.with_changes(&gone).unwrap_err().faults[0].message, "there is no `harness.damping`");
}
