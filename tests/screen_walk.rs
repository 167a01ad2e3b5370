//! A walk-through on the screen: a model, keys pressed on it, the model after them; and its frames.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
mod screen_support;

use crossterm::event::KeyCode;
use screen_support::{Bench, ROOF};
use underfoot::quantity::UnitSystem;
use underfoot::scenario::{Document, WALK_VIEWS, load_walk};
use underfoot::tui::message::{Effect, Message};
use underfoot::tui::model::{Exit, Model, View};
use underfoot::tui::walking::view_of;

const WALK: &str = r#"title = "a roof edge"
scenario = "roof-edge.toml"

[[stop]]
say = "Stop one only speaks."
view = "history"

[[stop]]
say = "A longer line: the feet come nearer to the plant-room roof than before, and everybody in the room can read from here how much nearer that is in this case."
input = "line.length"
value = "2.4 m"
view = "elevation"

[[stop]]
say = "A stiffer line and another kind of anchor."
change = [
    { input = "line.stiffness", value = "90 kN/m" },
    { input = "anchor.kind", value = "sprung" },
    { input = "anchor.stiffness", value = "400 kN/m" },
]
view = "margins"
"#;

fn walk_at(columns: u16, rows: u16) -> Bench {
    let mut bench = Bench::still(ROOF, columns, rows);
    let file = bench.folder.path().join("roof.walk.toml");
    std::fs::write(&file, WALK).unwrap();
    bench.model = Model::on_walk(load_walk(&file).unwrap(), UnitSystem::Metric);
    bench.model.size = ratatui::layout::Size::new(columns, rows);
    bench.hold_studies = false;
    let _ = bench.send(Message::Resize(columns, rows));
    bench
}

fn at(bench: &Bench) -> usize {
    bench.model.walking.as_ref().unwrap().at
}

#[test]
fn next_and_before_put_the_values_of_the_stops() {
    let mut bench = walk_at(140, 44);
    assert_eq!((at(&bench), bench.value("line.length")), (0, 1.8));
    bench.keys(">");
    assert_eq!((at(&bench), bench.value("line.length")), (1, 1.8));
    assert!(bench.model.undo.is_empty(), "a stop that only speaks changes nothing");
    bench.keys(">");
    assert_eq!((at(&bench), bench.value("line.length")), (2, 2.4));
    bench.keys(">");
    assert_eq!((at(&bench), bench.value("line.length"), bench.value("line.stiffness")), (3, 2.4, 90e3));
    assert_eq!(bench.value("anchor.stiffness"), 400e3);
    bench.keys("<<");
    assert_eq!((at(&bench), bench.value("line.length"), bench.value("line.stiffness")), (1, 1.8, 60e3));
    bench.keys(">>o");
    assert_eq!((at(&bench), bench.value("line.length")), (0, 1.8));
    assert!(!bench.model.is_edited());
}

#[test]
fn the_ends_of_the_walk_are_told_and_stay() {
    let mut bench = walk_at(140, 44);
    bench.keys("<");
    assert!(at(&bench) == 0 && bench.frame().contains("this is the start of the walk"));
    bench.keys(">>>>");
    assert_eq!(at(&bench), 3);
    assert!(bench.frame().contains("this was the last stop: < goes back, o starts over, l leaves the walk"));
}

#[test]
fn a_stop_puts_its_own_values_over_a_nudge_and_undo_brings_the_nudge_back() {
    let mut bench = walk_at(140, 44);
    bench.keys(">>");
    assert_eq!(bench.model.chosen_path(), Some("line.length"), "the changed input is chosen");
    bench.key(KeyCode::Right);
    let nudged = bench.value("line.length");
    assert!(nudged > 2.4 && !bench.model.is_at_stop());
    assert!(bench.frame().contains("changed by hand; differs from roof-edge.toml"));
    bench.keys(">");
    assert_eq!(bench.value("line.length"), 2.4);
    assert!(bench.model.is_at_stop());
    bench.keys("u");
    assert_eq!((bench.value("line.length"), bench.value("line.stiffness")), (nudged, 60e3));
    bench.keys("<");
    assert_eq!((at(&bench), bench.value("line.length")), (2, 2.4));
}

#[test]
fn a_stop_shows_its_view() {
    let mut bench = walk_at(80, 24);
    bench.keys(">");
    assert_eq!(bench.model.view, View::History);
    bench.keys(">");
    assert_eq!(bench.model.view, View::Elevation);
    bench.keys(">");
    assert_eq!(bench.model.view, View::Margins);
}

#[test]
fn the_words_for_views_are_those_of_the_tabs() {
    let titles = View::ALL.map(|view| view.title().to_lowercase());
    assert_eq!(WALK_VIEWS.map(str::to_owned), titles);
    assert!(View::ALL.into_iter().all(|view| view_of(&view.title().to_lowercase()) == Some(view)));
}

#[test]
fn saving_asks_once_and_another_key_takes_the_question_back() {
    let mut bench = walk_at(140, 44);
    bench.keys(">>");
    assert!(bench.key(KeyCode::Char('s')).is_empty());
    assert!(bench.frame().contains("s again writes the values on show into the scenario"));
    assert!(bench.key(KeyCode::Char('m')).is_empty());
    assert!(bench.key(KeyCode::Char('s')).is_empty(), "asked anew");
    let effects = bench.key(KeyCode::Char('s'));
    let [Effect::Save(document)] = effects.as_slice() else { panic!("{effects:?}") };
    assert_eq!(document.path(), bench.path);
    assert_eq!(std::fs::read_to_string(&bench.path).unwrap(), ROOF, "the screen itself writes nothing");
}

#[test]
fn after_a_save_the_walk_goes_on_and_can_save_again() {
    let mut bench = walk_at(140, 44);
    bench.keys(">>s");
    let Some(Effect::Save(mut document)) = bench.key(KeyCode::Char('s')).pop() else { panic!("no save") };
    document.save().unwrap();
    let _ = bench.send(Message::Saved(Ok(document)));
    assert!(!bench.model.is_edited());
    bench.keys("<");
    assert!(bench.model.is_edited() && bench.value("line.length") == 1.8);
    bench.keys("s");
    let Some(Effect::Save(mut document)) = bench.key(KeyCode::Char('s')).pop() else { panic!("no save") };
    document.save().unwrap();
    assert_eq!(std::fs::read_to_string(&bench.path).unwrap(), ROOF);
}

#[test]
fn leaving_with_the_values_of_a_stop_does_not_ask_but_hand_made_changes_do() {
    let mut bench = walk_at(140, 44);
    bench.keys(">>");
    assert!(matches!(bench.key(KeyCode::Char('q')).as_slice(), [Effect::Quit(Exit::Done)]));
    bench.key(KeyCode::Right);
    assert!(bench.key(KeyCode::Char('q')).is_empty());
    assert!(bench.frame().contains("unsaved changes"));
}

#[test]
fn leaving_the_walk_keeps_the_values_and_frees_its_rows() {
    let mut bench = walk_at(140, 44);
    bench.keys(">>l");
    assert!(bench.model.walking.is_none() && bench.value("line.length") == 2.4);
    let frame = bench.frame();
    assert!(frame.contains("left the walk-through") && frame.contains("was not written"), "{frame}");
    assert!(!frame.contains("stop 2 of 3"));
    bench.keys("u");
    assert_eq!(bench.value("line.length"), 1.8);
    bench.keys(">");
    assert!(bench.frame().contains("no walk-through is open"));
    bench.key(KeyCode::Right);
    assert!(
        matches!(bench.key(KeyCode::Char('s')).as_slice(), [Effect::Save(_)]),
        "without a walk saving does not ask"
    );
}

#[test]
fn a_file_changed_on_disk_is_walked_anew_and_left_where_the_walk_does_not_fit() {
    let mut bench = walk_at(140, 44);
    bench.keys(">>");
    let reread = |text: String| Document::of_text(&bench.path, text).map(Box::new).unwrap();
    let (other, unfit) = (reread(ROOF.replace("\"12 m\"", "\"12.2 m\"")), reread(ROOF.replace(
        "[anchor]\nkind = \"fixed\"\ncapacity = \"12 kN\"",
        "[anchor]\nkind = \"span\"\ncapacity = \"12 kN\"\nspan = { length = \"10 m\", sag = \"0.3 m\", modulus = \"4000 kN\" }",
    ).replace("kind = \"lanyard\"", "kind = \"retractable\"").replace("length = \"1.8 m\"", "lock_travel = \"0.6 m\"")));
    let _ = bench.send(Message::Reloaded(Ok(other)));
    assert_eq!((at(&bench), bench.value("place.standing"), bench.value("line.length")), (2, 12.2, 1.8));
    bench.keys("<>");
    assert_eq!((bench.value("place.standing"), bench.value("line.length")), (12.2, 2.4));
    let _ = bench.send(Message::Reloaded(Ok(unfit)));
    assert!(bench.model.walking.is_none());
    assert!(bench.frame().contains("left the walk-through, which does not fit the file any more"), "{}", bench.frame());
}

#[test]
fn the_bar_says_what_changed_what_it_did_and_that_the_file_is_untouched() {
    for (columns, rows) in [(60, 20), (80, 24), (140, 44), (200, 60)] {
        let mut bench = walk_at(columns, rows);
        assert!(bench.frame().contains("as in roof-edge.toml"));
        bench.keys(">>");
        let frame = bench.frame();
        let flat = frame.split_whitespace().collect::<Vec<_>>().join(" ");
        assert!(frame.contains("stop 2 of 3"), "{frame}");
        assert!(
            flat.contains("how much nearer that is in this case."),
            "the whole sentence at {columns}x{rows}\n{frame}"
        );
        assert!(flat.contains("changed line.length 1.8 m -> 2.4 m"), "{frame}");
        assert!(flat.contains("FIRST-PASS ESTIMATE"), "{frame}");
        let is_said = flat.contains("differs from roof-edge.toml, which is not written");
        assert!(is_said || columns < 80 && flat.contains("differs from the file"), "{columns} {frame}");
        if rows > 20 {
            assert!(
                flat.contains("margin clearance plant-room roof") && flat.contains("peak 4.00 kN -> 4.00 kN"),
                "{frame}"
            );
        }
    }
}

#[test]
fn the_key_line_offers_the_keys_of_the_walk_only_on_a_walk() {
    for (columns, rows) in [(80, 24), (140, 44)] {
        let frame = walk_at(columns, rows).frame();
        assert!(frame.contains("> next stop  < stop before  o start over  l leave walk"), "{frame}");
        assert!(!Bench::still(ROOF, columns, rows).frame().contains("next stop"));
    }
}

#[test]
fn a_longest_sentence_stands_whole_at_80x24() {
    let mut bench = walk_at(80, 24);
    let long = "word ".repeat(39) + "end.";
    let text = WALK.replace("Stop one only speaks.", &long);
    let file = bench.folder.path().join("long.walk.toml");
    std::fs::write(&file, text).unwrap();
    bench.model = Model::on_walk(load_walk(&file).unwrap(), UnitSystem::Metric);
    bench.keys(">");
    assert!(bench.frame().contains("word end."), "{}", bench.frame());
}

#[test]
fn a_stop_at_80x24() {
    let mut bench = walk_at(80, 24);
    bench.keys(">>");
    insta::assert_snapshot!(bench.frame());
}

#[test]
fn a_stop_at_140x44() {
    let mut bench = walk_at(140, 44);
    bench.keys(">>");
    insta::assert_snapshot!(bench.frame());
}

#[test]
fn the_start_at_80x24() {
    insta::assert_snapshot!(walk_at(80, 24).frame());
}
