//! One value of a text replaced, every other byte kept.
use super::field::{Field, LISTS, field_for};
use super::{Change, Places, leaf, path, places};
use crate::quantity::{Dimension, Measure, Shape, format_band, format_unit, parse_quantity};
use toml::de::DeValue;
use toml_edit::{ArrayOfTables, DocumentMut, InlineTable, Item, Table};

/// The text with all changes made in turn; the reader judges the result.
///
/// # Errors
/// A message when a path has no place in the file.
pub(super) fn with_changes(text: &str, changes: &[Change]) -> Result<String, String> {
    changes.iter().try_fold(text.to_owned(), |text, change| match change {
        Change::Set { path, value } => with_value(&text, &places(&text), path, value),
        Change::Remove { path } => removed(&text, path),
    })
}

/// The text without a key, or a section with all below it; its comment goes with it.
fn removed(text: &str, path: &str) -> Result<String, String> {
    let mut document: DocumentMut = text.parse().map_err(|_| format!("there is no place for `{path}`"))?;
    let mut parts: Vec<&str> = path.split('.').collect();
    let key = parts.pop().unwrap_or(path);
    let mut at: &mut Item = document.as_item_mut();
    for part in parts {
        at = at.get_mut(part).ok_or_else(|| format!("there is no `{path}`"))?;
    }
    let table = at.as_table_like_mut().ok_or_else(|| format!("there is no `{path}`"))?;
    table.remove(key).ok_or_else(|| format!("there is no `{path}`"))?;
    Ok(ends_like(text, document.to_string()))
}

/// The edited text with the line ends of the one before.
fn ends_like(text: &str, edited: String) -> String {
    if text.contains("\r\n") { edited.replace("\r\n", "\n").replace('\n', "\r\n") } else { edited }
}

/// The text with one input written anew; the reader judges the result.
///
/// # Errors
/// A message when the input has no place in the file.
fn with_value(text: &str, places: &Places, input: &str, value: &str) -> Result<String, String> {
    let field = field_for(input).ok_or_else(|| format!("there is no input `{input}`"))?;
    let inner = format!("{input}.value");
    let Some(at) = places.exactly(&inner).or_else(|| places.exactly(input)) else {
        return inserted(text, field, input, value);
    };
    let old = text.get(at.clone()).unwrap_or_default();
    let mut edited = String::with_capacity(text.len() + value.len());
    edited.push_str(&text[..at.start]);
    edited.push_str(&literal(old, field, value));
    edited.push_str(&text[at.end..]);
    Ok(edited)
}

/// How a value stands in the file, in the manner of the old one.
fn literal(old: &str, field: &Field, value: &str) -> String {
    let value = value.trim();
    if field.columns.is_some() && DeValue::parse(value).is_ok_and(|value| value.get_ref().is_array()) {
        return value.to_owned();
    }
    let old_measure = old_measure(old, field);
    if let (Some(old_measure), Some(dimension)) = (&old_measure, field.dimension)
        && old_measure.band.is_wide()
        && parse_quantity(value, dimension).is_ok()
        && let Ok(new) = leaf::parse(field, dimension, value)
    {
        let moved =
            Measure { unit: new.unit, feet_and_inches: new.feet_and_inches, ..path::moved(old_measure, new.si()) };
        return band_literal(old, &moved);
    }
    if field.dimension == Some(Dimension::Ratio) && !old.starts_with(['"', '\'']) && is_number(value) {
        return value.to_owned();
    }
    quoted_like(old, value)
}

/// A bare TOML number.
fn is_number(value: &str) -> bool {
    DeValue::parse(value).is_ok_and(|value| value.get_ref().is_integer() || value.get_ref().is_float())
}

/// The measure that stands there now.
fn old_measure(old: &str, field: &Field) -> Option<Measure> {
    let dimension = field.dimension?;
    let value = DeValue::parse(old).ok()?;
    match value.get_ref() {
        DeValue::String(written) => leaf::parse(field, dimension, written).ok(),
        DeValue::Table(_) => leaf::long_measure(old, field, &value),
        _ => None,
    }
}

/// A band in the short form, or in the long form where it stood so.
fn band_literal(old: &str, measure: &Measure) -> String {
    if !old.starts_with('{') {
        return quoted_like(old, &format_band(measure));
    }
    let shape = match measure.band.shape {
        Shape::Uniform => "uniform",
        Shape::Triangular => "triangular",
        Shape::Normal => "normal",
    };
    let end = |value| quoted_like("\"", &format_unit(value, measure.unit));
    let (low, typical, high) = (end(measure.band.low), end(measure.band.typical), end(measure.band.high));
    format!("{{ low = {low}, typical = {typical}, high = {high}, shape = \"{shape}\" }}")
}

/// A TOML string in the quotes of the old value where they can hold it.
fn quoted_like(old: &str, value: &str) -> String {
    let plain = |c: char| c != '\'' && !c.is_control();
    if old.starts_with('\'') && !old.starts_with("'''") && value.chars().all(plain) {
        return format!("'{value}'");
    }
    toml_edit::Value::from(value).to_string()
}

/// The text with a key added at the end of its section, which is made where it is absent.
fn inserted(text: &str, field: &Field, input: &str, value: &str) -> Result<String, String> {
    let mut document: DocumentMut = text.parse().map_err(|_| format!("there is no place for `{input}`"))?;
    let item: Item =
        literal("", field, value).parse::<toml_edit::Value>().map(Item::Value).map_err(|e| e.to_string())?;
    let mut parts: Vec<&str> = input.split('.').collect();
    let key = parts.pop().unwrap_or(input);
    let mut at: &mut Item = document.as_item_mut();
    let mut rest = parts.into_iter();
    while let Some(part) = rest.next() {
        let braces = at.is_inline_table();
        let table = at.as_table_like_mut().ok_or_else(|| format!("there is no place for `{input}`"))?;
        if LISTS.contains(&part) {
            at = list_entry(table.get_mut(part), rest.next()).ok_or_else(|| format!("there is no `{input}`"))?;
        } else {
            at = table.entry(part).or_insert_with(|| {
                if braces { Item::Value(InlineTable::new().into()) } else { Item::Table(Table::new()) }
            });
        }
    }
    insert(at, key, item).ok_or_else(|| format!("there is no place for `{input}`"))?;
    Ok(ends_like(text, document.to_string()))
}

/// Adds a key at the end of a table; in braces the blank before the closing one stays there.
fn insert(at: &mut Item, key: &str, mut item: Item) -> Option<()> {
    if let (Some(table), Some(value)) = (at.as_inline_table_mut(), item.as_value_mut())
        && let Some((_, last)) = table.iter_mut().last()
    {
        let blank = last.decor().suffix().cloned().unwrap_or_else(|| " ".into());
        last.decor_mut().set_suffix("");
        value.decor_mut().set_prefix(" ");
        value.decor_mut().set_suffix(blank);
    }
    at.as_table_like_mut()?.insert(key, item);
    Some(())
}

/// The table of one obstacle or face.
fn list_entry<'d>(list: Option<&'d mut Item>, number: Option<&str>) -> Option<&'d mut Item> {
    let index = number?.parse::<usize>().ok()?.checked_sub(1)?;
    let list: &mut Item = list?;
    let length =
        list.as_array_of_tables().map(ArrayOfTables::len).or_else(|| list.as_array().map(toml_edit::Array::len))?;
    if index < length { list.get_mut(index) } else { None }
}
