//! Typical axial stiffness of cables and ropes: first guesses with the state of their source.
//!
//! A figure of the maker goes before any of these.

/// Where the figures of a row come from.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Source {
    /// Worked out from a published figure, named here.
    Published(&'static str),
    /// From memory, not verified: confirm with the maker before use.
    FromMemory,
}

/// What the figures of a row are per.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Basis {
    /// Modulus in Pa of the metal in the section; that area is `fill d^2` with the nominal diameter d.
    MetallicArea {
        /// Metallic area over the square of the nominal diameter.
        fill: f64,
    },
    /// Modulus in Pa of the whole circle of the nominal diameter, voids included.
    NominalArea,
    /// Force per unit strain in N of one line, whatever its diameter.
    Line,
}

/// One row: low, typical and high.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Cable {
    /// Construction.
    pub name: &'static str,
    /// What the figures are per.
    pub basis: Basis,
    /// Low, typical, high: Pa, or N for [`Basis::Line`].
    pub values: [f64; 3],
    /// State of the source.
    pub source: Source,
    /// What to know before use.
    pub note: &'static str,
}

const GIGA: f64 = 1e9;

const NEW_ROPE: &str = "new rope stretches more until it has bedded in";

/// The rows, stiffest construction first.
pub const CABLES: [Cable; 7] = [
    Cable {
        name: "steel strand, 1x19",
        basis: Basis::MetallicArea { fill: 0.60 },
        values: [120.0 * GIGA, 145.0 * GIGA, 165.0 * GIGA],
        source: Source::FromMemory,
        note: "one strand, stiff, for fixed lines",
    },
    Cable {
        name: "steel wire rope, 7x7",
        basis: Basis::MetallicArea { fill: 0.43 },
        values: [90.0 * GIGA, 110.0 * GIGA, 130.0 * GIGA],
        source: Source::FromMemory,
        note: NEW_ROPE,
    },
    Cable {
        name: "steel wire rope, 7x19 or 6x19 with steel core",
        basis: Basis::MetallicArea { fill: 0.42 },
        values: [80.0 * GIGA, 100.0 * GIGA, 115.0 * GIGA],
        source: Source::FromMemory,
        note: NEW_ROPE,
    },
    Cable {
        name: "steel wire rope, 6x19 with fibre core",
        basis: Basis::MetallicArea { fill: 0.36 },
        values: [60.0 * GIGA, 80.0 * GIGA, 100.0 * GIGA],
        source: Source::FromMemory,
        note: NEW_ROPE,
    },
    Cable {
        name: "polyester rope, braided, low stretch",
        basis: Basis::NominalArea,
        values: [1.0 * GIGA, 2.0 * GIGA, 4.0 * GIGA],
        source: Source::FromMemory,
        note: "rises with load and with rate of loading",
    },
    Cable {
        name: "polyamide rope, laid",
        basis: Basis::NominalArea,
        values: [0.2 * GIGA, 0.5 * GIGA, 1.0 * GIGA],
        source: Source::FromMemory,
        note: "rises with load, falls when wet",
    },
    Cable {
        name: "dynamic rope",
        basis: Basis::Line,
        values: [18_533.0, 24_091.0, 45_090.0],
        source: Source::Published(
            "solved from the standard test fall of EN 892 (80 kg, 4.6 m on 2.6 m) for largest forces of 8, 9 and 12 kN; not \
             a rope for a horizontal line",
        ),
        note: "the rope of a lead climber's fall; as a horizontal line it sags far",
    },
];

impl Cable {
    /// Axial stiffness EA (force per unit strain), N: low, typical and high for a nominal diameter in m, `> 0`.
    #[must_use]
    pub fn axial_stiffness_n(&self, diameter_m: f64) -> [f64; 3] {
        let area = match self.basis {
            Basis::MetallicArea { fill } => fill * diameter_m * diameter_m,
            Basis::NominalArea => 0.25 * std::f64::consts::PI * diameter_m * diameter_m,
            Basis::Line => 1.0,
        };
        self.values.map(|value| value * area)
    }

    /// Whether the figures stand on a published source.
    #[must_use]
    pub const fn is_published(&self) -> bool {
        matches!(self.source, Source::Published(_))
    }
}
