//! The vertical solver against a general-purpose integrator with event location of its own.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
mod support;

use std::fmt::Write as _;
use support::compare::{Row, rows};
use support::random::physical;
use support::{Case, Fineness, numbers};
use underfoot::arrest::{Settings, solve};

const SEED: u64 = 2026;
const AGREEMENT: f64 = 1e-6;

fn compare(case: &Case) -> Result<Vec<Row>, String> {
    let settings = Settings::default();
    let outcome = solve(&case.fall(), &settings).map_err(|error| error.to_string())?;
    Ok(rows(case, &outcome, &numbers(case, Fineness::default(), settings.levels_n)))
}

fn line(table: &mut String, name: &str, row: &Row) {
    let show = |number: Option<f64>| number.map_or_else(|| "-".to_owned(), |number| format!("{number:.12}"));
    writeln!(
        table,
        "{name:>6}  {:<18} {:>22} {:>22} {:>10.2e}",
        row.id,
        show(row.solver),
        show(row.reference),
        row.difference
    )
    .expect("writing to a string");
}

/// Compares the cases and gives a table of every disagreement, and the number of figures compared.
fn disagreements(indices: impl Iterator<Item = u64>, make: impl Fn(u64) -> Case) -> (String, usize) {
    let mut table = String::new();
    let mut compared = 0;
    for index in indices {
        let case = make(index);
        let before = table.len();
        match compare(&case) {
            Err(error) => writeln!(table, "{index:>6}  refused: {error}").expect("writing to a string"),
            Ok(rows) => {
                compared += rows.len();
                for row in rows.iter().filter(|row| row.difference.is_nan() || row.difference > AGREEMENT) {
                    line(&mut table, &index.to_string(), row);
                }
            }
        }
        if table.len() > before {
            writeln!(table, "        {case:?}").expect("writing to a string");
        }
    }
    (table, compared)
}

fn check(count: u64, make: impl Fn(u64) -> Case) {
    let (table, compared) = disagreements(0..count, make);
    let heading = "  case  id                                 solver              reference difference";
    assert!(table.is_empty(), "\n{heading}\n{table}");
    assert!(compared as u64 > 15 * count, "only {compared} numbers were compared");
}

#[test]
fn solver_and_integrator_agree_on_linear_parts_with_and_without_absorber() {
    check(300, |index| physical(SEED, index, false));
}

#[test]
fn solver_and_integrator_agree_on_curved_lines() {
    check(60, |index| physical(SEED + 1, index, true));
}
