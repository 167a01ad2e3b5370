//! A walk-through as text and JSON: every stop with its sentence, what it changes, and what that does.
use super::band_words::report_margin_object;
use super::page::{Page, Paint, Tone};
use super::text::{sentences, verdict_line};
use super::walk_words::{governing_step, peak_step, stop_changes_words, verdict_step};
use super::{CAUTION_LINE, CAUTIONS, Report, sha256_hex};
use crate::margin::{Verdict, worst};
use crate::quantity::UnitSystem;
use crate::scenario::{Stop, Walk};
use serde_json::{Value, json};

/// What one state of a walk gives.
#[derive(Clone, Debug)]
pub enum WalkRun {
    /// Solved and judged.
    Judged {
        /// At the typical values.
        typical: Box<Report>,
        /// With the bands, where there are any.
        joint: Box<Report>,
    },
    /// Not solved, and why: it is open.
    Open(String),
}

impl WalkRun {
    /// The report at the typical values.
    #[must_use]
    pub fn typical(&self) -> Option<&Report> {
        match self {
            Self::Judged { typical, .. } => Some(typical),
            Self::Open(_) => None,
        }
    }

    /// The worst verdict, bands included.
    #[must_use]
    pub fn verdict(&self) -> Verdict {
        match self {
            Self::Judged { joint, .. } => joint.verdict,
            Self::Open(_) => Verdict::Open,
        }
    }
}

/// A walk with its runs: the start first, then one for each stop; fewer where it was broken off.
#[derive(Clone, Debug)]
pub struct Walked {
    /// The walk.
    pub walk: Walk,
    /// Its runs.
    pub runs: Vec<WalkRun>,
}

impl Walked {
    /// The worst verdict of all states.
    #[must_use]
    pub fn verdict(&self) -> Verdict {
        worst(self.runs.iter().map(WalkRun::verdict))
    }

    /// True where not every state was run.
    #[must_use]
    pub const fn is_partial(&self) -> bool {
        self.runs.len() <= self.walk.stops.len()
    }

    /// The stops that were run, each with its number from 1, the run before and its own.
    fn stops(&self) -> impl Iterator<Item = (usize, &Stop, [&WalkRun; 2])> {
        let pairs = self.runs.windows(2).filter_map(|pair| <&[WalkRun; 2]>::try_from(pair).ok());
        self.walk.stops.iter().zip(pairs).zip(1..).map(|((stop, [before, own]), n)| (n, stop, [before, own]))
    }
}

/// The walk as text.
#[must_use]
pub fn walk_text(walked: &Walked, system: UnitSystem, paint: Paint) -> String {
    let walk = &walked.walk;
    let mut page = Page::new(paint);
    page.wrapped("", CAUTION_LINE, Tone::Caution);
    page.gap();
    if let Some(title) = &walk.title {
        page.wrapped("", title, Tone::Heading);
    }
    page.wrapped("walk-through  ", &walk.file, Tone::Plain);
    page.wrapped("scenario      ", &walk.start.path().display().to_string(), Tone::Plain);
    page.heading("start: the scenario as its file has it");
    if let Some(run) = walked.runs.first() {
        run_lines(&mut page, [None, Some(run)], system);
    }
    for (number, stop, [before, own]) in walked.stops() {
        page.heading(&format!("stop {number} of {}", walk.stops.len()));
        page.wrapped("  ", &stop.say, Tone::Heading);
        let changed = stop_changes_words(stop).unwrap_or_else(|| "nothing".to_owned());
        page.wrapped("  changed     ", &changed, Tone::Plain);
        run_lines(&mut page, [Some(before).filter(|_| stop.is_changing()), Some(own)], system);
        if let Some(view) = stop.view {
            page.line(&format!("  view        {view}"), Tone::Plain);
        }
    }
    if walked.is_partial() {
        page.heading("STOPPED EARLY: the stops after this one were not run");
    }
    sentences(&mut page, "cautions", CAUTIONS);
    page.heading("provenance");
    page.line(&format!("  underfoot {}", env!("CARGO_PKG_VERSION")), Tone::Plain);
    page.line(&format!("  sha256 of the walk-through  {}", sha256_hex(&walk.text)), Tone::Plain);
    page.line(&format!("  sha256 of the scenario      {}", sha256_hex(walk.start.text())), Tone::Plain);
    page.finish()
}

fn run_lines(page: &mut Page, [before, own]: [Option<&WalkRun>; 2], system: UnitSystem) {
    let before = before.and_then(WalkRun::typical);
    match own {
        Some(WalkRun::Judged { typical, joint }) => {
            page.wrapped("  margin      ", &governing_step(before, typical, system), Tone::Plain);
            page.wrapped("  peak force  ", &peak_step(before, typical, system), Tone::Plain);
            let (lead, as_well) = match joint.bands {
                Some(_) => ("  typical     ", "; margin and force above are at typical values too"),
                None => ("  verdict     ", ""),
            };
            page.wrapped(lead, &format!("{}{as_well}", verdict_step(before, typical)), Tone::Plain);
            verdict_line(page, joint, &joint.margins_in(system), system);
        }
        Some(WalkRun::Open(why)) => {
            let (symbol, word) = (Verdict::Open.symbol(), Verdict::Open.word().to_uppercase());
            page.wrapped(
                &format!("{symbol} {word}  "),
                &format!("cannot be computed: {why}"),
                Tone::Verdict(Verdict::Open),
            );
        }
        None => {}
    }
}

/// The walk as a JSON object, SI units.
#[must_use]
pub fn walk_object(walked: &Walked) -> Value {
    let walk = &walked.walk;
    let start = walked.runs.first().map(|run| run_object(None, run));
    let stops: Vec<Value> = walked.stops().map(|(number, stop, runs)| stop_object(number, stop, runs)).collect();
    json!({
        "file": walk.file,
        "title": walk.title,
        "walk_sha256": sha256_hex(&walk.text),
        "scenario": walk.start.path().display().to_string(),
        "scenario_sha256": sha256_hex(walk.start.text()),
        "version": env!("CARGO_PKG_VERSION"),
        "cautions": CAUTIONS,
        "verdict": walked.verdict().word(),
        "partial": walked.is_partial(),
        "start": start,
        "stops": stops,
    })
}

fn stop_object(number: usize, stop: &Stop, [before, own]: [&WalkRun; 2]) -> Value {
    let mut object = json!({
        "stop": number,
        "say": stop.say,
        "view": stop.view,
        "changes": stop.changes.iter().map(|change| json!({
            "input": change.path,
            "before": change.before,
            "after": change.after,
        })).collect::<Vec<_>>(),
        "taken_out": stop.taken_out,
    });
    if let (Some(object), Value::Object(run)) = (object.as_object_mut(), run_object(before.typical(), own)) {
        object.extend(run);
    }
    object
}

/// Verdict and governing check with the bands; margin and force at typical values, each with its step from the state
/// before: none where another check governs.
fn run_object(before: Option<&Report>, run: &WalkRun) -> Value {
    let WalkRun::Judged { typical, joint } = run else {
        let WalkRun::Open(why) = run else { return Value::Null };
        return json!({ "verdict": Verdict::Open.word(), "not_computed": why });
    };
    let peak = |report: &Report| report.estimate.numbers.get("arrest_force_peak");
    let (then, now) = (before.and_then(|report| report.margins.first()), typical.margins.first());
    let same = then.zip(now).filter(|(then, now)| then.id == now.id);
    let step = same.and_then(|(then, now)| Some(now.margin? - then.margin?));
    json!({
        "verdict": joint.verdict.word(),
        "typical_verdict": typical.verdict.word(),
        "governing": joint.margins.first().map(|margin| report_margin_object(joint, margin)),
        "typical_governing": now.map(|margin| report_margin_object(typical, margin)),
        "margin_step": step,
        "arrest_force_peak": { "value": peak(typical), "unit": "N" },
        "arrest_force_peak_step": before.and_then(peak).zip(peak(typical)).map(|(then, now)| now - then),
    })
}
