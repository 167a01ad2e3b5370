//! One run of a study: some inputs replaced, every number and every check of it, no words.
use super::meter::Meter;
use crate::estimate::{EstimateError, Figures, Numbers, Validity, figures, peaks};
use crate::margin::{Check, CheckKind, Margin, Rules, UnknownBasis, checks, judge, margin_of};
use crate::quantity::UnitSystem;
use crate::scenario::{Input, Scenario, inputs, with_values};
use std::sync::Arc;

/// Why a study could not be made.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum StudyError {
    /// The scenario names an unknown set of limits.
    #[error(transparent)]
    Basis(#[from] UnknownBasis),
    /// No input has this number.
    #[error("there is no input number `{index}`; the scenario has `{count}`")]
    NoInput {
        /// The number asked for, from 0.
        index: usize,
        /// How many inputs there are.
        count: usize,
    },
    /// No input has this path.
    #[error("the scenario has no input `{path}`")]
    NoPath {
        /// The path asked for.
        path: String,
    },
    /// A value that is not a finite number.
    #[error("the value of `{path}` is not a finite number")]
    NotFinite {
        /// The path of the input.
        path: String,
    },
    /// A range or a number of steps that gives no field.
    #[error(
        "the field over `{path}` needs a range from low to high, 2 to `{most}` steps, and another input for the second"
    )]
    Axis {
        /// The path of the input.
        path: String,
        /// Most steps along one input.
        most: usize,
    },
    /// More wide bands than a sample has dimensions.
    #[error(
        "`{bands}` inputs are bands, `{most}` at most can be sampled together; make the least certain of them narrow"
    )]
    TooManyBands {
        /// How many inputs are wide.
        bands: usize,
        /// How many can be sampled.
        most: usize,
    },
    /// An input without a usual range: an exact zero has no half and no double.
    #[error("`{path}` is zero and has no range to move in; give it a value or a band")]
    NoRange {
        /// The path of the input.
        path: String,
    },
    /// Somebody broke it off, see [`Meter::drop_study`].
    #[error("stopped before it was done")]
    Stopped,
    /// A count that gives no answer.
    #[error("`{count}` samples are outside of `{least}` to `{most}`")]
    Samples {
        /// The count asked for.
        count: usize,
        /// Fewest.
        least: usize,
        /// Most.
        most: usize,
    },
}

/// Why one run has no numbers. Its checks are open; it is never left out of a statistic.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum Failure {
    /// The values are outside of what is physical, or cannot be together.
    #[error("these values cannot be together, or one is outside of its physical range")]
    Clash,
    /// The run was tried and gave no numbers.
    #[error(transparent)]
    Estimate(#[from] EstimateError),
}

/// One run.
#[derive(Clone, Debug, PartialEq)]
pub struct Run {
    /// The numbers by id; empty where the run failed.
    pub numbers: Numbers,
    /// Why the model is not valid for this run; empty where it is.
    pub validity: Vec<Validity>,
    /// Every check that applies, by its kind; all open where the run failed.
    pub checks: Vec<Check>,
    /// Why there are no numbers.
    pub failure: Option<Failure>,
}

impl Run {
    /// The check of a kind, where it applies to this run.
    #[must_use]
    pub fn check(&self, kind: CheckKind) -> Option<&Check> {
        self.checks.iter().find(|check| check.kind == kind)
    }
}

/// Runs one scenario at many values. Limits are resolved once.
#[derive(Clone, Debug)]
pub struct Evaluator {
    scenario: Scenario,
    rules: Rules,
    inputs: Vec<Input>,
    /// Kinds of checks that apply whatever the numbers are, for runs that fail.
    kinds: Vec<CheckKind>,
    /// Counts its runs and may refuse them.
    meter: Option<Arc<Meter>>,
}

impl Evaluator {
    /// Resolves limits and inputs of a scenario; it is not run yet.
    ///
    /// # Errors
    /// When the scenario names an unknown set of limits.
    pub fn new(scenario: &Scenario) -> Result<Self, StudyError> {
        let rules = Rules::of(scenario)?;
        let mut kinds: Vec<_> =
            checks(&rules, scenario, &Numbers::default(), &[]).iter().map(|check| check.kind).collect();
        if let Ok(typical) = figures(scenario) {
            let more = checks(&rules, scenario, &typical.numbers, &typical.validity);
            kinds.extend(more.iter().map(|check| check.kind));
        }
        kinds.sort_unstable();
        kinds.dedup();
        Ok(Self { scenario: scenario.clone(), rules, inputs: inputs(scenario), kinds, meter: None })
    }

    /// The same with every run of [`Self::at`] counted, and refused once the meter says so.
    #[must_use]
    pub fn metered(self, meter: Arc<Meter>) -> Self {
        Self { meter: Some(meter), ..self }
    }

    /// The scenario as it was given.
    #[must_use]
    pub const fn scenario(&self) -> &Scenario {
        &self.scenario
    }

    /// Every numeric input with its band, in file order.
    #[must_use]
    pub fn inputs(&self) -> &[Input] {
        &self.inputs
    }

    /// Kinds of the checks that apply at the typical values, in order.
    #[must_use]
    pub fn kinds(&self) -> &[CheckKind] {
        &self.kinds
    }

    /// The number of the input with a path.
    ///
    /// # Errors
    /// [`StudyError::NoPath`] when the scenario has none.
    pub fn index_of(&self, path: &str) -> Result<usize, StudyError> {
        let at = self.inputs.iter().position(|input| input.path == path);
        at.ok_or_else(|| StudyError::NoPath { path: path.to_owned() })
    }

    /// Numbers of the inputs whose low and high differ, in file order.
    #[must_use]
    pub fn wide(&self) -> Vec<usize> {
        (0..self.inputs.len()).filter(|&i| self.inputs[i].measure.band.is_wide()).collect()
    }

    /// The run at the typical values.
    #[must_use]
    pub fn typical(&self) -> Run {
        self.run(&self.scenario)
    }

    /// The run with some inputs replaced, each by its number in [`Self::inputs`], SI. Bands play no part in it.
    ///
    /// Values that are outside of their physical range or clash make a failed run, not an error.
    ///
    /// # Errors
    /// [`StudyError::NoInput`] and [`StudyError::NotFinite`]; [`StudyError::Stopped`] where a meter refuses the run.
    pub fn at(&self, values: &[(usize, f64)]) -> Result<Run, StudyError> {
        self.count()?;
        Ok(self.scenario_at(values)?.map_or_else(|| self.failed(Failure::Clash), |changed| self.run(&changed)))
    }

    /// As [`Self::at`], without the numbers that only the settling of a horizontal lifeline tells, which takes most of
    /// such a run; the checks are the same.
    ///
    /// # Errors
    /// As [`Self::at`].
    pub fn peaks_at(&self, values: &[(usize, f64)]) -> Result<Run, StudyError> {
        self.count()?;
        let run = |changed: &Scenario| self.judged(changed, peaks(changed));
        Ok(self.scenario_at(values)?.as_ref().map_or_else(|| self.failed(Failure::Clash), run))
    }

    /// One more run for the meter, which may refuse it.
    fn count(&self) -> Result<(), StudyError> {
        let refused = self.meter.as_ref().is_some_and(|meter| !meter.count());
        if refused { Err(StudyError::Stopped) } else { Ok(()) }
    }

    /// The scenario with some inputs replaced, as [`Self::at`] runs it; none where the values cannot be together.
    ///
    /// # Errors
    /// [`StudyError::NoInput`] and [`StudyError::NotFinite`].
    pub fn scenario_at(&self, values: &[(usize, f64)]) -> Result<Option<Scenario>, StudyError> {
        let mut named = Vec::with_capacity(values.len());
        for &(index, value) in values {
            let count = self.inputs.len();
            let input = self.inputs.get(index).ok_or(StudyError::NoInput { index, count })?;
            if !value.is_finite() {
                return Err(StudyError::NotFinite { path: input.path.clone() });
            }
            named.push((input.path.as_str(), value));
        }
        Ok(with_values(&self.scenario, &named))
    }

    /// A check with its id, label and basis, notes in the given units.
    #[must_use]
    pub fn margin(&self, run: &Run, check: &Check, system: UnitSystem) -> Margin {
        margin_of(&self.rules, &self.scenario, &run.validity, check, system)
    }

    /// A check of a run whose model is valid, as [`Self::margin`].
    #[must_use]
    pub fn margin_of(&self, check: &Check, system: UnitSystem) -> Margin {
        margin_of(&self.rules, &self.scenario, &[], check, system)
    }

    fn run(&self, scenario: &Scenario) -> Run {
        self.judged(scenario, figures(scenario))
    }

    fn judged(&self, scenario: &Scenario, figures: Result<Figures, EstimateError>) -> Run {
        match figures {
            Ok(figures) => Run {
                checks: checks(&self.rules, scenario, &figures.numbers, &figures.validity),
                numbers: figures.numbers,
                validity: figures.validity,
                failure: None,
            },
            Err(error) => self.failed(error.into()),
        }
    }

    fn failed(&self, failure: Failure) -> Run {
        let checks = self.kinds.iter().map(|kind| judge(*kind, None, None)).collect();
        Run { numbers: Numbers::default(), validity: Vec::new(), checks, failure: Some(failure) }
    }
}
