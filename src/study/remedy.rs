//! For each input that can be chosen, alone or with a second: the nearest change at which every check holds. Arithmetic,
//! not advice.
use super::held::{Held, Judge, Today, Values};
use super::nearest::Search;
use super::pair::PairSearch;
use super::watch::{Pulse, Step, Watch, unwatched};
use super::{Evaluator, StudyError};
use crate::margin::Verdict;
use crate::quantity::Dimension;
use crate::scenario::Input;
use rayon::prelude::*;

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

/// What a change is a share of.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Scale {
    /// Today's value, its amount.
    Today(f64),
    /// The length of what falls, m, see [`Yard`]: for elevations and offsets, whose zero is arbitrary, and for lengths
    /// that are zero today.
    Fall(f64),
    /// One: for ratios that are zero today.
    One,
    /// Nothing: today's value is zero. Such a change ranks last.
    Nothing,
}

impl Scale {
    /// A change as a share of the scale; infinite for [`Scale::Nothing`].
    #[must_use]
    pub fn share(self, change: f64) -> f64 {
        match self {
            Self::Today(size) | Self::Fall(size) => change.abs() / size,
            Self::One => change.abs(),
            Self::Nothing => f64::INFINITY,
        }
    }
    /// The change of a whole share, SI; none for [`Scale::Nothing`].
    #[must_use]
    pub const fn whole(self) -> Option<f64> {
        match self {
            Self::Today(size) | Self::Fall(size) => Some(size),
            Self::One => Some(1.0),
            Self::Nothing => None,
        }
    }
}

/// The length that changes of elevations and offsets are a share of.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Yard {
    /// `line.length` as the file states it.
    Line,
    /// The total fall distance of the file's own run, where no line length is stated.
    TotalFall,
    /// [`REACH_M`], where the file gives neither.
    Reach,
}

/// The nearest value of one input at which every check holds.
#[derive(Clone, Debug, PartialEq)]
pub struct Way {
    /// The value, SI.
    pub value: f64,
    /// As it would stand in the file; `1.5..1.5 m` where the input's own band has to go, see [`Way::narrowed`].
    pub written: String,
    /// The value alone: `1.5 m`.
    pub shown: String,
    /// True where the input has a band of its own that the search left out.
    pub narrowed: bool,
    /// Change over [`Way::scale`], its amount.
    pub relative: f64,
    /// What the change is a share of.
    pub scale: Scale,
    /// In how many separate stretches of the range every check holds; at the worst, at most so many.
    pub ways: usize,
    /// Where in the bands of the other inputs a check fails a step short of the value; empty for the typical values.
    pub place: Vec<(usize, f64)>,
}

/// Why there is no value.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Without {
    /// No value in the range was found at which every check holds.
    NoneInRange,
    /// The search for the worst came to no end within its rounds, or met open runs it could not place.
    Unsettled,
    /// It was broken off.
    Stopped,
}

/// One input's answer.
#[derive(Clone, Debug, PartialEq)]
pub struct Remedy {
    /// The input as it is today.
    pub input: Input,
    /// Range searched, SI.
    pub range: (f64, f64),
    /// The nearest value.
    pub way: Option<Way>,
    /// Why there is none.
    pub without: Option<Without>,
}

/// The nearest joint change of two inputs.
#[derive(Clone, Debug, PartialEq)]
pub struct Pair {
    /// Both inputs as they are today.
    pub inputs: [Input; 2],
    /// Their values.
    pub ways: [Way; 2],
    /// The root of the sum of the squares of both changes, each over its scale: what is least.
    pub relative: f64,
}

/// What is searched.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Wanted {
    /// Where every check must hold.
    pub held: Held,
    /// Pairs of inputs as well.
    pub pairs: bool,
}

/// All inputs' answers.
#[derive(Clone, Debug, PartialEq)]
pub struct Remedies {
    /// The worst verdict today.
    pub today: Verdict,
    /// What was searched.
    pub wanted: Wanted,
    /// The length that changes of elevations and offsets are a share of: which, and how long, m.
    pub yard: (Yard, f64),
    /// By the change, smallest first; those without a value last. Empty when every check holds today.
    pub list: Vec<Remedy>,
    /// Pairs that are nearer than each of their inputs alone, the nearest first.
    pub pairs: Vec<Pair>,
    /// How many pairs were searched.
    pub pairs_searched: usize,
    /// True when it was broken off.
    pub partial: bool,
}

/// Searches every adjustable input of a scenario at its typical values, one at a time; see [`remedies_of`].
///
/// # Errors
/// As [`Evaluator::at`].
pub fn remedies(evaluator: &Evaluator) -> Result<Remedies, StudyError> {
    remedies_of(evaluator, Wanted::default(), &unwatched)
}

/// Searches every adjustable input of a scenario, one at a time and, where wanted, in pairs; in parallel on the current
/// rayon pool, with the same result on any number of threads.
///
/// At the typical values a stretch of holding values narrower than a four-hundredth of a side of the range can be missed.
/// At the worst a value is searched that holds at the places of the bands where a check is known to fail, then the worst is
/// searched anew with that value; while a check fails there, its place joins the others. So the value holds at all that
/// the search for the worst finds, and a step short of it a check fails at a place that is known. `watch` is told after each
/// input and pair and may break off.
///
/// # Errors
/// As [`Evaluator::at`] and [`super::worst_found`].
pub fn remedies_of(evaluator: &Evaluator, wanted: Wanted, watch: &Watch<'_>) -> Result<Remedies, StudyError> {
    let today = Today::new(evaluator, wanted.held, watch)?;
    let (yard, partial) = (yard(evaluator), today.partial);
    let mut found = Remedies {
        today: today.verdict,
        wanted,
        yard,
        list: Vec::new(),
        pairs: Vec::new(),
        pairs_searched: 0,
        partial,
    };
    if today.verdict == Verdict::Holds || partial {
        return Ok(found);
    }
    let all = All { evaluator, wanted, known: &today.places, yard: yard.1 };
    let inputs = evaluator.inputs().iter().enumerate();
    let adjustable: Vec<usize> =
        inputs.filter(|(_, input)| ADJUSTABLE.contains(&input.path.as_str())).map(|(index, _)| index).collect();
    let pulse = Pulse::new(watch, Step::Remedies, adjustable.len());
    found.list = each(&pulse, &adjustable, |&input| all.remedy(input, &pulse))?;
    found.partial = pulse.is_stopped();
    if wanted.pairs && !found.partial {
        let pairs: Vec<[usize; 2]> =
            adjustable.iter().flat_map(|&a| adjustable.iter().filter(move |b| **b > a).map(move |&b| [a, b])).collect();
        let alone = |input: usize| {
            let path = evaluator.inputs().get(input).map(|input| input.path.as_str());
            let known = found.list.iter().find(|remedy| Some(remedy.input.path.as_str()) == path);
            known.and_then(|remedy| remedy.way.as_ref()).map_or(f64::INFINITY, |way| way.relative)
        };
        let pulse = Pulse::new(watch, Step::Pairs, pairs.len());
        let answers = each(&pulse, &pairs, |&pair| all.pair(pair, pair.map(alone), &pulse))?;
        found.pairs_searched = pairs.len();
        found.partial = pulse.is_stopped();
        found.pairs = answers.into_iter().flatten().collect();
        found.pairs.sort_by(|a, b| a.relative.total_cmp(&b.relative));
    }
    let change = |r: &Remedy| r.way.as_ref().map_or(f64::INFINITY, |w| w.relative);
    let without = |r: &Remedy| r.way.is_none();
    found.list.sort_by(|a, b| without(a).cmp(&without(b)).then(change(a).total_cmp(&change(b))));
    Ok(found)
}

/// The length of what falls.
fn yard(evaluator: &Evaluator) -> (Yard, f64) {
    let line = evaluator.scenario().line.length.map(|length| length.si()).filter(|m| *m > 0.0);
    let fall = || evaluator.typical().numbers.get("total_fall_distance").filter(|m| *m > 0.0);
    match line {
        Some(length) => (Yard::Line, length),
        None => fall().map_or((Yard::Reach, REACH_M), |fall| (Yard::TotalFall, fall)),
    }
}

/// Answers in the order of the questions.
fn each<Q: Sync, A: Send>(
    pulse: &Pulse<'_>,
    questions: &[Q],
    answer: impl Fn(&Q) -> Result<A, StudyError> + Sync,
) -> Result<Vec<A>, StudyError> {
    pulse.beat();
    let one = |question: &Q| {
        let found = answer(question)?;
        pulse.answered();
        Ok(found)
    };
    questions.par_iter().map(one).collect()
}

/// What all searches share.
struct All<'a> {
    evaluator: &'a Evaluator,
    wanted: Wanted,
    known: &'a [Values],
    yard: f64,
}

impl<'a> All<'a> {
    fn judge(&self, changed: Vec<usize>, pulse: &'a Pulse<'a>) -> Judge<'a> {
        Judge::new(self.evaluator, self.wanted.held, changed, self.known, pulse)
    }

    fn span(&self, index: usize) -> Option<Span> {
        let input = self.evaluator.inputs().get(index)?;
        Some(Span { index, input: input.clone(), range: range(input), scale: scale(input, self.yard) })
    }

    fn remedy(&self, index: usize, pulse: &'a Pulse<'a>) -> Result<Remedy, StudyError> {
        let count = self.evaluator.inputs().len();
        let span = self.span(index).ok_or(StudyError::NoInput { index, count })?;
        let way = Search { span: &span, judge: self.judge(vec![index], pulse), held: self.wanted.held }.way()?;
        let without = way.as_ref().err().copied();
        Ok(Remedy { range: span.range, input: span.input, way: way.ok(), without })
    }

    fn pair(&self, pair: [usize; 2], alone: [f64; 2], pulse: &'a Pulse<'a>) -> Result<Option<Pair>, StudyError> {
        let [Some(a), Some(b)] = pair.map(|index| self.span(index)) else { return Ok(None) };
        let judge = self.judge(pair.to_vec(), pulse);
        PairSearch { spans: [&a, &b], judge, held: self.wanted.held, alone: alone[0].min(alone[1]) }.pair()
    }
}

/// One input with the range that is searched and the scale of its changes.
pub(super) struct Span {
    pub index: usize,
    pub input: Input,
    pub range: (f64, f64),
    pub scale: Scale,
}

impl Span {
    pub fn today(&self) -> f64 {
        self.input.measure.si()
    }
    pub fn share(&self, value: f64) -> f64 {
        self.scale.share(value - self.today())
    }
}

/// Elevations and offsets have no zero of their own.
fn is_place(input: &Input) -> bool {
    input.path.starts_with("place.")
}

fn scale(input: &Input, yard: f64) -> Scale {
    let size = input.measure.si().abs();
    match input.field.dimension {
        _ if is_place(input) => Scale::Fall(yard),
        _ if size > 0.0 => Scale::Today(size),
        Some(Dimension::Length) => Scale::Fall(yard),
        Some(Dimension::Ratio) => Scale::One,
        _ => Scale::Nothing,
    }
}

fn range(input: &Input) -> (f64, f64) {
    let (today, field) = (input.measure.si(), input.field);
    let around = is_place(input) || today == 0.0;
    let reach = if field.dimension == Some(Dimension::Length) { REACH_M } else { 1.0 };
    let multiple = if input.path == "subject.mass" { MASS_MULTIPLE } else { MULTIPLE };
    let (low, high) = if around { (today - reach, today + reach) } else { (today / multiple, today * multiple) };
    (low.max(field.least), high.min(field.most))
}
