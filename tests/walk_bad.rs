//! One bad walk-through per fault: the file and the message it must give stand together in `tests/bad_walks/*.toml`.
//!
//! Below the line `# must say:` every line of the message stands behind `#| `. With `UNDERFOOT_BLESS=1` in the
//! environment the test writes the present messages there, to be read before they are kept.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
use std::fmt::Write as _;
use std::path::{Path, PathBuf};
use underfoot::scenario::{Faults, read_walk};

const MARK: &str = "# must say:\n";

fn folder() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/bad_walks")
}

/// Name, input and expected words of every bad walk.
fn fixtures() -> Vec<(PathBuf, String, String)> {
    let mut files: Vec<PathBuf> = std::fs::read_dir(folder()).unwrap().map(|entry| entry.unwrap().path()).collect();
    files.sort();
    let parted = |path: PathBuf| {
        let text = std::fs::read_to_string(&path).unwrap();
        let (input, expected) = text.split_once(MARK).unwrap_or((&text, ""));
        (path.clone(), input.to_owned(), expected.to_owned())
    };
    files.into_iter().map(parted).collect()
}

fn refused(path: &Path, input: &str) -> Faults {
    let name = path.file_name().unwrap().to_string_lossy().into_owned();
    match read_walk(&name, &folder(), input) {
        Ok(_) => panic!("{name} was read without a fault"),
        Err(faults) => faults,
    }
}

#[test]
fn every_bad_walk_is_refused_in_the_words_beside_it() {
    let mut wrong = String::new();
    let all = fixtures();
    assert!(all.len() >= 40, "only {} bad walks were found", all.len());
    for (path, input, expected) in all {
        let found = refused(&path, &input).render(false);
        let block: String = found.lines().map(|line| format!("#| {line}").trim_end().to_owned() + "\n").collect();
        if std::env::var_os("UNDERFOOT_BLESS").is_some() {
            std::fs::write(&path, format!("{input}{MARK}{block}")).unwrap();
        } else if block != expected {
            writeln!(wrong, "{} must say\n{expected}but says\n{block}", path.display()).unwrap();
        }
    }
    assert!(wrong.is_empty(), "{wrong}");
}

#[test]
fn every_message_has_its_place_and_follows_the_house_rules() {
    for (path, input, _) in fixtures() {
        let faults = refused(&path, &input);
        for row in faults.rows() {
            assert!(row.line >= 1 && row.column >= 1);
            let hint = row.hint.unwrap_or_else(|| panic!("{}: `{}` has no hint", path.display(), row.message));
            for words in [&row.message, &row.expected, &hint] {
                assert!(!words.is_empty() && !words.ends_with('.'), "{}: `{words}`", path.display());
                assert!(!words.chars().next().unwrap().is_uppercase(), "{}: `{words}`", path.display());
            }
        }
    }
}

#[test]
fn faults_of_several_stops_are_told_at_once_in_their_order() {
    let (path, input, _) =
        fixtures().into_iter().find(|(path, ..)| path.ends_with("faults_of_several_stops.toml")).unwrap();
    let lines: Vec<usize> = refused(&path, &input).rows().iter().map(|row| row.line).collect();
    assert_eq!(lines.len(), 3, "{lines:?}");
    assert!(lines.is_sorted(), "{lines:?}");
}

#[test]
fn a_walk_of_more_than_two_hundred_stops_or_more_than_a_mebibyte_is_refused() {
    let head = "scenario = \"../../scenarios/roof-foot-level.toml\"\n";
    let many = |count: usize| head.to_owned() + &"[[stop]]\nsay = \"Look.\"\n".repeat(count);
    assert!(read_walk("many", &folder(), &many(200)).is_ok());
    let faults = refused(Path::new("many"), &many(201));
    assert_eq!(faults.faults.len(), 1);
    assert!(faults.faults[0].message.contains("more than 200 stops"));
    let large = format!("{head}# {}\n", "x".repeat(1 << 20));
    assert!(refused(Path::new("large"), &large).faults[0].message.contains("more than 1 MiB"));
}
