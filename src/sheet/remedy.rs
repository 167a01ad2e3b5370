//! The nearest changes at which every check holds, as text and JSON.
use super::band_words::has_bands;
use super::page::{Page, Paint, Tone, pad};
use super::{CAUTION_LINE, CAUTIONS, Report};
use crate::margin::Verdict;
use crate::quantity::{Dimension, UnitSystem, display_unit, format_measure, format_si, format_unit};
use crate::scenario::Input;
use crate::study::{Held, Pair, Remedies, Remedy, Scale, Way, Without, Yard};
use serde_json::{Value, json};

/// What these values are and are not.
pub const REMEDY_CAUTION: &str = "This is arithmetic on the inputs of one file, not advice to buy, lengthen, soften or \
     move anything: each change must be confirmed by the competent person, for the real equipment and place, and run again.";

/// What stands behind a value at the typical values.
const TYPICAL_WORDS: &str = "All other inputs at their typical values: their bands play no part; ask for `--worst`.";
/// What stands behind the verdict of today, where no change is worked out.
const TODAY_TYPICAL: &str = "All inputs at their typical values: their bands play no part; ask for `--worst`.";
/// The same at the worst.
const TODAY_WORST: &str = "All inputs anywhere in their bands: the worst found there, by the search over the bands that \
     `run` makes.";
/// What stands behind a value at the worst.
const WORST_WORDS: &str = "All other inputs anywhere in their bands: every check holds at the worst found there, by the \
     search over the bands that `run` makes, done anew with the changed value. That value counts as exact: a band of its \
     own is left out, and what it is known within must be added by whoever confirms the change.";
/// What a joint change is.
const PAIR_WORDS: &str = "Two inputs changed together, where that is nearer than each of both alone by a hundredth: the \
     least root of the sum of the squares of both changes, each as a share as above, along 32 directions about today's values and the \
     refined best of them. A nearer one between the directions can be missed.";

/// By what the changes are compared.
fn rule(found: &Remedies, system: Option<UnitSystem>) -> String {
    let length = format_si(found.yard.1, Dimension::Length, system.unwrap_or_default());
    let yard = match found.yard.0 {
        Yard::Line => "of the line's length",
        Yard::TotalFall => "of the total fall distance of this file",
        Yard::Reach => "of the reach that is searched",
    };
    format!(
        "Ranked by the change as a share of today's value; of elevations and offsets, whose zero is arbitrary, and of \
         lengths that are zero today, as a share {yard}, {length}."
    )
}

/// The answers as text, smallest change first: in the file's units, and beside them in those asked for.
#[must_use]
pub fn remedy_text(report: &Report, found: &Remedies, system: Option<UnitSystem>, paint: Paint) -> String {
    let mut page = Page::new(paint);
    page.wrapped("", CAUTION_LINE, Tone::Caution);
    page.wrapped("", REMEDY_CAUTION, Tone::Caution);
    page.gap();
    page.wrapped("file   ", &report.file, Tone::Plain);
    let lead = format!("{} {}  ", found.today.symbol(), found.today.word());
    page.wrapped(&lead, &today_words(report, found), Tone::Verdict(found.today));
    if found.partial {
        page.wrapped("       ", "PARTIAL: stopped before every input was searched", Tone::Caution);
    }
    page.gap();
    page.wrapped("  ", held_words(found), Tone::Plain);
    if found.today != Verdict::Holds {
        page.wrapped("  ", &rule(found, system), Tone::Plain);
        page.heading("one input alone");
        found.list.iter().for_each(|remedy| remedy_line(&mut page, remedy, found, system));
    }
    if found.wanted.pairs && found.today != Verdict::Holds {
        pairs(&mut page, found, system);
    }
    page.heading("cautions");
    for words in CAUTIONS {
        page.wrapped("  ", words, Tone::Plain);
    }
    page.finish()
}

fn today_words(report: &Report, found: &Remedies) -> String {
    let at = match found.wanted.held {
        Held::Typical => "at today's typical values",
        Held::Worst => "today, at the worst found in the bands",
    };
    match found.today {
        Verdict::Holds if found.wanted.held == Held::Typical && has_bands(report) => {
            format!("every check holds {at}: no change is worked out; the bands were not searched, `--worst` does")
        }
        Verdict::Holds => format!("every check holds {at}: no change is worked out"),
        _ => format!("{at}; each line below is one change after which every check holds"),
    }
}

const fn held_words(found: &Remedies) -> &'static str {
    match (found.wanted.held, found.today) {
        (Held::Typical, Verdict::Holds) => TODAY_TYPICAL,
        (Held::Worst, Verdict::Holds) => TODAY_WORST,
        (Held::Typical, _) => TYPICAL_WORDS,
        (Held::Worst, _) => WORST_WORDS,
    }
}

fn remedy_line(page: &mut Page, remedy: &Remedy, found: &Remedies, system: Option<UnitSystem>) {
    let today = today_of(&remedy.input, system);
    let words = match &remedy.way {
        Some(way) => {
            let change = way_words(&remedy.input, way, system);
            format!("{today} -> {change}, changes by {}{}", share_words(way), others(way, found.wanted.held))
        }
        None => format!("{today}: {}", without_words(remedy, system)),
    };
    page.wrapped(&format!("  {} ", pad(&remedy.input.path, 24)), &words, Tone::Plain);
}

/// The value of today as the file states it, and in the units asked for.
fn today_of(input: &Input, system: Option<UnitSystem>) -> String {
    let own = format_measure(&input.measure);
    match in_system(input, input.measure.si(), system) {
        Some(shown) => format!("{own} ({shown})"),
        None => own,
    }
}

fn way_words(input: &Input, way: &Way, system: Option<UnitSystem>) -> String {
    let shown = in_system(input, way.value, system).map_or(way.shown.clone(), |more| format!("{} ({more})", way.shown));
    if way.narrowed { format!("{shown} exactly") } else { shown }
}

/// A value in the units asked for, where the file states it in others.
fn in_system(input: &Input, value: f64, system: Option<UnitSystem>) -> Option<String> {
    let dimension = input.measure.dimension();
    let differs = |system: &UnitSystem| display_unit(dimension, *system) != input.measure.unit;
    system.filter(differs).map(|system| format_si(value, dimension, system))
}

fn share_words(way: &Way) -> String {
    let percent = way.relative * 100.0;
    match way.scale {
        Scale::Today(_) => format!("{percent:.1} % of today's value"),
        Scale::Fall(_) => format!("{percent:.1} % of that length"),
        Scale::One => format!("{percent:.1} % of 1"),
        Scale::Nothing => "no share: today's value is zero".to_owned(),
    }
}

fn others(way: &Way, held: Held) -> String {
    match (way.relative == 0.0, way.ways > 1, held) {
        (true, ..) => "; its own band is all that has to go".to_owned(),
        (_, true, Held::Typical) => {
            format!("; every check holds in {} separate stretches of its range, this is the nearest", way.ways)
        }
        (_, true, Held::Worst) => {
            format!("; every check may hold in up to {} separate stretches of its range, this is the nearest", way.ways)
        }
        _ => String::new(),
    }
}

fn without_words(remedy: &Remedy, system: Option<UnitSystem>) -> String {
    let unit = remedy.input.measure.unit;
    let end = |value: f64| in_system(&remedy.input, value, system).unwrap_or_else(|| format_unit(value, unit));
    match remedy.without {
        Some(Without::Unsettled) => "not settled: the search for the worst did not come to an end".to_owned(),
        Some(Without::Stopped) => "not searched: stopped before".to_owned(),
        _ => format!("none within its range, {} to {}", end(remedy.range.0), end(remedy.range.1)),
    }
}

fn pairs(page: &mut Page, found: &Remedies, system: Option<UnitSystem>) {
    page.heading("two inputs together");
    page.wrapped("  ", PAIR_WORDS, Tone::Plain);
    for pair in &found.pairs {
        let words = |i: usize| {
            let (input, way) = (&pair.inputs[i], &pair.ways[i]);
            let (today, value) = (today_of(input, system), way_words(input, way, system));
            format!("{} {today} -> {value}, {}", input.path, share_words(way))
        };
        let joint = format!("{:.1} %", pair.relative * 100.0);
        page.wrapped(&format!("  {} ", pad(&joint, 8)), &words(0), Tone::Plain);
        page.wrapped(&format!("  {} ", pad("", 8)), &words(1), Tone::Plain);
    }
    let words = format!("{} of {} pairs are nearer so", found.pairs.len(), found.pairs_searched);
    page.wrapped("  ", &words, Tone::Plain);
}

/// The answers as a JSON object, SI units.
#[must_use]
pub fn remedy_object(report: &Report, found: &Remedies) -> Value {
    let cautions: Vec<&str> = std::iter::once(REMEDY_CAUTION).chain(CAUTIONS.iter().copied()).collect();
    let mut object = json!({
        "file": report.file,
        "scenario_sha256": report.scenario_sha256,
        "version": env!("CARGO_PKG_VERSION"),
        "verdict": found.today.word(),
        "held_at": match found.wanted.held {
            Held::Typical => "typical",
            Held::Worst => "worst",
        },
        "bands_searched": found.wanted.held == Held::Worst,
        "today": today_words(report, found),
        "meaning": held_words(found),
        "ranking": rule(found, None),
        "partial": found.partial,
        "cautions": cautions,
        "remedies": found.list.iter().map(remedy_json).collect::<Vec<_>>(),
    });
    if found.wanted.pairs {
        object["pairs_meaning"] = json!(PAIR_WORDS);
        object["pairs_searched"] = json!(found.pairs_searched);
        object["pairs"] = found.pairs.iter().map(pair_json).collect();
    }
    object
}

fn remedy_json(remedy: &Remedy) -> Value {
    let mut object = json!({
        "path": remedy.input.path,
        "today": remedy.input.measure.si(),
        "unit": super::json::si_unit(remedy.input.measure.dimension()),
        "range": [remedy.range.0, remedy.range.1],
        "without": remedy.without.map(|without| match without {
            Without::NoneInRange => "none within its range",
            Without::Unsettled => "not settled",
            Without::Stopped => "stopped",
        }),
    });
    let fields = ["value", "written", "own_band_left_out", "relative_change", "relative_to", "ways"];
    let values = remedy.way.as_ref().map(way_values);
    for (place, field) in fields.into_iter().enumerate() {
        object[field] = values.as_ref().map_or(Value::Null, |values| values[place].clone());
    }
    object
}

fn way_values(way: &Way) -> [Value; 6] {
    let scale = match way.scale {
        Scale::Today(_) => "today",
        Scale::Fall(_) => "fall",
        Scale::One => "one",
        Scale::Nothing => "nothing",
    };
    let relative = if way.relative.is_finite() { json!(way.relative) } else { Value::Null };
    [json!(way.value), json!(way.written), json!(way.narrowed), relative, json!(scale), json!(way.ways)]
}

fn pair_json(pair: &Pair) -> Value {
    let one = |i: usize| {
        let (input, way) = (&pair.inputs[i], &pair.ways[i]);
        let [value, written, narrowed, relative, scale, _] = way_values(way);
        json!({
            "path": input.path,
            "today": input.measure.si(),
            "unit": super::json::si_unit(input.measure.dimension()),
            "value": value,
            "written": written,
            "own_band_left_out": narrowed,
            "relative_change": relative,
            "relative_to": scale,
        })
    };
    json!({ "joint_change": pair.relative, "changes": [one(0), one(1)] })
}
