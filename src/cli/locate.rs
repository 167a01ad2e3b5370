//! Faults that are found only after reading, at their place in the file.
use crate::margin::UnknownBasis;
use crate::scenario::{Fault, Faults, Severity, places};

/// An unknown set of limits as a fault of the file.
pub fn unknown_basis(file: &str, text: &str, unknown: &UnknownBasis) -> Faults {
    let nearest = unknown.nearest.map(|name| format!("did you mean `{name}`? ")).unwrap_or_default();
    let hint = format!("{nearest}`underfoot limits` lists the sets");
    one_fault(file, text, "limits.basis", unknown.to_string(), "expected a built-in set or `own`", hint)
}

/// One fault at a path of a file.
pub fn one_fault(file: &str, text: &str, path: &str, message: String, expected: &str, hint: String) -> Faults {
    let fault = Fault {
        severity: Severity::Error,
        span: places(text).of(path),
        message,
        expected: expected.to_owned(),
        hint: Some(hint),
    };
    Faults::new(file, text, vec![fault])
}
