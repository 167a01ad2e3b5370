//! `walk`: a walk-through, on the screen or as text.
use super::exit::Code;
use super::interrupt::Interrupt;
use super::meter::Meter;
use super::options::WalkArgs;
use super::output::{self, PAINT};
use super::run::Failure;
use super::{Next, locate};
use crate::margin::Rules;
use crate::scenario::{Document, LoadError, Walk, load_walk};
use crate::sheet::{Layout, Report, WalkRun, Walked, print, report, report_bands, walk_object, walk_text};
use std::io::IsTerminal;

/// Opens the screen; prints the stops where text or JSON is asked for or there is no terminal.
pub fn walk(args: &WalkArgs) -> Next {
    let walk = match read(args) {
        Ok(walk) => walk,
        Err(failure) => {
            failure.print();
            return Next::Exit(failure.code());
        }
    };
    let on_terminal = std::io::stdout().is_terminal() && std::io::stdin().is_terminal();
    if args.text || args.json || !on_terminal {
        return Next::Exit(tell(args, walk));
    }
    Next::Walk { path: args.file.clone(), units: args.units.system() }
}

/// The walk with limits that are known at every stop.
fn read(args: &WalkArgs) -> Result<Walk, Failure> {
    let walk = load_walk(&args.file).map_err(|error| match error {
        LoadError::Refused(faults) => Failure::Refused(faults),
        unreadable @ LoadError::Unreadable { .. } => Failure::Unreadable(unreadable.to_string()),
    })?;
    let start = &walk.start;
    Rules::of(start.scenario()).map_err(|unknown| {
        Failure::Refused(locate::unknown_basis(&start.path().display().to_string(), start.text(), &unknown))
    })?;
    for (stop, number) in walk.stops.iter().zip(1..) {
        Rules::of(stop.document.scenario()).map_err(|unknown| {
            let nearest = unknown.nearest.map(|name| format!("did you mean `{name}`? ")).unwrap_or_default();
            let hint = format!("{nearest}`underfoot limits` lists the sets");
            Failure::Refused(walk.refused_at(number, unknown.to_string(), "expected a built-in set or `own`", hint))
        })?;
    }
    Ok(walk)
}

fn tell(args: &WalkArgs, walk: Walk) -> Code {
    let interrupt = Interrupt::listen();
    let mut runs = Vec::with_capacity(walk.stops.len() + 1);
    for at in 0..=walk.stops.len() {
        if interrupt.is_pressed() {
            break;
        }
        runs.push(run(walk.state(at), &interrupt));
    }
    let walked = Walked { walk, runs };
    let text = if args.json {
        print(&walk_object(&walked), Layout::Lines)
    } else {
        walk_text(&walked, args.units.system(), PAINT)
    };
    output::results(&text);
    if interrupt.is_pressed() {
        interrupt.tell();
        return Code::Interrupted;
    }
    code(&walked)
}

fn code(walked: &Walked) -> Code {
    let is_open = |run: &WalkRun| matches!(run, WalkRun::Open(_));
    if walked.runs.iter().any(is_open) { Code::NotComputed } else { Code::from(walked.verdict()) }
}

fn run(document: &Document, interrupt: &Interrupt) -> WalkRun {
    let file = document.path().display().to_string();
    let judged = report(&file, document.text(), document.scenario()).map_err(|error| error.to_string());
    match judged.and_then(|typical| Ok((with_bands(&typical, interrupt)?, typical))) {
        Ok((joint, typical)) => WalkRun::Judged { typical: Box::new(typical), joint: Box::new(joint) },
        Err(why) => WalkRun::Open(why),
    }
}

fn with_bands(typical: &Report, interrupt: &Interrupt) -> Result<Report, String> {
    let meter = Meter::new();
    let found = report_bands(typical, &|progress| interrupt.watch(&meter, progress));
    meter.clear();
    let mut joint = typical.clone();
    let put = found.and_then(|bands| bands.map_or(Ok(()), |bands| joint.add_bands(bands)));
    put.map_err(|error| error.to_string())?;
    Ok(joint)
}
