//! How near the body comes to levels and faces, and what it strikes first.
use super::outcome::{Approach, Strike};
use super::plane::{Face, Level, Plane};
use super::poly::{Poly, crossings, derivative, scaled, value};
use super::trajectory::{Step, Trajectory};

/// The nearest approach to every level and every face.
pub fn all(plane: &Plane, trajectory: &Trajectory) -> (Vec<Approach>, Vec<Approach>) {
    let levels = plane.levels.iter().map(|level| of(plane, trajectory, &|step| above_level(plane, level, step)));
    let faces = plane.faces.iter().map(|face| of(plane, trajectory, &|step| beside_face(plane, face, step)));
    (levels.collect(), faces.collect())
}

/// Largest horizontal distance from the start, m.
pub fn reach_m(plane: &Plane, trajectory: &Trajectory) -> f64 {
    let start = plane.start_from_pivot()[0];
    let mut reach = 0.0_f64;
    for step in &trajectory.steps {
        let mut offer = |at: f64| reach = reach.max((value(&step.x, at) - start).abs());
        crossings(&derivative(&step.x), 0, |turn| {
            if turn.at <= step.share {
                offer(turn.at);
            }
            false
        });
        offer(step.share);
    }
    reach
}

/// The gap to an obstacle, and what must be positive for the body to be beside or above it.
struct Sides {
    gap: Poly,
    within: [Option<Poly>; 2],
}

fn above_level(plane: &Plane, level: &Level, step: &Step) -> Sides {
    let pivot = plane.pivot;
    let gap = scaled(&step.z, 1.0, pivot.elevation_m - plane.body_below_m - level.top_m);
    let from = pivot.offset_m + plane.half_width_m - level.from_m;
    let to = level.to_m - pivot.offset_m + plane.half_width_m;
    let side = |sign: f64, by: f64| by.is_finite().then(|| scaled(&step.x, sign, by));
    Sides { gap, within: [side(1.0, from), side(-1.0, to)] }
}

fn beside_face(plane: &Plane, face: &Face, step: &Step) -> Sides {
    let pivot = plane.pivot;
    // The side of the face on which the fall starts.
    let side = if face.offset_m >= plane.start.offset_m { -1.0 } else { 1.0 };
    let gap = scaled(&step.x, side, side * (pivot.offset_m - face.offset_m) - plane.half_width_m);
    let over = |sign: f64, by: f64| by.is_finite().then(|| scaled(&step.z, sign, by));
    let within = [over(1.0, pivot.elevation_m - face.bottom_m), over(-1.0, face.top_m - pivot.elevation_m)];
    Sides { gap, within }
}

fn of(plane: &Plane, trajectory: &Trajectory, sides: &dyn Fn(&Step) -> Sides) -> Approach {
    let mut nearest: Option<(f64, f64)> = None;
    let mut strike = None;
    for step in &trajectory.steps {
        let Sides { gap, within } = sides(step);
        let cuts = cuts(step, &gap, &within);
        for pair in cuts.windows(2) {
            let middle = 0.5 * (pair[0] + pair[1]);
            if !within.iter().flatten().all(|p| value(p, middle) >= 0.0) {
                continue;
            }
            for &at in pair {
                let metres = value(&gap, at);
                if nearest.is_none_or(|(least, _)| metres < least) {
                    nearest = Some((metres, step.start_s + at * step.unit_s));
                }
            }
            if strike.is_none() && value(&gap, middle) < 0.0 {
                strike = Some(struck(plane, trajectory, step, pair[0]));
            }
        }
    }
    Approach { gap_m: nearest.map(|n| n.0), time_s: nearest.map(|n| n.1), strike }
}

/// Where a step must be cut so that between cuts the body stays inside or outside, and the gap neither turns nor changes
/// sign.
fn cuts(step: &Step, gap: &Poly, within: &[Option<Poly>; 2]) -> Vec<f64> {
    let mut cuts = vec![0.0, step.share];
    let mut add = |p: &Poly| {
        crossings(p, 0, |crossing| {
            if crossing.at > 0.0 && crossing.at < step.share {
                cuts.push(crossing.at);
            }
            false
        });
    };
    within.iter().flatten().for_each(&mut add);
    add(gap);
    add(&derivative(gap));
    cuts.sort_by(f64::total_cmp);
    cuts
}

fn struck(plane: &Plane, trajectory: &Trajectory, step: &Step, at: f64) -> Strike {
    let instant = trajectory.within(step, at);
    let [vx, vz] = instant.velocity_m_per_s;
    let square = vx * vx + vz * vz;
    Strike {
        time_s: instant.time_s,
        at: instant.at,
        speed_m_per_s: square.sqrt(),
        drop_equivalent_m: square / (2.0 * plane.gravity_m_per_s2),
    }
}
