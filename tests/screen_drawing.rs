//! The drawings of the screen from values made by hand.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail by panicking")]
use ratatui::Terminal;
use ratatui::backend::TestBackend;
use ratatui::layout::Rect;
use underfoot::estimate::{Envelope, Mode, Phase, Sample};
use underfoot::margin::Verdict;
use underfoot::quantity::{Dimension, UnitSystem};
use underfoot::scenario::SubjectKind;
use underfoot::tui::panes::history::{self, Picture};
use underfoot::tui::panes::scene::{Bar, Origin, Part, Scene, Station};
use underfoot::tui::panes::units::Scale;
use underfoot::tui::panes::{elevation, plot};
use underfoot::tui::theme::Theme;

fn rows(terminal: &Terminal<TestBackend>) -> Vec<String> {
    let buffer = terminal.backend().buffer();
    let width = usize::from(buffer.area.width);
    let symbols: Vec<&str> = buffer.content.iter().map(ratatui::buffer::Cell::symbol).collect();
    symbols.chunks(width).map(|row| row.concat().trim_end().to_owned()).collect()
}

fn draw_scene(scene: &Scene, width: u16, height: u16) -> Vec<String> {
    let mut terminal = Terminal::new(TestBackend::new(width, height)).unwrap();
    let draw = |frame: &mut ratatui::Frame| {
        let area = frame.area();
        elevation::draw(frame.buffer_mut(), area, scene, Theme::Mono);
    };
    terminal.draw(draw).unwrap();
    rows(&terminal)
}

fn station(name: &'static str, attachment_m: f64, body_m: f64, deployed_m: f64, taut: bool) -> Station {
    Station { name, attachment_m, body_m, deployed_m, taut }
}

/// A person on a roof with a lanyard and an absorber; the feet stop `clearance_m` above the lower roof.
fn roof(clearance_m: f64, units: UnitSystem) -> Scene {
    let part = |name: &str, length_m: f64| Part { name: name.to_owned(), length_m, verdict: None };
    let lowest = 13.5 - 1.8 - 0.081 - 0.583;
    let top = lowest - 1.8 - clearance_m;
    let mut parts = vec![
        part("free fall", 1.8),
        part("line stretch", 0.081),
        part("deployed", 0.583),
        part("to feet", 1.5),
        part("allowance", 0.3),
    ];
    parts.push(Part { verdict: Some(Verdict::Short), ..part("clearance", clearance_m) });
    Scene {
        origin: Origin::Datum(Some("street level".to_owned())),
        subject: SubjectKind::Person,
        anchor_m: Some(13.5),
        standing_m: Some(12.0),
        stations: [
            station("start", 13.5, 1.5, 0.0, false),
            station("taut", 11.7, 1.8, 0.0, true),
            station("lowest", lowest, 1.8, 0.583, true),
            station("rest", lowest + 0.04, 1.8, 0.583, true),
            station("now", 12.4, 1.5, 0.0, false),
        ],
        parts,
        string_end: Some("plant-room roof".to_owned()),
        bars: vec![Bar {
            name: "plant-room roof".to_owned(),
            top_m: top,
            reserve_m: 1.0,
            verdict: Verdict::Short,
            extent_m: None,
        }],
        scale: Scale::of(Dimension::Length, units),
    }
}

/// Numbers that stand in front of the unit in the rows.
fn numbers_before(rows: &[String], word: &str) -> Option<f64> {
    let row = rows.iter().find(|row| row.contains(word))?;
    let before = row.split(word).next()?;
    before.split_whitespace().rev().nth(1)?.parse().ok()
}

#[test]
fn every_station_and_every_dimension_is_named() {
    let rows = draw_scene(&roof(0.42, UnitSystem::Metric), 72, 30);
    println!("{}", rows.join("\n"));
    let all = rows.join("\n");
    for word in ["start", "taut", "lowest", "rest", "now", "anchor", "street level", "plant-room roof"] {
        assert!(all.contains(word), "no `{word}` in\n{all}");
    }
}

#[test]
fn printed_dimensions_add_up_to_the_printed_total() {
    for units in [UnitSystem::Metric, UnitSystem::Us] {
        for index in -20..20 {
            let clearance = f64::from(index) * 0.0537;
            let rows = draw_scene(&roof(clearance, units), 110, 40);
            let names = ["free fall", "line stretch", "deployed", "to feet", "allowance", "clearance"];
            let sum: f64 = names.iter().map(|name| numbers_before(&rows, name).unwrap()).sum();
            let total = rows.last().unwrap().split(" = ").nth(1).unwrap();
            let total: f64 = total.split_whitespace().next().unwrap().parse().unwrap();
            assert!((sum - total).abs() < 1e-9, "{sum} {total}\n{}", rows.join("\n"));
        }
    }
}

#[test]
fn feet_above_an_obstacle_are_never_drawn_inside_it() {
    for height in 12..48 {
        for clearance in [0.0, 0.01, 0.1, 0.3] {
            let rows = draw_scene(&roof(clearance, UnitSystem::Metric), 72, height);
            let hatch = rows.iter().position(|row| row.contains("////")).unwrap();
            let inside = rows[hatch..].iter().any(|row| row.contains('▐'));
            assert!(!inside, "{clearance} at {height}\n{}", rows.join("\n"));
        }
    }
}

#[test]
fn feet_below_the_top_of_an_obstacle_are_drawn_inside_it() {
    let rows = draw_scene(&roof(-0.9, UnitSystem::Metric), 72, 30);
    let hatch = rows.iter().position(|row| row.contains("////")).unwrap();
    assert!(rows[hatch..].iter().any(|row| row.contains('▐')), "{}", rows.join("\n"));
}

fn sample(time_s: f64) -> Sample {
    let taut = 0.606;
    let (travel_m, force_n, mode) = if time_s < taut {
        (0.5 * 9.8 * time_s * time_s - 1.8, 0.0, Mode::Falling)
    } else {
        let past = time_s - taut;
        let travel = 0.3 + 0.8 * (-0.9 * past).exp() * (6.0 * past - 1.95).cos();
        (travel, (travel * 4000.0).max(0.0), if travel > 0.0 { Mode::Taut } else { Mode::Slack })
    };
    Sample {
        time_s,
        travel_m,
        speed_m_per_s: 0.0,
        force_n,
        line_elongation_m: 0.0,
        other_elongation_m: 0.0,
        deployed_m: 0.0,
        mode,
        plane: None,
    }
}

fn picture() -> Picture {
    Picture {
        samples: (0..=300).map(|index| sample(f64::from(index) * 0.01)).collect(),
        phases: vec![
            Phase { from_s: 0.0, to_s: 0.606, mode: Mode::Falling },
            Phase { from_s: 0.606, to_s: 1.25, mode: Mode::Taut },
            Phase { from_s: 1.25, to_s: 1.5, mode: Mode::Slack },
            Phase { from_s: 1.5, to_s: 3.0, mode: Mode::Taut },
        ],
        window_s: (0.0, 3.0),
        envelope: Some(Envelope { hang_m: 0.3, amplitude_m: 0.8, decay_per_s: 0.9, from_s: 0.606, to_s: 3.0 }),
        hang_m: Some(0.3),
        lowest_m: Some(0.93),
        peak_n: 3720.0,
        limit_n: Some(6000.0),
        now_s: 0.9,
        length: Scale::of(Dimension::Length, UnitSystem::Metric),
        force: Scale::of(Dimension::Force, UnitSystem::Metric),
        swing: None,
    }
}

fn draw_picture(width: u16, height: u16) -> Vec<String> {
    let mut terminal = Terminal::new(TestBackend::new(width, height)).unwrap();
    terminal.draw(|frame| history::draw(frame, frame.area(), &picture(), Theme::Mono)).unwrap();
    rows(&terminal)
}

#[test]
fn history_names_its_axes_its_levels_and_its_modes() {
    let rows = draw_picture(72, 28);
    println!("{}", rows.join("\n"));
    let all = rows.join("\n");
    for word in [
        "travel past taut",
        "(m)",
        "line force (kN), peak 3.72 kN",
        "limit 6.00 kN",
        "rest 0.300 m",
        "lowest 0.930 m",
        "= taut",
        "~ slack",
    ] {
        assert!(all.contains(word), "no `{word}` in\n{all}");
    }
}

#[test]
fn tick_labels_under_a_plot_never_touch() {
    for width in 20..120 {
        let mut terminal = Terminal::new(TestBackend::new(width, 1)).unwrap();
        let area = Rect::new(0, 0, width, 1);
        for span in [0.0131, 0.9, 1.52, 14.2, 121.0] {
            terminal
                .draw(|frame| {
                    let ticks = plot::draw_foot(frame, area, (0.0, span), "s", ratatui::style::Style::new());
                    assert!(!ticks.values.is_empty());
                })
                .unwrap();
            let text = rows(&terminal).concat();
            let labels: Vec<f64> = text.split_whitespace().skip(1).map(|label| label.parse().unwrap()).collect();
            assert!(labels.windows(2).all(|pair| pair[0] < pair[1]), "{width} {span}: {text}");
        }
    }
}

#[test]
fn levels_and_reserves_show_the_digits_of_sentences_and_parts_add_up_to_the_millimetre() {
    let rows = draw_scene(&roof(0.417, UnitSystem::Metric), 110, 40).join("\n");
    for text in ["0.417 m clearance, 1.00 m wanted", "13.50 m anchor", "1.800 m free fall"] {
        assert!(rows.contains(text), "no `{text}` in\n{rows}");
    }
    let rows = draw_scene(&roof(0.80772, UnitSystem::Us), 110, 40).join("\n");
    assert!(rows.contains("2.65 ft clearance, 3.28 ft wanted"), "{rows}");
}
