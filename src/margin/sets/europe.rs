//! The European set.
use super::super::limit::Mark::{Published, Secondary};
use super::super::limit::{Applies, LimitKind as K, LimitSet, WrittenFor};
use super::{least, most};
use crate::quantity::Unit;

const EN_354: &str = "EN 354:2010 as summarised";
const EN_355: &str = "EN 355:2002 as summarised";
const EN_353: &str = "EN 353-2 as summarised";
const EN_360: &str = "EN 360 as summarised";
const EN_795: &str = "EN 795:2012 as summarised";

/// Europe: systems after EN 363 and their parts.
pub const EU_363: LimitSet = LimitSet {
    name: "eu-363",
    scope: "European standards for personal fall protection: fall arrest systems after EN 363 and their components, \
            tested with a mass of 100 kg",
    written_for: WrittenFor::ANY,
    limits: &[
        most(
            K::ArrestForce,
            "arrest force",
            (6.0, Unit::Kilonewton),
            ("EN 363 as applied in DGUV Regel 112-198 s.5.1", Published),
        ),
        most(K::ArrestForce, "absorber test, 100 kg falling 4 m: force", (6.0, Unit::Kilonewton), (EN_355, Secondary))
            .only(Applies::Absorber),
        most(
            K::DecelerationDistance,
            "absorber test, 100 kg falling 4 m: extension",
            (1.75, Unit::Metre),
            (EN_355, Secondary),
        )
        .only(Applies::Absorber)
        .remark("the test drops 100 kg by twice the length of the lanyard (4 m)"),
        most(
            K::TotalFallPastTwiceLength,
            "arrest distance H: twice the lanyard's length plus",
            (1.75, Unit::Metre),
            (EN_355, Secondary),
        )
        .only(Applies::LanyardWithAbsorber),
        most(
            K::LanyardLength,
            "length of a lanyard with absorber",
            (2.0, Unit::Metre),
            ("EN 354/355 practice", Secondary),
        )
        .only(Applies::LanyardWithAbsorber),
        least(K::LineStrength, "lanyard static strength, textile", (22.0, Unit::Kilonewton), (EN_354, Secondary))
            .only(Applies::Textile)
            .or(K::LineStrength)
            .remark("15 kN for a lanyard of metal"),
        least(K::LineStrength, "lanyard static strength, metal", (15.0, Unit::Kilonewton), (EN_354, Secondary))
            .only(Applies::Metal),
        most(K::ArrestForce, "retractable arrester: force", (6.0, Unit::Kilonewton), (EN_360, Secondary))
            .only(Applies::Retractable),
        most(K::TotalFall, "retractable arrester: arrest distance", (2.0, Unit::Metre), (EN_360, Secondary))
            .only(Applies::Retractable),
        most(K::ArrestForce, "guided arrester on a flexible line: force", (6.0, Unit::Kilonewton), (EN_353, Secondary))
            .only(Applies::Guided),
        most(
            K::TotalFall,
            "guided arrester on a flexible line: arrest distance",
            (1.0, Unit::Metre),
            (EN_353, Secondary),
        )
        .only(Applies::Guided),
        least(K::AnchorStrength, "anchor device, static, metal", (12.0, Unit::Kilonewton), (EN_795, Secondary))
            .remark("18 kN for an anchor device that is not of metal"),
        least(
            K::AnchorStrengthConditional,
            "anchor device, static, not of metal",
            (18.0, Unit::Kilonewton),
            (EN_795, Secondary),
        )
        .only(Applies::Elsewhere),
        least(K::Reserve, "reserve below the feet", (1.0, Unit::Metre), ("DGUV Regel 112-198 s.7.3", Published))
            .remark("covers attachment shift and webbing stretch"),
    ],
};
