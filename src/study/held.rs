//! Whether every check holds with some inputs changed: at the typical values of the others, or at the worst found over
//! their bands.
use super::evaluate::{Evaluator, Run, StudyError};
use super::watch::{Pulse, Watch};
use super::worst::{Worst, WorstFound, worst_found};
use crate::margin::{Verdict, worst};
use crate::scenario::with_exact_values;
use std::ops::ControlFlow;

/// Most bands of which every corner is tried before the search for the worst: 2^8 runs.
const CORNER_BANDS: usize = 8;
/// Corners that are taken over from one look at them.
const TAKEN: usize = 3;

/// Where every check must hold.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Held {
    /// With all other inputs at their typical values.
    #[default]
    Typical,
    /// At the worst that is found with all other inputs anywhere in their bands; the changed input counts as exact.
    Worst,
}

/// Values of inputs by their numbers, SI.
pub(super) type Values = Vec<(usize, f64)>;

/// What a look at the worst over the bands says.
pub(super) enum Look {
    /// Every check holds at the worst found.
    Holds,
    /// Places in the bands where one does not.
    Fails(Vec<Values>),
    /// It does not hold throughout, and no place is known; or the look was broken off.
    Unclear,
}

/// Judges changes of the same inputs. Knows places in the bands of the others at which all checks must hold: a change that
/// does not hold at one of them does not hold at the worst.
pub(super) struct Judge<'e> {
    evaluator: &'e Evaluator,
    held: Held,
    changed: Vec<usize>,
    /// Empty is the typical place.
    places: Vec<Values>,
    pulse: &'e Pulse<'e>,
}

/// The worst verdict of one run.
pub(super) fn word(run: &Run) -> Verdict {
    worst(run.checks.iter().map(|check| check.verdict))
}

/// What holds today.
pub(super) struct Today {
    pub verdict: Verdict,
    /// Places of the bands where a check does not hold.
    pub places: Vec<Values>,
    /// The search for the worst was broken off.
    pub partial: bool,
}

impl Today {
    pub fn new(evaluator: &Evaluator, held: Held, watch: &Watch<'_>) -> Result<Self, StudyError> {
        if held == Held::Typical {
            return Ok(Self { verdict: word(&evaluator.typical()), places: Vec::new(), partial: false });
        }
        let found = worst_found(evaluator, watch)?;
        let verdict = worst(found.checks.iter().map(|check| check.verdict));
        Ok(Self { verdict, places: places(&found), partial: found.partial })
    }
}

fn places(found: &WorstFound) -> Vec<Values> {
    let fails = |check: &&Worst| check.worst.is_some_and(|worst| worst.verdict == Verdict::Short);
    let place = |check: &Worst| check.stands.iter().map(|stand| (stand.input, stand.value)).collect();
    found.checks.iter().filter(fails).map(place).collect()
}

impl<'e> Judge<'e> {
    pub fn new(
        evaluator: &'e Evaluator,
        held: Held,
        changed: Vec<usize>,
        known: &[Values],
        pulse: &'e Pulse<'e>,
    ) -> Self {
        let mut judge = Self { evaluator, held, changed, places: vec![Values::new()], pulse };
        for place in known {
            judge.add(place);
        }
        judge
    }

    pub fn is_stopped(&self) -> bool {
        self.pulse.beat()
    }

    /// A place at which all checks must hold as well; true when it was not known.
    pub fn add(&mut self, place: &[(usize, f64)]) -> bool {
        let other: Values = place.iter().copied().filter(|(input, _)| !self.changed.contains(input)).collect();
        let new = !self.places.contains(&other);
        if new {
            self.places.push(other);
        }
        new
    }

    /// Whether every check holds at all known places; never once the search is broken off.
    pub fn holds(&self, values: &[(usize, f64)]) -> Result<bool, StudyError> {
        if self.is_stopped() {
            return Ok(false);
        }
        // The latest place is the likeliest to fail.
        for place in self.places.iter().rev() {
            if !self.holds_at(values, place)? {
                return Ok(false);
            }
        }
        Ok(true)
    }

    /// A known place, other than the typical one, where a check does not hold.
    pub fn failing_place(&self, values: &[(usize, f64)]) -> Result<Option<Values>, StudyError> {
        for place in self.places.iter().filter(|place| !place.is_empty()) {
            if !self.holds_at(values, place)? {
                return Ok(Some(place.clone()));
            }
        }
        Ok(None)
    }

    fn holds_at(&self, values: &[(usize, f64)], place: &[(usize, f64)]) -> Result<bool, StudyError> {
        let all: Values = values.iter().chain(place).copied().collect();
        Ok(word(&self.evaluator.peaks_at(&all)?) == Verdict::Holds)
    }

    /// Looks whether a change that holds at all known places holds at the worst found: first at the corners of the bands,
    /// then by the full search.
    pub fn look(&self, values: &[(usize, f64)]) -> Result<Look, StudyError> {
        if self.held == Held::Typical {
            return Ok(Look::Holds);
        }
        let corners = self.failing_corners(values)?;
        if !corners.is_empty() {
            return Ok(Look::Fails(corners));
        }
        let inputs = self.evaluator.inputs();
        let named: Vec<(&str, f64)> =
            values.iter().filter_map(|(input, value)| Some((inputs.get(*input)?.path.as_str(), *value))).collect();
        let Some(exact) = with_exact_values(self.evaluator.scenario(), &named) else { return Ok(Look::Unclear) };
        let go_on = |_| if self.is_stopped() { ControlFlow::Break(()) } else { ControlFlow::Continue(()) };
        let found = worst_found(&Evaluator::new(&exact)?, &go_on)?;
        let places = places(&found);
        Ok(match (worst(found.checks.iter().map(|check| check.verdict)), places.is_empty()) {
            (Verdict::Holds, _) => Look::Holds,
            (_, false) => Look::Fails(places),
            (_, true) => Look::Unclear,
        })
    }

    /// A few corners of the bands of all other inputs where a check does not hold.
    fn failing_corners(&self, values: &[(usize, f64)]) -> Result<Vec<Values>, StudyError> {
        let mut wide = self.evaluator.wide();
        wide.retain(|input| !self.changed.contains(input));
        let mut failing = Vec::new();
        if wide.len() > CORNER_BANDS {
            return Ok(failing);
        }
        let end = |input: usize, high: bool| {
            let band = self.evaluator.inputs().get(input).map(|input| input.measure.band);
            (input, band.map_or(0.0, |band| if high { band.high } else { band.low }))
        };
        for corner in 0..1_usize << wide.len() {
            let place: Values = wide.iter().enumerate().map(|(d, &input)| end(input, corner >> d & 1 == 1)).collect();
            if !self.holds_at(values, &place)? {
                failing.push(place);
            }
            if failing.len() >= TAKEN || self.is_stopped() {
                break;
            }
        }
        Ok(failing)
    }
}
