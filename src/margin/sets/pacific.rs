//! Sets of Queensland and Singapore.
use super::super::limit::Mark::Published;
use super::super::limit::{Applies, LimitKind as K, LimitSet, WrittenFor};
use super::{factor, least, most};
use crate::quantity::Unit;

const QLD: &str = "WHS Regulation 2011 (Qld) s.306I";
const WSH: &str = "WSH Council guideline s.3.9.1-3.9.3, 3.10";

/// Queensland.
pub const AU_QLD: LimitSet = LimitSet {
    name: "au-qld",
    scope: "Queensland regulation for work health and safety: fall arrest systems and their anchorages",
    written_for: WrittenFor::ANY,
    limits: &[
        most(K::ArrestForce, "absorber holds the arrest force to", (6.0, Unit::Kilonewton), (QLD, Published)),
        least(K::AnchorStrength, "anchor, free fall", (15.0, Unit::Kilonewton), (QLD, Published))
            .or(K::AnchorStrengthConditional)
            .remark("12 kN for a limited free fall, 21 kN for two persons"),
        least(K::AnchorStrengthConditional, "anchor, limited free fall", (12.0, Unit::Kilonewton), (QLD, Published))
            .only(Applies::Elsewhere),
        least(K::AnchorStrengthConditional, "anchor, two persons", (21.0, Unit::Kilonewton), (QLD, Published))
            .only(Applies::Elsewhere),
    ],
};

/// Singapore.
pub const SG_WSH: LimitSet = LimitSet {
    name: "sg-wsh",
    scope: "Singapore guideline for work at height: horizontal lifelines; the deflection counts in full in the clearance",
    written_for: WrittenFor::ANY,
    limits: &[
        factor(
            K::SpanFactor,
            "horizontal lifeline of wire: strength over the largest line load",
            2.0,
            (WSH, Published),
        )
        .only(Applies::WireSpan),
        factor(
            K::SpanFactor,
            "horizontal lifeline of webbing or fibre: strength over the largest line load",
            3.0,
            (WSH, Published),
        )
        .only(Applies::FibreSpan)
        .or(K::SpanFactor)
        .remark("2 for a lifeline of wire; the deflection counts in full in the clearance"),
    ],
};
