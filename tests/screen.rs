//! The screen as a model that takes keys: (model, keys, model).
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail by panicking")]
mod screen_support;

use crossterm::event::{KeyCode, KeyEvent, KeyEventKind, KeyModifiers, MouseButton, MouseEventKind};
use screen_support::{Bench, LOAD, ROOF};
use std::time::Duration;
use underfoot::quantity::UnitSystem;
use underfoot::scenario::Document;
use underfoot::tui::command::Command;
use underfoot::tui::layout::Panes;
use underfoot::tui::lean::Lean;
use underfoot::tui::message::{Effect, Message};
use underfoot::tui::model::Model;
use underfoot::tui::model::{Exit, Mode, Pane, View, Window};
use underfoot::tui::update::update;
use underfoot::tui::worker::Job;

fn saved_to_disk(bench: &mut Bench, effects: Vec<Effect>) {
    let Some(Effect::Save(mut document)) = effects.into_iter().next() else { panic!("no save") };
    let result = document.save().map(|()| document).map_err(|error| error.to_string());
    assert!(bench.send(Message::Saved(result)).is_empty());
}

#[test]
fn a_nudge_moves_the_value_by_one_step_and_the_numbers_with_it() {
    let mut bench = Bench::roof();
    bench.choose("line.length");
    let before = bench.number("free_fall_distance");
    bench.key(KeyCode::Right);
    assert!((bench.value("line.length") - 1.81).abs() < 1e-12);
    assert!((bench.number("free_fall_distance") - before - 0.01).abs() < 1e-9);
    assert!(bench.model.is_edited());
}

#[test]
fn shift_nudges_by_ten_steps() {
    let mut bench = Bench::roof();
    bench.choose("line.length");
    bench.with(KeyCode::Left, KeyModifiers::SHIFT);
    assert!((bench.value("line.length") - 1.7).abs() < 1e-12);
}

#[test]
fn a_nudge_of_a_band_moves_typical_and_keeps_the_ends() {
    let mut bench = Bench::roof();
    bench.choose("subject.mass");
    bench.key(KeyCode::Right);
    let input = bench.model.chosen().unwrap();
    assert_eq!((input.measure.band.low, input.measure.band.typical, input.measure.band.high), (80.0, 101.0, 120.0));
}

#[test]
fn undo_and_redo_walk_the_same_states() {
    let mut bench = Bench::roof();
    bench.choose("line.length");
    let mut texts = vec![bench.model.document.text().to_owned()];
    for _ in 0..3 {
        bench.key(KeyCode::Right);
        texts.push(bench.model.document.text().to_owned());
    }
    for text in texts.iter().rev().skip(1) {
        bench.keys("u");
        assert_eq!(bench.model.document.text(), text);
    }
    assert!(!bench.model.is_edited());
    for text in texts.iter().skip(1) {
        bench.keys("y");
        assert_eq!(bench.model.document.text(), text);
    }
}

#[test]
fn a_new_change_ends_what_redo_could_bring_back() {
    let mut bench = Bench::roof();
    bench.choose("line.length");
    bench.key(KeyCode::Right);
    bench.keys("u");
    bench.key(KeyCode::Left);
    let text = bench.model.document.text().to_owned();
    bench.keys("y");
    assert_eq!(bench.model.document.text(), text);
    assert_eq!(bench.model.notice.as_ref().unwrap().words, "nothing to redo");
}

#[test]
fn typing_takes_a_value_with_another_unit() {
    let mut bench = Bench::roof();
    bench.choose("line.length");
    bench.key(KeyCode::Enter);
    bench.with(KeyCode::Char('u'), KeyModifiers::CONTROL);
    bench.keys("6 ft 6 in");
    bench.key(KeyCode::Enter);
    assert!(matches!(bench.model.mode, Mode::Commands));
    assert!((bench.value("line.length") - 1.9812).abs() < 1e-12);
    assert!(bench.model.document.text().contains("length = \"6 ft 6 in\""), "{}", bench.model.document.text());
}

#[test]
fn a_fault_in_a_typed_value_is_shown_in_place_and_changes_nothing() {
    let mut bench = Bench::roof();
    bench.choose("line.length");
    let before = bench.model.document.text().to_owned();
    bench.key(KeyCode::Enter);
    bench.with(KeyCode::Char('u'), KeyModifiers::CONTROL);
    bench.keys("1.9 kg");
    bench.key(KeyCode::Enter);
    let Mode::Typing(typing) = &bench.model.mode else { panic!("no longer typing") };
    assert!(typing.fault.as_ref().unwrap().contains("kg"), "{:?}", typing.fault);
    assert_eq!(bench.model.document.text(), before);
    bench.key(KeyCode::Esc);
    assert!(matches!(bench.model.mode, Mode::Commands));
    assert_eq!(bench.model.document.text(), before);
}

#[test]
fn a_typed_value_outside_the_physical_range_is_refused_in_place() {
    let mut bench = Bench::roof();
    bench.choose("subject.mass");
    bench.key(KeyCode::Enter);
    bench.with(KeyCode::Char('u'), KeyModifiers::CONTROL);
    bench.keys("-3 kg");
    bench.key(KeyCode::Enter);
    let Mode::Typing(typing) = &bench.model.mode else { panic!("taken") };
    assert!(typing.fault.is_some());
}

#[test]
fn letters_typed_into_a_value_are_no_commands() {
    let mut bench = Bench::roof();
    bench.key(KeyCode::Enter);
    bench.keys("qsu");
    let Mode::Typing(typing) = &bench.model.mode else { panic!("left typing") };
    assert!(typing.text.value().ends_with("qsu"));
}

#[test]
fn the_files_value_comes_back_alone_and_word_for_word() {
    let mut bench = Bench::roof();
    bench.choose("line.length");
    bench.key(KeyCode::Right);
    bench.choose("subject.mass");
    bench.key(KeyCode::Left);
    bench.choose("line.length");
    bench.keys("f");
    assert!((bench.value("line.length") - 1.8).abs() < 1e-12);
    assert!((bench.value("subject.mass") - 99.0).abs() < 1e-12);
    bench.choose("subject.mass");
    bench.keys("f");
    assert_eq!(bench.model.document.text(), ROOF);
    bench.keys("u");
    assert!((bench.value("subject.mass") - 99.0).abs() < 1e-12);
}

#[test]
fn inputs_that_cannot_be_computed_leave_no_number_that_passes_for_current() {
    let mut bench = Bench::roof();
    bench.choose("place.anchor");
    bench.key(KeyCode::Enter);
    bench.with(KeyCode::Char('u'), KeyModifiers::CONTROL);
    bench.keys("40 m");
    bench.key(KeyCode::Enter);
    assert!(bench.model.answer.is_stale(), "a line of 1.8 m does not reach an anchor 26.5 m above");
    assert!(bench.model.answer.current().is_none());
    let frame = bench.frame();
    assert!(frame.contains("? OPEN"), "{frame}");
    assert!(frame.contains("NOT CURRENT"), "{frame}");
    assert!(!frame.contains("o holds"), "{frame}");
    bench.keys("u");
    assert!(bench.model.answer.current().is_some());
    assert!(!bench.frame().contains("NOT CURRENT"));
}

#[test]
fn saving_writes_the_value_and_keeps_every_comment() {
    let mut bench = Bench::roof();
    bench.choose("line.length");
    bench.key(KeyCode::Left);
    let effects = bench.key(KeyCode::Char('s'));
    saved_to_disk(&mut bench, effects);
    assert!(!bench.model.is_edited());
    assert_eq!(
        std::fs::read_to_string(&bench.path).unwrap(),
        ROOF.replace("length = \"1.8 m\"", "length = \"1.79 m\"")
    );
}

#[test]
fn a_state_from_before_a_save_can_be_saved_again_after_undo() {
    let mut bench = Bench::roof();
    bench.choose("line.length");
    bench.key(KeyCode::Left);
    let effects = bench.key(KeyCode::Char('s'));
    saved_to_disk(&mut bench, effects);
    bench.keys("u");
    assert!(bench.model.is_edited());
    let effects = bench.key(KeyCode::Char('s'));
    saved_to_disk(&mut bench, effects);
    assert!(!bench.model.notice.as_ref().unwrap().is_fault, "{:?}", bench.model.notice);
    assert_eq!(std::fs::read_to_string(&bench.path).unwrap(), ROOF);
}

#[test]
fn a_save_over_a_file_that_changed_is_refused_and_loses_nothing() {
    let mut bench = Bench::roof();
    bench.choose("line.length");
    bench.key(KeyCode::Left);
    let foreign = ROOF.replace("22 kN", "23 kN");
    std::fs::write(&bench.path, &foreign).unwrap();
    let effects = bench.key(KeyCode::Char('s'));
    saved_to_disk(&mut bench, effects);
    assert!(bench.model.notice.as_ref().unwrap().is_fault);
    assert!(bench.model.is_edited());
    assert!((bench.value("line.length") - 1.79).abs() < 1e-12);
    assert_eq!(std::fs::read_to_string(&bench.path).unwrap(), foreign);
}

#[test]
fn reading_again_keeps_the_edits_within_reach_of_undo() {
    let mut bench = Bench::roof();
    bench.choose("line.length");
    bench.key(KeyCode::Left);
    std::fs::write(&bench.path, ROOF.replace("22 kN", "23 kN")).unwrap();
    bench.send(Message::ChangedOnDisk);
    assert!(bench.frame().contains("changed on disk"));
    let effects = bench.key(KeyCode::Char('r'));
    assert!(matches!(&effects[..], [Effect::Reload(path)] if *path == bench.path));
    bench.send(Message::Reloaded(Ok(Box::new(Document::open(&bench.path).unwrap()))));
    assert!((bench.value("line.strength") - 23e3).abs() < 1e-9);
    assert!(!bench.model.is_edited() && !bench.model.changed_on_disk);
    bench.keys("u");
    assert!((bench.value("line.length") - 1.79).abs() < 1e-12);
}

#[test]
fn leaving_with_changes_asks_once() {
    let mut bench = Bench::roof();
    bench.choose("line.length");
    bench.key(KeyCode::Left);
    bench.keys("q");
    assert!(bench.frame().contains("unsaved changes"));
    bench.key(KeyCode::Down);
    assert!(matches!(bench.model.mode, Mode::Commands));
    bench.keys("q");
    let effects = bench.key(KeyCode::Char('q'));
    assert!(matches!(effects[..], [Effect::Quit(Exit::Done)]));
}

#[test]
fn leaving_without_changes_asks_nothing() {
    let mut bench = Bench::roof();
    assert!(matches!(bench.key(KeyCode::Char('q'))[..], [Effect::Quit(Exit::Done)]));
    let effects = bench.with(KeyCode::Char('c'), KeyModifiers::CONTROL);
    assert!(matches!(effects[..], [Effect::Quit(Exit::Interrupted)]));
}

#[test]
fn an_interrupt_is_heard_while_typing_and_in_help() {
    let mut bench = Bench::roof();
    bench.key(KeyCode::Enter);
    let effects = bench.with(KeyCode::Char('c'), KeyModifiers::CONTROL);
    assert!(matches!(effects[..], [Effect::Quit(Exit::Interrupted)]));
    let mut bench = Bench::roof();
    bench.keys("?");
    let effects = bench.with(KeyCode::Char('c'), KeyModifiers::CONTROL);
    assert!(matches!(effects[..], [Effect::Quit(Exit::Interrupted)]));
}

#[test]
fn releases_and_repeats_of_keys_do_nothing() {
    let mut bench = Bench::roof();
    for kind in [KeyEventKind::Release, KeyEventKind::Repeat] {
        let key = KeyEvent::new_with_kind(KeyCode::Right, KeyModifiers::NONE, kind);
        assert!(bench.send(Message::Key(key)).is_empty());
    }
    assert!(!bench.model.is_edited());
}

#[test]
fn the_play_head_runs_at_its_speed_and_stops_at_the_end() {
    let mut bench = Bench::roof();
    bench.keys(" ");
    bench.send(Message::Tick(Duration::from_millis(500)));
    assert!((bench.model.play.time_s - 0.05).abs() < 1e-12);
    bench.keys("]");
    assert!(bench.model.play.running);
    bench.send(Message::Tick(Duration::from_millis(500)));
    assert!((bench.model.play.time_s - 0.15).abs() < 1e-12);
    bench.send(Message::Tick(Duration::from_secs(100_000)));
    assert!(!bench.model.play.running);
    assert_eq!(bench.model.play.time_s, bench.model.end_s());
}

#[test]
fn the_play_head_steps_from_event_to_event() {
    let mut bench = Bench::roof();
    let times: Vec<f64> = bench.model.answer.current().unwrap().estimate.events.iter().map(|e| e.time_s).collect();
    let mut walked = vec![0.0];
    for _ in 0..times.len() {
        bench.keys("n");
        walked.push(bench.model.play.time_s);
    }
    for time in &times {
        assert!(walked.iter().any(|walked| (walked - time).abs() < 1e-8), "{time} missed in {walked:?}");
    }
    bench.key(KeyCode::Home);
    assert_eq!(bench.model.play.time_s, 0.0);
    bench.key(KeyCode::End);
    assert_eq!(bench.model.play.time_s, bench.model.end_s());
}

#[test]
fn arrows_agree_with_what_a_larger_step_does() {
    let mut bench = Bench::roof();
    let room = |bench: &Bench| bench.model.answer.current().unwrap().margins[0].clone();
    let base = room(&bench);
    let leans: Vec<(String, Lean)> =
        bench.model.inputs.iter().map(|input| input.path.clone()).zip(bench.model.leans.clone()).collect();
    let mut told = 0;
    for (path, lean) in leans {
        bench.choose(&path);
        bench.key(KeyCode::Right);
        let Some(report) = bench.model.answer.current() else { continue };
        let Some(now) = report.margins.iter().find(|margin| margin.id == base.id).and_then(|m| m.margin) else {
            continue;
        };
        let change = now - base.margin.unwrap();
        match lean {
            Lean::More => assert!(change > 0.0, "{path} {change}"),
            Lean::Less => assert!(change < 0.0, "{path} {change}"),
            Lean::None => assert!(change.abs() < 1e-6, "{path} {change}"),
            Lean::Pending | Lean::Unknown => panic!("{path} cannot be told"),
        }
        told += 1;
        bench.keys("u");
    }
    assert!(told > 8);
}

/// A light mass bouncing on a stiff line without damping: thousands of phases within the time limit.
fn bouncing() -> String {
    LOAD.replace("250 kg", "10 kg")
        .replace("damping_ratio = 0.1\n", "")
        .replace("0.2 m", "0.001 m")
        .replace("400 kN/m", "4000 kN/m")
}

fn job_of(effects: Vec<Effect>) -> Box<Job> {
    let Some(Effect::Lean(job)) = effects.into_iter().next() else { panic!("no job") };
    job
}

#[test]
fn arrows_that_take_long_are_worked_out_beside_and_stale_ones_are_dropped() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("bouncing.toml");
    std::fs::write(&path, bouncing()).unwrap();
    let mut model = Model::new(Document::open(&path).unwrap(), UnitSystem::Metric);
    let first = job_of(update(&mut model, Message::Resize(140, 44)));
    assert!(model.leans.iter().all(|&lean| lean == Lean::Pending));
    let second = job_of(update(&mut model, Message::Command(Command::Raise)));
    assert!(update(&mut model, first.answer()).is_empty());
    assert!(model.leans.iter().all(|&lean| lean == Lean::Pending), "a stale answer was shown");
    let _ = update(&mut model, second.answer());
    assert!(model.leans.iter().all(|&lean| lean != Lean::Pending));
    assert!(model.leans.contains(&Lean::Less));
}

#[test]
fn units_change_what_is_shown_and_nothing_in_the_file() {
    let mut bench = Bench::roof();
    bench.keys("m");
    assert_eq!(bench.model.units, UnitSystem::Us);
    assert!(!bench.model.is_edited());
    assert!(bench.frame().contains("lbf"));
}

#[test]
fn views_and_panes_are_reached_by_key() {
    let mut bench = Bench::roof();
    bench.keys("2");
    assert_eq!(bench.model.view, View::History);
    bench.keys("v");
    assert_eq!(bench.model.view, View::Notes);
    bench.keys("v");
    assert_eq!(bench.model.view, View::Ledger);
    for view in [View::Vary, View::Map, View::Spread, View::Remedies, View::Compare, View::Elevation] {
        bench.keys("v");
        assert_eq!(bench.model.view, view);
    }
    bench.keys("w");
    assert_eq!(bench.model.window, Window::Whole);
    bench.key(KeyCode::Tab);
    assert_eq!(bench.model.pane, Pane::Margins);
    bench.key(KeyCode::Down);
    assert_eq!(bench.model.check, 1);
    bench.with(KeyCode::BackTab, KeyModifiers::SHIFT);
    assert_eq!(bench.model.pane, Pane::Inputs);
}

#[test]
fn a_click_chooses_inputs_tabs_checks_and_events() {
    let mut bench = Bench::roof();
    let (column, row) = bench.find("damping ratio");
    bench.click(column, row);
    assert_eq!(bench.model.chosen().unwrap().path, "line.damping_ratio");
    let (column, row) = bench.find("2Hist");
    bench.click(column, row);
    assert_eq!(bench.model.view, View::History);
    let label = bench.model.answer.current().unwrap().margins[2].label.clone();
    let (_, row) = bench.find("demand");
    bench.click(5, row + 3);
    assert_eq!(bench.model.check, 2, "{label}");
    let event = bench.model.answer.current().unwrap().estimate.events[1].clone();
    let (column, row) = bench.find(&event.words(UnitSystem::Metric)[..10]);
    bench.click(column, row);
    assert!((bench.model.play.time_s - event.time_s).abs() < 1e-12);
}

#[test]
fn dragging_on_the_play_bar_scrubs() {
    let mut bench = Bench::roof();
    let bar = Panes::of(bench.model.size, &bench.model).unwrap().bar();
    let (from, to) = bench.model.window_s();
    bench.click(bar.x, bar.y);
    for (cell, share) in [(bar.width - 1, 1.0), ((bar.width - 1) / 2, 0.5), (0, 0.0)] {
        bench.mouse(MouseEventKind::Drag(MouseButton::Left), bar.x + cell, bar.y - 3);
        let wanted = from + share * (to - from);
        let one_cell = (to - from) / f64::from(bar.width - 1);
        assert!((bench.model.play.time_s - wanted).abs() <= one_cell, "{} {wanted}", bench.model.play.time_s);
    }
}

#[test]
fn dragging_what_was_not_pressed_on_a_time_axis_does_nothing() {
    let mut bench = Bench::roof();
    let bar = Panes::of(bench.model.size, &bench.model).unwrap().bar();
    bench.mouse(MouseEventKind::Drag(MouseButton::Left), bar.x + 9, bar.y);
    assert_eq!(bench.model.play.time_s, 0.0);
    bench.click(bar.x + 9, bar.y);
    let there = bench.model.play.time_s;
    assert!(there > 0.0);
    bench.mouse(MouseEventKind::Up(MouseButton::Left), bar.x + 9, bar.y);
    bench.mouse(MouseEventKind::Drag(MouseButton::Left), bar.x + 20, bar.y);
    assert_eq!(bench.model.play.time_s, there);
}

#[test]
fn warnings_are_announced_beside_the_peak_and_spelt_out_in_the_notes() {
    let mut bench = Bench::of(&ROOF.replace("damping_ratio = 0.08", "damping_ratio = 1.5"), 140, 44);
    let warnings = bench.model.answer.current().unwrap().estimate.warnings.clone();
    assert!(!warnings.is_empty());
    assert!(bench.frame().contains("warning"), "{}", bench.frame());
    for (columns, rows) in [(140, 44), (80, 24), (60, 20)] {
        bench.send(Message::Resize(columns, rows));
        bench.keys("4");
        let mut seen = bench.frame();
        for _ in 0..12 {
            bench.key(KeyCode::PageDown);
            seen += &bench.frame();
        }
        for word in warnings[0].split(' ').filter(|word| word.len() < 20) {
            assert!(seen.contains(word), "no `{word}` at {columns}x{rows}");
        }
        assert!(seen.contains("Left out: air drag"), "{seen}");
        for _ in 0..12 {
            bench.key(KeyCode::PageUp);
        }
        assert_eq!(bench.model.notes_row, 0);
    }
}

#[test]
fn a_file_that_cannot_be_computed_opens_and_can_be_mended() {
    let mut bench = Bench::of(&ROOF.replace("13.5 m", "40 m"), 140, 44);
    let frame = bench.frame();
    assert!(frame.contains("? OPEN"), "{frame}");
    bench.choose("place.anchor");
    bench.key(KeyCode::Enter);
    bench.with(KeyCode::Char('u'), KeyModifiers::CONTROL);
    bench.keys("13.5 m");
    bench.key(KeyCode::Enter);
    assert!(bench.model.answer.current().is_some());
}

#[test]
fn the_wheel_walks_the_list_and_nudges_below_it() {
    let mut bench = Bench::roof();
    bench.mouse(MouseEventKind::ScrollDown, 4, 8);
    assert_eq!(bench.model.chosen_path(), Some("subject.attachment_above_feet"));
    bench.choose("line.length");
    let (_, row) = bench.find("line.length =");
    bench.mouse(MouseEventKind::ScrollUp, 4, row);
    assert!((bench.value("line.length") - 1.81).abs() < 1e-12);
}

#[test]
fn pasted_text_goes_into_the_value_being_typed_and_nowhere_else() {
    let mut bench = Bench::roof();
    bench.send(Message::Paste("q\ns".to_owned()));
    assert!(!bench.model.is_edited());
    bench.choose("line.length");
    bench.key(KeyCode::Enter);
    bench.with(KeyCode::Char('u'), KeyModifiers::CONTROL);
    bench.send(Message::Paste("1.9 m\n".to_owned()));
    bench.key(KeyCode::Enter);
    assert!((bench.value("line.length") - 1.9).abs() < 1e-12);
}

#[test]
fn a_file_without_elevations_is_drawn_from_the_taut_position() {
    let bench = Bench::of(LOAD, 140, 44);
    let frame = bench.frame();
    assert!(frame.contains("past taut"), "{frame}");
    assert!(frame.contains("0.200 m free fall"), "{frame}");
}

#[test]
fn the_caution_stands_in_every_frame_at_every_size() {
    let words = underfoot::sheet::CAUTION_LINE.replace(' ', "");
    let mut bench = Bench::roof();
    for (columns, rows) in [(60, 20), (80, 24), (100, 30), (140, 44), (250, 90)] {
        bench.send(Message::Resize(columns, rows));
        for keys in ["1", "2", "3", "?", "?"] {
            bench.keys(keys);
            let frame = bench.frame().replace([' ', '\n'], "");
            assert!(frame.contains(&words), "{columns}x{rows} {keys}\n{}", bench.frame());
        }
    }
}

#[test]
fn no_key_and_no_size_makes_the_screen_panic() {
    let mut bench = Bench::roof();
    let codes = [
        KeyCode::Up,
        KeyCode::Down,
        KeyCode::Left,
        KeyCode::Right,
        KeyCode::Tab,
        KeyCode::Enter,
        KeyCode::Esc,
        KeyCode::PageDown,
        KeyCode::PageUp,
        KeyCode::Home,
        KeyCode::End,
        KeyCode::Char(' '),
        KeyCode::Char('2'),
        KeyCode::Char('3'),
        KeyCode::Char('v'),
        KeyCode::Char('n'),
        KeyCode::Char('?'),
        KeyCode::Char('w'),
        KeyCode::Char('m'),
        KeyCode::Char('u'),
        KeyCode::Char('9'),
        KeyCode::Backspace,
        KeyCode::Delete,
    ];
    let mut seed = 12_345_u32;
    for _ in 0..600 {
        seed = seed.wrapping_mul(1_664_525).wrapping_add(1_013_904_223);
        let code = codes[(seed >> 16) as usize % codes.len()];
        bench.key(code);
        let columns = u16::try_from(1 + (seed >> 8) % 170).unwrap();
        let rows = u16::try_from(1 + (seed >> 20) % 60).unwrap();
        bench.send(Message::Resize(columns, rows));
        bench.frame();
    }
}

#[test]
fn sentence_log_and_drawing_show_the_same_digits() {
    let bench = Bench::roof();
    let frame = bench.frame();
    for text in ["feet stop 0.807 m above", "0.807 m clearance", "0.526 m deployed"] {
        assert!(frame.contains(text), "no `{text}` in\n{frame}");
    }
    assert_eq!(frame.matches("0.526 m deployed").count(), 2, "log and drawing\n{frame}");
}
