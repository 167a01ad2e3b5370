//! Text to numbers with units.
use super::{Band, Dimension, Measure, QuantityError, Shape, Unit};
use std::ops::Range;

/// Reads `1.8 m`, `6 ft 6 in`, `6 kN`: one value with its unit. Returns the SI value and the unit.
///
/// # Errors
/// When there is no number, it is not finite, or the unit is missing, unknown or of another dimension;
/// also when the text is a band.
pub fn parse_quantity(text: &str, dimension: Dimension) -> Result<(f64, Unit), QuantityError> {
    if let [_, _, ..] = split_band(text).as_slice() {
        return Err(QuantityError::BandNotAllowed { at: trimmed(text, 0..text.len()), found: text.trim().to_owned() });
    }
    let measure = parse_measure(text, dimension)?;
    Ok((measure.si(), measure.unit))
}

/// Reads a value or a band: `100 kg`, `80..120 kg`, `80..100..120 kg`.
///
/// The unit stands once at the end, or the same after every value. Numbers have a point for decimals, no
/// thousands separators and an optional power of ten (`1.2e3`). A band of two has its typical value in the middle.
///
/// # Errors
/// As [`parse_quantity`], and when the band is out of order.
pub fn parse_measure(text: &str, dimension: Dimension) -> Result<Measure, QuantityError> {
    let parts = split_band(text);
    let whole = trimmed(text, 0..text.len());
    if parts.len() > 3 {
        return Err(QuantityError::TooManyValues { at: whole, count: parts.len() });
    }
    let values = parts.iter().map(|part| Value::read(text, part.clone(), dimension)).collect::<Result<Vec<_>, _>>()?;
    let (unit, feet_and_inches) = common_unit(text, &values, dimension)?;
    let si = values.iter().map(|value| value.si(text, unit)).collect::<Result<Vec<_>, _>>()?;
    let (low, typical, high) = match si.as_slice() {
        [low, high] => (*low, low + (high - low) / 2.0, *high),
        [low, typical, high] => (*low, *typical, *high),
        other => other.first().map_or((0.0, 0.0, 0.0), |value| (*value, *value, *value)),
    };
    if !(low <= typical && typical <= high) {
        return Err(QuantityError::BandOrder { at: whole.clone(), found: slice(text, whole) });
    }
    Ok(Measure { band: Band { low, typical, high, shape: Shape::Uniform }, unit, feet_and_inches })
}

/// One value of a band as written.
struct Value {
    /// Bytes of the number.
    at: Range<usize>,
    number: f64,
    /// Unit, and inches beside feet where written so.
    unit: Option<(Unit, Option<f64>)>,
}

impl Value {
    fn read(text: &str, part: Range<usize>, dimension: Dimension) -> Result<Self, QuantityError> {
        let part = trimmed(text, part);
        let at = number_range(text, part.clone(), dimension)?;
        let number = number(text, at.clone())?;
        let unit = trimmed(text, at.end..part.end);
        if unit.is_empty() {
            return Ok(Self { at, number, unit: None });
        }
        if let Some(inches) = inches_after_feet(text, part.clone(), unit.clone(), dimension)? {
            if number.fract() != 0.0 || !(0.0..12.0).contains(&inches) {
                return Err(QuantityError::FeetAndInches { at: part.clone(), found: slice(text, part) });
            }
            return Ok(Self { at, number, unit: Some((Unit::Foot, Some(inches))) });
        }
        let unit = unit_of(text, unit, dimension)?;
        Ok(Self { at, number, unit: Some((unit, None)) })
    }

    fn si(&self, text: &str, unit: Unit) -> Result<f64, QuantityError> {
        let value = match self.unit {
            Some((_, Some(inches))) => {
                let sign = if text[self.at.clone()].starts_with('-') { -1.0 } else { 1.0 };
                sign * self.number.abs().mul_add(12.0, inches) * Unit::Inch.factor()
            }
            _ => to_si(self.number, unit),
        };
        if value.is_finite() && (value != 0.0 || self.number == 0.0) {
            return Ok(value + 0.0);
        }
        Err(QuantityError::NotFinite { at: self.at.clone(), found: slice(text, self.at.clone()) })
    }
}

/// Number of a unit to SI; hundredths and thousandths divide, which rounds once where a product rounds twice.
fn to_si(number: f64, unit: Unit) -> f64 {
    match unit {
        Unit::Centimetre | Unit::Percent => number / 100.0,
        Unit::Millimetre => number / 1000.0,
        _ => number * unit.factor(),
    }
}

/// The one unit of all values; the last carries it, others may repeat it.
fn common_unit(text: &str, values: &[Value], dimension: Dimension) -> Result<(Unit, bool), QuantityError> {
    let Some(last) = values.last() else {
        return Err(QuantityError::NoNumber { at: 0..text.len(), found: text.to_owned(), dimension });
    };
    let unit = match last.unit {
        Some((unit, _)) => unit,
        None if dimension == Dimension::Ratio => Unit::One,
        None => {
            let found = slice(text, last.at.clone());
            return Err(QuantityError::MissingUnit { at: last.at.clone(), found, dimension });
        }
    };
    for (other, _) in values.iter().filter_map(|value| value.unit) {
        if other != unit {
            let at = trimmed(text, 0..text.len());
            return Err(QuantityError::MixedUnits { at, first: other.symbol(), second: unit.symbol() });
        }
    }
    let feet_and_inches = values.iter().any(|value| matches!(value.unit, Some((_, Some(_)))));
    Ok((unit, feet_and_inches))
}

/// The byte ranges between the double points.
fn split_band(text: &str) -> Vec<Range<usize>> {
    let mut parts = Vec::new();
    let mut start = 0;
    for (at, dots) in text.match_indices("..") {
        parts.push(start..at);
        start = at + dots.len();
    }
    parts.push(start..text.len());
    parts
}

/// The bytes of the number at the start of a part: sign, digits, point, digits, power of ten.
fn number_range(text: &str, part: Range<usize>, dimension: Dimension) -> Result<Range<usize>, QuantityError> {
    let bytes = &text.as_bytes()[part.clone()];
    let digits = |from: usize| bytes[from..].iter().take_while(|b| b.is_ascii_digit()).count();
    let mut end = usize::from(matches!(bytes.first(), Some(b'-' | b'+')));
    let whole = digits(end);
    end += whole;
    if bytes.get(end) == Some(&b'.') {
        let decimals = digits(end + 1);
        end += 1 + decimals;
        if whole == 0 || decimals == 0 {
            let at = part.start..part.start + end;
            return Err(QuantityError::LonePoint { found: slice(text, at.clone()), at });
        }
    }
    if whole == 0 {
        return Err(QuantityError::NoNumber { found: slice(text, part.clone()), at: part, dimension });
    }
    end += power_of_ten(&bytes[end..]);
    refuse_separator(text, part.start..part.start + end, part.end)
}

/// Length of `e3`, `E-3` at the start of the bytes, or 0.
fn power_of_ten(bytes: &[u8]) -> usize {
    if !matches!(bytes.first(), Some(b'e' | b'E')) {
        return 0;
    }
    let sign = usize::from(matches!(bytes.get(1), Some(b'-' | b'+')));
    let digits = bytes[1 + sign..].iter().take_while(|b| b.is_ascii_digit()).count();
    if digits == 0 { 0 } else { 1 + sign + digits }
}

/// Refuses `1,800`, `1_800`, `1'800` and `1 800`.
fn refuse_separator(text: &str, at: Range<usize>, end: usize) -> Result<Range<usize>, QuantityError> {
    let rest = &text[at.end..end];
    let after = rest.trim_start_matches([',', '_', '\'', '.']).trim_start();
    let more = after.chars().take_while(char::is_ascii_digit).count();
    let per = after[more..].starts_with('/');
    if more == 0 || per {
        return Ok(at);
    }
    let stop = end - after.len() + more;
    Err(QuantityError::Separator { at: at.start..stop, found: slice(text, at.start..stop) })
}

fn number(text: &str, at: Range<usize>) -> Result<f64, QuantityError> {
    let written = &text[at.clone()];
    let mantissa = written.split(['e', 'E']).next().unwrap_or(written);
    let zero = mantissa.bytes().all(|b| !b.is_ascii_digit() || b == b'0');
    match written.parse::<f64>() {
        Ok(value) if value.is_finite() && (value != 0.0 || zero) => Ok(value),
        _ => Err(QuantityError::NotFinite { found: slice(text, at.clone()), at }),
    }
}

/// The inches of `6 ft 6 in`; none when the unit is anything else.
fn inches_after_feet(
    text: &str,
    part: Range<usize>,
    unit: Range<usize>,
    dimension: Dimension,
) -> Result<Option<f64>, QuantityError> {
    if dimension != Dimension::Length || !text[unit.clone()].starts_with("ft") {
        return Ok(None);
    }
    let rest = trimmed(text, unit.start + 2..unit.end);
    if !text[rest.clone()].starts_with(|c: char| c.is_ascii_digit()) {
        return Ok(None);
    }
    let at = number_range(text, rest.clone(), dimension)?;
    if text[at.end..rest.end].trim() == Unit::Inch.symbol() {
        return number(text, at).map(Some);
    }
    Err(QuantityError::FeetAndInches { found: slice(text, part.clone()), at: part })
}

/// The unit of a text: blanks are one, `·` and `*` are a blank, `²` and `^2` are 2.
fn unit_of(text: &str, at: Range<usize>, dimension: Dimension) -> Result<Unit, QuantityError> {
    let found = &text[at.clone()];
    let plain = found.replace(['·', '*'], " ").replace('²', "2").replace('^', "");
    let plain = plain.split_whitespace().collect::<Vec<_>>().join(" ");
    let known = |unit: &Unit| unit.symbol() == plain && !plain.is_empty();
    if let Some(unit) = Unit::for_dimension(dimension).into_iter().find(known) {
        return Ok(unit);
    }
    match Unit::ALL.iter().copied().find(known) {
        Some(unit) => Err(QuantityError::WrongDimension { at, unit, dimension }),
        None => Err(QuantityError::UnknownUnit { found: found.to_owned(), at, dimension }),
    }
}

/// A range without the blanks at its ends.
fn trimmed(text: &str, range: Range<usize>) -> Range<usize> {
    let inner = &text[range.clone()];
    let start = range.start + (inner.len() - inner.trim_start().len());
    start..start + inner.trim().len()
}

fn slice(text: &str, at: Range<usize>) -> String {
    text[at].to_owned()
}
