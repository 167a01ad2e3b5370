//! What a published limit is: kind, value in its source's unit, clause, and how it was confirmed.
use super::sets::SETS;
use crate::quantity::Unit;

/// How a value was confirmed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Mark {
    /// Read in the official text or an official guide.
    Published,
    /// Read in a secondary summary of it.
    Secondary,
    /// From memory, unverified; said wherever the value is shown.
    Memory,
}

impl Mark {
    /// The mark in words, as shown beside every value.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Published => "published",
            Self::Secondary => "read in a secondary summary",
            Self::Memory => "from memory, unverified",
        }
    }
    /// The letter of the mark: `P`, `S`, `M`.
    #[must_use]
    pub const fn letter(self) -> char {
        match self {
            Self::Published => 'P',
            Self::Secondary => 'S',
            Self::Memory => 'M',
        }
    }
}

/// What a limit limits. Checks pick their limits by this kind, never by words.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum LimitKind {
    /// Largest force on the body or lifting eye.
    ArrestForce,
    /// Largest free-fall distance.
    FreeFall,
    /// Largest absorber travel, elongation of the line excluded.
    DecelerationDistance,
    /// Largest total fall distance as stated.
    TotalFall,
    /// Largest total fall distance: twice the length of the line plus this value.
    TotalFallPastTwiceLength,
    /// Largest length of a lanyard with absorber.
    LanyardLength,
    /// Least strength of an anchor.
    AnchorStrength,
    /// Least strength of an anchor under conditions that the scenario does not state.
    AnchorStrengthConditional,
    /// Factor on the largest anchor force.
    AnchorFactor,
    /// Least static strength of the line.
    LineStrength,
    /// Least static strength of a line that limits the free fall to 2 ft.
    LineStrengthShortFall,
    /// Factor on the largest line force.
    LineFactor,
    /// Factor on the largest tension of a horizontal lifeline.
    SpanFactor,
    /// Largest mass of the subject.
    SubjectMass,
    /// Clear space wanted below the feet.
    Reserve,
    /// Elongation of a rope between two static loads.
    StaticElongation,
    /// Elongation of a rope at the first drop of its type test.
    DynamicElongation,
    /// Largest sideways swing as a distance.
    SwingDistance,
    /// Largest sideways swing as an angle.
    SwingAngle,
    /// Least diameter of the cable of a prescribed horizontal lifeline.
    SpanCableDiameter,
    /// Least slack of a prescribed horizontal lifeline, as a share of its span.
    SpanSlack,
    /// Largest span of a prescribed horizontal lifeline.
    SpanLength,
    /// Least strength of the end anchors of a prescribed horizontal lifeline.
    SpanAnchorStrength,
    /// Most workers on a prescribed horizontal lifeline.
    SpanWorkers,
}

/// Which side of a published value is allowed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Bound {
    /// The value itself is allowed, nothing above.
    AtMost,
    /// The value itself is not allowed.
    Below,
    /// The value itself is allowed, nothing below.
    AtLeast,
    /// Not a bound: a number to multiply by.
    Factor,
}

impl Bound {
    /// `<=`, `<`, `>=`, `x`.
    #[must_use]
    pub const fn sign(self) -> &'static str {
        match self {
            Self::AtMost => "<=",
            Self::Below => "<",
            Self::AtLeast => ">=",
            Self::Factor => "x",
        }
    }
}

/// For which equipment a limit was written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Applies {
    /// Any line.
    Every,
    /// Any line with an energy absorber.
    Absorber,
    /// A lanyard with an energy absorber.
    LanyardWithAbsorber,
    /// A line of textile, or one whose material the file does not tell.
    Textile,
    /// A metal line.
    Metal,
    /// A dynamic rope used as a single rope.
    SingleRope,
    /// A dynamic rope used as a half rope or a twin rope: shown, never judged.
    HalfOrTwinRope,
    /// A self-retracting line.
    Retractable,
    /// A guided arrester on a vertical line.
    Guided,
    /// A horizontal lifeline of wire.
    WireSpan,
    /// A horizontal lifeline of webbing or fibre.
    FibreSpan,
    /// Any horizontal lifeline.
    Span,
    /// An arrest with a swing to the side.
    Swing,
    /// A condition that the file does not state: shown beside the judged value, never judged alone.
    Elsewhere,
}

/// One limit of a set.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PublishedLimit {
    /// What it limits, for checks.
    pub kind: LimitKind,
    /// What it limits, in words.
    pub quantity: &'static str,
    /// Which side is allowed.
    pub bound: Bound,
    /// The value as the source states it.
    pub value: f64,
    /// The unit of the source.
    pub unit: Unit,
    /// For which equipment.
    pub applies: Applies,
    /// Clause with year where known.
    pub clause: &'static str,
    /// How confirmed.
    pub mark: Mark,
    /// The rule is met as well when another limit of the set, of this kind, is met.
    pub or: Option<LimitKind>,
    /// What else the source says.
    pub remark: Option<&'static str>,
}

impl PublishedLimit {
    /// The value, SI.
    #[must_use]
    pub const fn si(&self) -> f64 {
        self.value * self.unit.factor()
    }
    pub(super) const fn or(mut self, kind: LimitKind) -> Self {
        self.or = Some(kind);
        self
    }
    pub(super) const fn remark(mut self, words: &'static str) -> Self {
        self.remark = Some(words);
        self
    }
    pub(super) const fn only(mut self, applies: Applies) -> Self {
        self.applies = applies;
        self
    }
    pub(super) const fn below(mut self) -> Self {
        self.bound = Bound::Below;
        self
    }
}

/// Within what a set was written; a run outside of it is open, not judged by the set.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct WrittenFor {
    /// Only lines with an energy absorber.
    pub absorber: bool,
    /// Only lines of kind rope.
    pub rope: bool,
    /// Largest free fall, m.
    pub free_fall_m: Option<f64>,
    /// Largest fall factor.
    pub fall_factor: Option<f64>,
    /// Largest mass, kg.
    pub mass_kg: Option<f64>,
}

impl WrittenFor {
    pub(super) const ANY: Self =
        Self { absorber: false, rope: false, free_fall_m: None, fall_factor: None, mass_kg: None };
}

/// A set of limits that belong together.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LimitSet {
    /// Name used in files: `eu-363`.
    pub name: &'static str,
    /// What it was written for.
    pub scope: &'static str,
    /// The same for checks.
    pub written_for: WrittenFor,
    /// The limits.
    pub limits: &'static [PublishedLimit],
}

impl LimitSet {
    /// Every limit of a kind, in the order of the set.
    pub fn of_kind(&self, kind: LimitKind) -> impl Iterator<Item = &'static PublishedLimit> + use<> {
        self.limits.iter().filter(move |l| l.kind == kind)
    }
}

/// All built-in sets.
#[must_use]
pub fn limit_sets() -> &'static [LimitSet] {
    SETS
}

/// A set by its name.
#[must_use]
pub fn limit_set(name: &str) -> Option<&'static LimitSet> {
    SETS.iter().find(|s| s.name == name)
}
