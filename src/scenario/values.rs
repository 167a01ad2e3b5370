//! The first pass over a file: every key to its value and place, every fault of a single value.
use super::field::{ACCEPT, Field, LISTS, field_for, list_of, pattern_of};
use super::keys::FIELDS;
use super::{Fault, Severity, leaf, table};
use crate::quantity::Measure;
use std::collections::BTreeMap;
use std::ops::Range;
use toml::Spanned;
use toml::de::{DeTable, DeValue};

/// More obstacles and faces than a hand-written file has.
const MOST_ENTRIES: usize = 200;

/// What the file holds, by concrete path.
#[derive(Default)]
pub(super) struct Values {
    /// Quantities that were read.
    pub measures: BTreeMap<String, Measure>,
    /// Words, names and free text that were read.
    pub words: BTreeMap<String, String>,
    /// The reasons of single limits.
    pub whys: BTreeMap<String, String>,
    /// Where each key's value stands, also of refused ones; sections stand at their name.
    pub spans: BTreeMap<String, Range<usize>>,
    /// Tables that were read, SI.
    pub tables: BTreeMap<String, Vec<(f64, f64)>>,
    /// How many obstacles and faces there are, by the name of the list.
    pub counts: BTreeMap<&'static str, usize>,
    /// What was wrong.
    pub faults: Vec<Fault>,
}

impl Values {
    /// Reads a whole document.
    pub fn of(text: &str, document: &DeTable<'_>) -> Self {
        let mut values = Self::default();
        values.walk(text, "", document);
        values
    }

    /// True when the key stands in the file, readable or not.
    pub fn has(&self, path: &str) -> bool {
        self.spans.contains_key(path)
    }

    /// How many entries a list has.
    pub fn count(&self, list: &str) -> usize {
        self.counts.get(list).copied().unwrap_or(0)
    }

    /// Notes an error.
    pub fn error(&mut self, span: Range<usize>, message: String, expected: &str, hint: Option<String>) {
        let expected = expected.to_owned();
        self.faults.push(Fault { severity: Severity::Error, span, message, expected, hint });
    }

    fn walk(&mut self, text: &str, prefix: &str, table: &DeTable<'_>) {
        for (key, value) in table {
            let name = key.get_ref().as_ref();
            let path = if prefix.is_empty() { name.to_owned() } else { format!("{prefix}.{name}") };
            match (plain(name), field_for(&path)) {
                (true, Some(field)) => {
                    self.spans.insert(path.clone(), value.span());
                    match field.columns {
                        Some(columns) => table::read(self, text, &path, field, columns, value),
                        None => leaf::read(self, text, &path, field, value),
                    }
                }
                (true, None) if is_section(&path) => self.section(text, &path, key.span(), value),
                _ => {
                    let meant = self.unknown(prefix, name, key.span());
                    if let Some(section) = meant.filter(|meant| is_section(meant) && value.get_ref().is_table()) {
                        self.section(text, &section, key.span(), value);
                    }
                }
            }
        }
    }

    fn section(&mut self, text: &str, path: &str, at: Range<usize>, value: &Spanned<DeValue<'_>>) {
        if value.get_ref().is_table() || value.get_ref().is_array() {
            self.spans.insert(path.to_owned(), at.clone());
        }
        let list = LISTS.into_iter().find(|list| *list == path);
        match (list, value.get_ref()) {
            (Some(list), DeValue::Array(entries)) if entries.iter().all(|entry| entry.get_ref().is_table()) => {
                self.list(text, list, entries.iter());
            }
            (Some(list), _) => {
                let hint = Some(format!("write each {list} below a line `[[{list}]]` of its own"));
                self.error(at, format!("`{list}` is not a list"), &format!("expected [[{list}]]"), hint);
            }
            (_, DeValue::Table(table)) => self.walk(text, path, table),
            _ => {
                let keys = children(path).collect::<Vec<_>>().join("`, `");
                let hint = Some(format!("`{path}` holds `{keys}`"));
                self.error(value.span(), format!("`{path}` is not a section"), "expected keys of its own", hint);
            }
        }
    }

    fn list<'v, 'i: 'v>(
        &mut self,
        text: &str,
        list: &'static str,
        entries: impl Iterator<Item = &'v Spanned<DeValue<'i>>>,
    ) {
        for (index, entry) in entries.enumerate() {
            if let Some((what, hint)) = self.is_full(list) {
                let message = format!("more than {MOST_ENTRIES} {what}");
                return self.error(entry.span(), message, "one too many", Some(hint.to_owned()));
            }
            *self.counts.entry(list).or_default() += 1;
            let path = format!("{list}.{}", index + 1);
            self.spans.insert(path.clone(), entry.span());
            if let Some(table) = entry.get_ref().as_table() {
                self.walk(text, &path, table);
            }
        }
    }

    /// Whether a list takes no further entry: what there are too many of, and what to do.
    fn is_full(&self, list: &str) -> Option<(&'static str, &'static str)> {
        let accepted = self.count(ACCEPT);
        if list == ACCEPT {
            return (accepted == MOST_ENTRIES)
                .then_some(("accepted doubts", "put the inputs right; accept what is left"));
        }
        (self.counts.values().sum::<usize>() - accepted == MOST_ENTRIES)
            .then_some(("obstacles and faces", "keep the obstacles and faces that the subject can reach"))
    }

    /// Notes an unknown key; returns the path that was probably meant.
    fn unknown(&mut self, prefix: &str, name: &str, at: Range<usize>) -> Option<String> {
        let shown = quoted(name);
        let message = if prefix.is_empty() {
            format!("unknown key {shown}")
        } else {
            format!("unknown key {shown} in `{prefix}`")
        };
        let known: Vec<&str> = children(prefix).collect();
        let near = nearest(name, known.iter().copied());
        let hint = if let Some(near) = near {
            format!("did you mean `{near}`?")
        } else if let Some(field) = FIELDS.iter().find(|field| field.key() == name) {
            format!("`{name}` belongs elsewhere: `{}`", field.path)
        } else {
            format!("known here: `{}`", known.join("`, `"))
        };
        self.error(at.clone(), message, "not a key of this file format", Some(hint));
        let meant = near.map(|near| if prefix.is_empty() { near.to_owned() } else { format!("{prefix}.{near}") })?;
        // What was meant counts as present: one slip of the pen is one fault.
        self.spans.entry(meant.clone()).or_insert(at);
        Some(meant)
    }

    /// A word out of a list, or a fault.
    pub fn word(&mut self, path: &str, field: &Field, at: Range<usize>, word: &str) {
        if field.words.is_empty() || field.words.contains(&word) {
            self.words.insert(path.to_owned(), word.to_owned());
        } else {
            let list = field.words.join("`, `");
            let hint = match nearest(word, field.words.iter().copied()) {
                Some(near) => format!("did you mean `{near}`? known: `{list}`"),
                None => format!("known: `{list}`"),
            };
            self.error(
                at,
                format!("unknown {} {}", field.label, quoted(word)),
                "expected one of the known words",
                Some(hint),
            );
        }
    }
}

/// A key that can be part of a path: quoted keys with points or digits alone cannot.
fn plain(name: &str) -> bool {
    !name.is_empty()
        && name.bytes().all(|b| b.is_ascii_lowercase() || b.is_ascii_digit() || b == b'_')
        && !name.bytes().all(|b| b.is_ascii_digit())
}

/// True when keys stand below the path.
pub(super) fn is_section(path: &str) -> bool {
    LISTS.contains(&path) || children(path).next().is_some()
}

/// The names that may stand directly below a path, each once.
fn children(prefix: &str) -> impl Iterator<Item = &'static str> {
    let pattern = if list_of(prefix).is_some() { pattern_of(prefix) } else { prefix.to_owned() };
    let mut last = "";
    FIELDS.iter().filter_map(move |field| {
        let rest =
            if pattern.is_empty() { field.path } else { field.path.strip_prefix(&pattern)?.strip_prefix('.')? };
        let name = rest.split('.').next()?;
        if name == last || name == "*" {
            return None;
        }
        last = name;
        Some(name)
    })
}

/// The known name that was probably meant: few letters off.
pub(super) fn nearest(name: &str, known: impl Iterator<Item = &'static str>) -> Option<&'static str> {
    known
        .map(|candidate| (strsim::jaro_winkler(&name.to_lowercase(), candidate), candidate))
        .filter(|(likeness, _)| *likeness > 0.8)
        .max_by(|a, b| a.0.total_cmp(&b.0))
        .map(|(_, candidate)| candidate)
}

/// A file's own text inside a message: in back-quotes, short, without control characters.
pub(super) fn quoted(text: &str) -> String {
    const LONGEST: usize = 40;
    let clean: String = text.chars().take(LONGEST).map(|c| if c.is_control() { '?' } else { c }).collect();
    let more = if text.chars().count() > LONGEST { ".." } else { "" };
    format!("`{clean}{more}`")
}
