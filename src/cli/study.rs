//! `compare` and `remedy`.
use super::exit::Code;
use super::interrupt::Interrupt;
use super::meter::Meter;
use super::options::{CompareArgs, RemedyArgs, Units};
use super::output::{self, PAINT};
use super::run::{load_and_judge, load_and_report};
use crate::sheet::{Layout, compare_object, compare_text, comparison, print, remedy_object, remedy_text};
use crate::study::{Evaluator, Held, StudyError, Wanted, remedies_of};

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

pub(super) fn refused(message: &str) -> Code {
    output::message(message);
    Code::WrongInput
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
    let held = if args.worst { Held::Worst } else { Held::Typical };
    let wanted = Wanted { held, pairs: args.pairs };
    let (interrupt, meter) = (Interrupt::listen(), Meter::new());
    let watch = |progress| interrupt.watch(&meter, progress);
    let found = Evaluator::new(&report.scenario).and_then(|evaluator| remedies_of(&evaluator, wanted, &watch));
    meter.clear();
    match found {
        Ok(found) => {
            let text = if args.json {
                print(&remedy_object(&report, &found), Layout::Lines)
            } else {
                remedy_text(&report, &found, args.units.map(Units::system), PAINT)
            };
            output::results(&text);
            interrupt.tell();
            if interrupt.is_pressed() { Code::Interrupted } else { Code::from(found.today) }
        }
        Err(StudyError::Basis(error)) => refused(&error.to_string()),
        Err(error) => {
            output::message(&error.to_string());
            Code::NotComputed
        }
    }
}
