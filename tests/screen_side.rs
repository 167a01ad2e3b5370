//! The screen of falls with things beside the fall line: swings and lifelines.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail by panicking")]
mod screen_support;

use crossterm::event::KeyCode;
use screen_support::{Bench, ROOF};
use underfoot::tui::message::Message;

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

#[test]
fn history_of_a_swing_at_140x44() {
    insta::assert_snapshot!(frame(SWING, 140, 44, "2nnn"));
}

#[test]
fn history_of_a_swing_at_80x24() {
    insta::assert_snapshot!(frame(SWING, 80, 24, "2cnnn"));
}

#[test]
fn ledger_of_a_swing_at_80x24() {
    insta::assert_snapshot!(frame(SWING, 80, 24, "5"));
}

#[test]
fn ledger_of_a_lifeline_at_140x44() {
    insta::assert_snapshot!(frame(SPAN, 140, 44, "5"));
}

/// Goes on through the words of a row until one is there, typing the values that it asks for.
fn turn_to(bench: &mut Bench, path: &str, word: &str, values: &[&str]) {
    bench.choose(path);
    bench.key(KeyCode::Enter);
    for _ in 0..20 {
        bench.key(KeyCode::Backspace);
    }
    bench.keys(word);
    bench.key(KeyCode::Enter);
    for value in values {
        assert!(bench.frame().contains("needs `"), "{}", bench.frame());
        bench.keys(value);
        bench.key(KeyCode::Enter);
    }
    assert_eq!(bench.model.document.word(path).as_deref(), Some(word), "{}", bench.frame());
}

fn paths(bench: &Bench) -> Vec<String> {
    bench.model.entries.iter().map(|entry| bench.model.path_of(entry).to_owned()).collect()
}

#[test]
fn a_fixed_anchor_becomes_a_lifeline_on_the_screen_and_back() {
    let mut bench = Bench::still(ROOF, 140, 44);
    turn_to(&mut bench, "anchor.kind", "span", &["12 m", "4000 kN", "1 kN"]);
    assert!(bench.model.answer.current().is_some(), "{}", bench.frame());
    for path in ["anchor.span.length", "anchor.span.modulus"] {
        assert!(paths(&bench).iter().any(|known| known == path), "no `{path}`");
    }
    assert!(bench.frame().contains("sag"), "{}", bench.frame());
    turn_to(&mut bench, "anchor.kind", "fixed", &[]);
    assert!(paths(&bench).iter().all(|path| !path.starts_with("anchor.span")));
    assert_eq!(bench.model.document.text(), ROOF);
}

#[test]
fn a_line_becomes_retractable_and_vertical_on_the_screen() {
    for (word, values, has, has_not) in [
        ("retractable", &["0.6 m"][..], "line.lock_travel", "line.length"),
        ("vertical", &[][..], "line.length", "line.lock_travel"),
    ] {
        let mut bench = Bench::roof();
        turn_to(&mut bench, "line.kind", word, values);
        let paths = paths(&bench);
        assert!(paths.iter().any(|path| path == has), "{word}: no `{has}`");
        assert!(paths.iter().all(|path| path != has_not), "{word}: still `{has_not}`");
        let told = bench.model.answer.current().is_some() || bench.model.answer.fault.is_some();
        assert!(told, "{}", bench.frame());
        bench.keys("u");
        assert_eq!(bench.model.document.text(), ROOF, "one step of undo");
    }
}

/// Column and row of the first cell that shows a symbol within the view.
fn cell_of(bench: &Bench, symbol: char) -> (f64, f64) {
    let frame = bench.frame();
    // Below the row of tabs, which has names of its own.
    let tabs = frame.lines().position(|line| line.contains("Elev")).unwrap_or(0);
    let found = frame.lines().zip(0_u32..).skip(tabs + 1).find_map(|(line, row)| {
        let column = line.chars().zip(0_u32..).skip(45).find(|(known, _)| *known == symbol)?.1;
        Some((f64::from(column), f64::from(row)))
    });
    found.unwrap_or_else(|| panic!("no `{symbol}` in\n{frame}"))
}

#[test]
fn offsets_and_heights_of_a_swing_have_one_scale() {
    for (columns, rows) in [(140, 44), (180, 60), (240, 80)] {
        let mut bench = Bench::of(SWING, columns, rows);
        bench.key(KeyCode::End);
        let (anchor, start) = (cell_of(&bench, '╤'), cell_of(&bench, 'S'));
        let per_column = 2.0 / (anchor.0 - start.0);
        let per_row = 1.6 / (start.1 - anchor.1);
        let slack = 2.0 / (anchor.0 - start.0) + 2.0 / (start.1 - anchor.1);
        assert!((per_row / per_column / 2.0 - 1.0).abs() < slack, "{per_row} {per_column}\n{}", bench.frame());
    }
}

#[test]
fn a_strike_is_marked_with_its_symbol_its_word_and_its_time() {
    for (columns, rows) in [(80, 24), (140, 44)] {
        let frame = frame(SWING, columns, rows, "");
        for text in ["X strikes", "1.13 s", "B turns back", "T taut", "L lowest", "wall", "from the fall line"] {
            assert!(frame.contains(text), "no `{text}` in\n{frame}");
        }
    }
    let free = SWING.replace("offset = \"3 m\"", "offset = \"9 m\"");
    assert!(!frame(&free, 140, 44, "").contains("X strikes"));
}

#[test]
fn no_number_is_cut_at_any_size() {
    let number = |word: &str| word.starts_with(|c: char| c.is_ascii_digit()) && word.ends_with("..");
    for text in [SWING, SPAN] {
        let mut bench = Bench::of(text, 80, 24);
        for (columns, rows) in [(60, 20), (72, 22), (80, 24), (100, 30), (132, 40), (140, 44), (200, 60)] {
            assert!(bench.send(Message::Resize(columns, rows)).is_empty());
            for keys in ["1", "nnn", "m", "2", "c", "5"] {
                bench.keys(keys);
                let frame = bench.frame();
                assert!(frame.contains("FIRST-PASS"), "{frame}");
                let words = frame.split_whitespace().find(|word| number(word));
                assert_eq!(words, None, "{columns}x{rows} {keys}\n{frame}");
            }
        }
    }
}

#[test]
fn the_energy_account_of_the_ledger_comes_out_even() {
    let mut texts = vec![SWING.to_owned(), SPAN.to_owned()];
    let folder = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios");
    let files = std::fs::read_dir(folder).unwrap().map(|entry| entry.unwrap().path());
    let scenarios = files.filter(|path| path.extension().is_some_and(|ending| ending == "toml"));
    texts.extend(scenarios.map(|path| std::fs::read_to_string(path).unwrap()));
    assert!(texts.len() > 8);
    for text in texts {
        let mut bench = Bench::still(&text, 140, 60);
        bench.keys("5");
        let frame = bench.frame();
        let row = frame.lines().find(|line| line.contains("left over")).unwrap_or_else(|| panic!("{frame}"));
        let left = row.split("miss").nth(1).unwrap().split_whitespace().next().unwrap();
        let joules: f64 = left.parse().unwrap();
        assert!(joules.abs() < 0.01, "{frame}");
    }
}

#[test]
fn the_ledger_ends_with_the_working_and_scrolls_no_further() {
    let mut bench = Bench::of(SWING, 80, 24);
    bench.keys("5");
    for _ in 0..40 {
        bench.key(KeyCode::PageDown);
    }
    let end = bench.frame();
    let last = &bench.model.answer.current().unwrap().estimate.working.last().unwrap().what;
    assert!(end.contains(last.split(' ').next().unwrap()), "{end}");
    assert!(end.contains("above") && !end.contains("more below (page"), "{end}");
    bench.key(KeyCode::PageUp);
    assert_ne!(bench.frame(), end, "the first page up moves at once");
}

#[test]
fn the_ledger_shows_every_number_of_the_run() {
    let mut bench = Bench::of(SWING, 140, 44);
    bench.keys("5");
    let mut seen = bench.frame();
    for _ in 0..20 {
        bench.key(KeyCode::PageDown);
        seen += &bench.frame();
    }
    for number in bench.model.answer.current().unwrap().estimate.numbers.iter() {
        let label = underfoot::estimate::definition(&number.id).unwrap().label;
        assert!(seen.contains(label), "no `{label}`");
    }
    assert!(seen.contains("closest approach, wall"), "names stand with their numbers");
}

#[test]
fn no_clearance_is_shown_above_a_level_beside_the_fall_line() {
    let plumb = SWING.replace("anchor_offset = \"2 m\"\n", "");
    let beside = frame(&plumb, 140, 44, "");
    assert!(beside.contains("down to the lowest point") && !beside.contains("down to canopy"), "{beside}");
    let below = frame(&plumb.replace("from = \"1 m\"", "from = \"-1 m\""), 140, 44, "");
    assert!(below.contains("down to canopy"), "{below}");
}
