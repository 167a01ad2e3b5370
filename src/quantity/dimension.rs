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
