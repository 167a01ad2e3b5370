//! The doubts that an audit may raise: stable ids, what each says, why it matters.
use super::values::nearest;

/// One kind of doubt.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct DoubtRule {
    /// Stable id, words joined by `-`.
    pub id: &'static str,
    /// What is doubtful, one clause.
    pub about: &'static str,
    /// Why it matters, in sentences.
    pub why: &'static str,
}

const fn rule(id: &'static str, about: &'static str, why: &'static str) -> DoubtRule {
    DoubtRule { id, about, why }
}

/// An entry of `[[accept]]` that accepts nothing.
pub(super) const UNUSED_ACCEPTANCE: &str = "acceptance-unused";
/// Doubts that only a judged run raises: no reading of the file alone can tell whether an acceptance of them is used.
pub(super) const FROM_JUDGED: [&str; 2] = ["limit-loosened", "limit-from-memory"];

/// Every doubt, in the order of a file.
pub const DOUBT_RULES: &[DoubtRule] = &[
    rule(
        "mass-above-usual",
        "a person is heavier than personal equipment is rated for",
        "Above 200 kg no published rating of a personal absorber reaches. Pounds written as kilograms look like this.",
    ),
    rule(
        "mass-below-usual",
        "a person is so light that an absorber may hardly deploy",
        "Below 40 kg the deployment force is a large multiple of the weight: the stop is short and hard. Tools and clothing count.",
    ),
    rule(
        "attachment-high",
        "the attachment lies higher on the body than any harness has it",
        "The height counts from the soles of a standing person; a dorsal D-ring is near 1.5 m. An elevation above the datum looks like this.",
    ),
    rule(
        "attachment-low",
        "the attachment lies lower on the body than any harness has it",
        "The height counts from the soles of a standing person. Below 0.6 m it would be under the knees, and the feet would seem to stop higher than they do.",
    ),
    rule(
        "attachment-height-missing",
        "the height of the attachment above the feet is not stated",
        "Without it the attachment has no elevation, and no clearance can be judged.",
    ),
    rule(
        "body-factor-above-one",
        "a body factor lowers the arrest force that is judged",
        "A rigid test mass sees a larger force than a body, by a factor that depends on harness, body and fall. Taken too large it hides a hard stop.",
    ),
    rule(
        "allowance-missing",
        "nothing is allowed for the stretch of the harness",
        "A harness and the shift of its attachment lower the feet by some tenths of a metre. Left out, the clearance is too large by as much.",
    ),
    rule(
        "allowance-large",
        "the stretch allowance is larger than any harness gives",
        "Above 1 m it is likely to hold something else as well, such as a reserve, which would then be counted twice.",
    ),
    rule(
        "gravity-unusual",
        "gravity is not that of the ground",
        "On the ground it differs from 9.80665 m/s2 by less than 0.05 m/s2. Another value scales every energy of the fall.",
    ),
    rule(
        "line-overdamped",
        "the line is damped above critical",
        "Textile and wire lines are far below. The force at the moment of taut rises with the damping and then no longer tells of a real line.",
    ),
    rule(
        "anchor-below-feet",
        "the anchor lies below the standing surface",
        "From there the fall is nearly twice the length of the line, and the line may run over an edge. Two elevations taken from different datums look like this.",
    ),
    rule(
        "fall-above-twice-length",
        "the stated free fall is more than twice the length of the line",
        "A line on a fixed point lets a body fall at most twice its length: one of the two numbers is wrong.",
    ),
    rule(
        "free-fall-none",
        "a person's stated free fall is nothing",
        "A line that hangs at all has some slack. A stated free fall of 0 m leaves out slack, reach and the swing of the arms.",
    ),
    rule(
        "elongation-tiny",
        "the static elongation is that of a steel bar",
        "The number is in percent. 0.034 for 3.4 % makes the line a hundred times too stiff.",
    ),
    rule(
        "rated-drop-above-two",
        "the rated drop of the line has a fall factor above 2",
        "A test on a fixed point has at most 2. A larger one gives a modulus that is wrong in the same measure.",
    ),
    rule("line-short", "the line is shorter than any that is sold", "Below 0.1 m a unit slipped: 1.8 mm for 1.8 m."),
    rule(
        "lanyard-long",
        "a lanyard is longer than lanyards are",
        "Above 5 m a point slipped, or the line is of another kind, such as a rope.",
    ),
    rule(
        "line-soft",
        "the weight alone stretches the line to twice its length",
        "Newton written for kilonewton looks like this. Peak force and travel are then those of a rubber band.",
    ),
    rule(
        "line-stiff",
        "the line is stiffer than a thick steel rope",
        "Above 100 MN per unit strain a unit slipped. The peak force is then too large, and other parts of the path give all the travel.",
    ),
    rule(
        "line-heavy",
        "the line itself weighs more than a tenth of the falling mass",
        "The model has no mass of the line. A heavy line sags, whips and falls as well.",
    ),
    rule(
        "strength-missing",
        "the breaking strength of the line is not stated",
        "Without it nothing tells whether the line carries the peak.",
    ),
    rule(
        "strength-below-onset",
        "the line breaks before the absorber starts",
        "Then the absorber never works: the strength, the onset force or a unit is wrong.",
    ),
    rule(
        "absorber-below-weight",
        "the absorber deploys at less than the weight",
        "It cannot stop the fall before its stroke is used up.",
    ),
    rule(
        "absorber-table-below-weight",
        "the absorber's table ends at less than the weight",
        "It cannot stop the fall before its stroke is used up.",
    ),
    rule(
        "absorber-force-high",
        "the absorber deploys at more than any limit on a person allows",
        "Above 10 kN it does not do what an absorber is for. Pound-force or a slipped point look like this.",
    ),
    rule(
        "stroke-long",
        "the stroke is longer than absorbers are",
        "Above 3 m it is likely to hold the line as well. A stroke that is not there hides a stop against the end.",
    ),
    rule(
        "onset-high",
        "the absorber starts at more than twice its deployment force",
        "The first stitches hold a little more, not twice. The larger number is the peak that the body feels.",
    ),
    rule(
        "rated-mass-missing",
        "the absorber states no rated mass",
        "Copy it from the label; without it the mass cannot be checked against the rating.",
    ),
    rule(
        "rated-free-fall-missing",
        "the absorber states no rated free fall",
        "Copy it from the label; without it the fall cannot be checked against the rating.",
    ),
    rule(
        "wet-factor-below-one",
        "a wet or frozen absorber is said to need less force",
        "Wet and frozen absorbers are known to need more. Below 1 the factor lowers the peak that is judged.",
    ),
    rule(
        "curve-ends-low",
        "the line's table ends below the forces of this fall",
        "Beyond the last row nothing can be judged.",
    ),
    rule(
        "harness-on-load",
        "a load has a harness",
        "Harness and body give where a load does not: the peak is too small.",
    ),
    rule(
        "harness-counted-twice",
        "the stretch of the harness is counted twice",
        "Both the allowance and the spring of [harness] lower the feet by it.",
    ),
    rule(
        "harness-soft",
        "the harness gives more than half a metre under the weight",
        "Newton written for kilonewton looks like this. The peak force is then too small.",
    ),
    rule(
        "datum-missing",
        "nothing says what elevation 0 is",
        "Elevations from two drawings with two datums are the usual source of a wrong clearance.",
    ),
    rule("obstacle-missing", "no obstacle is stated", "Then no clearance is judged, whatever lies below."),
    rule(
        "obstacle-without-standing",
        "obstacles have elevations, the subject has none",
        "No clearance can be worked out.",
    ),
    rule(
        "obstacle-above-start",
        "an obstacle lies above the start of the fall",
        "The body starts above it or beside it: one of the elevations or a datum is wrong.",
    ),
    rule(
        "reserve-missing",
        "an obstacle states no reserve",
        "Then a body that just so does not touch holds. Sets of limits want up to 1 m.",
    ),
    rule(
        "reserve-none",
        "an obstacle's reserve is nothing",
        "Then a body that just so does not touch holds. A first-pass estimate is not that fine.",
    ),
    rule("limits-missing", "no limits are stated", "Then no force is judged."),
    rule(
        "basis-missing",
        "single limits stand without a basis",
        "A reviewer cannot tell whether they are the user's own or a part of a published set.",
    ),
    rule("own-limits-missing", "the basis is the user's own and states no limit", "Then no force is judged."),
    rule(
        "arrest-limit-high",
        "the stated limit on the arrest force is above every published one",
        "Published limits for a person are 4 kN to 8 kN in work and up to 12 kN in rope tests with a rigid mass.",
    ),
    rule(
        "limit-loosened",
        "a limit of the file asks for less than the published one that it replaces",
        "It counts in the verdict. The reason stands in the file and wants to be read.",
    ),
    rule(
        "limit-from-memory",
        "a limit that counts in the verdict is from memory, unverified",
        "Its value was not read in the source or in a summary of it: look it up before relying on the check.",
    ),
    rule(
        "lock-travel-long",
        "a retractable line travels long until it locks",
        "It counts until the line locks, without the braking after it; published tests stop the whole fall within about 1.4 m.",
    ),
    rule(
        "retractable-below-attachment",
        "a retractable line is anchored below the attachment",
        "It pays out only once the attachment has passed the anchor: the free fall is larger than the lock travel.",
    ),
    rule(
        "retractable-over-edge",
        "a retractable line runs over an edge",
        "Its cable and brake are tested hanging free unless its maker says otherwise, and the lock may come late.",
    ),
    rule(
        "grab-slide-missing",
        "the grab of a vertical line has no slide",
        "It would hold at once; a real one slides some tenths of a metre, which counts as free fall.",
    ),
    rule(
        "edge-strength-missing",
        "the line's strength is judged as if the edge did it no harm",
        "A line that was not tested over such an edge may be cut or lose much of its strength.",
    ),
    rule(
        "edge-above-anchor",
        "the edge lies above the anchor",
        "The line would climb to it: one of the elevations or a datum is wrong.",
    ),
    rule(
        "face-missing",
        "the subject swings and nothing says what stands beside it",
        "Then no strike is judged, and swings strike with the speed of the fall.",
    ),
    rule("face-not-reached", "a face is stated and the fall does not swing", "No face is judged in a straight fall."),
    rule(
        "face-in-reach",
        "a face touches the fall line",
        "The offset counts from the fall line to the face; within half the body's width it is there from the start.",
    ),
    rule("half-width-missing", "the body has no width", "A point strikes later than a body does."),
    rule(
        "anchor-soft",
        "the anchor gives more than half a metre under the weight",
        "Newton written for kilonewton looks like this. The peak force is then too small.",
    ),
    rule(
        "capacity-missing",
        "what the anchor carries is not stated",
        "Without it nothing tells whether the anchor carries the peak.",
    ),
    rule(
        "span-tight",
        "the lifeline is so tight that it multiplies its load",
        "Below 1 % of sag or above 2 % of strain the supports feel tens of times the load, or the cable yields.",
    ),
    rule(
        "span-strength-missing",
        "neither the cable's strength nor the supports' stiffness are stated",
        "Then the supports are rigid and the cable is not judged.",
    ),
    rule(
        "span-capacity-missing",
        "the supports of the lifeline have no capacity",
        "A lifeline multiplies the load on them; without the capacity that is not judged.",
    ),
    rule(
        "band-wide",
        "the high end of a band is more than four times its low end",
        "Such a band says that the number is not known. The worst found is then that of the ignorance, not of the case.",
    ),
    rule(
        "band-one-sided",
        "the typical value lies at an end of its band",
        "Then the band has spread to one side only, and the typical verdict is at an extreme. A band in a wrong order of thought looks like this.",
    ),
    rule(
        "samples-few",
        "the sample of the bands is too small to tell a small share",
        "Below 256 runs the interval of a share of 0 reaches above 1 %.",
    ),
    rule(
        "acceptance-unused",
        "an accepted doubt is not there",
        "The file was put right since, or the id or the place is wrong. An entry that accepts nothing hides the next doubt of its kind.",
    ),
];

/// The doubt of an id.
#[must_use]
pub fn doubt_rule(id: &str) -> Option<&'static DoubtRule> {
    DOUBT_RULES.iter().find(|rule| rule.id == id)
}

/// The id that was probably meant.
#[must_use]
pub fn nearest_doubt(id: &str) -> Option<&'static str> {
    nearest(id, DOUBT_RULES.iter().map(|rule| rule.id))
}
