//! A kind changed together with the keys that belong to it.
use super::Places;
use super::field::field_for;

/// One change of a file's text.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Change {
    /// A key written anew, or added.
    Set {
        /// Concrete path.
        path: String,
        /// The value as it would stand in the file, without quotes.
        value: String,
    },
    /// A key, or a section with all below it, taken out.
    Remove {
        /// Concrete path.
        path: String,
    },
}

/// Keys that one word of a kind needs, and those that it has no use for.
struct Belonging {
    kind: &'static str,
    word: &'static str,
    needs: &'static [&'static str],
    foreign: &'static [&'static str],
}

const fn belonging(
    kind: &'static str,
    word: &'static str,
    needs: &'static [&'static str],
    foreign: &'static [&'static str],
) -> Belonging {
    Belonging { kind, word, needs, foreign }
}

const PLAIN_LINE: &[&str] = &["line.lock_travel", "line.slack", "line.grab_slide"];

const BELONGINGS: &[Belonging] = &[
    belonging("line.kind", "lanyard", &["line.length"], PLAIN_LINE),
    belonging("line.kind", "rope", &["line.length"], PLAIN_LINE),
    belonging("line.kind", "webbing", &["line.length"], PLAIN_LINE),
    belonging("line.kind", "cable", &["line.length"], PLAIN_LINE),
    belonging("line.kind", "vertical", &["line.length", "line.grab_slide"], &["line.lock_travel", "line.slack"]),
    belonging(
        "line.kind",
        "retractable",
        &["line.lock_travel"],
        &["line.length", "line.grab_slide", "absorber.packed_length", "fall.free_fall"],
    ),
    belonging("anchor.kind", "fixed", &[], &["anchor.stiffness", "anchor.damping", "anchor.span"]),
    belonging("anchor.kind", "sprung", &["anchor.stiffness"], &["anchor.span"]),
    belonging(
        "anchor.kind",
        "span",
        &["anchor.span.length", "anchor.span.pretension", "anchor.span.modulus"],
        &["anchor.stiffness", "anchor.damping"],
    ),
];

/// The changes that make a kind another one: the word, the keys that no longer belong to it taken out, and the keys
/// that it needs set to the example of the table where they are absent.
///
/// The examples are values to start from and not those of any equipment: show every `Set` to the user. Kinds of the
/// subject and unknown words change the word alone; the reader says what else is missing.
#[must_use]
pub fn kind_changes(places: &Places, kind: &str, word: &str) -> Vec<Change> {
    let mut changes = Vec::new();
    if let Some(own) = BELONGINGS.iter().find(|own| own.kind == kind && own.word == word) {
        let stands = |path: &&&str| places.exactly(path).is_some();
        changes.extend(own.foreign.iter().filter(stands).map(|path| Change::Remove { path: (*path).to_owned() }));
        for path in own.needs.iter().filter(|path| places.exactly(path).is_none()) {
            let tight = *path == "anchor.span.pretension" && places.exactly("anchor.span.sag").is_some();
            if let (Some(field), false) = (field_for(path), tight) {
                changes
                    .push(Change::Set { path: (*path).to_owned(), value: field.example.trim_matches('"').to_owned() });
            }
        }
    }
    changes.push(Change::Set { path: kind.to_owned(), value: word.to_owned() });
    changes
}
