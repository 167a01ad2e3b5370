//! The sheet as one HTML page: no network, no script, for screen and paper.
use super::figure;
use super::value::{Block, Cell, Column, Figure, Kind, Row, Section, Sheet, Table};
use crate::margin::Verdict;
use crate::sheet::CAUTION_LINE;
use maud::{DOCTYPE, Markup, PreEscaped, html};

/// The look on screen, light and dark, and on paper.
pub const STYLE: &str = include_str!("style.css");

/// The sheet as a page of its own. Words of the file are escaped.
#[must_use]
pub fn sheet_html(sheet: &Sheet) -> String {
    let title = format!("Calculation sheet: {}", sheet.title);
    let page = html! {
        (DOCTYPE)
        html lang="en" {
            head {
                meta charset="utf-8";
                meta name="viewport" content="width=device-width, initial-scale=1";
                meta name="color-scheme" content="light dark";
                title { (title) }
                style { (PreEscaped(STYLE)) }
            }
            body {
                header {
                    p.caution role="note" { (CAUTION_LINE) }
                    h1 { (title) }
                    p.about { "underfoot " (env!("CARGO_PKG_VERSION")) ", " (sheet.file) ", SHA-256 " code { (&sheet.scenario_sha256[..sheet.scenario_sha256.len().min(16)]) } }
                }
                main { @for (index, part) in sheet.sections.iter().enumerate() { (section(index + 1, part)) } }
                footer { p { (CAUTION_LINE) } }
            }
        }
    };
    let mut text = page.into_string();
    text.push('\n');
    text
}

fn section(number: usize, section: &Section) -> Markup {
    html! {
        section id=(section.id) {
            h2 { (number) ". " (section.title) }
            @for block in &section.blocks { (self::block(block)) }
        }
    }
}

fn block(block: &Block) -> Markup {
    match block {
        Block::Words(words) => html! { p { (words) } },
        Block::Verdict(verdict, words) => html! {
            p class=(format!("verdict {}", verdict.word())) {
                strong { (verdict.symbol()) " " (verdict.word().to_uppercase()) } ": " (words)
            }
        },
        Block::Part(words) => html! { h3 { (words) } },
        Block::List(list) => html! { ul { @for words in list { li { (words) } } } },
        Block::Table(table) => self::table(table),
        Block::Figure(figure) => self::figure(figure),
        Block::Blank(lines) => html! {
            table.blank {
                caption { "To be filled in by hand" }
                tbody { @for line in *lines { tr { th scope="row" { (line) } td {} } } }
            }
        },
    }
}

fn table(table: &Table) -> Markup {
    html! {
        table id=(format!("table-{}", table.id)) class=(table_class(table)) {
            caption { (table.caption) }
            thead { tr { @for column in table.columns { th scope="col" class=[column_class(column)] { (column.head) } } } }
            tbody { @for row in &table.rows { (self::row(table, row)) } }
        }
    }
}

/// Whether the rows are steps of a working, with symbols in their words.
fn is_working(table: &Table) -> bool {
    table.columns.iter().any(|column| column.key == "formula")
}

/// Most rows of a table that is kept on one page.
const WHOLE: usize = 12;

fn table_class(table: &Table) -> &'static str {
    match (is_working(table), table.rows.len() <= WHOLE) {
        (true, true) => "steps whole",
        (true, false) => "steps",
        (false, true) => "plain whole",
        (false, false) => "plain",
    }
}

fn row(table: &Table, row: &Row) -> Markup {
    let working = is_working(table);
    html! {
        tr class=[row.verdict.map(Verdict::word)] {
            @for (column, cell) in table.columns.iter().zip(&row.cells) { (self::cell(column, cell, working)) }
        }
    }
}

fn cell(column: &Column, cell: &Cell, working: bool) -> Markup {
    let words = match (column.kind, working) {
        (_, true) => formula(&cell.words),
        (Kind::Formula, false) => key(&cell.words),
        _ => html! { (cell.words) },
    };
    if column.kind == Kind::Name {
        return html! { th scope="row" { (words) } };
    }
    html! { td class=[column_class(column)] { (words) } }
}

/// A key of the file or an id, which may break after its points and between its words.
fn key(words: &str) -> Markup {
    html! { @for part in words.split_inclusive(['.', '_']) { (part) wbr; } }
}

const fn column_class(column: &Column) -> Option<&'static str> {
    match column.kind {
        Kind::Number => Some("number"),
        Kind::Formula => Some("formula"),
        Kind::Words | Kind::Name => None,
    }
}

/// A formula with its lower indices set low: `x_low` up to the first sign that is no letter, digit or comma between two.
fn formula(words: &str) -> Markup {
    let mut parts = words.split('_');
    let first = parts.next().unwrap_or("");
    html! {
        (first)
        @for part in parts {
            @let end = index_end(part);
            sub { (&part[..end]) } (&part[end..])
        }
    }
}

fn index_end(part: &str) -> usize {
    let mut end = 0;
    let mut rest = part.char_indices().peekable();
    while let Some((at, c)) = rest.next() {
        let comma = c == ',' && rest.peek().is_some_and(|(_, next)| next.is_ascii_alphanumeric());
        if !(c.is_ascii_alphanumeric() || comma) {
            break;
        }
        end = at + c.len_utf8();
    }
    end
}

fn figure(figure: &Figure) -> Markup {
    html! {
        figure id=(format!("figure-{}", figure.id)) {
            (figure::svg(figure))
            figcaption { strong { (figure.title) ". " } (figure.text) }
        }
    }
}
