//! Order in the house: who may import whom, how long files and functions are, what every module opens with, and a
//! word no text of the program may say.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
use std::fs;
use std::path::{Path, PathBuf};

const LONGEST_FILE: usize = 400;
const LONGEST_FUNCTION: usize = 80;

/// Each layer with the layers it may import.
const MAY_IMPORT: [(&str, &[&str]); 11] = [
    ("quantity", &[]),
    ("physics", &[]),
    ("arrest", &["physics"]),
    ("swing", &["physics", "arrest"]),
    ("scenario", &["quantity"]),
    ("estimate", &["quantity", "physics", "arrest", "swing", "scenario"]),
    ("margin", &["quantity", "scenario", "estimate"]),
    ("study", &["quantity", "scenario", "estimate", "margin"]),
    ("sheet", &["quantity", "scenario", "estimate", "margin", "study"]),
    ("cli", &["quantity", "scenario", "estimate", "margin", "study", "sheet"]),
    ("tui", &["quantity", "scenario", "estimate", "margin", "study", "sheet"]),
];

struct Source {
    path: PathBuf,
    text: String,
    /// The text with comments and literals blanked.
    code: String,
    literals: Vec<String>,
}

fn sources() -> Vec<Source> {
    let mut paths = Vec::new();
    collect(&Path::new(env!("CARGO_MANIFEST_DIR")).join("src"), &mut paths);
    paths.sort();
    assert!(paths.len() > 20, "only {} source files found", paths.len());
    paths.iter().map(|path| read(path)).collect()
}

fn collect(folder: &Path, found: &mut Vec<PathBuf>) {
    for entry in fs::read_dir(folder).expect("a folder") {
        let path = entry.expect("an entry").path();
        if path.is_dir() {
            collect(&path, found);
        } else if path.extension().is_some_and(|ending| ending == "rs") {
            found.push(path);
        }
    }
}

fn read(path: &Path) -> Source {
    let text = fs::read_to_string(path).expect("a source file");
    let (code, literals) = split(&text);
    let root = Path::new(env!("CARGO_MANIFEST_DIR")).join("src");
    Source { path: path.strip_prefix(root).expect("below src").to_owned(), text, code, literals }
}

/// Parts code from comments and string literals; line breaks stay in the code.
fn split(text: &str) -> (String, Vec<String>) {
    let mut code = String::new();
    let mut literals = Vec::new();
    let mut rest = text;
    while let Some(first) = rest.chars().next() {
        let after_word = code.ends_with(|c: char| c.is_alphanumeric() || c == '_');
        let taken = if rest.starts_with("//") {
            rest.find('\n').unwrap_or(rest.len())
        } else if rest.starts_with("/*") {
            rest.find("*/").map_or(rest.len(), |end| end + 2)
        } else if let Some(length) = raw_string(rest).filter(|_| !after_word) {
            literals.push(rest[..length].to_owned());
            length
        } else if first == '"' {
            let length = plain_string(rest);
            literals.push(rest[..length].to_owned());
            length
        } else if let Some(length) = character(rest) {
            length
        } else {
            code.push(first);
            rest = &rest[first.len_utf8()..];
            continue;
        };
        code.extend(rest[..taken].chars().filter(|c| *c == '\n'));
        rest = &rest[taken..];
    }
    (code, literals)
}

fn plain_string(rest: &str) -> usize {
    let mut escaped = false;
    for (at, c) in rest.char_indices().skip(1) {
        match c {
            _ if escaped => escaped = false,
            '\\' => escaped = true,
            '"' => return at + 1,
            _ => {}
        }
    }
    rest.len()
}

fn raw_string(rest: &str) -> Option<usize> {
    let hashes = rest.strip_prefix('r')?.chars().take_while(|c| *c == '#').count();
    let open = 1 + hashes;
    rest[open..].strip_prefix('"')?;
    let close = format!("\"{}", "#".repeat(hashes));
    rest[open + 1..].find(&close).map(|end| open + 1 + end + close.len())
}

/// A character literal, so that `'"'` does not open a string; a lifetime is none.
fn character(rest: &str) -> Option<usize> {
    let inner = rest.strip_prefix('\'')?;
    let length = if let Some(escape) = inner.strip_prefix('\\') {
        escape.char_indices().skip(1).find(|(_, c)| *c == '\'')?.0 + 1
    } else {
        inner.chars().next()?.len_utf8()
    };
    inner[length..].starts_with('\'').then_some(length + 2)
}

fn layer(source: &Source) -> Option<&str> {
    let first = source.path.components().next()?.as_os_str().to_str()?;
    let name = first.strip_suffix(".rs").unwrap_or(first);
    MAY_IMPORT.iter().find(|row| row.0 == name).map(|row| row.0)
}

/// Names that follow `crate::` anywhere, also inside braces.
fn imports(code: &str) -> Vec<String> {
    let mut names = Vec::new();
    for (at, matched) in code.match_indices("crate::") {
        let rest = code[at + matched.len()..].trim_start();
        match rest.strip_prefix('{') {
            Some(group) => names.extend(group_heads(group)),
            None => names.push(head(rest)),
        }
    }
    names
}

fn head(path: &str) -> String {
    path.chars().take_while(|c| c.is_alphanumeric() || *c == '_').collect()
}

fn group_heads(group: &str) -> Vec<String> {
    let mut heads = Vec::new();
    let mut depth = 0;
    let mut start = true;
    for (at, c) in group.char_indices() {
        match c {
            '}' if depth == 0 => break,
            '{' => depth += 1,
            '}' => depth -= 1,
            ',' if depth == 0 => start = true,
            c if start && !c.is_whitespace() => {
                heads.push(head(&group[at..]));
                start = false;
            }
            _ => {}
        }
    }
    heads
}

/// Layer names reached by climbing out with `super`.
fn climbs(source: &Source) -> Vec<String> {
    let is_layer = |name: &str| MAY_IMPORT.iter().any(|row| row.0 == name);
    let after = source.code.match_indices("super::").map(|(at, matched)| head(&source.code[at + matched.len()..]));
    let nested = source.path.components().count() > 1 || source.path.ends_with("mod.rs");
    after.filter(|name| nested && is_layer(name) && layer(source) != Some(name)).collect()
}

fn import_breaches(source: &Source) -> Vec<String> {
    let Some(layer) = layer(source) else { return Vec::new() };
    let allowed = MAY_IMPORT.iter().find(|row| row.0 == layer).map_or(&[][..], |row| row.1);
    let known = |name: &String| MAY_IMPORT.iter().any(|row| row.0 == name);
    imports(&source.code)
        .into_iter()
        .filter(known)
        .filter(|name| name != layer && !allowed.contains(&name.as_str()))
        .chain(climbs(source).into_iter().filter(|name| !allowed.contains(&name.as_str())))
        .map(|name| format!("{} imports {name}", source.path.display()))
        .collect()
}

/// Name and length of every function longer than allowed; relies on the formatter's indentation.
fn long_functions(source: &Source) -> Vec<String> {
    let lines: Vec<&str> = source.code.lines().collect();
    let mut found = Vec::new();
    for (number, line) in lines.iter().enumerate() {
        let words = line.trim_start();
        let opens = ["fn ", "pub fn ", "pub(crate) fn ", "pub(super) fn ", "const fn ", "pub const fn "];
        if !opens.iter().any(|open| words.starts_with(open)) {
            continue;
        }
        let close = format!("{}}}", " ".repeat(line.len() - words.len()));
        let length = lines[number..].iter().position(|line| *line == close).map_or(1, |end| end + 1);
        if length > LONGEST_FUNCTION && !words.trim_end().ends_with(';') {
            found.push(format!("{}:{} has {length} lines", source.path.display(), number + 1));
        }
    }
    found
}

fn says_safe(literal: &str) -> bool {
    literal.split(|c: char| !c.is_alphanumeric()).any(|word| matches!(&*word.to_lowercase(), "safe" | "safely"))
}

fn none(breaches: &[String]) {
    assert!(breaches.is_empty(), "\n{}", breaches.join("\n"));
}

#[test]
fn layers_import_only_what_lies_below_them() {
    none(&sources().iter().flat_map(import_breaches).collect::<Vec<_>>());
}

#[test]
fn every_folder_and_file_of_the_library_is_a_known_layer() {
    let strangers = sources().into_iter().filter(|source| layer(source).is_none());
    let names: Vec<String> = strangers.map(|source| source.path.display().to_string()).collect();
    assert_eq!(names, ["lib.rs", "main.rs"]);
}

#[test]
fn no_source_file_is_longer_than_four_hundred_lines() {
    let long = sources().into_iter().filter(|source| source.text.lines().count() > LONGEST_FILE);
    none(&long.map(|source| source.path.display().to_string()).collect::<Vec<_>>());
}

#[test]
fn every_module_says_on_top_what_it_is() {
    let silent = sources().into_iter().filter(|source| !source.text.starts_with("//! "));
    none(&silent.map(|source| source.path.display().to_string()).collect::<Vec<_>>());
}

#[test]
fn no_function_is_longer_than_eighty_lines() {
    none(&sources().iter().flat_map(long_functions).collect::<Vec<_>>());
}

#[test]
fn no_text_of_the_program_calls_anything_safe() {
    let claims = sources().into_iter().flat_map(|source| {
        let name = source.path.display().to_string();
        source.literals.into_iter().filter(|text| says_safe(text)).map(move |text| format!("{name}: {text}"))
    });
    none(&claims.collect::<Vec<_>>());
}

#[test]
fn no_shipped_scenario_calls_anything_safe() {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios");
    let files = fs::read_dir(folder).into_iter().flatten().map(|entry| entry.expect("an entry").path());
    let claims = files.filter(|path| path.is_file() && says_safe(&fs::read_to_string(path).unwrap_or_default()));
    none(&claims.map(|path| path.display().to_string()).collect::<Vec<_>>());
}

fn sample(path: &str, text: &str) -> Source {
    let (code, literals) = split(text);
    Source { path: PathBuf::from(path), text: text.to_owned(), code, literals }
}

#[test]
fn a_breach_of_the_import_table_is_noticed_in_every_spelling() {
    for text in [
        "use crate::tui::Model;",
        "use crate::{\n    quantity::Band,\n    tui::{self, Model},\n};",
        "fn f() { crate::tui::run() }",
        "use super::super::tui;",
    ] {
        assert_eq!(import_breaches(&sample("cli/run.rs", text)).len(), 1, "{text}");
    }
    for text in ["// use crate::tui::Model;", "const A: &str = \"crate::tui::Model\";", "use crate::margin::Check;"] {
        assert_eq!(import_breaches(&sample("cli/run.rs", text)).len(), 0, "{text}");
    }
}

#[test]
fn a_claim_is_noticed_in_every_kind_of_literal() {
    for text in
        ["f(\"It is Safe.\")", "r#\"a \"safe\" fall\"#", "('\"', \"safe\")", "fn f<'a>(x: &'a str) { \"safe\" }"]
    {
        assert!(split(text).1.iter().any(|literal| says_safe(literal)), "{text}");
    }
    assert!(!split("\"SAFETY.md, unsafe\" // safe").1.iter().any(|literal| says_safe(literal)));
}

#[test]
fn a_long_function_is_noticed() {
    let body = "    x();\n".repeat(79);
    assert_eq!(long_functions(&sample("cli/run.rs", &format!("fn f() {{\n{body}}}\n"))).len(), 1);
    assert_eq!(long_functions(&sample("cli/run.rs", "fn f() {\n    x();\n}\n")).len(), 0);
}
