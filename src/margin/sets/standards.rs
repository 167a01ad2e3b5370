//! Sets that are type tests of one component: absorbers and ropes.
use super::super::limit::Mark::{Published, Secondary};
use super::super::limit::{Applies, LimitKind as K, LimitSet, WrittenFor};
use super::most;
use crate::quantity::Unit;

const ISO: &str = "ISO 10333-2:2000, scope";

/// ISO absorber, type 1.
pub const ISO_10333_1: LimitSet = LimitSet {
    name: "iso-10333-1",
    scope: "type 1 energy absorbers of the international standard: one person of at most 100 kg, free fall of at most 1.8 m",
    written_for: WrittenFor { absorber: true, free_fall_m: Some(1.8), mass_kg: Some(100.0), ..WrittenFor::ANY },
    limits: &[
        most(K::FreeFall, "type 1 absorber: free fall", (1.8, Unit::Metre), (ISO, Published)),
        most(K::ArrestForce, "type 1 absorber: force", (4.0, Unit::Kilonewton), (ISO, Published)),
        most(K::SubjectMass, "type 1 absorber: mass", (100.0, Unit::Kilogram), (ISO, Published)),
    ],
};

/// ISO absorber, type 2.
pub const ISO_10333_2: LimitSet = LimitSet {
    name: "iso-10333-2",
    scope: "type 2 energy absorbers of the international standard: one person of at most 100 kg, free fall of at most 4.0 m",
    written_for: WrittenFor { absorber: true, free_fall_m: Some(4.0), mass_kg: Some(100.0), ..WrittenFor::ANY },
    limits: &[
        most(K::FreeFall, "type 2 absorber: free fall", (4.0, Unit::Metre), (ISO, Published)),
        most(K::ArrestForce, "type 2 absorber: force", (6.0, Unit::Kilonewton), (ISO, Published)),
        most(K::SubjectMass, "type 2 absorber: mass", (100.0, Unit::Kilogram), (ISO, Published)),
    ],
};

const EN_892: &str = "EN 892 as restated in the Alberta guide s.818";

/// Dynamic rope.
pub const ROPE_892: LimitSet = LimitSet {
    name: "rope-892",
    scope: "type test of dynamic ropes, first drop; a limit of the rope, not of what a body should bear",
    written_for: WrittenFor { rope: true, ..WrittenFor::ANY },
    limits: &[
        most(K::ArrestForce, "first drop, single rope: force", (12.0, Unit::Kilonewton), (EN_892, Published))
            .only(Applies::SingleRope)
            .remark("judged as a single rope; a half rope is tested to 8 kN, a twin rope to 12 kN"),
        most(K::ArrestForce, "first drop, half rope: force", (8.0, Unit::Kilonewton), (EN_892, Published))
            .only(Applies::HalfOrTwinRope),
        most(K::ArrestForce, "first drop, twin rope: force", (12.0, Unit::Kilonewton), (EN_892, Published))
            .only(Applies::HalfOrTwinRope),
        most(K::DynamicElongation, "first drop: elongation", (40.0, Unit::Percent), (EN_892, Published)),
    ],
};

const EN_1891: &str = "EN 1891 as summarised";

/// Low-stretch rope.
pub const ROPE_1891: LimitSet = LimitSet {
    name: "rope-1891",
    scope: "type test of low-stretch ropes of type A: 100 kg at a fall factor of 0.3",
    written_for: WrittenFor { rope: true, fall_factor: Some(0.3), mass_kg: Some(100.0), ..WrittenFor::ANY },
    limits: &[
        most(K::ArrestForce, "force at fall factor 0.3 with 100 kg", (6.0, Unit::Kilonewton), (EN_1891, Secondary))
            .below(),
        most(K::StaticElongation, "elongation from 50 kg to 150 kg", (5.0, Unit::Percent), (EN_1891, Secondary)),
    ],
};
