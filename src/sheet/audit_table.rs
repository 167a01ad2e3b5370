//! The end of an audit: one line a file, and how many of each verdict.
use super::CAUTION_LINE;
use super::audit::{Audited, Finding};
use super::page::{Page, Paint, Tone, pad, pad_left};
use super::words::{margin_value, signed};
use crate::margin::Verdict;
use crate::quantity::UnitSystem;
use crate::scenario::{DOUBT_RULES, DoubtRule};

/// So many files are all listed; of those after them only what does not hold.
pub const MOST_LISTED: usize = 1000;
/// Lines that the table never exceeds.
pub const MOST_ROWS: usize = 10_000;

/// What an audit keeps of one file.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Summary {
    /// Name of the file as given.
    pub file: String,
    /// The one verdict of the file, see [`Audited::verdict`].
    pub verdict: &'static str,
    symbol: char,
    tone: Verdict,
    /// Label of the governing check.
    pub governing: String,
    /// Its margin in words: at the worst found where that decides.
    pub margin: String,
    /// How many faults the file has.
    pub faults: usize,
    /// How many doubts it has.
    pub doubts: usize,
    /// How many doubts it accepts.
    pub accepted: usize,
}

impl Summary {
    /// Of one file.
    #[must_use]
    pub fn of(audited: &Audited, system: UnitSystem) -> Self {
        let mut summary = Self {
            file: audited.file.clone(),
            verdict: audited.verdict(),
            symbol: audited.symbol(),
            tone: Verdict::Short,
            governing: "-".to_owned(),
            margin: "-".to_owned(),
            faults: 0,
            doubts: 0,
            accepted: 0,
        };
        match &audited.finding {
            Finding::Judged(report, review) => {
                summary.tone = report.verdict;
                summary.doubts = review.open_doubts().count();
                summary.accepted = review.accepted().count();
                if let Some(margin) = report.margins.first() {
                    summary.governing.clone_from(&margin.label);
                    let worst = report.band_of(margin).and_then(|band| band.worst.as_ref());
                    let decides = worst.filter(|_| margin.verdict == Verdict::Thin).unwrap_or(margin);
                    if let Some(room) = decides.margin {
                        summary.margin = signed(room, &margin_value(decides, room, system));
                    }
                }
            }
            Finding::Refused(faults) => summary.faults = faults.faults.len(),
            Finding::Unreadable(_) | Finding::NotComputed(_) => summary.faults = 1,
        }
        summary
    }
}

/// The verdicts of an audit in the order in which they are counted.
const COUNTED: [&str; 7] = ["holds", "thin", "open", "short", "refused", "unreadable", "not computed"];

/// The lines of an audit as they come in; its size is bounded however many files there are.
#[derive(Clone, Debug, Default)]
pub struct AuditTable {
    rows: Vec<Summary>,
    counts: [usize; COUNTED.len()],
    files: usize,
    left_out: usize,
    doubts: usize,
    accepted: usize,
}

impl AuditTable {
    /// Takes a file in.
    pub fn push(&mut self, summary: Summary) {
        self.files += 1;
        self.doubts += summary.doubts;
        self.accepted += summary.accepted;
        if let Some(place) = COUNTED.iter().position(|word| *word == summary.verdict) {
            self.counts[place] += 1;
        }
        let all = self.files <= MOST_LISTED;
        let listed = self.rows.len() < MOST_ROWS && (all || summary.verdict != "holds");
        if listed {
            self.rows.push(summary);
        } else {
            self.left_out += 1;
        }
    }

    /// How many files were taken in.
    #[must_use]
    pub const fn files(&self) -> usize {
        self.files
    }

    /// The last line of an audit: `3 files: 1 holds, 1 short, 1 refused; 2 doubts, 1 accepted`.
    #[must_use]
    pub fn tally(&self) -> String {
        let counted = COUNTED.iter().zip(self.counts).filter(|(_, count)| *count > 0);
        let parts: Vec<String> = counted.map(|(word, count)| format!("{count} {word}")).collect();
        let files = if self.files == 1 { "file" } else { "files" };
        let verdicts = if parts.is_empty() { "none judged".to_owned() } else { parts.join(", ") };
        let doubts = match (self.doubts, self.accepted) {
            (0, 0) => String::new(),
            (doubts, accepted) => {
                format!("; {doubts} doubt{}, {accepted} accepted", if doubts == 1 { "" } else { "s" })
            }
        };
        format!("{} {files}: {verdicts}{doubts}", self.files)
    }

    /// The table with the tally below it. `of` is the number of files asked for: where there are fewer, it says so.
    #[must_use]
    pub fn text(&self, of: usize, paint: Paint) -> String {
        let mut page = Page::new(paint);
        page.heading("summary (governing check of each file)");
        let head = ["margin", "faults", "doubts", "accepted"].into_iter().zip([14, 8, 8, 10]);
        let head: String = head.map(|(words, width)| pad_left(words, width)).collect();
        page.line(&format!("  {}{}{head}  file", pad("verdict", 14), pad("governing", 30)), Tone::Faint);
        for row in &self.rows {
            page.line(&cells(row), Tone::Verdict(row.tone));
        }
        if self.left_out > 0 {
            page.wrapped(
                "  ",
                &format!(
                    "{} more files are counted below and not listed: after the first {MOST_LISTED} files only those that \
                     do not hold are, in {MOST_ROWS} lines at most",
                    self.left_out
                ),
                Tone::Plain,
            );
        }
        page.gap();
        if self.files < of {
            page.line(&format!("PARTIAL: interrupted after {} of {of} files", self.files), Tone::Caution);
        }
        page.line(&self.tally(), Tone::Plain);
        page.finish()
    }
}

fn cells(row: &Summary) -> String {
    let verdict = pad(&format!("{} {}", row.symbol, row.verdict), 14);
    let counts = [(row.faults, 8), (row.doubts, 8), (row.accepted, 10)];
    let counts: String = counts.iter().map(|(count, width)| pad_left(&count.to_string(), *width)).collect();
    format!("  {verdict}{}{}{counts}  {}", pad(&row.governing, 30), pad_left(&row.margin, 14), row.file)
}

const fn finding(id: &'static str, about: &'static str, why: &'static str) -> DoubtRule {
    DoubtRule { id, about, why }
}

/// What an audit finds besides doubts; none of it can be accepted in a file.
pub const FINDING_RULES: &[DoubtRule] = &[
    finding(
        "file-fault",
        "the file has a fault and was refused",
        "Nothing of it was judged. Each fault says what to do.",
    ),
    finding(
        "file-unreadable",
        "the file could not be read",
        "It is missing, not permitted, no text, or larger than 1 MiB.",
    ),
    finding(
        "not-computed",
        "the fall could not be computed",
        "The file reads, and its case has no numbers here. It is no pass.",
    ),
    finding("check-short", "a check does not hold at the typical values", "The demand is beyond the limit."),
    finding(
        "check-thin",
        "a check holds at the typical values and not at the worst found in the bands",
        "What is not known about the inputs decides whether it holds.",
    ),
    finding(
        "check-open",
        "a check cannot be judged",
        "An input is missing, or the model is not valid there. It is no pass.",
    ),
];

/// Every rule of an audit: findings, then doubts.
pub fn audit_rules() -> impl Iterator<Item = &'static DoubtRule> {
    FINDING_RULES.iter().chain(DOUBT_RULES)
}

/// What a rule's finding asks of the reader.
#[must_use]
pub fn what_to_do(rule: &DoubtRule) -> String {
    match rule.id {
        "acceptance-unused" => "Take the entry out, or correct its id or place.".to_owned(),
        id if FINDING_RULES.iter().any(|finding| finding.id == id) => "Change the input or the plan.".to_owned(),
        id => format!(
            "Put the input right; or, where it is right, say so in the file: [[accept]] with doubt = \"{id}\", \
             at = \"the path of the input\" and why = \"the reason\". It stays listed with its reason."
        ),
    }
}

/// One rule in full; all in one line each where none is given.
#[must_use]
pub fn explain_text(rule: Option<&DoubtRule>, paint: Paint) -> String {
    let mut page = Page::new(paint);
    page.wrapped("", CAUTION_LINE, Tone::Caution);
    if let Some(rule) = rule {
        page.heading(rule.id);
        for words in [rule.about, rule.why, &what_to_do(rule)] {
            page.wrapped("  ", words, Tone::Plain);
        }
        return page.finish();
    }
    for (title, rules) in [("findings", FINDING_RULES), ("doubts", DOUBT_RULES)] {
        page.heading(title);
        for rule in rules {
            page.wrapped(&format!("  {}", pad(rule.id, 30)), rule.about, Tone::Plain);
        }
    }
    page.finish()
}
