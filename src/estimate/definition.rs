//! Every id of a result with its meaning.
use crate::quantity::Dimension;

/// What an id means.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Definition {
    /// Id, without the name of an obstacle (`clearance`).
    pub id: &'static str,
    /// Unit as in JSON.
    pub unit: &'static str,
    /// What it measures.
    pub dimension: Dimension,
    /// Short label for screens and text: `arrest force, peak`.
    pub label: &'static str,
    /// One sentence.
    pub meaning: &'static str,
}

/// Every id with its meaning, in the order in which results are shown.
pub const DEFINITIONS: &[Definition] = &[
    Definition {
        id: "free_fall_distance",
        unit: "m",
        dimension: Dimension::Length,
        label: "free fall",
        meaning: "vertical travel of the attachment until the line begins to carry force",
    },
    Definition {
        id: "fall_factor",
        unit: "1",
        dimension: Dimension::Ratio,
        label: "fall factor",
        meaning: "free-fall distance over line length",
    },
    Definition {
        id: "fall_energy",
        unit: "J",
        dimension: Dimension::Energy,
        label: "fall energy",
        meaning: "weight times free-fall distance",
    },
    Definition {
        id: "speed_at_taut",
        unit: "m/s",
        dimension: Dimension::Speed,
        label: "speed at taut",
        meaning: "downward speed when the line first comes taut",
    },
    Definition {
        id: "time_taut",
        unit: "s",
        dimension: Dimension::Time,
        label: "time of taut",
        meaning: "from the start of the fall until the line first comes taut",
    },
    Definition {
        id: "arrest_force_peak",
        unit: "N",
        dimension: Dimension::Force,
        label: "arrest force, peak",
        meaning: "largest line force over the run",
    },
    Definition {
        id: "time_peak_force",
        unit: "s",
        dimension: Dimension::Time,
        label: "time of peak force",
        meaning: "from the start of the fall until the largest line force",
    },
    Definition {
        id: "anchor_force_peak",
        unit: "N",
        dimension: Dimension::Force,
        label: "anchor force, peak",
        meaning: "largest force on the anchor",
    },
    Definition {
        id: "deceleration_peak",
        unit: "g",
        dimension: Dimension::GravityMultiple,
        label: "deceleration, peak",
        meaning: "largest line force less the weight, over the weight",
    },
    Definition {
        id: "deceleration_mean",
        unit: "g",
        dimension: Dimension::GravityMultiple,
        label: "deceleration, mean",
        meaning: "mean upward acceleration from taut to the lowest point",
    },
    Definition {
        id: "time_above_4kn",
        unit: "s",
        dimension: Dimension::Time,
        label: "time above 4 kN",
        meaning: "time the line force spends above 4 kN, from taut to the first slack",
    },
    Definition {
        id: "time_above_6kn",
        unit: "s",
        dimension: Dimension::Time,
        label: "time above 6 kN",
        meaning: "time the line force spends above 6 kN, from taut to the first slack",
    },
    Definition {
        id: "line_elongation_peak",
        unit: "m",
        dimension: Dimension::Length,
        label: "line elongation, peak",
        meaning: "largest stretch of the line",
    },
    Definition {
        id: "other_elongation_peak",
        unit: "m",
        dimension: Dimension::Length,
        label: "other elongation, peak",
        meaning: "largest stretch of everything else in the path: series spring, harness, anchor",
    },
    Definition {
        id: "deployed_length",
        unit: "m",
        dimension: Dimension::Length,
        label: "deployed length",
        meaning: "length the absorber has deployed in the end",
    },
    Definition {
        id: "stroke_left",
        unit: "m",
        dimension: Dimension::Length,
        label: "stroke left",
        meaning: "stroke of the absorber less its deployed length",
    },
    Definition {
        id: "stroke_used_up",
        unit: "1",
        dimension: Dimension::Ratio,
        label: "stroke used up",
        meaning: "1 when the absorber came to its stroke, else 0",
    },
    Definition {
        id: "arrest_distance",
        unit: "m",
        dimension: Dimension::Length,
        label: "arrest distance",
        meaning: "travel from taut to the lowest point",
    },
    Definition {
        id: "total_fall_distance",
        unit: "m",
        dimension: Dimension::Length,
        label: "total fall distance",
        meaning: "free fall plus arrest distance, harness stretch excluded",
    },
    Definition {
        id: "hang_travel",
        unit: "m",
        dimension: Dimension::Length,
        label: "hang travel",
        meaning: "travel past taut at rest after the arrest",
    },
    Definition {
        id: "time_lowest",
        unit: "s",
        dimension: Dimension::Time,
        label: "time of lowest point",
        meaning: "from the start of the fall until the lowest point",
    },
    Definition {
        id: "lowest_attachment",
        unit: "m",
        dimension: Dimension::Length,
        label: "lowest attachment",
        meaning: "elevation of the attachment at the lowest point",
    },
    Definition {
        id: "lowest_foot",
        unit: "m",
        dimension: Dimension::Length,
        label: "lowest foot",
        meaning: "elevation of the feet at the lowest point, stretch allowance included",
    },
    Definition {
        id: "lowest_underside",
        unit: "m",
        dimension: Dimension::Length,
        label: "lowest underside",
        meaning: "elevation of the load's underside at the lowest point",
    },
    Definition {
        id: "clearance",
        unit: "m",
        dimension: Dimension::Length,
        label: "clearance",
        meaning: "lowest point less the top of the obstacle",
    },
    Definition {
        id: "margin",
        unit: "m",
        dimension: Dimension::Length,
        label: "clearance margin",
        meaning: "clearance less the reserve wanted",
    },
    Definition {
        id: "rebound_rise",
        unit: "m",
        dimension: Dimension::Length,
        label: "rebound rise",
        meaning: "from the lowest point to the next highest",
    },
    Definition {
        id: "time_first_slack",
        unit: "s",
        dimension: Dimension::Time,
        label: "time of first slack",
        meaning: "from the start of the fall until the line first goes slack",
    },
    Definition {
        id: "slack_episodes",
        unit: "1",
        dimension: Dimension::Ratio,
        label: "slack episodes",
        meaning: "times the line goes slack before it is settled",
    },
    Definition {
        id: "settle_time",
        unit: "s",
        dimension: Dimension::Time,
        label: "settle time",
        meaning: "from the start of the fall until the energy above the hang position is below 0.001 of the energy of the fall",
    },
    Definition {
        id: "damping_regime",
        unit: "text",
        dimension: Dimension::Ratio,
        label: "damping regime",
        meaning: "overdamped, critical or underdamped, about the hang position",
    },
    Definition {
        id: "damping_ratio",
        unit: "1",
        dimension: Dimension::Ratio,
        label: "damping ratio",
        meaning: "of the complex pair of roots about the hang position",
    },
    Definition {
        id: "natural_frequency",
        unit: "rad/s",
        dimension: Dimension::AngularFrequency,
        label: "natural frequency",
        meaning: "modulus of the complex pair of roots about the hang position",
    },
    Definition {
        id: "damped_frequency",
        unit: "rad/s",
        dimension: Dimension::AngularFrequency,
        label: "damped frequency",
        meaning: "imaginary part of the complex pair of roots about the hang position",
    },
    Definition {
        id: "envelope_amplitude",
        unit: "m",
        dimension: Dimension::Length,
        label: "envelope amplitude",
        meaning: "amplitude C of the envelope of the first taut phase",
    },
    Definition {
        id: "envelope_decay",
        unit: "1/s",
        dimension: Dimension::Rate,
        label: "envelope decay",
        meaning: "decay alpha = c/2m of the envelope",
    },
    Definition {
        id: "envelope_bound_coarse",
        unit: "m",
        dimension: Dimension::Length,
        label: "envelope bound, coarse",
        meaning: "hang travel plus C: never less than the arrest distance",
    },
    Definition {
        id: "envelope_bound_tight",
        unit: "m",
        dimension: Dimension::Length,
        label: "envelope bound, tight",
        meaning: "hang travel plus C exp(-alpha t) at the time of the lowest point: never less than the arrest distance",
    },
    Definition {
        id: "line_work",
        unit: "J",
        dimension: Dimension::Energy,
        label: "energy in the line",
        meaning: "elastic energy of the line at the lowest point",
    },
    Definition {
        id: "other_work",
        unit: "J",
        dimension: Dimension::Energy,
        label: "energy in the other parts",
        meaning: "elastic energy of everything else at the lowest point",
    },
    Definition {
        id: "absorber_work",
        unit: "J",
        dimension: Dimension::Energy,
        label: "energy taken by the absorber",
        meaning: "up to the lowest point",
    },
    Definition {
        id: "damper_work",
        unit: "J",
        dimension: Dimension::Energy,
        label: "energy taken by the dampers",
        meaning: "up to the lowest point",
    },
    Definition {
        id: "energy_residual",
        unit: "1",
        dimension: Dimension::Ratio,
        label: "energy residual",
        meaning: "largest imbalance of the energy account over the energy of the fall",
    },
];

/// The definition of an id, also of one that ends in the name of an obstacle.
#[must_use]
pub fn definition(id: &str) -> Option<&'static Definition> {
    let stem = id.split_once('.').map_or(id, |(stem, _)| stem);
    DEFINITIONS.iter().find(|d| d.id == stem)
}
