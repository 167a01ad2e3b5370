//! Steps of a working: symbol, formula, the same with numbers put in, value.
use super::value::{Block, Cell, Column, Kind, Row, Table, column};

const COLUMNS: &[Column] = &[
    column("symbol", "symbol", Kind::Formula),
    column("what", "what", Kind::Name),
    column("formula", "formula", Kind::Formula),
    column("numbers", "with numbers, SI", Kind::Formula),
    column("value", "value", Kind::Number),
];

/// A working under way.
#[derive(Clone, Debug, Default)]
pub struct Steps(Vec<Row>);

impl Steps {
    /// One step with its number in SI.
    pub fn step(&mut self, symbol: &str, what: &str, [formula, numbers]: [&str; 2], value: f64, unit: &'static str) {
        self.row(symbol, what, [formula, numbers], Cell::si(value, unit));
    }
    /// One step whose value is words.
    pub fn word(&mut self, symbol: &str, what: &str, [formula, numbers]: [&str; 2], words: &str) {
        self.row(symbol, what, [formula, numbers], Cell::words(words));
    }
    /// A number that needs no formula.
    pub fn given(&mut self, symbol: &str, what: &str, value: f64, unit: &'static str) {
        self.step(symbol, what, ["", ""], value, unit);
    }
    fn row(&mut self, symbol: &str, what: &str, [formula, numbers]: [&str; 2], value: Cell) {
        self.0.push(Row::new(vec![
            Cell::words(symbol),
            Cell::words(what),
            Cell::words(formula),
            Cell::words(numbers),
            value,
        ]));
    }
    /// The steps as a table.
    pub fn table(self, id: &str, caption: &str) -> Block {
        Block::Table(Table { id: id.to_owned(), caption: caption.to_owned(), columns: COLUMNS, rows: self.0 })
    }
}
