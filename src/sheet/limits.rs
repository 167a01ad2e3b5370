//! The built-in limits as text and JSON.
use super::json::{Layout, print};
use super::page::{Page, Paint, Tone, pad};
use super::text::sentences;
use super::{CAUTION_LINE, CAUTIONS, EQUIPMENT_CAUTIONS};
use crate::estimate::typical_cables;
use crate::margin::{Bound, Disagreement, LimitSet, PublishedLimit, disagreements, limit_sets};
use crate::quantity::{UnitSystem, display_unit, format_si};
use serde_json::{Value, json};

/// Every set with its limits, then where the sources disagree.
#[must_use]
pub fn limits_text(paint: Paint) -> String {
    let mut page = Page::new(paint);
    page.wrapped("", CAUTION_LINE, Tone::Caution);
    page.gap();
    let intro = "Published limits, each as its source states it. Name a set in a file by `basis` below `[limits]`. \
                 The text of the code itself decides; check that it is the one in force.";
    page.wrapped("", intro, Tone::Plain);
    for set in limit_sets() {
        one_set(&mut page, set);
    }
    page.heading("where the sources disagree");
    for disagreement in disagreements() {
        one_disagreement(&mut page, disagreement);
    }
    // The figure of the maker goes before any of these; the sentences say where each comes from.
    sentences(&mut page, "typical stiffness of cables", &typical_cables());
    sentences(&mut page, "cautions", CAUTIONS);
    sentences(&mut page, "cautions about equipment", EQUIPMENT_CAUTIONS);
    page.finish()
}

fn one_set(page: &mut Page, set: &LimitSet) {
    page.heading(set.name);
    page.wrapped("  ", &format!("written for: {}", set.scope), Tone::Plain);
    for limit in set.limits {
        let value = pad(&value_words(limit), 24);
        page.wrapped(&format!("    {value}"), limit.quantity, Tone::Plain);
        let remark = limit.remark.map(|r| format!("; {r}")).unwrap_or_default();
        let source = format!("{}, {}{remark}", limit.clause, limit.mark.words());
        page.wrapped(&" ".repeat(28), &source, Tone::Faint);
    }
}

fn one_disagreement(page: &mut Page, disagreement: &Disagreement) {
    page.wrapped("  ", disagreement.topic, Tone::Heading);
    for (value, source) in disagreement.readings {
        page.wrapped(&format!("    {}", pad(value, 28)), source, Tone::Plain);
    }
    page.wrapped("    here: ", disagreement.here, Tone::Plain);
}

/// `<= 1800 lbf (8.01 kN)`: the source's own unit first.
fn value_words(limit: &PublishedLimit) -> String {
    let dimension = limit.unit.dimension();
    let symbol = limit.unit.symbol();
    let own = format!("{} {} {symbol}", limit.bound.sign(), short_number(limit.value));
    let own = own.trim_end();
    let is_us = display_unit(dimension, UnitSystem::Us) == limit.unit
        && display_unit(dimension, UnitSystem::Metric) != limit.unit;
    if is_us { format!("{own} ({})", format_si(limit.si(), dimension, UnitSystem::Metric)) } else { own.to_owned() }
}

fn short_number(value: f64) -> String {
    let text = format!("{value:.4}");
    text.trim_end_matches('0').trim_end_matches('.').to_owned()
}

/// Every set and every disagreement as one JSON object.
#[must_use]
pub fn limits_json() -> String {
    let value = json!({
        "version": env!("CARGO_PKG_VERSION"),
        "cautions": CAUTIONS.iter().chain(EQUIPMENT_CAUTIONS).collect::<Vec<_>>(),
        "sets": limit_sets().iter().map(set_object).collect::<Vec<_>>(),
        "disagreements": disagreements().iter().map(disagreement_object).collect::<Vec<_>>(),
        "typical_cables": typical_cables(),
    });
    print(&value, Layout::Lines)
}

fn set_object(set: &LimitSet) -> Value {
    json!({
        "name": set.name,
        "written_for": set.scope,
        "limits": set.limits.iter().map(limit_object).collect::<Vec<_>>(),
    })
}

fn limit_object(limit: &PublishedLimit) -> Value {
    let symbol = limit.unit.symbol();
    let bound = match limit.bound {
        Bound::AtMost => "at most",
        Bound::Below => "below",
        Bound::AtLeast => "at least",
        Bound::Factor => "factor",
    };
    json!({
        "quantity": limit.quantity,
        "bound": bound,
        "value": limit.value,
        "unit": if symbol.is_empty() { "1" } else { symbol },
        "clause": limit.clause,
        "mark": limit.mark.letter().to_string(),
        "confirmed": limit.mark.words(),
        "remark": limit.remark,
    })
}

fn disagreement_object(disagreement: &Disagreement) -> Value {
    let reading = |(value, source): &(&str, &str)| json!({ "value": value, "source": source });
    json!({
        "topic": disagreement.topic,
        "readings": disagreement.readings.iter().map(reading).collect::<Vec<_>>(),
        "here": disagreement.here,
    })
}
