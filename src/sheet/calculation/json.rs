//! The sheet as JSON: the same sections, and the report they are made of.
use super::value::{Block, Cell, Column, Row, Section, Sheet, Table};
use crate::sheet::{CAUTION_LINE, Layout, Report, object, print};
use serde_json::{Map, Value, json};

/// The sheet as one JSON object with a line end, SI units beside every number.
#[must_use]
pub fn sheet_json(sheet: &Sheet, report: &Report) -> String {
    let value = json!({
        "sheet": 1,
        "caution": CAUTION_LINE,
        "title": sheet.title,
        "file": sheet.file,
        "scenario_sha256": sheet.scenario_sha256,
        "version": env!("CARGO_PKG_VERSION"),
        "verdict": sheet.verdict.word(),
        "sections": sheet.sections.iter().map(section).collect::<Vec<_>>(),
        "report": object(report),
    });
    print(&value, Layout::Lines)
}

fn section(section: &Section) -> Value {
    json!({
        "id": section.id,
        "title": section.title,
        "blocks": section.blocks.iter().map(block).collect::<Vec<_>>(),
    })
}

fn block(block: &Block) -> Value {
    match block {
        Block::Words(words) => json!({ "kind": "words", "words": words }),
        Block::Verdict(verdict, words) => json!({ "kind": "verdict", "verdict": verdict.word(), "words": words }),
        Block::Part(words) => json!({ "kind": "part", "words": words }),
        Block::List(list) => json!({ "kind": "list", "list": list }),
        Block::Table(table) => table_object(table),
        Block::Figure(figure) => {
            json!({ "kind": "figure", "id": figure.id, "title": figure.title, "text": figure.text })
        }
        Block::Blank(lines) => json!({ "kind": "blank", "lines": lines }),
    }
}

fn table_object(table: &Table) -> Value {
    let columns = table.columns.iter().map(|c| json!({ "key": c.key, "head": c.head })).collect::<Vec<_>>();
    let rows = table.rows.iter().map(|row| row_object(table.columns, row)).collect::<Vec<_>>();
    json!({ "kind": "table", "id": table.id, "caption": table.caption, "columns": columns, "rows": rows })
}

fn row_object(columns: &[Column], row: &Row) -> Value {
    let cells = columns.iter().zip(&row.cells).map(|(column, cell)| (column.key.to_owned(), cell_value(cell)));
    Value::Object(cells.collect::<Map<_, _>>())
}

fn cell_value(cell: &Cell) -> Value {
    match cell.si {
        Some((value, unit)) => json!({ "words": cell.words, "value": value, "unit": unit }),
        None => json!(cell.words),
    }
}
