//! Cost of the screen over all shipped scenarios: from the file to the first frame, and from a nudge to its frame, as
//! ratios to one bare estimate of the same scenario in the same run. A frame has 140 columns and 44 rows.
#![expect(clippy::expect_used, reason = "a bench that cannot run says so and ends")]
use crossterm::event::{KeyCode, KeyEvent, KeyModifiers};
use ratatui::Terminal;
use ratatui::backend::TestBackend;
use std::hint::black_box;
use std::path::{Path, PathBuf};
use std::time::Instant;
use underfoot::estimate::estimate;
use underfoot::quantity::UnitSystem;
use underfoot::scenario::Document;
use underfoot::tui::choice::Entry;
use underfoot::tui::message::{Effect, Message};
use underfoot::tui::model::{Model, View};
use underfoot::tui::update::update;
use underfoot::tui::view::view;

const COLUMNS: u16 = 140;
const ROWS: u16 = 44;
/// Nudge to frame, median, at most, s.
const GOAL_S: f64 = 4e-3;

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
    assert!(effects.iter().all(|effect| matches!(effect, Effect::Lean(_))), "opening asks for arrows at most");
    model
}

fn draw(terminal: &mut Terminal<TestBackend>, model: &Model) {
    terminal.draw(|frame| view(model, frame)).expect("a buffer takes every frame");
}

fn terminal() -> Terminal<TestBackend> {
    Terminal::new(TestBackend::new(COLUMNS, ROWS)).expect("a buffer")
}

fn press(model: &mut Model, code: KeyCode) {
    black_box(update(model, Message::Key(KeyEvent::new(code, KeyModifiers::NONE))));
}

/// Every input raised and lowered in turn, each with its frame; only nudges that were taken count.
fn nudges(model: &mut Model, screen: &mut Terminal<TestBackend>) -> (f64, f64) {
    let (mut changes, mut frames) = (Vec::new(), Vec::new());
    for index in 0..model.entries.len() {
        if matches!(model.entries[index], Entry::Word(_)) {
            continue;
        }
        for code in [KeyCode::Right, KeyCode::Left] {
            model.input = index;
            let before = model.generation;
            let start = Instant::now();
            press(model, code);
            let changed = start.elapsed().as_secs_f64();
            draw(screen, model);
            if model.generation != before {
                changes.push(changed);
                frames.push(start.elapsed().as_secs_f64());
            }
        }
    }
    assert!(!frames.is_empty(), "no nudge was taken");
    (median(changes), median(frames))
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
}
