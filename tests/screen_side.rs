//! The screen of falls with things beside the fall line: swings and lifelines.
mod screen_support;

use screen_support::Bench;

const SWING: &str = include_str!("screen_support/swing.toml");
const SPAN: &str = include_str!("screen_support/span.toml");

fn frame(text: &str, columns: u16, rows: u16, keys: &str) -> String {
    let mut bench = Bench::of(text, columns, rows);
    bench.keys(keys);
    bench.frame()
}

#[test]
fn elevation_of_a_swing_at_140x44() {
    insta::assert_snapshot!(frame(SWING, 140, 44, "nnn"));
}

#[test]
fn elevation_of_a_swing_at_80x24() {
    insta::assert_snapshot!(frame(SWING, 80, 24, "nnn"));
}

#[test]
fn elevation_of_a_lifeline_at_140x44() {
    insta::assert_snapshot!(frame(SPAN, 140, 44, "nn"));
}

#[test]
fn elevation_of_a_lifeline_at_80x24() {
    insta::assert_snapshot!(frame(SPAN, 80, 24, "nn"));
}
