//! A JSON Schema of the scenario file, from the same table of keys that the reader uses, for editors that know TOML.
//!
//! It says less than the reader: ranges that depend on a unit, and keys that need or exclude each other across sections,
//! are the reader's alone. What the schema refuses, the reader refuses too.
use super::field::{Field, Need, other_dimension};
use super::keys::FIELDS;
use crate::quantity::{Dimension, Unit};
use serde_json::{Map, Value, json};

/// The draft that the schema is written in.
const DRAFT: &str = "https://json-schema.org/draft/2020-12/schema";
/// Most entries of a list and most rows of a table, as the reader has them.
const MOST: (u32, u32) = (200, 1000);
/// A number as files write it: sign, digits, point, power of ten.
const NUMBER: &str = r"[+-]?\d+(\.\d+)?([eE][+-]?\d+)?";

/// The schema as a JSON value, keys in file order.
///
/// # Reference
/// JSON Schema, draft 2020-12.
#[must_use]
pub fn schema() -> Value {
    let mut root = section("");
    let mut object = Map::new();
    object.insert("$schema".into(), json!(DRAFT));
    object.insert("title".into(), json!("underfoot scenario"));
    object.insert(
        "description".into(),
        json!(
            "who falls, from where, on what, and what must not be touched; a first-pass estimate, not a design; local code \
             and a licensed or competent person decide; plan the rescue first"
        ),
    );
    if let Some(keys) = root.as_object_mut() {
        object.append(keys);
    }
    object.insert("$defs".into(), definitions());
    Value::Object(object)
}

/// One section with its keys, its sections and what must stand in it.
fn section(path: &str) -> Value {
    let mut properties = Map::new();
    let mut required = Vec::new();
    for name in names(path) {
        let inner = if path.is_empty() { name.to_owned() } else { format!("{path}.{name}") };
        let field = FIELDS.iter().find(|field| field.path == inner);
        let value = match field {
            Some(field) => key(field),
            None if !names(&format!("{inner}.*")).is_empty() => json!({
                "type": "array", "maxItems": MOST.0, "items": section(&format!("{inner}.*")),
            }),
            None => section(&inner),
        };
        let must = match field.map(|field| field.need) {
            Some(Need::Always | Need::InSection) => true,
            None => FIELDS.iter().any(|f| f.need == Need::Always && f.path.starts_with(&format!("{inner}."))),
            _ => false,
        };
        if must {
            required.push(name);
        }
        properties.insert(name.to_owned(), value);
    }
    let mut object = json!({ "type": "object", "additionalProperties": false, "properties": properties });
    if !required.is_empty() {
        object["required"] = json!(required);
    }
    object
}

/// The names of the keys and sections right below a section, in file order.
fn names(path: &str) -> Vec<&'static str> {
    let mut names = Vec::new();
    for field in FIELDS {
        let rest = match path {
            "" => Some(field.path),
            path => field.path.strip_prefix(path).and_then(|rest| rest.strip_prefix('.')),
        };
        let name = rest.and_then(|rest| rest.split('.').next());
        if let Some(name) = name.filter(|name| *name != "*" && !names.contains(name)) {
            names.push(name);
        }
    }
    names
}

/// One key with its sentence and what its absence means.
fn key(field: &Field) -> Value {
    let mut value = match (field.columns, field.dimension) {
        (Some(columns), _) => table(columns),
        (None, Some(_)) if field.is_count() => json!({
            "type": "integer", "minimum": field.least, "maximum": field.most,
        }),
        (None, Some(_)) if field.path.starts_with("limits.") => limit(field),
        (None, Some(_)) => measure(field),
        (None, None) if field.words.is_empty() => json!({ "type": "string" }),
        (None, None) => json!({ "type": "string", "enum": field.words }),
    };
    let absent = match field.need {
        Need::Default(absent) => format!("; if absent: {absent}"),
        _ => String::new(),
    };
    value["description"] = json!(format!("{}{absent}; for example {}", field.doc, field.example));
    value
}

/// One value, a band in one text, or a band in its long form.
fn measure(field: &Field) -> Value {
    let mut ways: Vec<Value> = dimensions(field).map(|dimension| reference(dimension, "band")).collect();
    ways.extend(number(field));
    one_of(ways)
}

/// One value, with its reason where it stands in place of a published limit.
fn limit(field: &Field) -> Value {
    let mut ways: Vec<Value> = dimensions(field).map(|dimension| reference(dimension, "value")).collect();
    ways.extend(number(field));
    let value = one_of(ways.clone());
    ways.push(json!({
        "type": "object",
        "additionalProperties": false,
        "required": ["value"],
        "properties": { "value": value, "why": { "type": "string" } },
    }));
    one_of(ways)
}

fn one_of(mut ways: Vec<Value>) -> Value {
    match (ways.len(), ways.pop()) {
        (1, Some(only)) => only,
        (_, last) => {
            ways.extend(last);
            json!({ "anyOf": ways })
        }
    }
}

fn table(columns: [Dimension; 2]) -> Value {
    json!({
        "type": "array",
        "minItems": 2,
        "maxItems": MOST.1,
        "items": {
            "type": "array", "minItems": 2, "maxItems": 2,
            "prefixItems": columns.map(|dimension| reference(dimension, "value")),
        },
    })
}

/// A bare number, where a ratio is wanted.
fn number(field: &Field) -> Option<Value> {
    let scale = if field.key() == "percent" { 100.0 } else { 1.0 };
    (field.dimension == Some(Dimension::Ratio))
        .then(|| json!({ "type": "number", "minimum": field.least * scale, "maximum": field.most * scale }))
}

/// The dimensions in which a field may be stated.
fn dimensions(field: &Field) -> impl Iterator<Item = Dimension> {
    field.dimension.into_iter().chain(other_dimension(field))
}

fn reference(dimension: Dimension, what: &str) -> Value {
    json!({ "$ref": format!("#/$defs/{}_{what}", name(dimension)) })
}

/// `mass per length` as `mass_per_length`.
fn name(dimension: Dimension) -> String {
    dimension.word().replace(' ', "_")
}

/// What a value and a band of each dimension look like.
fn definitions() -> Value {
    let columns = FIELDS.iter().filter_map(|field| field.columns).flatten();
    let mut used: Vec<Dimension> = FIELDS.iter().flat_map(dimensions).chain(columns).collect();
    let mut seen = Vec::new();
    used.retain(|dimension| {
        !seen.contains(dimension) && {
            seen.push(*dimension);
            true
        }
    });
    let mut object = Map::new();
    for dimension in used {
        object.insert(
            format!("{}_value", name(dimension)),
            json!({ "type": "string", "pattern": pattern(dimension, 1) }),
        );
        let mut end = vec![reference(dimension, "value")];
        if dimension == Dimension::Ratio {
            end.push(json!({ "type": "number" }));
        }
        let end = one_of(end);
        object.insert(
            format!("{}_band", name(dimension)),
            json!({ "anyOf": [
            { "type": "string", "pattern": pattern(dimension, 3) },
            {
                "type": "object",
                "additionalProperties": false,
                "required": ["low", "high"],
                "properties": {
                    "low": end, "typical": end, "high": end,
                    "shape": { "type": "string", "enum": ["uniform", "triangular", "normal"] },
                },
            },
        ] }),
        );
    }
    Value::Object(object)
}

/// `low..typical..high unit` with up to so many values; the unit may stand after each value.
fn pattern(dimension: Dimension, most: usize) -> String {
    let unit = units(dimension);
    let feet = if dimension == Dimension::Length { format!(r"|\s*ft\s*{NUMBER}\s*in") } else { String::new() };
    let may_lack = if dimension == Dimension::Ratio { "?" } else { "" };
    let before = match most {
        1 => String::new(),
        most => format!(r"({NUMBER}(\s*{unit}{feet})?\s*\.\.\s*){{0,{}}}", most - 1),
    };
    format!(r"^\s*{before}{NUMBER}(\s*{unit}{feet}){may_lack}\s*$")
}

/// The units of a dimension: blanks may be `·` or `*`, a power may be written `²` or `^2`.
fn units(dimension: Dimension) -> String {
    let spelled = |unit: &Unit| unit.symbol().replace('2', r"(2|²|\^2)").replace(' ', r"\s*[\s·*]\s*");
    let units: Vec<String> =
        Unit::for_dimension(dimension).iter().filter(|unit| !unit.symbol().is_empty()).map(spelled).collect();
    format!("({})", units.join("|"))
}
