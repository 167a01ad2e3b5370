//! Sentences about margins: the verdict line and the words of one check.
use crate::margin::{Margin, Sense, Verdict};
use crate::quantity::{UnitSystem, format_si};
use crate::scenario::{Obstacle, Scenario, SubjectKind};

/// What governs, in words: `feet stop 0.42 m above the plant-room roof, 1.00 m wanted (0.58 m short)`.
/// `margins` with the governing one first.
#[must_use]
pub fn governing_words(scenario: &Scenario, margins: &[Margin], system: UnitSystem) -> String {
    margins.first().map_or_else(
        || "nothing to judge: state `obstacle` and `limits`".to_owned(),
        |margin| margin_words(scenario, margin, system),
    )
}

/// One check in words.
#[must_use]
pub fn margin_words(scenario: &Scenario, margin: &Margin, system: UnitSystem) -> String {
    match (margin.verdict, margin.demand, margin.limit, margin.margin) {
        (Verdict::Holds, None, ..) => {
            let why = margin.note.as_deref().unwrap_or("never in reach");
            format!("{} holds: {why}", margin.label)
        }
        (Verdict::Open, ..) | (_, None, ..) | (_, _, None, _) | (.., None) => open_words(margin),
        (_, Some(demand), Some(limit), Some(room)) => judged_words(scenario, margin, [demand, limit, room], system),
    }
}

fn open_words(margin: &Margin) -> String {
    let why = margin.note.as_deref().unwrap_or("a number is missing");
    format!("{} cannot be judged: {why}", margin.label)
}

fn judged_words(scenario: &Scenario, margin: &Margin, numbers: [f64; 3], system: UnitSystem) -> String {
    let [demand, limit, room] = numbers;
    let show = |value: f64| margin_value(margin, value, system);
    if let Some(name) = margin.id.strip_prefix("swing_strike.") {
        return strike_words(place_name(scenario, name), demand, &show(demand.abs()), margin.note.as_deref());
    }
    let room_words = room_words(room, margin.verdict, &show(room.abs()));
    if let Some(obstacle) = obstacle_of(scenario, margin) {
        let lowest = lowest_part(scenario.subject.kind);
        let name = with_article(&obstacle.name);
        return if demand < 0.0 {
            format!(
                "{lowest} {} below the top of {name}, {} wanted above it ({room_words})",
                passes(demand, &show),
                show(limit)
            )
        } else {
            format!(
                "{lowest} stop{} {} above {name}, {} wanted ({room_words})",
                s_of(scenario),
                show(demand),
                show(limit)
            )
        };
    }
    let allowed = match margin.sense {
        Sense::AtMost => "allowed",
        Sense::AtLeast => "wanted",
    };
    format!("{} {} of {} {allowed} ({room_words})", margin.label, show(demand), show(limit))
}

/// A demand, limit or room of a check with its unit; a number of people without decimals.
pub(super) fn margin_value(margin: &Margin, value: f64, system: UnitSystem) -> String {
    if margin.id == "span_workers" { format!("{value:.0}") } else { format_si(value, margin.dimension, system) }
}

/// Room with its sign.
pub(super) fn signed(value: f64, words: &str) -> String {
    if value > 0.0 { format!("+{words}") } else { words.to_owned() }
}

fn strike_words(name: &str, gap_m: f64, gap: &str, note: Option<&str>) -> String {
    let name = with_article(name);
    let note = note.map(|n| format!("; {n}")).unwrap_or_default();
    if gap_m < 0.0 {
        format!("the swing strikes {name}: it would go {gap} past it{note}")
    } else {
        format!("the swing passes {name} with {gap} left{note}")
    }
}

/// The name of a face or obstacle by its id.
pub(super) fn place_name<'a>(scenario: &'a Scenario, id: &'a str) -> &'a str {
    let obstacles = scenario.obstacles.iter().map(|o| (o.id(), o.name.as_str()));
    let faces = scenario.faces.iter().map(|f| (f.id(), f.name.as_str()));
    obstacles.chain(faces).find(|(known, _)| known == id).map_or(id, |(_, name)| name)
}

fn passes(demand: f64, show: &dyn Fn(f64) -> String) -> String {
    format!("would reach {}", show(demand.abs()))
}

fn room_words(room: f64, verdict: Verdict, amount: &str) -> String {
    match verdict {
        Verdict::Short if room == 0.0 => "short, exactly on the limit".to_owned(),
        Verdict::Short => format!("{amount} short"),
        _ => format!("{amount} to spare"),
    }
}

const fn lowest_part(kind: SubjectKind) -> &'static str {
    match kind {
        SubjectKind::Person => "feet",
        SubjectKind::Load => "underside",
    }
}

/// Feet stop, the underside stops.
const fn s_of(scenario: &Scenario) -> &'static str {
    match scenario.subject.kind {
        SubjectKind::Person => "",
        SubjectKind::Load => "s",
    }
}

fn obstacle_of<'a>(scenario: &'a Scenario, margin: &Margin) -> Option<&'a Obstacle> {
    let id = margin.id.strip_prefix("clearance.")?;
    scenario.obstacles.iter().find(|o| o.id() == id)
}

/// `the plant-room roof`; a name with a capital or an article of its own stays as it is.
fn with_article(name: &str) -> String {
    let own = ["the ", "a ", "an "].iter().any(|a| name.starts_with(a));
    if !own && name.starts_with(char::is_lowercase) { format!("the {name}") } else { name.to_owned() }
}
