//! Changing a word that decides which other keys may stand in the file, such as the kind of the anchor.
use super::{Change, Document, FIELDS, Fault, Faults, Field, Need, Places, Severity, edit, field_for, places, read};

/// What came of changing a word.
#[derive(Clone, Debug)]
pub enum Turn {
    /// The file with the word, and with what it needs.
    Done {
        /// The file.
        document: Box<Document>,
        /// Keys that do not belong to the new word and were taken out, by path.
        taken_out: Vec<String>,
    },
    /// The new word needs a value for this key, which the file lacks.
    Needs(String),
}

/// More keys than any one word brings or bans.
const MOST_KEYS: usize = 32;

impl Document {
    /// The word or free text that the file holds at a path, if the key stands in it.
    #[must_use]
    pub fn word(&self, path: &str) -> Option<String> {
        let written = self.text().get(self.places().exactly(path)?)?;
        written.parse::<toml_edit::Value>().ok()?.as_str().map(str::to_owned)
    }

    /// The same file with a word changed and further values set (`anchor.kind` to `sprung`, `anchor.stiffness` to
    /// `500 kN/m`). Keys that do not belong to the new word are taken out and named; a key that it needs is asked for,
    /// never made up. All else stays as with [`Document::with_value`].
    ///
    /// # Errors
    /// The faults the file would have otherwise.
    pub fn turned(&self, changes: &[(&str, &str)]) -> Result<Turn, Faults> {
        let file = self.path().display().to_string();
        let refuse = |message: String| Faults::new(&file, self.text(), vec![fault(message)]);
        let set = |&(path, value): &(&str, &str)| Change::Set { path: path.to_owned(), value: value.to_owned() };
        let changes: Vec<Change> = changes.iter().map(set).collect();
        let mut text = edit::with_changes(self.text(), &changes).map_err(refuse)?;
        let mut taken_out = Vec::new();
        while taken_out.len() < MOST_KEYS {
            let Err(faults) = read(&file, &text) else {
                let document = Self::of_text(self.path(), text)?.on_disk_as(self);
                return Ok(Turn::Done { document: Box::new(document), taken_out });
            };
            if let Some(path) = foreign(&places(&text), &faults) {
                text = edit::with_changes(&text, &[Change::Remove { path: path.to_owned() }]).map_err(refuse)?;
                taken_out.push(path.to_owned());
            } else if let Some(path) = faults.faults.iter().find_map(missing) {
                return Ok(Turn::Needs(path));
            } else {
                return Err(faults);
            }
        }
        Err(refuse(format!("more than {MOST_KEYS} keys do not belong there")))
    }
}

fn fault(message: String) -> Fault {
    let hint = Some("choose an input that the file can hold".to_owned());
    Fault { severity: Severity::Error, span: 0..0, message, expected: "cannot be set".into(), hint }
}

/// The key that a fault says is missing; of a section the first key that it cannot do without.
fn missing(fault: &Fault) -> Option<String> {
    let (path, rest) = fault.message.strip_prefix('`')?.split_once('`')?;
    if !rest.starts_with(" is missing") {
        return None;
    }
    let inside = |field: &&Field| field.need == Need::InSection && parent(field.path) == Some(path);
    let field = field_for(path).is_some().then_some(path);
    field.or_else(|| Some(FIELDS.iter().find(inside)?.path)).map(str::to_owned)
}

/// The first key or section that a fault says does not belong there.
fn foreign(places: &Places, faults: &Faults) -> Option<&'static str> {
    let found = faults.faults.iter().find(|fault| fault.message.contains("` does not belong to a "))?;
    let mut paths = FIELDS.iter().flat_map(|field| [Some(field.path), parent(field.path)]).flatten();
    paths.find(|path| places.exactly(path).is_some_and(|span| span == found.span))
}

fn parent(path: &'static str) -> Option<&'static str> {
    path.rsplit_once('.').map(|(section, _)| section)
}
