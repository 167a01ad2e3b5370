//! One input across a range, and a map of two, as SVG figures.
use super::Report;
use super::drawing::{Drawing, FRAME, Scale, With, px};
use super::field::{MAP_CAUTION, Map};
use super::vary::ROW_CAUTION;
use crate::margin::{Check, CheckKind, Verdict, worst};
use crate::quantity::{UnitSystem, display_unit, format_si};
use crate::study::{Axis, Evaluator, Field, Variation};
use std::fmt::Write;
use svg::node::element::Element;

/// Dashes that tell the checks apart beside their places in the legend.
const DASHES: [&str; 6] = ["", "9 4", "3 3", "12 3 3 3", "6 2 1 2", "1 4"];
/// Most checks that are drawn; those with the least room anywhere come first.
const MOST_LINES: usize = 6;
/// Height of the strip of verdicts, user units.
const STRIP: f64 = 18.0;
/// Room beyond this share of the limit, on either side, is cut.
const CUT: f64 = 1.0;

/// The map as a figure: fields of verdicts, the line where they change, the file's own values.
#[must_use]
pub fn field_svg(report: &Report, evaluator: &Evaluator, field: &Field, system: UnitSystem) -> String {
    let map = Map { evaluator, field, system };
    let (x, y) = (scale(&map, &field.across, true), scale(&map, &field.up, true));
    let title = format!("Verdicts over {} and {}", map.path(&field.across), map.path(&field.up));
    let mut drawing = Drawing::new(&title, &alternative(&map, report));
    cells(&mut drawing, field);
    let units = [unit(&map, &field.across), unit(&map, &field.up)];
    let mut data = String::new();
    for [a, b] in &field.line {
        let at = |p: &crate::study::Edge| format!("{} {}", px(x.x(p.x / units[0])), px(y.y(p.y / units[1])));
        let _ = write!(data, "M{}L{}", at(a), at(b));
    }
    drawing.path("halo", &data);
    drawing.path("zero", &data);
    drawing.axes(&x, &y);
    if let (Some(across), Some(up)) = (map.present(&field.across), map.present(&field.up)) {
        mark(&mut drawing, (x.x(across / units[0]), y.y(up / units[1])));
    }
    field_legend(&mut drawing, &map, report);
    drawing.finish()
}

fn unit(map: &Map<'_>, axis: &Axis) -> f64 {
    display_unit(map.dimension(axis), map.system).factor()
}

/// An axis in the unit shown; cells reach half a step beyond the first and the last value.
#[expect(clippy::cast_precision_loss, reason = "steps are few")]
fn scale(map: &Map<'_>, axis: &Axis, cells: bool) -> Scale {
    let (low, high) = (*axis.range.start(), *axis.range.end());
    let half = if cells { (high - low) / (axis.steps - 1) as f64 / 2.0 } else { 0.0 };
    let unit = display_unit(map.dimension(axis), map.system);
    let label = map.evaluator.inputs().get(axis.input).map_or("", |input| input.field.label);
    let words = match unit.symbol() {
        "" => format!("{} ({label})", map.path(axis)),
        symbol => format!("{} ({label}), {symbol}", map.path(axis)),
    };
    Scale { low: (low - half) / unit.factor(), high: (high + half) / unit.factor(), words }
}

fn alternative(map: &Map<'_>, report: &Report) -> String {
    let field = map.field;
    let count = |verdict: Verdict| format!("{} in {} cells", verdict.word(), field.count(verdict));
    let counts = [Verdict::Holds, Verdict::Open, Verdict::Short].map(count).join(", ");
    let range = |axis: &Axis| {
        let (low, high) = (map.shown(axis, *axis.range.start()), map.shown(axis, *axis.range.end()));
        format!("{} from {low} to {high}", map.path(axis))
    };
    let partial = if field.partial { " Partial: it was stopped before its end." } else { "" };
    format!(
        "Map of {} by {} runs of {}: to the right {}, upwards {}. Verdicts: {counts}; {} runs could not be made. The file \
         itself: {}. {MAP_CAUTION}{partial}",
        field.across.steps,
        field.up.steps,
        report.file,
        range(&field.across),
        range(&field.up),
        field.failed(),
        report.verdict.word()
    )
}

/// Neighbours of one verdict in a row are one rectangle.
#[expect(clippy::cast_precision_loss, reason = "steps are few")]
fn cells(drawing: &mut Drawing, field: &Field) {
    let [left, top, right, bottom] = FRAME;
    let (columns, rows) = (field.across.steps, field.up.steps);
    let (width, height) = ((right - left) / columns as f64, (bottom - top) / rows as f64);
    for up in 0..field.rows() {
        let verdicts: Vec<Verdict> =
            (0..columns).filter_map(|across| field.cell(across, up)).map(crate::study::Cell::verdict).collect();
        let mut first = 0;
        for stretch in verdicts.chunk_by(|a, b| a == b) {
            let place = [left + first as f64 * width, bottom - (up + 1) as f64 * height];
            if let Some(&verdict) = stretch.first() {
                drawing.verdict(verdict, [place[0], place[1], stretch.len() as f64 * width, height]);
            }
            first += stretch.len();
        }
    }
}

/// A ring with a cross: the file's own values.
fn mark(drawing: &mut Drawing, (x, y): (f64, f64)) {
    let ring =
        |class: &str| Element::new("circle").with("class", class).with("cx", px(x)).with("cy", px(y)).with("r", 7);
    let (left, top) = (px(x - 11.0), px(y - 11.0));
    let cross = format!("M{left} {}h22M{} {top}v22", px(y), px(x));
    drawing.add(ring("halo"));
    drawing.path("halo", &cross);
    drawing.add(ring("ink"));
    drawing.path("ink", &cross);
}

fn field_legend(drawing: &mut Drawing, map: &Map<'_>, report: &Report) {
    let y = FRAME[3] + 74.0;
    let place = [(FRAME[0], Verdict::Holds), (FRAME[0] + 250.0, Verdict::Open), (FRAME[0] + 500.0, Verdict::Short)];
    for (x, verdict) in place {
        drawing.key(verdict, (x, y), &format!("{} ({} cells)", verdict.word(), map.field.count(verdict)));
    }
    mark(drawing, (FRAME[0] + 11.0, y + 24.0));
    let within = map.present(&map.field.across).is_some() && map.present(&map.field.up).is_some();
    let place = if within { "" } else { ", outside of this map" };
    drawing.text("small", (FRAME[0] + 28.0, y + 29.0), &format!("the file: {}{place}", report.verdict.word()));
    drawing.path("zero", &format!("M{} {}h26", px(FRAME[0] + 250.0), px(y + 24.0)));
    let line = if map.field.partial { "line not worked out: partial" } else { "where verdicts change (refined)" };
    drawing.text("small", (FRAME[0] + 282.0, y + 29.0), line);
    drawing.text("small faint", (FRAME[0], y + 54.0), MAP_CAUTION);
    drawing.text("small faint", (FRAME[0], y + 74.0), &report.file);
}

/// One input across a range as a figure: the room of the checks as a share of their limits, the verdict below it, and
/// where verdicts change.
#[must_use]
pub fn vary_svg(report: &Report, evaluator: &Evaluator, found: &Variation, system: UnitSystem) -> String {
    let Some(input) = evaluator.inputs().get(found.input) else { return String::new() };
    let unit = display_unit(input.measure.dimension(), system);
    let values: Vec<f64> = found.rows.iter().map(|row| row.value / unit.factor()).collect();
    let (Some(&low), Some(&high)) = (values.first(), values.last()) else { return String::new() };
    let symbol = if unit.symbol().is_empty() { String::new() } else { format!(", {}", unit.symbol()) };
    let x = Scale { low, high, words: format!("{} ({}){symbol}", input.path, input.field.label) };
    let y = Scale { low: -CUT, high: CUT, words: "room left as a share of the limit (above zero it holds)".to_owned() };
    let title = format!("Checks over {}", input.path);
    let mut drawing = Drawing::new(&title, &vary_alternative(report, evaluator, found, system));
    strip(&mut drawing, found, &x, unit.factor());
    let kinds = drawn(found);
    for (place, kind) in kinds.iter().enumerate() {
        let data = room_path(found, *kind, &x, &y, unit.factor());
        drawing.add(line(place, &data));
    }
    drawing.path("zero", &format!("M{} {}H{}", px(FRAME[0]), px(y.y(0.0)), px(FRAME[2])));
    for at in &found.crossings {
        drawing.path("change", &format!("M{} {}V{}", px(x.x(at.value / unit.factor())), px(FRAME[1]), px(FRAME[3])));
    }
    let today = input.measure.si() / unit.factor();
    if (low..=high).contains(&today) {
        mark(&mut drawing, (x.x(today), y.y(0.0)));
    }
    drawing.axes(&x, &y);
    vary_legend(&mut drawing, report, evaluator, found, &kinds);
    drawing.finish()
}

fn vary_alternative(report: &Report, evaluator: &Evaluator, found: &Variation, system: UnitSystem) -> String {
    let Some(input) = evaluator.inputs().get(found.input) else { return String::new() };
    let shown = |value: f64| format_si(value, input.measure.dimension(), system);
    let change = |at: &crate::study::Crossing| {
        let label = label(evaluator, found, at.kind);
        format!("{label} {} below and {} above {}", at.below.word(), at.above.word(), shown(at.value))
    };
    let changes: Vec<String> = found.crossings.iter().map(change).collect();
    let changes = if changes.is_empty() { "nowhere".to_owned() } else { changes.join("; ") };
    let ends = [found.rows.first(), found.rows.last()].map(|row| row.map_or(String::new(), |row| shown(row.value)));
    format!(
        "Room of every check of {} over {} from {} to {}, {} in the file. Verdicts change: {changes}. \
         {ROW_CAUTION}",
        report.file,
        input.path,
        ends[0],
        ends[1],
        shown(input.measure.si())
    )
}

fn label(evaluator: &Evaluator, found: &Variation, kind: CheckKind) -> String {
    let known = found.rows.iter().find_map(|row| row.run.check(kind).map(|check| (row, check)));
    known.map_or(String::new(), |(row, check)| evaluator.margin(&row.run, check, UnitSystem::Metric).label)
}

/// The worst verdict of every row along the lower rim.
fn strip(drawing: &mut Drawing, found: &Variation, x: &Scale, unit: f64) {
    let verdict = |row: &crate::study::Row| worst(row.run.checks.iter().map(|check| check.verdict));
    for pair in found.rows.windows(2) {
        let [a, b] = pair else { continue };
        let (from, to) = (x.x(a.value / unit), x.x(b.value / unit));
        let middle = f64::midpoint(from, to);
        for (row, start, end) in [(a, from, middle), (b, middle, to)] {
            drawing.verdict(verdict(row), [start, FRAME[3] - STRIP, end - start, STRIP]);
        }
    }
}

/// The checks that are drawn: those with a margin somewhere, the least room first.
fn drawn(found: &Variation) -> Vec<CheckKind> {
    let mut least: Vec<(CheckKind, f64)> = Vec::new();
    for check in found.rows.iter().flat_map(|row| &row.run.checks).filter(|check| room(check).is_some()) {
        let room = check.relative();
        match least.iter_mut().find(|(kind, _)| *kind == check.kind) {
            Some((_, known)) => *known = known.min(room),
            None => least.push((check.kind, room)),
        }
    }
    least.sort_by(|a, b| a.1.total_cmp(&b.1).then(a.0.cmp(&b.0)));
    least.into_iter().map(|(kind, _)| kind).take(MOST_LINES).collect()
}

fn room(check: &Check) -> Option<f64> {
    check.margin.map(|_| check.relative()).filter(|room| room.is_finite())
}

/// A path through every row that has the margin; broken where one has none.
fn room_path(found: &Variation, kind: CheckKind, x: &Scale, y: &Scale, unit: f64) -> String {
    let mut data = String::new();
    let mut pen = 'M';
    for row in &found.rows {
        match row.run.check(kind).and_then(room) {
            Some(room) => {
                let place = (x.x(row.value / unit), y.y(room.clamp(-CUT, CUT)));
                let _ = write!(data, "{pen}{} {}", px(place.0), px(place.1));
                pen = 'L';
            }
            None => pen = 'M',
        }
    }
    data
}

fn line(place: usize, data: &str) -> Element {
    let dash = DASHES.get(place % DASHES.len()).copied().unwrap_or_default();
    let width = if place == 0 { "3" } else { "2" };
    Element::new("path").with("class", "ink").with("d", data).with("stroke-width", width).with("stroke-dasharray", dash)
}

fn vary_legend(drawing: &mut Drawing, report: &Report, evaluator: &Evaluator, found: &Variation, kinds: &[CheckKind]) {
    let y = FRAME[3] + 66.0;
    for ((place, kind), slot) in kinds.iter().enumerate().zip(0_u32..) {
        let (x, y) = (FRAME[0] + f64::from(slot % 3) * 272.0, y + f64::from(slot / 3) * 20.0);
        drawing.add(line(place, &format!("M{} {}h34", px(x), px(y - 4.0))));
        drawing.text("small", (x + 40.0, y), &label(evaluator, found, *kind));
    }
    let verdicts = [Verdict::Holds, Verdict::Open, Verdict::Short];
    for (slot, verdict) in (0_u32..).zip(verdicts) {
        drawing.key(verdict, (FRAME[0] + f64::from(slot) * 90.0, y + 44.0), verdict.word());
    }
    mark(drawing, (FRAME[0] + 285.0, y + 39.0));
    drawing.text("small", (FRAME[0] + 302.0, y + 44.0), &format!("the file: {}", report.verdict.word()));
    drawing.path("change", &format!("M{} {}h26", px(FRAME[0] + 400.0), px(y + 40.0)));
    drawing.text("small", (FRAME[0] + 432.0, y + 44.0), "where a verdict changes (refined)");
    drawing.text("small faint", (FRAME[0], y + 66.0), ROW_CAUTION);
    let words = format!("Room beyond the limit itself, either way, is cut. {}", report.file);
    drawing.text("small faint", (FRAME[0], y + 84.0), &words);
}
