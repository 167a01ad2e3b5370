//! Numbers of a drawing in one unit: axis labels, dimensions and level names agree.
use crate::quantity::{Dimension, Unit, UnitSystem, display_unit, format_si, format_unit};
use crate::sheet::ticks::fixed;

/// One display unit with a fixed number of decimals.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Scale {
    /// How many SI units one display unit is.
    pub factor: f64,
    /// Symbol of the display unit.
    pub symbol: &'static str,
    /// Decimals of numbers that are to add up.
    pub decimals: usize,
    dimension: Dimension,
    units: UnitSystem,
}

impl Scale {
    /// The scale of a dimension: metres to a thousandth, as the sentences show lengths below a metre; feet, speeds and
    /// kilonewtons to a hundredth, the rest whole.
    #[must_use]
    pub fn of(dimension: Dimension, units: UnitSystem) -> Self {
        let unit = display_unit(dimension, units);
        let decimals = match unit {
            Unit::Newton | Unit::PoundForce | Unit::Kilogram | Unit::Pound => 0,
            Unit::Metre => 3,
            _ => 2,
        };
        Self { factor: unit.factor(), symbol: unit.symbol(), decimals, dimension, units }
    }

    /// The value in display units.
    #[must_use]
    pub fn shown(&self, si: f64) -> f64 {
        si / self.factor
    }

    /// The value in display units, rounded as it is printed.
    #[must_use]
    pub fn rounded(&self, si: f64) -> f64 {
        let tens = 10_f64.powi(i32::try_from(self.decimals).unwrap_or(0));
        (self.shown(si) * tens).round() / tens
    }

    /// Number and unit with the digits that sentences, log and margins show.
    #[must_use]
    pub fn text(&self, si: f64) -> String {
        format_si(si, self.dimension, self.units)
    }

    /// A force in the same system.
    #[must_use]
    pub fn force(&self, newton: f64) -> String {
        format_si(newton, Dimension::Force, self.units)
    }

    /// A number that is already in display units and is to add up with others, with the unit.
    #[must_use]
    pub fn print(&self, shown: f64) -> String {
        format!("{} {}", fixed(shown, self.decimals), self.symbol)
    }
}

/// The number alone of a value in a unit, as a file would write it.
#[must_use]
pub fn bare(si: f64, unit: Unit) -> String {
    let text = format_unit(si, unit);
    text.strip_suffix(unit.symbol()).map_or_else(|| text.clone(), |number| number.trim_end().to_owned())
}
