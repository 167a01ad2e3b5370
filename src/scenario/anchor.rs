//! What the line hangs from.
use crate::quantity::Measure;

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
    /// Fixed, sprung or a span.
    pub kind: AnchorKind,
    /// What the anchor carries, N.
    pub capacity: Option<Measure>,
}

/// Kind of anchor.
#[derive(Clone, Debug, PartialEq)]
#[expect(clippy::large_enum_variant, reason = "a file has one anchor")]
pub enum AnchorKind {
    /// Does not move.
    Fixed,
    /// Gives on a spring.
    Sprung(Compliance),
    /// A horizontal lifeline between two supports.
    Span(Span),
}

/// A horizontal lifeline: a cable between supports that carries the line somewhere along it.
#[derive(Clone, Debug, PartialEq)]
pub struct Span {
    /// Horizontal distance of the supports, m; of two neighbours where the cable runs through more.
    pub length: Measure,
    /// Horizontal distance of the line from the left support, m; the middle where absent.
    pub at: Option<Measure>,
    /// How tight the unloaded cable is.
    pub tension: SpanTension,
    /// Force per unit strain of the cable, N.
    pub modulus: Measure,
    /// Stiffness of each end support along the cable, N/m; rigid where absent.
    pub support_stiffness: Option<Measure>,
    /// Absorber in the cable, if any.
    pub absorber: Option<SpanAbsorber>,
    /// People who fall together, a whole number; 1 where absent.
    pub workers: Option<Measure>,
    /// Equal spans that one cable runs through, a whole number; 1 where absent.
    pub spans: Option<Measure>,
    /// Elevation of the right support less that of the left one, m; 0 where absent.
    pub level_difference: Option<Measure>,
    /// Breaking strength of the cable, N.
    pub strength: Option<Measure>,
}

impl Span {
    /// Horizontal distance of the line from the left support, m.
    #[must_use]
    pub fn at_m(&self) -> f64 {
        self.at.map_or(0.5 * self.length.si(), |at| at.si())
    }

    /// Distance of the supports along the straight cable, m.
    #[must_use]
    pub fn chord_m(&self) -> f64 {
        self.length.si().hypot(self.level_difference.map_or(0.0, |level| level.si()))
    }
}

/// How tight an unloaded span is; exactly one is stated.
#[derive(Clone, Debug, PartialEq)]
pub enum SpanTension {
    /// Tension of the straight cable, N.
    Pretension(Measure),
    /// Sag in the middle of the unloaded cable, m.
    Sag(Measure),
}

/// Absorber in the cable of a span.
#[derive(Clone, Debug, PartialEq)]
pub struct SpanAbsorber {
    /// Cable tension while it deploys, N.
    pub deploy_force: Measure,
    /// Largest deployed length, m.
    pub stroke: Measure,
}
