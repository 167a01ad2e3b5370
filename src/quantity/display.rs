//! Numbers with units to text.
use super::{Dimension, Measure, Unit, UnitSystem};

/// Significant digits of [`format_unit`]: enough for any tape or scale, few enough to hide binary noise.
const KEPT_DIGITS: usize = 12;
/// Significant digits that [`format_si`] shows at least.
const SHOWN_DIGITS: i32 = 3;

/// Values below this share of a unit come from rounding, not from a fall.
const ROUNDING: f64 = 1e-9;

/// The unit in which a system shows a dimension (forces in kN or lbf, lengths in m or ft).
#[must_use]
pub fn display_unit(dimension: Dimension, system: UnitSystem) -> Unit {
    let us = system == UnitSystem::Us;
    let pick = |metric, customary| if us { customary } else { metric };
    match dimension {
        Dimension::Length => pick(Unit::Metre, Unit::Foot),
        Dimension::Mass => pick(Unit::Kilogram, Unit::Pound),
        Dimension::Force => pick(Unit::Kilonewton, Unit::PoundForce),
        Dimension::Stiffness => pick(Unit::KilonewtonPerMetre, Unit::PoundForcePerFoot),
        Dimension::Damping => pick(Unit::NewtonSecondPerMetre, Unit::PoundForceSecondPerFoot),
        Dimension::Time => Unit::Second,
        Dimension::Speed => pick(Unit::MetrePerSecond, Unit::FootPerSecond),
        Dimension::Acceleration => pick(Unit::MetrePerSecondSquared, Unit::FootPerSecondSquared),
        Dimension::Angle => Unit::Degree,
        Dimension::Energy => pick(Unit::Joule, Unit::FootPoundForce),
        Dimension::MassPerLength => pick(Unit::KilogramPerMetre, Unit::PoundPerFoot),
        Dimension::AngularFrequency => Unit::RadianPerSecond,
        Dimension::Rate => Unit::PerSecond,
        Dimension::GravityMultiple => Unit::Gravity,
        Dimension::Ratio => Unit::One,
    }
}

/// `format_si(5123.0, Force, Metric)` is `5.12 kN`: a readable number of digits, always with its unit.
///
/// At least three significant digits, and at least as many decimals as the unit is usually read to (centimetres,
/// tenths of a kilonewton); whole kilograms and pounds without decimals. Below 0.0001 and from a thousand million of the
/// unit with a power of ten; below a thousand-millionth of the unit, where only rounding is left, zero (ratios excepted).
/// A value that is not finite reads `not a number`.
#[must_use]
pub fn format_si(value_si: f64, dimension: Dimension, system: UnitSystem) -> String {
    let unit = display_unit(dimension, system);
    let value = value_si / unit.factor();
    let value = if unit != Unit::One && value.abs() < ROUNDING { 0.0 } else { value + 0.0 };
    if !value.is_finite() {
        return "not a number".to_owned();
    }
    let exponent = decimal_exponent(value);
    if value != 0.0 && !(-4..9).contains(&exponent) {
        return with_symbol(&format!("{value:.2e}"), unit);
    }
    let decimals = (SHOWN_DIGITS - 1 - exponent).max(usual_decimals(unit));
    let number = format!("{value:.*}", usize::try_from(decimals).unwrap_or(0));
    if matches!(unit, Unit::Kilogram | Unit::Pound) && number.contains('.') {
        return with_symbol(number.trim_end_matches('0').trim_end_matches('.'), unit);
    }
    with_symbol(&number, unit)
}

/// A value in one given unit, the shortest text that reads back to the same value within 12 digits.
#[must_use]
pub fn format_unit(value_si: f64, unit: Unit) -> String {
    with_symbol(&shortest(in_unit(value_si, unit)), unit)
}

/// A measure as a file would state it: `80..100..120 kg` in its own unit, feet and inches where written so.
///
/// The shape is not part of the text; a band whose typical value is its middle is written with two values.
#[must_use]
pub fn format_measure(measure: &Measure) -> String {
    let band = &measure.band;
    if band.is_wide() && same(band.typical, band.low + (band.high - band.low) / 2.0) {
        return join(measure, &[band.low, band.high]);
    }
    format_band(measure)
}

/// A measure as [`format_measure`] writes it, a band always with its three values.
#[must_use]
pub fn format_band(measure: &Measure) -> String {
    let band = &measure.band;
    if band.is_wide() { join(measure, &[band.low, band.typical, band.high]) } else { join(measure, &[band.typical]) }
}

fn join(measure: &Measure, values: &[f64]) -> String {
    if measure.feet_and_inches {
        return values.iter().copied().map(feet_and_inches).collect::<Vec<_>>().join("..");
    }
    let numbers: Vec<String> = values.iter().map(|value| shortest(in_unit(*value, measure.unit))).collect();
    with_symbol(&numbers.join(".."), measure.unit)
}

/// SI to a number of the unit, with the one rounding that undoes the reading.
fn in_unit(value_si: f64, unit: Unit) -> f64 {
    match unit {
        Unit::Centimetre | Unit::Percent => value_si * 100.0,
        Unit::Millimetre => value_si * 1000.0,
        _ => value_si / unit.factor(),
    }
}

fn same(a: f64, b: f64) -> bool {
    shortest(a) == shortest(b)
}

/// `6 ft 6 in`, `-6 ft 6 in`; plain feet when there are no inches.
fn feet_and_inches(value_si: f64) -> String {
    let total = rounded(value_si.abs() / Unit::Inch.factor());
    let feet = (total / 12.0).floor();
    let inches = rounded(feet.mul_add(-12.0, total));
    let (feet, inches) = if inches >= 12.0 { (feet + 1.0, 0.0) } else { (feet, inches) };
    let sign = if value_si < 0.0 && total > 0.0 { "-" } else { "" };
    if inches == 0.0 {
        return format!("{sign}{} ft", shortest(feet));
    }
    format!("{sign}{} ft {} in", shortest(feet), shortest(inches))
}

/// A number cut to the kept digits.
fn rounded(value: f64) -> f64 {
    format!("{value:.*e}", KEPT_DIGITS - 1).parse().unwrap_or(value)
}

/// The shortest decimal text of a number cut to the kept digits; never `-0`.
fn shortest(value: f64) -> String {
    let value = rounded(value) + 0.0;
    let exponent = decimal_exponent(value);
    if value != 0.0 && !(-6..16).contains(&exponent) { format!("{value:e}") } else { format!("{value}") }
}

/// Power of ten of the first of three shown digits, after rounding to them.
fn decimal_exponent(value: f64) -> i32 {
    let text = format!("{value:.2e}");
    text.split('e').nth(1).and_then(|exponent| exponent.parse().ok()).unwrap_or(0)
}

const fn usual_decimals(unit: Unit) -> i32 {
    match unit {
        Unit::Metre | Unit::Foot | Unit::Second | Unit::MetrePerSecond | Unit::RadianPerSecond | Unit::One => 2,
        Unit::Kilonewton | Unit::Kilogram | Unit::Pound | Unit::Gravity | Unit::Degree | Unit::FootPerSecond => 1,
        _ => 0,
    }
}

fn with_symbol(number: &str, unit: Unit) -> String {
    if unit == Unit::One { number.to_owned() } else { format!("{number} {}", unit.symbol()) }
}
