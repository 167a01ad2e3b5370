//! What must be read beside a check whatever its verdict.
use super::judge::{Check, CheckKind};
use super::limit::{Applies, LimitKind, PublishedLimit};
use super::rules::Ruling;
use super::sideways::swings;
use super::verdict::Verdict;
use super::words::Words;
use crate::quantity::{Dimension, format_si, format_unit};
use crate::scenario::{AnchorKind, SpanTension};

/// The lower of the two arrest forces on which the sources disagree, N.
const LOWER_FORCE_N: f64 = 6000.0;

/// Beside every check of a prescribed lifeline.
const PRESCRIBED: &str =
    "one rule of a lifeline built as the set prescribes it; one of another design needs its own proof";

impl Words<'_> {
    /// What must be read beside a check whatever its verdict.
    pub(super) fn beside(&self, check: &Check) -> Option<String> {
        match check.kind {
            CheckKind::Clearance(i) => self.reserve_note(i),
            CheckKind::LevelStrike(_) | CheckKind::FaceStrike(_) => self.strike_note(check),
            CheckKind::ArrestForce => self.force_note(check),
            CheckKind::DecelerationDistance => self.travel_note(check),
            CheckKind::TotalFall if swings(self.scenario) => {
                Some("a swing: judged from the start down to the lowest point of the swing".to_owned())
            }
            CheckKind::AnchorStrength | CheckKind::LineStrength => self.strength_note(check),
            CheckKind::AnchorLoad if check.limit.is_none() => self.anchor_note(),
            CheckKind::LineLoad => self.edge_note(),
            CheckKind::SpanEndLoad => self.end_note(check),
            CheckKind::SpanSlack => self.slack_note(),
            CheckKind::SpanLength
            | CheckKind::SpanWorkers
            | CheckKind::SpanAnchorStrength
            | CheckKind::SpanCableDiameter => Some(PRESCRIBED.to_owned()),
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

    fn force_note(&self, check: &Check) -> Option<String> {
        let factor = self.scenario.subject.body_factor.map(|f| f.si()).filter(|f| *f != 1.0);
        let body = factor.map(|f| format!("largest line force divided by the file's body factor of {f}"));
        let published = self.published(check);
        let rope = |p: &&PublishedLimit| p.applies == Applies::SingleRope;
        let single_rope = published.filter(rope).and_then(|p| p.remark).map(str::to_owned);
        let higher = published.filter(|p| !rope(p) && p.si() > LOWER_FORCE_N);
        let other = higher.map(|_| "other sets allow 6 kN only: see `underfoot limits`".to_owned());
        let notes: Vec<String> = body.into_iter().chain(single_rope).chain(other).collect();
        (!notes.is_empty()).then(|| notes.join("; "))
    }

    fn travel_note(&self, check: &Check) -> Option<String> {
        match &self.scenario.absorber {
            None if swings(self.scenario) => Some(
                "no absorber and a swing: the drop from taut to the lowest point is judged, elongation of the line and \
                 the turn about the pivot included"
                    .to_owned(),
            ),
            None => Some("no absorber: the arrest distance is judged, elongation of the line included".to_owned()),
            Some(_) => self.published(check).and_then(|p| p.remark).map(str::to_owned),
        }
    }

    fn strike_note(&self, check: &Check) -> Option<String> {
        let struck = check.impact.map(|impact| {
            format!(
                "first strike of this run at {}, the speed of a straight fall of {}",
                format_si(impact.speed_m_per_s, Dimension::Speed, self.system),
                format_si(impact.drop_equivalent_m, Dimension::Length, self.system)
            )
        });
        let thin_body = self.scenario.subject.half_width.is_none();
        let width = thin_body.then(|| "`subject.half_width` is not stated: the body has no width here".to_owned());
        let notes: Vec<String> = struck.into_iter().chain(width).collect();
        (!notes.is_empty()).then(|| notes.join("; "))
    }

    fn edge_note(&self) -> Option<String> {
        let edge = self.scenario.place.edge.as_ref()?;
        edge.strength_factor.is_none().then(|| {
            "the line runs over an edge: what the edge takes of its strength is not counted; state \
             `place.edge.strength_factor`"
                .to_owned()
        })
    }

    fn end_note(&self, check: &Check) -> Option<String> {
        let published = self.published(check).filter(|p| p.kind == LimitKind::SpanFactor)?;
        let mut words = "the set's factor for the lifeline is applied to its supports as well".to_owned();
        if let Some(remark) = published.remark.filter(|_| check.cause.is_none()) {
            words = format!("{words}; {remark}");
        }
        Some(words)
    }

    fn slack_note(&self) -> Option<String> {
        let AnchorKind::Span(span) = &self.scenario.anchor.kind else { return None };
        let read = match span.tension {
            SpanTension::Sag(_) => "read as the sag in the middle of the unloaded cable over the span",
            SpanTension::Pretension(_) => "a cable with pretension is taken as straight: no slack",
        };
        Some(format!("{read}; {PRESCRIBED}"))
    }

    /// The other rule of a set is told where it matters; a condition that the file cannot state always is.
    fn strength_note(&self, check: &Check) -> Option<String> {
        let published = self.published(check)?;
        let untold = published.or.is_none() || check.verdict == Verdict::Short;
        published.remark.filter(|_| untold).map(str::to_owned)
    }

    fn anchor_note(&self) -> Option<String> {
        let ruling = self.rules.anchor_strength.as_ref()?;
        let value = format_si(ruling.si(), CheckKind::AnchorStrength.dimension(), self.system);
        Some(format!("at least {value} is asked for by {}", self.ruling_basis(Some(ruling)).words))
    }
}
