//! Changing inputs: nudging, typing, undo, back to the file's value.
use super::model::{Mode, Model, Typing};
use crate::quantity::{Dimension, Measure, Unit, format_measure, parse_measure};
use crate::scenario::{Document, Faults, Input, Severity, inputs};
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
    /// Moves the chosen input by a step.
    pub fn nudge(&mut self, nudge: Nudge) {
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
        let Some(input) = self.chosen().cloned() else { return };
        let stored = inputs(self.saved.scenario());
        let Some(own) = stored.iter().find(|stored| stored.path == input.path) else {
            return self.complain(format!("the file holds no `{}`", input.path));
        };
        if own.measure == input.measure {
            return self.say(format!("`{}` is at the file's value", input.path));
        }
        match self.rebuilt_without(&input.path, &stored) {
            Ok(document) => {
                self.notice = None;
                self.take(document);
            }
            Err(faults) => self.complain(first_fault(&faults)),
        }
    }

    /// The file's text with every change but that of one input.
    fn rebuilt_without(&self, path: &str, stored: &[Input]) -> Result<Document, Box<Faults>> {
        let mut document = self.saved.clone();
        for input in self.inputs.iter().filter(|input| input.path != path) {
            let own = stored.iter().find(|stored| stored.path == input.path);
            if own.is_none_or(|own| own.measure != input.measure) {
                let ends_moved = own.is_none_or(|own| !same_ends(&own.measure, &input.measure));
                let text = if ends_moved { format_measure(&input.measure) } else { value_text(&input.measure) };
                document = document.with_value(&input.path, &text)?;
            }
        }
        Ok(document)
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
        let Some(input) = self.chosen() else { return };
        let text = tui_input::Input::new(format_measure(&input.measure));
        self.notice = None;
        self.mode = Mode::Typing(Typing { text, fault: None });
    }

    /// Takes the typed text, or shows in place what is wrong with it.
    pub fn finish_typing(&mut self) {
        let Mode::Typing(typing) = &self.mode else { return };
        let text = typing.text.value().trim().to_owned();
        let Some(input) = self.chosen().cloned() else { return };
        let fault = fault_of(&text, input.field.dimension).or_else(|| {
            let refused = self.document.with_value(&input.path, &text).err();
            refused.map(|faults| first_fault(&faults))
        });
        if fault.is_some() {
            return self.set_fault(fault);
        }
        self.mode = Mode::Commands;
        self.write(&input.path, &text);
    }

    /// Judges the text as it stands, for the message below it.
    pub fn judge_typing(&mut self) {
        let Mode::Typing(typing) = &self.mode else { return };
        let text = typing.text.value().to_owned();
        let dimension = self.chosen().and_then(|input| input.field.dimension);
        self.set_fault(fault_of(&text, dimension));
    }

    fn set_fault(&mut self, words: Option<String>) {
        if let Mode::Typing(typing) = &mut self.mode {
            typing.fault = words;
        }
    }
}

fn fault_of(text: &str, dimension: Option<Dimension>) -> Option<String> {
    let fault = parse_measure(text.trim(), dimension?).err()?;
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
