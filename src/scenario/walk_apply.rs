//! The changes of a walk-through made one stop after the other; every refusal is a fault of the walk's own text.
use super::field::{Field, field_for};
use super::leaf::{inner_span, parse};
use super::values::{nearest, quoted};
use super::walk::{Stop, StopChange, stated};
use super::{Document, FIELDS, Fault, Faults, Severity, Turn, places};
use std::ops::Range;

/// A text with its place.
type Placed = (String, Range<usize>);

/// A stop as its file states it.
#[derive(Default)]
pub(super) struct RawStop {
    /// From 1.
    pub number: usize,
    pub at: Range<usize>,
    pub say: Option<String>,
    pub changes: Vec<RawChange>,
    pub view: Option<&'static str>,
}

/// A change as its file states it.
#[derive(Default)]
pub(super) struct RawChange {
    pub input: Option<Placed>,
    pub value: Option<Placed>,
}

/// A change with a known input and a value that is right by itself.
struct Sound<'r> {
    path: &'r str,
    value: &'r str,
    at: Range<usize>,
}

/// The stops with the state at each; a stop that was refused leaves the state as it was, so that what follows is judged
/// as well.
pub(super) fn apply(text: &str, start: &Document, raw: Vec<RawStop>) -> (Vec<Stop>, Vec<Fault>) {
    let mut faults = Vec::new();
    let mut stops: Vec<Stop> = Vec::new();
    for stop in raw {
        let before = stops.last().map_or(start, |stop| &stop.document);
        let sound: Vec<Sound<'_>> = stop.changes.iter().filter_map(|change| sound(text, change, &mut faults)).collect();
        twice(&sound, stop.number, &mut faults);
        let (document, taken_out) =
            changed(before, &sound, &mut faults).unwrap_or_else(|| (before.clone(), Vec::new()));
        let change = |change: &Sound<'_>| StopChange {
            path: change.path.to_owned(),
            before: stated(before, change.path),
            after: stated(&document, change.path).unwrap_or_else(|| change.value.to_owned()),
        };
        let changes = sound.iter().map(change).collect();
        let at = sound.first().map_or(stop.at, |change| change.at.clone());
        let (say, view) = (stop.say.unwrap_or_default(), stop.view);
        stops.push(Stop { say, changes, taken_out, view, document, at });
    }
    (stops, faults)
}

fn fault(span: Range<usize>, message: String, expected: &str, hint: String) -> Fault {
    Fault { severity: Severity::Error, span, message, expected: expected.to_owned(), hint: Some(hint) }
}

fn sound<'r>(text: &str, change: &'r RawChange, faults: &mut Vec<Fault>) -> Option<Sound<'r>> {
    let ((path, path_at), (value, at)) = change.input.as_ref().zip(change.value.as_ref())?;
    let Some(field) = field_for(path) else {
        let hint = match nearest(path, FIELDS.iter().map(|field| field.path)) {
            Some(near) => format!("did you mean `{near}`?"),
            None => "write the path of an input, such as `line.length` or `obstacle.1.top`".to_owned(),
        };
        let message = format!("there is no input {}", quoted(path));
        faults.push(fault(path_at.clone(), message, "not an input of a scenario", hint));
        return None;
    };
    if let Some(wrong) = wrong(text, field, value, at) {
        faults.push(wrong);
        return None;
    }
    Some(Sound { path, value, at: at.clone() })
}

/// What is wrong with the value by itself.
fn wrong(text: &str, field: &Field, value: &str, at: &Range<usize>) -> Option<Fault> {
    let dimension = field.dimension.filter(|_| !field.is_count())?;
    let error = parse(field, dimension, value).err()?;
    let place = inner_span(text, at.clone(), value, error.span());
    Some(fault(place, format!("{}: {error}", field.label), &error.expected(), error.hint()))
}

fn twice(changes: &[Sound<'_>], number: usize, faults: &mut Vec<Fault>) {
    for (index, change) in changes.iter().enumerate() {
        if changes[..index].iter().any(|other| other.path == change.path) {
            let message = format!("stop {number} changes `{}` twice", change.path);
            faults.push(fault(change.at.clone(), message, "the second one", "keep one of them".to_owned()));
        }
    }
}

/// The state after the changes, and what was taken out for them.
fn changed(before: &Document, changes: &[Sound<'_>], faults: &mut Vec<Fault>) -> Option<(Document, Vec<String>)> {
    let first = changes.first()?;
    let pairs: Vec<(&str, &str)> = changes.iter().map(|change| (change.path, change.value)).collect();
    match before.turned(&pairs) {
        Ok(Turn::Done { document, taken_out }) => {
            let Some(lost) = changes.iter().find(|change| taken_out.iter().any(|path| path == change.path)) else {
                return Some((*document, taken_out));
            };
            let message = format!("`{}` does not belong to this scenario here", lost.path);
            let hint = "change the word that decides it, such as `line.kind` or `anchor.kind`, at this stop or before";
            faults.push(fault(lost.at.clone(), message, "has no place here", hint.to_owned()));
        }
        Ok(Turn::Needs(path)) => {
            let example = field_for(&path).map_or("..", |field| field.example);
            let hint = format!("add it to the same stop: `change = [.., {{ input = \"{path}\", value = {example} }}]`");
            let message =
                format!("`{}` as {} needs `{path}`, which the scenario lacks", first.path, quoted(first.value));
            faults.push(fault(first.at.clone(), message, "expected one change more", hint));
        }
        Err(refused) => faults.extend(refused.faults.iter().map(|fault| moved(&refused, fault, changes, first))),
    }
    None
}

/// A fault of the changed scenario at the value of the walk that makes it; the first of the stop where none does alone.
fn moved(refused: &Faults, found: &Fault, changes: &[Sound<'_>], first: &Sound<'_>) -> Fault {
    let places = places(&refused.text);
    let holds = |change: &&Sound<'_>| {
        places.exactly(change.path).is_some_and(|place| place.start <= found.span.start && found.span.end <= place.end)
    };
    let change = changes.iter().find(holds).unwrap_or(first);
    let message = format!("`{}` cannot become {} here: {}", change.path, quoted(change.value), found.message);
    let hint = found.hint.clone().unwrap_or_else(|| "choose a value that the scenario can hold".to_owned());
    fault(change.at.clone(), message, &found.expected, hint)
}
