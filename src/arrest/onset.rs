//! The drop from the onset force to the deployment force.
use super::mode::State;
use super::next::Slider;
use super::outcome::Fall;
use crate::physics::{Absorber, Group};

/// Lets the undamped groups give back their stretch when the slider first moves: the smallest `ds` with
/// `F(s + ds) = f(e - ds)`, at most what is left of the stroke. Damped groups keep their stretch, the mass its place.
/// Returns the elastic energy lost in the jump, J, which the absorber takes.
pub fn give_back(fall: &Fall, state: &mut State, slider: Slider) -> f64 {
    let Some(absorber) = fall.path.absorber.as_ref().filter(|_| !slider.started) else { return 0.0 };
    let springs: Vec<usize> = (0..2).filter(|&i| !group(fall, i).is_rigid() && !group(fall, i).is_damped()).collect();
    let Some(&first) = springs.first() else { return 0.0 };
    let before: f64 = fall.elastic_j(state.e).iter().sum();
    let force = elastic_force(group(fall, first), state.e[first]);
    let stretch = |force: f64| springs.iter().map(|&i| group(fall, i).elastic.elongation_m(force)).sum::<f64>();
    let held: f64 = springs.iter().map(|&i| state.e[i]).sum();
    let after = force_after(absorber, state.s, force, |f| held - stretch(f));
    let ds = (held - stretch(after)).max(0.0);
    if ds == 0.0 {
        return 0.0;
    }
    for &i in &springs {
        state.e[i] = group(fall, i).elastic.elongation_m(after);
    }
    state.s = (state.s + ds).min(absorber.stroke_m);
    before - fall.elastic_j(state.e).iter().sum::<f64>()
}

fn group(fall: &Fall, index: usize) -> &Group {
    if index == 0 { &fall.path.line } else { &fall.path.other }
}

fn elastic_force(group: &Group, e: f64) -> f64 {
    group.elastic.piece(group.elastic.piece_at(e)).map_or(0.0, |piece| piece.value(e))
}

/// The largest force `f` below `from` with `f <= F(s + given(f))`, or where the stroke ends: `given` falls with `f` and
/// `F` never falls with length, so the difference is monotone and halving finds it to the last bits.
fn force_after(absorber: &Absorber, s: f64, from: f64, given: impl Fn(f64) -> f64) -> f64 {
    let holds = |f: f64| {
        let length = s + given(f);
        length >= absorber.stroke_m || f <= absorber.force.value(length)
    };
    let (mut lo, mut hi) = (absorber.force.value(s).min(from), from);
    if holds(hi) {
        return hi;
    }
    while hi - lo > f64::EPSILON * hi {
        let middle = 0.5 * (lo + hi);
        if middle <= lo || middle >= hi {
            break;
        }
        if holds(middle) { lo = middle } else { hi = middle }
    }
    lo
}
