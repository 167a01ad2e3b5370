//! Changing inputs: nudging, typing, undo, back to the file's value.
use super::choice::{Entry, borrowed};
use super::model::{Mode, Model, Typing};
use crate::quantity::{Measure, Unit, format_measure, parse_measure};
use crate::scenario::{Document, Faults, Input, Severity, Turn, field_for, inputs};
use crate::sheet::ticks::floor_log10;

/// Direction and size of a nudge.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Nudge {
    /// One small step up.
    Raise,
    /// One small step down.
    Lower,
    /// Ten small steps up.
    RaiseMuch,
    /// Ten small steps down.
    LowerMuch,
}

impl Nudge {
    pub(super) const fn is_down(self) -> bool {
        matches!(self, Self::Lower | Self::LowerMuch)
    }

    const fn steps(self) -> f64 {
        match self {
            Self::Raise => 1.0,
            Self::Lower => -1.0,
            Self::RaiseMuch => 10.0,
            Self::LowerMuch => -10.0,
        }
    }
}

/// The small step of a value in the unit it is written in: a power of ten, 0.3 % to 3 % of the value; an inch where
/// feet and inches are written.
#[must_use]
pub fn step_si(measure: &Measure) -> f64 {
    if measure.feet_and_inches {
        return Unit::Inch.factor();
    }
    let shown = (measure.si() / measure.unit.factor()).abs();
    let exponent = if shown > 1e-9 { floor_log10(shown * 0.03 * (1.0 + 1e-9)) } else { -1 };
    10_f64.powi(exponent) * measure.unit.factor()
}

/// The measure after a nudge: the typical value on a multiple of the step, kept within `least..=most`; the ends of a
/// band stay and give way only where they would no longer enclose it.
#[must_use]
pub fn nudged(input: &Input, nudge: Nudge) -> Measure {
    let step = step_si(&input.measure);
    let here = input.measure.si() / step;
    let steps = nudge.steps();
    let slip = 1e-6;
    let grid = if steps > 0.0 { (here + slip).floor() } else { (here - slip).ceil() };
    let wanted = (grid + steps) * step;
    let (least, most) = (input.field.least, input.field.most);
    let value = if wanted < least || wanted > most { input.measure.si() } else { wanted };
    let mut measure = input.measure;
    measure.band.typical = value;
    measure.band.low = if input.measure.band.is_wide() { measure.band.low.min(value) } else { value };
    measure.band.high = if input.measure.band.is_wide() { measure.band.high.max(value) } else { value };
    measure
}

impl Model {
    /// Moves the chosen number by a step, or goes on to the next word.
    pub fn nudge(&mut self, nudge: Nudge) {
        if let Some(choice) = self.chosen_word().cloned() {
            return self.turn(&choice, nudge);
        }
        let Some(input) = self.chosen().cloned() else { return };
        let measure = nudged(&input, nudge);
        if measure == input.measure {
            self.complain(format!("`{}` is at the end of its range", input.path));
            return;
        }
        self.write(&input.path, &value_text(&measure));
    }

    /// Writes a value text into the document; a refusal becomes a notice. True when it was taken.
    pub fn write(&mut self, path: &str, value: &str) -> bool {
        match self.document.with_value(path, value) {
            Ok(document) => {
                self.notice = None;
                self.take(document);
                true
            }
            Err(faults) => {
                self.complain(first_fault(&faults));
                false
            }
        }
    }

    /// Back to the value that the file holds for the chosen input, in the file's own words.
    pub fn restore(&mut self) {
        if let Some(choice) = self.chosen_word().cloned() {
            return self.restore_word(&choice);
        }
        let Some(input) = self.chosen().cloned() else { return };
        let stored = inputs(self.saved.scenario());
        let Some(own) = stored.iter().find(|stored| stored.path == input.path) else {
            return self.complain(format!("the file holds no `{}`", input.path));
        };
        if own.measure == input.measure {
            return self.say(format!("`{}` is at the file's value", input.path));
        }
        match self.rebuilt_without(&input.path, &stored) {
            Ok(Turn::Done { document, .. }) => {
                self.notice = None;
                self.take(*document);
            }
            Ok(Turn::Needs(path)) => self.complain(format!("the file's value needs `{path}`")),
            Err(faults) => self.complain(first_fault(&faults)),
        }
    }

    /// The file's text with every change but that of one input.
    fn rebuilt_without(&self, path: &str, stored: &[Input]) -> Result<Turn, Box<Faults>> {
        let mut changes = Vec::new();
        for entry in &self.entries {
            if let Entry::Word(choice) = entry
                && let Some(word) = self.document.word(choice.path)
                && self.saved.word(choice.path).as_ref() != Some(&word)
            {
                changes.push((choice.path.to_owned(), word));
            }
        }
        for input in self.inputs.iter().filter(|input| input.path != path) {
            let own = stored.iter().find(|stored| stored.path == input.path);
            if own.is_none_or(|own| own.measure != input.measure) {
                let ends_moved = own.is_none_or(|own| !same_ends(&own.measure, &input.measure));
                let text = if ends_moved { format_measure(&input.measure) } else { value_text(&input.measure) };
                changes.push((input.path.clone(), text));
            }
        }
        Ok(self.saved.turned(&borrowed(&changes))?)
    }

    /// Takes back the last change.
    pub fn undo(&mut self) {
        match self.undo.pop() {
            Some(before) => {
                let now = self.exchange(before);
                self.redo.push(now);
            }
            None => self.say("nothing to undo"),
        }
    }

    /// Makes the change again that was taken back last.
    pub fn redo(&mut self) {
        match self.redo.pop() {
            Some(after) => {
                let now = self.exchange(after);
                self.undo.push(now);
            }
            None => self.say("nothing to redo"),
        }
    }

    fn exchange(&mut self, document: Document) -> Document {
        let now = std::mem::replace(&mut self.document, document);
        self.notice = None;
        self.recompute();
        now
    }

    /// Opens the line in which a value is typed, with the present value in it.
    pub fn start_typing(&mut self) {
        let Some(path) = self.chosen_path().map(str::to_owned) else { return };
        let word = self.chosen_word().map(|choice| choice.word.clone());
        let number = self.chosen().map(|input| format_measure(&input.measure));
        let text = tui_input::Input::new(word.or(number).unwrap_or_default());
        self.notice = None;
        self.mode = Mode::Typing(Typing { path, text, ..Typing::default() });
    }

    /// Takes the typed text, asks for what it needs, or shows in place what is wrong with it.
    pub fn finish_typing(&mut self) {
        let Mode::Typing(typing) = &self.mode else { return };
        let (path, text) = (typing.path.clone(), typing.text.value().trim().to_owned());
        let mut changes = typing.before.clone();
        if let Some(fault) = fault_of(&text, &path) {
            return self.set_fault(Some(fault));
        }
        changes.push((path, text));
        match self.document.turned(&borrowed(&changes)) {
            Ok(turn) => self.settle_turn(turn, changes),
            Err(faults) => self.set_fault(Some(first_fault(&faults))),
        }
    }

    /// Judges the text as it stands, for the message below it.
    pub fn judge_typing(&mut self) {
        let Mode::Typing(typing) = &self.mode else { return };
        let fault = fault_of(typing.text.value(), &typing.path);
        self.set_fault(fault);
    }

    fn set_fault(&mut self, words: Option<String>) {
        if let Mode::Typing(typing) = &mut self.mode {
            typing.fault = words;
        }
    }
}

/// What is wrong with the text of a number by itself.
fn fault_of(text: &str, path: &str) -> Option<String> {
    let fault = parse_measure(text.trim(), field_for(path)?.dimension?).err()?;
    Some(format!("{fault}; {}", fault.hint()))
}

/// The typical value alone, in the file's unit.
#[must_use]
pub fn value_text(measure: &Measure) -> String {
    let mut measure = *measure;
    (measure.band.low, measure.band.high) = (measure.band.typical, measure.band.typical);
    format_measure(&measure)
}

fn same_ends(a: &Measure, b: &Measure) -> bool {
    (a.band.low, a.band.high) == (b.band.low, b.band.high)
}

/// The first error of a refused value, with its hint.
#[must_use]
pub fn first_fault(faults: &Faults) -> String {
    let first = faults.faults.iter().find(|fault| fault.severity == Severity::Error).or_else(|| faults.faults.first());
    first.map_or_else(
        || "the value was refused".to_owned(),
        |fault| match &fault.hint {
            Some(hint) => format!("{}; {hint}", fault.message),
            None => fault.message.clone(),
        },
    )
}
