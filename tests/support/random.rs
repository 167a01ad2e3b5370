//! Random cases: physical ones for the cross-check, harsh ones for the energy account. Case `i` draws from (seed, i).
use super::case::{Case, Law, Part, Slider};
use rand::rngs::Xoshiro256PlusPlus;
use rand::{RngExt, SeedableRng};

pub type Random = Xoshiro256PlusPlus;

pub fn stream(seed: u64, index: u64) -> Random {
    Random::seed_from_u64(seed.wrapping_mul(0x9e37_79b9_7f4a_7c15) ^ index)
}

pub fn logarithmic(random: &mut Random, low: f64, high: f64) -> f64 {
    (random.random_range(low.ln()..high.ln())).exp()
}

fn mass(random: &mut Random) -> f64 {
    if random.random_bool(0.2) { logarithmic(random, 300.0, 2000.0) } else { random.random_range(40.0..300.0) }
}

fn damped(random: &mut Random, mass: f64, stiffness: f64, least: f64) -> Part {
    let ratio = if random.random_bool(0.6) { random.random_range(least..0.6) } else { random.random_range(0.6..2.0) };
    Part::damped(stiffness, 2.0 * ratio * (stiffness * mass).sqrt())
}

fn curve(random: &mut Random) -> Law {
    let mut knots = vec![(0.0, 0.0)];
    let mut slope = logarithmic(random, 2e3, 5e4);
    for _ in 0..3 {
        let (x, y) = *knots.last().expect("a knot");
        let step = random.random_range(0.03..0.2);
        knots.push((x + step, y + slope * step));
        slope *= random.random_range(0.8..2.5);
    }
    Law::Curve(knots)
}

fn parts(random: &mut Random, mass: f64, curves: bool) -> (Part, Part) {
    let k1 = logarithmic(random, 500.0, 5e5);
    let k2 = logarithmic(random, 500.0, 5e5);
    match random.random_range(0..if curves { 9 } else { 7 }) {
        0 => (Part::spring(k1), Part::rigid()),
        1 | 2 => (damped(random, mass, k1, 0.02), Part::rigid()),
        3 => (damped(random, mass, k1, 0.02), Part::spring(k2)),
        4 => (Part::spring(k1), damped(random, mass, k2, 0.02)),
        5 => (damped(random, mass, k1, 0.02), damped(random, mass, k2, 0.02)),
        6 => (Part::rigid(), damped(random, mass, k2, 0.02)),
        7 => (Part { law: curve(random), damping: random.random_range(100.0..3000.0) }, Part::rigid()),
        _ => (Part { law: curve(random), damping: 0.0 }, damped(random, mass, k2, 0.02)),
    }
}

/// One in four rises; with two damped parts beside it that makes a fourth-order mode.
fn slider(random: &mut Random) -> Slider {
    let force = random.random_range(1.5e3..12e3);
    let stroke = random.random_range(0.1..2.0);
    let onset = if random.random_bool(0.5) { force } else { force * random.random_range(1.0..1.3) };
    let mut slider = Slider::constant(force, onset, stroke);
    if random.random_bool(0.25) {
        slider.force = vec![(0.0, force), (0.4 * stroke, 1.2 * force), (stroke, 1.3 * force)];
    }
    slider
}

/// A case of the size met in practice.
pub fn physical(seed: u64, index: u64, curves: bool) -> Case {
    let mut random = stream(seed, index);
    let mass = mass(&mut random);
    let (line, other) = parts(&mut random, mass, curves);
    let free_fall = if random.random_bool(0.08) { 0.0 } else { random.random_range(0.0..6.0) };
    let slider = random.random_bool(0.5).then(|| slider(&mut random));
    Case { slider, ..Case::on(mass, free_fall, line).with_other(other) }
}

/// A case at or beyond the edges: near-critical, stiff against soft, no free fall, hardly or hugely damped.
pub fn harsh(seed: u64, index: u64) -> Case {
    let mut random = stream(seed, index);
    let mass = logarithmic(&mut random, 1.0, 2000.0);
    let stiffness = logarithmic(&mut random, 100.0, 1e6);
    let nudge = [0.0, 1e-12, -1e-12, 1e-10, -1e-8, 1e-8, 1e-4, -1e-4][random.random_range(0..8)];
    let ratio = match random.random_range(0..6) {
        0 => 0.0,
        1 => 1.0 + nudge,
        2 => logarithmic(&mut random, 1e-6, 1e-2),
        3 => logarithmic(&mut random, 2.0, 300.0),
        _ => random.random_range(0.0..2.0),
    };
    let line = Part::damped(stiffness, 2.0 * ratio * (stiffness * mass).sqrt());
    let far = stiffness * [1e-6, 1e-3, 0.1, 1.0, 1.0 + 1e-12, 10.0, 1e3, 1e6][random.random_range(0..8)];
    let far_ratio = [0.0, 1e-4, 0.1, 1.0 + nudge, 30.0][random.random_range(0..5)];
    let other = match random.random_range(0..3) {
        0 => Part::rigid(),
        1 => Part::spring(far),
        _ => Part::damped(far, 2.0 * far_ratio * (far * mass).sqrt()),
    };
    let free_fall = match random.random_range(0..4) {
        0 => 0.0,
        1 => logarithmic(&mut random, 1e-9, 1e-2),
        _ => random.random_range(0.0..10.0),
    };
    let case = Case::on(mass, free_fall, line).with_other(other);
    if random.random_bool(0.5) {
        return case;
    }
    let force = mass * case.gravity * logarithmic(&mut random, 0.5, 50.0);
    let onset = force * [1.0, 1.0 + 1e-12, 1.1, 2.0][random.random_range(0..4)];
    case.with_slider(Slider::constant(force, onset, logarithmic(&mut random, 1e-6, 5.0)))
}
