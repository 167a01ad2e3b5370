//! The table of every key a file may hold: feeds the reader, `new`, the inputs list and messages.
use super::field::Need::{Always, Default, InSection, Sometimes};
use super::field::{Field, count, quantity, table, text};
use crate::quantity::Dimension;
use crate::quantity::Dimension::{Acceleration, Damping, Force, Length, Mass, MassPerLength, Ratio, Stiffness};

/// Elevations reach from the deepest mine to the highest mast, m.
const DEEPEST_M: f64 = -10_000.0;
/// See [`DEEPEST_M`].
const HIGHEST_M: f64 = 10_000.0;
/// Longest line or fall that is not a slip of the pen, m.
const LONGEST_M: f64 = 1_000.0;
/// Softest and stiffest spring, N/m: a toy band and a steel bar.
const SOFTEST_N_PER_M: f64 = 0.1;
/// See [`SOFTEST_N_PER_M`].
const STIFFEST_N_PER_M: f64 = 1e11;
/// Smallest and largest force that a file may state, N.
const LEAST_N: f64 = 0.01;
/// See [`LEAST_N`].
const MOST_N: f64 = 1e9;

/// Largest whole number that every reader of TOML and JSON keeps exactly: 2^53 - 1.
const LARGEST_SEED: f64 = 9_007_199_254_740_991.0;
/// A finer share than one in a million says nothing that the bands know.
const MOST_SAMPLES: f64 = 1e6;

const ELEVATION: (Dimension, f64, f64) = (Length, DEEPEST_M, HIGHEST_M);
const DISTANCE: (Dimension, f64, f64) = (Length, 0.0, LONGEST_M);
/// Offsets from the fall line.
const OFFSET: (Dimension, f64, f64) = (Length, -LONGEST_M, LONGEST_M);
/// A span is no shorter than a step.
const SPAN: (Dimension, f64, f64) = (Length, 0.1, LONGEST_M);
const LINE_LENGTH: (Dimension, f64, f64) = (Length, 0.001, LONGEST_M);
const BODY: (Dimension, f64, f64) = (Length, 0.0, 100.0);
const FORCE: (Dimension, f64, f64) = (Force, LEAST_N, MOST_N);
const LOAD: (Dimension, f64, f64) = (Force, 0.0, MOST_N);
const MASS: (Dimension, f64, f64) = (Mass, 0.001, 1e6);
const STIFF: (Dimension, f64, f64) = (Stiffness, SOFTEST_N_PER_M, STIFFEST_N_PER_M);
const VISCOUS: (Dimension, f64, f64) = (Damping, 0.0, 1e9);

/// All keys, in file order.
pub const FIELDS: &[Field] = &[
    text("title", "title", "what this file is about", "\"roof edge, plant room\""),
    text("notes", "notes", "anything a reader should know", "\"\""),
    text("datum", "datum", "what elevation 0 is", "\"finished floor of level 0\""),
    quantity("gravity", "gravity", "acceleration of free fall", (Acceleration, 0.1, 100.0), "\"9.80665 m/s2\"")
        .needed(Default("9.80665 m/s2")),
    text("subject.kind", "subject kind", "a person or a suspended load", "\"person\"")
        .needed(Always)
        .one_of(&["person", "load"]),
    quantity("subject.mass", "subject mass", "falling mass with tools and clothing", MASS, "\"100 kg\"").needed(Always),
    quantity(
        "subject.attachment_above_feet",
        "attachment above feet",
        "height of the attachment above the soles, standing (person)",
        BODY,
        "\"1.5 m\"",
    )
    .needed(Sometimes),
    quantity(
        "subject.underside_below_attachment",
        "underside below attachment",
        "distance from the attachment down to the underside (load)",
        BODY,
        "\"0.8 m\"",
    )
    .needed(Sometimes),
    quantity(
        "subject.stretch_allowance",
        "stretch allowance",
        "harness stretch and shift of the attachment, lowers the feet (person)",
        BODY,
        "\"0.3 m\"",
    )
    .needed(Default("0 m")),
    quantity("subject.half_width", "half width", "half the width of the body or load", BODY, "\"0.3 m\""),
    quantity(
        "subject.body_factor",
        "body factor",
        "rigid-mass force over body force; divides only the demand of the arrest-force check (person)",
        (Ratio, 0.1, 10.0),
        "1.0",
    )
    .needed(Default("1")),
    quantity(
        "place.standing",
        "standing surface",
        "elevation of the standing surface, or of the underside of a load",
        ELEVATION,
        "\"10 m\"",
    )
    .needed(Sometimes),
    quantity("place.anchor", "anchor", "elevation of the anchor; gives the free fall", ELEVATION, "\"12 m\""),
    quantity(
        "place.anchor_offset",
        "anchor offset",
        "horizontal distance of the anchor from the fall line, right positive",
        OFFSET,
        "\"0.6 m\"",
    )
    .needed(Default("0 m")),
    quantity("place.edge.offset", "edge offset", "offset of an edge that the line runs over", OFFSET, "\"0.3 m\"")
        .needed(InSection),
    quantity("place.edge.elevation", "edge elevation", "elevation of that edge", ELEVATION, "\"11.3 m\"")
        .needed(InSection),
    quantity(
        "place.edge.strength_factor",
        "edge strength factor",
        "own number that divides the line's strength at the edge",
        (Ratio, 1.0, 100.0),
        "2",
    )
    .needed(Default("1")),
    quantity(
        "fall.free_fall",
        "free fall",
        "vertical travel until the line carries force, where it is stated and not worked out",
        DISTANCE,
        "\"1.8 m\"",
    )
    .needed(Sometimes),
    text("line.kind", "line kind", "what the line is", "\"lanyard\"").needed(Always).one_of(LINE_KINDS),
    quantity("line.length", "line length", "length with the packed absorber", LINE_LENGTH, "\"1.8 m\"")
        .needed(Sometimes),
    quantity("line.stiffness", "line stiffness", "force per length of stretch", STIFF, "\"60 kN/m\"").needed(Sometimes),
    quantity(
        "line.modulus",
        "line modulus",
        "force per unit strain; over the length it gives the stiffness",
        FORCE,
        "\"25 kN\"",
    )
    .needed(Sometimes),
    quantity("line.rated_impact.force", "rated impact force", "largest force of the rated drop", FORCE, "\"9 kN\"")
        .needed(InSection),
    quantity("line.rated_impact.mass", "rated impact mass", "mass of the rated drop", MASS, "\"80 kg\"")
        .needed(InSection),
    quantity(
        "line.rated_impact.fall_factor",
        "rated impact fall factor",
        "fall factor of the rated drop",
        (Ratio, 0.001, 10.0),
        "1.77",
    )
    .needed(InSection),
    quantity(
        "line.static_elongation.percent",
        "static elongation",
        "elongation in percent between the two loads",
        (Ratio, 1e-6, 10.0),
        "3.2",
    )
    .needed(InSection),
    quantity(
        "line.static_elongation.from",
        "static elongation from",
        "the smaller load, a mass or a force",
        LOAD,
        "\"50 kg\"",
    )
    .needed(InSection),
    quantity(
        "line.static_elongation.to",
        "static elongation to",
        "the larger load, a mass or a force",
        FORCE,
        "\"150 kg\"",
    )
    .needed(InSection),
    table(
        "line.curve",
        "force-elongation table",
        "pairs of elongation and force from zero, both rising; instead of stiffness",
        [Length, Force],
        "[[\"0 m\", \"0 kN\"], [\"0.1 m\", \"3 kN\"], [\"0.3 m\", \"12 kN\"]]",
    )
    .needed(Sometimes),
    quantity("line.damping", "line damping", "viscous damping of the line", VISCOUS, "\"400 N s/m\""),
    quantity(
        "line.damping_ratio",
        "line damping ratio",
        "damping over critical, about the mass and the line's own stiffness",
        (Ratio, 0.0, 1000.0),
        "0.08",
    ),
    quantity(
        "line.series_stiffness",
        "series stiffness",
        "the spring in series of a three-parameter line",
        STIFF,
        "\"200 kN/m\"",
    ),
    quantity("line.strength", "line strength", "breaking strength of the line", FORCE, "\"22 kN\""),
    quantity(
        "line.mass_per_length",
        "line mass per length",
        "information only, the model has no line mass",
        (MassPerLength, 0.0, 1000.0),
        "\"0.07 kg/m\"",
    ),
    quantity("line.lock_travel", "lock travel", "travel until a retractable line locks", DISTANCE, "\"0.6 m\"")
        .needed(Sometimes),
    quantity(
        "line.grab_slide",
        "grab slide",
        "slide of a vertical line's grab before it holds, added to the free fall",
        DISTANCE,
        "\"0.3 m\"",
    )
    .needed(Default("0 m")),
    quantity("line.slack", "slack", "slack of a retractable line at the start", DISTANCE, "\"0 m\"")
        .needed(Default("0 m")),
    quantity("absorber.deploy_force", "deployment force", "force while the absorber deploys", FORCE, "\"4 kN\"")
        .needed(Sometimes),
    quantity(
        "absorber.onset_force",
        "onset force",
        "force at which deployment first starts, not below the deployment force",
        FORCE,
        "\"4.5 kN\"",
    )
    .needed(Default("the deployment force")),
    quantity("absorber.stroke", "stroke", "largest deployed length", LINE_LENGTH, "\"1.1 m\"").needed(Sometimes),
    table(
        "absorber.force_table",
        "force table",
        "pairs of deployed length and force from length 0; instead of deploy_force",
        [Length, Force],
        "[[\"0 m\", \"3 kN\"], [\"1.1 m\", \"4 kN\"]]",
    )
    .needed(Sometimes),
    quantity("absorber.rated_mass", "rated mass", "largest mass the absorber is rated for", MASS, "\"140 kg\""),
    quantity(
        "absorber.rated_free_fall",
        "rated free fall",
        "largest free fall the absorber is rated for",
        LINE_LENGTH,
        "\"4 m\"",
    ),
    quantity(
        "absorber.packed_length",
        "packed length",
        "length while packed, part of the line's length",
        DISTANCE,
        "\"0.2 m\"",
    )
    .needed(Default("0 m")),
    quantity(
        "absorber.wet_cold_factor",
        "wet and cold factor",
        "factor on all forces of a wet or frozen absorber",
        (Ratio, 0.1, 10.0),
        "1.5",
    )
    .needed(Default("1")),
    quantity("harness.stiffness", "harness stiffness", "stiffness of harness and body", STIFF, "\"80 kN/m\"")
        .needed(InSection),
    quantity("harness.damping", "harness damping", "viscous damping of harness and body", VISCOUS, "\"900 N s/m\"")
        .needed(Default("0 N s/m")),
    text("anchor.kind", "anchor kind", "what the line hangs from", "\"fixed\"")
        .needed(Default("fixed"))
        .one_of(&["fixed", "sprung", "span"]),
    quantity("anchor.stiffness", "anchor stiffness", "stiffness of a sprung anchor", STIFF, "\"500 kN/m\"")
        .needed(Sometimes),
    quantity("anchor.damping", "anchor damping", "viscous damping of a sprung anchor", VISCOUS, "\"0 N s/m\"")
        .needed(Default("0 N s/m")),
    quantity("anchor.capacity", "anchor capacity", "what the anchor carries", FORCE, "\"22.2 kN\""),
    quantity("anchor.span.length", "span length", "horizontal distance of the two supports", SPAN, "\"12 m\"")
        .needed(InSection),
    quantity(
        "anchor.span.at",
        "place on the span",
        "horizontal distance of the line from the left support",
        DISTANCE,
        "\"6 m\"",
    )
    .needed(Default("the middle")),
    quantity(
        "anchor.span.pretension",
        "span pretension",
        "tension of the straight cable; or state the sag",
        LOAD,
        "\"1 kN\"",
    )
    .needed(Sometimes),
    quantity(
        "anchor.span.sag",
        "span sag",
        "sag in the middle, unloaded; or state the pretension",
        DISTANCE,
        "\"0.3 m\"",
    )
    .needed(Sometimes),
    quantity("anchor.span.modulus", "span cable modulus", "force per unit strain of the cable", FORCE, "\"4000 kN\"")
        .needed(InSection),
    quantity(
        "anchor.span.support_stiffness",
        "span support stiffness",
        "stiffness of each end support along the cable",
        STIFF,
        "\"2000 kN/m\"",
    )
    .needed(Default("rigid")),
    quantity(
        "anchor.span.level_difference",
        "span level difference",
        "elevation of the right support less that of the left",
        OFFSET,
        "\"0 m\"",
    )
    .needed(Default("0 m")),
    quantity("anchor.span.workers", "span workers", "people who fall together", (Ratio, 1.0, 20.0), "1")
        .needed(Default("1")),
    quantity(
        "anchor.span.spans",
        "number of spans",
        "equal spans that the cable runs through",
        (Ratio, 1.0, 100.0),
        "1",
    )
    .needed(Default("1")),
    quantity("anchor.span.strength", "span cable strength", "breaking strength of the cable", FORCE, "\"40 kN\""),
    quantity(
        "anchor.span.absorber.deploy_force",
        "span absorber force",
        "cable tension while an absorber in the cable deploys",
        FORCE,
        "\"10 kN\"",
    )
    .needed(InSection),
    quantity(
        "anchor.span.absorber.stroke",
        "span absorber stroke",
        "its largest deployed length",
        LINE_LENGTH,
        "\"0.6 m\"",
    )
    .needed(InSection),
    text("obstacle.*.name", "obstacle name", "unique in the file", "\"lower roof\"").needed(InSection),
    quantity("obstacle.*.top", "obstacle top", "elevation of its top", ELEVATION, "\"4 m\"").needed(InSection),
    quantity(
        "obstacle.*.from",
        "obstacle from",
        "start of its horizontal extent, from the fall line",
        ELEVATION,
        "\"-1 m\"",
    ),
    quantity("obstacle.*.to", "obstacle to", "end of its horizontal extent, from the fall line", ELEVATION, "\"2 m\""),
    quantity("obstacle.*.reserve", "obstacle reserve", "clear space wanted above it", DISTANCE, "\"1 m\"")
        .needed(Default("0 m")),
    text("face.*.name", "face name", "unique in the file", "\"wall\"").needed(InSection),
    quantity("face.*.offset", "face offset", "its offset from the fall line, right positive", OFFSET, "\"3 m\"")
        .needed(InSection),
    quantity("face.*.bottom", "face bottom", "elevation of its lower end", ELEVATION, "\"0 m\"").needed(InSection),
    quantity("face.*.top", "face top", "elevation of its upper end", ELEVATION, "\"10 m\"").needed(InSection),
    text("limits.basis", "limits basis", "a built-in set of published limits, or own", "\"eu-363\""),
    quantity("limits.arrest_force", "limit on the arrest force", "largest arrest force", FORCE, "\"6 kN\""),
    quantity("limits.free_fall", "limit on the free fall", "largest free-fall distance", DISTANCE, "\"1.8 m\""),
    quantity(
        "limits.deceleration_distance",
        "limit on the deceleration distance",
        "largest deceleration distance",
        DISTANCE,
        "\"1.07 m\"",
    ),
    quantity(
        "limits.arrest_distance",
        "limit on the total fall",
        "largest total fall distance",
        DISTANCE,
        "\"5.75 m\"",
    ),
    quantity("limits.anchor_strength", "limit on the anchor", "least strength of the anchor", FORCE, "\"12 kN\""),
    quantity("limits.anchor_factor", "anchor factor", "factor on the anchor load", (Ratio, 1.0, 100.0), "2"),
    quantity("limits.line_strength", "limit on the line", "least strength of the line", FORCE, "\"22 kN\""),
    quantity("limits.line_factor", "line factor", "factor on the line force", (Ratio, 1.0, 100.0), "2"),
    quantity("limits.subject_mass", "limit on the mass", "largest mass of the subject", MASS, "\"140 kg\""),
    text("accept.*.doubt", "accepted doubt", "id of a doubt of `audit` that was looked at", "\"reserve-missing\"")
        .needed(InSection),
    text("accept.*.at", "accepted place", "path of the one input or section it is about", "\"obstacle.1\"")
        .needed(Default("every place")),
    text("accept.*.why", "reason", "why it is accepted, for the next reviewer", "\"the roof is netted, see plan 4\"")
        .needed(InSection),
    count("study.seed", "seed", "which sample of the bands is drawn", (0.0, LARGEST_SEED), "1").needed(Default("1")),
    count("study.samples", "samples", "runs that the sample of the bands has", (1.0, MOST_SAMPLES), "4096")
        .needed(Default("4096")),
];

/// Line kinds of a file.
const LINE_KINDS: &[&str] = &["lanyard", "rope", "webbing", "cable", "retractable", "vertical"];
