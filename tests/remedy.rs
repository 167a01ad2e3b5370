//! Remedies put back into the file make every check hold, and a step short of them does not.
#![expect(clippy::unwrap_used, reason = "a test stops at what it cannot have")]
use assert_cmd::cargo::cargo_bin_cmd;
use predicates::prelude::*;
use proptest::prelude::*;
use std::fs;
use std::ops::ControlFlow;
use std::path::Path;
use std::sync::atomic::{AtomicUsize, Ordering};
use underfoot::margin::{Verdict, worst};
use underfoot::scenario::{Document, Scenario};
use underfoot::study::{
    Evaluator, Held, Remedies, Run, Scale, Step, Wanted, Without, Yard, remedies, remedies_of, unwatched, worst_found,
};

const SHORT: &str = "scenarios/low-scaffold-short.toml";

fn word(run: &Run) -> Verdict {
    worst(run.checks.iter().map(|check| check.verdict))
}

fn verdict(scenario: &Scenario) -> Verdict {
    word(&Evaluator::new(scenario).unwrap().typical())
}

fn shipped() -> Document {
    Document::of_text(Path::new(SHORT), fs::read_to_string(SHORT).unwrap()).unwrap()
}

/// How many remedies were put back.
fn put_back(document: &Document) -> usize {
    let evaluator = Evaluator::new(document.scenario()).unwrap();
    let found = remedies(&evaluator).unwrap();
    let mut count = 0;
    for remedy in &found.list {
        let Some(way) = &remedy.way else { continue };
        let path = &remedy.input.path;
        let mended = document.with_value(path, &way.written).unwrap();
        assert_eq!(verdict(mended.scenario()), Verdict::Holds, "{path} {}", way.written);
        let today = remedy.input.measure.si();
        let step = 1e-4 * way.value.abs() * (today - way.value).signum();
        let index = evaluator.index_of(path).unwrap();
        let back = way.value + if step.abs() < (today - way.value).abs() { step } else { today - way.value };
        assert_ne!(word(&evaluator.at(&[(index, back)]).unwrap()), Verdict::Holds, "{path} at {back} already holds");
        assert!(way.ways >= 1);
        count += 1;
    }
    let changes: Vec<f64> = found.list.iter().filter_map(|r| r.way.as_ref()).map(|w| w.relative).collect();
    assert!(changes.is_sorted());
    count
}

#[test]
fn the_shipped_short_scenario_has_remedies_that_hold_when_put_back() {
    assert!(put_back(&shipped()) >= 2);
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(24))]
    #[test]
    fn remedies_hold_when_put_back_and_a_step_short_does_not(
        mass in 60.0..115.0_f64, length in 1.0..2.0_f64, standing in 3.0..7.0_f64, force in 2.5..5.5_f64,
    ) {
        let mut document = shipped();
        for (path, value) in [
            ("subject.mass", format!("{mass:.2} kg")),
            ("line.length", format!("{length:.3} m")),
            ("place.standing", format!("{standing:.2} m")),
            ("place.anchor", format!("{standing:.2} m")),
            ("absorber.deploy_force", format!("{force:.2} kN")),
        ] {
            document = document.with_value(path, &value).unwrap();
        }
        put_back(&document);
    }
}

fn searched(document: &Document, wanted: Wanted) -> (Evaluator, Remedies) {
    let evaluator = Evaluator::new(document.scenario()).unwrap();
    let found = remedies_of(&evaluator, wanted, &unwatched).unwrap();
    (evaluator, found)
}

/// The verdict at the worst found in the bands of a file.
fn worst_verdict(document: &Document) -> Verdict {
    let found = worst_found(&Evaluator::new(document.scenario()).unwrap(), &unwatched).unwrap();
    worst(found.checks.iter().map(|check| check.verdict))
}

/// The low scaffold made higher, so that bands decide, with bands of mass, force and stiffness.
fn banded(standing: f64, length: f64) -> Document {
    let mut document = shipped();
    for (path, value) in [
        ("subject.mass", "80..100..110 kg".to_owned()),
        ("absorber.deploy_force", "3.4..4..4.6 kN".to_owned()),
        ("line.stiffness", "50..60..75 kN/m".to_owned()),
        ("line.length", format!("{length:.3} m")),
        ("place.standing", format!("{standing:.2} m")),
        ("place.anchor", format!("{standing:.2} m")),
    ] {
        document = document.with_value(path, &value).unwrap();
    }
    document
}

const AT_WORST: Wanted = Wanted { held: Held::Worst, pairs: false };
const IN_PAIRS: Wanted = Wanted { held: Held::Typical, pairs: true };

/// How many remedies at the worst were put back.
fn put_back_at_worst(document: &Document) -> usize {
    let (evaluator, found) = searched(document, AT_WORST);
    assert_eq!(found.today, worst_verdict(document));
    let mut count = 0;
    for remedy in &found.list {
        let Some(way) = &remedy.way else { continue };
        let path = &remedy.input.path;
        let mended = document.with_value(path, &way.written).unwrap();
        assert_eq!(worst_verdict(&mended), Verdict::Holds, "{path} {}", way.written);
        let today = remedy.input.measure.si();
        if way.value != today {
            let back =
                way.value + (1e-4 * way.value.abs()).min((today - way.value).abs()) * (today - way.value).signum();
            // At the place that the remedy names a check fails, and the search for the worst finds one as well.
            let index = evaluator.index_of(path).unwrap();
            let values: Vec<_> = way.place.iter().copied().chain([(index, back)]).collect();
            assert_ne!(word(&evaluator.at(&values).unwrap()), Verdict::Holds, "{path} at {back} already holds");
            let unit = remedy.input.measure.unit;
            let exact = format!("{0}..{0} {1}", back / unit.factor(), unit.symbol());
            let short = document.with_value(path, &exact).unwrap();
            assert_ne!(worst_verdict(&short), Verdict::Holds, "{path} at {back} holds at the worst");
        }
        count += 1;
    }
    count
}

#[test]
fn remedies_at_the_worst_go_further_than_those_at_the_typical_values() {
    let document = banded(5.2, 1.7);
    let (_, typical) = searched(&document, Wanted::default());
    let (_, at_worst) = searched(&document, AT_WORST);
    let change = |found: &Remedies, path: &str| {
        let remedy = found.list.iter().find(|remedy| remedy.input.path == path);
        remedy.and_then(|remedy| remedy.way.as_ref()).map_or(f64::INFINITY, |way| way.relative)
    };
    let (a, b) = (change(&typical, "place.anchor"), change(&at_worst, "place.anchor"));
    assert!(a < b && b.is_finite(), "{a} {b}");
    assert!(put_back_at_worst(&document) >= 1);
}

#[test]
fn a_thin_file_holds_typically_and_has_remedies_only_at_the_worst() {
    let thin = banded(5.6, 1.7);
    assert_eq!((verdict(thin.scenario()), worst_verdict(&thin)), (Verdict::Holds, Verdict::Thin));
    assert!(searched(&thin, Wanted::default()).1.list.is_empty());
    let (_, found) = searched(&thin, AT_WORST);
    assert_eq!(found.today, Verdict::Thin);
    assert!(put_back_at_worst(&thin) >= 1);
    // An input with a band of its own is written without it.
    let narrowed: Vec<_> =
        found.list.iter().filter_map(|r| r.way.as_ref().map(|w| (r, w))).filter(|(_, w)| w.narrowed).collect();
    assert!(!narrowed.is_empty());
    for (remedy, way) in narrowed {
        assert!(remedy.input.measure.band.is_wide() && way.written.contains(".."), "{way:?}");
    }
}

/// How many pairs were put back; none within 97 % of their change holds on a grid of its own.
fn put_pairs_back(document: &Document) -> usize {
    let (evaluator, found) = searched(document, IN_PAIRS);
    for pair in &found.pairs {
        let mut mended = document.clone();
        for (input, way) in pair.inputs.iter().zip(&pair.ways) {
            mended = mended.with_value(&input.path, &way.written).unwrap();
        }
        assert_eq!(verdict(mended.scenario()), Verdict::Holds, "{pair:?}");
        let index = [0, 1].map(|i| evaluator.index_of(&pair.inputs[i].path).unwrap());
        let today = [0, 1].map(|i| pair.inputs[i].measure.si());
        let holds = |share: [f64; 2]| {
            let value = |i: usize| (index[i], today[i] + share[i]);
            word(&evaluator.at(&[value(0), value(1)]).unwrap()) == Verdict::Holds
        };
        let change = [0, 1].map(|i| pair.ways[i].value - today[i]);
        assert!(!holds(change.map(|c| 0.999 * c)), "a step short holds: {pair:?}");
        assert!((pair.ways[0].relative.hypot(pair.ways[1].relative) - pair.relative).abs() < 1e-12);
        let whole = [0, 1].map(|i| pair.ways[i].scale.whole().unwrap());
        for ring in 1..=12 {
            for turn in 0..90 {
                let size = 0.97 * pair.relative * f64::from(ring) / 12.0;
                let (sine, cosine) = (f64::from(turn) / 90.0 * std::f64::consts::TAU).sin_cos();
                let nearer = [size * cosine * whole[0], size * sine * whole[1]];
                let inside = |i: usize| {
                    let alone = found.list.iter().find(|remedy| remedy.input.path == pair.inputs[i].path).unwrap();
                    (alone.range.0..=alone.range.1).contains(&(today[i] + nearer[i]))
                };
                assert!(!(inside(0) && inside(1) && holds(nearer)), "{nearer:?} holds nearer than {pair:?}");
            }
        }
        for input in &pair.inputs {
            let alone = found.list.iter().find(|remedy| remedy.input.path == input.path).unwrap();
            assert!(alone.way.as_ref().is_none_or(|way| way.relative > pair.relative), "{pair:?}");
        }
    }
    found.pairs.len()
}

#[test]
fn pairs_hold_when_put_back_and_nothing_nearer_does() {
    let document = shipped();
    assert!(put_pairs_back(&document) >= 5);
    let (evaluator, found) = searched(&document, IN_PAIRS);
    let count = found.list.len();
    assert_eq!(found.pairs_searched, count * (count - 1) / 2);
    assert!(found.pairs.iter().map(|pair| pair.relative).collect::<Vec<_>>().is_sorted());
    assert_eq!(remedies(&evaluator).unwrap().pairs_searched, 0);
}

#[test]
fn pairs_at_the_worst_hold_there_when_put_back() {
    let document = banded(5.2, 1.7);
    let (_, found) = searched(&document, Wanted { held: Held::Worst, pairs: true });
    assert!(!found.pairs.is_empty());
    for pair in &found.pairs {
        let put =
            |document: Document, i: usize| document.with_value(&pair.inputs[i].path, &pair.ways[i].written).unwrap();
        assert_eq!(worst_verdict(&put(put(document.clone(), 0), 1)), Verdict::Holds, "{pair:?}");
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(3))]
    #[test]
    fn remedies_at_the_worst_hold_there_when_put_back(standing in 4.6..6.0_f64, length in 1.5..1.9_f64) {
        put_back_at_worst(&banded(standing, length));
    }
    #[test]
    fn pairs_hold_when_put_back(standing in 4.0..5.6_f64, length in 1.5..1.9_f64) {
        put_pairs_back(&banded(standing, length));
    }
}

#[test]
fn remedies_are_the_same_on_any_number_of_threads() {
    let document = banded(5.2, 1.7);
    let on = |threads: usize| {
        let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build().unwrap();
        pool.install(|| searched(&document, Wanted { held: Held::Worst, pairs: true }).1)
    };
    assert_eq!(on(1), on(8));
}

#[test]
fn elevations_are_a_share_of_the_line_and_other_inputs_of_themselves() {
    let (_, found) = searched(&shipped(), Wanted::default());
    assert_eq!(found.yard, (Yard::Line, 2.0));
    for remedy in &found.list {
        let Some(way) = &remedy.way else {
            assert_eq!(remedy.without, Some(Without::NoneInRange));
            continue;
        };
        let today = remedy.input.measure.si();
        let expected = if remedy.input.path.starts_with("place.") { Scale::Fall(2.0) } else { Scale::Today(today) };
        assert_eq!(way.scale, expected);
        assert!((way.relative - (way.value - today).abs() / expected.whole().unwrap()).abs() < 1e-12);
    }
}

#[test]
fn a_stopped_search_is_partial_and_says_what_was_not_searched() {
    let evaluator = Evaluator::new(shipped().scenario()).unwrap();
    let told = AtomicUsize::new(0);
    let watch = |progress: underfoot::study::Progress| {
        assert!(progress.done <= progress.of && progress.step == Step::Remedies);
        if told.fetch_add(1, Ordering::Relaxed) >= 2 { ControlFlow::Break(()) } else { ControlFlow::Continue(()) }
    };
    let found = remedies_of(&evaluator, Wanted::default(), &watch).unwrap();
    assert!(found.partial);
    assert!(found.list.iter().any(|remedy| remedy.without == Some(Without::Stopped)));
    assert_eq!(found.list.len(), remedies(&evaluator).unwrap().list.len());
}

#[test]
fn what_already_holds_gets_no_remedy() {
    let deep = shipped().with_value("obstacle.1.top", "-5 m").unwrap();
    let found = remedies(&Evaluator::new(deep.scenario()).unwrap()).unwrap();
    assert_eq!((found.today, found.list.len()), (Verdict::Holds, 0));
}

#[test]
fn a_thin_file_that_holds_typically_is_told_that_its_bands_were_not_searched() {
    let folder = tempfile::tempdir().unwrap();
    let file = folder.path().join("thin.toml").display().to_string();
    fs::write(&file, banded(5.6, 1.7).text()).unwrap();
    let run = cargo_bin_cmd!("underfoot").args(["remedy", &file]).assert().code(0);
    let text = one_line(&String::from_utf8_lossy(&run.get_output().stdout));
    for words in ["o holds", "the bands were not searched, `--worst` does", "their bands play no part"] {
        assert!(text.contains(words), "{words}: {text}");
    }
    let run = cargo_bin_cmd!("underfoot").args(["remedy", &file, "--json"]).assert().code(0);
    let object: serde_json::Value = serde_json::from_slice(&run.get_output().stdout).unwrap();
    assert_eq!((&object["held_at"], &object["bands_searched"]), (&"typical".into(), &false.into()));
    assert!(object["today"].as_str().unwrap().contains("the bands were not searched"), "{object}");
}

#[test]
fn an_input_that_cannot_mend_it_is_told_as_none() {
    cargo_bin_cmd!("underfoot").args(["remedy", SHORT]).assert().code(1).stdout(
        predicate::str::contains("none within its range")
            .and(predicate::str::contains("confirmed by the competent person"))
            .and(predicate::str::contains("FIRST-PASS ESTIMATE"))
            .and(predicate::str::contains("place.anchor"))
            .and(predicate::str::contains("anchor.capacity").not())
            .and(predicate::str::is_match(r"(?i)\bsafe\b").unwrap().not()),
    );
}

#[test]
fn json_carries_values_units_and_the_caution() {
    let run = cargo_bin_cmd!("underfoot").args(["remedy", SHORT, "--json"]).assert().code(1);
    let object: serde_json::Value = serde_json::from_slice(&run.get_output().stdout).unwrap();
    assert!(object["cautions"][0].as_str().unwrap().contains("competent person"));
    let anchor = object["remedies"].as_array().unwrap().iter().find(|r| r["path"] == "place.anchor").unwrap();
    assert!(anchor["value"].as_f64().unwrap() > 5.0 && anchor["unit"] == "m", "{anchor}");
}

#[test]
fn the_number_of_ways_is_that_of_an_even_scan() {
    let evaluator = Evaluator::new(shipped().scenario()).unwrap();
    for remedy in remedies(&evaluator).unwrap().list {
        let index = evaluator.index_of(&remedy.input.path).unwrap();
        let (low, high) = remedy.range;
        let holds: Vec<bool> = (0..=3000)
            .map(|i| low + (high - low) * f64::from(i) / 3000.0)
            .map(|value| word(&evaluator.at(&[(index, value)]).unwrap()) == Verdict::Holds)
            .collect();
        let stretches = usize::from(holds[0]) + holds.windows(2).filter(|pair| !pair[0] && pair[1]).count();
        assert_eq!(remedy.way.map_or(0, |way| way.ways), stretches, "{}", remedy.input.path);
    }
}

fn remedy(more: &[&str]) -> String {
    let run = cargo_bin_cmd!("underfoot").arg("remedy").args(more).output().unwrap();
    assert_eq!(run.status.code(), Some(1), "{}", String::from_utf8_lossy(&run.stderr));
    String::from_utf8(run.stdout).unwrap()
}

fn one_line(text: &str) -> String {
    text.split_whitespace().collect::<Vec<_>>().join(" ")
}

#[test]
fn the_text_says_what_is_held_what_is_ranked_and_who_confirms() {
    let typical = one_line(&remedy(&[SHORT]));
    for words in ["their bands play no part", "share of the line's length, 2.00 m", "confirmed by the competent person"]
    {
        assert!(typical.contains(words), "{words}: {typical}");
    }
    assert!(!typical.contains("two inputs together"));
    let all = remedy(&[SHORT, "--worst", "--pairs", "--units", "us"]);
    let words = one_line(&all);
    for words_wanted in
        ["at the worst found in the bands", "counts as exact", "two inputs together", "of 28 pairs", "6.56 ft"]
    {
        assert!(words.contains(words_wanted), "{words_wanted}: {words}");
    }
    assert!(all.lines().all(|line| line.chars().count() <= 100), "{all}");
    assert!(!words.contains("buy ") || words.contains("not advice to buy"), "{words}");
}

#[test]
fn json_of_pairs_at_the_worst_has_both_changes() {
    let value: serde_json::Value = serde_json::from_str(&remedy(&[SHORT, "--worst", "--pairs", "--json"])).unwrap();
    assert_eq!((&value["held_at"], &value["partial"]), (&"worst".into(), &false.into()));
    let pair = &value["pairs"][0];
    let share = |i: usize| pair["changes"][i]["relative_change"].as_f64().unwrap();
    assert!((share(0).hypot(share(1)) - pair["joint_change"].as_f64().unwrap()).abs() < 1e-12);
    assert!(value["ranking"].as_str().unwrap().contains("line's length"));
    let none = value["remedies"].as_array().unwrap().iter().find(|r| r["value"].is_null()).unwrap();
    assert_eq!(none["without"], "none within its range");
}

#[test]
fn nonsense_ends_with_2() {
    for more in [&["--units", "old"][..], &["--worst=3"][..], &["--json", "--csv"][..], &["other.toml"][..]] {
        cargo_bin_cmd!("underfoot").args(["remedy", SHORT]).args(more).assert().code(2).stdout("");
    }
    cargo_bin_cmd!("underfoot").args(["remedy", "no-such.toml"]).assert().code(2).stdout("");
}
