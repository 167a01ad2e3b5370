//! Reads a scenario file, solves it and prints what matters: `cargo run --example estimate -- scenarios/roof-foot-level.toml`.
//!
//! The same from code: change one input, solve again, and compare.
use std::error::Error;
use std::path::PathBuf;
use underfoot::estimate::estimate;
use underfoot::margin::margins;
use underfoot::quantity::Dimension;
use underfoot::scenario::{inputs, load, with_value};
use underfoot::sheet::CAUTIONS;

fn main() -> Result<(), Box<dyn Error>> {
    let path =
        std::env::args_os().nth(1).map_or_else(|| PathBuf::from("scenarios/roof-foot-level.toml"), PathBuf::from);
    let scenario = load(&path)?.scenario;

    for caution in CAUTIONS {
        println!("{caution}");
    }
    let today = estimate(&scenario)?;
    for margin in margins(&scenario, &today)? {
        println!("{} {}: {}", margin.verdict.symbol(), margin.label, margin.verdict.word());
    }

    // What ten per cent more mass does to the peak force.
    let mass = inputs(&scenario).into_iter().find(|input| input.path == "subject.mass").ok_or("no mass")?;
    debug_assert_eq!(mass.field.dimension, Some(Dimension::Mass));
    let heavier =
        with_value(&scenario, &mass.path, 1.1 * mass.measure.si()).ok_or("the heavier mass is not physical")?;
    let peak = |estimate: &underfoot::estimate::Estimate| estimate.numbers.get("arrest_force_peak");
    if let (Some(now), Some(then)) = (peak(&today), peak(&estimate(&heavier)?)) {
        println!("peak force {now:.0} N; with ten per cent more mass {then:.0} N");
    }
    Ok(())
}
