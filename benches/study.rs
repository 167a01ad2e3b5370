//! Throughput of the sample of the bands, as ratios measured in one run.
#![allow(clippy::expect_used, reason = "a bench fails by panicking")]
use std::ops::ControlFlow;
use std::path::Path;
use std::time::Instant;
use underfoot::scenario::load;
use underfoot::study::{Evaluator, spread, unwatched, worst_found};

/// Samples of the goal.
const SAMPLES: usize = 100_000;
/// Goal: a vertical scenario with absorber in less than this, s, on two cores.
const GOAL_S: f64 = 1.0;
/// Goal: two threads over one.
const GOAL_TIMES: f64 = 1.8;

fn evaluator(name: &str) -> Evaluator {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios").join(name);
    Evaluator::new(&load(&path).expect("a shipped scenario").scenario).expect("known limits")
}

/// Seconds of one call on some threads.
fn seconds(threads: usize, call: impl FnOnce() + Send) -> f64 {
    let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build().expect("threads");
    pool.install(|| {
        let start = Instant::now();
        call();
        start.elapsed().as_secs_f64()
    })
}

fn sampled(evaluator: &Evaluator, samples: usize, threads: usize) -> f64 {
    seconds(threads, || {
        let found = spread(evaluator, samples, 1, &mut |_| ControlFlow::Continue(())).expect("a sample");
        assert_eq!((found.samples, found.failed), (samples, 0));
    })
}

/// One and two threads in turn, so that a load that comes and goes meets both; the best of each.
fn pair(evaluator: &Evaluator, samples: usize) -> (f64, f64) {
    (0..4).fold((f64::INFINITY, f64::INFINITY), |(one, two), _| {
        (one.min(sampled(evaluator, samples, 1)), two.min(sampled(evaluator, samples, 2)))
    })
}

/// The load of the machine in the last minute: the figures mean nothing when it is high.
fn load_average() -> String {
    let text = std::fs::read_to_string("/proc/loadavg").unwrap_or_default();
    text.split(' ').next().unwrap_or("unknown").to_owned()
}

fn main() {
    println!("load before: {}", load_average());
    for (name, samples) in [
        ("roof-foot-level.toml", SAMPLES),
        ("overhead-anchor.toml", SAMPLES),
        ("lifeline-with-sag.toml", 1024),
        ("swing-clears-tower.toml", 4096),
    ] {
        let evaluator = evaluator(name);
        let (one, two) = pair(&evaluator, samples);
        let search = seconds(2, || drop(worst_found(&evaluator, &unwatched).expect("a search")));
        #[expect(clippy::cast_precision_loss, reason = "small counts")]
        let each = 1e6 * one / samples as f64;
        println!(
            "{name:<26} {samples:>6} samples: {two:>6.3} s on 2 threads, {one:>6.3} s on 1 ({each:>6.1} us each), \
             {:>4.2} times; worst found {search:.3} s",
            one / two
        );
    }
    println!("goals: {SAMPLES} samples of a vertical scenario with absorber below {GOAL_S} s, {GOAL_TIMES} times");
}
