//! The figures of a sheet.
use super::drawing::{Anchor, Drawing, Shape};
use super::elevation::elevation;
use super::plot::{Axis, Plot};
use super::value::{Block, Figure, Section};
use crate::estimate::{Envelope, Sample};
use crate::margin::{Margin, Sense};
use crate::quantity::{Dimension, UnitSystem, display_unit, format_si};
use crate::sheet::Report;
use crate::sheet::text::number_label;
use crate::sheet::words::{margin_value, signed};
use crate::study::NumberSpread;

/// Size of a plot.
const SIZE: (f64, f64) = (720.0, 300.0);
/// Points along a curve.
const POINTS: f64 = 700.0;
/// A long run is shown up to this many times the time of its lowest point.
const WINDOW: f64 = 10.0;

/// All figures that apply.
pub fn section(report: &Report, margins: &[Margin], system: UnitSystem) -> Section {
    let window = Window::of(report);
    let mut figures = Vec::new();
    figures.extend(elevation(report, system));
    figures.push(travel(report, &window, system));
    figures.push(force(report, &window, margins, system));
    figures.extend(bars(margins, system));
    figures.extend(spreads(report, system));
    Section::new("figures", "Figures", figures.into_iter().map(Block::Figure).collect())
}

/// The part of the run that is drawn.
struct Window {
    samples: Vec<Sample>,
    end_s: f64,
    cut: bool,
}

impl Window {
    fn of(report: &Report) -> Self {
        let trace = &report.estimate.trace;
        let lowest = report.estimate.numbers.get("time_lowest").unwrap_or(f64::INFINITY);
        let end_s = trace.end_s().min(WINDOW * lowest);
        let samples = trace.samples(0.0, end_s, (end_s / POINTS).max(f64::MIN_POSITIVE));
        Self { samples, end_s, cut: end_s < trace.end_s() }
    }
    fn words(&self) -> String {
        let end = format_si(self.end_s, Dimension::Time, UnitSystem::Metric);
        if self.cut { format!(" Drawn up to {end}; the run goes on.") } else { format!(" The run ends at {end}.") }
    }
    fn axis(&self) -> (Axis, &'static str) {
        (Axis { from: 0.0, to: self.end_s.max(1e-6) }, "time from the start of the fall, s")
    }
}

fn travel(report: &Report, window: &Window, system: UnitSystem) -> Figure {
    let unit = display_unit(Dimension::Length, system);
    let shown = |m: f64| m / unit.factor();
    let values: Vec<(f64, f64)> = window.samples.iter().map(|s| (s.time_s, shown(s.travel_m))).collect();
    let range = Axis::around(values.iter().map(|v| v.1));
    let y = Axis { from: range.to, to: range.from };
    let name = format!("travel past taut, downward, {}", unit.symbol());
    let mut plot = Plot::new(SIZE, window.axis(), (y, &name));
    let envelope = report.estimate.envelope.as_ref();
    if let Some(envelope) = envelope {
        for sign in [1.0, -1.0] {
            plot.curve("bound", &bound(envelope, window.end_s, sign, shown));
        }
        plot.level("bound", shown(envelope.hang_m), "hangs");
    }
    plot.curve("curve", &values);
    let length = |m: f64| format_si(m, Dimension::Length, system);
    let numbers = &report.estimate.numbers;
    let lowest = numbers
        .get("arrest_distance")
        .map_or(String::new(), |m| format!(" The lowest point is {} past taut.", length(m)));
    let rest =
        numbers.get("hang_travel").map_or(String::new(), |m| format!(" It comes to rest {} past taut.", length(m)));
    let bounds = if envelope.is_some() {
        " Dotted: the envelope of its mode about the hang position, carried on to the end."
    } else {
        ""
    };
    let text = format!("Travel of the attachment over time, downward.{lowest}{rest}{bounds}{}", window.words());
    let title = if envelope.is_some() { "Travel over time with its envelope" } else { "Travel over time" };
    Figure { id: "travel", title: title.to_owned(), text, drawing: plot.finish() }
}

fn bound(envelope: &Envelope, end_s: f64, sign: f64, shown: impl Fn(f64) -> f64) -> Vec<(f64, f64)> {
    let (from, to) = (envelope.from_s, end_s);
    (0..=200)
        .map(|n| {
            let t = from + (to - from) * f64::from(n) / 200.0;
            let away = envelope.amplitude_m * (-envelope.decay_per_s * (t - from)).exp();
            (t, shown(envelope.hang_m + sign * away))
        })
        .collect()
}

fn force(report: &Report, window: &Window, margins: &[Margin], system: UnitSystem) -> Figure {
    let unit = display_unit(Dimension::Force, system);
    let shown = |n: f64| n / unit.factor();
    let values: Vec<(f64, f64)> = window.samples.iter().map(|s| (s.time_s, shown(s.force_n))).collect();
    let limit = margins.iter().find(|margin| margin.id == "arrest_force").and_then(|margin| margin.limit);
    let range = Axis::around(values.iter().map(|v| v.1).chain(limit.map(shown)).chain([0.0]));
    let name = format!("line force, {}", unit.symbol());
    let mut plot = Plot::new(SIZE, window.axis(), (range, &name));
    let words = |n: f64| format_si(n, Dimension::Force, system);
    if let Some(limit) = limit {
        plot.level("limit", shown(limit), &format!("limit on the arrest force, {}", words(limit)));
    }
    plot.curve("curve", &values);
    let peak = report.estimate.numbers.get("arrest_force_peak").map_or(String::new(), words);
    let against =
        limit.map_or_else(|| " No limit on it is judged.".to_owned(), |l| format!(" The limit is {}.", words(l)));
    let text = format!("Line force over time; the largest is {peak}.{against}{}", window.words());
    Figure { id: "force", title: "Line force over time with its limit".to_owned(), text, drawing: plot.finish() }
}

/// Height of a row of the margin bars.
const ROW: f64 = 24.0;

fn bars(margins: &[Margin], system: UnitSystem) -> Option<Figure> {
    if margins.is_empty() {
        return None;
    }
    let height = ROW * f64::from(u32::try_from(margins.len()).unwrap_or(0)) + 34.0;
    let mut drawing = Drawing { width: SIZE.0, height, shapes: Vec::new() };
    let (middle, half) = (440.0, 150.0);
    let mut words = |class, at, anchor, words: String| drawing.shapes.push(Shape::Words { class, at, anchor, words });
    words("strong", (middle - 6.0, 14.0), Anchor::End, "short".to_owned());
    words("strong", (middle + 6.0, 14.0), Anchor::Start, "room, as a share of the limit".to_owned());
    let mut y = 24.0;
    let mut told = Vec::new();
    for margin in margins {
        let class = margin.verdict.word();
        let name = format!("{} {}  {}", margin.verdict.symbol(), class, crate::sheet::clean(&margin.label));
        words(class, (4.0, y + 14.0), Anchor::Start, name.clone());
        let room =
            margin.margin.map_or_else(|| "not judged".to_owned(), |m| signed(m, &margin_value(margin, m, system)));
        words("", (SIZE.0 - 4.0, y + 14.0), Anchor::End, room.clone());
        told.push(format!("{} {class}, {room}", crate::sheet::clean(&margin.label)));
        y += ROW;
    }
    y = 24.0;
    for margin in margins {
        if let Some(share) = share(margin) {
            let width = (share.abs() * half).clamp(1.0, half);
            let at = (if share < 0.0 { middle - width } else { middle }, y + 4.0);
            drawing.shapes.push(Shape::Area { class: margin.verdict.word(), at, size: (width, ROW - 9.0) });
        }
        y += ROW;
    }
    drawing.shapes.push(Shape::Line { class: "axis", from: (middle, 20.0), to: (middle, height - 6.0) });
    let text = format!(
        "Room of every check as a share of its limit, to the right where there is room, to the left where it is short; a \
         bar ends at the whole limit. {}.",
        told.join("; ")
    );
    Some(Figure { id: "margins", title: "Margins".to_owned(), text, drawing })
}

/// Room over the limit; over the demand where the limit is the smaller one.
fn share(margin: &Margin) -> Option<f64> {
    let (room, limit, demand) = (margin.margin?, margin.limit?, margin.demand?);
    let of = match margin.sense {
        Sense::AtMost => limit.abs(),
        Sense::AtLeast => limit.abs().max(demand.abs()),
    };
    (of > 0.0).then(|| (room / of).clamp(-1.0, 1.0))
}

/// Ids of the histograms in a fixed order.
const HISTOGRAMS: [&str; 3] = ["spread-1", "spread-2", "spread-3"];

/// The histograms of the largest force and of the first clearances, where they vary.
fn spreads(report: &Report, system: UnitSystem) -> Vec<Figure> {
    let Some(bands) = &report.bands else { return Vec::new() };
    let wanted = |n: &&NumberSpread| {
        n.id == "arrest_force_peak" || n.id == "total_fall_distance" || n.id.starts_with("clearance.")
    };
    // Rounding alone is no spread.
    let varies = |n: &&NumberSpread| n.quantiles[6] - n.quantiles[0] > 1e-6 * n.quantiles[6].abs();
    let numbers = bands.study.spread.numbers.iter().filter(wanted).filter(varies);
    numbers.zip(HISTOGRAMS).map(|(number, id)| histogram(report, number, id, system)).collect()
}

fn histogram(report: &Report, number: &NumberSpread, id: &'static str, system: UnitSystem) -> Figure {
    let unit = display_unit(number.dimension, system);
    let [least, .., most] = number.quantiles.map(|v| v / unit.factor());
    let label = crate::sheet::clean(&number_label(&number.id, &report.scenario));
    let counts: Vec<f64> = number.bars.iter().map(|&n| f64::from(u32::try_from(n).unwrap_or(u32::MAX))).collect();
    let tallest = counts.iter().copied().fold(1.0, f64::max);
    let name = format!("{label}, {}", unit.symbol());
    let x = Axis { from: least, to: most };
    let mut plot = Plot::new(SIZE, (x, &name), (Axis { from: 0.0, to: 1.05 * tallest }, "samples"));
    let width = (most - least) / f64::from(u32::try_from(counts.len()).unwrap_or(1));
    for (at, count) in (0_u32..).zip(&counts) {
        let from = least + width * f64::from(at);
        plot.area("pile", (from, 0.0), (from + width, *count));
    }
    let show = |v: f64| format_si(v, number.dimension, system);
    let [q0, q05, _, q50, _, q95, q100] = number.quantiles;
    let text = format!(
        "{label} over {} samples: from {} to {}, half of them below {}, nine tenths between {} and {}.",
        number.count,
        show(q0),
        show(q100),
        show(q50),
        show(q05),
        show(q95)
    );
    Figure { id, title: format!("Spread of {label}"), text, drawing: plot.finish() }
}
