//! Picks the command line or the screen.
fn main() {}
