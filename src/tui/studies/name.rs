//! Checks of a study by their ids and labels.
use crate::margin::{CheckKind, Margin, judge};
use crate::quantity::UnitSystem;
use crate::study::Evaluator;

/// A check: its kind in the study, and how it stands at the typical values.
#[derive(Clone, Debug, PartialEq)]
pub struct Name {
    /// In the study.
    pub kind: CheckKind,
    /// Id, label, limit and the rest at the typical values.
    pub margin: Margin,
}

/// Every check of an evaluator at its typical values, and further ones that apply only elsewhere.
#[must_use]
pub fn names(evaluator: &Evaluator, further: impl IntoIterator<Item = CheckKind>) -> Vec<Name> {
    let typical = evaluator.typical();
    let mut kinds = evaluator.kinds().to_vec();
    kinds.extend(further);
    kinds.sort_unstable();
    kinds.dedup();
    let name = |kind: CheckKind| {
        let check = typical.check(kind).copied().unwrap_or_else(|| judge(kind, None, None));
        Name { kind, margin: evaluator.margin(&typical, &check, UnitSystem::Metric) }
    };
    kinds.into_iter().map(name).collect()
}
