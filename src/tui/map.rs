//! Axes and movable point of Map.
use super::edit::{step_si, value_text};
use super::layout::Panes;
use super::model::{Model, View};
use super::panes::map as pane;
use super::studies::{Mapped, What};
use crate::margin::{Verdict, governing_first, worst};
use crate::quantity::{Measure, UnitSystem};
use crate::scenario::{Input, Turn};
use crate::study::{Axis, MOST_STEPS};

/// Inputs that are put on the axes where none were chosen, in this order.
const USUAL: [&str; 8] = [
    "line.length",
    "absorber.deploy_force",
    "subject.mass",
    "line.stiffness",
    "line.modulus",
    "fall.free_fall",
    "place.anchor",
    "line.damping_ratio",
];

/// Axes and point.
#[derive(Clone, Debug, Default)]
pub struct Point {
    /// Paths of the inputs to the right and upwards; none for the usual ones.
    pub paths: [Option<String>; 2],
    /// The movable point, SI; none where it stands on the present values.
    pub at: Option<[f64; 2]>,
    /// What the point gives.
    pub seen: Option<Seen>,
}

/// The run at the point.
#[derive(Clone, Debug, PartialEq)]
pub struct Seen {
    /// Of all checks.
    pub verdict: Verdict,
    /// The check that governs there with its room, or why there is no run.
    pub words: String,
}

/// Direction of a step of the point.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Step {
    /// Cells to the right.
    pub across: i32,
    /// Cells up.
    pub up: i32,
}

impl Model {
    /// The inputs on the axes of Map: those chosen, else the usual ones.
    #[must_use]
    pub fn map_paths(&self) -> Option<[String; 2]> {
        let known = |path: &&str| self.inputs.iter().any(|input| input.path == *path && input.measure.si() != 0.0);
        let chosen = |axis: usize| self.map.paths[axis].as_deref().filter(known);
        let usual = |not: Option<&str>| USUAL.into_iter().filter(known).find(|path| Some(*path) != not);
        let across = chosen(0).or_else(|| usual(chosen(1)))?;
        let up = chosen(1).filter(|path| *path != across).or_else(|| usual(Some(across)))?;
        Some([across.to_owned(), up.to_owned()])
    }

    /// The map that the view has room for.
    #[must_use]
    pub fn map_question(&self) -> Option<What> {
        let panes = Panes::of(self.size, self)?;
        let field = pane::field(panes.view);
        let steps = [field.width, field.height].map(|cells| usize::from(cells).clamp(2, MOST_STEPS));
        Some(What::Map { paths: self.map_paths()?, steps })
    }

    /// Puts the chosen input on an axis.
    pub fn set_axis(&mut self, axis: usize) {
        let Some(path) = self.chosen().map(|input| input.path.clone()) else {
            return self.say("choose a number among the inputs first");
        };
        if let (Some(paths), false) = (self.map_paths(), self.view != View::Map)
            && paths[1 - axis] == path
        {
            // The other axis takes what this one had.
            self.map.paths[1 - axis] = Some(paths[axis].clone());
        }
        self.map.paths[axis] = Some(path);
        self.map.at = None;
        self.map.seen = None;
    }

    /// The movable point, SI, within the axes of a map.
    #[must_use]
    pub fn map_point(&self, mapped: &Mapped) -> [f64; 2] {
        let here = [0, 1].map(|axis| mapped.inputs[axis].measure.si());
        let axes = [&mapped.field.across, &mapped.field.up];
        let wanted = self.map.at.unwrap_or(here);
        [0, 1].map(|axis| wanted[axis].clamp(*axes[axis].range.start(), *axes[axis].range.end()))
    }

    /// Moves the point by cells.
    pub fn step_point(&mut self, step: Step) {
        let Some(mapped) = self.shelf.map() else { return self.say("the map is not there yet") };
        let point = self.map_point(mapped);
        let axes = [&mapped.field.across, &mapped.field.up];
        let steps = [step.across, step.up];
        let moved = [0, 1].map(|axis| {
            if steps[axis] == 0 {
                point[axis]
            } else {
                stepped(axes[axis], &mapped.inputs[axis], point[axis], steps[axis])
            }
        });
        self.map.at = Some(moved);
        self.look_at_point();
    }

    /// Puts the point on a cell of the map, counted from its lower left.
    pub fn put_point(&mut self, across: usize, up: usize) {
        let Some(mapped) = self.shelf.map() else { return };
        let axes = [(&mapped.field.across, across), (&mapped.field.up, up)];
        let value = |axis: usize| {
            let (of, cell) = axes[axis];
            rounded(of, &mapped.inputs[axis], of.value(cell.min(of.steps - 1)))
        };
        self.map.at = Some([value(0), value(1)]);
        self.look_at_point();
    }

    /// Runs the point.
    pub fn look_at_point(&mut self) {
        self.map.seen = self.shelf.map().map(|mapped| seen(mapped, self.map_point(mapped), self.units));
    }

    /// Writes the point into the inputs, as one change.
    pub fn take_point(&mut self) {
        let Some(mapped) = self.shelf.map() else { return self.say("the map is not there yet") };
        let point = self.map_point(mapped);
        let texts = [0, 1].map(|axis| (mapped.inputs[axis].path.clone(), text(&mapped.inputs[axis], point[axis])));
        let changes: Vec<(&str, &str)> = texts.iter().map(|(path, value)| (path.as_str(), value.as_str())).collect();
        match self.document.turned(&changes) {
            Ok(Turn::Done { document, .. }) => {
                self.take(*document);
                self.map.at = None;
                let [(a, x), (b, y)] = &texts;
                self.say(format!("{a} = {x} and {b} = {y} are now the inputs; u takes them back"));
            }
            Ok(Turn::Needs(path)) => self.complain(format!("these values need `{path}`")),
            Err(faults) => self.complain(super::edit::first_fault(&faults)),
        }
    }
}

/// The value as it would be written: exact, in the unit of the file.
#[must_use]
pub fn text(input: &Input, value: f64) -> String {
    let mut measure: Measure = input.measure;
    measure.band.typical = value;
    value_text(&measure)
}

fn stepped(axis: &Axis, input: &Input, value: f64, cells: i32) -> f64 {
    let cell = axis.value(1) - axis.value(0);
    rounded(axis, input, value + f64::from(cells) * cell)
}

/// A tenth of the step of a nudge, within the axis.
fn rounded(axis: &Axis, input: &Input, value: f64) -> f64 {
    let step = step_si(&input.measure) / 10.0;
    ((value / step).round() * step).clamp(*axis.range.start(), *axis.range.end())
}

fn seen(mapped: &Mapped, point: [f64; 2], units: UnitSystem) -> Seen {
    let (across, up) = (mapped.field.across.input, mapped.field.up.input);
    let run = match mapped.evaluator.at(&[(across, point[0]), (up, point[1])]) {
        Ok(run) => run,
        Err(error) => return Seen { verdict: Verdict::Open, words: error.to_string() },
    };
    let verdict = worst(run.checks.iter().map(|check| check.verdict));
    if let Some(failure) = &run.failure {
        return Seen { verdict, words: failure.to_string() };
    }
    let governing = run.checks.iter().min_by(|a, b| governing_first(a, b));
    let words = governing.map_or_else(
        || "nothing to judge".to_owned(),
        |check| {
            let margin = mapped.evaluator.margin(&run, check, units);
            format!("{} ({})", pane::room(&margin, units), margin.label)
        },
    );
    Seen { verdict, words }
}
