//! What a reviewer is told about one file after the other.
use super::band_words::{band_table, bands_object, has_bands, report_margin_object};
use super::json::{Layout, print};
use super::page::{Page, Paint, Tone};
use super::text::{margin_table, sentences, verdict_line};
use super::{CAUTION_LINE, CAUTIONS, Report};
use crate::margin::{Margin, Verdict};
use crate::quantity::UnitSystem;
use crate::scenario::{Faults, Review};
use serde_json::{Map, Value, json};

/// What became of one file.
#[derive(Clone, Debug)]
pub enum Finding {
    /// Read, computed and judged; the doubts may be none.
    Judged(Box<Report>, Review),
    /// Read and refused.
    Refused(Faults),
    /// Not readable; why.
    Unreadable(String),
    /// Read, but not computed; why.
    NotComputed(String),
}

/// One file with its finding.
#[derive(Clone, Debug)]
pub struct Audited {
    /// Name of the file as given.
    pub file: String,
    /// Its place as a URI reference, see [`super::file_uri`].
    pub uri: String,
    /// What became of it.
    pub finding: Finding,
}

impl Audited {
    /// The one verdict of the file: a verdict word, or `refused`, `unreadable`, `not computed`.
    #[must_use]
    pub fn verdict(&self) -> &'static str {
        match &self.finding {
            Finding::Judged(report, _) => report.verdict.word(),
            Finding::Refused(_) => "refused",
            Finding::Unreadable(_) => "unreadable",
            Finding::NotComputed(_) => "not computed",
        }
    }
    pub(super) const fn symbol(&self) -> char {
        match &self.finding {
            Finding::Judged(report, _) => report.verdict.symbol(),
            Finding::Refused(_) | Finding::Unreadable(_) | Finding::NotComputed(_) => '!',
        }
    }
}

/// The caution that stands above an audit.
#[must_use]
pub fn audit_head(paint: Paint) -> String {
    let mut page = Page::new(paint);
    page.wrapped("", CAUTION_LINE, Tone::Caution);
    page.finish()
}

/// One file of an audit as text.
#[must_use]
pub fn audit_text(audited: &Audited, system: UnitSystem, paint: Paint) -> String {
    let mut page = Page::new(paint);
    page.heading(&audited.file);
    let colour = paint == Paint::Colour;
    match &audited.finding {
        Finding::Judged(report, review) => judged(&mut page, report, review, system, colour),
        Finding::Refused(faults) => {
            refusal(&mut page, audited, "the file has faults");
            page.raw(&faults.render(colour));
        }
        Finding::Unreadable(why) | Finding::NotComputed(why) => refusal(&mut page, audited, why),
    }
    page.finish()
}

fn refusal(page: &mut Page, audited: &Audited, why: &str) {
    let lead = format!("{} {}  ", audited.symbol(), audited.verdict().to_uppercase());
    page.wrapped(&lead, why, Tone::Verdict(Verdict::Short));
}

/// Why the bands of a file were left alone.
const NOT_SEARCHED: &str = "the bands were not searched: the typical values do not hold, or cannot be judged";

fn judged(page: &mut Page, report: &Report, review: &Review, system: UnitSystem, colour: bool) {
    let margins = report.margins_in(system);
    verdict_line(page, report, &margins, system);
    margin_table(page, &margins, system);
    if is_not_searched(report) {
        page.wrapped("  ", NOT_SEARCHED, Tone::Caution);
    }
    for margin in &margins {
        page.wrapped("    ", &format!("{}: {}", margin.label, margin.basis.words), Tone::Faint);
        if let Some(note) = &margin.note {
            page.wrapped("      note: ", note, Tone::Plain);
        }
    }
    band_table(page, report, system);
    sentences(page, "limits", &report.limit_remarks);
    sentences(page, "warnings", &report.estimate.warnings);
    let open = review.open_doubts().count();
    if open > 0 {
        page.heading(&format!("doubtful inputs: {open}"));
        page.raw(&review.render(colour));
    }
    accepted(page, review);
}

/// Whether there are bands that were left alone, because nothing in them can better the verdict.
fn is_not_searched(report: &Report) -> bool {
    report.bands.is_none() && has_bands(report)
}

/// A margin, which says for itself whether the bands played a part.
fn margin_object(report: &Report, margin: &Margin) -> Value {
    let mut object = report_margin_object(report, margin);
    object["bands_searched"] = json!(!is_not_searched(report));
    object
}

fn accepted(page: &mut Page, review: &Review) {
    let count = review.accepted().count();
    if count == 0 {
        return;
    }
    page.heading(&format!("doubts that the file accepts: {count}"));
    for (doubt, why) in review.accepted() {
        let ((line, _), _) = review.region(doubt);
        let words = format!("{} at {} (line {line}): {}", doubt.id, doubt.path, doubt.fault.message);
        page.wrapped("  ", &words, Tone::Plain);
        page.wrapped("    why  ", why, Tone::Plain);
    }
}

/// One file of an audit as one line of JSON.
#[must_use]
pub fn audit_json(audited: &Audited) -> String {
    let mut object = Map::new();
    object.insert("file".into(), json!(audited.file));
    object.insert("verdict".into(), json!(audited.verdict()));
    object.insert("version".into(), json!(env!("CARGO_PKG_VERSION")));
    object.insert("cautions".into(), json!(CAUTIONS));
    match &audited.finding {
        Finding::Judged(report, review) => {
            object.insert("scenario_sha256".into(), json!(report.scenario_sha256));
            object.insert("faults".into(), json!([]));
            object.insert("doubts".into(), json!(review.rows()));
            object.insert("margins".into(), report.margins.iter().map(|m| margin_object(report, m)).collect());
            object.insert("warnings".into(), json!(report.estimate.warnings));
            object.insert("bands_searched".into(), json!(!is_not_searched(report)));
            if let Some(bands) = &report.bands {
                object.insert("bands".into(), bands_object(bands));
            }
        }
        Finding::Refused(faults) => {
            object.insert("faults".into(), json!(faults.rows()));
        }
        Finding::Unreadable(why) | Finding::NotComputed(why) => {
            object.insert("reason".into(), json!(why));
        }
    }
    print(&Value::Object(object), Layout::OneLine)
}

/// The last line of JSON after Ctrl-C: the lines before are a part only.
#[must_use]
pub fn interrupted_json(files: usize, of: usize) -> String {
    print(&json!({ "interrupted": true, "files": files, "of": of, "cautions": CAUTIONS }), Layout::OneLine)
}
