//! Editing a scenario file: every byte outside the edited value stays, and nothing foreign is overwritten.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
use proptest::prelude::*;
use std::path::Path;
use underfoot::quantity::Shape;
use underfoot::scenario::{Document, SaveError, StretchLaw, inputs, read};

const FILE: &str = "# head\ntitle = 'roof'   # title\n\n[subject]   # who\nkind = \"person\"\nmass = \"80..100..120 kg\"  # with tools\n\
attachment_above_feet=\"5 ft 2 in\"\n[place]\nstanding = '10 m' # roof\nanchor   =   \"12 m\"\n\n  [line]\nkind = \"lanyard\"\n\
length = \"1.8 m\"\nstiffness = { low = \"50 kN/m\", typical = \"60 kN/m\", high = \"75 kN/m\", shape = \"triangular\" } # tape\n\
damping_ratio = 0.08 # dry\n[anchor]\ncapacity = \"15 kN\"\n# before\n[[obstacle]]\nname = \"yard\"\ntop = \"0 m\"\n\
[[obstacle]]\nname = \"shed\"\ntop = \"1 m\"\nreserve = \"1 m\"   # wanted\n[limits]\nbasis = \"eu-363\"\n\
arrest_force = { value = \"5 kN\", why = \"house rule\" } # ours\n# tail\n";

fn document(text: &str) -> Document {
    Document::of_text(Path::new("roof.toml"), text.to_owned())
        .unwrap_or_else(|faults| panic!("{}", faults.render(false)))
}

fn edited(input: &str, value: &str) -> String {
    document(FILE)
        .with_value(input, value)
        .unwrap_or_else(|faults| panic!("{}", faults.render(false)))
        .text()
        .to_owned()
}

#[test]
fn one_value_changes_and_its_line_keeps_its_comment() {
    let cases = [
        ("line.length", "2 m", "length = \"1.8 m\"", "length = \"2 m\""),
        ("place.standing", "11 m", "'10 m' # roof", "'11 m' # roof"),
        ("place.anchor", "40 ft", "anchor   =   \"12 m\"", "anchor   =   \"40 ft\""),
        ("line.damping_ratio", "0.1", "0.08 # dry", "0.1 # dry"),
        ("line.damping_ratio", "10 %", "0.08 # dry", "\"10 %\" # dry"),
        ("subject.attachment_above_feet", "5 ft 3 in", "\"5 ft 2 in\"", "\"5 ft 3 in\""),
        ("subject.mass", "90 kg", "80..100..120 kg", "80..90..120 kg"),
        ("subject.mass", "130 kg", "80..100..120 kg", "80..130..130 kg"),
        ("subject.mass", "70..75..90 kg", "80..100..120 kg", "70..75..90 kg"),
        ("obstacle.2.reserve", "0.8 m", "reserve = \"1 m\"   #", "reserve = \"0.8 m\"   #"),
        ("limits.arrest_force", "4.5 kN", "value = \"5 kN\"", "value = \"4.5 kN\""),
        ("limits.basis", "own", "\"eu-363\"", "\"own\""),
        ("line.kind", "rope", "\"lanyard\"", "\"rope\""),
    ];
    for (input, value, old, new) in cases {
        assert_eq!(edited(input, value), FILE.replacen(old, new, 1), "{input} = {value}");
    }
}

#[test]
fn a_long_band_keeps_its_shape() {
    let document = document(FILE).with_value("line.stiffness", "80 kN/m").unwrap();
    let StretchLaw::Stiffness(k) = &document.scenario().line.stretch else { panic!() };
    assert_eq!((k.band.low, k.band.typical, k.band.high), (50_000.0, 80_000.0, 80_000.0));
    assert_eq!(k.band.shape, Shape::Triangular);
    assert!(document.text().contains(" } # tape"));
}

#[test]
fn the_seed_of_the_sample_is_added_and_written_anew_as_a_bare_number() {
    let first = document(FILE).with_value("study.seed", "7").unwrap();
    assert_eq!(first.scenario().study.seed, Some(7));
    assert!(first.text().contains("[study]\nseed = 7"), "{}", first.text());
    let second = first.with_value("study.seed", "8").unwrap();
    assert_eq!(second.text(), first.text().replace("seed = 7", "seed = 8"));
    assert!(second.with_value("study.samples", "0").is_err());
    let kept = second.with_value("subject.mass", "90 kg").unwrap();
    assert_eq!(kept.scenario().study.seed, Some(8));
}

#[test]
fn an_absent_key_is_added_to_its_section() {
    let cases = [
        ("obstacle.1.reserve", "1 m", "top = \"0 m\"\n", "top = \"0 m\"\nreserve = \"1 m\"\n"),
        ("line.strength", "22 kN", "# dry\n", "# dry\nstrength = \"22 kN\"\n"),
    ];
    for (input, value, before, after) in cases {
        assert_eq!(edited(input, value), FILE.replacen(before, after, 1), "{input}");
    }
    let faults = document(FILE).with_value("limits.free_fall", "1.8 m").unwrap_err();
    assert!(faults.faults[0].message.contains("without a reason"), "{}", faults.render(false));
    let harness = edited("harness.stiffness", "80 kN/m");
    assert!(harness.contains("[harness]\nstiffness = \"80 kN/m\"\n"), "{harness}");
    assert!(harness.contains("# tail"), "{harness}");
}

#[test]
fn line_ends_of_another_system_stay() {
    let text = FILE.replace('\n', "\r\n");
    let changed = document(&text).with_value("line.length", "2 m").unwrap();
    assert_eq!(changed.text(), text.replace("length = \"1.8 m\"", "length = \"2 m\""));
    let added = changed.with_value("line.strength", "22 kN").unwrap();
    assert_eq!(added.text().matches('\n').count(), added.text().matches("\r\n").count());
}

#[test]
fn a_value_that_the_file_cannot_have_is_refused_with_its_faults() {
    let document = document(FILE);
    let message = |input: &str, value: &str| document.with_value(input, value).unwrap_err().faults[0].message.clone();
    assert_eq!(message("line.length", "2"), "line length: `2` has no unit");
    assert_eq!(message("line.length", "-2 m"), "`-2 m` is outside the range of line length");
    assert_eq!(message("line.colour", "red"), "there is no input `line.colour`");
    assert_eq!(message("obstacle.7.top", "1 m"), "there is no `obstacle.7.top`");
    assert_eq!(message("line.modulus", "9 kN"), "`line.modulus` and `line.stiffness` both say how the line stretches");
    assert_eq!(document.with_value("title", "a \"b\"\n[c]").unwrap().scenario().title.as_deref(), Some("a \"b\"\n[c]"));
}

fn on_disk(folder: &tempfile::TempDir) -> std::path::PathBuf {
    let path = folder.path().join("roof.toml");
    std::fs::write(&path, FILE).unwrap();
    path
}

#[test]
fn saving_writes_the_file_and_ends_the_edit() {
    let folder = tempfile::tempdir().unwrap();
    let path = on_disk(&folder);
    let mut changed = Document::open(&path).unwrap().with_value("line.length", "2 m").unwrap();
    assert!(changed.is_edited());
    changed.save().unwrap();
    assert!(!changed.is_edited());
    assert_eq!(std::fs::read_to_string(&path).unwrap(), changed.text());
    assert_eq!(std::fs::read_dir(folder.path()).unwrap().count(), 1, "nothing is left beside the file");
    let back = changed.with_value("line.length", "1.8 m").unwrap();
    assert!(back.is_edited());
    assert!(!back.with_value("line.length", "2 m").unwrap().is_edited(), "back at what is on disk");
}

#[test]
fn a_file_changed_or_removed_meanwhile_is_not_overwritten() {
    let folder = tempfile::tempdir().unwrap();
    let path = on_disk(&folder);
    let mut changed = Document::open(&path).unwrap().with_value("line.length", "2 m").unwrap();
    std::fs::write(&path, "# somebody else\n").unwrap();
    assert!(matches!(changed.save(), Err(SaveError::ChangedOnDisk(_))));
    assert_eq!(std::fs::read_to_string(&path).unwrap(), "# somebody else\n");
    std::fs::remove_file(&path).unwrap();
    assert!(matches!(changed.save(), Err(SaveError::Vanished(_))));
    assert!(!path.exists() && changed.is_edited());
}

#[cfg(unix)]
#[test]
fn permissions_and_links_stay() {
    use std::os::unix::fs::PermissionsExt;
    let folder = tempfile::tempdir().unwrap();
    let path = on_disk(&folder);
    std::fs::set_permissions(&path, std::fs::Permissions::from_mode(0o640)).unwrap();
    let link = folder.path().join("link.toml");
    std::os::unix::fs::symlink(&path, &link).unwrap();
    Document::open(&link).unwrap().with_value("line.length", "2 m").unwrap().save().unwrap();
    assert!(std::fs::symlink_metadata(&link).unwrap().is_symlink());
    assert_eq!(std::fs::metadata(&path).unwrap().permissions().mode() & 0o777, 0o640);
    assert!(std::fs::read_to_string(&path).unwrap().contains("length = \"2 m\""));
    std::fs::set_permissions(&path, std::fs::Permissions::from_mode(0o440)).unwrap();
    let mut locked = Document::open(&path).unwrap().with_value("line.length", "3 m").unwrap();
    assert!(matches!(locked.save(), Err(SaveError::Io { .. })), "a read-only file is left alone");
}

#[test]
fn unreadable_paths_say_why() {
    let folder = tempfile::tempdir().unwrap();
    let why = |path: &Path| Document::open(path).unwrap_err().to_string();
    assert!(why(folder.path()).contains("it is a folder"));
    assert!(why(&folder.path().join("none.toml")).contains("no such file"));
    let path = folder.path().join("x.toml");
    std::fs::write(&path, b"title = \"\xff\"").unwrap();
    assert!(why(&path).contains("byte 10 is not UTF-8"));
    std::fs::write(&path, vec![b'#'; (1 << 20) + 1]).unwrap();
    assert!(why(&path).contains("larger than 1 MiB"));
}

proptest! {
    #[test]
    fn an_edit_keeps_every_byte_outside_the_value(which in 0_usize..100, scale in 0.5_f64..1.5) {
        let document = document(FILE);
        let inputs: Vec<_> = inputs(document.scenario()).into_iter().filter(|input| input.path != "gravity").collect();
        let input = &inputs[which % inputs.len()];
        let value = underfoot::quantity::format_unit(input.measure.si() * scale, input.measure.unit);
        let at = document.places().exactly(&input.path).unwrap();
        let changed = document.with_value(&input.path, &value).unwrap();
        prop_assert!(changed.text().starts_with(&FILE[..at.start]));
        prop_assert!(changed.text().ends_with(&FILE[at.end..]));
        let now = underfoot::scenario::inputs(changed.scenario()).into_iter().find(|i| i.path == input.path).unwrap();
        prop_assert!((now.measure.si() - input.measure.si() * scale).abs() <= 1e-10 * input.measure.si().abs().max(1e-3));
        for other in &inputs {
            let again = underfoot::scenario::inputs(changed.scenario()).into_iter().find(|i| i.path == other.path);
            prop_assert!(other.path == input.path || again.as_ref() == Some(other), "{} changed too", other.path);
        }
    }

    #[test]
    fn any_text_given_as_a_value_is_refused_or_read_back(value in "\\PC{0,20}", which in 0_usize..3) {
        let input = ["title", "line.length", "obstacle.2.reserve"][which];
        if let Ok(changed) = document(FILE).with_value(input, &value) {
            prop_assert!(read("again", changed.text()).is_ok());
            if which == 0 { prop_assert_eq!(changed.scenario().title.as_deref(), Some(value.trim())); }
        }
    }
}
