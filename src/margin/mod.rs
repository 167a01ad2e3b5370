//! Published limits as data, the checks against them, and the verdicts.
mod check;
mod limit;
mod verdict;

pub use check::{Basis, Margin, Sense, UnknownBasis, margins};
pub use limit::{LimitSet, Mark, PublishedLimit, limit_set, limit_sets};
pub use verdict::{Verdict, worst};
