//! The doubts of a file with their places, and which of them it accepts.
use super::doubt::{Doubt, raised};
use super::doubt_rule::{FROM_JUDGED, UNUSED_ACCEPTANCE};
use super::field::ACCEPT;
use super::model::{Acceptance, Scenario};
use super::{Fault, FaultRow, Faults, Places, Severity, places};
use annotate_snippets::Renderer;

/// One doubt at its place.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Reviewed {
    /// Id of its rule.
    pub id: &'static str,
    /// Path of the input or section it is about.
    pub path: String,
    /// Its place and words.
    pub fault: Fault,
    /// The file's reason, where it accepts the doubt.
    pub accepted: Option<String>,
}

/// All doubts of one file, sorted by place.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Review {
    /// Name of the file as given.
    pub file: String,
    /// Its text.
    pub text: String,
    /// The doubts, accepted ones among them.
    pub doubts: Vec<Reviewed>,
}

/// One doubt with its place as numbers, for machine-readable output.
#[derive(Clone, Debug, PartialEq, Eq, serde::Serialize)]
pub struct ReviewRow {
    /// Id of its rule.
    pub id: &'static str,
    /// Path of the input or section it is about.
    pub path: String,
    /// Place and words.
    #[serde(flatten)]
    pub row: FaultRow,
    /// The file's reason, where it accepts the doubt.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub accepted: Option<String>,
}

/// Doubts about a file's own statements and those of a judged run, sorted by place. An acceptance that is about none of
/// them is a doubt itself; where the run was not judged (`judged` is none), only those that the file alone can tell.
#[must_use]
pub fn review(file: &str, text: &str, scenario: &Scenario, judged: Option<Vec<Doubt>>) -> Review {
    let whole = judged.is_some();
    let mut found = raised(scenario);
    found.extend(judged.unwrap_or_default());
    let places = places(text);
    let mut used = vec![false; scenario.accepted.len()];
    let mut doubts: Vec<Reviewed> =
        found.into_iter().map(|doubt| placed(doubt, scenario, &mut used, &places)).collect();
    let unused = scenario
        .accepted
        .iter()
        .zip(used)
        .enumerate()
        .filter(|(_, (entry, used))| !used && (whole || !FROM_JUDGED.contains(&entry.doubt.as_str())));
    doubts.extend(unused.map(|(index, (entry, _))| placed(accepts_nothing(index, entry), scenario, &mut [], &places)));
    doubts.sort_by(|a, b| {
        let key = |doubt: &Reviewed| (doubt.fault.span.start, doubt.fault.span.end);
        key(a).cmp(&key(b)).then_with(|| a.id.cmp(b.id))
    });
    Review { file: file.to_owned(), text: text.to_owned(), doubts }
}

/// The doubt at its place; the first acceptance that is about it counts as used.
fn placed(doubt: Doubt, scenario: &Scenario, used: &mut [bool], places: &Places) -> Reviewed {
    let Doubt { id, path, message, expected, hint } = doubt;
    let by = scenario.accepted.iter().position(|entry| entry.covers(id, &path));
    if let Some(used) = by.and_then(|index| used.get_mut(index)) {
        *used = true;
    }
    let fault = Fault {
        severity: Severity::Doubt,
        span: places.of(&path),
        message,
        expected: expected.to_owned(),
        hint: Some(hint.to_owned()),
    };
    let accepted = by.and_then(|index| scenario.accepted.get(index)).map(|entry| entry.why.clone());
    Reviewed { id, path, fault, accepted }
}

fn accepts_nothing(index: usize, entry: &Acceptance) -> Doubt {
    let at = entry.at.as_ref().map(|at| format!(" at `{at}`")).unwrap_or_default();
    Doubt {
        id: UNUSED_ACCEPTANCE,
        path: format!("{ACCEPT}.{}", index + 1),
        message: format!("the file accepts `{}`{at}, which is not raised", entry.doubt),
        expected: "accepts nothing",
        hint: "take the entry out, or correct its id or place",
    }
}

impl Review {
    /// The doubts that are not accepted.
    pub fn open_doubts(&self) -> impl Iterator<Item = &Reviewed> {
        self.doubts.iter().filter(|doubt| doubt.accepted.is_none())
    }

    /// The accepted doubts, each with its reason.
    pub fn accepted(&self) -> impl Iterator<Item = (&Reviewed, &str)> {
        self.doubts.iter().filter_map(|doubt| Some((doubt, doubt.accepted.as_deref()?)))
    }

    /// The doubts that are not accepted, as findings.
    #[must_use]
    pub fn open(&self) -> Faults {
        self.faults(self.open_doubts().map(|doubt| doubt.fault.clone()).collect())
    }

    fn faults(&self, faults: Vec<Fault>) -> Faults {
        Faults { file: self.file.clone(), text: self.text.clone(), faults }
    }

    /// The doubts that are not accepted with their ids, places and markers, as [`Faults::render`].
    #[must_use]
    pub fn render(&self, color: bool) -> String {
        let renderer = if color { Renderer::styled() } else { Renderer::plain() };
        let text = self.faults(Vec::new());
        let one = |doubt: &Reviewed| text.render_one(&renderer, &doubt.fault, Some(doubt.id));
        let texts: Vec<String> = self.open_doubts().map(one).collect();
        texts.join("\n\n") + if texts.is_empty() { "" } else { "\n" }
    }

    /// Line and column where a doubt begins and where it ends, see [`Faults::region`].
    #[must_use]
    pub fn region(&self, doubt: &Reviewed) -> ((usize, usize), (usize, usize)) {
        self.faults(Vec::new()).region(&doubt.fault)
    }

    /// All doubts with line and column, for machine-readable output.
    #[must_use]
    pub fn rows(&self) -> Vec<ReviewRow> {
        let text = self.faults(Vec::new());
        let row = |doubt: &Reviewed| {
            let Reviewed { id, path, fault, accepted } = doubt.clone();
            ReviewRow { id, path, row: text.row(&fault), accepted }
        };
        self.doubts.iter().map(row).collect()
    }
}
