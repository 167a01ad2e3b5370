//! What a reviewer should look at in the limits that a run was judged by.
use super::check::{Margin, UnknownBasis};
use super::limit::{Bound, PublishedLimit};
use super::rules::{Rules, Ruling};
use crate::scenario::{Doubt, Scenario};

/// Doubts about the limits behind a list of margins: values from memory, and own values that ask for less than the
/// published ones they replace.
///
/// # Errors
/// When the scenario names an unknown set.
pub fn doubts(scenario: &Scenario, margins: &[Margin]) -> Result<Vec<Doubt>, UnknownBasis> {
    let rules = Rules::of(scenario)?;
    Ok(loosened(&rules).into_iter().chain(from_memory(margins)).collect())
}

fn loosened(rules: &Rules) -> Vec<Doubt> {
    let rulings = [
        &rules.arrest_force,
        &rules.free_fall,
        &rules.deceleration,
        &rules.total_fall,
        &rules.anchor_strength,
        &rules.anchor_factor,
        &rules.line_strength,
        &rules.line_factor,
        &rules.subject_mass,
    ];
    rulings.into_iter().flatten().filter_map(less_than_published).collect()
}

fn less_than_published(ruling: &Ruling) -> Option<Doubt> {
    let (own, published) = (ruling.own.as_ref()?, ruling.published?);
    (published.kind != super::LimitKind::TotalFallPastTwiceLength && asks_less(own.value.si(), published)).then(|| {
        Doubt {
            id: "limit-loosened",
            path: format!("limits.{}", own.key),
            message: format!("`{}` asks for less than the published limit that it replaces", own.key),
            expected: "less than published",
            hint: "read the reason beside it, and confirm it with whoever decides",
        }
    })
}

fn asks_less(own: f64, published: &PublishedLimit) -> bool {
    match published.bound {
        Bound::AtMost | Bound::Below => own > published.si() * (1.0 + super::judge::ROUNDING_SHARE),
        Bound::AtLeast | Bound::Factor => own < published.si() * (1.0 - super::judge::ROUNDING_SHARE),
    }
}

fn from_memory(margins: &[Margin]) -> Option<Doubt> {
    let labels: Vec<String> =
        margins.iter().filter(|margin| margin.basis.from_memory).map(|margin| format!("`{}`", margin.label)).collect();
    (!labels.is_empty()).then(|| Doubt {
        id: "limit-from-memory",
        path: "limits.basis".to_owned(),
        message: format!("limits from memory, unverified, count in the verdict: {}", labels.join(", ")),
        expected: "not read in the source",
        hint: "look the values up, and state them in the file with `why`",
    })
}
