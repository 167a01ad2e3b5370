//! The state of the screen.
use super::choice::{Entry, entries};
use super::kept::Kept;
use super::lean::{Lean, is_slow, leans};
use super::map::Point;
pub use super::play::{Curves, Play, Scrubbing, Window};
use super::studies::Shelf;
use super::theme::Theme;
pub use super::views::View;
use super::walking::Walking;
use super::worker::Job;
use crate::quantity::UnitSystem;
use crate::scenario::{Document, Input, inputs};
use crate::sheet::{Report, ReportError, report};
use ratatui::layout::Size;
use std::path::PathBuf;

/// Which pane the keys go to.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Pane {
    /// The inputs.
    #[default]
    Inputs,
    /// The margins.
    Margins,
    /// The large view.
    View,
}

/// What keys mean at present.
#[derive(Clone, Debug, Default)]
pub enum Mode {
    /// Commands.
    #[default]
    Commands,
    /// A value is being typed.
    Typing(Typing),
    /// The help screen is open, scrolled down by so many rows.
    Help(u16),
    /// Asked whether to leave with unsaved changes.
    Leaving(Exit),
}

/// A value being typed.
#[derive(Clone, Debug, Default)]
pub struct Typing {
    /// The input it is for: the chosen one, or one that a changed word needs.
    pub path: String,
    /// Changes that wait for this value.
    pub before: Vec<(String, String)>,
    /// The text with its cursor.
    pub text: tui_input::Input,
    /// What is wrong with it, with a hint.
    pub fault: Option<String>,
}

/// How the screen ends.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Exit {
    /// The user is done.
    Done,
    /// Interrupted from the keyboard.
    Interrupted,
}

/// A message to the user.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Notice {
    /// The words.
    pub words: String,
    /// Whether something went wrong.
    pub is_fault: bool,
}

/// The answer to the present inputs.
#[derive(Clone, Debug)]
pub struct Answer {
    /// The newest report that could be computed.
    pub report: Option<Report>,
    /// Why the present inputs give none; the report is then that of earlier inputs and must not pass for current.
    pub fault: Option<String>,
}

impl Answer {
    /// The report, if it belongs to the present inputs.
    #[must_use]
    pub const fn current(&self) -> Option<&Report> {
        match self.fault {
            None => self.report.as_ref(),
            Some(_) => None,
        }
    }

    /// True when the report on show belongs to earlier inputs.
    #[must_use]
    pub const fn is_stale(&self) -> bool {
        self.fault.is_some()
    }
}

/// Everything the screen knows.
#[derive(Clone, Debug)]
pub struct Model {
    /// The file with the present values.
    pub document: Document,
    /// The file as last read or written.
    pub saved: Document,
    /// Earlier states, the latest last.
    pub undo: Vec<Document>,
    /// States taken back, the latest last.
    pub redo: Vec<Document>,
    /// Units of display.
    pub units: UnitSystem,
    /// Colours.
    pub theme: Theme,
    /// Size of the terminal.
    pub size: Size,
    /// The inputs of the document, in file order; those of no section last.
    pub inputs: Vec<Input>,
    /// The rows of the inputs: numbers and words.
    pub entries: Vec<Entry>,
    /// Which way raising each input moves the governing margin; same order as the inputs.
    pub leans: Vec<Lean>,
    /// Report and fault.
    pub answer: Answer,
    /// Number of the present state of the inputs.
    pub generation: u64,
    /// Work to be handed out after this message.
    pub job: Option<Box<Job>>,
    /// Which pane the keys go to.
    pub pane: Pane,
    /// The chosen row of the inputs.
    pub input: usize,
    /// The chosen check.
    pub check: usize,
    /// The large view.
    pub view: View,
    /// First row shown of the notes.
    pub notes_row: usize,
    /// First row shown of the ledger.
    pub ledger_row: usize,
    /// First row shown of Spread.
    pub spread_row: usize,
    /// First row shown of Compare.
    pub compare_row: usize,
    /// Whether remedies are to hold at the worst found, too.
    pub remedies_at_worst: bool,
    /// The chosen remedy.
    pub remedy: usize,
    /// Axes and movable point of Map.
    pub map: Point,
    /// Studies asked for and their answers.
    pub shelf: Shelf,
    /// The state that Compare holds the present one against.
    pub kept: Kept,
    /// The walk-through that is open.
    pub walking: Option<Box<Walking>>,
    /// Where the mouse button went down on a time axis and still is.
    pub scrubbing: Option<Scrubbing>,
    /// Stretch of time in History.
    pub window: Window,
    /// Curves in History.
    pub curves: Curves,
    /// Play head.
    pub play: Play,
    /// What keys mean.
    pub mode: Mode,
    /// Message to the user.
    pub notice: Option<Notice>,
    /// Whether the file on disk was changed by somebody else.
    pub changed_on_disk: bool,
}

/// States kept for undo.
const UNDO_DEPTH: usize = 300;

impl Model {
    /// The screen of a file just read.
    #[must_use]
    pub fn new(document: Document, units: UnitSystem) -> Self {
        let mut model = Self {
            saved: document.clone(),
            undo: Vec::new(),
            redo: Vec::new(),
            units,
            theme: Theme::default(),
            size: Size::new(80, 24),
            inputs: Vec::new(),
            entries: Vec::new(),
            leans: Vec::new(),
            answer: Answer { report: None, fault: None },
            generation: 0,
            job: None,
            pane: Pane::default(),
            input: 0,
            check: 0,
            view: View::default(),
            notes_row: 0,
            ledger_row: 0,
            spread_row: 0,
            compare_row: 0,
            remedies_at_worst: false,
            remedy: 0,
            map: Point::default(),
            shelf: Shelf::default(),
            kept: Kept::opened(&document),
            walking: None,
            scrubbing: None,
            window: Window::default(),
            curves: Curves::default(),
            play: Play { time_s: 0.0, running: false, speed: 3 },
            mode: Mode::default(),
            notice: None,
            changed_on_disk: false,
            document,
        };
        model.recompute();
        model.kept.report.clone_from(&model.answer.report);
        let is_number = |entry: &Entry| matches!(entry, Entry::Number(_));
        model.input = model.entries.iter().position(is_number).unwrap_or(0);
        model
    }

    /// Where the file is.
    #[must_use]
    pub fn path(&self) -> PathBuf {
        self.document.path().to_owned()
    }

    /// True when leaving now would lose changes.
    #[must_use]
    pub fn is_edited(&self) -> bool {
        self.document.text() != self.saved.text()
    }

    /// End of the motion on show, s.
    #[must_use]
    pub fn end_s(&self) -> f64 {
        self.answer.report.as_ref().map_or(0.0, |report| report.estimate.trace.end_s())
    }

    /// The stretch of time shown in History, s.
    #[must_use]
    pub fn window_s(&self) -> (f64, f64) {
        let end = self.end_s().max(1e-3);
        let first = self.answer.report.as_ref().map_or(end, |report| {
            let numbers = &report.estimate.numbers;
            let taut = numbers.get("time_taut").unwrap_or(0.0);
            let lowest = numbers.get("time_lowest").unwrap_or(end);
            (lowest + 2.5 * (lowest - taut) + 0.1 * end.min(1.0)).min(end)
        });
        match self.window {
            Window::Whole => (0.0, end),
            Window::FirstCatch if self.play.time_s <= first => (0.0, first),
            Window::FirstCatch => {
                let page = (self.play.time_s / first).floor();
                (page * first, (page + 1.0) * first)
            }
        }
    }

    /// Puts a new state in place of the present one, which undo brings back.
    pub fn take(&mut self, document: Document) {
        let before = std::mem::replace(&mut self.document, document);
        self.undo.push(before);
        if self.undo.len() > UNDO_DEPTH {
            self.undo.remove(0);
        }
        self.redo.clear();
        self.recompute();
    }

    /// Solves the present document; a failure keeps the last report, marked as stale by the fault.
    pub fn recompute(&mut self) {
        let chosen = self.chosen_path().map(str::to_owned);
        self.inputs = sections_first(inputs(self.document.scenario()));
        self.entries = entries(&self.document, &self.inputs);
        let at = |path: String| self.entries.iter().position(|entry| self.path_of(entry) == path);
        self.input = chosen.and_then(at).unwrap_or(self.input).min(self.entries.len().saturating_sub(1));
        let file = self.document.path().display().to_string();
        match report(&file, self.document.text(), self.document.scenario()) {
            Ok(report) => self.answer = Answer { report: Some(report), fault: None },
            Err(error) => self.answer.fault = Some(words(&error)),
        }
        self.generation += 1;
        self.job = None;
        self.lean();
        let checks = self.answer.report.as_ref().map_or(0, |report| report.margins.len());
        self.check = self.check.min(checks.saturating_sub(1));
        self.play.time_s = self.play.time_s.min(self.end_s());
    }

    /// Takes note of what the file on disk now holds, in the present state and in all that undo and redo bring back.
    pub fn adopt(&mut self, on_disk: &Document) {
        self.saved = on_disk.clone();
        let states = self.undo.iter_mut().chain(&mut self.redo).chain(std::iter::once(&mut self.document));
        for state in states {
            *state = state.clone().on_disk_as(on_disk);
        }
    }

    /// Works the arrows out, or leaves a job behind where that takes longer than a frame may.
    fn lean(&mut self) {
        let scenario = self.document.scenario();
        match self.answer.current() {
            Some(report) if is_slow(&self.inputs, report) => {
                self.leans = vec![Lean::Pending; self.inputs.len()];
                self.job = Some(Box::new(Job {
                    generation: self.generation,
                    scenario: scenario.clone(),
                    inputs: self.inputs.clone(),
                    report: Box::new(report.clone()),
                }));
            }
            current => self.leans = leans(&self.inputs, scenario, current),
        }
    }

    /// Tells the user something.
    pub fn say(&mut self, words: impl Into<String>) {
        self.notice = Some(Notice { words: words.into(), is_fault: false });
    }

    /// Tells the user that something went wrong.
    pub fn complain(&mut self, words: impl Into<String>) {
        self.notice = Some(Notice { words: words.into(), is_fault: true });
    }
}

/// The error with its hint.
fn words(error: &ReportError) -> String {
    use crate::estimate::EstimateError;
    match error {
        ReportError::Estimate(EstimateError::Geometry { message, hint, .. }) => format!("{message}; {hint}"),
        ReportError::Basis(basis) => match basis.nearest {
            Some(nearest) => format!("{error}; did you mean `{nearest}`"),
            None => error.to_string(),
        },
        ReportError::Estimate(_) => error.to_string(),
    }
}

/// Keys of no section (gravity) stand first in a file and last on the screen.
fn sections_first(mut inputs: Vec<Input>) -> Vec<Input> {
    inputs.sort_by_key(|input| !input.path.contains('.'));
    inputs
}
