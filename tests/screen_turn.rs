//! Words that decide which other keys apply: a change names what it takes out and asks for what it needs.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail by panicking")]
mod screen_support;

use screen_support::{LOAD, ROOF};
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
