//! Which way raising an input moves the governing margin, by a small step to both sides.
use crate::estimate::{Estimate, estimate};
use crate::margin::{Check, Rules, checks, governing_first};
use crate::scenario::{AnchorKind, DampingLaw, Input, Scenario, with_value};
use crate::sheet::Report;

/// The arrow beside an input.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Lean {
    /// Raising the input gives more room.
    More,
    /// Raising the input gives less room.
    Less,
    /// The input does not matter to the governing margin.
    None,
    /// Still being worked out.
    Pending,
    /// Cannot be told: there is no margin, or the neighbours cannot be computed.
    Unknown,
}

impl Lean {
    /// `^` more room, `v` less room, `.` does not matter, `?` cannot be told, blank while being worked out.
    #[must_use]
    pub const fn symbol(self) -> char {
        match self {
            Self::More => '^',
            Self::Less => 'v',
            Self::None => '.',
            Self::Pending => ' ',
            Self::Unknown => '?',
        }
    }

    /// The same in words.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::More => "raising it gives more room",
            Self::Less => "raising it gives less room",
            Self::None => "does not move the governing margin",
            Self::Pending => "which way it moves the governing margin is being worked out",
            Self::Unknown => "cannot be told which way it moves the governing margin",
        }
    }
}

/// Share of its value by which an input is moved to both sides.
const STEP: f64 = 1e-4;
/// Change of the margin, as a share of demand and limit, below which an input does not matter: well above the
/// solver's 1e-12 and well below what a step of [`STEP`] does to a margin that depends on the input at all.
const NOTHING: f64 = 1e-9;

/// Phases that may be solved within one frame: some milliseconds.
const PHASES_PER_FRAME: usize = 4000;

/// True when working out the arrows takes longer than a frame may: lifelines, and long undamped motions with many phases.
#[must_use]
pub fn is_slow(inputs: &[Input], report: &Report) -> bool {
    if matches!(report.scenario.anchor.kind, AnchorKind::Span(_)) {
        return true;
    }
    let each = if report.estimate.plane.is_some() || is_coupled(&report.scenario) { COUPLED_PHASE } else { 1 };
    2 * inputs.len() * report.estimate.trace.phases().len() * each > PHASES_PER_FRAME
}

/// A phase of two groups with a damper between springs, or one of a swing, takes about so many times as long as one of a
/// single group.
const COUPLED_PHASE: usize = 25;

/// Line and other parts both stretch, and a damper makes their stretches move on their own.
fn is_coupled(scenario: &Scenario) -> bool {
    let sprung = match &scenario.anchor.kind {
        AnchorKind::Sprung(spring) => Some(spring),
        AnchorKind::Fixed | AnchorKind::Span(_) => None,
    };
    let others = [sprung, scenario.harness.as_ref()];
    let is_span = matches!(scenario.anchor.kind, AnchorKind::Span(_));
    let is_other_soft = is_span || scenario.line.series_stiffness.is_some() || others.iter().any(Option::is_some);
    let is_other_damped = others.into_iter().flatten().any(|other| other.damping.is_some());
    is_other_soft && (is_other_damped || scenario.line.damping != DampingLaw::None)
}

/// The arrows of all inputs, in their order.
#[must_use]
pub fn leans(inputs: &[Input], scenario: &Scenario, report: Option<&Report>) -> Vec<Lean> {
    let governing = report.and_then(|report| {
        let mut found = judged(scenario, &report.estimate)?;
        found.sort_by(governing_first);
        found.into_iter().find(|check| check.margin.is_some())
    });
    let Some(governing) = governing else { return vec![Lean::Unknown; inputs.len()] };
    inputs.iter().map(|input| lean(input, scenario, &governing)).collect()
}

fn judged(scenario: &Scenario, estimate: &Estimate) -> Option<Vec<Check>> {
    Some(checks(&Rules::of(scenario).ok()?, scenario, &estimate.numbers, &estimate.validity))
}

/// The difference of the governing margin over a step to both sides; one side where the other cannot be had.
fn lean(input: &Input, scenario: &Scenario, governing: &Check) -> Lean {
    let value = input.measure.si();
    let step = if value == 0.0 { STEP } else { value.abs() * STEP };
    let margin_at = |value: f64| {
        let moved = with_value(scenario, &input.path, value)?;
        let found = judged(&moved, &estimate(&moved).ok()?)?;
        found.into_iter().find(|check| check.kind == governing.kind)?.margin
    };
    let (above, below) = (margin_at(value + step), margin_at(value - step));
    if above.is_none() && below.is_none() {
        return Lean::Unknown;
    }
    let here = governing.margin.unwrap_or(0.0);
    let change = above.unwrap_or(here) - below.unwrap_or(here);
    let size = governing.demand.unwrap_or(0.0).abs().max(governing.limit.unwrap_or(0.0).abs()).max(1e-9);
    if change.abs() <= NOTHING * size {
        Lean::None
    } else if change > 0.0 {
        Lean::More
    } else {
        Lean::Less
    }
}
