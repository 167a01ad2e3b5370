//! The built-in sets as data.
mod america;
mod europe;
mod pacific;
mod standards;

use super::limit::{Applies, Bound, LimitKind, LimitSet, Mark, PublishedLimit};
use crate::quantity::Unit;

/// Every built-in set, in the order in which they are listed.
pub(super) const SETS: &[LimitSet] = &[
    america::US_1926,
    america::US_1910,
    europe::EU_363,
    standards::ISO_10333_1,
    standards::ISO_10333_2,
    america::CA_ON,
    america::CA_QC,
    america::CA_AB,
    pacific::AU_QLD,
    pacific::SG_WSH,
    standards::ROPE_892,
    standards::ROPE_1891,
];

const fn limit(
    kind: LimitKind,
    bound: Bound,
    quantity: &'static str,
    value: (f64, Unit),
    source: (&'static str, Mark),
) -> PublishedLimit {
    PublishedLimit {
        kind,
        quantity,
        bound,
        value: value.0,
        unit: value.1,
        applies: Applies::Every,
        clause: source.0,
        mark: source.1,
        or: None,
        remark: None,
    }
}

const fn most(
    kind: LimitKind,
    quantity: &'static str,
    value: (f64, Unit),
    source: (&'static str, Mark),
) -> PublishedLimit {
    limit(kind, Bound::AtMost, quantity, value, source)
}

const fn least(
    kind: LimitKind,
    quantity: &'static str,
    value: (f64, Unit),
    source: (&'static str, Mark),
) -> PublishedLimit {
    limit(kind, Bound::AtLeast, quantity, value, source)
}

const fn factor(kind: LimitKind, quantity: &'static str, value: f64, source: (&'static str, Mark)) -> PublishedLimit {
    limit(kind, Bound::Factor, quantity, (value, Unit::One), source)
}
