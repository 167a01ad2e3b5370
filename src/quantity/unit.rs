//! The units that files may use, with their exact factors to SI.
//!
//! The foot, inch and pound are exact by the international yard and pound agreement of 1959; the
//! pound-force is the pound times standard gravity 9.80665 m/s2 (NIST SP 811, 2008, appendix B).
use super::Dimension;

/// Which family of units the program shows.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum UnitSystem {
    /// m, kg, kN.
    #[default]
    Metric,
    /// ft, lb, lbf.
    Us,
}

/// A unit of measure.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Unit {
    /// m
    Metre,
    /// cm
    Centimetre,
    /// mm
    Millimetre,
    /// ft, exactly 0.3048 m
    Foot,
    /// in, exactly 0.0254 m
    Inch,
    /// kg
    Kilogram,
    /// lb, exactly 0.453 592 37 kg
    Pound,
    /// N
    Newton,
    /// kN
    Kilonewton,
    /// lbf, exactly 4.448 221 615 260 5 N
    PoundForce,
    /// N/m
    NewtonPerMetre,
    /// kN/m
    KilonewtonPerMetre,
    /// lbf/ft
    PoundForcePerFoot,
    /// lbf/in
    PoundForcePerInch,
    /// N s/m
    NewtonSecondPerMetre,
    /// kN s/m
    KilonewtonSecondPerMetre,
    /// lbf s/ft
    PoundForceSecondPerFoot,
    /// s
    Second,
    /// m/s
    MetrePerSecond,
    /// ft/s
    FootPerSecond,
    /// m/s2
    MetrePerSecondSquared,
    /// ft/s2
    FootPerSecondSquared,
    /// deg
    Degree,
    /// J
    Joule,
    /// ft lbf
    FootPoundForce,
    /// kg/m
    KilogramPerMetre,
    /// lb/ft
    PoundPerFoot,
    /// rad/s
    RadianPerSecond,
    /// 1/s
    PerSecond,
    /// g, multiples of gravity
    Gravity,
    /// %
    Percent,
    /// a plain number
    One,
}

/// One foot in metres, exact (international yard and pound agreement, 1959).
const FOOT_M: f64 = 0.3048;
/// One inch in metres, exact (one twelfth of a foot).
const INCH_M: f64 = 0.0254;
/// One pound in kilograms, exact (international yard and pound agreement, 1959).
const POUND_KG: f64 = 0.453_592_37;
/// One pound-force in newtons, exact: the pound times 9.80665 m/s2 (NIST SP 811, appendix B.8).
const POUND_FORCE_N: f64 = 4.448_221_615_260_5;

impl Unit {
    /// Every unit, grouped by dimension with the usual one first.
    pub const ALL: &'static [Self] = &[
        Self::Metre,
        Self::Centimetre,
        Self::Millimetre,
        Self::Foot,
        Self::Inch,
        Self::Kilogram,
        Self::Pound,
        Self::Kilonewton,
        Self::Newton,
        Self::PoundForce,
        Self::KilonewtonPerMetre,
        Self::NewtonPerMetre,
        Self::PoundForcePerFoot,
        Self::PoundForcePerInch,
        Self::NewtonSecondPerMetre,
        Self::KilonewtonSecondPerMetre,
        Self::PoundForceSecondPerFoot,
        Self::Second,
        Self::MetrePerSecond,
        Self::FootPerSecond,
        Self::MetrePerSecondSquared,
        Self::FootPerSecondSquared,
        Self::Degree,
        Self::Joule,
        Self::FootPoundForce,
        Self::KilogramPerMetre,
        Self::PoundPerFoot,
        Self::RadianPerSecond,
        Self::PerSecond,
        Self::Gravity,
        Self::One,
        Self::Percent,
    ];

    /// The dimension this unit measures.
    #[must_use]
    pub const fn dimension(self) -> Dimension {
        self.entry().0
    }
    /// The symbol as written in files and shown on screens; empty for a plain number.
    #[must_use]
    pub const fn symbol(self) -> &'static str {
        self.entry().1
    }
    /// How many SI units one of this unit is.
    #[must_use]
    pub const fn factor(self) -> f64 {
        self.entry().2
    }
    /// Units that a file may use for this dimension, the usual one first.
    #[must_use]
    pub fn for_dimension(dimension: Dimension) -> Vec<Self> {
        Self::ALL.iter().copied().filter(|unit| unit.dimension() == dimension).collect()
    }

    const fn entry(self) -> (Dimension, &'static str, f64) {
        match self {
            Self::Metre => (Dimension::Length, "m", 1.0),
            Self::Centimetre => (Dimension::Length, "cm", 0.01),
            Self::Millimetre => (Dimension::Length, "mm", 0.001),
            Self::Foot => (Dimension::Length, "ft", FOOT_M),
            Self::Inch => (Dimension::Length, "in", INCH_M),
            Self::Kilogram => (Dimension::Mass, "kg", 1.0),
            Self::Pound => (Dimension::Mass, "lb", POUND_KG),
            Self::Newton => (Dimension::Force, "N", 1.0),
            Self::Kilonewton => (Dimension::Force, "kN", 1000.0),
            Self::PoundForce => (Dimension::Force, "lbf", POUND_FORCE_N),
            Self::NewtonPerMetre => (Dimension::Stiffness, "N/m", 1.0),
            Self::KilonewtonPerMetre => (Dimension::Stiffness, "kN/m", 1000.0),
            Self::PoundForcePerFoot => (Dimension::Stiffness, "lbf/ft", POUND_FORCE_N / FOOT_M),
            Self::PoundForcePerInch => (Dimension::Stiffness, "lbf/in", POUND_FORCE_N / INCH_M),
            Self::NewtonSecondPerMetre => (Dimension::Damping, "N s/m", 1.0),
            Self::KilonewtonSecondPerMetre => (Dimension::Damping, "kN s/m", 1000.0),
            Self::PoundForceSecondPerFoot => (Dimension::Damping, "lbf s/ft", POUND_FORCE_N / FOOT_M),
            Self::Second => (Dimension::Time, "s", 1.0),
            Self::MetrePerSecond => (Dimension::Speed, "m/s", 1.0),
            Self::FootPerSecond => (Dimension::Speed, "ft/s", FOOT_M),
            Self::MetrePerSecondSquared => (Dimension::Acceleration, "m/s2", 1.0),
            Self::FootPerSecondSquared => (Dimension::Acceleration, "ft/s2", FOOT_M),
            Self::Degree => (Dimension::Angle, "deg", std::f64::consts::PI / 180.0),
            Self::Joule => (Dimension::Energy, "J", 1.0),
            Self::FootPoundForce => (Dimension::Energy, "ft lbf", FOOT_M * POUND_FORCE_N),
            Self::KilogramPerMetre => (Dimension::MassPerLength, "kg/m", 1.0),
            Self::PoundPerFoot => (Dimension::MassPerLength, "lb/ft", POUND_KG / FOOT_M),
            Self::RadianPerSecond => (Dimension::AngularFrequency, "rad/s", 1.0),
            Self::PerSecond => (Dimension::Rate, "1/s", 1.0),
            Self::Gravity => (Dimension::GravityMultiple, "g", 1.0),
            Self::Percent => (Dimension::Ratio, "%", 0.01),
            Self::One => (Dimension::Ratio, "", 1.0),
        }
    }
}
