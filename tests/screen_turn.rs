//! Words that decide which other keys apply: a change names what it takes out and asks for what it needs.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail by panicking")]
mod screen_support;

use crossterm::event::{KeyCode, KeyModifiers};
use screen_support::{Bench, LOAD, ROOF};
use std::path::Path;
use underfoot::scenario::{AnchorKind, Document, SubjectKind, Turn};

fn document(text: &str) -> Document {
    Document::of_text(Path::new("roof.toml"), text.to_owned()).unwrap()
}

fn done(turn: Turn) -> (Document, Vec<String>) {
    match turn {
        Turn::Done { document, taken_out } => (*document, taken_out),
        Turn::Needs(path) => panic!("asked for `{path}`"),
    }
}

#[test]
fn a_word_that_needs_a_key_asks_for_it_and_makes_nothing_up() {
    let roof = document(ROOF);
    match roof.turned(&[("anchor.kind", "sprung")]).unwrap() {
        Turn::Needs(path) => assert_eq!(path, "anchor.stiffness"),
        Turn::Done { document, .. } => panic!("made up\n{}", document.text()),
    }
}

#[test]
fn a_word_with_what_it_needs_changes_nothing_else() {
    let roof = document(ROOF);
    let (sprung, taken_out) =
        done(roof.turned(&[("anchor.kind", "sprung"), ("anchor.stiffness", "500 kN/m")]).unwrap());
    assert!(taken_out.is_empty() && sprung.is_edited());
    let expected = ROOF.replace(
        "kind = \"fixed\"\ncapacity = \"12 kN\"\n",
        "kind = \"sprung\"\ncapacity = \"12 kN\"\nstiffness = \"500 kN/m\"\n",
    );
    assert_eq!(sprung.text(), expected);
    assert!(matches!(sprung.scenario().anchor.kind, AnchorKind::Sprung(_)));
}

#[test]
fn what_does_not_belong_to_the_new_word_is_taken_out_and_named() {
    let roof = document(ROOF);
    let (sprung, _) = done(roof.turned(&[("anchor.kind", "sprung"), ("anchor.stiffness", "500 kN/m")]).unwrap());
    let (fixed, taken_out) = done(sprung.turned(&[("anchor.kind", "fixed")]).unwrap());
    assert_eq!(taken_out, ["anchor.stiffness"]);
    assert_eq!(fixed.text(), ROOF);
    let changes = [("subject.kind", "load"), ("subject.underside_below_attachment", "0.5 m")];
    let (load, taken_out) = done(roof.turned(&changes).unwrap());
    assert_eq!(taken_out, ["subject.attachment_above_feet", "subject.stretch_allowance"]);
    assert_eq!(load.scenario().subject.kind, SubjectKind::Load);
    assert!(load.text().contains("# with tools and clothing"), "{}", load.text());
}

#[test]
fn a_word_nobody_knows_is_refused_with_those_that_are_known() {
    let faults = document(ROOF).turned(&[("anchor.kind", "wobbly")]).unwrap_err();
    assert!(faults.render(false).contains("known: `fixed`"), "{}", faults.render(false));
    assert!(document(LOAD).turned(&[("nothing.kind", "fixed")]).is_err());
}

#[test]
fn the_word_at_a_path_is_read_as_written() {
    assert_eq!(document(ROOF).word("limits.basis").as_deref(), Some("eu-363"));
    assert_eq!(document(LOAD).word("anchor.kind"), None);
    assert_eq!(document(&ROOF.replace("\"fixed\"", "'fixed'")).word("anchor.kind").as_deref(), Some("fixed"));
}

#[test]
fn the_kinds_and_the_set_of_limits_stand_among_the_inputs() {
    let bench = Bench::roof();
    let paths: Vec<&str> = bench.model.entries.iter().map(|entry| bench.model.path_of(entry)).collect();
    let at = |path: &str| paths.iter().position(|known| *known == path).unwrap_or_else(|| panic!("no `{path}`"));
    assert_eq!(at("subject.kind") + 1, at("subject.mass"));
    assert_eq!(at("line.kind") + 1, at("line.length"));
    assert_eq!(at("anchor.kind") + 1, at("anchor.capacity"));
    assert!(at("limits.basis") > at("obstacle.1.reserve") && at("limits.basis") < at("gravity"));
    assert_eq!(bench.model.chosen_path(), Some("subject.mass"), "a first nudge must not change what falls");
    let frame = bench.frame();
    for word in ["person", "lanyard", "fixed", "eu-363"] {
        assert!(frame.contains(word), "{word}\n{frame}");
    }
}

#[test]
fn left_and_right_go_through_the_words() {
    let mut bench = Bench::roof();
    bench.choose("line.kind");
    assert!(bench.frame().contains("of lanyard, rope"), "{}", bench.frame());
    bench.key(KeyCode::Right);
    assert_eq!(bench.model.document.text(), ROOF.replace("\"lanyard\"", "\"rope\""));
    assert_eq!(bench.model.chosen_path(), Some("line.kind"));
    bench.key(KeyCode::Left);
    assert_eq!(bench.model.document.text(), ROOF);
    bench.choose("limits.basis");
    bench.key(KeyCode::Left);
    let before = bench.model.document.word("limits.basis");
    assert_ne!(before.as_deref(), Some("eu-363"));
    bench.keys("f");
    assert_eq!(bench.model.document.text(), ROOF);
}

#[test]
fn a_kind_that_needs_a_value_asks_for_it_on_the_screen() {
    let mut bench = Bench::roof();
    bench.choose("anchor.kind");
    bench.key(KeyCode::Right);
    let frame = bench.frame();
    assert!(
        frame.contains("`sprung` needs `anchor.stiffness`") && frame.contains("esc leaves all as it was"),
        "{frame}"
    );
    assert_eq!(bench.model.document.text(), ROOF, "nothing changes before the value is there");
    bench.key(KeyCode::Esc);
    assert_eq!(bench.model.document.text(), ROOF);
    bench.key(KeyCode::Right);
    bench.keys("500");
    bench.key(KeyCode::Enter);
    assert_eq!(bench.model.document.text(), ROOF, "a number without a unit is not taken");
    bench.keys(" kN/m");
    bench.key(KeyCode::Enter);
    assert!((bench.value("anchor.stiffness") - 500e3).abs() < 1e-6);
    assert!(bench.model.answer.current().is_some());
    bench.keys("u");
    assert_eq!(bench.model.document.text(), ROOF, "one step of undo takes the kind and its value back");
}

#[test]
fn a_kind_that_drops_a_value_says_so_and_undo_brings_it_back() {
    let mut bench = Bench::of(LOAD, 140, 44);
    bench.choose("subject.kind");
    bench.key(KeyCode::Left);
    assert_eq!(bench.model.document.word("subject.kind").as_deref(), Some("person"));
    assert!(bench.frame().contains("took out `subject.underside_below_attachment`"), "{}", bench.frame());
    bench.keys("u");
    assert_eq!(bench.model.document.text(), LOAD);
    bench.key(KeyCode::Left);
    bench.keys("f");
    assert_eq!(bench.model.document.word("subject.kind").as_deref(), Some("load"));
    let kept = bench.value("subject.underside_below_attachment");
    assert!((kept - 0.8).abs() < 1e-12, "the file's word comes with the file's value");
}

#[test]
fn a_word_can_be_typed_and_a_wrong_one_is_refused_in_place() {
    let mut bench = Bench::roof();
    bench.choose("line.kind");
    bench.key(KeyCode::Enter);
    bench.with(KeyCode::Char('u'), KeyModifiers::CONTROL);
    bench.keys("wabbing");
    bench.key(KeyCode::Enter);
    assert!(bench.frame().contains("did you mean `webbing`"), "{}", bench.frame());
    assert_eq!(bench.model.document.text(), ROOF);
    bench.with(KeyCode::Char('u'), KeyModifiers::CONTROL);
    bench.keys("webbing");
    bench.key(KeyCode::Enter);
    assert_eq!(bench.model.document.word("line.kind").as_deref(), Some("webbing"));
}

#[test]
fn a_value_goes_back_to_the_files_own_while_a_changed_word_stays() {
    let mut bench = Bench::roof();
    bench.choose("line.kind");
    bench.key(KeyCode::Right);
    bench.choose("line.length");
    bench.key(KeyCode::Right);
    bench.keys("f");
    assert_eq!(bench.model.document.text(), ROOF.replace("\"lanyard\"", "\"rope\""));
}
