//! A file, a model of it, and keys pressed on it.
#![allow(dead_code, reason = "each test binary uses its own part")]
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail by panicking")]
use crossterm::event::{KeyCode, KeyEvent, KeyModifiers, MouseButton, MouseEvent, MouseEventKind};
use ratatui::Terminal;
use ratatui::backend::TestBackend;
use ratatui::buffer::Cell;
use std::path::PathBuf;
use std::sync::Arc;
use underfoot::quantity::UnitSystem;
use underfoot::scenario::{Document, inputs};
use underfoot::study::Meter;
use underfoot::tui::message::{Effect, Message};
use underfoot::tui::model::Model;
use underfoot::tui::studies::Order;
use underfoot::tui::update::update;
use underfoot::tui::view::view;

/// A person on a roof; the lower roof is too near.
pub const ROOF: &str = r#"# A fitter at the roof edge; every value is invented.
title = "Roof edge"
datum = "street level"

[subject]
kind = "person"
mass = "80..100..120 kg"   # with tools and clothing
attachment_above_feet = "1.5 m"
stretch_allowance = "0.3 m"

[place]
standing = "12 m"
anchor = "13.5 m"

[line]
kind = "lanyard"
length = "1.8 m"
stiffness = "60 kN/m"
damping_ratio = 0.08
strength = "22 kN"

[absorber]
deploy_force = "4 kN"
stroke = "1.2 m"

[anchor]
kind = "fixed"
capacity = "12 kN"

[[obstacle]]
name = "plant-room roof"
top = "8.5 m"
reserve = "1 m"

[limits]
basis = "eu-363"
"#;

/// A load on a secondary line; no elevation is stated.
pub const LOAD: &str = r#"title = "Load on its secondary line"

[subject]
kind = "load"
mass = "250 kg"
underside_below_attachment = "0.8 m"

[fall]
free_fall = "0.2 m"

[line]
kind = "cable"
length = "6 m"
stiffness = "400 kN/m"
damping_ratio = 0.1
strength = "90 kN"

[limits]
basis = "own"
arrest_force = "40 kN"
"#;

/// A file on disk and the screen on it.
pub struct Bench {
    pub folder: tempfile::TempDir,
    pub path: PathBuf,
    pub model: Model,
    /// Studies are left undone, for tests of what is shown meanwhile.
    pub hold_studies: bool,
    /// Studies left undone, the latest last.
    pub held: Vec<Order>,
}

impl Bench {
    pub fn of(text: &str, columns: u16, rows: u16) -> Self {
        Self::with_studies(text, columns, rows, true)
    }

    /// As [`Bench::of`], with every study left undone.
    pub fn still(text: &str, columns: u16, rows: u16) -> Self {
        Self::with_studies(text, columns, rows, false)
    }

    fn with_studies(text: &str, columns: u16, rows: u16, studies: bool) -> Self {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("roof-edge.toml");
        std::fs::write(&path, text).unwrap();
        let mut model = Model::new(Document::open(&path).unwrap(), UnitSystem::Metric);
        let effects = update(&mut model, Message::Resize(columns, rows));
        let mut bench = Self { folder, path, model, hold_studies: !studies, held: Vec::new() };
        let effects = bench.study(effects);
        bench.carry_out(effects);
        bench
    }

    pub fn roof() -> Self {
        Self::of(ROOF, 140, 44)
    }

    /// Works arrows out that were left to the worker; nothing else may be asked for.
    fn carry_out(&mut self, effects: Vec<Effect>) {
        for effect in effects {
            let Effect::Lean(job) = effect else { panic!("asked for {effect:?}") };
            assert!(update(&mut self.model, job.answer()).is_empty());
        }
    }

    /// One message; the effects of it but for studies, which are made at once or held.
    pub fn send(&mut self, message: Message) -> Vec<Effect> {
        let effects = update(&mut self.model, message);
        self.study(effects)
    }

    fn study(&mut self, effects: Vec<Effect>) -> Vec<Effect> {
        let mut others = Vec::new();
        for effect in effects {
            match effect {
                Effect::Study(order) if self.hold_studies => self.held.push(*order),
                Effect::Study(order) => {
                    let more = self.send(order.answer(&Arc::default()));
                    assert!(more.is_empty(), "an answer asked for {more:?}");
                }
                Effect::EndStudy(_) | Effect::DropStudy(_) => {}
                other => others.push(other),
            }
        }
        others
    }

    /// Makes a study that was held; the message of its answer.
    pub fn answer(order: &Order) -> Message {
        order.answer(&Arc::<Meter>::default())
    }

    /// One key; the effects of it.
    pub fn key(&mut self, code: KeyCode) -> Vec<Effect> {
        self.send(Message::Key(KeyEvent::new(code, KeyModifiers::NONE)))
    }

    pub fn with(&mut self, code: KeyCode, modifiers: KeyModifiers) -> Vec<Effect> {
        self.send(Message::Key(KeyEvent::new(code, modifiers)))
    }

    /// Characters one after the other; none of them may have an effect.
    pub fn keys(&mut self, text: &str) {
        for symbol in text.chars() {
            let effects = self.key(KeyCode::Char(symbol));
            self.carry_out(effects);
        }
    }

    pub fn mouse(&mut self, kind: MouseEventKind, column: u16, row: u16) -> Vec<Effect> {
        self.send(Message::Mouse(MouseEvent { kind, column, row, modifiers: KeyModifiers::NONE }))
    }

    pub fn click(&mut self, column: u16, row: u16) {
        assert!(self.mouse(MouseEventKind::Down(MouseButton::Left), column, row).is_empty());
    }

    /// Walks to an input with the down key.
    pub fn choose(&mut self, path: &str) {
        let at = self.model.entries.iter().position(|entry| self.model.path_of(entry) == path);
        let at = at.unwrap_or_else(|| panic!("no input `{path}`"));
        for _ in 0..self.model.entries.len() {
            self.key(KeyCode::Up);
        }
        for _ in 0..at {
            self.key(KeyCode::Down);
        }
        assert_eq!(self.model.chosen_path(), Some(path));
    }

    /// The present value of an input, SI.
    pub fn value(&self, path: &str) -> f64 {
        let all = inputs(self.model.document.scenario());
        all.iter().find(|input| input.path == path).unwrap().measure.si()
    }

    /// A number of the present report, SI.
    pub fn number(&self, id: &str) -> f64 {
        self.model.answer.current().unwrap().estimate.numbers.get(id).unwrap()
    }

    /// The frame as rows of text.
    pub fn frame(&self) -> String {
        let size = self.model.size;
        let mut terminal = Terminal::new(TestBackend::new(size.width, size.height)).unwrap();
        terminal.draw(|frame| view(&self.model, frame)).unwrap();
        let symbols: Vec<&str> = terminal.backend().buffer().content.iter().map(Cell::symbol).collect();
        let rows = symbols.chunks(usize::from(size.width)).map(|row| row.concat().trim_end().to_owned());
        rows.collect::<Vec<_>>().join("\n")
    }

    /// Row and column of a text in the frame, in cells.
    pub fn find(&self, text: &str) -> (u16, u16) {
        let frame = self.frame();
        for (row, line) in (0..).zip(frame.lines()) {
            if let Some(at) = line.find(text) {
                return (u16::try_from(line[..at].chars().count()).unwrap(), row);
            }
        }
        panic!("no `{text}` in\n{frame}");
    }
}
