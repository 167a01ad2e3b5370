//! One check in numbers: what is checked, and the verdict of a demand against a limit.
use super::check::Sense;
use super::verdict::Verdict;
use crate::quantity::Dimension;

/// What is checked. The order is that of equal checks in a list.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum CheckKind {
    /// Clearance to an obstacle, by its place in the file from 0.
    Clearance(usize),
    /// A swing that meets a level, by the obstacle's place in the file from 0.
    LevelStrike(usize),
    /// A swing that meets a face, by its place in the file from 0.
    FaceStrike(usize),
    /// Distance swung to the side.
    SwingDistance,
    /// Angle swung to the side.
    SwingAngle,
    /// Force on the body or lifting eye.
    ArrestForce,
    /// Stroke of the absorber.
    Stroke,
    /// Free fall.
    FreeFall,
    /// Absorber travel, elongation of the line excluded.
    DecelerationDistance,
    /// Free fall plus arrest distance.
    TotalFall,
    /// Factor times the largest anchor force against the capacity stated.
    AnchorLoad,
    /// The capacity stated against the strength the set asks for.
    AnchorStrength,
    /// Factor times the largest load of an end support of a horizontal lifeline against its capacity.
    SpanEndLoad,
    /// Factor times the largest tension of a horizontal lifeline against its strength.
    SpanTension,
    /// Stroke of the absorber in line with a horizontal lifeline.
    SpanStroke,
    /// Span of a prescribed horizontal lifeline.
    SpanLength,
    /// Slack of a prescribed horizontal lifeline, as a share of its span.
    SpanSlack,
    /// Workers on a prescribed horizontal lifeline.
    SpanWorkers,
    /// Strength of the end anchors of a prescribed horizontal lifeline.
    SpanAnchorStrength,
    /// Diameter of the cable of a prescribed horizontal lifeline.
    SpanCableDiameter,
    /// Factor times the largest line force against the strength stated.
    LineLoad,
    /// The strength stated against the strength the set asks for.
    LineStrength,
    /// The subject's mass against the absorber's rating.
    RatedMass,
    /// The free fall against the absorber's rating.
    RatedFreeFall,
    /// The subject's mass against the set.
    SubjectMass,
    /// Length of a lanyard with absorber.
    LanyardLength,
    /// Elongation of a rope from 50 kg to 150 kg.
    StaticElongation,
    /// Largest elongation of a rope in this run, as a share of its length.
    DynamicElongation,
}

impl CheckKind {
    /// What demand and limit measure.
    #[must_use]
    pub const fn dimension(self) -> Dimension {
        match self {
            Self::Clearance(_)
            | Self::LevelStrike(_)
            | Self::FaceStrike(_)
            | Self::SwingDistance
            | Self::SpanLength
            | Self::SpanCableDiameter
            | Self::Stroke
            | Self::SpanStroke
            | Self::FreeFall
            | Self::DecelerationDistance
            | Self::TotalFall
            | Self::RatedFreeFall
            | Self::LanyardLength => Dimension::Length,
            Self::ArrestForce
            | Self::AnchorLoad
            | Self::AnchorStrength
            | Self::SpanEndLoad
            | Self::SpanTension
            | Self::SpanAnchorStrength
            | Self::LineLoad
            | Self::LineStrength => Dimension::Force,
            Self::SwingAngle => Dimension::Angle,
            Self::RatedMass | Self::SubjectMass => Dimension::Mass,
            Self::StaticElongation | Self::DynamicElongation | Self::SpanSlack | Self::SpanWorkers => Dimension::Ratio,
        }
    }
    /// Which side is good.
    #[must_use]
    pub const fn sense(self) -> Sense {
        match self {
            Self::Clearance(_)
            | Self::LevelStrike(_)
            | Self::FaceStrike(_)
            | Self::AnchorStrength
            | Self::SpanSlack
            | Self::SpanAnchorStrength
            | Self::SpanCableDiameter
            | Self::LineStrength => Sense::AtLeast,
            _ => Sense::AtMost,
        }
    }
    /// True when the demand comes from the motion that the model solves, not from the inputs alone.
    #[must_use]
    pub const fn needs_model(self) -> bool {
        matches!(
            self,
            Self::Clearance(_)
                | Self::LevelStrike(_)
                | Self::FaceStrike(_)
                | Self::SwingDistance
                | Self::SwingAngle
                | Self::SpanEndLoad
                | Self::SpanTension
                | Self::ArrestForce
                | Self::Stroke
                | Self::SpanStroke
                | Self::DecelerationDistance
                | Self::TotalFall
                | Self::AnchorLoad
                | Self::LineLoad
                | Self::DynamicElongation
        )
    }
}

/// Why a check is open, or not as its numbers alone would say.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Cause {
    /// The run does not give the number.
    NoNumber,
    /// The file does not state the capacity or strength.
    NotStated,
    /// A number is not a number.
    NotANumber,
    /// The model is not valid for this run.
    NotValid,
    /// The run is outside of what the set was written for.
    OutsideSet,
    /// The set accepts something else instead, and that may be met.
    OtherRule,
    /// The stroke is used up.
    StrokeUsedUp,
    /// The limit itself is not allowed, and the demand is on it.
    OnTheLimit,
    /// The swing is never where it could meet it: it holds without a number.
    OutOfReach,
    /// The attachment never comes past the face, what hangs below it may.
    BelowAttachment,
    /// A straight fall does not meet what lies beside it.
    Beside,
}

/// How hard the first strike of a swing is.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Impact {
    /// Speed, m/s.
    pub speed_m_per_s: f64,
    /// Height of a straight fall with that speed, m.
    pub drop_equivalent_m: f64,
}

/// One check in numbers, SI.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Check {
    /// What is checked.
    pub kind: CheckKind,
    /// What the run asks for.
    pub demand: Option<f64>,
    /// What is allowed.
    pub limit: Option<f64>,
    /// Room left.
    pub margin: Option<f64>,
    /// The word.
    pub verdict: Verdict,
    /// Why, where the numbers alone do not tell.
    pub cause: Option<Cause>,
    /// The first strike of the run, beside a check of a strike that is short.
    pub impact: Option<Impact>,
}

impl Check {
    /// Room left as a share of the limit (of one SI unit where the limit is zero); the measure by which checks
    /// of one verdict are ordered. A check without a margin counts as the smallest, out of reach as the largest.
    #[must_use]
    pub fn relative(&self) -> f64 {
        if matches!(self.cause, Some(Cause::OutOfReach | Cause::Beside)) {
            return f64::INFINITY;
        }
        let scale = self.limit.map(f64::abs).filter(|l| *l > 0.0).unwrap_or(1.0);
        self.margin.map(|m| m / scale).filter(|r| !r.is_nan()).unwrap_or(f64::NEG_INFINITY)
    }
    pub(super) fn open(mut self, cause: Cause) -> Self {
        self.verdict = Verdict::Open;
        self.cause = Some(cause);
        self
    }
    /// Holds without a number, since the body never comes there.
    pub(super) fn not_met(mut self, cause: Cause) -> Self {
        self.verdict = Verdict::Holds;
        self.cause = Some(cause);
        self
    }
    pub(super) fn short(mut self, cause: Cause) -> Self {
        self.verdict = Verdict::Short;
        self.cause = Some(cause);
        self
    }
}

/// Differences below this share of demand or limit are rounding of decimal inputs: the demand is on the limit.
pub(super) const ROUNDING_SHARE: f64 = 1e-9;
/// The same where both are near zero, SI.
const ROUNDING: f64 = 1e-12;

/// Judges one pair of numbers. A margin of exactly zero holds; what is not a number never does.
#[must_use]
pub fn judge(kind: CheckKind, demand: Option<f64>, limit: Option<f64>) -> Check {
    let check = Check { kind, demand, limit, margin: None, verdict: Verdict::Open, cause: None, impact: None };
    match (demand, limit) {
        (None, _) => check.open(Cause::NoNumber),
        (_, None) => check.open(Cause::NotStated),
        (Some(demand), Some(limit)) => compare(check, demand, limit),
    }
}

fn compare(check: Check, demand: f64, limit: f64) -> Check {
    let room = match check.kind.sense() {
        Sense::AtMost => limit - demand,
        Sense::AtLeast => demand - limit,
    };
    let on_it = room.abs() <= (ROUNDING_SHARE * demand.abs().min(limit.abs())).max(ROUNDING);
    let room = if on_it { 0.0 } else { room };
    if room.is_nan() {
        return check.open(Cause::NotANumber);
    }
    let verdict = if room >= 0.0 { Verdict::Holds } else { Verdict::Short };
    Check { margin: Some(room), verdict, ..check }
}
