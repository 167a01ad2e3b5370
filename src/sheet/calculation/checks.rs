//! The checks with limit, clause, year and how the limit was confirmed.
use super::value::{Block, Cell, Column, Kind, Row, Section, Table, column};
use crate::margin::{Margin, Sense};
use crate::quantity::UnitSystem;
use crate::sheet::Report;
use crate::sheet::json::si_unit;
use crate::sheet::words::margin_value;

const MARGINS: &[Column] = &[
    column("verdict", "verdict", Kind::Words),
    column("check", "check", Kind::Name),
    column("demand", "demand", Kind::Number),
    column("limit", "limit", Kind::Number),
    column("room", "room", Kind::Number),
];
const BASES: &[Column] = &[
    column("check", "check", Kind::Name),
    column("basis", "where the limit comes from: clause, year, how confirmed", Kind::Words),
    column("note", "note", Kind::Words),
];

/// The section of the margins, the governing check first.
pub fn section(report: &Report, margins: &[Margin], system: UnitSystem) -> Section {
    if margins.is_empty() {
        let words = "Nothing to judge: the file states no obstacle and no limits, so the verdict is open.";
        return Section::new("margins", "Margins", vec![Block::words(words)]);
    }
    let mut blocks = vec![
        table("margins", "checks, the governing one first", MARGINS, margins.iter().map(|m| row(m, system)).collect()),
        table("bases", "where each limit comes from", BASES, margins.iter().map(basis).collect()),
    ];
    if !report.limit_remarks.is_empty() {
        blocks.push(Block::part("About the limits"));
        blocks.push(Block::list(&report.limit_remarks));
    }
    Section::new("margins", "Margins", blocks)
}

fn table(id: &str, caption: &str, columns: &'static [Column], rows: Vec<Row>) -> Block {
    Block::Table(Table { id: id.to_owned(), caption: caption.to_owned(), columns, rows })
}

fn row(margin: &Margin, system: UnitSystem) -> Row {
    let unit = si_unit(margin.dimension);
    let cell = |value: Option<f64>, lead: &str| match value {
        Some(value) => Cell::shown(format!("{lead}{}", margin_value(margin, value, system)), value, unit),
        None => Cell::words("-"),
    };
    let sign = match margin.sense {
        Sense::AtMost => "≤ ",
        Sense::AtLeast => "≥ ",
    };
    let plus = if margin.margin.is_some_and(|room| room > 0.0) { "+" } else { "" };
    Row {
        cells: vec![
            Cell::words(&format!("{} {}", margin.verdict.symbol(), margin.verdict.word())),
            Cell::words(&margin.label),
            cell(margin.demand, ""),
            cell(margin.limit, sign),
            cell(margin.margin, plus),
        ],
        verdict: Some(margin.verdict),
    }
}

fn basis(margin: &Margin) -> Row {
    let lead = if margin.basis.from_memory { "FROM MEMORY, UNVERIFIED: " } else { "" };
    Row::new(vec![
        Cell::words(&margin.label),
        Cell::words(&format!("{lead}{}", margin.basis.words)),
        Cell::words(margin.note.as_deref().unwrap_or("")),
    ])
}
