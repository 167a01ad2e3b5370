//! For each input that can be chosen, alone: the nearest value at which every check holds. Arithmetic, not advice.
use super::{Evaluator, Run, StudyError};
use crate::margin::{Verdict, worst};
use crate::quantity::{Dimension, Unit, format_unit, parse_quantity};
use crate::scenario::Input;

/// Inputs that somebody chooses when the fall is planned. What is stated of a thing as it is (strengths, capacities,
/// ratings, the body, obstacles with their reserves, limits) is not among them: writing another value there would not
/// change the place, only the file.
pub const ADJUSTABLE: &[&str] = &[
    "subject.mass",
    "place.standing",
    "place.anchor",
    "place.anchor_offset",
    "fall.free_fall",
    "line.length",
    "line.stiffness",
    "line.modulus",
    "line.damping",
    "line.damping_ratio",
    "absorber.deploy_force",
    "absorber.stroke",
    "anchor.span.length",
    "anchor.span.at",
    "anchor.span.pretension",
    "anchor.span.sag",
];

/// Inputs are searched from a fifth to five times of today's value.
pub const MULTIPLE: f64 = 5.0;
/// The mass of the subject is searched from half to double: tools can be left behind, a person cannot be chosen.
pub const MASS_MULTIPLE: f64 = 2.0;
/// Elevations and offsets, whose zero is arbitrary, are searched this far up and down, m.
pub const REACH_M: f64 = 10.0;
/// Cells of the search on each side of today's value.
const CELLS: u32 = 400;
/// Halvings of a bracket.
const HALVINGS: usize = 60;
/// Digits to which a value is rounded to the holding side; more where the window is narrower than that.
const DIGITS: [i32; 3] = [5, 8, 11];

/// The nearest value of one input at which every check holds.
#[derive(Clone, Debug, PartialEq)]
pub struct Way {
    /// The value, SI.
    pub value: f64,
    /// As it would stand in the file.
    pub written: String,
    /// Change over today's value, its amount; over the range searched where today's zero is arbitrary.
    pub relative: f64,
    /// True where the change is a share of the range searched, not of today's value.
    pub of_range: bool,
    /// In how many separate stretches of the range every check holds.
    pub ways: usize,
}

/// One input's answer.
#[derive(Clone, Debug, PartialEq)]
pub struct Remedy {
    /// The input as it is today.
    pub input: Input,
    /// Range searched, SI.
    pub range: (f64, f64),
    /// The nearest value; none where no value in the range was found at which every check holds.
    pub way: Option<Way>,
}

/// All inputs' answers.
#[derive(Clone, Debug, PartialEq)]
pub struct Remedies {
    /// The worst verdict today.
    pub today: Verdict,
    /// By the change, smallest first; those without a value last. Empty when every check holds today.
    pub list: Vec<Remedy>,
}

/// Searches every adjustable input of a scenario at its typical values, one at a time.
///
/// A stretch of holding values narrower than a four-hundredth of a side of the range can be missed.
///
/// # Errors
/// As [`Evaluator::at`].
pub fn remedies(evaluator: &Evaluator) -> Result<Remedies, StudyError> {
    let today = word(&evaluator.typical());
    let mut list = Vec::new();
    if today != Verdict::Holds {
        for (index, input) in evaluator.inputs().iter().enumerate() {
            if ADJUSTABLE.contains(&input.path.as_str()) {
                list.push(Search { evaluator, index, input }.remedy()?);
            }
        }
    }
    let change = |r: &Remedy| r.way.as_ref().map_or(f64::INFINITY, |w| w.relative);
    list.sort_by(|a, b| change(a).total_cmp(&change(b)));
    Ok(Remedies { today, list })
}

fn word(run: &Run) -> Verdict {
    worst(run.checks.iter().map(|check| check.verdict))
}

struct Search<'a> {
    evaluator: &'a Evaluator,
    index: usize,
    input: &'a Input,
}

impl Search<'_> {
    fn remedy(&self) -> Result<Remedy, StudyError> {
        let range = self.range();
        let mut nearest: Option<(f64, f64)> = None;
        let mut ways = 0;
        for end in [range.0, range.1] {
            let (first, count) = self.side(end)?;
            ways += count;
            let distance = |pair: (f64, f64)| (pair.1 - self.today()).abs();
            nearest = match (nearest, first) {
                (Some(a), Some(b)) => Some(if distance(b) < distance(a) { b } else { a }),
                (a, b) => a.or(b),
            };
        }
        let way = match nearest {
            Some(bracket) => Some(self.way(bracket, range, ways)?),
            None => None,
        };
        Ok(Remedy { input: self.input.clone(), range, way })
    }

    fn today(&self) -> f64 {
        self.input.measure.si()
    }

    /// Elevations and offsets have no zero of their own.
    fn is_place(&self) -> bool {
        self.input.path.starts_with("place.")
    }

    fn range(&self) -> (f64, f64) {
        let (today, field) = (self.today(), self.input.field);
        let around = self.is_place() || today == 0.0;
        let reach = if self.input.field.dimension == Some(Dimension::Length) { REACH_M } else { 1.0 };
        let multiple = if self.input.path == "subject.mass" { MASS_MULTIPLE } else { MULTIPLE };
        let (low, high) = if around { (today - reach, today + reach) } else { (today / multiple, today * multiple) };
        (low.max(field.least), high.min(field.most))
    }

    fn holds(&self, value: f64) -> Result<bool, StudyError> {
        Ok(word(&self.evaluator.at(&[(self.index, value)])?) == Verdict::Holds)
    }

    /// From today's value to one end: the first bracket (not holding, holding), and how many stretches hold.
    fn side(&self, end: f64) -> Result<(Option<(f64, f64)>, usize), StudyError> {
        let (mut first, mut count) = (None, 0);
        let (mut last, mut held) = (self.today(), false);
        for i in 1..=CELLS {
            // Denser near today's value, where the answer is wanted.
            let share = (f64::from(i) / f64::from(CELLS)).powi(2);
            let value = self.today() * (1.0 - share) + end * share;
            let holds = self.holds(value)?;
            if holds && !held {
                count += 1;
                first = first.or(Some((last, value)));
            }
            (last, held) = (value, holds);
        }
        Ok((first, count))
    }

    fn way(&self, bracket: (f64, f64), range: (f64, f64), ways: usize) -> Result<Way, StudyError> {
        let (mut short, mut good) = bracket;
        for _ in 0..HALVINGS {
            let middle = f64::midpoint(short, good);
            if middle == short || middle == good {
                break;
            }
            *(if self.holds(middle)? { &mut good } else { &mut short }) = middle;
        }
        let (value, written) = self.rounded(good)?;
        let of_range = self.is_place() || self.today() == 0.0;
        let scale = if of_range { range.1 - range.0 } else { self.today().abs() };
        Ok(Way { value, written, relative: (value - self.today()).abs() / scale, of_range, ways })
    }

    /// The value as the file would state it: few digits, rounded away from today's value, and checked as it reads.
    fn rounded(&self, good: f64) -> Result<(f64, String), StudyError> {
        let unit = self.input.measure.unit;
        for digits in DIGITS {
            let step = 10_f64.powf(in_unit(good, unit).abs().max(1e-12).log10().floor() - f64::from(digits));
            let away = (good - self.today()).signum();
            let first = (in_unit(good, unit) * away / step).ceil();
            for more in [0.0, 1.0] {
                let written = format_unit((first + more) * away * step * unit.factor(), unit);
                let Ok((value, _)) = parse_quantity(&written, unit.dimension()) else { continue };
                if self.holds(value)? {
                    return Ok((value, written));
                }
            }
        }
        Ok((good, format_unit(good, unit)))
    }
}

fn in_unit(value: f64, unit: Unit) -> f64 {
    value / unit.factor()
}
