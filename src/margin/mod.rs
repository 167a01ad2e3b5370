//! Published limits as data, the checks against them, and the verdicts.
mod beside;
mod check;
mod disagreement;
mod doubt;
mod judge;
mod limit;
mod name;
mod numeric;
mod rules;
mod sets;
mod sideways;
mod span;
mod stretch;
mod verdict;
mod words;

pub use check::{Basis, Margin, Sense, UnknownBasis, governing_first, margins, margins_from, margins_in};
pub use disagreement::{Disagreement, disagreements};
pub use doubt::doubts;
pub use judge::{Cause, Check, CheckKind, Impact, judge};
pub use limit::{Applies, Bound, LimitKind, LimitSet, Mark, PublishedLimit, WrittenFor, limit_set, limit_sets};
pub use numeric::checks;
pub use rules::{Rules, Ruling};
pub use verdict::{Verdict, worst};
pub use words::{margin_of, remarks};
