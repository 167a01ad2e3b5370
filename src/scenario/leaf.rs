//! One value of a file: a quantity, a band in its long form, a single limit with its reason, a word.
use super::field::{Field, other_dimension};
use super::values::{Values, nearest, quoted};
use crate::quantity::{Band, Dimension, Measure, QuantityError, Shape, Unit, format_unit, parse_measure};
use std::ops::Range;
use toml::Spanned;
use toml::de::{DeTable, DeValue};

type Value<'i> = Spanned<DeValue<'i>>;

/// Reads one value into `values`, or notes why not.
pub(super) fn read(values: &mut Values, text: &str, path: &str, field: &Field, value: &Value<'_>) {
    let Some(dimension) = field.dimension else {
        return match value.get_ref() {
            DeValue::String(word) => values.word(path, field, value.span(), word),
            other => wrong_type(values, value.span(), field, other, "expected text in quotes"),
        };
    };
    if field.is_count() {
        return count(values, path, field, value);
    }
    let one_value = path.starts_with("limits.");
    let measure = match value.get_ref() {
        DeValue::Table(table) if one_value => limit(values, text, path, field, table, value.span()),
        DeValue::Table(table) => long_band(values, text, field, dimension, table, value.span()),
        _ if one_value => single(values, text, field, dimension, value),
        _ => scalar(values, text, field, dimension, value),
    };
    if let Some(measure) = measure
        && in_range(values, field, &measure, value.span())
    {
        values.measures.insert(path.to_owned(), measure);
    }
}

/// A whole number without quotes.
fn count(values: &mut Values, path: &str, field: &Field, value: &Value<'_>) {
    let whole = match value.get_ref() {
        DeValue::Integer(number) if number.radix() == 10 => number.as_str().replace('_', ""),
        other => return wrong_type(values, value.span(), field, other, "expected a whole number"),
    };
    match whole.parse::<f64>() {
        Ok(number) if number >= field.least && number <= field.most => {
            values.measures.insert(path.to_owned(), Measure::exact(number, Unit::One));
        }
        _ => {
            let message = format!("{} is outside the range of {}", quoted(&whole), field.label);
            let expected = format!("expected {:.0} to {:.0}", field.least, field.most);
            let hint = format!("write a whole number such as `{} = {}`", field.key(), field.example);
            values.error(value.span(), message, &expected, Some(hint));
        }
    }
}

/// A quantity in quotes, or a bare number where a ratio is wanted.
fn scalar(values: &mut Values, text: &str, field: &Field, dimension: Dimension, value: &Value<'_>) -> Option<Measure> {
    let (written, bare) = match value.get_ref() {
        DeValue::String(written) => (written.to_string(), false),
        DeValue::Integer(number) if number.radix() == 10 => (number.as_str().to_owned(), true),
        DeValue::Float(number) => (number.as_str().to_owned(), true),
        other => {
            wrong_type(values, value.span(), field, other, "expected a quantity in quotes");
            return None;
        }
    };
    if bare && dimension != Dimension::Ratio {
        let message = format!("{} of {} is a bare number", quoted(&written), field.label);
        let units = Unit::for_dimension(dimension).iter().map(|u| format!("`{}`", u.symbol())).collect::<Vec<_>>();
        let hint = format!(
            "write it in quotes with its unit, such as `{} = {}`; units that fit: {}",
            field.key(),
            field.example,
            units.join(", ")
        );
        values.error(value.span(), message, "expected a quantity with its unit", Some(hint));
        return None;
    }
    match parse(field, dimension, &written) {
        Ok(measure) => Some(measure),
        Err(error) => {
            let span = inner_span(text, value.span(), &written, error.span());
            values.error(span, format!("{}: {error}", field.label), &error.expected(), Some(error.hint()));
            None
        }
    }
}

/// Parses a text for a field: a load may be a mass, a percentage may lack its sign.
pub(super) fn parse(field: &Field, dimension: Dimension, written: &str) -> Result<Measure, QuantityError> {
    let measure = match other_dimension(field).map(|other| parse_measure(written, other)) {
        Some(Ok(measure)) => measure,
        Some(Err(error @ (QuantityError::MissingUnit { .. } | QuantityError::NoNumber { .. }))) => return Err(error),
        _ => parse_measure(written, dimension)?,
    };
    if field.key() == "percent" && measure.unit == Unit::One {
        return parse_measure(&format!("{written} %"), dimension);
    }
    Ok(measure)
}

/// The place of a part of a quoted text; the whole value where quotes or escapes hide it.
pub(super) fn inner_span(text: &str, value: Range<usize>, written: &str, part: Range<usize>) -> Range<usize> {
    let inside = value.start + 1..value.end.saturating_sub(1);
    match text.get(inside.clone()) {
        Some(raw) if raw == written && !part.is_empty() => inside.start + part.start..inside.start + part.end,
        _ => value,
    }
}

/// The measure of a band in its long form; nothing where it has faults.
pub(super) fn long_measure(text: &str, field: &Field, value: &Value<'_>) -> Option<Measure> {
    let (table, dimension) = value.get_ref().as_table().zip(field.dimension)?;
    long_band(&mut Values::default(), text, field, dimension, table, value.span())
}

/// `{ low, typical, high, shape }`.
fn long_band(
    values: &mut Values,
    text: &str,
    field: &Field,
    dimension: Dimension,
    table: &DeTable<'_>,
    at: Range<usize>,
) -> Option<Measure> {
    let before = values.faults.len();
    let mut ends: [Option<Measure>; 3] = [None; 3];
    let mut shape = Some(Shape::Uniform);
    for (key, value) in table {
        match key.get_ref().as_ref() {
            "low" => ends[0] = single(values, text, field, dimension, value),
            "typical" => ends[1] = single(values, text, field, dimension, value),
            "high" => ends[2] = single(values, text, field, dimension, value),
            "shape" => shape = shape_of(values, value),
            other => {
                let hint = nearest(other, ["low", "typical", "high", "shape"].into_iter()).map_or_else(
                    || "a band holds `low`, `typical`, `high`, `shape`".into(),
                    |n| format!("did you mean `{n}`?"),
                );
                let message = format!("unknown key {} in a band", quoted(other));
                values.error(key.span(), message, "expected low, typical, high or shape", Some(hint));
            }
        }
    }
    if values.faults.len() > before {
        return None;
    }
    let ([Some(low), typical, Some(high)], Some(shape)) = (ends, shape) else {
        let hint = Some("write `{ low = .., typical = .., high = .., shape = \"uniform\" }`".to_owned());
        values.error(at, format!("the band of {} lacks an end", field.label), "expected low and high", hint);
        return None;
    };
    let middle = low.si() + (high.si() - low.si()) / 2.0;
    let lead = typical.unwrap_or(low);
    let band = Band { low: low.si(), typical: typical.map_or(middle, |t| t.si()), high: high.si(), shape };
    if !(band.low <= band.typical && band.typical <= band.high) {
        let hint = Some("order the three values".to_owned());
        values.error(
            at,
            format!("the band of {} is not in order", field.label),
            "expected low <= typical <= high",
            hint,
        );
        return None;
    }
    Some(Measure { band, ..lead })
}

fn shape_of(values: &mut Values, value: &Value<'_>) -> Option<Shape> {
    match value.get_ref().as_str() {
        Some("uniform") => Some(Shape::Uniform),
        Some("triangular") => Some(Shape::Triangular),
        Some("normal") => Some(Shape::Normal),
        _ => {
            let hint = Some("known: `uniform`, `triangular`, `normal`".to_owned());
            values.error(value.span(), "unknown shape of a band".into(), "expected one of the known words", hint);
            None
        }
    }
}

/// A value that must not be a band itself.
fn single(values: &mut Values, text: &str, field: &Field, dimension: Dimension, value: &Value<'_>) -> Option<Measure> {
    let measure = scalar(values, text, field, dimension, value)?;
    if !measure.band.is_wide() {
        return Some(measure);
    }
    let hint = Some("write one value here".to_owned());
    values.error(
        value.span(),
        format!("{} has a band where one value is wanted", field.label),
        "expected one value",
        hint,
    );
    None
}

/// `{ value, why }` of a single limit.
fn limit(
    values: &mut Values,
    text: &str,
    path: &str,
    field: &Field,
    table: &DeTable<'_>,
    at: Range<usize>,
) -> Option<Measure> {
    let mut found = None;
    let mut stands = false;
    for (key, value) in table {
        match (key.get_ref().as_ref(), value.get_ref()) {
            ("value", _) => {
                stands = true;
                values.spans.insert(format!("{path}.value"), value.span());
                found = field.dimension.and_then(|dimension| single(values, text, field, dimension, value));
            }
            ("why", DeValue::String(why)) => {
                values.whys.insert(path.to_owned(), why.to_string());
            }
            ("why", other) => wrong_type(values, value.span(), field, other, "expected text in quotes"),
            (other, _) => {
                let message = format!("unknown key {} in a limit", quoted(other));
                let hint = Some(match nearest(other, ["value", "why"].into_iter()) {
                    Some(near) => format!("did you mean `{near}`? a limit holds `value` and `why`"),
                    None => "a limit holds `value` and `why`".to_owned(),
                });
                values.error(key.span(), message, "expected value or why", hint);
            }
        }
    }
    if !stands {
        let hint = Some(format!("write `{{ value = {}, why = \"..\" }}`", field.example));
        values.error(at, format!("{} has no value", field.label), "expected `value`", hint);
    }
    found
}

fn in_range(values: &mut Values, field: &Field, measure: &Measure, at: Range<usize>) -> bool {
    let band = measure.band;
    if band.low >= field.least && band.high <= field.most {
        return true;
    }
    let wrong = if band.low >= field.least { band.high } else { band.low };
    let shown = |value: f64| format_unit(value, measure.unit);
    let message = format!("`{}` is outside the range of {}", shown(wrong), field.label);
    let expected = format!("expected {} to {}", shown(field.least), shown(field.most));
    values.error(
        at,
        message,
        &expected,
        Some(format!("check the number and its unit; for example `{} = {}`", field.key(), field.example)),
    );
    false
}

fn wrong_type(values: &mut Values, at: Range<usize>, field: &Field, found: &DeValue<'_>, expected: &str) {
    let message = format!("{} cannot be of type {}", field.label, found.type_str());
    values.error(at, message, expected, Some(format!("write it like `{} = {}`", field.key(), field.example)));
}
