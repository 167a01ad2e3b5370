//! Planes built on the cases of the vertical tests. Plane `i` draws from (seed, i).
use crate::support::Case;
use crate::support::random::{Random, harsh, logarithmic, physical, stream};
use rand::RngExt;
use underfoot::swing::{Face, Level, Plane, Point};

/// A vertical case with a pivot at the origin beside its fall line.
#[derive(Clone, Debug)]
pub struct Setup {
    pub case: Case,
    pub offset: f64,
    pub length: f64,
}

impl Setup {
    /// Depth below the pivot at taut.
    pub fn depth_at_taut(&self) -> f64 {
        ((self.length - self.offset.abs()) * (self.length + self.offset.abs())).sqrt()
    }

    pub fn plane(&self) -> Plane {
        Plane {
            mass_kg: self.case.mass,
            gravity_m_per_s2: self.case.gravity,
            path: self.case.fall().path,
            pivot: Point::new(0.0, 0.0),
            start: Point::new(self.offset, self.case.free_fall - self.depth_at_taut()),
            free_length_m: self.length,
            body_below_m: 0.0,
            half_width_m: 0.0,
            levels: Vec::new(),
            faces: Vec::new(),
        }
    }
}

fn setup(mut case: Case, length: f64, share: f64) -> Setup {
    let offset = length * share;
    let highest = 1.9 * ((length - offset.abs()) * (length + offset.abs())).sqrt();
    case.free_fall = case.free_fall.min(highest);
    Setup { case, offset, length }
}

/// Of the size met in practice, to either side, lines up to 60 m.
pub fn physical_plane(seed: u64, index: u64, curves: bool) -> Setup {
    let case = physical(seed, index, curves);
    let mut random = stream(seed ^ 0x5157, index);
    let length =
        if random.random_bool(0.15) { random.random_range(20.0..60.0) } else { random.random_range(1.0..20.0) };
    let side = if random.random_bool(0.5) { 1.0 } else { -1.0 };
    setup(case, length, side * random.random_range(0.02..0.95))
}

/// At or beyond the edges, with obstacles anywhere.
pub fn wild_plane(seed: u64, index: u64) -> Plane {
    let case = harsh(seed, index);
    let mut random = stream(seed ^ 0x3177, index);
    let length = logarithmic(&mut random, 0.3, 60.0);
    let share = [0.0, 1e-9, 1e-3, 0.3, -0.7, 0.99, 1.0][random.random_range(0..7)];
    let mut plane = setup(case, length, share).plane();
    plane.body_below_m = random.random_range(0.0..2.0);
    plane.half_width_m = random.random_range(0.0..0.5);
    for _ in 0..random.random_range(0..3) {
        plane.levels.push(level(&mut random, length));
        plane.faces.push(face(&mut random, length));
    }
    plane
}

fn level(random: &mut Random, length: f64) -> Level {
    let top_m = length * random.random_range(-1.5..0.5);
    let from_m = length * random.random_range(-1.0..1.0);
    if random.random_bool(0.3) {
        return Level { top_m, from_m: f64::NEG_INFINITY, to_m: f64::INFINITY };
    }
    Level { top_m, from_m, to_m: from_m + length * random.random_range(0.0..1.0) }
}

fn face(random: &mut Random, length: f64) -> Face {
    let bottom_m = length * random.random_range(-1.5..0.5);
    let top_m = bottom_m + length * random.random_range(0.0..1.0);
    Face { offset_m: length * random.random_range(-1.0..1.0), bottom_m, top_m }
}
