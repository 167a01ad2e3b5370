//! The annotated file that `underfoot new` prints.
use super::field::{Field, Need};
use super::keys::FIELDS;

/// Optional keys that stand in the new file as keys and not as comments.
const SHOWN: &[&str] = &[
    "title",
    "datum",
    "subject.attachment_above_feet",
    "subject.stretch_allowance",
    "place.standing",
    "place.anchor",
    "line.length",
    "line.stiffness",
    "line.damping_ratio",
    "line.strength",
    "absorber.deploy_force",
    "absorber.stroke",
    "absorber.rated_mass",
    "absorber.rated_free_fall",
    "anchor.capacity",
    "obstacle.*.reserve",
    "limits.basis",
];

/// Sections that stand in the new file as comments.
const OPTIONAL_SECTIONS: &[&str] =
    &["place.edge", "fall", "harness", "anchor.span", "anchor.span.absorber", "face.*", "accept.*", "study"];

/// Sections that stand in the new file as one key with a table in braces.
const IN_ONE_LINE: &[&str] = &["line.rated_impact", "line.static_elongation"];

/// Longest line of the new file; a longer note stands above its key.
const LONGEST_LINE: usize = 116;

/// An annotated scenario that reads without a fault.
#[must_use]
pub fn new_file() -> String {
    let mut text = String::from(
        "# A scenario: who falls, from where, on what, and what must not be touched.\n\
         # Every number carries its unit; a band is \"80..100..120 kg\". Lines behind # are choices.\n\n",
    );
    let mut sections = vec![""];
    for field in FIELDS {
        let own = field.path.rsplit_once('.').map_or("", |(section, _)| section);
        if !sections.contains(&own) {
            sections.push(own);
            text.push_str(&header(own));
        }
        text.push_str(&key_line(field, own));
    }
    text
}

/// `[line]`, `[[obstacle]]`, or a comment for a section that is a choice.
fn header(section: &str) -> String {
    match section {
        "obstacle.*" => "\n[[obstacle]]\n".to_owned(),
        "face.*" => "\n# [[face]]\n".to_owned(),
        "accept.*" => "\n# [[accept]]\n".to_owned(),
        section if IN_ONE_LINE.contains(&section) => {
            let key = section.trim_start_matches("line.");
            format!("# {key} = {{ {} }}  # instead\n", members(section))
        }
        section if OPTIONAL_SECTIONS.contains(&section) => format!("\n# [{section}]\n"),
        section => format!("\n[{section}]\n"),
    }
}

/// `force = "9 kN", mass = "80 kg"`.
fn members(section: &str) -> String {
    let inside = |field: &&Field| field.path.strip_prefix(section).is_some_and(|rest| rest.starts_with('.'));
    FIELDS
        .iter()
        .filter(inside)
        .map(|field| format!("{} = {}", field.key(), field.example))
        .collect::<Vec<_>>()
        .join(", ")
}

fn key_line(field: &Field, section: &str) -> String {
    if IN_ONE_LINE.contains(&section) {
        return String::new();
    }
    if field.path == "line.kind" {
        let note = format!("{}: {}", field.doc, field.words.join(", "));
        return format!("# {note}\n{} = {}\n", field.key(), field.example);
    }
    let shown = SHOWN.contains(&field.path)
        || field.need == Need::Always
        || (field.need == Need::InSection && !OPTIONAL_SECTIONS.contains(&section));
    let mark = if shown { "" } else { "# " };
    let note = match (field.path, field.need) {
        ("anchor.kind", _) => "; fixed, sprung or span".to_owned(),
        ("place.edge.offset", _) => "; between place.anchor_offset and 0".to_owned(),
        ("fall.free_fall", _) => "; instead of place.anchor".to_owned(),
        ("line.modulus", _) => "; instead of stiffness".to_owned(),
        (_, Need::Default(default)) if default != "none" => format!("; {default} if absent"),
        _ => String::new(),
    };
    let example = match (section, field.key()) {
        ("limits", key) if key != "basis" => format!("{{ value = {}, why = \"\" }}", field.example),
        _ => field.example.to_owned(),
    };
    let pair = format!("{mark}{} = {example}", field.key());
    let line = format!("{pair:<46}  # {}{note}\n", field.doc);
    if line.len() <= LONGEST_LINE { line } else { format!("# {}{note}\n{pair}\n", field.doc) }
}
