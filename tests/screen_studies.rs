//! Frames of the views of studies, at the two sizes that must read well.
mod screen_support;

use screen_support::{Bench, ROOF};

/// Three bands about a fall that holds at the typical values and not at the worst.
const BANDS: &str = "tests/screen_support/bands.toml";

fn bands(columns: u16, rows: u16) -> Bench {
    let path = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join(BANDS);
    Bench::of(&std::fs::read_to_string(path).unwrap_or_default(), columns, rows)
}

fn show(columns: u16, rows: u16, keys: &str) -> String {
    let mut bench = bands(columns, rows);
    bench.choose("line.length");
    bench.keys(keys);
    bench.frame()
}

#[test]
fn vary_at_140x44() {
    insta::assert_snapshot!(show(140, 44, "6"));
}

#[test]
fn vary_at_80x24() {
    insta::assert_snapshot!(show(80, 24, "6"));
}

#[test]
fn map_at_140x44() {
    insta::assert_snapshot!(show(140, 44, "7"));
}

#[test]
fn map_at_80x24() {
    insta::assert_snapshot!(show(80, 24, "7"));
}

#[test]
fn spread_at_140x44() {
    insta::assert_snapshot!(show(140, 44, "8"));
}

#[test]
fn spread_at_80x24() {
    insta::assert_snapshot!(show(80, 24, "8"));
}

fn remedies(columns: u16, rows: u16) -> String {
    let mut bench = Bench::of(ROOF, columns, rows);
    bench.keys("9");
    bench.frame()
}

#[test]
fn remedies_at_140x44() {
    insta::assert_snapshot!(remedies(140, 44));
}

#[test]
fn remedies_at_80x24() {
    insta::assert_snapshot!(remedies(80, 24));
}

#[test]
fn compare_at_140x44() {
    insta::assert_snapshot!(show(140, 44, "k++++0"));
}

#[test]
fn compare_at_80x24() {
    insta::assert_snapshot!(show(80, 24, "k++++0"));
}
