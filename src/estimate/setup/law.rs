//! The laws of the path: line, absorber, and everything else that gives.
use crate::estimate::EstimateError;
use crate::estimate::remark::both;
use crate::physics::{Absorber, Elastic, Group, Table, TableError};
use crate::quantity::{Dimension, Measure};
use crate::scenario::{AnchorKind, DampingLaw, Scenario, StretchLaw};

/// Elastic law of the line; `elastic_length_m` is what a modulus is divided by.
fn elastic(scenario: &Scenario, elastic_length_m: Option<f64>) -> Result<Elastic, EstimateError> {
    let gravity = scenario.gravity.si();
    let force = |m: &Measure| if m.dimension() == Dimension::Mass { m.si() * gravity } else { m.si() };
    let modulus = match &scenario.line.stretch {
        StretchLaw::Curve(rows) => {
            return Table::elastic(rows.clone()).map(Elastic::Table).map_err(|e| bad_table(&e, "line.curve"));
        }
        StretchLaw::Stiffness(stiffness) => return Ok(Elastic::Linear { stiffness_n_per_m: stiffness.si() }),
        StretchLaw::Modulus(modulus) => modulus.si(),
        // F = W + sqrt(W^2 + 2 W K f) of an undamped line, solved for K.
        StretchLaw::RatedImpact { force, mass, fall_factor } => {
            let weight = mass.si() * gravity;
            force.si() * (force.si() - 2.0 * weight) / (2.0 * weight * fall_factor.si())
        }
        StretchLaw::StaticElongation { percent, from, to } => (force(to) - force(from)) / percent.si(),
    };
    match elastic_length_m.map(|l| modulus / l) {
        Some(k) if k > 0.0 && k.is_finite() => Ok(Elastic::Linear { stiffness_n_per_m: k }),
        Some(_) => Err(EstimateError::Geometry {
            message: format!("the line's law gives a modulus of `{}`", both(modulus, Dimension::Force)),
            hint: "the rated force must exceed twice the weight of the rated mass, and the loads must rise".to_owned(),
            path: "line",
        }),
        None => Err(EstimateError::Geometry {
            message: "a modulus gives no stiffness without `line.length`".to_owned(),
            hint: "state `line.length`".to_owned(),
            path: "line.length",
        }),
    }
}

fn bad_table(error: &TableError, path: &'static str) -> EstimateError {
    EstimateError::Geometry {
        message: format!("the table does not rise: {error}"),
        hint: "give rows of rising length and rising force, from zero".to_owned(),
        path,
    }
}

/// Group 1: the line with its damper. A damping ratio is about the first piece of a curve.
///
/// # Errors
/// When the law gives no stiffness.
pub fn line(scenario: &Scenario, elastic_length_m: Option<f64>) -> Result<Group, EstimateError> {
    let elastic = elastic(scenario, elastic_length_m)?;
    let stiffness = elastic.piece(0).map_or(0.0, |piece| piece.slope);
    let damping_n_s_per_m = match &scenario.line.damping {
        DampingLaw::None => 0.0,
        DampingLaw::Damping(damping) => damping.si(),
        DampingLaw::Ratio(ratio) => 2.0 * ratio.si() * (scenario.subject.mass.si() * stiffness).sqrt(),
    };
    Ok(Group { elastic, damping_n_s_per_m })
}

/// Group 2 without a span and, where it had to be joined to first order, a sentence that says so.
pub fn other(scenario: &Scenario) -> (Group, Option<&'static str>) {
    let mut parts = Vec::with_capacity(3);
    parts.extend(scenario.line.series_stiffness.map(|k| (k.si(), 0.0)));
    let sprung = match &scenario.anchor.kind {
        AnchorKind::Sprung(compliance) => Some(compliance),
        AnchorKind::Fixed | AnchorKind::Span(_) => None,
    };
    parts.extend(
        [scenario.harness.as_ref(), sprung]
            .into_iter()
            .flatten()
            .map(|c| (c.stiffness.si(), c.damping.map_or(0.0, |d| d.si()))),
    );
    let joined = (parts.len() > 1 && parts.iter().any(|p| p.1 > 0.0)).then_some(
        "The parts beside the line (series spring, harness, anchor) are joined into one spring and one damper, to first \
         order in the damping.",
    );
    (Group::in_series(&parts), joined)
}

/// The absorber, with the wet and cold factor on all its forces.
///
/// # Errors
/// When its table does not rise.
pub fn absorber(scenario: &Scenario) -> Result<Option<Absorber>, EstimateError> {
    let Some(absorber) = scenario.absorber.as_ref() else { return Ok(None) };
    let factor = absorber.force_factor();
    let [_, first, _] = absorber.first_force_n();
    let onset_n = factor * absorber.onset_force.map_or(first, |f| f.si());
    let stroke_m = absorber.stroke_m();
    let force = match &absorber.force_table {
        Some(rows) => Table::new(rows.iter().map(|&(s, f)| (s, f * factor)).collect())
            .map_err(|e| bad_table(&e, "absorber.force_table"))?,
        None => Table::constant(factor * first, stroke_m),
    };
    Ok(Some(Absorber { force, onset_n, stroke_m }))
}
