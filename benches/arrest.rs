//! Cost of the vertical arrest.
fn main() {}
