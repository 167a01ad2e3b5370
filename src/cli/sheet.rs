//! `sheet`: the calculation sheet of one file.
use super::exit::Code;
use super::interrupt::Interrupt;
use super::options::{SheetArgs, Units};
use super::output;
use super::run::load_and_judge;
use crate::sheet::{self, Report, SheetOptions, ranking, sheet_html, sheet_json, sheet_markdown};
use crate::study::{Evaluator, Remedies, StudyError, remedies};
use std::io::{self, ErrorKind, Write};
use std::path::Path;

/// What a sheet is written as.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Form {
    Html,
    Markdown,
    Json,
}

impl Form {
    fn of(path: &Path) -> Option<Self> {
        match path.extension()?.to_str()?.to_ascii_lowercase().as_str() {
            "html" | "htm" => Some(Self::Html),
            "md" | "markdown" => Some(Self::Markdown),
            "json" => Some(Self::Json),
            _ => None,
        }
    }
}

/// Writes the sheet; the exit code tells the verdict.
fn written_form(args: &SheetArgs, path: &Path, form: Form) -> Code {
    let interrupt = Interrupt::listen();
    let (loaded, report) = match load_and_judge(&args.file, &interrupt) {
        Ok(both) => both,
        Err(failure) => {
            failure.print();
            return failure.code();
        }
    };
    if interrupt.is_pressed() {
        output::message("interrupted: no sheet was written");
        return Code::Interrupted;
    }
    let options = match options(args, path, &report) {
        Ok(options) => options,
        Err(error) => {
            output::message(&error.to_string());
            return Code::NotComputed;
        }
    };
    let value = sheet::sheet(&report, &loaded.text, &options);
    let bytes = match form {
        Form::Html => sheet_html(&value),
        Form::Markdown => sheet_markdown(&value),
        Form::Json => sheet_json(&value, &report),
    };
    written(path, &bytes, args.replace, &report)
}

/// Looks at where the sheet is to go before anything is computed.
pub fn sheet(args: &SheetArgs) -> Code {
    let wrong = |message: &str| {
        output::message(message);
        Code::WrongInput
    };
    let Some(path) = args.output.as_deref().filter(|path| *path != Path::new("-")) else {
        return wrong("a sheet goes to a file: state `-o NAME.html`, `-o NAME.md` or `-o NAME.json`");
    };
    let Some(form) = Form::of(path) else {
        return wrong(&format!(
            "`{}` does not say what the sheet is; let it end in `.html`, `.md` or `.json`",
            path.display()
        ));
    };
    if !args.replace && path.exists() {
        return wrong(&exists(path));
    }
    written_form(args, path, form)
}

fn exists(path: &Path) -> String {
    format!("`{}` exists and was left as it is; choose another name, or add `--replace`", path.display())
}

fn options(args: &SheetArgs, path: &Path, report: &Report) -> Result<SheetOptions, StudyError> {
    let worked = |wanted: bool| -> Result<Option<Remedies>, StudyError> {
        if !wanted {
            return Ok(None);
        }
        remedies(&Evaluator::new(&report.scenario)?).map(Some)
    };
    Ok(SheetOptions {
        system: args.units.system(),
        command: command(args, path),
        ranking: ranking(report)?,
        remedies: worked(args.remedies)?,
    })
}

/// The command that makes the sheet again. The name of the sheet is no part of what it says: two copies are equal.
fn command(args: &SheetArgs, path: &Path) -> String {
    let ending = path.extension().and_then(|ending| ending.to_str()).unwrap_or("html");
    let units = if args.units == Units::Us { " --units us" } else { "" };
    let remedies = if args.remedies { " --remedies" } else { "" };
    format!("underfoot sheet {}{units}{remedies} -o OUT.{ending}", quoted(&args.file))
}

/// A name as a shell reads it.
fn quoted(path: &Path) -> String {
    let name = path.display().to_string();
    let plain = |c: char| c.is_alphanumeric() || "-_./+:,@".contains(c);
    if name.chars().all(plain) { name } else { format!("'{}'", name.replace('\'', "'\\''")) }
}

fn written(path: &Path, text: &str, replace: bool, report: &Report) -> Code {
    match write(path, text.as_bytes(), replace) {
        Ok(()) => {
            output::message(&format!("wrote `{}`: {}", path.display(), report.verdict.word()));
            Code::from(report.verdict)
        }
        Err(error) if error.kind() == ErrorKind::AlreadyExists => {
            output::message(&exists(path));
            Code::WrongInput
        }
        Err(error) => {
            output::message(&format!("cannot write `{}`: {error}; choose another place", path.display()));
            Code::WrongInput
        }
    }
}

/// Writes beside and renames, so that there is never half a sheet.
fn write(path: &Path, bytes: &[u8], replace: bool) -> io::Result<()> {
    let folder = path.parent().filter(|folder| !folder.as_os_str().is_empty()).unwrap_or(Path::new("."));
    let mut builder = tempfile::Builder::new();
    builder.prefix(".underfoot-sheet-");
    readable(&mut builder);
    let mut file = builder.tempfile_in(folder)?;
    file.write_all(bytes)?;
    file.as_file().sync_all()?;
    let moved = if replace { file.persist(path) } else { file.persist_noclobber(path) };
    moved.map(|_| ()).map_err(|error| error.error)
}

/// As any new file: what the user's mask lets others read.
#[cfg(unix)]
fn readable(builder: &mut tempfile::Builder<'_, '_>) {
    use std::os::unix::fs::PermissionsExt;
    builder.permissions(std::fs::Permissions::from_mode(0o666));
}

#[cfg(not(unix))]
fn readable(_: &mut tempfile::Builder<'_, '_>) {}
