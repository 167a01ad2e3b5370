//! Doubts: each has an id and is raised by the statement it is about; a file accepts them one by one, with a reason.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
use std::collections::BTreeSet;
use std::path::Path;
use underfoot::estimate::estimate;
use underfoot::margin::{self, margins};
use underfoot::scenario::{DOUBT_RULES, Document, Review, doubt_rule, doubts, nearest_doubt, read, review};

/// A file without a doubt; cases change it.
const SOUND: &str = r#"datum = "yard"
[subject]
kind = "person"
mass = "80..100..120 kg"
attachment_above_feet = "1.5 m"
stretch_allowance = "0.3 m"
[place]
standing = "10 m"
anchor = "12 m"
[line]
kind = "lanyard"
length = "1.8 m"
stiffness = "60 kN/m"
damping_ratio = 0.08
strength = "22 kN"
[absorber]
deploy_force = "4 kN"
stroke = "1.1 m"
rated_mass = "140 kg"
rated_free_fall = "4 m"
[anchor]
capacity = "15 kN"
[[obstacle]]
name = "yard"
top = "0 m"
reserve = "1 m"
[limits]
basis = "eu-363"
"#;

fn shipped(name: &str) -> String {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios").join(name);
    std::fs::read_to_string(path).unwrap()
}

/// The review of a judged file.
fn reviewed(text: &str) -> Review {
    let scenario = read("t", text).unwrap_or_else(|faults| panic!("{}\n{text}", faults.render(false)));
    let judged = estimate(&scenario).ok().map(|run| {
        let list = margins(&scenario, &run).unwrap();
        margin::doubts(&scenario, &list).unwrap()
    });
    review("t", text, &scenario, Some(judged.unwrap_or_default()))
}

fn open(review: &Review) -> Vec<(&'static str, &str)> {
    review.open_doubts().map(|doubt| (doubt.id, doubt.path.as_str())).collect()
}

/// Where it is changed, what stands there, what is put there, and the doubt with its path.
type Case = (&'static str, &'static str, &'static str, &'static str, &'static str);

const FACES: &str = "swing-clears-tower.toml";
const SPAN: &str = "lifeline-with-sag.toml";
const RETRACTABLE: &str = "retractable-overhead.toml";
const EDGE: &str = "canopy-edge.toml";
const SPRUNG: &str = "harness-and-post.toml";
const GRAB: &str = "vertical-line-grab.toml";
const TABLE: &str = "rope-by-table.toml";
const ROPE: &str = "low-stretch-rope.toml";
const FROZEN: &str = "frozen-absorber.toml";

const CASES: &[Case] = &[
    ("", "80..100..120 kg", "80..100..210 kg", "mass-above-usual", "subject.mass"),
    ("", "80..100..120 kg", "35 kg", "mass-below-usual", "subject.mass"),
    ("", "feet = \"1.5 m\"", "feet = \"11.5 m\"", "attachment-high", "subject.attachment_above_feet"),
    ("", "feet = \"1.5 m\"", "feet = \"15 cm\"", "attachment-low", "subject.attachment_above_feet"),
    ("", "stretch_allowance = \"0.3 m\"", "body_factor = 1.2", "body-factor-above-one", "subject.body_factor"),
    ("", "stretch_allowance = \"0.3 m\"", "stretch_allowance = \"0 m\"", "allowance-missing", "subject"),
    ("", "\"0.3 m\"", "\"0.3 ft\"\nhalf_width = \"1..2..9 ft\"", "band-wide", "subject.half_width"),
    ("", "\"0.3 m\"", "\"1.3 m\"", "allowance-large", "subject.stretch_allowance"),
    ("", "datum = \"yard\"\n", "datum = \"yard\"\ngravity = \"1.62 m/s2\"\n", "gravity-unusual", "gravity"),
    ("", "damping_ratio = 0.08", "damping_ratio = 1.5", "line-overdamped", "line.damping_ratio"),
    ("", "anchor = \"12 m\"", "anchor = \"9.8 m\"", "anchor-below-feet", "place.anchor"),
    ("", "length = \"1.8 m\"", "length = \"1.8 mm\"", "line-short", "line.length"),
    ("", "length = \"1.8 m\"", "length = \"18 m\"", "lanyard-long", "line.length"),
    ("", "\"60 kN/m\"", "\"60 N/m\"", "line-soft", "line.stiffness"),
    ("", "\"60 kN/m\"", "\"6e7 kN/m\"", "line-stiff", "line.stiffness"),
    ("", "\"22 kN\"", "\"22 kN\"\nmass_per_length = \"7 kg/m\"", "line-heavy", "line.mass_per_length"),
    ("", "strength = \"22 kN\"\n", "", "strength-missing", "line"),
    ("", "strength = \"22 kN\"", "strength = \"2.2 kN\"", "strength-below-onset", "line.strength"),
    ("", "\"4 kN\"", "\"0.9 kN\"", "absorber-below-weight", "absorber.deploy_force"),
    ("", "\"4 kN\"", "\"40 kN\"", "absorber-force-high", "absorber.deploy_force"),
    ("", "stroke = \"1.1 m\"", "stroke = \"11 m\"", "stroke-long", "absorber.stroke"),
    ("", "stroke", "onset_force = \"9 kN\"\nstroke", "onset-high", "absorber.onset_force"),
    ("", "rated_mass = \"140 kg\"\n", "", "rated-mass-missing", "absorber"),
    ("", "rated_free_fall = \"4 m\"\n", "", "rated-free-fall-missing", "absorber"),
    (
        "",
        "[anchor]",
        "[harness]\nstiffness = \"80 kN/m\"\n[anchor]",
        "harness-counted-twice",
        "subject.stretch_allowance",
    ),
    ("", "[anchor]", "[harness]\nstiffness = \"80 N/m\"\n[anchor]", "harness-soft", "harness.stiffness"),
    ("", "datum = \"yard\"\n", "", "datum-missing", "place.standing"),
    ("", "top = \"0 m\"", "top = \"10.5 m\"", "obstacle-above-start", "obstacle.1.top"),
    ("", "reserve = \"1 m\"\n", "", "reserve-missing", "obstacle.1"),
    ("", "reserve = \"1 m\"", "reserve = \"0 m\"", "reserve-none", "obstacle.1.reserve"),
    ("", "[limits]\nbasis = \"eu-363\"\n", "", "limits-missing", "limits"),
    ("", "basis = \"eu-363\"", "arrest_force = \"6 kN\"", "basis-missing", "limits"),
    ("", "basis = \"eu-363\"", "basis = \"own\"", "own-limits-missing", "limits.basis"),
    ("", "basis = \"eu-363\"", "basis = \"own\"\narrest_force = \"60 kN\"", "arrest-limit-high", "limits.arrest_force"),
    (
        "",
        "basis = \"eu-363\"",
        "basis = \"eu-363\"\narrest_force = { value = \"7 kN\", why = \"x\" }",
        "limit-loosened",
        "limits.arrest_force",
    ),
    ("", "capacity = \"15 kN\"\n", "", "capacity-missing", "anchor"),
    ("", "80..100..120 kg", "100..100..120 kg", "band-one-sided", "subject.mass"),
    ("", "[limits]", "[study]\nsamples = 100\n[limits]", "samples-few", "study.samples"),
    ("", "[limits]", "[[accept]]\ndoubt = \"line-soft\"\nwhy = \"x\"\n[limits]", "acceptance-unused", "accept.1"),
    (SPRUNG, "\"300 kN/m\"", "\"300 N/m\"", "anchor-soft", "anchor.stiffness"),
    (ROPE, "free_fall = \"0.9 m\"", "free_fall = \"9 m\"", "fall-above-twice-length", "fall.free_fall"),
    (ROPE, "free_fall = \"0.9 m\"", "free_fall = \"0 m\"", "free-fall-none", "fall.free_fall"),
    (ROPE, "attachment_above_feet = \"1.1 m\"", "", "attachment-height-missing", "subject"),
    (ROPE, "standing = \"21.0 m\"", "", "obstacle-without-standing", "obstacle.1"),
    (ROPE, "percent = 3.4", "percent = 0.034", "elongation-tiny", "line.static_elongation.percent"),
    (
        ROPE,
        "static_elongation = { percent = 3.4, from = \"50 kg\", to = \"150 kg\" }",
        "rated_impact = { force = \"9 kN\", mass = \"80 kg\", fall_factor = 2.5 }",
        "rated-drop-above-two",
        "line.rated_impact.fall_factor",
    ),
    (
        TABLE,
        "[\"0.3 m\", \"2.4 kN\"],\n    [\"0.6 m\", \"6.6 kN\"],\n    [\"0.8 m\", \"10.4 kN\"],",
        "[\"0.2 m\", \"1.4 kN\"],",
        "curve-ends-low",
        "line.curve",
    ),
    (FROZEN, "wet_cold_factor = 1.3", "wet_cold_factor = 0.9", "wet-factor-below-one", "absorber.wet_cold_factor"),
    (FROZEN, "kN\"]", "N\"]", "absorber-table-below-weight", "absorber.force_table"),
    (RETRACTABLE, "lock_travel = \"0.5 m\"", "lock_travel = \"1.5 m\"", "lock-travel-long", "line.lock_travel"),
    (RETRACTABLE, "anchor = \"8.9 m\"", "anchor = \"7 m\"", "retractable-below-attachment", "place.anchor"),
    (
        RETRACTABLE,
        "anchor = \"8.9 m\"",
        "anchor = \"8.9 m\"\nanchor_offset = \"1 m\"\nedge = { offset = \"0.5 m\", elevation = \"8 m\", strength_factor = 2 }",
        "retractable-over-edge",
        "place.edge",
    ),
    (GRAB, "grab_slide = \"0.25 m\"", "", "grab-slide-missing", "line"),
    (EDGE, "strength_factor = 2", "", "edge-strength-missing", "place.edge"),
    (EDGE, "elevation = \"8 m\"", "elevation = \"8.8 m\"", "edge-above-anchor", "place.edge.elevation"),
    (FACES, "half_width = \"0.25 m\"", "", "half-width-missing", "subject"),
    (FACES, "offset = \"3.4 m\"", "offset = \"0.2 m\"", "face-in-reach", "face.1.offset"),
    (FACES, "anchor_offset = \"1.2 m\"", "", "face-not-reached", "face.1"),
    (SPAN, "sag = \"0.3 m\"", "sag = \"0.03 m\"", "span-tight", "anchor.span.sag"),
    (SPAN, "capacity = \"60 kN\"", "", "span-capacity-missing", "anchor"),
];

#[test]
fn every_doubt_of_the_table_is_raised_by_a_statement_and_at_its_place() {
    let mut raised = BTreeSet::new();
    for (base, from, to, id, path) in CASES {
        let base = if base.is_empty() { SOUND.to_owned() } else { shipped(base) };
        let times = if *id == "absorber-table-below-weight" { 9 } else { 1 };
        let text = base.replacen(from, to, times);
        assert_ne!(text, base, "`{from}` is not in the file");
        let before = open(&reviewed(&base)).contains(&(id, path));
        assert!(!before, "{id} is raised without its statement");
        let review = reviewed(&text);
        assert!(open(&review).contains(&(id, path)), "{id} at {path}: {:?}", open(&review));
        raised.insert(*id);
    }
    for (text, ids) in whole_files() {
        let review = reviewed(&text);
        for id in ids {
            assert!(open(&review).iter().any(|(found, _)| *found == id), "{id}: {:?}\n{text}", open(&review));
            raised.insert(id);
        }
    }
    let table: BTreeSet<&str> = DOUBT_RULES.iter().map(|rule| rule.id).collect();
    assert_eq!(raised, table);
}

/// Doubts that need more than one change.
fn whole_files() -> Vec<(String, Vec<&'static str>)> {
    let load = "[subject]\nkind = \"load\"\nmass = \"50 kg\"\n[fall]\nfree_fall = \"0 m\"\n[line]\nkind = \"cable\"\n\
                stiffness = \"9 kN/m\"\n[harness]\nstiffness = \"9 kN/m\"";
    let swing = shipped(FACES);
    let face = swing.find("[[face]]").unwrap()..swing.find("[limits]").unwrap();
    let mut no_face = swing.clone();
    no_face.replace_range(face, "");
    let span = shipped(SPAN).replace("support_stiffness = \"1500 kN/m\"", "");
    let cable = span.rfind("strength = \"60 kN\"").unwrap();
    let mut no_strength = span.clone();
    no_strength.replace_range(cable..cable + "strength = \"60 kN\"".len(), "");
    let memory = margin::limit_sets()
        .iter()
        .find(|set| {
            let text = SOUND.replace("eu-363", set.name);
            open(&reviewed(&text)).iter().any(|(id, _)| *id == "limit-from-memory")
        })
        .map(|set| SOUND.replace("eu-363", set.name));
    let mut files = vec![
        (load.to_owned(), vec!["harness-on-load", "obstacle-missing"]),
        (no_face, vec!["face-missing"]),
        (no_strength, vec!["span-strength-missing"]),
    ];
    files.extend(memory.map(|text| (text, vec!["limit-from-memory"])));
    files
}

#[test]
fn a_sound_file_has_none_and_ids_and_words_follow_the_house_rules() {
    assert_eq!(open(&reviewed(SOUND)), []);
    let ids: BTreeSet<&str> = DOUBT_RULES.iter().map(|rule| rule.id).collect();
    assert_eq!(ids.len(), DOUBT_RULES.len());
    for rule in DOUBT_RULES {
        assert!(rule.id.bytes().all(|b| b.is_ascii_lowercase() || b == b'-'), "{}", rule.id);
        assert!(rule.about.starts_with(char::is_lowercase) && !rule.about.ends_with('.'), "{}", rule.about);
        assert!(rule.why.starts_with(char::is_uppercase) && rule.why.ends_with('.'), "{}", rule.why);
        assert_eq!(doubt_rule(rule.id), Some(rule));
    }
    assert_eq!(nearest_doubt("reserve-mising"), Some("reserve-missing"));
    assert_eq!(nearest_doubt("xyz"), None);
}

fn accepting(text: &str, entry: &str) -> String {
    format!("{text}[[accept]]\n{entry}\n")
}

#[test]
fn an_accepted_doubt_stays_listed_with_its_reason_and_covers_no_other_place() {
    let two = SOUND.replace("reserve = \"1 m\"\n", "") + "[[obstacle]]\nname = \"ledge\"\ntop = \"1 m\"\n";
    assert_eq!(open(&reviewed(&two)), [("reserve-missing", "obstacle.1"), ("reserve-missing", "obstacle.2")]);
    let one = accepting(&two, "doubt = \"reserve-missing\"\nat = \"obstacle.2\"\nwhy = \"the ledge is netted\"");
    let review = reviewed(&one);
    assert_eq!(open(&review), [("reserve-missing", "obstacle.1")]);
    let accepted: Vec<_> = review.accepted().map(|(doubt, why)| (doubt.id, doubt.path.as_str(), why)).collect();
    assert_eq!(accepted, [("reserve-missing", "obstacle.2", "the ledge is netted")]);
    assert_eq!(review.rows().len(), 2);
    assert!(!review.render(false).contains("obstacle 2") && review.render(false).contains("doubt[reserve-missing]"));
    // A section covers what lies in it, no place covers all, a name that only begins alike covers nothing.
    let section = accepting(&two, "doubt = \"reserve-missing\"\nat = \"obstacle\"\nwhy = \"x\"");
    assert_eq!(open(&reviewed(&section)), []);
    assert_eq!(open(&reviewed(&accepting(&two, "doubt = \"reserve-missing\"\nwhy = \"x\""))), []);
    let twelfth = accepting(&two, "doubt = \"reserve-missing\"\nat = \"obstacle.12\"\nwhy = \"x\"");
    assert!(open(&reviewed(&twelfth)).contains(&("acceptance-unused", "accept.1")));
    assert_eq!(doubts("t", &one, &read("t", &one).unwrap()).faults.len(), 1);
}

#[test]
fn an_acceptance_of_what_is_not_raised_is_a_doubt_itself() {
    let put_right = accepting(SOUND, "doubt = \"reserve-missing\"\nwhy = \"x\"");
    assert_eq!(open(&reviewed(&put_right)), [("acceptance-unused", "accept.1")]);
    // The second entry for the same doubt accepts nothing more.
    let missing = SOUND.replace("reserve = \"1 m\"\n", "");
    let twice = accepting(
        &accepting(&missing, "doubt = \"reserve-missing\"\nwhy = \"x\""),
        "doubt = \"reserve-missing\"\nwhy = \"y\"",
    );
    assert_eq!(open(&reviewed(&twice)), [("acceptance-unused", "accept.2")]);
    // Without a judged run nobody knows whether a limit is from memory.
    let memory = accepting(SOUND, "doubt = \"limit-from-memory\"\nwhy = \"x\"");
    assert_eq!(doubts("t", &memory, &read("t", &memory).unwrap()).faults, []);
    assert_eq!(open(&reviewed(&memory)), [("acceptance-unused", "accept.1")]);
}

#[test]
fn the_reason_of_an_acceptance_is_edited_like_any_key_and_comments_stay() {
    let text = accepting(SOUND, "doubt = \"reserve-missing\" # looked at\nwhy = \"netted\" # by me");
    let document = Document::of_text(Path::new("t.toml"), text.clone()).unwrap();
    let edited = document.with_value("accept.1.why", "netted, plan 4").unwrap();
    assert_eq!(edited.text(), text.replace("\"netted\"", "\"netted, plan 4\""));
    assert_eq!(edited.scenario().accepted[0].why, "netted, plan 4");
    let placed = document.with_value("accept.1.at", "obstacle.1").unwrap();
    assert!(placed.text().contains("at = \"obstacle.1\"") && placed.text().contains("# by me"), "{}", placed.text());
    assert!(document.with_value("accept.1.why", " ").unwrap_err().faults[0].message.contains("without a reason"));
    assert!(document.with_value("accept.1.doubt", "reserve-mising").is_err());
}

#[test]
fn more_than_two_hundred_acceptances_are_refused_and_take_no_room_from_obstacles() {
    let entry = "[[accept]]\ndoubt = \"reserve-missing\"\nwhy = \"x\"\n";
    let many = SOUND.to_owned() + &entry.repeat(200);
    assert_eq!(read("t", &many).unwrap().accepted.len(), 200);
    let obstacle = |n: usize| format!("[[obstacle]]\nname = \"o{n}\"\ntop = \"0 m\"\nreserve = \"1 m\"\n");
    let obstacles = |n: usize| (0..n).map(obstacle).collect::<Vec<_>>().concat();
    assert_eq!(read("t", &(many.clone() + &obstacles(199))).unwrap().obstacles.len(), 200);
    let faults = read("t", &(many + entry)).unwrap_err();
    assert_eq!(faults.faults[0].message, "more than 200 accepted doubts");
}
