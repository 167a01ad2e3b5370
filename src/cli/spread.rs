//! `spread`: what the bands do, and which input matters.
use super::exit::Code;
use super::interrupt::Interrupt;
use super::meter::Meter;
use super::options::SpreadArgs;
use super::output::{self, PAINT};
use super::run::{Failure, load_and_report};
use crate::sheet::{CAUTION_LINE, Layout, Report, SpreadSheet, print, spread_csv, spread_object, spread_text};
use crate::study::{CheckRanking, Evaluator, Sampling, StudyError, Watch, bands, ranked};

/// Prints the spread of one file; Ctrl-C prints what there is.
pub fn spread(args: &SpreadArgs) -> Code {
    let mut report = match load_and_report(&args.file) {
        Ok((_, report)) => report,
        Err(failure) => return refused(&failure),
    };
    let interrupt = Interrupt::listen();
    let meter = Meter::new();
    let studied = studied(&mut report, args, &|progress| interrupt.watch(&meter, progress));
    meter.clear();
    let (evaluator, ranking) = match studied {
        Ok(studied) => studied,
        Err(error) => {
            return refused(&Failure::NotComputed { file: report.file, reason: error.to_string() });
        }
    };
    let sheet = SpreadSheet { report: &report, evaluator: &evaluator, ranking: &ranking };
    match rendered(&sheet, args) {
        Ok(text) => output::results(&text),
        Err(error) => return refused(&Failure::NotComputed { file: report.file.clone(), reason: error.to_string() }),
    };
    if interrupt.is_pressed() {
        interrupt.tell();
        return Code::Interrupted;
    }
    Code::from(report.verdict)
}

fn refused(failure: &Failure) -> Code {
    failure.print();
    failure.code()
}

/// Searches, samples and ranks as far as it is let; the bands go into the report.
fn studied(
    report: &mut Report,
    args: &SpreadArgs,
    watch: &Watch<'_>,
) -> Result<(Evaluator, Vec<CheckRanking>), StudyError> {
    let evaluator = Evaluator::new(&report.scenario)?;
    let stated = Sampling::of(&report.scenario);
    let sampling = Sampling { samples: args.samples.unwrap_or(stated.samples), seed: args.seed.unwrap_or(stated.seed) };
    let Some(found) = bands(&evaluator, sampling, watch)? else { return Ok((evaluator, Vec::new())) };
    let partial = found.is_partial();
    report.add_bands(found)?;
    let ranking = if partial { Vec::new() } else { ranked(&evaluator, sampling, watch)? };
    Ok((evaluator, ranking))
}

fn rendered(sheet: &SpreadSheet<'_>, args: &SpreadArgs) -> Result<String, csv::Error> {
    if args.json {
        return Ok(print(&spread_object(sheet), Layout::Lines));
    }
    if args.csv {
        output::message(CAUTION_LINE);
        return spread_csv(sheet);
    }
    Ok(spread_text(sheet, args.units.system(), PAINT))
}
