//! `vary`: one input across a range, or two across a map.
use super::exit::Code;
use super::interrupt::Interrupt;
use super::meter::Meter;
use super::options::VaryArgs;
use super::output::{self, PAINT};
use super::run::load_and_report;
use super::study::refused;
use crate::margin::worst;
use crate::quantity::parse_quantity;
use crate::sheet::{
    CAUTION_LINE, Layout, MOST_TEXT_STEPS, Report, field_csv, field_object, field_svg, field_text, print, vary_csv,
    vary_object, vary_svg, vary_text,
};
use crate::study::{Axis, Evaluator, Field, MOST_STEPS, Progress, Step, Variation, field, usual_range, vary};
use std::ops::RangeInclusive;

/// Values of the first input of a map, and of the second, where none are asked for.
const USUAL_STEPS: [usize; 2] = [61, 21];
/// Rows of a table where none are asked for.
const USUAL_ROWS: usize = 21;

/// How the result is written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Form {
    Text,
    Csv,
    Json,
    Svg,
}

impl Form {
    /// As asked for, else by the ending of the file, else text.
    fn of(args: &VaryArgs) -> Self {
        let ending = |path: &std::path::PathBuf| path.extension().map(|e| e.to_string_lossy().to_lowercase());
        let by_ending = args.output.output.as_ref().and_then(ending).unwrap_or_default();
        let none = !(args.csv || args.json || args.svg);
        let is = |asked: bool, name: &str| asked || (none && by_ending == name);
        if is(args.csv, "csv") {
            Self::Csv
        } else if is(args.json, "json") {
            Self::Json
        } else if is(args.svg, "svg") {
            Self::Svg
        } else {
            Self::Text
        }
    }
}

/// Prints one input across a range, or two across a map.
pub fn vary_inputs(args: &VaryArgs) -> Code {
    let (_, report) = match load_and_report(&args.file) {
        Ok(both) => both,
        Err(failure) => {
            failure.print();
            return failure.code();
        }
    };
    let made = Evaluator::new(&report.scenario).map_err(|error| error.to_string()).and_then(|evaluator| {
        let made = match &args.and {
            None => one(args, &report, &evaluator),
            Some(second) => two(args, second, &report, &evaluator),
        }?;
        Ok(made)
    });
    match made {
        Ok((text, code)) => {
            if Form::of(args) == Form::Csv {
                output::message(CAUTION_LINE);
            }
            output::deliver(&text, &args.output, code)
        }
        Err(message) => refused(&message),
    }
}

/// What one end of a range is called on the command line.
struct Ends<'a> {
    from: (&'static str, &'a Option<String>),
    to: (&'static str, &'a Option<String>),
}

fn one(args: &VaryArgs, report: &Report, evaluator: &Evaluator) -> Result<(String, Code), String> {
    let input = index(evaluator, &args.over)?;
    let range = range(evaluator, input, &Ends { from: ("--from", &args.from), to: ("--to", &args.to) })?;
    let found = vary(evaluator, input, range, args.steps.unwrap_or(USUAL_ROWS)).map_err(|error| error.to_string())?;
    let text = match Form::of(args) {
        Form::Text => vary_text(report, evaluator, &found, args.units.system(), PAINT),
        Form::Csv => vary_csv(evaluator, &found).map_err(|error| error.to_string())?,
        Form::Json => print(&vary_object(report, evaluator, &found), Layout::Lines),
        Form::Svg => vary_svg(report, evaluator, &found, args.units.system()),
    };
    Ok((text, code_of(&found)))
}

fn code_of(found: &Variation) -> Code {
    let verdicts = found.rows.iter().map(|row| worst(row.run.checks.iter().map(|check| check.verdict)));
    Code::from(worst(verdicts))
}

fn two(args: &VaryArgs, second: &str, report: &Report, evaluator: &Evaluator) -> Result<(String, Code), String> {
    let form = Form::of(args);
    let found = map(args, second, form, evaluator)?;
    let text = match form {
        Form::Text => field_text(report, evaluator, &found, args.units.system(), PAINT),
        Form::Csv => field_csv(evaluator, &found).map_err(|error| error.to_string())?,
        Form::Json => print(&field_object(report, evaluator, &found), Layout::Lines),
        Form::Svg => field_svg(report, evaluator, &found, args.units.system()),
    };
    let verdict = Code::from(worst(found.cells.iter().map(crate::study::Cell::verdict)));
    Ok((text, if found.partial { Code::Interrupted } else { verdict }))
}

fn map(args: &VaryArgs, second: &str, form: Form, evaluator: &Evaluator) -> Result<Field, String> {
    let inputs = [index(evaluator, &args.over)?, index(evaluator, second)?];
    if inputs[0] == inputs[1] {
        return Err(format!("`--and {second}` is the same input as `--over`; choose another"));
    }
    let ends = Ends { from: ("--from", &args.from), to: ("--to", &args.to) };
    let second_ends = Ends { from: ("--and-from", &args.and_from), to: ("--and-to", &args.and_to) };
    let across = Axis {
        input: inputs[0],
        range: range(evaluator, inputs[0], &ends)?,
        steps: steps("--steps", args.steps.unwrap_or(USUAL_STEPS[0]), form == Form::Text)?,
    };
    let up = Axis {
        input: inputs[1],
        range: range(evaluator, inputs[1], &second_ends)?,
        steps: steps("--and-steps", args.and_steps.unwrap_or(USUAL_STEPS[1]), false)?,
    };
    let cells = across.steps * up.steps;
    let (interrupt, meter) = (Interrupt::listen(), Meter::new());
    let mut watch = |done| interrupt.watch(&meter, Progress { step: Step::Cells, done, of: cells });
    let found = field(evaluator, across, up, &mut watch);
    meter.clear();
    interrupt.tell();
    found.map_err(|error| error.to_string())
}

/// A text map has room for fewer values than the other forms.
fn steps(name: &str, count: usize, as_text: bool) -> Result<usize, String> {
    if as_text && count > MOST_TEXT_STEPS {
        return Err(format!(
            "`{name} {count}`: a map as text has room for `{MOST_TEXT_STEPS}`; ask for `--svg`, `--csv` or `--json`"
        ));
    }
    if count > MOST_STEPS { Err(format!("`{name} {count}`: a map has at most `{MOST_STEPS}`")) } else { Ok(count) }
}

fn index(evaluator: &Evaluator, path: &str) -> Result<usize, String> {
    evaluator.index_of(path).map_err(|error| format!("{error}; it has {}", known(evaluator)))
}

fn known(evaluator: &Evaluator) -> String {
    evaluator.inputs().iter().map(|input| format!("`{}`", input.path)).collect::<Vec<_>>().join(", ")
}

/// The range asked for, in SI; an end that is not stated is the usual one.
fn range(evaluator: &Evaluator, input: usize, ends: &Ends<'_>) -> Result<RangeInclusive<f64>, String> {
    let usual = usual_range(evaluator, input);
    let path = evaluator.inputs().get(input).map_or("", |input| input.path.as_str());
    let (from, to) = (ends.from.0, ends.to.0);
    let end = |stated: &Option<String>, name: &str, usual: Option<f64>| match stated {
        Some(text) => value(evaluator, input, text).map_err(|why| format!("`{name} {text}`: {why}")),
        None => usual.ok_or_else(|| format!("`{path}` has no usual range; state `{from}` and `{to}`")),
    };
    let low = end(ends.from.1, from, usual.as_ref().map(|r| *r.start()))?;
    let high = end(ends.to.1, to, usual.as_ref().map(|r| *r.end()))?;
    if low < high { Ok(low..=high) } else { Err(format!("`{from}` must be below `{to}`")) }
}

fn value(evaluator: &Evaluator, input: usize, text: &str) -> Result<f64, String> {
    let field = evaluator.inputs().get(input).map(|input| input.field).ok_or("no such input")?;
    let dimension = field.dimension.ok_or("not a quantity")?;
    let (value, _) = parse_quantity(text, dimension).map_err(|error| format!("{error}; {}", error.hint()))?;
    let fits = value >= field.least && value <= field.most;
    fits.then_some(value).ok_or_else(|| format!("outside of what {} can be", field.label))
}
