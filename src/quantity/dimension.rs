//! Kinds of quantity.

/// What kind of quantity a number is; two numbers compare only within one dimension.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Dimension {
    /// Length, SI metre.
    Length,
    /// Mass, SI kilogram.
    Mass,
    /// Force, SI newton.
    Force,
    /// Stiffness, SI newton per metre.
    Stiffness,
    /// Viscous damping, SI newton second per metre.
    Damping,
    /// Time, SI second.
    Time,
    /// Speed, SI metre per second.
    Speed,
    /// Acceleration, SI metre per second squared.
    Acceleration,
    /// Plane angle, SI radian.
    Angle,
    /// Energy, SI joule.
    Energy,
    /// Mass per length of a line, SI kilogram per metre.
    MassPerLength,
    /// Angular frequency, radian per second.
    AngularFrequency,
    /// Decay rate, one per second.
    Rate,
    /// Acceleration as a multiple of gravity, `g`.
    GravityMultiple,
    /// A plain number.
    Ratio,
}

impl Dimension {
    /// The word for it in messages: `length`, `force`.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Length => "length",
            Self::Mass => "mass",
            Self::Force => "force",
            Self::Stiffness => "stiffness",
            Self::Damping => "damping",
            Self::Time => "time",
            Self::Speed => "speed",
            Self::Acceleration => "acceleration",
            Self::Angle => "angle",
            Self::Energy => "energy",
            Self::MassPerLength => "mass per length",
            Self::AngularFrequency => "angular frequency",
            Self::Rate => "rate",
            Self::GravityMultiple => "multiple of gravity",
            Self::Ratio => "ratio",
        }
    }
}
