//! A quantity known within a band.
use super::{Dimension, Unit};

/// How likely the values inside a band are.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Shape {
    /// Every value as likely as any other.
    #[default]
    Uniform,
    /// Most likely at typical, falling to nothing at low and high.
    Triangular,
    /// Normal about typical, cut at low and high.
    Normal,
}

/// low..typical..high in SI units, `low <= typical <= high`, all finite.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Band {
    /// Smallest value, SI.
    pub low: f64,
    /// Value used for the typical estimate, SI.
    pub typical: f64,
    /// Largest value, SI.
    pub high: f64,
    /// Distribution inside the band.
    pub shape: Shape,
}

impl Band {
    /// A band of no width.
    #[must_use]
    pub const fn point(value_si: f64) -> Self {
        Self { low: value_si, typical: value_si, high: value_si, shape: Shape::Uniform }
    }
    /// True when low and high differ.
    #[must_use]
    pub fn is_wide(&self) -> bool {
        self.low < self.high
    }
}

/// A band together with the unit it was written in.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Measure {
    /// The values, SI.
    pub band: Band,
    /// The unit of the file; values are shown and saved back in it.
    pub unit: Unit,
    /// Written in feet and inches (`6 ft 6 in`); kept when saved.
    pub feet_and_inches: bool,
}

impl Measure {
    /// An exact value in a unit.
    #[must_use]
    pub const fn exact(value_si: f64, unit: Unit) -> Self {
        Self { band: Band::point(value_si), unit, feet_and_inches: false }
    }
    /// The typical value, SI.
    #[must_use]
    pub const fn si(&self) -> f64 {
        self.band.typical
    }
    /// What is measured.
    #[must_use]
    pub const fn dimension(&self) -> Dimension {
        self.unit.dimension()
    }
}
