//! The units that files may use, with their exact factors to SI.
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

impl Unit {
    /// The dimension this unit measures.
    #[must_use]
    pub const fn dimension(self) -> Dimension {
        todo!()
    }
    /// The symbol as written in files and shown on screens; empty for a plain number.
    #[must_use]
    pub const fn symbol(self) -> &'static str {
        todo!()
    }
    /// How many SI units one of this unit is.
    #[must_use]
    pub const fn factor(self) -> f64 {
        todo!()
    }
    /// Units that a file may use for this dimension, the usual one first.
    #[must_use]
    pub fn for_dimension(dimension: Dimension) -> Vec<Self> {
        todo!()
    }
}
