//! Where sources disagree: both are shown, none is picked silently.

/// One matter on which the sources differ.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Disagreement {
    /// What they differ about.
    pub topic: &'static str,
    /// What each says: the value, then who says it.
    pub readings: &'static [(&'static str, &'static str)],
    /// What this program does about it.
    pub here: &'static str,
}

/// Every known disagreement.
#[must_use]
pub const fn disagreements() -> &'static [Disagreement] {
    DISAGREEMENTS
}

const DISAGREEMENTS: &[Disagreement] = &[
    Disagreement {
        topic: "largest arrest force",
        readings: &[
            ("6 kN", "Europe, Queensland, Singapore, Quebec, Alberta"),
            ("8 kN (1800 lbf)", "United States federal, Ontario"),
        ],
        here: "the file names its set; no set is assumed",
    },
    Disagreement {
        topic: "metric rounding of 3.5 ft",
        readings: &[
            ("1.07 m", "rounded from 1.0668 m"),
            ("1.08 m", "another printed rounding"),
            ("1.1 m", "29 CFR 1910.140(d)"),
        ],
        here: "the sets of the United States are kept in feet: 3.5 ft = 1.0668 m",
    },
    Disagreement {
        topic: "reserve below the feet",
        readings: &[
            ("1 m", "DGUV Regel 112-198 s.7.3"),
            ("2 ft", "practice, no source"),
            ("3 ft", "practice, no source"),
        ],
        here: "each obstacle states its own reserve; where it states less than the set, the check says so",
    },
    Disagreement {
        topic: "height of the attachment above the feet",
        readings: &[("1.5 m", "metric clearance sums"), ("5 ft (1.524 m)", "clearance sums in feet")],
        here: "the file states it",
    },
    Disagreement {
        topic: "datum of a clearance sum",
        readings: &[
            ("below the anchor", "2.0 + 1.75 + 1.5 + 1.0 = 6.25 m; 6 + 3.5 + 6 + 3 = 18.5 ft"),
            ("below the standing surface", "DGUV Regel 112-198 s.7.3: 4.0 + 1.75 + 1.0 = 6.75 m"),
        ],
        here: "below the anchor = below the standing surface + height of the anchor above the attachment + height of \
               the attachment; elevations here are above the file's own datum",
    },
];
