//! Every scenario that is shipped: read without a fault, its numbers and its verdicts.
//!
//! The numbers were not taken from this program. They come from an integration of the equations of motion with a fixed
//! step (fourth order, 10 us, events by bisection inside the step), written apart from the solver in another language
//! and checked against closed forms: m 100 kg, k 10 kN/m, h 4 m, ratio 0.1 gives 0.8498893152 m and 8651.802438 N;
//! 50 kN/m with a 4 kN absorber from 2 m gives a total of 0.7025818599 m. Halving the step moved no value by more
//! than 1e-9 of itself, settle times by 1e-5. The instant of the rope's largest force is the first zero of the third
//! derivative of the closed form (its force agrees with the integration). By hand: free fall from the elevations noted in each file; hang
//! position m g / k; lowest point = standing surface - free fall - arrest distance - stretch allowance.

#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
use std::path::{Path, PathBuf};
use underfoot::estimate::estimate;
use underfoot::margin::{Verdict, margins, worst};
use underfoot::scenario::{doubts, load};

type Expected = (&'static str, &'static [(&'static str, f64)]);

const EXPECTED: &[Expected] = &[
    (
        "elastic-suspension",
        &[
            ("free_fall_distance", 14.1),
            ("speed_at_taut", 16.629_718_3),
            ("arrest_force_peak", 2_157.946_769),
            ("arrest_distance", 19.574_914_02),
            ("time_lowest", 3.274_555_719),
            ("time_first_slack", 4.922_008_115),
            ("rebound_rise", 28.097_896_86),
            ("slack_episodes", 3.0),
            ("hang_travel", 6.240_595_455),
            ("lowest_foot", 12.325_085_98),
            ("settle_time", 66.843_465),
        ],
    ),
    (
        "low-scaffold-short",
        &[
            ("free_fall_distance", 3.5),
            ("arrest_force_peak", 4_000.0),
            ("arrest_distance", 1.138_378_567),
            ("deployed_length", 1.071_711_9),
            ("lowest_foot", 0.061_621_433),
            ("margin.ground", -0.938_378_567),
            ("time_lowest", 1.119_469_386),
            ("slack_episodes", 3.0),
        ],
    ),
    (
        "low-stretch-rope",
        &[
            ("fall_factor", 0.3),
            ("arrest_force_peak", 4_536.806_38),
            ("arrest_distance", 0.464_505_209_6),
            ("time_peak_force", 0.583_028_739_981),
            ("time_above_4kn", 0.113_575_4),
            ("rebound_rise", 0.831_444_572_1),
            ("slack_episodes", 3.0),
            ("hang_travel", 0.102),
            ("lowest_foot", 19.535_494_790_4),
            ("settle_time", 4.432_73),
        ],
    ),
    (
        "near-critical",
        &[
            ("damping_ratio", 0.99),
            ("arrest_force_peak", 2_630.642_188),
            ("arrest_distance", 0.238_718_621_6),
            ("time_lowest", 0.572_298_569_1),
            ("hang_travel", 0.196_133),
            ("slack_episodes", 0.0),
            ("lowest_underside", 2.661_281_378_4),
            ("settle_time", 0.898_07),
        ],
    ),
    (
        "overdamped-buffer",
        &[
            ("arrest_force_peak", 4_730.102_745),
            ("arrest_distance", 0.294_199_5),
            ("hang_travel", 0.294_199_5),
            ("time_above_4kn", 0.017_054_115),
            ("slack_episodes", 0.0),
            ("lowest_underside", 1.005_800_5),
        ],
    ),
    (
        "overhead-anchor",
        &[
            ("free_fall_distance", 0.4),
            ("arrest_force_peak", 4_000.0),
            ("arrest_distance", 0.153_796_414_9),
            ("deployed_length", 0.087_129_799_34),
            ("stroke_left", 1.112_870_200_66),
            ("stroke_used_up", 0.0),
            ("time_first_slack", 0.463_933_186_3),
            ("rebound_rise", 0.112_500_900_4),
            ("slack_episodes", 3.0),
            ("lowest_foot", 5.346_203_585_1),
            ("settle_time", 1.895_26),
        ],
    ),
    (
        "roof-foot-level",
        &[
            ("free_fall_distance", 3.2),
            ("arrest_force_peak", 4_800.0),
            ("time_peak_force", 0.811_527_408_2),
            ("arrest_distance", 0.976_983_914_6),
            ("deployed_length", 0.906_983_914_6),
            ("time_above_4kn", 0.253_855_15),
            ("lowest_foot", 4.923_016_085_4),
            ("rebound_rise", 0.123_696_449_9),
            ("settle_time", 2.159_43),
        ],
    ),
    (
        "secondary-line",
        &[
            ("arrest_force_peak", 10_785.554_23),
            ("arrest_distance", 0.134_298_994_1),
            ("time_above_6kn", 0.126_507_142),
            ("rebound_rise", 0.260_073_368_5),
            ("slack_episodes", 5.0),
            ("hang_travel", 0.030_645_781_25),
            ("lowest_underside", 4.665_701_005_9),
            ("settle_time", 4.497_25),
        ],
    ),
    (
        "steel-beam-us",
        &[
            ("free_fall_distance", 1.828_8),
            ("arrest_force_peak", 4_003.399_454),
            ("arrest_distance", 0.602_956_257_8),
            ("deployed_length", 0.534_376_257_8),
            ("lowest_foot", 6.407_443_742_2),
            ("time_first_slack", 0.888_021_224_7),
            ("settle_time", 2.168_87),
        ],
    ),
    (
        "step-transfer",
        &[
            ("free_fall_distance", 0.0),
            ("time_taut", 0.0),
            ("arrest_force_peak", 15_218.676_02),
            ("arrest_distance", 0.025_354_630_22),
            ("time_lowest", 0.114_737_694),
            ("rebound_rise", 0.023_810_268_61),
            ("slack_episodes", 0.0),
            ("lowest_underside", 0.874_645_369_78),
            ("settle_time", 5.085_41),
        ],
    ),
    (
        "timber-beam-harness",
        &[
            ("free_fall_distance", 0.65),
            ("arrest_force_peak", 3_500.0),
            ("time_peak_force", 0.398_362_253),
            ("arrest_distance", 0.292_965_055_9),
            ("deployed_length", 0.162_298_397_7),
            ("time_first_slack", 0.617_840_333_3),
            ("rebound_rise", 0.241_465_714_7),
            ("slack_episodes", 7.0),
            ("lowest_foot", 3.657_034_944_1),
            ("settle_time", 6.373_81),
        ],
    ),
];

/// Scenarios that are short on purpose; every other one holds.
const SHORT: &[&str] = &["low-scaffold-short"];

/// Doubts that a scenario raises on purpose, by a piece of the message.
const DOUBTS: &[(&str, &str)] = &[("overdamped-buffer", "is above critical")];

fn folder() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios")
}

fn file(name: &str) -> PathBuf {
    folder().join(format!("{name}.toml"))
}

#[test]
fn every_scenario_is_in_the_table_and_the_table_in_the_folder() {
    let mut found: Vec<String> = std::fs::read_dir(folder())
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .filter(|path| path.extension().is_some_and(|ending| ending == "toml"))
        .map(|path| path.file_stem().unwrap().to_string_lossy().into_owned())
        .collect();
    found.sort();
    let listed: Vec<&str> = EXPECTED.iter().map(|(name, _)| *name).collect();
    assert_eq!(found, listed);
}

#[test]
fn every_scenario_raises_no_doubt_but_the_one_it_is_about() {
    for (name, _) in EXPECTED {
        let loaded = load(&file(name)).unwrap();
        let raised = doubts(name, &loaded.text, &loaded.scenario);
        let meant: Vec<&str> = DOUBTS.iter().filter(|(file, _)| file == name).map(|(_, piece)| *piece).collect();
        assert_eq!(raised.faults.len(), meant.len(), "{name}: {}", raised.render(false));
        for (fault, piece) in raised.faults.iter().zip(meant) {
            assert!(fault.message.contains(piece), "{name}: {}", fault.message);
        }
    }
}

#[test]
fn the_numbers_are_those_of_the_independent_integration() {
    let mut wrong = Vec::new();
    for (name, numbers) in EXPECTED {
        let loaded = load(&file(name)).unwrap();
        let run = estimate(&loaded.scenario).unwrap_or_else(|error| panic!("{name}: {error}"));
        for (id, expected) in *numbers {
            let Some(found) = run.numbers.get(id) else {
                wrong.push(format!("{name} {id}: absent, {expected} expected"));
                continue;
            };
            let share = if *id == "settle_time" { 2e-5 } else { 2e-9_f64.max(1e-9 / expected.abs()) };
            let share = if id.starts_with("time_above") { 1e-6 } else { share };
            if found.is_nan() || (found - expected).abs() > share * expected.abs().max(1e-12) {
                wrong.push(format!("{name} {id}: {found} is not {expected}"));
            }
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn a_motion_that_never_turns_has_no_lowest_instant_and_no_rebound() {
    let run = estimate(&load(&file("overdamped-buffer")).unwrap().scenario).unwrap();
    for id in ["time_lowest", "deceleration_mean", "rebound_rise", "time_first_slack"] {
        assert_eq!(run.numbers.get(id), None, "{id}");
    }
}

#[test]
fn every_scenario_holds_but_the_one_that_is_short_on_purpose() {
    for (name, _) in EXPECTED {
        let scenario = load(&file(name)).unwrap().scenario;
        let list = margins(&scenario, &estimate(&scenario).unwrap()).unwrap();
        let shown: Vec<String> = list.iter().map(|m| format!("{} {:?}", m.id, m.verdict)).collect();
        assert!(list.iter().all(|m| m.verdict != Verdict::Open), "{name}: {shown:?}");
        let expected = if SHORT.contains(name) { Verdict::Short } else { Verdict::Holds };
        assert_eq!(worst(list.iter().map(|m| m.verdict)), expected, "{name}: {shown:?}");
    }
}
