//! The energy account and every number with its definition.
use super::steps::Steps;
use super::value::{Block, Cell, Column, Kind, Row, Section, Table, column, digits};
use crate::estimate::{Number, Value, definition};
use crate::quantity::UnitSystem;
use crate::sheet::Report;
use crate::sheet::text::{number_label, number_words};

const NUMBERS: &[Column] = &[
    column("label", "number", Kind::Name),
    column("id", "id", Kind::Formula),
    column("value", "value", Kind::Number),
    column("si", "value, SI", Kind::Number),
    column("meaning", "definition", Kind::Words),
];

/// The section of the ledger.
pub fn section(report: &Report, system: UnitSystem) -> Section {
    let rows = report.estimate.numbers.iter().map(|number| row(report, number, system)).collect();
    let caption = "every number with its definition".to_owned();
    let mut blocks: Vec<Block> = energy(report).into_iter().collect();
    blocks.push(Block::Table(Table { id: "numbers".to_owned(), caption, columns: NUMBERS, rows }));
    Section::new("ledger", "Ledger", blocks)
}

fn row(report: &Report, number: &Number, system: UnitSystem) -> Row {
    let shown = number_words(number, system);
    let (value, si) = match number.value {
        // Above 1e-9 there is no estimate; what it is below that is rounding, which differs from machine to machine.
        Value::Number(_) if number.id == "energy_residual" => (Cell::words("below 1e-9"), Cell::none()),
        Value::Number(value) => (Cell::shown(shown, value, number.unit), Cell::si(value, number.unit)),
        Value::Text(_) => (Cell::words(&shown), Cell::none()),
    };
    let stem = number.id.split_once('.').map_or(number.id.as_str(), |(stem, _)| stem);
    Row::new(vec![
        Cell::words(&number_label(&number.id, &report.scenario)),
        Cell::words(&number.id),
        value,
        si,
        Cell::words(definition(stem).map_or("", |d| d.meaning)),
    ])
}

/// The account at the lowest point of a straight fall: what the fall gives, and where it has gone.
fn energy(report: &Report) -> Option<Block> {
    let n = &report.estimate.numbers;
    let get = |id: &str| n.get(id);
    let (line, other, absorber, damper) =
        (get("line_work")?, get("other_work")?, get("absorber_work")?, get("damper_work")?);
    let solved = &report.estimate.solved;
    let mut steps = Steps::default();
    if let Some(distance) = get("arrest_distance") {
        let weight = solved.mass_kg * solved.gravity_m_per_s2;
        let numbers = format!("{} × ({} + {})", digits(weight), digits(solved.free_fall_m), digits(distance));
        let given = weight * (solved.free_fall_m + distance);
        steps.step("E", "given by the fall down to the lowest point", ["W (h + x_low)", &numbers], given, "J");
    }
    steps.given("E_1", "elastic energy of the line", line, "J");
    steps.given("E_2", "elastic energy of the other parts", other, "J");
    steps.given("E_s", "taken by the absorber: integral of T over the deployed length", absorber, "J");
    steps.given("E_c", "taken by the dampers: integral of c e′² over time", damper, "J");
    let numbers = format!("{} + {} + {} + {}", digits(line), digits(other), digits(absorber), digits(damper));
    let sum = line + other + absorber + damper;
    steps.step("Σ", "sum, without the energy of motion", ["E_1 + E_2 + E_s + E_c", &numbers], sum, "J");
    Some(steps.table("energy", "energy account at the lowest point"))
}
