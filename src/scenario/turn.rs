//! Changing a word that decides which other keys may stand in the file, such as the kind of the anchor.
use super::{Document, FIELDS, Fault, Faults, Severity, edit, field_for, places, read};
use toml_edit::{DocumentMut, Item};

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
        let mut text = self.text().to_owned();
        for (path, value) in changes {
            text = edit::with_value(&text, &places(&text), path, value)
                .map_err(|message| Faults::new(&file, self.text(), vec![fault(message)]))?;
        }
        let mut taken_out = Vec::new();
        while taken_out.len() < MOST_KEYS {
            let Err(faults) = read(&file, &text) else {
                let document = Self::of_text(self.path(), text)?.on_disk_as(self);
                return Ok(Turn::Done { document: Box::new(document), taken_out });
            };
            if let Some((path, without)) = without_foreign(&text, &faults) {
                text = without;
                taken_out.push(path);
            } else if let Some(path) = faults.faults.iter().find_map(missing) {
                return Ok(Turn::Needs(path));
            } else {
                return Err(faults);
            }
        }
        Err(Faults::new(&file, self.text(), vec![fault(format!("more than {MOST_KEYS} keys do not belong there"))]))
    }
}

fn fault(message: String) -> Fault {
    let hint = Some("choose an input that the file can hold".to_owned());
    Fault { severity: Severity::Error, span: 0..0, message, expected: "cannot be set".into(), hint }
}

/// The path of a key that a fault says is missing.
fn missing(fault: &Fault) -> Option<String> {
    let (path, rest) = fault.message.strip_prefix('`')?.split_once('`')?;
    (rest.starts_with(" is missing") && field_for(path).is_some()).then(|| path.to_owned())
}

/// The text without the first key that a fault says does not belong there.
fn without_foreign(text: &str, faults: &Faults) -> Option<(String, String)> {
    let places = places(text);
    let foreign = faults.faults.iter().filter(|fault| fault.message.contains("` does not belong to a "));
    foreign.into_iter().find_map(|fault| {
        let path = FIELDS
            .iter()
            .map(|field| field.path)
            .find(|path| places.exactly(path).is_some_and(|span| span == fault.span))?;
        Some((path.to_owned(), without(text, path)?))
    })
}

/// The text without one key and the comment on its line.
fn without(text: &str, path: &str) -> Option<String> {
    let mut document: DocumentMut = text.parse().ok()?;
    let mut at: &mut Item = document.as_item_mut();
    let (section, key) = path.rsplit_once('.')?;
    for part in section.split('.') {
        at = at.as_table_like_mut()?.get_mut(part)?;
    }
    at.as_table_like_mut()?.remove(key)?;
    let edited = document.to_string();
    Some(if text.contains("\r\n") { edited.replace("\r\n", "\n").replace('\n', "\r\n") } else { edited })
}
