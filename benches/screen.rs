//! Cost of the screen over all shipped scenarios: from the file to the first frame, and from a nudge to its frame, as
//! ratios to one bare estimate of the same scenario in the same run; then the same nudges while a map, a sample and the
//! search of the bands run beside. A frame has 140 columns and 44 rows.
#![expect(clippy::expect_used, reason = "a bench that cannot run says so and ends")]
use crossterm::event::{KeyCode, KeyEvent, KeyModifiers};
use ratatui::Terminal;
use ratatui::backend::TestBackend;
use std::hint::black_box;
use std::path::{Path, PathBuf};
use std::sync::mpsc::channel;
use std::time::{Duration, Instant};
use underfoot::estimate::estimate;
use underfoot::quantity::UnitSystem;
use underfoot::scenario::Document;
use underfoot::study::{MOST_POINTS, MOST_STEPS, Sampling, USUAL_SEED};
use underfoot::tui::arrival::Arrival;
use underfoot::tui::choice::Entry;
use underfoot::tui::message::{Effect, Message};
use underfoot::tui::model::{Model, View};
use underfoot::tui::studies::{Desk, Order, What};
use underfoot::tui::update::update;
use underfoot::tui::view::view;

const COLUMNS: u16 = 140;
const ROWS: u16 = 44;
/// Nudge to frame, median, at most, s.
const GOAL_S: f64 = 4e-3;
/// The same beside a map and a sample, at most, s.
const BESIDE_GOAL_S: f64 = 16e-3;
/// A key held down comes about so often.
const BETWEEN_KEYS: Duration = Duration::from_millis(30);

fn median(mut times: Vec<f64>) -> f64 {
    times.sort_by(f64::total_cmp);
    times[times.len() / 2]
}

/// Median seconds of a call.
fn seconds<T>(calls: usize, mut call: impl FnMut() -> T) -> f64 {
    let once = |call: &mut dyn FnMut() -> T| {
        let start = Instant::now();
        black_box(call());
        start.elapsed().as_secs_f64()
    };
    median((0..calls).map(|_| once(&mut call)).collect())
}

fn open(path: &Path) -> Model {
    let mut model = Model::new(Document::open(path).expect("a shipped scenario is sound"), UnitSystem::Metric);
    let effects = update(&mut model, Message::Resize(COLUMNS, ROWS));
    let usual = |effect: &Effect| matches!(effect, Effect::Lean(_) | Effect::Study(_));
    assert!(effects.iter().all(usual), "opening asks for arrows and a search of the bands at most");
    model
}

fn draw(terminal: &mut Terminal<TestBackend>, model: &Model) {
    terminal.draw(|frame| view(model, frame)).expect("a buffer takes every frame");
}

fn terminal() -> Terminal<TestBackend> {
    Terminal::new(TestBackend::new(COLUMNS, ROWS)).expect("a buffer")
}

fn press(model: &mut Model, code: KeyCode) -> Vec<Effect> {
    black_box(update(model, Message::Key(KeyEvent::new(code, KeyModifiers::NONE))))
}

/// Every input raised and lowered in turn, each with its frame; only nudges that were taken count.
fn nudges(model: &mut Model, screen: &mut Terminal<TestBackend>) -> (f64, f64) {
    let (changes, frames) = every_nudge(model, screen, Duration::ZERO, &mut |_| {});
    (median(changes), median(frames))
}

/// Seconds of every nudge without and with its frame; `hand` takes what each asks for.
fn every_nudge(
    model: &mut Model,
    screen: &mut Terminal<TestBackend>,
    between: Duration,
    hand: &mut dyn FnMut(Vec<Effect>),
) -> (Vec<f64>, Vec<f64>) {
    let (mut changes, mut frames) = (Vec::new(), Vec::new());
    for index in 0..model.entries.len() {
        if matches!(model.entries[index], Entry::Word(_)) {
            continue;
        }
        for code in [KeyCode::Right, KeyCode::Left] {
            model.input = index;
            let before = model.generation;
            std::thread::sleep(between);
            let start = Instant::now();
            let effects = press(model, code);
            hand(effects);
            let changed = start.elapsed().as_secs_f64();
            draw(screen, model);
            if model.generation != before {
                changes.push(changed);
                frames.push(start.elapsed().as_secs_f64());
            }
        }
    }
    assert!(!frames.is_empty(), "no nudge was taken");
    (changes, frames)
}

/// Whether a message tells of the progress of this kind of study.
fn is_of(message: &Message, what: &What) -> bool {
    matches!(message, Message::Progress { lane, .. } if *lane == what.lane())
}

/// A map and a sample that are begun anew whenever they end while the nudges last, beside the search of the bands that every
/// nudge asks for. Median and slowest nudge with its frame.
fn nudges_beside_studies(path: &Path) -> Option<(f64, f64)> {
    let (outbox, inbox) = channel::<Arrival>();
    let mut desk = Desk::start(outbox).expect("threads");
    let mut model = open(path);
    let scenario = model.document.scenario().clone();
    let map = What::Map { paths: model.map_paths()?, steps: [MOST_STEPS; 2] };
    let sample =
        model.has_bands().then_some(What::Spread { sampling: Sampling { samples: MOST_POINTS, seed: USUAL_SEED } });
    let wanted: Vec<What> = sample.into_iter().chain([map]).collect();
    let keep_up = |desk: &mut Desk| {
        let running = desk.progress(Instant::now());
        for what in &wanted {
            if !running.iter().any(|message| is_of(message, what)) {
                desk.give(Order { ticket: 0, scenario: scenario.clone(), what: what.clone() });
            }
        }
    };
    keep_up(&mut desk);
    let mut screen = terminal();
    let (_, frames) = every_nudge(&mut model, &mut screen, BETWEEN_KEYS, &mut |effects| {
        for effect in effects {
            if let Effect::Study(order) = effect {
                desk.give(*order);
            }
        }
        keep_up(&mut desk);
    });
    drop(inbox);
    let slowest = frames.iter().copied().fold(0.0, f64::max);
    Some((median(frames), slowest))
}

fn report(path: &Path) -> f64 {
    let mut model = open(path);
    let scenario = model.document.scenario().clone();
    let bare = seconds(101, || estimate(black_box(&scenario)));
    let first = seconds(31, || draw(&mut terminal(), &open(path)));
    let mut screen = terminal();
    let (change, elevation) = nudges(&mut model, &mut screen);
    model.view = View::History;
    let (_, history) = nudges(&mut model, &mut screen);
    let name = path.file_stem().unwrap_or_default().to_string_lossy().into_owned();
    let shown = |time: f64| format!("{:>8.2} ms {:>7.1} x", time * 1e3, time / bare);
    println!(
        "{name:<26} {:>8.1} us | {} | {} | {} | {}",
        bare * 1e6,
        shown(first),
        shown(change),
        shown(elevation),
        shown(history)
    );
    elevation.max(history)
}

fn main() {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios");
    let files = std::fs::read_dir(folder).expect("the shipped scenarios").map(|entry| entry.expect("an entry").path());
    let mut files: Vec<PathBuf> = files.filter(|path| path.extension().is_some_and(|end| end == "toml")).collect();
    files.sort();
    println!(
        "{:<26} {:>11} | {:>21} | {:>21} | {:>21} | {:>21}",
        "", "estimate", "file to first frame", "a nudge alone", "with Elevation", "with History"
    );
    let worst = files.iter().map(|path| report(path)).fold(0.0, f64::max);
    println!("slowest median from nudge to frame {:.2} ms, goal {:.0} ms", worst * 1e3, GOAL_S * 1e3);
    println!("\nnudge with Elevation while a map, a sample and the search of the bands run: median, slowest");
    let mut beside = (0.0_f64, 0.0_f64);
    for path in &files {
        let Some((median, slowest)) = nudges_beside_studies(path) else { continue };
        let name = path.file_stem().unwrap_or_default().to_string_lossy().into_owned();
        println!("{name:<26} {:>8.2} ms {:>8.2} ms", median * 1e3, slowest * 1e3);
        beside = (beside.0.max(median), beside.1.max(slowest));
    }
    let (median, slowest) = (beside.0 * 1e3, beside.1 * 1e3);
    println!("slowest median {median:.2} ms, slowest of all {slowest:.2} ms, goal {:.0} ms", BESIDE_GOAL_S * 1e3);
}
