//! Where in a file an input stands, for faults that are found only after reading.
use crate::margin::UnknownBasis;
use crate::scenario::{Fault, Faults, Severity};
use std::ops::Range;
use toml::de::{DeTable, DeValue};

/// The bytes of the value at a path (`limits.basis`, `obstacle.2.top`), else of the nearest table above it, else
/// the start of the text.
pub fn span_of(text: &str, path: &str) -> Range<usize> {
    let Ok(root) = DeTable::parse(text) else { return 0..0 };
    let mut span = 0..0;
    let mut here: Option<&DeValue<'_>> = None;
    for (i, part) in path.split('.').enumerate() {
        let found = match here {
            None if i == 0 => root.get_ref().get(part),
            Some(DeValue::Table(table)) => table.get(part),
            Some(DeValue::Array(list)) => {
                part.parse::<usize>().ok().and_then(|n| n.checked_sub(1)).and_then(|n| list.get(n))
            }
            _ => None,
        };
        let Some(found) = found else { break };
        span = found.span();
        here = Some(found.get_ref());
    }
    span
}

/// An unknown set of limits as a fault of the file.
pub fn unknown_basis(file: &str, text: &str, unknown: &UnknownBasis) -> Faults {
    let nearest = unknown.nearest.map(|name| format!("did you mean `{name}`? ")).unwrap_or_default();
    one_fault(
        file,
        text,
        "limits.basis",
        unknown.to_string(),
        "the name of a built-in set, or `own`",
        format!("{nearest}`underfoot limits` lists the sets"),
    )
}

/// One fault at a path of a file.
pub fn one_fault(file: &str, text: &str, path: &str, message: String, expected: &str, hint: String) -> Faults {
    let fault = Fault {
        severity: Severity::Error,
        span: span_of(text, path),
        message,
        expected: expected.to_owned(),
        hint: Some(hint),
    };
    Faults { file: file.to_owned(), text: text.to_owned(), faults: vec![fault] }
}
