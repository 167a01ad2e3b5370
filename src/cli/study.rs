//! `compare`, `vary` and `remedy`: many runs, each well under a second.
use super::exit::Code;
use super::interrupt::Interrupt;
use super::options::{CompareArgs, RemedyArgs, VaryArgs};
use super::output::{self, PAINT};
use super::run::{load_and_judge, load_and_report};
use crate::margin::worst;
use crate::quantity::parse_quantity;
use crate::sheet::{
    CAUTION_LINE, Layout, compare_object, compare_text, comparison, print, remedy_object, remedy_text, vary_csv,
    vary_text,
};
use crate::study::{Evaluator, StudyError, remedies, usual_range, vary};
use std::ops::RangeInclusive;

/// Prints what differs between two files.
pub fn compare(args: &CompareArgs) -> Code {
    let interrupt = Interrupt::listen();
    let both = (load_and_judge(&args.first, &interrupt), load_and_judge(&args.second, &interrupt));
    let ((a_file, a), (b_file, b)) = match both {
        (Ok(a), Ok(b)) => (a, b),
        (a, b) => {
            let failures: Vec<_> = [a.err(), b.err()].into_iter().flatten().collect();
            failures.iter().for_each(super::run::Failure::print);
            return failures.iter().map(super::run::Failure::code).max().unwrap_or(Code::WrongInput);
        }
    };
    let found = comparison((&a_file.text, &a), (&b_file.text, &b));
    let text = if args.json {
        print(&compare_object(&found, &a, &b), Layout::Lines)
    } else {
        compare_text(&found, &a, &b, args.units.system(), PAINT)
    };
    output::results(&text);
    if interrupt.is_pressed() {
        interrupt.tell();
        return Code::Interrupted;
    }
    if found.is_worse() { Code::NotHeld } else { Code::Holds }
}

/// Prints one input across a range.
pub fn vary_one(args: &VaryArgs) -> Code {
    let (_, report) = match load_and_report(&args.file) {
        Ok(both) => both,
        Err(failure) => {
            failure.print();
            return failure.code();
        }
    };
    let evaluator = match Evaluator::new(&report.scenario) {
        Ok(evaluator) => evaluator,
        Err(error) => return refused(&error.to_string()),
    };
    let input = match evaluator.index_of(&args.over) {
        Ok(input) => input,
        Err(error) => return refused(&format!("{error}; it has {}", known(&evaluator))),
    };
    let found = match range(&evaluator, input, args).map(|range| vary(&evaluator, input, range, args.steps)) {
        Ok(Ok(found)) => found,
        Ok(Err(error)) => return refused(&error.to_string()),
        Err(message) => return refused(&message),
    };
    if args.csv {
        output::message(CAUTION_LINE);
        match vary_csv(&evaluator, &found) {
            Ok(text) => output::results(&text),
            Err(error) => return refused(&error.to_string()),
        };
    } else {
        output::results(&vary_text(&report, &evaluator, &found, args.units.system(), PAINT));
    }
    Code::from(worst(found.rows.iter().map(|row| worst(row.run.checks.iter().map(|check| check.verdict)))))
}

fn refused(message: &str) -> Code {
    output::message(message);
    Code::WrongInput
}

fn known(evaluator: &Evaluator) -> String {
    evaluator.inputs().iter().map(|input| format!("`{}`", input.path)).collect::<Vec<_>>().join(", ")
}

/// The range asked for, in SI; an end that is not stated is the usual one.
fn range(evaluator: &Evaluator, input: usize, args: &VaryArgs) -> Result<RangeInclusive<f64>, String> {
    let usual = usual_range(evaluator, input);
    let end = |stated: &Option<String>, name: &str, usual: Option<f64>| match stated {
        Some(text) => value(evaluator, input, text).map_err(|why| format!("`{name} {text}`: {why}")),
        None => usual.ok_or_else(|| format!("`{}` has no usual range; state `--from` and `--to`", args.over)),
    };
    let low = end(&args.from, "--from", usual.as_ref().map(|r| *r.start()))?;
    let high = end(&args.to, "--to", usual.as_ref().map(|r| *r.end()))?;
    if low < high { Ok(low..=high) } else { Err("`--from` must be below `--to`".to_owned()) }
}

fn value(evaluator: &Evaluator, input: usize, text: &str) -> Result<f64, String> {
    let field = evaluator.inputs().get(input).map(|input| input.field).ok_or("no such input")?;
    let dimension = field.dimension.ok_or("not a quantity")?;
    let (value, _) = parse_quantity(text, dimension).map_err(|error| format!("{error}; {}", error.hint()))?;
    let fits = value >= field.least && value <= field.most;
    fits.then_some(value).ok_or_else(|| format!("outside of what {} can be", field.label))
}

/// Prints the nearest values at which every check holds.
pub fn remedy(args: &RemedyArgs) -> Code {
    let (_, report) = match load_and_report(&args.file) {
        Ok(both) => both,
        Err(failure) => {
            failure.print();
            return failure.code();
        }
    };
    let found = Evaluator::new(&report.scenario).and_then(|evaluator| remedies(&evaluator));
    match found {
        Ok(found) => {
            let text = if args.json {
                print(&remedy_object(&report, &found), Layout::Lines)
            } else {
                remedy_text(&report, &found, PAINT)
            };
            output::results(&text);
            Code::from(found.today)
        }
        Err(StudyError::Basis(error)) => refused(&error.to_string()),
        Err(error) => {
            output::message(&error.to_string());
            Code::NotComputed
        }
    }
}
