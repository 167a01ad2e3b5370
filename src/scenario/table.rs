//! Tables of a file: rows of two quantities, judged row by row.
use super::field::Field;
use super::values::Values;
use crate::quantity::{Dimension, Unit, format_unit, parse_quantity};
use std::ops::Range;
use toml::Spanned;
use toml::de::DeValue;

type Value<'i> = Spanned<DeValue<'i>>;

/// Most rows of one table.
const MOST_ROWS: usize = 1000;
/// Longest elongation or deployed length of a table, m: as the longest line.
const LONGEST_M: f64 = 1000.0;
/// Largest force of a table, N.
const MOST_N: f64 = 1e9;

/// One row as read: abscissa and ordinate, SI, with their units and where it stands.
struct Row {
    x: f64,
    y: f64,
    units: [Unit; 2],
    at: Range<usize>,
}

/// Reads one table into `values`, or notes the rows that are wrong.
pub(super) fn read(
    values: &mut Values,
    text: &str,
    path: &str,
    field: &Field,
    columns: [Dimension; 2],
    value: &Value<'_>,
) {
    let Some(list) = value.get_ref().as_array() else {
        let message = format!("{} cannot be of type {}", field.label, value.get_ref().type_str());
        return values.error(value.span(), message, "expected a list of pairs", Some(like(field)));
    };
    if !(2..=MOST_ROWS).contains(&list.len()) {
        let rows = if list.len() == 1 { "row" } else { "rows" };
        let message = format!("the {} has {} {rows}", field.label, list.len());
        return values.error(value.span(), message, "expected 2 to 1000 rows", Some(like(field)));
    }
    let before = values.faults.len();
    let rows: Vec<Row> = list
        .iter()
        .enumerate()
        .filter_map(|(index, row)| pair(values, text, field, columns, (index + 1, row)))
        .collect();
    if values.faults.len() == before && ordered(values, field, &rows) {
        values.tables.insert(path.to_owned(), rows.iter().map(|row| (row.x, row.y)).collect());
    }
}

fn like(field: &Field) -> String {
    format!("write it like `{} = {}`", field.key(), field.example)
}

/// One row of two quantities.
fn pair(
    values: &mut Values,
    text: &str,
    field: &Field,
    columns: [Dimension; 2],
    (number, row): (usize, &Value<'_>),
) -> Option<Row> {
    let cells: Vec<&Value<'_>> = row.get_ref().as_array().map(|cells| cells.iter().collect()).unwrap_or_default();
    let [first, second] = cells.as_slice() else {
        let message = format!("row {number} of the {} is not a pair", field.label);
        values.error(row.span(), message, "expected two quantities in quotes", Some(like(field)));
        return None;
    };
    let x = cell(values, text, field, columns[0], (number, first));
    let y = cell(values, text, field, columns[1], (number, second));
    let ((x, x_unit), (y, y_unit)) = (x?, y?);
    Some(Row { x, y, units: [x_unit, y_unit], at: row.span() })
}

/// One quantity of a row, SI, not negative.
fn cell(
    values: &mut Values,
    text: &str,
    field: &Field,
    dimension: Dimension,
    (number, value): (usize, &Value<'_>),
) -> Option<(f64, Unit)> {
    let Some(written) = value.get_ref().as_str() else {
        let message = format!("row {number} of the {} holds a value without quotes", field.label);
        values.error(value.span(), message, "expected a quantity with its unit", Some(like(field)));
        return None;
    };
    let most = if dimension == Dimension::Length { LONGEST_M } else { MOST_N };
    match parse_quantity(written, dimension) {
        Ok((si, unit)) if (0.0..=most).contains(&si) => Some((si, unit)),
        Ok((si, unit)) => {
            let message =
                format!("`{}` in row {number} is outside the range of the {}", format_unit(si, unit), field.label);
            let expected = format!("expected {} to {}", format_unit(0.0, unit), format_unit(most, unit));
            values.error(value.span(), message, &expected, Some("check the number and its unit".to_owned()));
            None
        }
        Err(error) => {
            let at = super::leaf::inner_span(text, value.span(), written, error.span());
            let message = format!("row {number} of the {}: {error}", field.label);
            values.error(at, message, &error.expected(), Some(error.hint()));
            None
        }
    }
}

/// Whether the rows start and rise as a law must; the first that does not is noted.
fn ordered(values: &mut Values, field: &Field, rows: &[Row]) -> bool {
    let elastic = field.path == "line.curve";
    let Some(first) = rows.first() else { return false };
    if first.x != 0.0 || (elastic && first.y != 0.0) {
        let (what, hint) = if elastic {
            ("0 and 0", "a line without stretch carries no force; add the pair `[\"0 m\", \"0 kN\"]` before it")
        } else {
            ("length 0", "add the force at the start of deployment, such as `[\"0 m\", \"3 kN\"]`")
        };
        let message = format!("row 1 of the {} does not start at {what}", field.label);
        values.error(first.at.clone(), message, &format!("expected {what}"), Some(hint.to_owned()));
        return false;
    }
    if !elastic && first.y == 0.0 {
        let hint = Some("an absorber that starts at no force would not hold the line; check the row".to_owned());
        values.error(first.at.clone(), format!("row 1 of the {} has no force", field.label), "expected a force", hint);
        return false;
    }
    for (index, pair) in rows.windows(2).enumerate() {
        let [before, row] = pair else { continue };
        if let Some((wrong, expected, hint)) = falls(before, row, elastic) {
            let message = format!("row {} of the {}: {wrong}", index + 2, field.label);
            values.error(row.at.clone(), message, expected, Some(hint.to_owned()));
            return false;
        }
    }
    true
}

/// What of a row does not rise over the row before.
fn falls(before: &Row, row: &Row, elastic: bool) -> Option<(String, &'static str, &'static str)> {
    let shown = |si: f64, unit: Unit| format!("`{}`", format_unit(si, unit));
    let order = "order the rows by their first value, each only once";
    if row.x <= before.x {
        let (now, then) = (shown(row.x, row.units[0]), shown(before.x, before.units[0]));
        return Some((
            format!("the length {now} is not above {then} of the row before"),
            "expected a larger length",
            order,
        ));
    }
    let (now, then) = (shown(row.y, row.units[1]), shown(before.y, before.units[1]));
    if elastic && row.y <= before.y {
        let hint = "a line that stretches further carries more force; leave out what came after the largest force";
        return Some((
            format!("the force {now} is not above {then} of the row before"),
            "expected a larger force",
            hint,
        ));
    }
    (row.y < before.y).then(|| {
        let hint = "run it twice with curves that never fall: one above the measured force for the peak, one below it \
                    for the stroke";
        (format!("the force {now} falls below {then} of the row before"), "expected no smaller force", hint)
    })
}
