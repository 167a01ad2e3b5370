//! One study: what is asked, and its answer as a message.
use super::name::{Name, names};
use crate::scenario::{Input, Scenario};
use crate::study::{
    self, Axis, CheckRanking, Evaluator, Field, Held, Meter, Remedies, Sampling, Spread, Step, StudyError, Variation,
    Wanted, WorstFound, field, remedies_of, spread, usual_range, vary, worst_found,
};
use crate::tui::message::Message;
use std::ops::{ControlFlow, RangeInclusive};
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::sync::Arc;

/// Rows of Vary: as many as are searched for crossings, so that no run is made twice.
pub const VARY_ROWS: usize = 401;

/// One kind of study; the newest of each kind is the one that counts.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Lane {
    /// The worst found in the bands.
    Bands,
    /// One input across its range.
    Vary,
    /// Two inputs.
    Map,
    /// A sample of the bands.
    Spread,
    /// Which band matters.
    Ranking,
    /// Nearest values at which every check holds.
    Remedies,
}

impl Lane {
    /// All kinds.
    pub const ALL: [Self; 6] = [Self::Bands, Self::Vary, Self::Map, Self::Spread, Self::Ranking, Self::Remedies];

    /// In words, as the subject of a sentence.
    #[must_use]
    pub const fn title(self) -> &'static str {
        match self {
            Self::Bands => "search of the bands",
            Self::Vary => "curve",
            Self::Map => "map",
            Self::Spread => "sample",
            Self::Ranking => "ranking",
            Self::Remedies => "search for remedies",
        }
    }

    /// Whether it goes on while another view is shown: it lets others pass between its parts.
    #[must_use]
    pub const fn stays(self) -> bool {
        matches!(self, Self::Bands | Self::Map | Self::Spread)
    }

    /// Whether it gives a part when it is ended early.
    #[must_use]
    pub const fn gives_part(self) -> bool {
        matches!(self, Self::Map | Self::Spread)
    }
}

/// What is asked of one state of the inputs.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum What {
    /// The worst found in the bands.
    Bands,
    /// One input across its range.
    Vary {
        /// Its path.
        path: String,
    },
    /// Two inputs, each across its range.
    Map {
        /// Paths of the input to the right and upwards.
        paths: [String; 2],
        /// Values along each.
        steps: [usize; 2],
    },
    /// A sample of the bands.
    Spread {
        /// How many, and which.
        sampling: Sampling,
    },
    /// Which band moves the margin of a check.
    Ranking {
        /// Id of the check.
        check: String,
    },
    /// Nearest values at which every check holds: with the others at their typical values, or at the worst found.
    Remedies {
        /// Which of the two.
        held: Held,
    },
}

impl What {
    /// Its kind.
    #[must_use]
    pub const fn lane(&self) -> Lane {
        match self {
            Self::Bands => Lane::Bands,
            Self::Vary { .. } => Lane::Vary,
            Self::Map { .. } => Lane::Map,
            Self::Spread { .. } => Lane::Spread,
            Self::Ranking { .. } => Lane::Ranking,
            Self::Remedies { .. } => Lane::Remedies,
        }
    }
}

/// One input across its range.
#[derive(Clone, Debug)]
pub struct Varied {
    /// The checks.
    pub names: Vec<Name>,
    /// The input.
    pub input: Input,
    /// Its range, SI.
    pub range: RangeInclusive<f64>,
    /// The rows.
    pub variation: Variation,
}

/// Two inputs.
#[derive(Clone, Debug)]
pub struct Mapped {
    /// To the right and upwards.
    pub inputs: [Input; 2],
    /// Runs any point.
    pub evaluator: Evaluator,
    /// The field.
    pub field: Field,
}

/// A sample.
#[derive(Clone, Debug)]
pub struct Spreading {
    /// The checks.
    pub names: Vec<Name>,
    /// The sample.
    pub spread: Spread,
}

/// A ranking by the margin of one check.
#[derive(Clone, Debug)]
pub struct Ranked {
    /// The check.
    pub name: Name,
    /// The inputs.
    pub inputs: Vec<Input>,
    /// One at a time, and shares of the variance.
    pub ranking: CheckRanking,
}

/// An answer.
#[derive(Clone, Debug)]
pub enum Findings {
    /// Of [`What::Bands`].
    Bands(Arc<WorstFound>),
    /// Of [`What::Vary`].
    Vary(Arc<Varied>),
    /// Of [`What::Map`].
    Map(Arc<Mapped>),
    /// Of [`What::Spread`].
    Spread(Arc<Spreading>),
    /// Of [`What::Ranking`].
    Ranking(Arc<Ranked>),
    /// Of [`What::Remedies`].
    Remedies(Arc<Remedies>),
}

/// A study to be made.
#[derive(Clone, Debug)]
pub struct Order {
    /// Its number; the answer bears it.
    pub ticket: u64,
    /// The state of the inputs.
    pub scenario: Scenario,
    /// What is asked.
    pub what: What,
}

impl Order {
    /// About how many runs it takes, where that can be told.
    #[must_use]
    pub fn expected(&self) -> Option<usize> {
        match &self.what {
            What::Bands | What::Ranking { .. } | What::Remedies { .. } => None,
            What::Vary { .. } => Some(VARY_ROWS),
            What::Map { steps, .. } => Some(steps[0] * steps[1]),
            What::Spread { sampling } => Some(sampling.samples),
        }
    }

    /// Works it out; a panic becomes a message. Also what tests call instead of a thread.
    #[must_use]
    pub fn answer(&self, meter: &Arc<Meter>) -> Message {
        let result = guarded(|| self.find(meter));
        Message::Studied { lane: self.what.lane(), ticket: self.ticket, result }
    }

    fn find(&self, meter: &Arc<Meter>) -> Result<Findings, StudyError> {
        let evaluator = Evaluator::new(&self.scenario)?.metered(Arc::clone(meter));
        if meter.is_ending() {
            return Err(StudyError::Stopped);
        }
        // Between two parts of a long study others may pass: they share its threads.
        let mut watch = |_| {
            rayon::yield_now();
            if meter.is_ending() { ControlFlow::Break(()) } else { ControlFlow::Continue(()) }
        };
        Ok(match &self.what {
            What::Bands => Findings::Bands(Arc::new(worst_found(&evaluator, &|at| goes_on(at, meter))?)),
            What::Vary { path } => Findings::Vary(Arc::new(varied(&evaluator, path)?)),
            What::Map { paths, steps } => {
                let [across, up] = [axis(&evaluator, &paths[0], steps[0])?, axis(&evaluator, &paths[1], steps[1])?];
                let inputs = [&across, &up].map(|axis| evaluator.inputs()[axis.input].clone());
                let field = field(&evaluator, across, up, &mut watch)?;
                Findings::Map(Arc::new(Mapped { inputs, evaluator: Evaluator::new(&self.scenario)?, field }))
            }
            What::Spread { sampling } => {
                let spread = spread(&evaluator, sampling.samples, sampling.seed, &mut watch)?;
                let kinds = spread.checks.iter().map(|check| check.kind);
                Findings::Spread(Arc::new(Spreading { names: names(&evaluator, kinds), spread }))
            }
            What::Ranking { check } => {
                Findings::Ranking(Arc::new(ranked(&evaluator, check, Sampling::of(&self.scenario), meter)?))
            }
            What::Remedies { held } => {
                let wanted = Wanted { held: *held, pairs: false };
                Findings::Remedies(Arc::new(remedies_of(&evaluator, wanted, &|at| goes_on(at, meter))?))
            }
        })
    }
}

/// The answer; none where it was stopped, a message where it failed or panicked.
fn guarded(find: impl FnOnce() -> Result<Findings, StudyError>) -> Result<Option<Findings>, String> {
    match catch_unwind(AssertUnwindSafe(find)) {
        Ok(Ok(found)) => Ok(Some(found)),
        Ok(Err(StudyError::Stopped)) => Ok(None),
        Ok(Err(error)) => Err(error.to_string()),
        Err(_) => Err("an inner fault; please report it with the file".to_owned()),
    }
}

/// Share of a search that its first runs are taken for.
const FIRST_SHARE: f32 = 0.3;

/// Tells how far a study is; it goes on until nobody wants it.
#[expect(clippy::cast_precision_loss, reason = "a share for the eye")]
fn goes_on(at: study::Progress, meter: &Meter) -> ControlFlow<()> {
    let share = at.done as f32 / at.of.max(1) as f32;
    match at.step {
        Step::Corners => meter.tell_share(FIRST_SHARE * share),
        Step::Refining => meter.tell_share(FIRST_SHARE + (1.0 - FIRST_SHARE) * share),
        Step::Ranking | Step::Remedies => meter.tell_share(share),
        _ => {}
    }
    if meter.is_dropped() { ControlFlow::Break(()) } else { ControlFlow::Continue(()) }
}

fn no_range(path: &str) -> StudyError {
    StudyError::NoRange { path: path.to_owned() }
}

fn axis(evaluator: &Evaluator, path: &str, steps: usize) -> Result<Axis, StudyError> {
    let input = evaluator.index_of(path)?;
    Ok(Axis { input, range: usual_range(evaluator, input).ok_or_else(|| no_range(path))?, steps })
}

fn varied(evaluator: &Evaluator, path: &str) -> Result<Varied, StudyError> {
    let input = evaluator.index_of(path)?;
    let range = usual_range(evaluator, input).ok_or_else(|| no_range(path))?;
    let variation = vary(evaluator, input, range.clone(), VARY_ROWS)?;
    Ok(Varied { names: names(evaluator, []), input: evaluator.inputs()[input].clone(), range, variation })
}

/// The ranking that the command line gives, for one check.
fn ranked(evaluator: &Evaluator, check: &str, sampling: Sampling, meter: &Meter) -> Result<Ranked, StudyError> {
    let names = names(evaluator, []);
    let found = names.iter().find(|name| name.margin.id == check).or_else(|| names.first()).cloned();
    let name = found.ok_or_else(|| StudyError::NoPath { path: check.to_owned() })?;
    let all = study::ranked(evaluator, sampling, &|at| goes_on(at, meter))?;
    let ranking = all.into_iter().find(|ranking| ranking.kind == name.kind && !meter.is_dropped());
    Ok(Ranked { ranking: ranking.ok_or(StudyError::Stopped)?, inputs: evaluator.inputs().to_vec(), name })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_panic_becomes_a_message_and_a_stop_becomes_none() {
        let told = guarded(|| panic!("a fault on purpose"));
        assert!(matches!(told, Err(words) if words.contains("inner fault")));
        assert!(matches!(guarded(|| Err(StudyError::Stopped)), Ok(None)));
    }
}
