//! From the text of a walk-through to its stops, collecting every fault.
use super::read::{MOST_BYTES, with_syntax};
use super::values::{nearest, quoted};
use super::walk::{WALK_VIEWS, Walk};
use super::walk_apply::{self, RawChange, RawStop};
use super::{Document, Fault, Faults, LoadError, Severity};
use std::ops::Range;
use std::path::Path;
use toml::Spanned;
use toml::de::{DeTable, DeValue};

type Value<'i> = Spanned<DeValue<'i>>;

/// Most stops of one walk.
const MOST_STOPS: usize = 200;
/// Most changes at one stop.
const MOST_CHANGES: usize = 32;
/// Longest sentence, characters: it must stand whole on a screen of 80 columns.
const LONGEST_SAY: usize = 200;

const TOP: [&str; 3] = ["title", "scenario", "stop"];
const STOP: [&str; 5] = ["say", "input", "value", "change", "view"];
const CHANGE: [&str; 2] = ["input", "value"];

/// Reads the text of a walk-through; the path of its scenario is taken from `folder`.
///
/// # Errors
/// Every fault of the text at once, sorted by place, also those that the changes would make in the scenario.
pub fn read_walk(file: &str, folder: &Path, text: &str) -> Result<Walk, Faults> {
    read(file, folder, text, None)
}

/// As [`read_walk`]; a scenario that is known is not read again.
pub(super) fn read(file: &str, folder: &Path, text: &str, known: Option<Document>) -> Result<Walk, Faults> {
    let mut reader = Reader::default();
    if text.len() > MOST_BYTES {
        let hint = "a walk-through is a few kilobytes of text";
        reader.fault(0..0, format!("the file has {} bytes, more than 1 MiB", text.len()), "too large", hint);
        return Err(Faults::new(file, "", reader.faults));
    }
    let (document, syntax) = DeTable::parse_recoverable(text);
    if !syntax.is_empty() {
        return Err(Faults::new(file, text, with_syntax(text, &syntax, Vec::new())));
    }
    let top = reader.top(text, document.get_ref());
    let start = match known {
        Some(document) => Some(document),
        None => top.scenario.and_then(|(name, at)| reader.open(folder, &name, at)),
    };
    let Some(start) = start else { return Err(Faults::new(file, text, reader.faults)) };
    let (stops, faults) = walk_apply::apply(text, &start, top.stops);
    reader.faults.extend(faults);
    if !reader.faults.is_empty() {
        return Err(Faults::new(file, text, reader.faults));
    }
    let (file, text) = (file.to_owned(), text.to_owned());
    Ok(Walk { file, folder: folder.to_owned(), text, title: top.title, start, stops })
}

/// What stands at the top of the file.
#[derive(Default)]
struct Top {
    title: Option<String>,
    scenario: Option<(String, Range<usize>)>,
    stops: Vec<RawStop>,
}

#[derive(Default)]
struct Reader {
    faults: Vec<Fault>,
}

impl Reader {
    fn fault(&mut self, span: Range<usize>, message: String, expected: &str, hint: &str) {
        let (expected, hint) = (expected.to_owned(), Some(hint.to_owned()));
        self.faults.push(Fault { severity: Severity::Error, span, message, expected, hint });
    }

    fn top(&mut self, text: &str, table: &DeTable<'_>) -> Top {
        let mut top = Top::default();
        let (mut has_scenario, mut has_stops) = (false, false);
        for (key, value) in table {
            match self.key(key.get_ref(), &key.span(), &TOP, "a walk-through") {
                Some("title") => top.title = self.words("title", value).map(|(title, _)| title),
                Some("scenario") => {
                    has_scenario = true;
                    top.scenario = self.words("scenario", value);
                }
                Some(_) => {
                    has_stops = true;
                    top.stops = self.stops(&key.span(), value);
                }
                None => {}
            }
        }
        let end = text.trim_end().len();
        if !has_scenario {
            let hint =
                "add `scenario = \"../roof.toml\"`: the file it leads through, seen from the folder of this file";
            self.fault(end..end, "`scenario` is missing".into(), "expected `scenario`", hint);
        }
        if !has_stops {
            let hint =
                "add a line `[[stop]]` and below it `say = \"..\"`, with `input` and `value` where one is changed";
            self.fault(end..end, "there is no stop".into(), "expected [[stop]]", hint);
        }
        top
    }

    /// The key that is meant; a slip of the pen is noted and goes on as what was probably meant.
    fn key(&mut self, name: &str, at: &Range<usize>, known: &[&'static str], of: &str) -> Option<&'static str> {
        if let Some(key) = known.iter().find(|key| **key == name) {
            return Some(key);
        }
        let near = nearest(name, known.iter().copied());
        let list = known.join("`, `");
        let hint = match near {
            Some(near) => format!("did you mean `{near}`? {of} holds `{list}`"),
            None if super::FIELDS.iter().any(|field| field.path.split('.').next() == Some(name)) => {
                format!("`{name}` belongs into the scenario file that `scenario` names; {of} holds `{list}`")
            }
            None => format!("{of} holds `{list}`"),
        };
        self.fault(at.clone(), format!("unknown key {} in {of}", quoted(name)), "not a key of this file format", &hint);
        near
    }

    /// A text in quotes that says something.
    fn words(&mut self, key: &str, value: &Value<'_>) -> Option<(String, Range<usize>)> {
        match value.get_ref().as_str() {
            Some(words) if !words.trim().is_empty() => Some((words.to_owned(), value.span())),
            Some(_) => {
                self.fault(value.span(), format!("`{key}` is blank"), "expected words", "write what belongs there");
                None
            }
            None => {
                let message = format!("`{key}` cannot be of type {}", value.get_ref().type_str());
                self.fault(
                    value.span(),
                    message,
                    "expected text in quotes",
                    &format!("write it like `{key} = \"..\"`"),
                );
                None
            }
        }
    }

    /// Reads the scenario that the walk leads through.
    fn open(&mut self, folder: &Path, name: &str, at: Range<usize>) -> Option<Document> {
        match Document::open(&folder.join(name)) {
            Ok(document) => Some(document),
            Err(LoadError::Unreadable { reason, .. }) => {
                let message = format!("the scenario {} cannot be read: {reason}", quoted(name));
                let hint = "the path is taken from the folder of this file";
                self.fault(at, message, "expected a scenario file", hint);
                None
            }
            Err(LoadError::Refused(faults)) => {
                let first = faults.rows().into_iter().next();
                let first =
                    first.map_or_else(String::new, |row| format!(", the first in line {}: {}", row.line, row.message));
                let message = format!("the scenario {} has {} fault(s){first}", quoted(name), faults.faults.len());
                let hint = "`underfoot run` on that file lists them all; put them right there";
                self.fault(at, message, "expected a scenario without faults", hint);
                None
            }
        }
    }

    fn stops(&mut self, at: &Range<usize>, value: &Value<'_>) -> Vec<RawStop> {
        let hint = "write each stop below a line `[[stop]]` of its own";
        let Some(list) = value.get_ref().as_array() else {
            self.fault(at.clone(), "`stop` is not a list".into(), "expected [[stop]]", hint);
            return Vec::new();
        };
        if list.iter().next().is_none() {
            self.fault(value.span(), "there is no stop".into(), "expected [[stop]]", hint);
        }
        let mut stops = Vec::new();
        for (index, entry) in list.iter().enumerate() {
            if index == MOST_STOPS {
                let message = format!("more than {MOST_STOPS} stops");
                self.fault(entry.span(), message, "one too many", "part the walk into several files");
                break;
            }
            if let Some(table) = entry.get_ref().as_table() {
                stops.push(self.stop(index + 1, entry.span(), table));
            } else {
                self.fault(entry.span(), format!("stop {} holds no keys", index + 1), "expected [[stop]]", hint);
            }
        }
        stops
    }

    fn stop(&mut self, number: usize, at: Range<usize>, table: &DeTable<'_>) -> RawStop {
        let mut stop = RawStop { number, at: at.clone(), ..RawStop::default() };
        let (mut own, mut has_say, mut list_at) = (RawChange::default(), false, None);
        for (key, value) in table {
            match self.key(key.get_ref(), &key.span(), &STOP, "a stop") {
                Some("say") => {
                    has_say = true;
                    stop.say = self.say(value);
                }
                Some("input") => own.input = self.words("input", value),
                Some("value") => own.value = self.value(value),
                Some("view") => stop.view = self.view(value),
                Some(_) => {
                    list_at = Some(key.span());
                    stop.changes = self.changes(number, value);
                }
                None => {}
            }
        }
        if !has_say {
            let hint = "add `say = \"..\"`: the sentence that stands on the screen";
            self.fault(at, format!("stop {number} says nothing"), "expected `say`", hint);
        }
        let stands = ["input", "value"].map(|key| table.keys().any(|own| own.get_ref() == key));
        match (list_at, stands) {
            (_, [false, false]) => {}
            (Some(list_at), _) => {
                let message = format!("stop {number} has both `input` with `value` and `change`");
                self.fault(list_at, message, "one of the two ways", "put all changes of a stop into `change`");
            }
            (None, stands) => stop.changes.extend(self.pair(number, own, stands)),
        }
        stop
    }

    /// `input` and `value`, which stand together.
    fn pair(&mut self, number: usize, change: RawChange, stands: [bool; 2]) -> Option<RawChange> {
        let (stands, missing, hint) = match stands {
            [true, true] => return Some(change).filter(|change| change.input.is_some() && change.value.is_some()),
            [true, false] => ("input", "value", "add `value = \"..\"`, as it would stand in the scenario"),
            _ => ("value", "input", "add `input = \"line.stiffness\"`: the path of what is changed"),
        };
        let at = change.input.or(change.value).map_or(0..0, |(_, at)| at);
        let message = format!("stop {number} has `{stands}` without `{missing}`");
        self.fault(at, message, &format!("expected `{missing}` beside it"), hint);
        None
    }

    fn changes(&mut self, number: usize, value: &Value<'_>) -> Vec<RawChange> {
        let hint = "write `change = [{ input = \"line.length\", value = \"2 m\" }, ..]`";
        let Some(list) = value.get_ref().as_array() else {
            self.fault(value.span(), format!("`change` of stop {number} is not a list"), "expected a list", hint);
            return Vec::new();
        };
        if !(1..=MOST_CHANGES).contains(&list.len()) {
            let message = format!("stop {number} has {} changes", list.len());
            self.fault(value.span(), message, &format!("expected 1 to {MOST_CHANGES}"), hint);
            return Vec::new();
        }
        list.iter().filter_map(|entry| self.change(number, entry)).collect()
    }

    fn change(&mut self, number: usize, entry: &Value<'_>) -> Option<RawChange> {
        let Some(table) = entry.get_ref().as_table() else {
            let hint = "write it like `{ input = \"line.length\", value = \"2 m\" }`";
            self.fault(
                entry.span(),
                format!("a change of stop {number} is not a pair"),
                "expected input and value",
                hint,
            );
            return None;
        };
        let mut change = RawChange::default();
        let mut stands = [false; 2];
        for (key, value) in table {
            match self.key(key.get_ref(), &key.span(), &CHANGE, "a change") {
                Some("input") => {
                    stands[0] = true;
                    change.input = self.words("input", value);
                }
                Some(_) => {
                    stands[1] = true;
                    change.value = self.value(value);
                }
                None => {}
            }
        }
        if stands == [false; 2] { None } else { self.pair(number, change, stands) }
    }

    fn say(&mut self, value: &Value<'_>) -> Option<String> {
        let (words, at) = self.words("say", value)?;
        let words = words.split_whitespace().collect::<Vec<_>>().join(" ");
        let length = words.chars().count();
        if length > LONGEST_SAY {
            let message = format!("the sentence has {length} characters");
            let expected = format!("expected at most {LONGEST_SAY}");
            self.fault(at, message, &expected, "it must stand whole on the screen: say less, or make two stops of it");
            return None;
        }
        Some(words)
    }

    /// A value as it would stand in the scenario; a number without quotes is kept as it is written.
    fn value(&mut self, value: &Value<'_>) -> Option<(String, Range<usize>)> {
        match value.get_ref() {
            DeValue::Integer(number) if number.radix() == 10 => Some((number.as_str().to_owned(), value.span())),
            DeValue::Float(number) => Some((number.as_str().to_owned(), value.span())),
            _ => self.words("value", value),
        }
    }

    fn view(&mut self, value: &Value<'_>) -> Option<&'static str> {
        let (word, at) = self.words("view", value)?;
        if let Some(view) = WALK_VIEWS.into_iter().find(|view| *view == word) {
            return Some(view);
        }
        let list = WALK_VIEWS.join("`, `");
        let hint = match nearest(&word, WALK_VIEWS.into_iter()) {
            Some(near) => format!("did you mean `{near}`? known: `{list}`"),
            None => format!("known: `{list}`"),
        };
        self.fault(at, format!("unknown view {}", quoted(&word)), "expected one of the known words", &hint);
        None
    }
}
