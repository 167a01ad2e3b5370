//! A scenario whose every value has been checked; SI inside, the file's units kept beside.
use super::anchor::{Anchor, Compliance};
use super::line::{Absorber, Line};
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
    /// Vertical faces that a swing could strike.
    pub faces: Vec<Face>,
    /// Limits to check against.
    pub limits: Limits,
    /// How the bands are sampled, where the file says so.
    pub study: Study,
    /// Doubts that the file accepts, each with its reason.
    pub accepted: Vec<Acceptance>,
}

/// A doubt that the file accepts with a reason. It stays visible in every audit.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Acceptance {
    /// Id of the doubt.
    pub doubt: String,
    /// Path of the one input or section that it is about; every place where absent.
    pub at: Option<String>,
    /// Why, not blank.
    pub why: String,
}

/// How the bands are sampled; what is absent is at its default.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Study {
    /// Which sample, 0 to 2^53 - 1.
    pub seed: Option<u64>,
    /// Runs of the sample, 1 to 1,000,000.
    pub samples: Option<u64>,
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
    /// Horizontal offset of the anchor from the fall line, m, right positive; 0 where absent.
    pub anchor_offset: Option<Measure>,
    /// The edge that the line runs over, if any.
    pub edge: Option<Edge>,
}

/// An edge that the line runs over.
#[derive(Clone, Debug, PartialEq)]
pub struct Edge {
    /// Horizontal offset from the fall line, m, right positive.
    pub offset: Measure,
    /// Elevation, m.
    pub elevation: Measure,
    /// The user's own number that divides the line's strength at the edge, at least 1; 1 where absent.
    pub strength_factor: Option<Measure>,
}

/// The fall, where it is stated and not worked out.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Fall {
    /// Free-fall distance, m.
    pub free_fall: Option<Measure>,
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

/// A vertical face that a swing could strike.
#[derive(Clone, Debug, PartialEq)]
pub struct Face {
    /// Name, unique in the file, obstacles included.
    pub name: String,
    /// Horizontal offset from the fall line, m, right positive.
    pub offset: Measure,
    /// Elevation of its lower end, m.
    pub bottom: Measure,
    /// Elevation of its upper end, m, above the lower one.
    pub top: Measure,
}

impl Face {
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
