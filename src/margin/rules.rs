//! Which limits hold for a scenario: the set it names, what it states itself, and for what each was written.
use super::check::UnknownBasis;
use super::limit::{Applies, Bound, LimitKind, LimitSet, PublishedLimit, limit_set, limit_sets};
use super::span::SpanRules;
use crate::scenario::{AnchorKind, Face, LineKind, Obstacle, OwnLimit, Scenario, SubjectKind};

/// One limit as it is judged: the file's own value before the published one.
#[derive(Clone, Debug, PartialEq)]
pub struct Ruling {
    /// The file's own value.
    pub own: Option<OwnLimit>,
    /// The set's value.
    pub published: Option<&'static PublishedLimit>,
}

impl Ruling {
    /// The value that is judged, SI.
    #[must_use]
    pub fn si(&self) -> f64 {
        self.own.as_ref().map(|o| o.value.si()).or_else(|| self.published.map(PublishedLimit::si)).unwrap_or(f64::NAN)
    }
    /// True when the value itself is not allowed.
    #[must_use]
    pub fn is_strict(&self) -> bool {
        self.judged_by_set().is_some_and(|p| p.bound == Bound::Below)
    }
    /// The set's limit, where no value of the file replaces it.
    #[must_use]
    pub fn judged_by_set(&self) -> Option<&'static PublishedLimit> {
        if self.own.is_some() { None } else { self.published }
    }
    /// True when the limit is twice the length of the line plus the value.
    #[must_use]
    pub fn is_past_twice_length(&self) -> bool {
        self.judged_by_set().is_some_and(|p| p.kind == LimitKind::TotalFallPastTwiceLength)
    }
}

/// Every limit of one scenario, resolved once; checking an estimate against it is cheap.
#[derive(Clone, Debug, PartialEq)]
pub struct Rules {
    /// The set that the file names, if any; `own` is none.
    pub set: Option<&'static LimitSet>,
    /// False when the set was written for persons and the subject is a load.
    pub set_judges: bool,
    /// Ids of the clearance numbers, one per obstacle in file order.
    pub clearance_ids: Vec<String>,
    pub(super) arrest_force: Option<Ruling>,
    pub(super) free_fall: Option<Ruling>,
    pub(super) deceleration: Option<Ruling>,
    pub(super) total_fall: Option<Ruling>,
    pub(super) lanyard_length: Option<Ruling>,
    pub(super) anchor_strength: Option<Ruling>,
    pub(super) anchor_factor: Option<Ruling>,
    pub(super) line_strength: Option<Ruling>,
    pub(super) short_fall_line_strength: Option<Ruling>,
    pub(super) line_factor: Option<Ruling>,
    pub(super) subject_mass: Option<Ruling>,
    pub(super) static_elongation: Option<Ruling>,
    pub(super) dynamic_elongation: Option<Ruling>,
    pub(super) reserve: Option<Ruling>,
    pub(super) swing_distance: Option<Ruling>,
    pub(super) swing_angle: Option<Ruling>,
    pub(super) span: Option<SpanRules>,
    pub(super) approach_ids: Vec<String>,
}

impl Rules {
    /// Resolves the limits of a scenario.
    ///
    /// # Errors
    /// When `limits.basis` names no built-in set.
    pub fn of(scenario: &Scenario) -> Result<Self, UnknownBasis> {
        let set = named_set(scenario.limits.basis.as_deref())?;
        let find = |key: &str, kinds: &[LimitKind]| ruling(scenario, set, key, kinds);
        Ok(Self {
            set,
            set_judges: scenario.subject.kind == SubjectKind::Person,
            clearance_ids: scenario.obstacles.iter().map(|o| format!("clearance.{}", o.id())).collect(),
            arrest_force: find("arrest_force", &[LimitKind::ArrestForce]),
            free_fall: find("free_fall", &[LimitKind::FreeFall]),
            deceleration: find("deceleration_distance", &[LimitKind::DecelerationDistance]),
            total_fall: find("arrest_distance", &[LimitKind::TotalFall, LimitKind::TotalFallPastTwiceLength]),
            lanyard_length: find("", &[LimitKind::LanyardLength]),
            anchor_strength: find("anchor_strength", &[LimitKind::AnchorStrength]),
            anchor_factor: find("anchor_factor", &[LimitKind::AnchorFactor]),
            line_strength: find("line_strength", &[LimitKind::LineStrength]),
            short_fall_line_strength: find("line_strength", &[LimitKind::LineStrengthShortFall]),
            line_factor: find("line_factor", &[LimitKind::LineFactor]),
            subject_mass: find("subject_mass", &[LimitKind::SubjectMass]),
            static_elongation: find("", &[LimitKind::StaticElongation]),
            dynamic_elongation: find("", &[LimitKind::DynamicElongation]),
            reserve: find("", &[LimitKind::Reserve]),
            swing_distance: find("", &[LimitKind::SwingDistance]),
            swing_angle: find("", &[LimitKind::SwingAngle]),
            span: is_span(scenario).then(|| SpanRules::of(&find)),
            approach_ids: approach_ids(scenario),
        })
    }
    /// The smallest value of a kind in the set that is judged, SI, whatever it applies to.
    pub(super) fn least_conditional(&self, kind: LimitKind) -> Option<f64> {
        let set = self.set.filter(|_| self.set_judges)?;
        set.of_kind(kind).map(PublishedLimit::si).reduce(f64::min)
    }
}

/// Ids of the numbers of the closest approach: obstacles, then faces, in file order.
fn approach_ids(scenario: &Scenario) -> Vec<String> {
    let names = scenario.obstacles.iter().map(Obstacle::id).chain(scenario.faces.iter().map(Face::id));
    names.map(|name| format!("closest_approach.{name}")).collect()
}

const fn is_span(scenario: &Scenario) -> bool {
    matches!(scenario.anchor.kind, AnchorKind::Span(_))
}

fn named_set(basis: Option<&str>) -> Result<Option<&'static LimitSet>, UnknownBasis> {
    match basis {
        None | Some("own") => Ok(None),
        Some(name) => limit_set(name).map(Some).ok_or_else(|| unknown(name)),
    }
}

/// Names further away than this are no help (share of letters that agree).
const NEAR_ENOUGH: f64 = 0.5;

fn unknown(name: &str) -> UnknownBasis {
    let wanted = name.trim().to_lowercase();
    let nearest = limit_sets()
        .iter()
        .map(|s| (s.name, strsim::normalized_damerau_levenshtein(s.name, &wanted)))
        .filter(|(_, score)| *score >= NEAR_ENOUGH)
        .max_by(|a, b| a.1.total_cmp(&b.1))
        .map(|(name, _)| name);
    UnknownBasis { name: name.to_owned(), nearest }
}

fn ruling(scenario: &Scenario, set: Option<&'static LimitSet>, key: &str, kinds: &[LimitKind]) -> Option<Ruling> {
    let own = scenario.limits.own.iter().find(|o| o.key == key).cloned();
    let published = set.and_then(|s| strictest(scenario, s, kinds));
    (own.is_some() || published.is_some()).then_some(Ruling { own, published })
}

fn strictest(scenario: &Scenario, set: &'static LimitSet, kinds: &[LimitKind]) -> Option<&'static PublishedLimit> {
    let fits = |l: &&'static PublishedLimit| {
        kinds.contains(&l.kind) && is_for_subject(l.kind, scenario.subject.kind) && applies(l.applies, scenario)
    };
    set.limits.iter().filter(fits).reduce(|a, b| if is_stricter(b, a) { b } else { a })
}

fn is_stricter(new: &PublishedLimit, old: &PublishedLimit) -> bool {
    match new.bound {
        Bound::AtMost | Bound::Below => new.si() < old.si(),
        Bound::AtLeast | Bound::Factor => new.si() > old.si(),
    }
}

/// Every set was written for persons; only what a rope itself must be holds for a load as well.
const fn is_for_subject(kind: LimitKind, subject: SubjectKind) -> bool {
    match subject {
        SubjectKind::Person => true,
        SubjectKind::Load => matches!(kind, LimitKind::StaticElongation | LimitKind::DynamicElongation),
    }
}

fn applies(to: Applies, scenario: &Scenario) -> bool {
    let kind = scenario.line.kind;
    let absorber = scenario.absorber.is_some();
    match to {
        // The length of a swing is known after the run only: the check looks whether there is one.
        Applies::Every | Applies::Swing => true,
        Applies::Absorber => absorber,
        Applies::LanyardWithAbsorber => absorber && kind == LineKind::Lanyard,
        Applies::Textile => matches!(kind, LineKind::Lanyard | LineKind::Rope | LineKind::Webbing),
        Applies::Metal => kind == LineKind::Cable,
        Applies::SingleRope => kind == LineKind::Rope,
        Applies::Retractable => kind == LineKind::Retractable,
        Applies::Guided => kind == LineKind::Vertical,
        // The file does not tell the material of the cable: both are looked at.
        Applies::WireSpan | Applies::FibreSpan | Applies::Span => is_span(scenario),
        Applies::HalfOrTwinRope | Applies::Elsewhere => false,
    }
}
