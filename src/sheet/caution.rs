//! The cautions that stand in every output.

/// The line that is always on the screen.
pub const CAUTION_LINE: &str =
    "FIRST-PASS ESTIMATE, NOT A DESIGN - local code and a licensed or competent person decide - plan the rescue first";

/// Longer cautions for text, JSON and sheet, with their sources.
pub const CAUTIONS: &[&str] = &[
    "This is a first-pass estimate, not a design: local codes and a licensed or competent person decide.",
    "Plan the rescue before anyone leans on the line: prompt rescue is required (29 CFR 1926.502(d)(20)), and \
     suspension in a harness may cause unconsciousness and death in under 30 minutes (OSHA SHIB 03-24-2004, \
     read in a secondary summary).",
    "Left out: air drag; mass of the line; rate-dependence of the absorber other than its band; knots, edge friction \
     and line damage; rotation and posture of the body; temperature, wet and ageing unless put into the inputs; a \
     second fall on used equipment.",
];
