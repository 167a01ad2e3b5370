//! The cautions that stand in every output.

/// The line that is always on the screen.
pub const CAUTION_LINE: &str =
    "FIRST-PASS ESTIMATE, NOT A DESIGN - local code and a licensed or competent person decide - plan the rescue first";

/// What the model leaves out, shown with every result.
pub const LEFT_OUT: &str = "Left out: air drag; mass of the line; rate-dependence of the absorber other than its band; \
     knots, edge friction and line damage; rotation and posture of the body; temperature, wet and ageing unless put \
     into the inputs; a second fall on used equipment.";

/// Longer cautions for text, JSON and sheet, with their sources.
pub const CAUTIONS: &[&str] = &[
    "This is a first-pass estimate, not a design: local codes and a licensed or competent person decide.",
    "Plan the rescue before anyone leans on the line: prompt rescue is required (29 CFR 1926.502(d)(20), \
     1910.140(c)(21)), and suspension in a harness may cause unconsciousness and death in under 30 minutes (OSHA SHIB \
     03-24-2004, read in a secondary summary).",
    LEFT_OUT,
];

/// Cautions about equipment that stand beside the published limits.
pub const EQUIPMENT_CAUTIONS: &[&str] = &[
    "A rescue within 9 minutes keeps unconsciousness in suspension to 5 % of workers (Hsiao et al. 2012, Human Factors \
     54(3):346-357, published).",
    "A rope tied round a beam loses up to 70 % of its strength (29 CFR 1926 Subpart M App. C, read in a secondary summary).",
    "A knot takes 50 % or more of a rope's strength (from memory, unverified).",
    "Wet and frozen absorbers may rise from class 4 kN to 6 kN and from 6 kN to 8 kN (Alberta guide s.142.3 on CSA \
     Z259.11-05, published).",
];
