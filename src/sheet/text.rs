//! One report as text for a screen of 100 columns.
use super::band_words::{band_table, worst_words};
use super::page::{Page, Paint, Tone, pad, pad_left};
use super::places::{span, swing};
use super::words::{governing_words, margin_value, place_name, signed};
use super::working::{clearance_sums, working};
use super::{CAUTION_LINE, CAUTIONS, Report};
use crate::estimate::{DEFINITIONS, Number, Value};
use crate::margin::{Margin, Sense};
use crate::quantity::{UnitSystem, format_si};
use crate::scenario::Scenario;
use unicode_width::UnicodeWidthStr;

/// The whole report as text.
#[must_use]
pub fn text(report: &Report, system: UnitSystem, paint: Paint) -> String {
    let mut page = Page::new(paint);
    let margins = report.margins_in(system);
    head(&mut page, report);
    verdict_line(&mut page, report, &margins, system);
    events(&mut page, report, system);
    working(&mut page, &report.estimate, system);
    clearance_sums(&mut page, report, system);
    span(&mut page, &report.estimate, system);
    swing(&mut page, &report.estimate, system);
    numbers(&mut page, report, system);
    page.heading("margins (governing first)");
    margin_table(&mut page, &margins, system);
    band_table(&mut page, report, system);
    margin_bases(&mut page, &margins);
    sentences(&mut page, "limits", &report.limit_remarks);
    sentences(&mut page, "assumptions", &report.estimate.assumptions);
    sentences(&mut page, "warnings", &report.estimate.warnings);
    sentences(&mut page, "cautions", CAUTIONS);
    page.heading("provenance");
    page.line(&format!("  underfoot {}", env!("CARGO_PKG_VERSION")), Tone::Plain);
    page.line(&format!("  sha256 {}", report.scenario_sha256), Tone::Plain);
    page.finish()
}

fn head(page: &mut Page, report: &Report) {
    page.wrapped("", CAUTION_LINE, Tone::Caution);
    page.gap();
    if let Some(title) = &report.scenario.title {
        page.wrapped("", title, Tone::Heading);
    }
    page.wrapped("file   ", &report.file, Tone::Plain);
    let datum = report.scenario.datum.as_deref().unwrap_or("not stated");
    if let Some(notes) = &report.scenario.notes {
        page.wrapped("notes  ", notes, Tone::Plain);
    }
    page.wrapped("datum  ", &format!("elevation 0 is: {datum}"), Tone::Plain);
    page.gap();
}

/// `x SHORT  feet stop 0.42 m above the plant-room roof, 1.00 m wanted (0.58 m short)`.
pub(super) fn verdict_line(page: &mut Page, report: &Report, margins: &[Margin], system: UnitSystem) {
    let verdict = report.verdict;
    let lead = format!("{} {}  ", verdict.symbol(), verdict.word().to_uppercase());
    let mut words = governing_words(&report.scenario, margins, system);
    if let Some(worst) = margins.first().and_then(|margin| worst_words(report, margin, system)) {
        words = format!("{words}; {worst}");
    }
    page.wrapped(&lead, &words, Tone::Verdict(verdict));
}

fn events(page: &mut Page, report: &Report, system: UnitSystem) {
    page.heading("what the fall does (time from the start of the fall)");
    for event in &report.estimate.events {
        page.wrapped(&format!("  {:>9.3} s  ", event.time_s), &event.words(system), Tone::Plain);
    }
}

/// Groups of numbers in the order of the page, with the ids that belong to each.
const GROUPS: &[(&str, &[&str])] = &[
    ("the fall", &["free_fall_distance", "speed_at_taut", "fall_energy", "fall_factor"]),
    (
        "forces",
        &[
            "arrest_force_peak",
            "anchor_force_peak",
            "deceleration_peak",
            "deceleration_mean",
            "time_above_4kn",
            "time_above_6kn",
        ],
    ),
    (
        "distances",
        &[
            "line_elongation_peak",
            "other_elongation_peak",
            "deployed_length",
            "stroke_left",
            "stroke_used_up",
            "arrest_distance",
            "total_fall_distance",
            "hang_travel",
            "rebound_rise",
        ],
    ),
    (
        "horizontal lifeline, largest",
        &[
            "span_tension_peak",
            "span_sag_peak",
            "span_end_force",
            "span_deployed_length",
            "span_stroke_left",
            "span_stroke_used_up",
        ],
    ),
    (
        "swing",
        &[
            "swing_drop",
            "swing_speed_lowest",
            "swing_angle_peak",
            "swing_offset_peak",
            "strike_speed",
            "strike_drop_equivalent",
            "closest_approach",
        ],
    ),
    ("elevations and clearance", &["lowest_attachment", "lowest_foot", "lowest_underside", "clearance", "margin"]),
    ("times", &["time_taut", "time_peak_force", "time_lowest", "time_first_slack", "settle_time", "slack_episodes"]),
    (
        "oscillation about the hang position",
        &[
            "damping_regime",
            "damping_ratio",
            "natural_frequency",
            "damped_frequency",
            "envelope_amplitude",
            "envelope_decay",
            "envelope_bound_coarse",
            "envelope_bound_tight",
        ],
    ),
    (
        "energy at the lowest point",
        &["line_work", "other_work", "absorber_work", "span_absorber_work", "damper_work", "energy_residual"],
    ),
];

/// The part of an id before the name of an obstacle.
fn stem(id: &str) -> &str {
    id.split_once('.').map_or(id, |(stem, _)| stem)
}

fn numbers(page: &mut Page, report: &Report, system: UnitSystem) {
    for (title, ids) in GROUPS {
        group(page, title, report, system, |id| ids.contains(&stem(id)));
    }
    group(page, "further numbers", report, system, |id| !GROUPS.iter().any(|(_, ids)| ids.contains(&stem(id))));
}

fn group(page: &mut Page, title: &str, report: &Report, system: UnitSystem, belongs: impl Fn(&str) -> bool) {
    let members: Vec<&Number> = report.estimate.numbers.iter().filter(|n| belongs(&n.id)).collect();
    if members.is_empty() {
        return;
    }
    page.heading(title);
    for number in members {
        let cell = pad_left(&number_words(number, system), 16);
        row(page, "  ", (&number_label(&number.id, &report.scenario), 44), &format!("  {cell}"), Tone::Plain);
    }
}

pub(super) fn number_label(id: &str, scenario: &Scenario) -> String {
    let known = DEFINITIONS.iter().find(|d| d.id == stem(id));
    let label = known.map_or_else(|| stem(id).replace('_', " "), |d| d.label.to_owned());
    let Some((_, place)) = id.split_once('.') else { return label };
    format!("{label}, {}", place_name(scenario, place))
}

pub(super) fn number_words(number: &Number, system: UnitSystem) -> String {
    match (&number.value, number.id.as_str()) {
        (Value::Text(words), _) => words.clone(),
        (Value::Number(flag), "stroke_used_up" | "span_stroke_used_up") => {
            if *flag == 0.0 { "no" } else { "yes" }.to_owned()
        }
        (Value::Number(count), "slack_episodes") => format!("{count:.0}"),
        (Value::Number(value), _) => format_si(*value, number.dimension, system),
    }
}

/// The table of checks: symbol, word, label, demand, limit, room.
pub(super) fn margin_table(page: &mut Page, margins: &[Margin], system: UnitSystem) {
    if margins.is_empty() {
        page.line("  nothing to judge", Tone::Plain);
        return;
    }
    let head = ["demand", "limit", "room"].map(|h| pad_left(h, 15)).concat();
    page.line(&format!("  {}{head}", pad("", 42)), Tone::Faint);
    for margin in margins {
        let lead = format!("  {}", pad(&format!("{} {}", margin.verdict.symbol(), margin.verdict.word()), 9));
        row(page, &lead, (&margin.label, 33), &margin_cells(margin, system), Tone::Verdict(margin.verdict));
    }
}

/// A row with its label in a column; a label that is too wide for it stands above its cells.
pub(super) fn row(page: &mut Page, lead: &str, (label, width): (&str, usize), cells: &str, tone: Tone) {
    if label.width() <= width {
        page.line(&format!("{lead}{}{cells}", pad(label, width)), tone);
    } else {
        page.wrapped(lead, label, tone);
        page.line(&format!("{}{cells}", " ".repeat(lead.width() + width)), tone);
    }
}

fn margin_cells(margin: &Margin, system: UnitSystem) -> String {
    let show = |value: Option<f64>| value.map_or_else(|| "-".to_owned(), |v| margin_value(margin, v, system));
    let sign = match margin.sense {
        Sense::AtMost => "<=",
        Sense::AtLeast => ">=",
    };
    let limit = margin.limit.map_or_else(|| "-".to_owned(), |l| format!("{sign} {}", show(Some(l))));
    let room = margin.margin.map_or_else(|| "-".to_owned(), |m| signed(m, &margin_value(margin, m, system)));
    [show(margin.demand), limit, room].map(|cell| pad_left(&cell, 15)).concat()
}

fn margin_bases(page: &mut Page, margins: &[Margin]) {
    page.heading("where each limit comes from");
    for margin in margins {
        page.wrapped("  ", &margin.label, Tone::Heading);
        page.wrapped("    from  ", &margin.basis.words, Tone::Plain);
        if let Some(note) = &margin.note {
            page.wrapped("    note  ", note, Tone::Plain);
        }
    }
}

/// A heading with one wrapped sentence a line; nothing when there are none.
pub(super) fn sentences<S: AsRef<str>>(page: &mut Page, title: &str, list: &[S]) {
    if list.is_empty() {
        return;
    }
    page.heading(title);
    for sentence in list {
        page.wrapped("  - ", sentence.as_ref(), Tone::Plain);
    }
}
