//! Frames of the screen as text, at the two sizes that must read well and at those that must still work.
mod screen_support;

use crossterm::event::KeyCode;
use screen_support::{Bench, LOAD, ROOF};

/// The moment after the absorber has started, with one input changed.
fn at(columns: u16, rows: u16, keys: &str) -> String {
    let mut bench = Bench::of(ROOF, columns, rows);
    bench.choose("line.length");
    bench.key(KeyCode::Right);
    bench.keys(keys);
    bench.frame()
}

#[test]
fn elevation_at_140x44() {
    insta::assert_snapshot!(at(140, 44, "nn"));
}

#[test]
fn history_at_140x44() {
    insta::assert_snapshot!(at(140, 44, "2nn"));
}

#[test]
fn elevation_at_80x24() {
    insta::assert_snapshot!(at(80, 24, "nn"));
}

#[test]
fn history_at_80x24() {
    insta::assert_snapshot!(at(80, 24, "2nn"));
}

#[test]
fn margins_at_80x24() {
    insta::assert_snapshot!(at(80, 24, "3"));
}

#[test]
fn us_units_at_140x44() {
    insta::assert_snapshot!(at(140, 44, "m"));
}

#[test]
fn help_at_80x24() {
    insta::assert_snapshot!(at(80, 24, "?"));
}

#[test]
fn typing_at_80x24() {
    let mut bench = Bench::of(ROOF, 80, 24);
    bench.choose("line.length");
    bench.key(KeyCode::Enter);
    bench.key(KeyCode::Backspace);
    insta::assert_snapshot!(bench.frame());
}

#[test]
fn a_load_without_elevations_at_140x44() {
    insta::assert_snapshot!(Bench::of(LOAD, 140, 44).frame());
}

#[test]
fn smallest_at_60x20() {
    insta::assert_snapshot!(at(60, 20, ""));
}

#[test]
fn too_small_says_what_is_missing() {
    let frame = at(59, 19, "");
    assert!(frame.contains("60x20") && frame.contains("59x19"), "{frame}");
}
