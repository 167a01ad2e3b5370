//! What the bands do to the checks of a report: worst found, share short, one verdict of both.
use super::Report;
use crate::margin::{Cause, Check, CheckKind, Margin, Verdict, governing_first, worst};
use crate::quantity::{Measure, UnitSystem};
use crate::study::{Bands, Evaluator, Place, Sampling, Share, StudyError, Watch, Worst, bands, worst_only};

/// A wide input at the worst found of a check.
#[derive(Clone, Debug, PartialEq)]
pub struct InputAt {
    /// Concrete path.
    pub path: String,
    /// Its label.
    pub label: &'static str,
    /// Its value, SI.
    pub value: f64,
    /// Its band and the unit of the file.
    pub measure: Measure,
    /// Where the value is in the band.
    pub place: Place,
}

/// What the bands do to one check.
#[derive(Clone, Debug, PartialEq)]
pub struct MarginBand {
    /// Which check.
    pub kind: CheckKind,
    /// Its verdict at the typical values; none where it does not apply there.
    pub typical: Option<Verdict>,
    /// The worst found; none where no run judged it.
    pub worst: Option<Margin>,
    /// The wide inputs there, in file order.
    pub inputs: Vec<InputAt>,
    /// True when every input that matters is at an end of its band.
    pub corner: bool,
    /// Runs of the search that left it open.
    pub open_runs: usize,
    /// Samples that fall short; none where there is no sample.
    pub short: Option<Share>,
    /// Samples that fall short or are open.
    pub not_held: Option<Share>,
}

/// The bands of a report: one entry for each of its margins, in their order, and the studies they come from.
#[derive(Clone, Debug, PartialEq)]
pub struct ReportBands {
    /// Beside each margin.
    pub margins: Vec<MarginBand>,
    /// The search and the sample.
    pub study: Bands,
}

/// Searches and samples the bands of a report's scenario, as its `[study]` says; none where no input is wide. It can
/// take seconds: `watch` is told how far it is and may break off. [`Report::add_bands`] puts the result in.
///
/// # Errors
/// See [`bands`].
pub fn report_bands(report: &Report, watch: &Watch<'_>) -> Result<Option<Bands>, StudyError> {
    bands(&Evaluator::new(&report.scenario)?, Sampling::of(&report.scenario), watch)
}

/// As [`report_bands`], without the sample: the joint verdict and nothing of how often.
///
/// # Errors
/// See [`worst_only`].
pub fn report_worst(report: &Report, watch: &Watch<'_>) -> Result<Option<Bands>, StudyError> {
    worst_only(&Evaluator::new(&report.scenario)?, watch)
}

/// A check with all that is said of it: by what it is ordered, its typical numbers with the joint verdict, its bands.
struct Joint {
    rank: Check,
    margin: Margin,
    band: MarginBand,
}

impl Report {
    /// Puts the bands in: every margin keeps its typical numbers and takes the joint verdict, checks that apply only
    /// within the bands are added, the order and the verdict of the report follow.
    ///
    /// # Errors
    /// When the scenario names an unknown set of limits, which no report does.
    pub fn add_bands(&mut self, study: Bands) -> Result<(), StudyError> {
        let evaluator = Evaluator::new(&self.scenario)?;
        let mut list: Vec<Joint> = study.found.checks.iter().map(|w| self.joint(&evaluator, &study, w)).collect();
        list.sort_by(|a, b| governing_first(&a.rank, &b.rank));
        self.verdict = worst(list.iter().map(|joint| joint.margin.verdict));
        let margins;
        (self.margins, margins) = list.into_iter().map(|joint| (joint.margin, joint.band)).unzip();
        self.bands = Some(ReportBands { margins, study });
        Ok(())
    }

    /// What the bands do to a margin of this report.
    #[must_use]
    pub fn band_of(&self, margin: &Margin) -> Option<&MarginBand> {
        let at = self.margins.iter().position(|own| own.id == margin.id)?;
        self.bands.as_ref()?.margins.get(at)
    }

    fn joint(&self, evaluator: &Evaluator, study: &Bands, found: &Worst) -> Joint {
        let words = |check: &Check| evaluator.margin_of(check, UnitSystem::Metric);
        let typical = found.typical.map(|check| words(&check));
        let worst = found.worst.map(|check| words(&check));
        let absent = Check { cause: None, ..crate::margin::judge(found.kind, None, None) };
        let known = typical.as_ref().and_then(|m| self.margins.iter().find(|own| own.id == m.id));
        let mut margin = known.cloned().or(typical).unwrap_or_else(|| Margin {
            limit: worst.as_ref().and_then(|m| m.limit),
            note: Some("does not apply at the typical values".to_owned()),
            ..words(&absent)
        });
        margin.verdict = found.verdict;
        let share = study.spread.checks.iter().find(|check| check.kind == found.kind);
        Joint {
            rank: rank(found),
            margin,
            band: MarginBand {
                kind: found.kind,
                typical: found.typical.map(|check| check.verdict),
                worst,
                inputs: inputs_at(evaluator, found),
                corner: found.is_corner(),
                open_runs: found.open_runs,
                short: share.map(|check| check.short),
                not_held: share.map(|check| check.not_held),
            },
        }
    }
}

/// By what a check is ordered: the worst found where that decides, else the typical numbers.
fn rank(found: &Worst) -> Check {
    let absent = Check { cause: Some(Cause::OutOfReach), ..crate::margin::judge(found.kind, None, None) };
    let decides = found.verdict == Verdict::Thin;
    let numbers = if decides { found.worst.or(found.typical) } else { found.typical.or(found.worst) };
    Check { verdict: found.verdict, ..numbers.unwrap_or(absent) }
}

fn inputs_at(evaluator: &Evaluator, found: &Worst) -> Vec<InputAt> {
    let one = |stand: &crate::study::Stand| {
        let input = evaluator.inputs().get(stand.input)?;
        let (path, label) = (input.path.clone(), input.field.label);
        Some(InputAt { path, label, value: stand.value, measure: input.measure, place: stand.place })
    };
    found.stands.iter().filter_map(one).collect()
}
