//! One input across a range, and a map of two, as JSON in SI units.
use super::field::{MAP_CAUTION, Map};
use super::json::si_unit;
use super::vary::ROW_CAUTION;
use super::{CAUTIONS, Report};
use crate::estimate::Value as NumberValue;
use crate::margin::{Check, CheckKind, Verdict, governing_first, worst};
use crate::quantity::UnitSystem;
use crate::study::{Axis, Cell, Crossing, Edge, Evaluator, Field, Row, Run, Variation};
use serde_json::{Map as Object, Value, json};

fn head(report: &Report, more: &[&str]) -> Value {
    let cautions: Vec<&str> = CAUTIONS.iter().chain(more).copied().collect();
    json!({
        "file": report.file,
        "scenario_sha256": report.scenario_sha256,
        "version": env!("CARGO_PKG_VERSION"),
        "cautions": cautions,
        "verdict": report.verdict.word(),
    })
}

/// The values of one input with every number and every check, and where verdicts change.
#[must_use]
pub fn vary_object(report: &Report, evaluator: &Evaluator, found: &Variation) -> Value {
    let mut object = head(report, &[ROW_CAUTION]);
    object["over"] = input_object(evaluator, found.input);
    object["rows"] = found.rows.iter().map(|row| row_object(evaluator, row)).collect();
    object["crossings"] = found.crossings.iter().map(|at| crossing_object(evaluator, found, at)).collect();
    object
}

fn input_object(evaluator: &Evaluator, input: usize) -> Value {
    evaluator.inputs().get(input).map_or(Value::Null, |input| {
        json!({
            "path": input.path,
            "label": input.field.label,
            "unit": si_unit(input.measure.dimension()),
            "today": input.measure.si(),
        })
    })
}

fn row_object(evaluator: &Evaluator, row: &Row) -> Value {
    let run = &row.run;
    let number = |value: &NumberValue| match value {
        NumberValue::Number(value) => json!(value),
        NumberValue::Text(words) => json!(words),
    };
    let numbers: Object<String, Value> =
        run.numbers.iter().map(|n| (n.id.clone(), json!({ "value": number(&n.value), "unit": n.unit }))).collect();
    let first = run.checks.iter().min_by(|a, b| governing_first(a, b));
    json!({
        "value": row.value,
        "verdict": worst(run.checks.iter().map(|check| check.verdict)).word(),
        "governing": first.map(|check| id(evaluator, run, check)),
        "failed": run.failure.as_ref().map(ToString::to_string),
        "numbers": numbers,
        "margins": run.checks.iter().map(|check| check_object(evaluator, run, check)).collect::<Vec<_>>(),
    })
}

fn id(evaluator: &Evaluator, run: &Run, check: &Check) -> String {
    evaluator.margin(run, check, UnitSystem::Metric).id
}

fn check_object(evaluator: &Evaluator, run: &Run, check: &Check) -> Value {
    json!({
        "id": id(evaluator, run, check),
        "demand": check.demand,
        "limit": check.limit,
        "margin": check.margin,
        "unit": si_unit(check.kind.dimension()),
        "verdict": check.verdict.word(),
    })
}

fn crossing_object(evaluator: &Evaluator, found: &Variation, at: &Crossing) -> Value {
    let known = found.rows.iter().find_map(|row| row.run.check(at.kind).map(|check| id(evaluator, &row.run, check)));
    json!({
        "value": at.value,
        "id": known,
        "below": at.below.word(),
        "above": at.above.word(),
        "how": how(at.through_zero),
    })
}

const fn how(through_zero: bool) -> &'static str {
    if through_zero { "zero" } else { "jump" }
}

/// The map: values of both inputs, row by row from the low end of the second the verdict, the governing check and its
/// margin; and the pieces of the line where all checks together change between holding and not.
#[must_use]
pub fn field_object(report: &Report, evaluator: &Evaluator, field: &Field) -> Value {
    let map = Map { evaluator, field, system: UnitSystem::Metric };
    let axis = |axis: &Axis| {
        let mut object = input_object(evaluator, axis.input);
        object["values"] = (0..axis.steps).map(|step| json!(axis.value(step))).collect();
        object
    };
    let names = names(evaluator, field);
    let cell = |cell: &Cell| {
        let first = cell.governing();
        json!({
            "verdict": cell.verdict().word(),
            "governing": first.map(|check| name_of(&names, check.kind)),
            "margin": first.and_then(|check| check.margin),
            "failed": cell.failure.as_ref().map(ToString::to_string),
        })
    };
    let row = |cells: &[Cell]| cells.iter().map(cell).collect::<Vec<_>>();
    let point = |point: &Edge| {
        let kind = point.kind.map(|kind| name_of(&names, kind));
        let (beyond, how) = (point.beyond.word(), how(point.through_zero));
        json!({ "at": [point.x, point.y], "id": kind, "beyond": beyond, "how": how })
    };
    let mut object = head(report, &[MAP_CAUTION]);
    object["over"] = axis(&field.across);
    object["and"] = axis(&field.up);
    object["partial"] = json!(field.partial);
    object["failed"] = json!(field.failed());
    object["units"] = names.iter().map(|(kind, name)| (name.clone(), json!(si_unit(kind.dimension())))).collect();
    object["file_within"] = json!(map.present(&field.across).is_some() && map.present(&field.up).is_some());
    object["counts"] = [Verdict::Holds, Verdict::Open, Verdict::Short]
        .map(|verdict| (verdict.word().to_owned(), json!(field.count(verdict))))
        .into_iter()
        .collect();
    object["cells"] = field.cells.chunks(field.across.steps).map(row).collect();
    object["line"] = field.line.iter().map(|piece| json!(piece.iter().map(point).collect::<Vec<_>>())).collect();
    object
}

/// The id of every check of a field.
fn names(evaluator: &Evaluator, field: &Field) -> Vec<(CheckKind, String)> {
    let mut names: Vec<(CheckKind, String)> = Vec::new();
    let run = evaluator.typical();
    for check in field.cells.iter().flat_map(|cell| &cell.checks) {
        if names.iter().all(|(kind, _)| *kind != check.kind) {
            names.push((check.kind, id(evaluator, &run, check)));
        }
    }
    names.sort_by_key(|(kind, _)| *kind);
    names
}

fn name_of(names: &[(CheckKind, String)], kind: CheckKind) -> Option<&String> {
    names.iter().find(|(known, _)| *known == kind).map(|(_, name)| name)
}
