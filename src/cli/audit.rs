//! `audit`: files, folders and patterns for a reviewer, and for a gate.
use super::exit::Code;
use super::gather::Gathered;
use super::interrupt::Interrupt;
use super::meter::Meter;
use super::options::{AuditArgs, Require};
use super::output::{self, PAINT, Reader};
use super::run::{Failure, load_and_report};
use crate::margin::{self, Verdict};
use crate::scenario::{Loaded, review};
use crate::sheet::{
    AuditTable, Audited, Finding, Report, Summary, audit_head, audit_json, audit_rules, audit_text, explain_text,
    file_uri, interrupted_json, report_worst, sarif_close, sarif_open, sarif_results,
};
use rayon::prelude::*;
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::path::{Path, PathBuf};
use std::sync::atomic::{AtomicUsize, Ordering};

/// Files that each thread is given before the results of all are written: so many results at most are held at a time.
const FILES_A_THREAD: usize = 32;

/// How the results are written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Form {
    Text,
    Brief,
    Json,
    Sarif,
}

/// What is kept of one file until it is written.
struct Seen {
    summary: Summary,
    text: String,
    code: Code,
}

/// Reviews every file; the largest exit code counts.
pub fn audit(args: &AuditArgs) -> Code {
    if let Some(id) = &args.explain {
        return explain(id);
    }
    let interrupt = Interrupt::listen();
    let gathered = Gathered::of(&args.paths);
    let mut gate = Gate {
        args,
        form: form(args),
        interrupt,
        meter: Meter::new(),
        table: AuditTable::default(),
        code: gathered.code(),
        reader: Reader::Listens,
        first_result: true,
    };
    gate.head();
    gate.all(&gathered.files);
    gate.end(gathered.files.len())
}

const fn form(args: &AuditArgs) -> Form {
    match (args.sarif, args.json, args.brief) {
        (true, ..) => Form::Sarif,
        (_, true, _) => Form::Json,
        (.., true) => Form::Brief,
        _ => Form::Text,
    }
}

/// One audit.
struct Gate<'a> {
    args: &'a AuditArgs,
    form: Form,
    interrupt: Interrupt,
    meter: Meter,
    table: AuditTable,
    code: Code,
    reader: Reader,
    first_result: bool,
}

impl Gate<'_> {
    fn head(&mut self) {
        let head = match self.form {
            Form::Text | Form::Brief => audit_head(PAINT),
            Form::Json => return,
            Form::Sarif => sarif_open(),
        };
        self.write(&head);
    }

    fn write(&mut self, text: &str) {
        if self.reader == Reader::Listens && !text.is_empty() {
            self.reader = self.meter.aside(|| output::results(text));
        }
    }

    /// In order, and in parallel within a piece of the list; after Ctrl-C what was finished without a gap is written.
    fn all(&mut self, files: &[PathBuf]) {
        let done = AtomicUsize::new(0);
        for piece in files.chunks(FILES_A_THREAD * rayon::current_num_threads()) {
            let seen: Vec<Option<Seen>> = piece
                .par_iter()
                .with_max_len(1)
                .map(|path| {
                    let seen = self.one(path)?;
                    self.meter.count("files", done.fetch_add(1, Ordering::Relaxed) + 1, files.len());
                    Some(seen)
                })
                .collect();
            let mut text = String::new();
            for seen in seen.into_iter().map_while(|seen| seen) {
                self.take(seen, &mut text);
            }
            self.write(&text);
            if self.interrupt.is_pressed() {
                return;
            }
        }
    }

    fn take(&mut self, seen: Seen, text: &mut String) {
        self.code = self.code.max(seen.code);
        self.table.push(seen.summary);
        if !seen.text.is_empty() {
            if self.form == Form::Sarif && !self.first_result {
                text.push_str(",\n");
            }
            self.first_result = false;
            text.push_str(&seen.text);
        }
    }

    /// One file; none once Ctrl-C was pressed, also where that broke its search off.
    fn one(&self, path: &Path) -> Option<Seen> {
        if self.interrupt.is_pressed() {
            return None;
        }
        // A fault of the program in one file must not take the others with it.
        let judged = catch_unwind(AssertUnwindSafe(|| self.judged(path))).unwrap_or_else(|_| Err(broken(path)));
        let (finding, code) = match judged {
            Ok((loaded, report)) => {
                let doubts = margin::doubts(&report.scenario, &report.margins).unwrap_or_default();
                let review = review(&report.file, &loaded.text, &loaded.scenario, Some(doubts));
                let code = code_of(report.verdict, self.args.require);
                (Finding::Judged(Box::new(report), review), code)
            }
            Err(failure) => {
                let code = failure.code();
                (finding_of(failure), code)
            }
        };
        if self.interrupt.is_pressed() {
            return None;
        }
        let audited = Audited { file: path.display().to_string(), uri: file_uri(path), finding };
        let system = self.args.units.system();
        let text = match self.form {
            Form::Text => audit_text(&audited, system, PAINT),
            Form::Brief => String::new(),
            Form::Json => audit_json(&audited),
            Form::Sarif => sarif_results(&audited).join(",\n"),
        };
        Some(Seen { summary: Summary::of(&audited, system), text, code })
    }

    /// With the worst found in the bands where the typical values hold: nothing in the bands betters another verdict.
    fn judged(&self, path: &Path) -> Result<(Loaded, Report), Failure> {
        let (loaded, mut report) = load_and_report(path)?;
        if report.verdict != Verdict::Holds {
            return Ok((loaded, report));
        }
        let found = report_worst(&report, &|_| self.interrupt.flow());
        let put = found.and_then(|bands| bands.map_or(Ok(()), |bands| report.add_bands(bands)));
        put.map_err(|error| Failure::NotComputed { file: report.file.clone(), reason: error.to_string() })?;
        Ok((loaded, report))
    }

    fn end(&mut self, of: usize) -> Code {
        self.meter.clear();
        let complete = self.table.files() == of;
        if !complete {
            self.code = Code::Interrupted;
        }
        match self.form {
            Form::Text | Form::Brief => self.write(&self.table.text(of, PAINT)),
            Form::Sarif => self.write(&sarif_close(complete, self.code.number())),
            Form::Json if !complete => self.write(&interrupted_json(self.table.files(), of)),
            Form::Json => {}
        }
        if !complete {
            let files = self.table.files();
            output::message(&format!("interrupted: {files} of {of} files were looked at, the results are a part only"));
        }
        if matches!(self.form, Form::Json | Form::Sarif) {
            output::message(&self.table.tally());
        }
        self.code
    }
}

fn broken(path: &Path) -> Failure {
    let reason = "the program failed on it, see the report on standard error; please send the file with it".to_owned();
    Failure::NotComputed { file: path.display().to_string(), reason }
}

const fn code_of(verdict: Verdict, require: Require) -> Code {
    match (verdict, require) {
        (Verdict::Holds, _) | (Verdict::Thin, Require::Thin) => Code::Holds,
        _ => Code::NotHeld,
    }
}

fn finding_of(failure: Failure) -> Finding {
    match failure {
        Failure::Refused(faults) => Finding::Refused(faults),
        Failure::Unreadable(why) => Finding::Unreadable(why),
        Failure::NotComputed { reason, .. } => Finding::NotComputed(reason),
    }
}

/// Words of more likeness than this were meant.
const LIKE: f64 = 0.8;

/// One finding or doubt in full; the list of all where none is named or the name is unknown.
fn explain(id: &str) -> Code {
    let rule = audit_rules().find(|rule| rule.id == id);
    if rule.is_none() && !id.is_empty() {
        let near = audit_rules().map(|rule| (strsim::jaro_winkler(id, rule.id), rule.id));
        let near = near.filter(|(likeness, _)| *likeness > LIKE).max_by(|a, b| a.0.total_cmp(&b.0));
        let hint = near.map_or_else(String::new, |(_, near)| format!("did you mean `{near}`? "));
        output::message(&format!("no doubt has the id `{id}`; {hint}all are listed on standard output"));
    }
    output::results(&explain_text(rule, PAINT));
    if rule.is_some() || id.is_empty() { Code::Holds } else { Code::WrongInput }
}
