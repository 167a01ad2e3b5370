//! From TOML text to a scenario, collecting every fault.
use super::values::Values;
use super::{Fault, Faults, Scenario, Severity, build, clash, rules};
use std::collections::BTreeMap;
use std::ops::Range;
use toml::de::DeTable;

/// Largest file that is read, bytes.
pub(super) const MOST_BYTES: usize = 1 << 20;

/// Reads the text of a scenario file. Doubts (reserve missing, double counted stretch) do not refuse; see
/// [`super::doubts`].
///
/// # Errors
/// Every fault of the text at once, sorted by place.
pub fn read(file: &str, text: &str) -> Result<Scenario, Faults> {
    read_with_places(file, text).map(|(scenario, _)| scenario)
}

/// Where each key of a file stands, by concrete path.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Places(BTreeMap<String, Range<usize>>);

impl Places {
    /// The bytes of a key's value, if the key stands in the file.
    #[must_use]
    pub fn exactly(&self, path: &str) -> Option<Range<usize>> {
        self.0.get(path).cloned()
    }

    /// The bytes of a key's value; where the key is absent those of its section's name, else the start of the file.
    #[must_use]
    pub fn of(&self, path: &str) -> Range<usize> {
        let mut path = path;
        loop {
            if let Some(span) = self.0.get(path) {
                return span.clone();
            }
            match path.rsplit_once('.') {
                Some((section, _)) => path = section,
                None => return 0..0,
            }
        }
    }
}

/// Where the keys of a text stand; as far as it can be read.
#[must_use]
pub fn places(text: &str) -> Places {
    if text.len() > MOST_BYTES {
        return Places::default();
    }
    let (document, _) = DeTable::parse_recoverable(text);
    Places(Values::of(text, document.get_ref()).spans)
}

/// [`read`], with the places of all keys.
///
/// # Errors
/// As [`read`].
pub fn read_with_places(file: &str, text: &str) -> Result<(Scenario, Places), Faults> {
    if text.len() > MOST_BYTES {
        let hint = Some("a scenario file is a few kilobytes of text".to_owned());
        let message = format!("the file has {} bytes, more than 1 MiB", text.len());
        let fault = Fault { severity: Severity::Error, span: 0..0, message, expected: "too large".into(), hint };
        return Err(Faults::new(file, "", vec![fault]));
    }
    let (document, syntax) = DeTable::parse_recoverable(text);
    let mut values = Values::of(text, document.get_ref());
    if !syntax.is_empty() {
        return Err(Faults::new(file, text, with_syntax(text, &syntax, values.faults)));
    }
    rules::check(text, &mut values);
    let scenario = build::scenario(&mut values);
    if let (Some(scenario), true) = (&scenario, values.faults.is_empty()) {
        let places = Places(values.spans.clone());
        values.faults.extend(clash::clashes(scenario).into_iter().map(|clash| clash.at(&places)));
    }
    match scenario {
        Some(scenario) if values.faults.is_empty() => Ok((scenario, Places(values.spans))),
        _ => Err(Faults::new(file, text, values.faults)),
    }
}

/// Syntax errors, the first of each line, and the other faults of lines without one.
pub(super) fn with_syntax(text: &str, errors: &[toml::de::Error], others: Vec<Fault>) -> Vec<Fault> {
    let line = |at: usize| text.as_bytes()[..at.min(text.len())].split(|byte| *byte == b'\n').count();
    let mut faults: Vec<Fault> = Vec::new();
    for error in errors {
        let span = error.span().unwrap_or(0..0);
        if faults.iter().all(|fault| line(fault.span.start) != line(span.start)) {
            faults.push(syntax_fault(text, span, error.message()));
        }
    }
    let lines: Vec<usize> = faults.iter().map(|fault| line(fault.span.start)).collect();
    faults.extend(others.into_iter().filter(|fault| !lines.contains(&line(fault.span.start))));
    faults
}

fn syntax_fault(text: &str, span: Range<usize>, message: &str) -> Fault {
    let first = message.lines().next().unwrap_or("not readable").trim_end_matches('.');
    let mut message = String::with_capacity(first.len());
    message.extend(first.chars().next().map(|c| c.to_ascii_lowercase()));
    message.extend(first.chars().skip(1));
    let hint = unquoted_quantity(text, span.start).map_or_else(
        || "the file is TOML: `[section]` lines, then `key = \"value\"` lines".to_owned(),
        |line| format!("quantities and words stand in quotes: `{line}`"),
    );
    Fault { severity: Severity::Error, span, message, expected: "not readable as TOML".into(), hint: Some(hint) }
}

/// `mass = 100 kg` as it should be: `mass = "100 kg"`.
fn unquoted_quantity(text: &str, at: usize) -> Option<String> {
    let start = text.get(..at)?.rfind('\n').map_or(0, |n| n + 1);
    let line = text.get(start..)?.lines().next()?;
    let (key, value) = line.split_once('=')?;
    let (key, value) = (key.trim(), value.split('#').next()?.trim());
    let word = |c: char| c.is_ascii_alphanumeric() || c == '_' || c == '.';
    let plain = |c: char| c.is_ascii_alphanumeric() || " ./%-".contains(c);
    (key.chars().all(word) && !value.is_empty() && value.chars().all(plain)).then(|| format!("{key} = \"{value}\""))
}
