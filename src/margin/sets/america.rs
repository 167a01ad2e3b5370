//! Sets of the United States and of Canadian provinces.
use super::super::limit::Mark::{Memory, Published, Secondary};
use super::super::limit::{Applies, LimitKind as K, LimitSet, WrittenFor};
use super::{factor, least, most};
use crate::quantity::Unit;

const KN_8: &str = "the source prints 8 kN beside it; 1800 lbf is 8.007 kN";

/// United States, construction.
pub const US_1926: LimitSet = LimitSet {
    name: "us-1926",
    scope: "United States federal rules for construction work: personal fall arrest systems with a body harness",
    written_for: WrittenFor::ANY,
    limits: &[
        most(K::ArrestForce, "arrest force, body harness", (1800.0, Unit::PoundForce), ("29 CFR 1926.502(d)(16)(ii)", Published)).remark(KN_8),
        most(K::FreeFall, "free-fall distance", (6.0, Unit::Foot), ("29 CFR 1926.502(d)(16)(iii)", Published))
            .remark("and no contact with a lower level; the source prints 1.8 m beside it"),
        most(
            K::DecelerationDistance,
            "deceleration distance, 42 in (absorber travel, lifeline elongation excluded)",
            (3.5, Unit::Foot),
            ("29 CFR 1926.502(d)(16)(iv); 1926.500(b) definition", Published),
        ),
        factor(
            K::LineFactor,
            "strength of the system: factor on the arrest force",
            2.0,
            ("29 CFR 1926.502(d)(16)(v); OSHA interpretation letter 1995-02-09", Secondary),
        )
        .remark("twice the potential impact energy (read in a secondary summary), applied to the arrest force and not to the energy (read in the official letter)"),
        least(K::AnchorStrength, "anchorage, per person attached", (5000.0, Unit::PoundForce), ("29 CFR 1926.502(d)(15)", Secondary))
            .or(K::AnchorFactor)
            .remark("22.2 kN; or a safety factor of 2 under the supervision of a qualified person"),
        factor(K::AnchorFactor, "anchorage as part of a designed system: safety factor", 2.0, ("29 CFR 1926.502(d)(15)", Secondary))
            .remark("under the supervision of a qualified person"),
        least(K::LineStrength, "strength of a lanyard or vertical lifeline", (5000.0, Unit::PoundForce), ("29 CFR 1926.502(d)(9)", Secondary)),
        least(
            K::LineStrengthShortFall,
            "strength of a self-retracting line that limits the free fall to 2 ft",
            (3000.0, Unit::PoundForce),
            ("29 CFR 1926.502(d)(12)", Secondary),
        )
        .only(Applies::Retractable)
        .remark("13.3 kN"),
        factor(K::SpanFactor, "horizontal lifeline: safety factor", 2.0, ("29 CFR 1926.502(d)(8)", Secondary))
            .only(Applies::Span)
            .remark("under the supervision of a qualified person"),
        most(
            K::SubjectMass,
            "person with tools, for the presumption of compliance",
            (310.0, Unit::Pound),
            ("note to 29 CFR 1926.502(d)(16)", Memory),
        )
        .below()
        .remark("140 kg"),
    ],
};

const US_1910_CLAUSE: &str = "29 CFR 1910.140(d)(1)-(2)";

/// United States, general industry.
pub const US_1910: LimitSet = LimitSet {
    name: "us-1910",
    scope: "United States federal rules for general industry: personal fall arrest systems with a body harness",
    written_for: WrittenFor::ANY,
    limits: &[
        most(K::ArrestForce, "arrest force", (1800.0, Unit::PoundForce), (US_1910_CLAUSE, Secondary)).remark(KN_8),
        most(K::DecelerationDistance, "deceleration distance", (3.5, Unit::Foot), (US_1910_CLAUSE, Secondary))
            .remark("the source prints 1.1 m beside it"),
        most(K::FreeFall, "free-fall distance", (6.0, Unit::Foot), (US_1910_CLAUSE, Secondary)),
        factor(K::LineFactor, "strength of the system: factor on the arrest force", 2.0, (US_1910_CLAUSE, Secondary)),
        factor(K::AnchorFactor, "strength of the system, applied to the anchorage", 2.0, (US_1910_CLAUSE, Secondary)),
        most(K::SubjectMass, "person with tools", (310.0, Unit::Pound), (US_1910_CLAUSE, Secondary)),
    ],
};

const ON_CLAUSE: &str = "R.R.O. 1990, Reg. 851, s.85";

/// Ontario.
pub const CA_ON: LimitSet = LimitSet {
    name: "ca-on",
    scope: "Ontario regulation for industrial establishments: fall arrest systems for persons",
    written_for: WrittenFor::ANY,
    limits: &[
        most(K::FreeFall, "free-fall distance", (1.5, Unit::Metre), (ON_CLAUSE, Secondary)),
        most(K::ArrestForce, "arrest force", (8.0, Unit::Kilonewton), (ON_CLAUSE, Secondary)),
    ],
};

const QC_FALL: &str = "Quebec Safety Code 2.10.12; RROHS s.347";
const QC_ANCHOR: &str = "Quebec Safety Code 2.10.15; RROHS s.349.1";
const QC_SPAN: &str = "Quebec Safety Code 2.10.15(2)(a)";

/// Quebec.
pub const CA_QC: LimitSet = LimitSet {
    name: "ca-qc",
    scope: "Quebec rules for construction and for work in general: fall arrest of persons, anchors, horizontal lifelines",
    written_for: WrittenFor::ANY,
    limits: &[
        most(K::ArrestForce, "arrest force", (6.0, Unit::Kilonewton), (QC_FALL, Published))
            .or(K::FreeFall)
            .remark("this, or a free fall of at most 1.8 m"),
        most(K::FreeFall, "free-fall distance", (1.8, Unit::Metre), (QC_FALL, Published))
            .or(K::ArrestForce)
            .remark("this, or an arrest force of at most 6 kN"),
        least(K::AnchorStrength, "anchor", (18.0, Unit::Kilonewton), (QC_ANCHOR, Published))
            .or(K::AnchorFactor)
            .remark("or twice the arrest force, certified by an engineer"),
        factor(K::AnchorFactor, "certified anchor: factor on the arrest force", 2.0, (QC_ANCHOR, Published)),
        most(K::SwingDistance, "sideways swing, distance", (3.0, Unit::Metre), (QC_ANCHOR, Published))
            .only(Applies::Swing)
            .or(K::SwingAngle)
            .remark("this, or a sideways swing of at most 22 deg"),
        most(K::SwingAngle, "sideways swing, angle", (22.0, Unit::Degree), (QC_ANCHOR, Published))
            .only(Applies::Swing)
            .or(K::SwingDistance)
            .remark("this, or a sideways swing of at most 3 m"),
        least(
            K::SpanCableDiameter,
            "prescribed horizontal lifeline: steel cable diameter",
            (12.0, Unit::Millimetre),
            (QC_SPAN, Published),
        )
        .only(Applies::Span),
        least(
            K::SpanSlack,
            "prescribed horizontal lifeline: slack over span",
            (1.0 / 12.0, Unit::One),
            (QC_SPAN, Published),
        )
        .only(Applies::Span)
        .remark("1:12"),
        most(K::SpanLength, "prescribed horizontal lifeline: span", (12.0, Unit::Metre), (QC_SPAN, Published))
            .only(Applies::Span),
        least(
            K::SpanAnchorStrength,
            "prescribed horizontal lifeline: end anchors",
            (90.0, Unit::Kilonewton),
            (QC_SPAN, Published),
        )
        .only(Applies::Span),
        most(K::SpanWorkers, "prescribed horizontal lifeline: workers", (2.0, Unit::One), (QC_SPAN, Published))
            .only(Applies::Span),
    ],
};

/// Alberta.
pub const CA_AB: LimitSet = LimitSet {
    name: "ca-ab",
    scope: "Alberta occupational health and safety code and its guide: personal fall arrest",
    written_for: WrittenFor::ANY,
    limits: &[
        most(K::ArrestForce, "arrest force", (6.0, Unit::Kilonewton), ("Alberta OHS Code s.828 guide", Published)),
        least(K::AnchorStrength, "anchor", (16.0, Unit::Kilonewton), ("Alberta OHS Code s.152 guide", Published))
            .or(K::AnchorFactor)
            .remark("or twice the arrest force"),
        factor(K::AnchorFactor, "anchor: factor on the arrest force", 2.0, ("Alberta OHS Code s.152 guide", Published)),
    ],
};
