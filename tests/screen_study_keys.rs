//! The views of studies as a model that takes keys and answers: (model, keys, model).
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail by panicking")]
mod screen_support;

use crossterm::event::{KeyCode, KeyModifiers, MouseButton, MouseEventKind};
use screen_support::{Bench, LOAD, ROOF};
use std::time::Duration;
use underfoot::margin::Verdict;
use underfoot::study::{Evaluator, Held, Sampling, bands, ranked, unwatched};
use underfoot::tui::joint::Word;
use underfoot::tui::layout::Panes;
use underfoot::tui::message::{Effect, Message};
use underfoot::tui::model::{Model, Pane, View};
use underfoot::tui::panes::map;
use underfoot::tui::studies::{Lane, State, What};
use underfoot::tui::update::update;

const BANDS: &str = include_str!("screen_support/bands.toml");

fn held() -> Bench {
    Bench::still(BANDS, 140, 44)
}

fn state(bench: &Bench, lane: Lane) -> &State {
    &bench.model.shelf.slot(lane).state
}

#[test]
fn a_check_is_not_called_holding_before_the_bands_are_searched() {
    let mut bench = held();
    assert_eq!(bench.model.word_of_all(), Word::Searching);
    let frame = bench.frame();
    assert!(frame.contains("HOLDS AT TYPICAL, BANDS BEING SEARCHED"), "{frame}");
    assert!(!frame.contains("o HOLDS") && !frame.contains("o holds"), "{frame}");
    let order = bench.held.pop().unwrap();
    bench.send(Bench::answer(&order));
    assert_eq!(bench.model.word_of_all(), Word::Final(Verdict::Thin));
    assert!(bench.frame().contains("~ THIN"), "{}", bench.frame());
}

#[test]
fn a_check_that_is_short_at_typical_values_is_short_at_once() {
    let bench = Bench::still(ROOF, 140, 44);
    assert_eq!(bench.model.word_of_all(), Word::Final(Verdict::Short));
    assert!(bench.frame().contains("x SHORT"));
}

#[test]
fn without_bands_nothing_is_searched_and_the_word_is_final() {
    let bench = Bench::still(LOAD, 140, 44);
    assert!(bench.held.is_empty(), "{:?}", bench.held);
    assert_eq!(bench.model.word_of_all(), Word::Final(Verdict::Holds));
}

#[test]
fn an_answer_to_earlier_inputs_is_dropped() {
    let mut bench = held();
    let stale = bench.held.pop().unwrap();
    bench.choose("line.length");
    bench.key(KeyCode::Right);
    bench.send(Bench::answer(&stale));
    assert_eq!(bench.model.word_of_all(), Word::Searching, "the old search must not judge the new inputs");
    assert!(matches!(state(&bench, Lane::Bands), State::Running(_)));
    let fresh = bench.held.pop().unwrap();
    bench.send(Bench::answer(&fresh));
    assert!(bench.model.bands().is_some());
}

#[test]
fn a_nudge_takes_the_curve_away_until_the_new_one_is_there() {
    let mut bench = held();
    bench.choose("line.length");
    bench.keys("6");
    let order = bench.held.pop().unwrap();
    bench.send(Bench::answer(&order));
    assert!(bench.frame().contains("2.033 m"), "{}", bench.frame());
    bench.key(KeyCode::Right);
    let frame = bench.frame();
    assert!(!frame.contains("2.033 m") && frame.contains("waiting for its turn"), "{frame}");
    bench.send(Bench::answer(&order));
    assert_eq!(bench.frame(), frame, "the curve of the earlier inputs stays away");
}

#[test]
fn an_answer_of_the_same_kind_to_another_question_is_dropped() {
    let mut bench = held();
    bench.choose("line.length");
    bench.keys("6");
    let of_length = bench.held.pop().unwrap();
    bench.choose("subject.mass");
    let of_mass = bench.held.pop().unwrap();
    assert_eq!(of_mass.what, What::Vary { path: "subject.mass".to_owned() });
    bench.send(Bench::answer(&of_length));
    assert!(bench.model.shelf.vary().is_none());
    bench.send(Bench::answer(&of_mass));
    assert_eq!(bench.model.shelf.vary().unwrap().input.path, "subject.mass");
}

#[test]
fn a_stopped_study_says_so_and_starts_again_on_demand() {
    let mut bench = held();
    bench.keys("9");
    bench.held.clear();
    bench.keys("x");
    assert!(matches!(state(&bench, Lane::Remedies), State::Stopped));
    assert_eq!(bench.model.word_of_all(), Word::Unsearched);
    let frame = bench.frame();
    assert!(frame.contains("g starts it again") && frame.contains("BANDS NOT SEARCHED"), "{frame}");
    bench.keys("g");
    assert_eq!(bench.held.len(), 2, "both are asked for again");
    assert!(matches!(state(&bench, Lane::Remedies), State::Running(_)));
}

#[test]
fn a_stopped_sample_answers_with_its_part() {
    let mut bench = held();
    bench.keys("8");
    let order = bench.held.iter().find(|order| order.what.lane() == Lane::Spread).unwrap().clone();
    let effects = update(&mut bench.model, key('x'));
    assert!(effects.iter().any(|effect| matches!(effect, Effect::EndStudy(Lane::Spread))), "{effects:?}");
    assert!(effects.iter().any(|effect| matches!(effect, Effect::DropStudy(Lane::Bands))), "{effects:?}");
    let meter = std::sync::Arc::<underfoot::study::Meter>::default();
    let watched = std::sync::Arc::clone(&meter);
    let key = std::thread::spawn(move || {
        while watched.runs() == 0 {
            std::thread::yield_now();
        }
        watched.end_early();
    });
    bench.send(order.answer(&meter));
    key.join().unwrap();
    assert!(bench.model.shelf.spread().unwrap().spread.is_partial());
    let frame = bench.frame();
    assert!(frame.contains(" of 4,096, stopped: a part"), "{frame}");
}

fn key(symbol: char) -> Message {
    Message::Key(crossterm::event::KeyEvent::new(KeyCode::Char(symbol), KeyModifiers::NONE))
}

#[test]
fn an_answer_that_nobody_wants_any_more_is_refused_by_its_meter() {
    let mut bench = held();
    bench.keys("9");
    let order = bench.held.pop().unwrap();
    let meter = std::sync::Arc::<underfoot::study::Meter>::default();
    meter.drop_study();
    let Message::Studied { result, .. } = order.answer(&meter) else { panic!("no answer") };
    assert!(result.unwrap().is_none());
}

#[test]
fn progress_tells_share_and_time_left() {
    let mut bench = held();
    bench.keys("8");
    let order = bench.held.iter().find(|order| order.what.lane() == Lane::Spread).unwrap().clone();
    let passed = Duration::from_secs(3);
    bench.send(Message::Progress { lane: Lane::Spread, ticket: order.ticket, done: 4096, of: Some(16384), passed });
    let frame = bench.frame();
    assert!(frame.contains("sample: 25 % done, about 9 s left; x stops it"), "{frame}");
    bench.send(Message::Progress { lane: Lane::Spread, ticket: order.ticket - 1, done: 9999, of: Some(16384), passed });
    assert_eq!(bench.frame(), frame, "progress of another order is not this one's");
}

#[test]
fn a_study_that_fails_says_why() {
    let mut bench = held();
    bench.keys("9");
    let order = bench.held.pop().unwrap();
    bench.send(Message::Studied { lane: Lane::Remedies, ticket: order.ticket, result: Err("an inner fault".into()) });
    assert!(bench.frame().contains("no search for remedies: an inner fault"), "{}", bench.frame());
}

#[test]
fn leaving_a_view_drops_its_study_but_not_the_sample() {
    let mut bench = held();
    bench.keys("9");
    let effects = update(&mut bench.model, key('1'));
    assert!(effects.iter().any(|effect| matches!(effect, Effect::DropStudy(Lane::Remedies))), "{effects:?}");
    bench.keys("8");
    let effects = update(&mut bench.model, key('1'));
    assert!(!effects.iter().any(|effect| matches!(effect, Effect::DropStudy(Lane::Spread))), "{effects:?}");
}

#[test]
fn the_point_of_the_map_goes_into_the_inputs_as_one_change() {
    let mut bench = Bench::of(BANDS, 140, 44);
    let before = bench.model.document.text().to_owned();
    bench.keys("7");
    assert_eq!(bench.model.pane, Pane::View);
    for _ in 0..3 {
        bench.key(KeyCode::Right);
    }
    bench.key(KeyCode::Down);
    let point = bench.model.map.at.unwrap();
    assert!(point[0] > 1.8 && point[1] < 4000.0, "{point:?}");
    bench.keys("i");
    assert!((bench.value("line.length") - point[0]).abs() < 1e-9);
    assert!((bench.value("absorber.deploy_force") - point[1]).abs() < 1e-6);
    bench.keys("u");
    assert_eq!(bench.model.document.text(), before);
}

#[test]
fn the_mouse_moves_the_point_to_its_cell() {
    let mut bench = Bench::of(BANDS, 140, 44);
    bench.keys("7");
    let field = map::field(Panes::of(bench.model.size, &bench.model).unwrap().view);
    bench.click(field.x, field.bottom() - 1);
    let low = bench.model.map.at.unwrap();
    bench.mouse(MouseEventKind::Drag(MouseButton::Left), field.right() - 1, field.y);
    let high = bench.model.map.at.unwrap();
    assert!((low[0] - 0.9).abs() < 1e-3 && (low[1] - 3200.0).abs() < 1.0, "{low:?}");
    assert!((high[0] - 3.6).abs() < 1e-3 && (high[1] - 4600.0).abs() < 1.0, "{high:?}");
    let (column, row) = bench.find("point 3.6 m, 4.6 kN: x short");
    assert!(row >= field.bottom() && column >= field.x - 7);
}

#[test]
fn what_the_map_says_of_a_point_is_what_its_inputs_give() {
    let mut bench = Bench::of(BANDS, 140, 44);
    bench.keys("7");
    for _ in 0..12 {
        bench.key(KeyCode::Right);
    }
    let seen = bench.model.map.seen.clone().unwrap();
    bench.keys("i");
    assert_eq!(seen.verdict, Verdict::Short);
    assert_eq!(bench.model.answer.current().unwrap().verdict, Verdict::Short);
    let room = bench.model.answer.current().unwrap().margins[0].margin.unwrap();
    assert!(seen.words.contains(&format!("{room:.3}")[..5]), "{} {room}", seen.words);
}

#[test]
fn the_chosen_inputs_go_on_the_axes() {
    let mut bench = Bench::of(BANDS, 140, 44);
    bench.choose("subject.mass");
    bench.keys("a");
    bench.choose("line.stiffness");
    bench.keys("b7");
    assert_eq!(bench.model.map_paths().unwrap(), ["subject.mass", "line.stiffness"]);
    bench.key(KeyCode::Tab);
    bench.choose("line.stiffness");
    bench.keys("a");
    let [across, up] = bench.model.map_paths().unwrap();
    assert_eq!(across, "line.stiffness");
    assert_ne!(up, "line.stiffness", "one input never stands on both axes");
    let mapped = bench.model.shelf.map().unwrap();
    assert_eq!(mapped.inputs[0].path, "line.stiffness", "the map follows the axes");
}

/// What the file states about its sample.
const STATED: &str = "\n[study]\nsamples = 300\nseed = 7\n";

#[test]
fn the_sample_is_the_one_that_the_file_states_and_agrees_with_the_report() {
    let text = format!("{BANDS}{STATED}");
    let mut bench = Bench::of(&text, 140, 44);
    assert_eq!(bench.model.bands().unwrap().study.spread.seed, 7, "before there is a sample");
    bench.keys("8");
    assert!(bench.frame().contains("300 samples, seed 7"), "{}", bench.frame());
    let scenario = bench.model.document.scenario();
    let evaluator = Evaluator::new(scenario).unwrap();
    let report = bands(&evaluator, Sampling::of(scenario), &unwatched).unwrap().unwrap();
    assert_eq!(bench.model.bands().unwrap().study, report);
    let ranked = ranked(&evaluator, Sampling::of(scenario), &unwatched).unwrap();
    let shown = &bench.model.shelf.ranking().unwrap().ranking;
    assert!(shown.shares.is_some() && ranked.contains(shown), "{shown:?}");
    bench.keys("g");
    assert!(bench.frame().contains("1,200 samples, seed 7"), "{}", bench.frame());
}

#[test]
fn a_key_that_would_do_nothing_is_not_offered() {
    let line = |bench: &Bench| bench.frame().lines().last().unwrap_or_default().to_owned();
    let mut without = Bench::of(LOAD, 140, 44);
    without.keys("8");
    assert!(!line(&without).contains("g go on"), "{}", line(&without));
    without.keys("9");
    assert!(!line(&without).contains("i into inputs") && !line(&without).contains("h at"), "{}", line(&without));
    let mut short = Bench::of(ROOF, 140, 44);
    short.keys("8");
    assert!(line(&short).contains("g go on"), "{}", line(&short));
    short.keys("9");
    assert!(line(&short).contains("i into inputs  h at the worst"), "{}", line(&short));
    short.keys("h");
    assert!(line(&short).contains("h at typical"), "{}", line(&short));
    let mut thin = Bench::of(BANDS, 140, 44);
    thin.keys("9");
    assert!(!line(&thin).contains("h at"), "every check holds at the typical values: {}", line(&thin));
}

#[test]
fn two_running_studies_stand_two_columns_apart() {
    let mut bench = held();
    bench.keys("8");
    for lane in [Lane::Spread, Lane::Ranking] {
        let order = bench.held.iter().find(|order| order.what.lane() == lane).unwrap().clone();
        let passed = Duration::from_secs(150);
        bench.send(Message::Progress { lane, ticket: order.ticket, done: 1638, of: Some(4096), passed });
    }
    let frame = bench.frame();
    let row = frame.lines().find(|row| row.contains("ranking: 40 % done")).unwrap_or_else(|| panic!("{frame}"));
    assert!(row.contains("  ranking: ") && row.contains("sample: 40 % done"), "{row}");
}

#[test]
fn a_narrow_list_of_margins_shows_the_worst_found() {
    let mut bench = Bench::of(BANDS, 80, 24);
    bench.keys("3");
    assert!(bench.frame().contains("+0.307 m, worst -0.221 m"), "{}", bench.frame());
}

#[test]
fn a_remedy_goes_into_the_inputs_and_makes_every_check_hold() {
    let mut bench = Bench::of(ROOF, 140, 44);
    bench.keys("9");
    assert_eq!(bench.model.pane, Pane::View);
    bench.key(KeyCode::Down);
    bench.key(KeyCode::Down);
    let chosen = bench.model.shelf.remedies().unwrap().list[2].clone();
    bench.key(KeyCode::Enter);
    assert!((bench.value(&chosen.input.path) - chosen.way.unwrap().value).abs() < 1e-9);
    let report = bench.model.answer.current().unwrap();
    assert!(report.margins.iter().all(|margin| margin.verdict < Verdict::Open), "{:?}", report.margins);
    bench.keys("u");
    assert_eq!(bench.model.document.text(), ROOF);
}

#[test]
fn an_input_without_a_remedy_is_not_written() {
    let mut bench = Bench::of(ROOF, 140, 44);
    bench.keys("9");
    let count = bench.model.shelf.remedies().unwrap().list.len();
    for _ in 0..count {
        bench.key(KeyCode::Down);
    }
    bench.keys("i");
    assert_eq!(bench.model.document.text(), ROOF);
    assert!(bench.model.notice.as_ref().unwrap().is_fault);
}

#[test]
fn compare_holds_the_kept_state_against_what_comes_next() {
    let mut bench = Bench::of(BANDS, 140, 44);
    bench.keys("0");
    assert!(bench.frame().contains("the file as opened"), "{}", bench.frame());
    bench.choose("line.length");
    bench.key(KeyCode::Right);
    bench.keys("k");
    assert!(bench.model.difference().unwrap().inputs.is_empty());
    for _ in 0..40 {
        bench.key(KeyCode::Right);
    }
    let found = bench.model.difference().unwrap();
    assert_eq!(found.inputs.len(), 1);
    let frame = bench.frame();
    assert!(frame.contains("1.81 m -> 2.21 m"), "{frame}");
    assert!(frame.contains("~ thin -> x short (worse)"), "{frame}");
}

#[test]
fn compare_speaks_of_typical_values_until_both_sides_are_searched() {
    let mut bench = Bench::of(BANDS, 140, 44);
    bench.keys("0");
    assert!(bench.model.compares_bands());
    bench.hold_studies = true;
    bench.choose("line.length");
    bench.key(KeyCode::Right);
    assert!(!bench.model.compares_bands());
    let frame = bench.frame();
    assert!(frame.contains("verdicts that changed at typical values"), "{frame}");
    assert!(bench.model.difference().unwrap().verdicts.is_empty(), "{frame}");
}

#[test]
fn every_view_of_studies_draws_at_every_size_with_the_caution() {
    for text in [BANDS, LOAD] {
        for (columns, rows) in [(60, 20), (80, 24), (100, 32), (140, 44), (200, 60)] {
            let mut bench = Bench::of(text, columns, rows);
            for key in "67890".chars() {
                bench.keys(&key.to_string());
                let frame = bench.frame();
                assert!(frame.contains("FIRST-PASS ESTIMATE"), "{frame}");
                assert!(!bench.model.view.title().is_empty() && frame.contains(bench.model.view.title()), "{frame}");
            }
        }
    }
}

#[test]
fn stale_inputs_stop_every_study() {
    let mut bench = held();
    bench.keys("7");
    let faulty = {
        let mut model: Model = bench.model.clone();
        model.answer.fault = Some("no run".to_owned());
        let effects = update(&mut model, Message::Tick(Duration::ZERO));
        assert!(model.shelf.running().count() <= 2);
        effects
    };
    assert!(!faulty.iter().any(|effect| matches!(effect, Effect::Study(_))), "{faulty:?}");
    assert_eq!(bench.model.view, View::Map);
}

#[test]
fn a_thin_file_gets_remedies_that_hold_at_the_worst_found() {
    let mut bench = Bench::of(BANDS, 140, 44);
    assert_eq!(bench.model.word_of_all(), Word::Final(Verdict::Thin));
    bench.keys("9");
    assert_eq!(bench.model.remedies_held(), Held::Worst);
    assert!(bench.frame().contains("at the worst found"), "{}", bench.frame());
    bench.keys("i");
    assert_eq!(bench.model.word_of_all(), Word::Final(Verdict::Holds), "{}", bench.frame());
}

#[test]
fn remedies_of_a_short_file_are_typical_until_the_worst_is_asked_for() {
    let mut bench = Bench::of(ROOF, 140, 44);
    bench.keys("9");
    let typical = bench.model.shelf.remedies().unwrap().list[0].way.clone().unwrap();
    bench.keys("h");
    assert_eq!(bench.model.remedies_held(), Held::Worst);
    let worst = bench.model.shelf.remedies().unwrap().list[0].way.clone().unwrap();
    assert!(worst.relative > typical.relative, "{worst:?} {typical:?}");
    bench.keys("h");
    assert_eq!(bench.model.shelf.remedies().unwrap().list[0].way.clone().unwrap(), typical);
}
