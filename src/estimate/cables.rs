//! Typical cable stiffness in words, for whoever has no figure of the maker yet.
use crate::physics::cable::{Basis, CABLES, Cable, Source};

/// Nominal diameter the rows are worked out for, m.
const EXAMPLE_M: f64 = 0.008;

/// One sentence a construction: modulus, what area it is of, the axial stiffness at 8 mm, and the state of its source.
#[must_use]
pub fn typical_cables() -> Vec<String> {
    CABLES.iter().map(sentence).collect()
}

fn sentence(cable: &Cable) -> String {
    let source = match cable.source {
        Source::Published(words) => words,
        Source::FromMemory => "from memory, unverified",
    };
    let kilonewtons = cable.axial_stiffness_n(EXAMPLE_M).map(|n| n / 1e3);
    let [low, typical, high] = kilonewtons;
    let stiffness = format!("{low:.0}..{typical:.0}..{high:.0} kN");
    let [a, b, c] = cable.values.map(|pa| pa / 1e9);
    let per = match cable.basis {
        Basis::MetallicArea { fill } => {
            format!("{a:.1}..{b:.1}..{c:.1} GPa of the metallic area ({fill} d2); EA at 8 mm {stiffness}")
        }
        Basis::NominalArea => format!("{a:.1}..{b:.1}..{c:.1} GPa of the nominal area; EA at 8 mm {stiffness}"),
        Basis::Line => format!("EA of one line {stiffness}"),
    };
    format!("{}: {per}; {} ({source})", cable.name, cable.note)
}
