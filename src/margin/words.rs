//! The words of a check: id, label, where its limit comes from, and what must be read beside it.
use super::check::{Basis, Margin};
use super::judge::{Cause, Check, CheckKind};
use super::limit::{LimitKind, Mark, PublishedLimit};
use super::name::missing_key;
use super::numeric::edge_factor;
use super::rules::{Rules, Ruling};
use super::sideways::swings;
use crate::estimate::Validity;
use crate::quantity::{Unit, UnitSystem, format_unit};
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
        basis: words.basis(check),
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
        let not_applied = rules.span.is_some() && rules.anchor_strength.as_ref().is_some_and(|r| r.own.is_none());
        if not_applied {
            let name = set.name;
            list.push(format!(
                "the anchor strength of `{name}` is not applied to a horizontal lifeline: its supports are judged by \
                 their load"
            ));
        }
    } else if scenario.limits.own.is_empty() {
        list.push(
            "no limits are stated: forces and distances are not judged, only clearance, stroke, ratings and capacity"
                .to_owned(),
        );
    }
    list
}

pub(super) struct Words<'a> {
    pub(super) rules: &'a Rules,
    pub(super) scenario: &'a Scenario,
    pub(super) validity: &'a [Validity],
    pub(super) system: UnitSystem,
}

impl Words<'_> {
    fn basis(&self, check: &Check) -> Basis {
        match check.kind {
            CheckKind::Clearance(i) => self.reserve_basis(i),
            CheckKind::LevelStrike(_) => must_not_meet(""),
            CheckKind::FaceStrike(_) => must_not_meet(" at the height of the attachment"),
            CheckKind::Stroke => from_file("absorber.stroke"),
            CheckKind::SpanStroke => from_file("anchor.span.absorber.stroke"),
            CheckKind::RatedMass => from_file("absorber.rated_mass"),
            CheckKind::RatedFreeFall => from_file("absorber.rated_free_fall"),
            CheckKind::AnchorLoad | CheckKind::SpanEndLoad => {
                self.factor_basis(self.ruling(check), "`anchor.capacity`")
            }
            CheckKind::SpanTension => self.factor_basis(self.ruling(check), "`anchor.span.strength`"),
            CheckKind::LineLoad => self.factor_basis(self.ruling(check), &self.line_strength_key()),
            _ => self.ruling_basis(self.ruling(check)),
        }
    }

    /// The strength of the line as it is judged, with the file's own number for an edge.
    fn line_strength_key(&self) -> String {
        match edge_factor(self.scenario) {
            1.0 => "`line.strength`".to_owned(),
            factor => format!("`line.strength` divided by {factor}, its `place.edge.strength_factor`"),
        }
    }

    /// The limit or factor that a check is judged by.
    pub(super) fn ruling(&self, check: &Check) -> Option<&Ruling> {
        let rules = self.rules;
        let span = rules.span.as_ref();
        match check.kind {
            CheckKind::ArrestForce => rules.arrest_force.as_ref(),
            CheckKind::FreeFall => rules.free_fall.as_ref(),
            CheckKind::DecelerationDistance => rules.deceleration.as_ref(),
            CheckKind::TotalFall => rules.total_fall.as_ref(),
            CheckKind::SwingDistance => rules.swing_distance.as_ref(),
            CheckKind::SwingAngle => rules.swing_angle.as_ref(),
            CheckKind::AnchorLoad => rules.anchor_factor.as_ref(),
            CheckKind::AnchorStrength => span.map_or(rules.anchor_strength.as_ref(), |s| s.own_strength.as_ref()),
            CheckKind::SpanEndLoad => span?.end_factor.as_ref(),
            CheckKind::SpanTension => span?.cable_factor.as_ref(),
            CheckKind::SpanLength => span?.length.as_ref(),
            CheckKind::SpanSlack => span?.slack.as_ref(),
            CheckKind::SpanWorkers => span?.workers.as_ref(),
            CheckKind::SpanAnchorStrength => span?.anchor.as_ref(),
            CheckKind::SpanCableDiameter => span?.diameter.as_ref(),
            CheckKind::LineLoad => rules.line_factor.as_ref(),
            CheckKind::LineStrength => {
                let short_fall = rules.short_fall_line_strength.as_ref();
                short_fall.filter(|r| check.limit == Some(r.si())).or(rules.line_strength.as_ref())
            }
            CheckKind::SubjectMass => rules.subject_mass.as_ref(),
            CheckKind::LanyardLength => rules.lanyard_length.as_ref(),
            CheckKind::StaticElongation => rules.static_elongation.as_ref(),
            CheckKind::DynamicElongation => rules.dynamic_elongation.as_ref(),
            CheckKind::Clearance(_)
            | CheckKind::LevelStrike(_)
            | CheckKind::FaceStrike(_)
            | CheckKind::Stroke
            | CheckKind::SpanStroke
            | CheckKind::RatedMass
            | CheckKind::RatedFreeFall => None,
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
            return Basis { words: format!("the file ({key}); factor 1: {states_none}"), from_memory: false };
        };
        let basis = self.ruling_basis(Some(ruling));
        Basis { words: format!("the file ({key}); factor {}: {}", ruling.si(), basis.words), ..basis }
    }

    pub(super) fn ruling_basis(&self, ruling: Option<&Ruling>) -> Basis {
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

    pub(super) fn set_name(&self) -> &'static str {
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
            Cause::OtherRule => self.other_rule(check),
            Cause::StrokeUsedUp => {
                "the stroke is used up: the absorber is locked and the force rises beyond it".to_owned()
            }
            Cause::OutOfReach => "the body is never above or beside it, up to the first turn of the swing".to_owned(),
            Cause::BelowAttachment => {
                "a strike is judged at the height of the attachment, which never comes past it: what hangs below may \
                 meet it"
                    .to_owned()
            }
            Cause::Beside => "beside the fall line: a straight fall does not meet it".to_owned(),
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
                "cannot be worked out from this law: state `line.static_elongation`, `line.modulus`, or a table up to \
                 150 kg with `line.length`"
                    .to_owned()
            }
            CheckKind::LanyardLength | CheckKind::DynamicElongation => "state `line.length`".to_owned(),
            CheckKind::ArrestForce | CheckKind::LineLoad | CheckKind::AnchorLoad if swings(self.scenario) => {
                "the line carries no force up to the first turn of the swing".to_owned()
            }
            _ => "the run does not give this number".to_owned(),
        }
    }

    fn outside(&self) -> String {
        let scope = self.rules.set.map_or("", |s| s.scope);
        format!("outside of what `{}` was written for ({scope})", self.set_name())
    }

    fn other_rule(&self, check: &Check) -> String {
        let remark = self.published(check).and_then(|p| p.remark).unwrap_or("the set accepts another rule instead");
        format!(
            "not within the published value, but the set accepts another rule ({remark}): a competent person decides"
        )
    }

    pub(super) fn published(&self, check: &Check) -> Option<&'static PublishedLimit> {
        self.ruling(check).and_then(Ruling::judged_by_set)
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

fn must_not_meet(where_judged: &str) -> Basis {
    Basis { words: format!("a swing must not meet it: any space left{where_judged} counts"), from_memory: false }
}

fn from_file(key: &str) -> Basis {
    Basis { words: format!("the file (`{key}`)"), from_memory: false }
}
