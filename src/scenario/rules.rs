//! Which keys must stand together, and which must not.
use super::accept;
use super::field::{Field, LISTS, Need, field_for, list_of};
use super::keys::FIELDS;
use super::values::{Values, quoted};
use std::collections::BTreeMap;
use std::ops::Range;

/// The ways to state how a line stretches.
pub(super) const STRETCH_LAWS: [&str; 5] =
    ["line.stiffness", "line.modulus", "line.rated_impact", "line.static_elongation", "line.curve"];

/// Notes every missing key and every pair that contradicts itself.
pub(super) fn check(text: &str, values: &mut Values) {
    needed(text, values);
    fall(text, values);
    line(text, values);
    line_kind(text, values);
    absorber(text, values);
    subject(text, values);
    anchor(text, values);
    span(text, values);
    obstacles(values);
    limits(values);
    accept::check(values);
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
    for field in FIELDS {
        match field.need {
            Need::Always if !values.has(field.path) => missing(text, values, field.path, ""),
            Need::InSection => in_section(text, values, field),
            _ => {}
        }
    }
}

fn in_section(text: &str, values: &mut Values, field: &Field) {
    let paths: Vec<String> = match list_of(field.path) {
        Some(list) => (1..=values.count(list)).map(|n| field.path.replace('*', &n.to_string())).collect(),
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
        for path in ["place.anchor", "place.anchor_offset", "place.edge"] {
            if let Some(span) = values.spans.get(path).cloned() {
                let hint =
                    Some(format!("state either `fall.free_fall` or the elevations; take out one of them (`{path}`)"));
                let message = format!("`{path}` would give the free fall that `fall.free_fall` states");
                values.error(span, message, "two ways to one number", hint);
            }
        }
    } else if anchor && !values.has("place.standing") {
        missing(text, values, "place.standing", ", `place.anchor` alone gives no free fall");
    } else if !anchor && word(values, "line.kind") == "retractable" {
        missing(text, values, "place.anchor", ", a retractable line pays out from there");
    } else if !anchor {
        let span = place_for(text, values, "fall.free_fall");
        let hint = "add `[fall]` with `free_fall = \"1.8 m\"`, or `[place]` with `standing` and `anchor`".to_owned();
        let message = "nothing says how far the subject falls free".to_owned();
        values.error(span, message, "expected `fall.free_fall` or `place.anchor`", Some(hint));
    }
}

fn line(text: &str, values: &mut Values) {
    let laws: Vec<&str> = STRETCH_LAWS.into_iter().filter(|path| values.has(path)).collect();
    if laws.is_empty() {
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
        && word(values, "line.kind") != "retractable"
    {
        missing(text, values, "line.length", because);
    }
}

/// The word at a path, empty where there is none.
fn word<'v>(values: &'v Values, path: &str) -> &'v str {
    values.words.get(path).map_or("", String::as_str)
}

/// Notes every key of a list that stands in the file though its kind has no use for it.
fn foreign(values: &mut Values, paths: &[&str], kind: &str, hint: &str) {
    for path in paths {
        if let Some(span) = values.spans.get(*path).cloned() {
            let message = format!("`{path}` does not belong to a {kind}");
            values.error(span, message, &format!("not a key of a {kind}"), Some(hint.to_owned()));
        }
    }
}

/// Keys that belong to one kind of line.
fn line_kind(text: &str, values: &mut Values) {
    let kind = word(values, "line.kind").to_owned();
    let shown = format!("line of kind `{kind}`");
    if kind.is_empty() {
        return;
    }
    if kind == "retractable" {
        if !values.has("line.lock_travel") {
            missing(text, values, "line.lock_travel", " for a retractable line");
        }
        let hint = "the line out follows from the elevations; take the key out";
        foreign(values, &["line.length", "absorber.packed_length"], &shown, hint);
        let hint = "`line.slack` and `line.lock_travel` give its free fall; take the key out";
        foreign(values, &["fall.free_fall"], &shown, hint);
    } else {
        let hint = "write `kind = \"retractable\"` for a line that pays out and locks, or take the key out";
        foreign(values, &["line.lock_travel", "line.slack"], &shown, hint);
    }
    if kind != "vertical" {
        let hint = "write `kind = \"vertical\"` for a line with a grab, or take the key out";
        foreign(values, &["line.grab_slide"], &shown, hint);
    }
}

/// One law of deployment; a constant force needs its stroke.
fn absorber(text: &str, values: &mut Values) {
    if !values.has("absorber") {
        return;
    }
    match (values.has("absorber.deploy_force"), values.spans.get("absorber.force_table").cloned()) {
        (false, None) => missing(text, values, "absorber.deploy_force", ", or `absorber.force_table` instead"),
        (true, Some(span)) => {
            let message = "`absorber.force_table` and `absorber.deploy_force` both say how the absorber deploys";
            values.error(span, message.to_owned(), "expected one force law", Some("keep one of them".to_owned()));
        }
        _ => {}
    }
    if !values.has("absorber.stroke") && !values.has("absorber.force_table") {
        missing(text, values, "absorber.stroke", "");
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

/// A spring belongs to a sprung anchor, a span to a span, and to no other.
fn anchor(text: &str, values: &mut Values) {
    if values.has("anchor.kind") && word(values, "anchor.kind").is_empty() {
        return;
    }
    let springs = ["anchor.stiffness", "anchor.damping"];
    let sprung = "write `kind = \"sprung\"` for an anchor that gives, or take the key out";
    let span = "write `kind = \"span\"` for a horizontal lifeline, or take the key out";
    match word(values, "anchor.kind") {
        "sprung" => {
            if !values.has("anchor.stiffness") {
                missing(text, values, "anchor.stiffness", " for a sprung anchor");
            }
            foreign(values, &["anchor.span"], "sprung anchor", span);
        }
        "span" => {
            if !values.has("anchor.span") {
                let at = values.spans.get("anchor.kind").cloned().unwrap_or(0..0);
                let hint =
                    "add `span = { length = \"12 m\", pretension = \"1 kN\", modulus = \"4000 kN\" }`".to_owned();
                values.error(at, "`anchor.span` is missing for a span".into(), "expected `span`", Some(hint));
            }
            let hint = "the span's own keys give its stiffness, `support_stiffness` that of its supports";
            foreign(values, &springs, "span", hint);
        }
        _ => {
            foreign(values, &springs, "fixed anchor", sprung);
            foreign(values, &["anchor.span"], "fixed anchor", span);
        }
    }
}

/// A span says once how tight it is.
fn span(text: &str, values: &mut Values) {
    if !values.has("anchor.span") {
        return;
    }
    match (values.has("anchor.span.pretension"), values.spans.get("anchor.span.sag").cloned()) {
        (false, None) => missing(text, values, "anchor.span.pretension", ", or `anchor.span.sag` instead"),
        (true, Some(span)) => {
            let message = "`anchor.span.sag` and `anchor.span.pretension` both say how tight the span is";
            values.error(span, message.to_owned(), "expected one of them", Some("keep one of them".to_owned()));
        }
        _ => {}
    }
}

fn obstacles(values: &mut Values) {
    let mut seen: BTreeMap<String, String> = BTreeMap::new();
    for list in LISTS {
        for n in 1..=values.count(list) {
            name_of(values, list, n, &mut seen);
        }
    }
    for n in 1..=values.count("obstacle") {
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

fn name_of(values: &mut Values, list: &str, n: usize, seen: &mut BTreeMap<String, String>) {
    let path = format!("{list}.{n}.name");
    let (Some(name), Some(span)) = (values.words.get(&path).cloned(), values.spans.get(&path).cloned()) else { return };
    let id = super::model::id_of(&name);
    if id.is_empty() {
        let hint = Some("name it by what it is, such as `lower roof`".to_owned());
        let article = if list == "obstacle" { "an" } else { "a" };
        return values.error(span, format!("the name of {article} {list} is blank"), "expected a name", hint);
    }
    if let Some(first) = seen.get(&id) {
        let hint = Some("names differ in more than capitals and blanks, as outputs use them as ids".to_owned());
        let message = format!("{list} {} has the name of {} (`{path}`)", quoted(&name), quoted(first));
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
