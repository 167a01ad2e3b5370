//! A check by hand of a calculation sheet: nothing here knows the program but what it prints.
pub mod motion;
pub mod page;
