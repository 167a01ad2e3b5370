//! The words of a check: id, label, where its limit comes from, and what must be read beside it.
use super::check::{Basis, Margin};
use super::judge::{Cause, Check, CheckKind};
use super::limit::{Applies, LimitKind, Mark, PublishedLimit};
use super::rules::{Rules, Ruling};
use super::verdict::Verdict;
use crate::estimate::Validity;
use crate::quantity::{Unit, UnitSystem, format_si, format_unit};
use crate::scenario::Scenario;

/// A check with its words; notes in the given units.
#[must_use]
pub fn margin_of(
    rules: &Rules,
    scenario: &Scenario,
    validity: &[Validity],
    check: &Check,
    system: UnitSystem,
) -> Margin {
    let words = Words { rules, scenario, validity, system };
    Margin {
        id: words.id(check.kind),
        label: words.label(check.kind),
        demand: check.demand,
        limit: check.limit,
        dimension: check.kind.dimension(),
        sense: check.kind.sense(),
        margin: check.margin,
        verdict: check.verdict,
        basis: words.basis(check.kind),
        note: words.note(check),
    }
}

/// Sentences about the limits of a scenario as a whole: what the set was written for, what is not judged.
#[must_use]
pub fn remarks(rules: &Rules, scenario: &Scenario) -> Vec<String> {
    let mut list = Vec::new();
    if let Some(set) = rules.set {
        list.push(format!("`{}` was written for: {}", set.name, set.scope));
        if !rules.set_judges {
            let name = set.name;
            list.push(format!("`{name}` was written for persons: its limits are not applied to a load"));
        }
    } else if scenario.limits.own.is_empty() {
        list.push(
            "no limits are stated: forces and distances are not judged, only clearance, stroke, ratings and capacity"
                .to_owned(),
        );
    }
    list
}

/// The lower of the two arrest forces on which the sources disagree, N.
const LOWER_FORCE_N: f64 = 6000.0;

struct Words<'a> {
    rules: &'a Rules,
    scenario: &'a Scenario,
    validity: &'a [Validity],
    system: UnitSystem,
}

impl Words<'_> {
    fn id(&self, kind: CheckKind) -> String {
        match kind {
            CheckKind::Clearance(i) => self.rules.clearance_ids.get(i).cloned().unwrap_or_default(),
            other => plain_id(other).to_owned(),
        }
    }

    fn label(&self, kind: CheckKind) -> String {
        match kind {
            CheckKind::Clearance(i) => {
                let name = self.scenario.obstacles.get(i).map_or("", |o| o.name.as_str());
                format!("clearance {name}")
            }
            CheckKind::AnchorLoad => with_factor("anchor load", self.rules.anchor_factor.as_ref()),
            CheckKind::LineLoad => with_factor("line force", self.rules.line_factor.as_ref()),
            other => plain_label(other).to_owned(),
        }
    }

    fn basis(&self, kind: CheckKind) -> Basis {
        let rules = self.rules;
        match kind {
            CheckKind::Clearance(i) => self.reserve_basis(i),
            CheckKind::Stroke => from_file("absorber.stroke"),
            CheckKind::RatedMass => from_file("absorber.rated_mass"),
            CheckKind::RatedFreeFall => from_file("absorber.rated_free_fall"),
            CheckKind::AnchorLoad => self.factor_basis(rules.anchor_factor.as_ref(), "anchor.capacity"),
            CheckKind::LineLoad => self.factor_basis(rules.line_factor.as_ref(), "line.strength"),
            CheckKind::ArrestForce => self.ruling_basis(rules.arrest_force.as_ref()),
            CheckKind::FreeFall => self.ruling_basis(rules.free_fall.as_ref()),
            CheckKind::DecelerationDistance => self.ruling_basis(rules.deceleration.as_ref()),
            CheckKind::TotalFall => self.ruling_basis(rules.total_fall.as_ref()),
            CheckKind::AnchorStrength => self.ruling_basis(rules.anchor_strength.as_ref()),
            CheckKind::LineStrength => self.ruling_basis(rules.line_strength.as_ref()),
            CheckKind::SubjectMass => self.ruling_basis(rules.subject_mass.as_ref()),
            CheckKind::LanyardLength => self.ruling_basis(rules.lanyard_length.as_ref()),
            CheckKind::StaticElongation => self.ruling_basis(rules.static_elongation.as_ref()),
            CheckKind::DynamicElongation => self.ruling_basis(rules.dynamic_elongation.as_ref()),
        }
    }

    fn reserve_basis(&self, obstacle: usize) -> Basis {
        let stated = self.scenario.obstacles.get(obstacle).and_then(|o| o.reserve);
        let words = match stated {
            Some(_) => format!("the file (reserve wanted, `obstacle.{}.reserve`)", obstacle + 1),
            None => "the file states no reserve: any space above the obstacle counts".to_owned(),
        };
        Basis { words, from_memory: false }
    }

    fn factor_basis(&self, factor: Option<&Ruling>, key: &str) -> Basis {
        let Some(ruling) = factor else {
            let states_none = match self.rules.set {
                Some(set) if self.rules.set_judges => format!("`{}` states none", set.name),
                Some(set) => format!("`{}` is not applied to a load", set.name),
                None => "no set of limits names one".to_owned(),
            };
            return Basis { words: format!("the file (`{key}`); factor 1: {states_none}"), from_memory: false };
        };
        let basis = self.ruling_basis(Some(ruling));
        Basis { words: format!("the file (`{key}`); factor {}: {}", ruling.si(), basis.words), ..basis }
    }

    fn ruling_basis(&self, ruling: Option<&Ruling>) -> Basis {
        let Some(Ruling { own, published }) = ruling else {
            return Basis { words: "no limit".to_owned(), from_memory: false };
        };
        let from_memory = published.is_some_and(|p| p.mark == Mark::Memory);
        let words = match (own, published) {
            (None, Some(p)) => format!("{}: {}{}", self.set_name(), customary(p), source(p)),
            (Some(own), published) => {
                let value = format_unit(own.value.si(), own.value.unit);
                let instead = self.replaced(*published);
                let why = own.why.as_ref().map(|w| format!("; why: {w}")).unwrap_or_default();
                format!("the file: {value}{instead}{why}")
            }
            (None, None) => "no limit".to_owned(),
        };
        Basis { words, from_memory }
    }

    fn replaced(&self, published: Option<&'static PublishedLimit>) -> String {
        match (published, self.rules.set) {
            (Some(p), _) => format!(" instead of {} of {} ({})", value_words(p), self.set_name(), source(p)),
            (None, Some(set)) if self.rules.set_judges => format!("; `{}` states none", set.name),
            _ => " (own limit)".to_owned(),
        }
    }

    fn set_name(&self) -> &'static str {
        self.rules.set.map_or("", |s| s.name)
    }

    fn note(&self, check: &Check) -> Option<String> {
        let notes: Vec<String> = self.cause(check).into_iter().chain(self.beside(check)).collect();
        (!notes.is_empty()).then(|| notes.join("; "))
    }

    fn cause(&self, check: &Check) -> Option<String> {
        Some(match check.cause? {
            Cause::NoNumber => self.missing_number(check.kind),
            Cause::NotStated => missing_key(check.kind).to_owned(),
            Cause::NotANumber => "the numbers of this run are out of range".to_owned(),
            Cause::NotValid => self.validity.iter().map(|v| v.words(self.system)).collect::<Vec<_>>().join("; "),
            Cause::OutsideSet => self.outside(),
            Cause::OtherRule => self.other_rule(check.kind),
            Cause::StrokeUsedUp => {
                "the stroke is used up: the absorber is locked and the force rises beyond it".to_owned()
            }
            Cause::OnTheLimit => "the value must stay below the limit; it is on it".to_owned(),
        })
    }

    fn missing_number(&self, kind: CheckKind) -> String {
        match kind {
            CheckKind::Clearance(_) if self.scenario.place.standing.is_none() => {
                "no elevations: state `place.standing` (and `subject.attachment_above_feet` or \
                 `subject.underside_below_attachment`)"
                    .to_owned()
            }
            CheckKind::Clearance(_) => "the run gives no elevation of the lowest point".to_owned(),
            CheckKind::StaticElongation => {
                "cannot be worked out from this law: state `line.static_elongation`, `line.modulus` or `line.length`"
                    .to_owned()
            }
            CheckKind::LanyardLength | CheckKind::DynamicElongation => "state `line.length`".to_owned(),
            _ => "the run does not give this number".to_owned(),
        }
    }

    fn outside(&self) -> String {
        let scope = self.rules.set.map_or("", |s| s.scope);
        format!("outside of what `{}` was written for ({scope})", self.set_name())
    }

    fn other_rule(&self, kind: CheckKind) -> String {
        let remark = self.published(kind).and_then(|p| p.remark).unwrap_or("the set accepts another rule instead");
        format!(
            "less than the published value, but the set accepts another rule ({remark}): a competent person decides"
        )
    }

    fn published(&self, kind: CheckKind) -> Option<&'static PublishedLimit> {
        let rules = self.rules;
        let ruling = match kind {
            CheckKind::ArrestForce => rules.arrest_force.as_ref(),
            CheckKind::FreeFall => rules.free_fall.as_ref(),
            CheckKind::DecelerationDistance => rules.deceleration.as_ref(),
            CheckKind::AnchorStrength => rules.anchor_strength.as_ref(),
            CheckKind::LineStrength => rules.line_strength.as_ref(),
            _ => None,
        };
        ruling.and_then(Ruling::judged_by_set)
    }

    /// What must be read beside a check whatever its verdict.
    fn beside(&self, check: &Check) -> Option<String> {
        match check.kind {
            CheckKind::Clearance(i) => self.reserve_note(i),
            CheckKind::ArrestForce => self.force_note(),
            CheckKind::DecelerationDistance => self.travel_note(),
            CheckKind::AnchorStrength | CheckKind::LineStrength => self.strength_note(check),
            CheckKind::AnchorLoad if check.limit.is_none() => self.anchor_note(),
            _ => None,
        }
    }

    fn reserve_note(&self, obstacle: usize) -> Option<String> {
        let wanted = self.rules.reserve.as_ref().and_then(Ruling::judged_by_set)?;
        let stated = self.scenario.obstacles.get(obstacle)?.reserve.map_or(0.0, |r| r.si());
        (stated < wanted.si()).then(|| {
            let reserve = format_unit(wanted.si(), wanted.unit);
            format!("`{}` asks for a reserve of {reserve} ({}); the file asks for less", self.set_name(), wanted.clause)
        })
    }

    fn force_note(&self) -> Option<String> {
        let factor = self.scenario.subject.body_factor.map(|f| f.si()).filter(|f| *f != 1.0);
        let body = factor.map(|f| format!("largest line force divided by the file's body factor of {f}"));
        let published = self.published(CheckKind::ArrestForce);
        let rope = |p: &&PublishedLimit| p.applies == Applies::SingleRope;
        let single_rope = published.filter(rope).and_then(|p| p.remark).map(str::to_owned);
        let higher = published.filter(|p| !rope(p) && p.si() > LOWER_FORCE_N);
        let other = higher.map(|_| "other sets allow 6 kN only: see `underfoot limits`".to_owned());
        let notes: Vec<String> = body.into_iter().chain(single_rope).chain(other).collect();
        (!notes.is_empty()).then(|| notes.join("; "))
    }

    fn travel_note(&self) -> Option<String> {
        match &self.scenario.absorber {
            None => Some("no absorber: the arrest distance is judged, elongation of the line included".to_owned()),
            Some(_) => self.published(CheckKind::DecelerationDistance).and_then(|p| p.remark).map(str::to_owned),
        }
    }

    /// The other rule of a set is told where it matters; a condition that the file cannot state always is.
    fn strength_note(&self, check: &Check) -> Option<String> {
        let published = self.published(check.kind)?;
        let untold = published.or.is_none() || check.verdict == Verdict::Short;
        published.remark.filter(|_| untold).map(str::to_owned)
    }

    fn anchor_note(&self) -> Option<String> {
        let ruling = self.rules.anchor_strength.as_ref()?;
        let value = format_si(ruling.si(), CheckKind::AnchorStrength.dimension(), self.system);
        Some(format!("at least {value} is asked for by {}", self.ruling_basis(Some(ruling)).words))
    }
}

/// `EN 363 as applied in DGUV Regel 112-198 s.5.1 (published)`.
fn source(limit: &PublishedLimit) -> String {
    format!("{} ({})", limit.clause, limit.mark.words())
}

/// `6 ft, `: the source's own number where screens may show another; nothing for metric sources.
fn customary(limit: &PublishedLimit) -> String {
    match limit.unit {
        Unit::Foot | Unit::Inch | Unit::Pound | Unit::PoundForce => format!("{}, ", value_words(limit)),
        _ => String::new(),
    }
}

fn value_words(limit: &PublishedLimit) -> String {
    let value = format_unit(limit.si(), limit.unit);
    match limit.kind {
        LimitKind::TotalFallPastTwiceLength => format!("twice the length plus {value}"),
        _ => value,
    }
}

fn from_file(key: &str) -> Basis {
    Basis { words: format!("the file (`{key}`)"), from_memory: false }
}

fn with_factor(label: &str, factor: Option<&Ruling>) -> String {
    match factor.map(Ruling::si) {
        Some(factor) if factor != 1.0 => format!("{label} x {factor}"),
        _ => label.to_owned(),
    }
}

const fn missing_key(kind: CheckKind) -> &'static str {
    match kind {
        CheckKind::AnchorLoad | CheckKind::AnchorStrength => "not stated: state `anchor.capacity`",
        CheckKind::LineLoad | CheckKind::LineStrength => "not stated: state `line.strength`",
        CheckKind::TotalFall => "the limit needs the length of the line: state `line.length`",
        _ => "the limit is missing",
    }
}

const fn plain_id(kind: CheckKind) -> &'static str {
    match kind {
        CheckKind::Clearance(_) => "clearance",
        CheckKind::ArrestForce => "arrest_force",
        CheckKind::Stroke => "stroke",
        CheckKind::FreeFall => "free_fall",
        CheckKind::DecelerationDistance => "deceleration_distance",
        CheckKind::TotalFall => "total_fall_distance",
        CheckKind::AnchorLoad => "anchor_load",
        CheckKind::AnchorStrength => "anchor_strength",
        CheckKind::LineLoad => "line_load",
        CheckKind::LineStrength => "line_strength",
        CheckKind::RatedMass => "rated_mass",
        CheckKind::RatedFreeFall => "rated_free_fall",
        CheckKind::SubjectMass => "subject_mass",
        CheckKind::LanyardLength => "lanyard_length",
        CheckKind::StaticElongation => "static_elongation",
        CheckKind::DynamicElongation => "dynamic_elongation",
    }
}

const fn plain_label(kind: CheckKind) -> &'static str {
    match kind {
        CheckKind::Clearance(_) => "clearance",
        CheckKind::ArrestForce => "arrest force",
        CheckKind::Stroke => "absorber stroke",
        CheckKind::FreeFall => "free fall",
        CheckKind::DecelerationDistance => "deceleration distance",
        CheckKind::TotalFall => "total fall distance",
        CheckKind::AnchorLoad => "anchor load",
        CheckKind::AnchorStrength => "anchor strength",
        CheckKind::LineLoad => "line force",
        CheckKind::LineStrength => "line strength",
        CheckKind::RatedMass => "mass, absorber rating",
        CheckKind::RatedFreeFall => "free fall, absorber rating",
        CheckKind::SubjectMass => "subject mass",
        CheckKind::LanyardLength => "lanyard length",
        CheckKind::StaticElongation => "rope elongation, static",
        CheckKind::DynamicElongation => "rope elongation, dynamic",
    }
}
