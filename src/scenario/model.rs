//! A scenario whose every value has been checked; SI inside, the file's units kept beside.
use crate::quantity::Measure;

/// Everything a file says.
#[derive(Clone, Debug, PartialEq)]
pub struct Scenario {
    /// Title, the file's own words.
    pub title: Option<String>,
    /// Notes, the file's own words.
    pub notes: Option<String>,
    /// What elevation 0 is.
    pub datum: Option<String>,
    /// Gravity, m/s2; 9.80665 unless the file says otherwise.
    pub gravity: Measure,
    /// The falling mass.
    pub subject: Subject,
    /// Elevations.
    pub place: Place,
    /// The fall, where stated.
    pub fall: Fall,
    /// The line.
    pub line: Line,
    /// Energy absorber, if any.
    pub absorber: Option<Absorber>,
    /// Compliance of harness and body, if any.
    pub harness: Option<Compliance>,
    /// What the line hangs from.
    pub anchor: Anchor,
    /// What must not be touched.
    pub obstacles: Vec<Obstacle>,
    /// Limits to check against.
    pub limits: Limits,
}

/// Person or load.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum SubjectKind {
    /// A person with tools and clothing.
    Person,
    /// A suspended load.
    Load,
}

/// The falling mass.
#[derive(Clone, Debug, PartialEq)]
pub struct Subject {
    /// Person or load.
    pub kind: SubjectKind,
    /// Mass with tools and clothing, kg.
    pub mass: Measure,
    /// Height of the attachment above the feet, m (persons).
    pub attachment_above_feet: Option<Measure>,
    /// Distance from attachment down to the underside, m (loads).
    pub underside_below_attachment: Option<Measure>,
    /// Harness stretch and attachment shift, m (persons).
    pub stretch_allowance: Option<Measure>,
    /// Half the width of the body or load, m.
    pub half_width: Option<Measure>,
    /// Rigid-mass force over body force; divides only the demand of the arrest-force check.
    pub body_factor: Option<Measure>,
}

/// Elevations above the file's datum.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Place {
    /// Standing surface (persons) or underside of the load, m.
    pub standing: Option<Measure>,
    /// Anchor elevation, m.
    pub anchor: Option<Measure>,
}

/// The fall, where it is stated and not worked out.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Fall {
    /// Free-fall distance, m.
    pub free_fall: Option<Measure>,
}

/// Kind of line.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum LineKind {
    /// Lanyard.
    Lanyard,
    /// Rope.
    Rope,
    /// Webbing.
    Webbing,
    /// Wire cable.
    Cable,
}

/// The one law of the line's stretch, as the file states it.
#[derive(Clone, Debug, PartialEq)]
pub enum StretchLaw {
    /// Stiffness, N/m.
    Stiffness(Measure),
    /// Force per unit strain, N.
    Modulus(Measure),
    /// A rated drop: largest force, mass, fall factor.
    RatedImpact {
        /// Largest force of the rated drop, N.
        force: Measure,
        /// Mass of the rated drop, kg.
        mass: Measure,
        /// Fall factor of the rated drop.
        fall_factor: Measure,
    },
    /// Elongation in percent between two loads (forces in N; a mass was turned into its weight).
    StaticElongation {
        /// Elongation between the loads, as a ratio (0.05 for 5 %).
        percent: Measure,
        /// The smaller load, as written (mass or force).
        from: Measure,
        /// The larger load, as written (mass or force).
        to: Measure,
    },
}

/// Damping of the line, as the file states it.
#[derive(Clone, Debug, PartialEq)]
pub enum DampingLaw {
    /// No key: no damping.
    None,
    /// Viscous damping, N s/m.
    Damping(Measure),
    /// Ratio about the subject's mass and the line's own stiffness.
    Ratio(Measure),
}

/// The line.
#[derive(Clone, Debug, PartialEq)]
pub struct Line {
    /// Kind.
    pub kind: LineKind,
    /// Length with any packed absorber, m.
    pub length: Option<Measure>,
    /// The law of its stretch.
    pub stretch: StretchLaw,
    /// Its damping.
    pub damping: DampingLaw,
    /// The spring in series of the three-parameter line, N/m.
    pub series_stiffness: Option<Measure>,
    /// Breaking strength, N.
    pub strength: Option<Measure>,
    /// Mass per length, kg/m; information only.
    pub mass_per_length: Option<Measure>,
}

/// Energy absorber.
#[derive(Clone, Debug, PartialEq)]
pub struct Absorber {
    /// Deployment force, N.
    pub deploy_force: Measure,
    /// Force at which deployment first starts, N; the deployment force where absent.
    pub onset_force: Option<Measure>,
    /// Largest deployed length, m.
    pub stroke: Measure,
    /// Largest mass it is rated for, kg.
    pub rated_mass: Option<Measure>,
    /// Largest free fall it is rated for, m.
    pub rated_free_fall: Option<Measure>,
    /// Length it takes while packed, part of the line's length, m.
    pub packed_length: Option<Measure>,
}

/// A spring with its damper.
#[derive(Clone, Debug, PartialEq)]
pub struct Compliance {
    /// Stiffness, N/m.
    pub stiffness: Measure,
    /// Damping, N s/m.
    pub damping: Option<Measure>,
}

/// What the line hangs from.
#[derive(Clone, Debug, PartialEq)]
pub struct Anchor {
    /// Fixed or sprung.
    pub kind: AnchorKind,
    /// What the anchor carries, N.
    pub capacity: Option<Measure>,
}

/// Kind of anchor.
#[derive(Clone, Debug, PartialEq)]
pub enum AnchorKind {
    /// Does not move.
    Fixed,
    /// Gives on a spring.
    Sprung(Compliance),
}

/// A level that must not be touched.
#[derive(Clone, Debug, PartialEq)]
pub struct Obstacle {
    /// Name, unique in the file.
    pub name: String,
    /// Elevation of its top, m.
    pub top: Measure,
    /// Horizontal extent, m from the fall line; both or neither.
    pub extent: Option<(Measure, Measure)>,
    /// Clear space wanted above it, m; 0 where absent.
    pub reserve: Option<Measure>,
}

impl Obstacle {
    /// Whether a body on the fall line (offset 0, with its half width) is above some of it.
    #[must_use]
    pub fn is_below(&self, subject: &Subject) -> bool {
        let half_width = subject.half_width.map_or(0.0, |w| w.si());
        self.extent.is_none_or(|(from, to)| from.si() <= half_width && to.si() >= -half_width)
    }

    /// Name as used in ids: lower case, `_` for blanks.
    #[must_use]
    pub fn id(&self) -> String {
        id_of(&self.name)
    }
}

/// A name as used in ids.
pub(super) fn id_of(name: &str) -> String {
    name.to_lowercase().split_whitespace().collect::<Vec<_>>().join("_")
}

/// Limits to check against.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Limits {
    /// Name of the built-in set, `own`, or none. Not judged here: the margin layer knows the sets.
    pub basis: Option<String>,
    /// Single limits stated by the file, by key (`arrest_force`).
    pub own: Vec<OwnLimit>,
}

/// A limit that the file states itself.
#[derive(Clone, Debug, PartialEq)]
pub struct OwnLimit {
    /// Key below `limits`, see [`LIMIT_KEYS`].
    pub key: String,
    /// Value, SI.
    pub value: Measure,
    /// Why it differs from the basis; required when a published basis is named.
    pub why: Option<String>,
}

/// Keys of single limits with their dimensions: `limits.<key> = "6 kN"` with basis `own`, or
/// `limits.<key> = { value = "6 kN", why = "..." }` over a published set.
pub const LIMIT_KEYS: &[(&str, crate::quantity::Dimension, &str)] = &[
    ("arrest_force", crate::quantity::Dimension::Force, "largest arrest force"),
    ("free_fall", crate::quantity::Dimension::Length, "largest free-fall distance"),
    ("deceleration_distance", crate::quantity::Dimension::Length, "largest deceleration distance"),
    ("arrest_distance", crate::quantity::Dimension::Length, "largest total fall distance"),
    ("anchor_strength", crate::quantity::Dimension::Force, "least strength of the anchor"),
    ("anchor_factor", crate::quantity::Dimension::Ratio, "factor on the anchor load"),
    ("line_strength", crate::quantity::Dimension::Force, "least strength of the line"),
    ("line_factor", crate::quantity::Dimension::Ratio, "factor on the line force"),
    ("subject_mass", crate::quantity::Dimension::Mass, "largest mass of the subject"),
];
