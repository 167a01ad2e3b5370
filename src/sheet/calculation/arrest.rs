//! The arrest step by step: constants, roots, modes, envelope, events.
use super::steps::Steps;
use super::value::{Block, Cell, Column, Kind, Row, Section, Table, column, digits};
use super::{modes, path};
use crate::estimate::Event;
use crate::quantity::UnitSystem;
use crate::sheet::Report;

const EVENTS: &[Column] = &[
    column("time", "time", Kind::Number),
    column("words", "what happens", Kind::Name),
    column("travel", "travel past taut", Kind::Number),
    column("speed", "speed", Kind::Number),
    column("force", "line force", Kind::Number),
    column("deployed", "deployed", Kind::Number),
];

/// The section of the arrest.
pub fn section(report: &Report, system: UnitSystem) -> Section {
    let estimate = &report.estimate;
    let mut blocks = vec![
        Block::words(
            "Worked in kg, m, s and N. Every number is computed to double precision and shown to six digits; travel x, \
             speed v and stretch e are counted downward from the moment when the line comes taut, times from the start of \
             the fall.",
        ),
        path::constants(&report.scenario, &estimate.solved),
        Block::part("Roots and regime"),
    ];
    if estimate.plane.is_some() {
        blocks.push(Block::words(
            "Of stretch along the line alone, with the pivot above the mass: they tell how the line answers, not how the mass \
             swings.",
        ));
    }
    blocks.extend(path::roots(&estimate.solved));
    blocks.push(Block::part("Motion, mode by mode"));
    if estimate.plane.is_some() {
        blocks.push(Block::words(
            "The pivot lies beside the fall line, so the arrest is a swing in one plane: m r″ = m g − T n with the unit \
             vector n from the pivot to the attachment and |r − pivot| = L + e + s while taut. It has no closed form; it is \
             integrated in power series of order 20, and events are zeros of their polynomials.",
        ));
    } else {
        blocks.extend(modes::modes(report));
        blocks.extend(envelope(report));
    }
    blocks.push(Block::part("Events in order of time"));
    blocks.push(events(&estimate.events, system));
    Section::new("arrest", "Arrest, worked step by step", blocks)
}

fn envelope(report: &Report) -> Vec<Block> {
    let estimate = &report.estimate;
    let Some(envelope) = &estimate.envelope else { return Vec::new() };
    let mut steps = Steps::default();
    steps.given("t_a", "start of the mode that it bounds", envelope.from_s, "s");
    steps.given("x_r", "hang position of that mode", envelope.hang_m, "m");
    steps.given("C", "amplitude at its start", envelope.amplitude_m, "m");
    steps.given("α", "decay", envelope.decay_per_s, "1/s");
    let (x, c) = (digits(envelope.hang_m), digits(envelope.amplitude_m));
    let form = format!("{x} ± {c} e^(−{} (t − {}))", digits(envelope.decay_per_s), digits(envelope.from_s));
    steps.word("x(t)", "bound on the travel while taut", ["x_r ± C e^(−α (t − t_a))", &form], "");
    if let Some(coarse) = estimate.numbers.get("envelope_bound_coarse") {
        steps.step("x_c", "coarse bound on the deepest point", ["x_r + C", &format!("{x} + {c}")], coarse, "m");
    }
    if let (Some(tight), Some(time)) =
        (estimate.numbers.get("envelope_bound_tight"), estimate.numbers.get("time_lowest"))
    {
        let tau = digits(time - envelope.from_s);
        let numbers = format!("{x} + {c} e^(−{} × {tau})", digits(envelope.decay_per_s));
        steps.step(
            "x_t",
            "tight bound, at the time of the lowest point",
            ["x_r + C e^(−α τ_low)", &numbers],
            tight,
            "m",
        );
    }
    vec![Block::part("Envelope"), steps.table("envelope", "envelope of the oscillation about the hang position")]
}

fn events(list: &[Event], system: UnitSystem) -> Block {
    let row = |event: &Event| {
        Row::new(vec![
            Cell::si(event.time_s, "s"),
            Cell::words(&event.words(system)),
            Cell::si(event.travel_m, "m"),
            Cell::si(event.speed_m_per_s, "m/s"),
            Cell::si(event.force_n, "N"),
            Cell::si(event.deployed_m, "m"),
        ])
    };
    Block::Table(Table {
        id: "events".to_owned(),
        caption: "what the fall does".to_owned(),
        columns: EVENTS,
        rows: list.iter().map(row).collect(),
    })
}
