//! Which keys must stand together, and which must not.
use super::field::{FIELDS, Field, Need, field_for};
use super::values::{Values, quoted};
use std::collections::BTreeMap;
use std::ops::Range;

/// The ways to state how a line stretches.
pub(super) const STRETCH_LAWS: [&str; 4] =
    ["line.stiffness", "line.modulus", "line.rated_impact", "line.static_elongation"];

/// Notes every missing key and every pair that contradicts itself.
pub(super) fn check(text: &str, values: &mut Values) {
    needed(text, values);
    fall(text, values);
    line(text, values);
    subject(text, values);
    anchor(text, values);
    obstacles(values);
    limits(values);
}

/// Where to add a key: at its section's name, else at the end of the file.
fn place_for(text: &str, values: &Values, path: &str) -> Range<usize> {
    let section = path.rsplit_once('.').and_then(|(section, _)| values.spans.get(section).cloned());
    section.unwrap_or_else(|| {
        let end = text.trim_end().len();
        end..end
    })
}

fn missing(text: &str, values: &mut Values, path: &str, because: &str) {
    let Some(field) = field_for(path) else { return };
    let span = place_for(text, values, path);
    let section = path.rsplit_once('.').map_or("", |(section, _)| section);
    let shown = if values.has(section) || section.is_empty() { field.key().to_owned() } else { path.to_owned() };
    let hint = format!("add `{shown} = {}`: {}", field.example, field.doc);
    values.error(span, format!("`{path}` is missing{because}"), &format!("expected `{}`", field.key()), Some(hint));
}

fn needed(text: &str, values: &mut Values) {
    for field in FIELDS.iter().filter(|field| field.ready) {
        match field.need {
            Need::Always if !values.has(field.path) => missing(text, values, field.path, ""),
            Need::InSection => in_section(text, values, field),
            _ => {}
        }
    }
}

fn in_section(text: &str, values: &mut Values, field: &Field) {
    let paths: Vec<String> = match field.path.strip_prefix("obstacle.*") {
        Some(rest) => (1..=values.obstacles).map(|n| format!("obstacle.{n}{rest}")).collect(),
        None => vec![field.path.to_owned()],
    };
    for path in paths {
        let section = path.rsplit_once('.').map_or("", |(section, _)| section).to_owned();
        if values.has(&section) && !values.has(&path) {
            missing(text, values, &path, "");
        }
    }
}

/// Exactly one way to the free-fall distance.
fn fall(text: &str, values: &mut Values) {
    let (stated, anchor) = (values.has("fall.free_fall"), values.has("place.anchor"));
    if stated {
        for path in ["place.anchor", "place.anchor_offset"] {
            if let Some(span) = values.spans.get(path).cloned() {
                let hint =
                    Some(format!("state either `fall.free_fall` or the elevations; take out one of them (`{path}`)"));
                let message = format!("`{path}` would give the free fall that `fall.free_fall` states");
                values.error(span, message, "two ways to one number", hint);
            }
        }
    } else if anchor && !values.has("place.standing") {
        missing(text, values, "place.standing", ", `place.anchor` alone gives no free fall");
    } else if !anchor {
        let span = place_for(text, values, "fall.free_fall");
        let hint = "add `[fall]` with `free_fall = \"1.8 m\"`, or `[place]` with `standing` and `anchor`".to_owned();
        let message = "nothing says how far the subject falls free".to_owned();
        values.error(span, message, "expected `fall.free_fall` or `place.anchor`", Some(hint));
    }
    let offset = values.measures.get("place.anchor_offset").map(|measure| measure.band);
    if let (Some(band), Some(span)) = (offset, values.spans.get("place.anchor_offset").cloned())
        && (band.low != 0.0 || band.high != 0.0)
    {
        values.later(span, "`place.anchor_offset` other than `0 m`");
    }
}

fn line(text: &str, values: &mut Values) {
    let laws: Vec<&str> = STRETCH_LAWS.into_iter().filter(|path| values.has(path)).collect();
    if laws.is_empty() && values.faults.iter().all(|fault| !fault.message.contains("line.curve")) {
        let span = place_for(text, values, "line.stiffness");
        let hint = format!("add one of `{}`, such as `stiffness = \"60 kN/m\"`", STRETCH_LAWS.join("`, `"));
        values.error(span, "nothing says how the line stretches".into(), "expected one stretch law", Some(hint));
    }
    for second in laws.iter().skip(1) {
        let span = values.spans.get(*second).cloned().unwrap_or(0..0);
        let message = format!("`{second}` and `{}` both say how the line stretches", laws[0]);
        values.error(span, message, "expected one stretch law", Some("keep one of them".to_owned()));
    }
    if values.has("line.damping") && values.has("line.damping_ratio") {
        let span = values.spans.get("line.damping_ratio").cloned().unwrap_or(0..0);
        let message = "`line.damping_ratio` and `line.damping` both say how the line damps".to_owned();
        values.error(span, message, "expected one damping", Some("keep one of them".to_owned()));
    }
    let wants_length = [
        ("place.anchor", ", `place.anchor` needs it for the free fall"),
        ("line.modulus", ", `line.modulus` needs it for the stiffness"),
        ("line.rated_impact", ", `line.rated_impact` needs it for the stiffness"),
        ("line.static_elongation", ", `line.static_elongation` needs it for the stiffness"),
        ("absorber.packed_length", ", `absorber.packed_length` is a part of it"),
    ];
    if let Some((_, because)) = wants_length.iter().find(|(path, _)| values.has(path))
        && !values.has("line.length")
    {
        missing(text, values, "line.length", because);
    }
}

/// Keys that belong to one kind of subject.
fn subject(text: &str, values: &mut Values) {
    let kind = values.words.get("subject.kind").cloned().unwrap_or_default();
    let (own, foreign): (&str, &[&str]) = match kind.as_str() {
        "person" => ("subject.attachment_above_feet", &["subject.underside_below_attachment"]),
        "load" => (
            "subject.underside_below_attachment",
            &["subject.attachment_above_feet", "subject.stretch_allowance", "subject.body_factor"],
        ),
        _ => return,
    };
    for path in foreign {
        if let Some(span) = values.spans.get(*path).cloned() {
            let key = path.rsplit('.').next().unwrap_or(path);
            let message = format!("`{key}` does not belong to a {kind}");
            values.error(
                span,
                message,
                &format!("not a key of a {kind}"),
                Some(format!("take it out, or change `subject.kind` from `{kind}`")),
            );
        }
    }
    if values.has("place.anchor") && !values.has(own) {
        missing(text, values, own, ", the elevation of the attachment needs it");
    }
}

/// A spring belongs to a sprung anchor and to no other.
fn anchor(text: &str, values: &mut Values) {
    let kind = values.words.get("anchor.kind").map_or("fixed", String::as_str).to_owned();
    if kind == "sprung" {
        if !values.has("anchor.stiffness") {
            missing(text, values, "anchor.stiffness", " for a sprung anchor");
        }
        return;
    }
    if values.has("anchor.kind") && !values.words.contains_key("anchor.kind") {
        return;
    }
    for path in ["anchor.stiffness", "anchor.damping"] {
        if let Some(span) = values.spans.get(path).cloned() {
            let hint = Some("write `kind = \"sprung\"` for an anchor that gives, or take the key out".to_owned());
            values.error(
                span,
                format!("`{path}` does not belong to a fixed anchor"),
                "not a key of a fixed anchor",
                hint,
            );
        }
    }
}

fn obstacles(values: &mut Values) {
    let mut seen: BTreeMap<String, String> = BTreeMap::new();
    for n in 1..=values.obstacles {
        name_of(values, n, &mut seen);
        let (from, to) = (format!("obstacle.{n}.from"), format!("obstacle.{n}.to"));
        let (lone, other) = match (values.has(&from), values.has(&to)) {
            (true, false) => (from, "to"),
            (false, true) => (to, "from"),
            _ => continue,
        };
        let span = values.spans.get(&lone).cloned().unwrap_or(0..0);
        let hint = Some(format!("add `{other}`, or take both out for a level that extends everywhere"));
        values.error(span, format!("`{lone}` stands without `{other}`"), "half an extent", hint);
    }
}

fn name_of(values: &mut Values, n: usize, seen: &mut BTreeMap<String, String>) {
    let path = format!("obstacle.{n}.name");
    let (Some(name), Some(span)) = (values.words.get(&path).cloned(), values.spans.get(&path).cloned()) else { return };
    let id = super::model::id_of(&name);
    if id.is_empty() {
        let hint = Some("name it by what it is, such as `lower roof`".to_owned());
        return values.error(span, "the name of an obstacle is blank".into(), "expected a name", hint);
    }
    if let Some(first) = seen.get(&id) {
        let hint = Some("names differ in more than capitals and blanks, as outputs use them as ids".to_owned());
        let message = format!("obstacle {} has the name of {} (`{path}`)", quoted(&name), quoted(first));
        return values.error(span, message, "expected another name", hint);
    }
    seen.insert(id, name);
}

/// A single limit over a published basis needs its reason.
fn limits(values: &mut Values) {
    let Some(basis) = values.words.get("limits.basis").filter(|basis| *basis != "own").cloned() else { return };
    let paths: Vec<String> = values.measures.keys().filter(|path| path.starts_with("limits.")).cloned().collect();
    for path in paths {
        let why = values.whys.get(&path).is_some_and(|why| !why.trim().is_empty());
        if why {
            continue;
        }
        let span = values.spans.get(&path).cloned().unwrap_or(0..0);
        let key = path.rsplit('.').next().unwrap_or(&path).to_owned();
        let hint = Some(format!("write `{key} = {{ value = .., why = \"..\" }}`, or use basis `own`"));
        let message = format!("`{path}` differs from the basis {} without a reason", quoted(&basis));
        values.error(span, message, "expected `value` and `why`", hint);
    }
}
