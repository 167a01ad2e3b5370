//! Shares, quantiles and histograms of a sample; the same on any number of threads.
#![allow(clippy::unwrap_used, clippy::panic, reason = "a test stops at what it cannot have")]
use approx::assert_relative_eq;
use std::ops::ControlFlow;
use std::path::Path;
use underfoot::margin::CheckKind;
use underfoot::scenario::{Scenario, load};
use underfoot::study::{BATCH, Evaluator, Share, Spread, spread};

fn shipped(name: &str) -> Scenario {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios").join(name);
    load(&path).unwrap().scenario
}

fn whole(scenario: &Scenario, samples: usize, seed: u64) -> Spread {
    spread(&Evaluator::new(scenario).unwrap(), samples, seed, &mut |_| ControlFlow::Continue(())).unwrap()
}

/// `scipy.stats.binomtest(k, n).proportion_ci(method='wilson')` (`SciPy` 1.17.1).
#[test]
fn a_share_has_the_interval_of_wilson() {
    let cases = [
        (0, 10, 0.0, 0.277_532_799_862_889_26),
        (3, 10, 0.107_791_267_406_301_02, 0.603_221_852_538_854_6),
        (50, 1000, 0.038_130_262_392_748_81, 0.065_313_820_244_250_81),
        (1000, 1000, 0.996_173_241_514_444_9, 1.0),
    ];
    for (count, of, low, high) in cases {
        let share = Share::new(count, of);
        assert_relative_eq!(share.low, low, max_relative = 1e-12);
        assert_relative_eq!(share.high, high, max_relative = 1e-12);
    }
    let none = Share::new(0, 0);
    assert_eq!((none.low, none.high), (0.0, 1.0));
}

#[test]
fn one_two_and_eight_threads_give_the_same_result_to_the_last_bit() {
    let scenario = shipped("timber-beam-harness.toml");
    let on = |threads| {
        let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build().unwrap();
        format!("{:?}", pool.install(|| whole(&scenario, 3000, 11)))
    };
    let one = on(1);
    assert_eq!(one, on(2));
    assert_eq!(one, on(8));
    assert_ne!(one, format!("{:?}", whole(&scenario, 3000, 12)));
}

#[test]
fn the_share_short_is_the_part_of_a_uniform_band_past_its_limit() {
    // The only wide input is the mass, 80 to 115 kg: the rating is the limit, and the share past it is known.
    let mut scenario = shipped("roof-foot-level.toml");
    scenario.absorber.as_mut().unwrap().rated_mass.as_mut().unwrap().band.typical = 105.0;
    let spread = whole(&scenario, 4096, 1);
    let rated = spread.checks.iter().find(|check| check.kind == CheckKind::RatedMass).unwrap();
    assert_relative_eq!(rated.short.share, 10.0 / 35.0, epsilon = 1.0 / 4096.0);
    assert!(rated.short.low < 10.0 / 35.0 && 10.0 / 35.0 < rated.short.high);
}

#[test]
fn failed_runs_are_open_in_every_check_and_missing_in_every_number() {
    let mut scenario = shipped("roof-foot-level.toml");
    // A quarter of the band of the onset force is below the deployment force of 4.2 kN, where no run is possible.
    let onset = &mut scenario.absorber.as_mut().unwrap().onset_force.as_mut().unwrap().band;
    (onset.low, onset.high) = (4.0e3, 4.8e3);
    let spread = whole(&scenario, 1024, 3);
    assert!((250..=262).contains(&spread.failed), "{}", spread.failed);
    for check in &spread.checks {
        assert!(check.open >= spread.failed);
        assert_eq!(check.short.count + check.holds + check.open + check.absent, 1024);
        assert_eq!(check.not_held.count, check.short.count + check.open);
    }
    for number in &spread.numbers {
        assert_eq!(number.count + number.missing, 1024);
        assert!(number.missing >= spread.failed);
        assert_eq!(number.bars.iter().sum::<usize>(), number.count);
    }
}

#[test]
fn a_stopped_sample_keeps_what_it_has_and_is_marked_as_a_part() {
    let evaluator = Evaluator::new(&shipped("roof-foot-level.toml")).unwrap();
    let mut told = Vec::new();
    let mut stop = |made| {
        told.push(made);
        if made >= 2 * BATCH { ControlFlow::Break(()) } else { ControlFlow::Continue(()) }
    };
    let part = spread(&evaluator, 100_000, 5, &mut stop).unwrap();
    assert_eq!(told, [BATCH, 2 * BATCH]);
    assert!(part.is_partial());
    assert_eq!((part.samples, part.asked), (2 * BATCH, 100_000));
    let whole = whole(evaluator.scenario(), 2 * BATCH, 5);
    assert!(!whole.is_partial());
    assert_eq!(part.checks, whole.checks);
    assert_eq!(part.numbers, whole.numbers);
}

#[test]
fn quantiles_rise_and_the_free_fall_without_a_band_is_one_bar() {
    let spread = whole(&shipped("roof-foot-level.toml"), 2000, 1);
    for number in &spread.numbers {
        assert!(number.quantiles.is_sorted(), "{}", number.id);
    }
    let of = |id: &str| spread.numbers.iter().find(|number| number.id == id).unwrap();
    assert_eq!(of("free_fall_distance").bars, [2000]);
    let total = of("total_fall_distance");
    assert!(total.quantiles[0] < total.mean && total.mean < total.quantiles[6]);
}

#[test]
fn no_samples_are_refused() {
    let evaluator = Evaluator::new(&shipped("roof-foot-level.toml")).unwrap();
    assert!(spread(&evaluator, 0, 1, &mut |_| ControlFlow::Continue(())).is_err());
}
