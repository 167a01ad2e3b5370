//! The rows of the inputs: numbers, and the words that decide what applies (kinds, the set of limits).
use super::edit::{Nudge, first_fault};
use super::model::{Mode, Model, Typing};
use crate::margin::limit_sets;
use crate::quantity::format_measure;
use crate::scenario::{Document, Field, Input, Need, Turn, field_for, inputs};

/// Words that the screen offers, in file order.
const WORDS: [&str; 4] = ["subject.kind", "line.kind", "anchor.kind", "limits.basis"];

/// One row of the inputs.
#[derive(Clone, Debug, PartialEq)]
pub enum Entry {
    /// A number: its index among the inputs.
    Number(usize),
    /// A word.
    Word(Choice),
}

/// A word out of a list.
#[derive(Clone, Debug, PartialEq)]
pub struct Choice {
    /// Where it stands in the file.
    pub path: &'static str,
    /// Its key's entry in the table.
    pub field: &'static Field,
    /// The present word; what its absence means where it is absent.
    pub word: String,
}

impl Choice {
    fn of(path: &'static str, document: &Document) -> Option<Self> {
        let field = field_for(path)?;
        let absent = if let Need::Default(word) = field.need { word } else { "none" };
        Some(Self { path, field, word: document.word(path).unwrap_or_else(|| absent.to_owned()) })
    }

    /// The words it may hold.
    #[must_use]
    pub fn words(&self) -> Vec<&'static str> {
        if self.path == "limits.basis" {
            return limit_sets().iter().map(|set| set.name).chain(["own"]).collect();
        }
        self.field.words.to_vec()
    }

    /// The other words, nearest first in one direction, around the end of the list.
    fn others(&self, nudge: Nudge) -> Vec<&'static str> {
        let mut words = self.words();
        if nudge.is_down() {
            words.reverse();
        }
        if let Some(here) = words.iter().position(|word| *word == self.word) {
            words.rotate_left(here);
            words.remove(0);
        }
        words
    }
}

/// Every row: the numbers in their order, each word before the first number that follows it in the file.
#[must_use]
pub fn entries(document: &Document, inputs: &[Input]) -> Vec<Entry> {
    let order = |path: &str| crate::scenario::FIELDS.iter().position(|field| field.path == path);
    let mut words = WORDS.into_iter().filter_map(|path| Choice::of(path, document)).peekable();
    let mut entries = Vec::new();
    for (index, input) in inputs.iter().enumerate() {
        let is_general = !input.path.contains('.');
        while let Some(word) = words.next_if(|word| is_general || order(word.path) < order(input.field.path)) {
            entries.push(Entry::Word(word));
        }
        entries.push(Entry::Number(index));
    }
    entries.extend(words.map(Entry::Word));
    entries
}

impl Model {
    /// The chosen number.
    #[must_use]
    pub fn chosen(&self) -> Option<&Input> {
        match self.entries.get(self.input)? {
            Entry::Number(index) => self.inputs.get(*index),
            Entry::Word(_) => None,
        }
    }

    /// The chosen word.
    #[must_use]
    pub fn chosen_word(&self) -> Option<&Choice> {
        match self.entries.get(self.input)? {
            Entry::Number(_) => None,
            Entry::Word(choice) => Some(choice),
        }
    }

    /// Path of a row.
    #[must_use]
    pub fn path_of<'m>(&'m self, entry: &'m Entry) -> &'m str {
        match entry {
            Entry::Number(index) => self.inputs.get(*index).map_or("", |input| &input.path),
            Entry::Word(choice) => choice.path,
        }
    }

    /// Path of the chosen row.
    #[must_use]
    pub fn chosen_path(&self) -> Option<&str> {
        self.entries.get(self.input).map(|entry| self.path_of(entry))
    }

    /// The next word that the file can hold; a refused one is passed over and named.
    pub(super) fn turn(&mut self, choice: &Choice, nudge: Nudge) {
        let mut refused: Option<(&str, String)> = None;
        for word in choice.others(nudge) {
            match self.document.turned(&[(choice.path, word)]) {
                Ok(turn) => {
                    self.settle_turn(turn, vec![(choice.path.to_owned(), word.to_owned())]);
                    if let (Some((word, why)), None) = (refused, &self.notice) {
                        self.say(format!("passed over `{word}`: {why}"));
                    }
                    return;
                }
                Err(faults) => refused = refused.or_else(|| Some((word, first_fault(&faults)))),
            }
        }
        self.complain(refused.map_or_else(|| format!("`{}` has no other word", choice.path), |(_, why)| why));
    }

    /// Takes a change, or asks for the key that it needs.
    pub(super) fn settle_turn(&mut self, turn: Turn, changes: Vec<(String, String)>) {
        self.notice = None;
        match turn {
            Turn::Done { document, taken_out } => {
                self.mode = Mode::Commands;
                self.take(*document);
                if !taken_out.is_empty() {
                    self.say(format!(
                        "took out `{}`, which no longer applies; u undoes it all",
                        taken_out.join("`, `")
                    ));
                }
            }
            Turn::Needs(path) => {
                self.mode = Mode::Typing(Typing { path, before: changes, ..Typing::default() });
            }
        }
    }

    /// Back to the file's word, with the values that the file has for it.
    pub(super) fn restore_word(&mut self, choice: &Choice) {
        let Some(word) = self.saved.word(choice.path) else {
            return self.say(format!("the file holds no `{}`", choice.path));
        };
        if word == choice.word {
            return self.say(format!("`{}` is at the file's word", choice.path));
        }
        let mut changes = vec![(choice.path.to_owned(), word)];
        changes.extend(self.lost_beside(choice));
        match self.document.turned(&borrowed(&changes)) {
            Ok(turn) => self.settle_turn(turn, changes),
            Err(faults) => self.complain(first_fault(&faults)),
        }
    }

    /// What the file holds in the word's section and the present state lacks.
    fn lost_beside(&self, choice: &Choice) -> Vec<(String, String)> {
        let section = choice.path.split_inclusive('.').next().unwrap_or_default();
        let is_lost = |stored: &Input| {
            stored.path.starts_with(section) && self.inputs.iter().all(|input| input.path != stored.path)
        };
        let value = |stored: &Input| self.saved.word(&stored.path).unwrap_or_else(|| format_measure(&stored.measure));
        let stored = inputs(self.saved.scenario());
        stored.iter().filter(|stored| is_lost(stored)).map(|stored| (stored.path.clone(), value(stored))).collect()
    }
}

/// The changes as the document takes them.
pub(super) fn borrowed(changes: &[(String, String)]) -> Vec<(&str, &str)> {
    changes.iter().map(|(path, value)| (path.as_str(), value.as_str())).collect()
}
