//! What a swing is said to do nearby, without a search, against the search between turning points and dense sampling.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
mod support;

use rand::RngExt;
use support::random::{Random, logarithmic, stream};
use underfoot::arrest::oscillator::{Oscillator, Swing};
use underfoot::arrest::roots::Passage;

const CASES: u64 = 20_000;

/// An oscillator from undamped to far overdamped, near-critical within 1e-12 among them, stiffness over eight decades.
fn oscillator(random: &mut Random) -> Oscillator {
    let mass = logarithmic(random, 1.0, 2000.0);
    let stiffness = logarithmic(random, 1.0, 1e8);
    let nudge = [0.0, 1e-12, -1e-12, 1e-8, -1e-8, 1e-4, -1e-4][random.random_range(0..7)];
    let ratio = match random.random_range(0..5) {
        0 => 0.0,
        1 => 1.0 + nudge,
        2 => logarithmic(random, 1e-6, 1e-1),
        3 => logarithmic(random, 1.0, 50.0),
        _ => random.random_range(0.0..1.0),
    };
    Oscillator::new(mass, 2.0 * ratio * (stiffness * mass).sqrt(), stiffness)
}

/// A swing that starts anywhere: at rest, at a turning point, fast or hardly moving.
fn swing(random: &mut Random) -> Swing {
    let of = oscillator(random);
    let rest = [0.0, 1.0, -1.0][random.random_range(0..3)] * logarithmic(random, 1e-6, 1e3);
    let away = [0.0, 1.0, -1.0, 1.0, -1.0][random.random_range(0..5)] * logarithmic(random, 1e-6, 1e3);
    let slope = [0.0, 1.0, -1.0, 1.0, -1.0][random.random_range(0..5)] * logarithmic(random, 1e-6, 1e3);
    Swing::new(of, rest, away, slope * of.stiffness.sqrt())
}

fn time_scale(swing: &Swing) -> f64 {
    1.0 / swing.of.stiffness.sqrt()
}

/// A level that the swing passes, touches at a turning point within 1e-12, starts at, or never sees.
fn level(random: &mut Random, swing: &Swing) -> f64 {
    let within = time_scale(swing) * logarithmic(random, 1e-4, 10.0);
    let touch = [0.0, 1e-15, -1e-15, 1e-12, -1e-12, 1e-9, -1e-9][random.random_range(0..7)];
    match random.random_range(0..5) {
        0 => swing.value(0.0),
        1 => {
            let top = swing.first_maximum(0.0, f64::INFINITY).map_or(swing.rest, |t| swing.value(t));
            top + touch * (top - swing.rest).abs()
        }
        2 => swing.rest,
        3 => swing.rest + random.random_range(-3.0..3.0) * (swing.p.abs() + 1e-6),
        _ => swing.value(within),
    }
}

fn horizon(random: &mut Random, swing: &Swing) -> f64 {
    time_scale(swing) * logarithmic(random, 1e-3, 1e3)
}

/// Size of the rounding of the swing's values.
fn rounding(swing: &Swing, level: f64) -> f64 {
    8.0 * f64::EPSILON * (swing.rest.abs() + swing.p.abs() + swing.q.abs() * time_scale(swing) + level.abs())
}

#[test]
fn a_near_passage_is_the_first_one_that_the_search_finds() {
    let mut near = 0;
    for index in 0..CASES {
        let mut random = stream(21, index);
        let swing = swing(&mut random);
        let (level, to) = (level(&mut random, &swing), horizon(&mut random, &swing));
        for passage in [Passage::Up, Passage::Down] {
            let searched = swing.searched_passing(level, passage, 0.0, to);
            let Some(found) = swing.near_passing(level, passage, to) else { continue };
            near += 1;
            let Some(searched) = searched else {
                // Only where the passage is at the horizon to the last bits.
                assert!(
                    found.time > to * (1.0 - 1e-9),
                    "{index}: only near: {found:?} before {to:e}: {swing:?} {level:e}"
                );
                continue;
            };
            let slope = swing.value_slope(found.time).1.abs();
            let allowed = 4.0 * f64::EPSILON * found.time + rounding(&swing, level) / slope;
            let off = (found.time - searched.time).abs();
            assert!(
                off <= allowed,
                "{index}: off by {off:e} of {:e}, allowed {allowed:e}: {swing:?} {level:e}",
                found.time
            );
            assert!(
                found.beyond <= searched.beyond + rounding(&swing, level),
                "{index}: {found:?} {searched:?} {swing:?}"
            );
        }
    }
    assert!(near > CASES / 10, "only {near} were found near");
}

#[test]
fn a_level_outside_of_the_envelope_has_no_passage() {
    let mut off = 0;
    for index in 0..CASES {
        let mut random = stream(22, index);
        let swing = swing(&mut random);
        let (level, to) = (level(&mut random, &swing), horizon(&mut random, &swing));
        if swing.stays_off(level) {
            off += 1;
            for passage in [Passage::Up, Passage::Down] {
                let searched = swing.searched_passing(level, passage, 0.0, to);
                assert_eq!(searched, None, "{index}: {swing:?} passes {level:e}");
            }
        }
    }
    assert!(off > CASES / 20, "only {off} levels were out of reach");
}

#[test]
fn between_the_ends_of_a_monotone_stretch_no_value_lies_outside() {
    let mut monotone = 0;
    for index in 0..CASES {
        let mut random = stream(23, index);
        let swing = swing(&mut random);
        let t = horizon(&mut random, &swing);
        let Some([a, b]) = swing.monotone_ends(t, swing.of.pair(t)) else { continue };
        monotone += 1;
        assert_eq!(a, swing.value(0.0));
        let room = rounding(&swing, 0.0);
        for i in 0..=64 {
            let value = swing.value(t * f64::from(i) / 64.0);
            assert!(
                value <= a.max(b) + room && value >= a.min(b) - room,
                "{index}: {value:e} in {a:e}..{b:e}: {swing:?}"
            );
        }
        for passage in [Passage::Up, Passage::Down] {
            for level in [a.max(b) + room, a.min(b) - room] {
                assert_eq!(swing.searched_passing(level, passage, 0.0, t), None, "{index}: {swing:?} passes {level:e}");
            }
        }
    }
    assert!(monotone > CASES / 10, "only {monotone} stretches were monotone");
}

#[test]
fn the_first_maximum_is_where_the_sampled_swing_is_largest() {
    let mut found = 0;
    for index in 0..CASES {
        let mut random = stream(24, index);
        let swing = swing(&mut random);
        let to = horizon(&mut random, &swing).min(20.0 * time_scale(&swing));
        let Some(top) = swing.first_maximum(0.0, to) else { continue };
        found += 1;
        // Or at the start, from where it may only fall first.
        let (highest, room) = (swing.value(top).max(swing.value(0.0)), rounding(&swing, 0.0));
        for i in 1..=64 {
            let value = swing.value(to * f64::from(i) / 64.0);
            assert!(value <= highest + room, "{index}: {value:e} above {highest:e} at {top:e}: {swing:?}");
        }
    }
    assert!(found > CASES / 10, "only {found} had a maximum");
}
