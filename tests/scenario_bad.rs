//! One bad file per fault: the file and the message it must give stand together in `tests/bad/*.toml`.
//!
//! Below the line `# must say:` every line of the message stands behind `#| `. With `UNDERFOOT_BLESS=1` in the
//! environment the test writes the present messages there, to be read before they are kept.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
use std::fmt::Write as _;
use std::path::{Path, PathBuf};
use underfoot::scenario::read;

const MARK: &str = "# must say:\n";

fn fixtures() -> Vec<PathBuf> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/bad");
    let mut files: Vec<PathBuf> = std::fs::read_dir(folder).unwrap().map(|entry| entry.unwrap().path()).collect();
    files.sort();
    files
}

fn said(name: &str, input: &str) -> String {
    match read(name, input) {
        Ok(_) => "nothing: the file was read\n".to_owned(),
        Err(faults) => faults.render(false),
    }
}

#[test]
fn every_bad_file_is_refused_in_the_words_beside_it() {
    let mut wrong = String::new();
    let files = fixtures();
    assert!(files.len() >= 70, "only {} bad files were found", files.len());
    for path in files {
        let text = std::fs::read_to_string(&path).unwrap();
        let name = path.file_name().unwrap().to_string_lossy().into_owned();
        let (input, expected) = text.split_once(MARK).unwrap_or((&text, ""));
        let found = said(&name, input);
        let block: String = found.lines().map(|line| format!("#| {line}").trim_end().to_owned() + "\n").collect();
        if std::env::var_os("UNDERFOOT_BLESS").is_some() {
            std::fs::write(&path, format!("{input}{MARK}{block}")).unwrap();
        } else if block != expected {
            writeln!(wrong, "{name} must say\n{expected}but says\n{block}").unwrap();
        }
        assert!(!found.starts_with("nothing"), "{name} was read without a fault");
    }
    assert!(wrong.is_empty(), "{wrong}");
}

#[test]
fn every_message_follows_the_house_rules() {
    for path in fixtures() {
        let text = std::fs::read_to_string(&path).unwrap();
        let (input, _) = text.split_once(MARK).unwrap_or((&text, ""));
        let Err(faults) = read("f", input) else { continue };
        for fault in faults.faults {
            let all = [Some(&fault.message), Some(&fault.expected), fault.hint.as_ref()];
            for words in all.into_iter().flatten() {
                assert!(!words.ends_with('.'), "{}: `{words}` ends with a full stop", path.display());
                let first = words.chars().next().unwrap();
                assert!(!first.is_uppercase(), "{}: `{words}` starts with a capital", path.display());
            }
            assert!(fault.hint.is_some(), "{}: `{}` has no hint", path.display(), fault.message);
            assert!(!fault.expected.is_empty(), "{}: `{}` expects nothing", path.display(), fault.message);
        }
    }
}
