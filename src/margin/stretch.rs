//! What a rope stretches between the two loads of its static test.
use crate::quantity::{Dimension, Measure};
use crate::scenario::{Scenario, StretchLaw};

/// The loads of the static test that the published limit names, kg.
const FROM_KG: f64 = 50.0;
const TO_KG: f64 = 150.0;

/// Elongation from 50 kg to 150 kg as a share of the length: of a law that is linear in strain, or of a table that
/// reaches as far. None where the law does not tell.
pub fn static_elongation(scenario: &Scenario) -> Option<f64> {
    let gravity = scenario.gravity.si();
    let force = |m: &Measure| match m.dimension() {
        Dimension::Mass => m.si() * gravity,
        _ => m.si(),
    };
    let length = || scenario.line.length.map(|l| l.si());
    let modulus = match &scenario.line.stretch {
        StretchLaw::Modulus(modulus) => modulus.si(),
        StretchLaw::Stiffness(stiffness) => stiffness.si() * length()?,
        StretchLaw::StaticElongation { percent, from, to } => (force(to) - force(from)) / percent.si(),
        StretchLaw::Curve(rows) => {
            let at = |mass_kg: f64| elongation_m(rows, mass_kg * gravity);
            return Some((at(TO_KG)? - at(FROM_KG)?) / length()?);
        }
        StretchLaw::RatedImpact { .. } => return None,
    };
    Some((TO_KG - FROM_KG) * gravity / modulus)
}

/// Elongation of a table at a force within it.
fn elongation_m(rows: &[(f64, f64)], force_n: f64) -> Option<f64> {
    let pair = rows.windows(2).find(|pair| pair[0].1 <= force_n && force_n <= pair[1].1)?;
    let [(e0, f0), (e1, f1)] = [pair[0], pair[1]];
    Some(e0 + (e1 - e0) * (force_n - f0) / (f1 - f0))
}
