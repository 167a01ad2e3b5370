//! Cost of a map of two inputs, as ratios measured in one run: against as many single runs, on one and on two threads.
#![allow(clippy::expect_used, reason = "a bench fails by panicking")]
use std::hint::black_box;
use std::ops::ControlFlow;
use std::time::Instant;
use underfoot::scenario::read;
use underfoot::study::{Axis, Evaluator, Field, Of, field, zero_line};

const FILE: &str = "scenarios/roof-foot-level.toml";
const CELLS: [usize; 2] = [120, 40];

/// Seconds a call: the best of several.
fn seconds<T>(calls: u32, mut call: impl FnMut() -> T) -> f64 {
    let mut one = || {
        let start = Instant::now();
        black_box(call());
        start.elapsed().as_secs_f64()
    };
    (0..calls).map(|_| one()).fold(f64::INFINITY, f64::min)
}

fn map(evaluator: &Evaluator) -> Field {
    let axis = |path: &str, range, steps| Axis { input: evaluator.index_of(path).expect("an input"), range, steps };
    let across = axis("line.length", 1.0..=2.5, CELLS[0]);
    let up = axis("absorber.deploy_force", 2000.0..=6000.0, CELLS[1]);
    field(evaluator, across, up, &mut |_| ControlFlow::Continue(())).expect("a field")
}

fn main() {
    let text = std::fs::read_to_string(FILE).expect("a scenario");
    let evaluator = Evaluator::new(&read(FILE, &text).expect("a scenario")).expect("an evaluator");
    let known = map(&evaluator);
    let single = seconds(2000, || evaluator.typical());
    let on = |threads: usize| {
        let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build().expect("a pool");
        pool.install(|| seconds(25, || map(&evaluator)))
    };
    let (one, two) = (on(1), on(2));
    let line = seconds(10, || zero_line(&evaluator, &known, Of::All));
    #[expect(clippy::cast_precision_loss, reason = "cells are few")]
    let cells = (CELLS[0] * CELLS[1]) as f64;
    println!(
        "map {} x {}: {:.1} ms on 1 thread, {:.1} ms on 2 ({:.2} times as fast); line of {} pieces {:.1} ms",
        CELLS[0],
        CELLS[1],
        one * 1e3,
        two * 1e3,
        one / two,
        known.line.len(),
        line * 1e3
    );
    println!(
        "a cell with its share of the line costs {:.2} single runs of {:.1} us",
        one / cells / single,
        single * 1e6
    );
}
