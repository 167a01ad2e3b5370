//! `audit`: files and folders for a reviewer.
use super::exit::Code;
use super::interrupt::Interrupt;
use super::options::AuditArgs;
use super::output::{self, PAINT, Reader};
use super::run::{Failure, load_and_judge};
use crate::scenario::{doubts, is_walk};
use crate::sheet::{Audited, Finding, audit_head, audit_json, audit_text, tally};
use std::io;
use std::path::{Path, PathBuf};

/// Reviews every file; the largest exit code counts.
pub fn audit(args: &AuditArgs) -> Code {
    let (files, mut code) = gather(&args.paths);
    let mut reader = if args.json { Reader::Listens } else { output::results(&audit_head(PAINT)) };
    let mut verdicts = Vec::with_capacity(files.len());
    let interrupt = Interrupt::listen();
    for path in &files {
        let (audited, own_code) = one_file(path, &interrupt);
        code = code.max(own_code);
        verdicts.push(audited.verdict());
        let text = if args.json { audit_json(&audited) } else { audit_text(&audited, args.units.system(), PAINT) };
        if reader == Reader::Listens {
            reader = output::results(&text);
        }
        if interrupt.is_pressed() {
            code = Code::Interrupted;
            interrupt.tell();
            break;
        }
    }
    last_line(&tally(&verdicts), args.json, reader);
    code
}

/// The count goes to stderr where stdout carries JSON.
fn last_line(words: &str, json: bool, reader: Reader) {
    if json {
        output::message(words);
    } else if reader == Reader::Listens {
        output::results(&format!("\n{words}\n"));
    }
}

fn one_file(path: &Path, interrupt: &Interrupt) -> (Audited, Code) {
    let file = path.display().to_string();
    let (finding, code) = match load_and_judge(path, interrupt) {
        Ok((loaded, report)) => {
            let code = Code::from(report.verdict);
            let doubts = doubts(&file, &loaded.text, &loaded.scenario);
            (Finding::Judged(Box::new(report), doubts), code)
        }
        Err(failure) => {
            let code = failure.code();
            (finding_of(failure), code)
        }
    };
    (Audited { file, finding }, code)
}

fn finding_of(failure: Failure) -> Finding {
    match failure {
        Failure::Refused(faults) => Finding::Refused(faults),
        Failure::Unreadable(why) => Finding::Unreadable(why),
        Failure::NotComputed { reason, .. } => Finding::NotComputed(reason),
    }
}

/// Files as given, folders searched; in the order given, a folder's files by name.
fn gather(paths: &[PathBuf]) -> (Vec<PathBuf>, Code) {
    let mut files = Vec::new();
    let mut code = Code::Holds;
    for path in paths {
        if !path.is_dir() {
            files.push(path.clone());
            continue;
        }
        let before = files.len();
        if let Err(error) = search(path, &mut files) {
            output::message(&format!("cannot search `{}`: {error}", path.display()));
            code = Code::WrongInput;
        } else if files.len() == before {
            output::message(&format!("no `*.toml` below `{}`; name the files themselves", path.display()));
            code = Code::WrongInput;
        }
    }
    (files, code)
}

/// Links to folders are not followed, so that no folder is searched twice.
fn search(folder: &Path, files: &mut Vec<PathBuf>) -> io::Result<()> {
    let mut entries = std::fs::read_dir(folder)?.collect::<io::Result<Vec<_>>>()?;
    entries.sort_by_key(std::fs::DirEntry::file_name);
    for entry in entries {
        let path = entry.path();
        if entry.file_type()?.is_dir() {
            search(&path, files)?;
        } else if is_walk(&path) {
            output::message(&format!(
                "`{0}` is a walk-through and was passed over; `underfoot walk {0} --text` checks it",
                path.display()
            ));
        } else if path.extension().is_some_and(|ending| ending == "toml") {
            files.push(path);
        }
    }
    Ok(())
}
