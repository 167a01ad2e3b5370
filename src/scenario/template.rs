//! The annotated file that `underfoot new` prints.

/// An annotated scenario that reads without a fault.
#[must_use]
pub fn new_file() -> String {
    todo!()
}
