//! Two scenarios beside each other: inputs, numbers and verdicts that differ.
use crate::estimate::{Number, Numbers, Value};
use crate::margin::{Margin, Verdict};
use crate::quantity::{Measure, Shape, format_measure};
use crate::scenario::{Scenario, field_for, inputs};

/// Differences of numbers below this share of the larger one are rounding.
pub const SAME_SHARE: f64 = 1e-9;
/// The same near zero, SI.
const SAME: f64 = 1e-12;

/// One side of a comparison.
#[derive(Clone, Copy, Debug)]
pub struct Side<'a> {
    /// The text of the file.
    pub text: &'a str,
    /// What it means.
    pub scenario: &'a Scenario,
    /// Its numbers.
    pub numbers: &'a Numbers,
    /// Its checks.
    pub margins: &'a [Margin],
}

/// One key of the file that differs; none where a file does not state it.
#[derive(Clone, Debug, PartialEq)]
pub struct InputChange {
    /// Concrete path.
    pub path: String,
    /// As the first file states it, with its unit.
    pub before: Option<String>,
    /// As the second file states it.
    pub after: Option<String>,
    /// The values of both, with their bands, where the key is a quantity.
    pub measures: [Option<Measure>; 2],
}

/// One number that differs; none where it does not apply.
#[derive(Clone, Debug, PartialEq)]
pub struct NumberChange {
    /// Of the first file.
    pub before: Option<Number>,
    /// Of the second file.
    pub after: Option<Number>,
}

/// One check whose verdict differs; none where it does not apply.
#[derive(Clone, Debug, PartialEq)]
pub struct VerdictChange {
    /// Of the first file.
    pub before: Option<Margin>,
    /// Of the second file.
    pub after: Option<Margin>,
}

impl VerdictChange {
    /// True when the second file is worse off: a worse word, a check that the first did not have and that does not
    /// hold, or a check that is no longer made.
    #[must_use]
    pub fn is_worse(&self) -> bool {
        match (&self.before, &self.after) {
            (Some(before), Some(after)) => after.verdict > before.verdict,
            (None, Some(after)) => after.verdict != Verdict::Holds,
            (Some(_), None) => true,
            (None, None) => false,
        }
    }
}

/// Everything that differs.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Comparison {
    /// Keys, in the order of the first file, then those of the second alone.
    pub inputs: Vec<InputChange>,
    /// Numbers beyond [`SAME_SHARE`].
    pub numbers: Vec<NumberChange>,
    /// Verdicts, also of checks that only one file has.
    pub verdicts: Vec<VerdictChange>,
}

impl Comparison {
    /// True when a check of the second file is worse than in the first, see [`VerdictChange::is_worse`].
    #[must_use]
    pub fn is_worse(&self) -> bool {
        self.verdicts.iter().any(VerdictChange::is_worse)
    }
}

/// Compares two scenarios.
#[must_use]
pub fn compare(a: &Side<'_>, b: &Side<'_>) -> Comparison {
    let numbers = pairs(a.numbers.iter(), b.numbers.iter(), |n| &n.id);
    let margins = pairs(a.margins.iter(), b.margins.iter(), |m| &m.id);
    Comparison {
        inputs: changed_inputs(a, b),
        numbers: numbers
            .into_iter()
            .filter(|(x, y)| !same_number(*x, *y))
            .map(|(x, y)| NumberChange { before: x.cloned(), after: y.cloned() })
            .collect(),
        verdicts: margins
            .into_iter()
            .filter(|(x, y)| x.map(|m| m.verdict) != y.map(|m| m.verdict))
            .map(|(x, y)| VerdictChange { before: x.cloned(), after: y.cloned() })
            .collect(),
    }
}

/// Entries of two lists joined by a key: those of the first list, then those that only the second has.
fn pairs<'a, T>(
    a: impl Iterator<Item = &'a T>,
    b: impl Iterator<Item = &'a T>,
    key: fn(&T) -> &String,
) -> Vec<(Option<&'a T>, Option<&'a T>)> {
    let a: Vec<&T> = a.collect();
    let b: Vec<&T> = b.collect();
    let both = a.iter().map(|x| (Some(*x), b.iter().find(|y| key(y) == key(x)).copied()));
    let later = b.iter().filter(|y| !a.iter().any(|x| key(x) == key(y))).map(|y| (None, Some(*y)));
    both.chain(later).collect()
}

fn same_number(a: Option<&Number>, b: Option<&Number>) -> bool {
    match (a.map(|n| &n.value), b.map(|n| &n.value)) {
        (Some(Value::Number(x)), Some(Value::Number(y))) => close(*x, *y),
        (x, y) => x == y,
    }
}

fn close(x: f64, y: f64) -> bool {
    (x - y).abs() <= (SAME_SHARE * x.abs().max(y.abs())).max(SAME)
}

fn same_measure(x: &Measure, y: &Measure) -> bool {
    let ends = |m: &Measure| [m.band.low, m.band.typical, m.band.high];
    ends(x).into_iter().zip(ends(y)).all(|(x, y)| close(x, y)) && x.band.shape == y.band.shape
}

/// A key with its value as the file states it, and as a measure where it is one.
struct Stated {
    path: String,
    words: String,
    measure: Option<Measure>,
}

fn changed_inputs(a: &Side<'_>, b: &Side<'_>) -> Vec<InputChange> {
    let (a, b) = (stated(a), stated(b));
    let same = |x: &Stated, y: &Stated| match (&x.measure, &y.measure) {
        (Some(x), Some(y)) => same_measure(x, y),
        _ => x.words == y.words,
    };
    pairs(a.iter(), b.iter(), |s| &s.path)
        .into_iter()
        .filter(|pair| !matches!(pair, (Some(x), Some(y)) if same(x, y)))
        .map(|(x, y)| InputChange {
            path: x.or(y).map(|s| s.path.clone()).unwrap_or_default(),
            before: x.map(|s| s.words.clone()),
            after: y.map(|s| s.words.clone()),
            measures: [x, y].map(|side| side.and_then(|s| s.measure)),
        })
        .collect()
}

/// A measure with the shape of its band, where that is not the usual one.
fn measure_words(measure: &Measure) -> String {
    let words = format_measure(measure);
    match (measure.band.is_wide(), measure.band.shape) {
        (true, Shape::Triangular) => format!("{words} (triangular)"),
        (true, Shape::Normal) => format!("{words} (normal)"),
        _ => words,
    }
}

/// Every key of a file, numbers and words alike, so that no difference goes unsaid.
fn stated(side: &Side<'_>) -> Vec<Stated> {
    let known = inputs(side.scenario);
    let mut leaves = Vec::new();
    if let Ok(table) = side.text.parse::<toml::Table>() {
        flatten("", &toml::Value::Table(table), &mut leaves);
    }
    let measured = |(path, words): (String, String)| {
        let measure = known.iter().find(|input| input.path == path).map(|input| input.measure);
        let words = measure.as_ref().map_or(words, measure_words);
        Stated { path, words, measure }
    };
    leaves.into_iter().map(measured).collect()
}

fn flatten(path: &str, value: &toml::Value, leaves: &mut Vec<(String, String)>) {
    let below = |key: &str| if path.is_empty() { key.to_owned() } else { format!("{path}.{key}") };
    match value {
        toml::Value::Table(table) if field_for(path).is_none() => {
            table.iter().for_each(|(key, value)| flatten(&below(key), value, leaves));
        }
        toml::Value::Array(list) if field_for(path).is_none() => {
            let numbered = list.iter().enumerate();
            numbered.for_each(|(i, value)| flatten(&below(&(i + 1).to_string()), value, leaves));
        }
        toml::Value::String(words) => leaves.push((path.to_owned(), words.clone())),
        other => leaves.push((path.to_owned(), other.to_string())),
    }
}
