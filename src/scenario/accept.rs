//! Doubts that a file accepts: what an entry must say, and which doubt it is about.
use super::doubt_rule::{DOUBT_RULES, UNUSED_ACCEPTANCE, doubt_rule, nearest_doubt};
use super::field::{ACCEPT, field_for, list_of};
use super::keys::FIELDS;
use super::model::Acceptance;
use super::values::{Values, is_section, nearest, quoted};

impl Acceptance {
    /// Whether it is about a doubt at a place: the place itself, a section around it, or any where none is named.
    #[must_use]
    pub fn covers(&self, doubt: &str, path: &str) -> bool {
        let inside = |at: &str| path == at || path.strip_prefix(at).is_some_and(|rest| rest.starts_with('.'));
        self.doubt == doubt && self.at.as_deref().is_none_or(inside)
    }
}

/// Notes every entry that names no doubt, no place, or gives no reason.
pub(super) fn check(values: &mut Values) {
    for n in 1..=values.count(ACCEPT) {
        known_doubt(values, &format!("{ACCEPT}.{n}.doubt"));
        known_place(values, &format!("{ACCEPT}.{n}.at"));
        reason(values, &format!("{ACCEPT}.{n}.why"));
    }
}

fn known_doubt(values: &mut Values, path: &str) {
    let Some((id, span)) = values.words.get(path).cloned().zip(values.spans.get(path).cloned()) else { return };
    if id == UNUSED_ACCEPTANCE {
        let hint = Some("take out the entry that accepts nothing".to_owned());
        return values.error(span, format!("`{id}` cannot be accepted"), "expected another doubt", hint);
    }
    if doubt_rule(&id).is_some() {
        return;
    }
    let near = nearest_doubt(&id).map(|near| format!("did you mean `{near}`? ")).unwrap_or_default();
    let hint = format!("{near}`underfoot audit --explain` lists the {} doubts", DOUBT_RULES.len());
    values.error(span, format!("no doubt has the id {}", quoted(&id)), "expected the id of a doubt", Some(hint));
}

fn known_place(values: &mut Values, path: &str) {
    let Some((at, span)) = values.words.get(path).cloned().zip(values.spans.get(path).cloned()) else { return };
    if is_place(&at) {
        return;
    }
    let paths = FIELDS.iter().map(|field| field.path).filter(|path| list_of(path) != Some(ACCEPT));
    let near = nearest(&at, paths).map(|near| format!("did you mean `{near}`? ")).unwrap_or_default();
    let hint = format!("{near}a path is a section or a key, such as `obstacle.1` or `line.strength`");
    values.error(span, format!("there is no input or section {}", quoted(&at)), "expected a path", Some(hint));
}

/// The path of a key, a section, a list or one of its entries.
fn is_place(path: &str) -> bool {
    let entry = |list: &str| path.strip_prefix(list).and_then(|rest| rest.strip_prefix('.'));
    let number = |rest: &str| rest.parse::<usize>().is_ok_and(|n| n > 0);
    match list_of(path) {
        Some(ACCEPT) => false,
        Some(list) => path == list || entry(list).is_some_and(number) || field_for(path).is_some(),
        None => field_for(path).is_some() || (!path.is_empty() && is_section(path)),
    }
}

fn reason(values: &mut Values, path: &str) {
    let Some((why, span)) = values.words.get(path).zip(values.spans.get(path).cloned()) else { return };
    if why.trim().is_empty() {
        let hint = Some("say what was looked at, where, and by whom".to_owned());
        values.error(span, "a doubt is accepted without a reason".to_owned(), "expected a reason", hint);
    }
}
