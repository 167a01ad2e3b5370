//! The elevation, to scale.
use super::drawing::{Anchor, Drawing, Shape};
use super::value::Figure;
use crate::estimate::{Elevations, PlaneView};
use crate::quantity::{Dimension, UnitSystem, display_unit, format_si};
use crate::sheet::Report;
use crate::sheet::ticks::ticks;

const WIDTH: f64 = 720.0;
const HEIGHT: f64 = 460.0;
/// Edges of the drawing: left, top, right, bottom.
const EDGE: (f64, f64, f64, f64) = (58.0, 26.0, 190.0, 16.0);

/// The elevation where the file gives one: to scale, from the anchor down to the lowest obstacle.
pub fn elevation(report: &Report, system: UnitSystem) -> Option<Figure> {
    let e = report.estimate.elevations.as_ref()?;
    let mut view = View::new(report, e, system);
    view.scale();
    view.levels(report, e);
    match &report.estimate.plane {
        Some(plane) => view.swing(report, e, plane),
        None => view.straight(e),
    }
    let words = |m: f64| format_si(m, Dimension::Length, system);
    let obstacles: Vec<String> = report
        .scenario
        .obstacles
        .iter()
        .map(|o| format!("{} at {}", crate::sheet::clean(&o.name), words(o.top.si())))
        .collect();
    let below = if obstacles.is_empty() { String::new() } else { format!(" Below: {}.", obstacles.join(", ")) };
    let anchor = e.anchor_m.map_or(String::new(), |a| format!(" The anchor is at {}.", words(a)));
    let beside = if report.estimate.plane.is_some() { ", offsets too" } else { ", four moments side by side" };
    let text = format!(
        "Elevations to scale{beside}.{anchor} The attachment is at {} at the start, at {} when the line comes taut, at {} at the \
         lowest point and at {} at rest; the lowest part of the body comes down to {}, its allowance counted in.{below}",
        words(e.attachment_start_m),
        words(e.attachment_taut_m),
        words(e.attachment_lowest_m),
        words(e.attachment_rest_m),
        words(e.lowest_point_m())
    );
    Some(Figure { id: "elevation", title: "Elevation, to scale".to_owned(), text, drawing: view.drawing })
}

struct View {
    drawing: Drawing,
    /// Elevations at the foot and at the head of the drawing, m.
    low: f64,
    high: f64,
    /// Offset in the middle, m.
    centre: f64,
    /// Lowest height at which the next label may stand.
    labels: Vec<f64>,
    system: UnitSystem,
}

impl View {
    fn new(report: &Report, e: &Elevations, system: UnitSystem) -> Self {
        let tops = report.scenario.obstacles.iter().map(|o| o.top.si());
        let faces = report.scenario.faces.iter().flat_map(|f| [f.bottom.si(), f.top.si()]);
        let plane = report.estimate.plane.as_ref();
        let marks = [e.lowest_point_m(), e.attachment_start_m + 0.3, e.standing_m];
        let all = tops.chain(faces).chain(e.anchor_m).chain(marks);
        let (low, high) = all.fold((f64::INFINITY, f64::NEG_INFINITY), |(l, h), v| (l.min(v), h.max(v)));
        let more = 0.06 * (high - low).max(0.5);
        let centre = plane.map_or(0.0, |p| 0.5 * (p.anchor.offset_m + p.lowest.offset_m));
        let drawing = Drawing { width: WIDTH, height: HEIGHT, shapes: Vec::new() };
        Self { drawing, low: low - more, high: high + more, centre, labels: Vec::new(), system }
    }

    fn per_metre(&self) -> f64 {
        (HEIGHT - EDGE.1 - EDGE.3) / (self.high - self.low)
    }
    fn y(&self, elevation_m: f64) -> f64 {
        EDGE.1 + (self.high - elevation_m) * self.per_metre()
    }
    /// Offsets are to the same scale as elevations.
    fn x(&self, offset_m: f64) -> f64 {
        let middle = 0.5 * (EDGE.0 + WIDTH - EDGE.2);
        (middle + (offset_m - self.centre) * self.per_metre()).clamp(EDGE.0, WIDTH - EDGE.2)
    }
    fn line(&mut self, class: &'static str, from: (f64, f64), to: (f64, f64)) {
        self.drawing.shapes.push(Shape::Line { class, from, to });
    }
    fn words(&mut self, class: &'static str, at: (f64, f64), anchor: Anchor, words: &str) {
        self.drawing.shapes.push(Shape::Words { class, at, anchor, words: words.to_owned() });
    }

    fn scale(&mut self) {
        let unit = display_unit(Dimension::Length, self.system);
        let found = ticks(self.low / unit.factor(), self.high / unit.factor(), 10);
        for &value in &found.values {
            let y = self.y(value * unit.factor());
            self.line("grid", (EDGE.0, y), (WIDTH - EDGE.2, y));
            self.words("faint", (EDGE.0 - 6.0, y + 4.0), Anchor::End, &found.label(value));
        }
        let name = format!("elevation above the datum, {}", unit.symbol());
        self.words("strong", (EDGE.0, 16.0), Anchor::Start, &name);
    }

    /// A label at the right; moved up where one is there already.
    fn label(&mut self, elevation_m: f64, words: &str) {
        let mut y = self.y(elevation_m) + 4.0;
        while self.labels.iter().any(|taken| (taken - y).abs() < 14.0) {
            y -= 3.0;
        }
        self.labels.push(y);
        let shown = format_si(elevation_m, Dimension::Length, self.system);
        let words = if words.chars().count() > 20 {
            format!("{}…", words.chars().take(19).collect::<String>())
        } else {
            words.to_owned()
        };
        self.words("", (WIDTH - EDGE.2 + 6.0, y), Anchor::Start, &format!("{shown} {words}"));
    }

    fn levels(&mut self, report: &Report, e: &Elevations) {
        let (left, right) = (EDGE.0, WIDTH - EDGE.2);
        for obstacle in &report.scenario.obstacles {
            let top = obstacle.top.si();
            let (from, to) = obstacle.extent.map_or((left, right), |(from, to)| (self.x(from.si()), self.x(to.si())));
            let (from, to) = if report.estimate.plane.is_some() { (from, to) } else { (left, right) };
            let y = self.y(top);
            let thick = (self.y(self.low) - y).clamp(3.0, 9.0);
            self.drawing.shapes.push(Shape::Area { class: "ground", at: (from, y), size: (to - from, thick) });
            if let Some(reserve) = obstacle.reserve.filter(|r| r.si() > 0.0) {
                let above = self.y(top + reserve.si());
                self.drawing.shapes.push(Shape::Area {
                    class: "reserve",
                    at: (from, above),
                    size: (to - from, y - above),
                });
            }
            self.label(top, &crate::sheet::clean(&obstacle.name));
        }
        for face in &report.scenario.faces {
            let x = self.x(face.offset.si());
            self.line("wall", (x, self.y(face.bottom.si())), (x, self.y(face.top.si())));
            self.words("", (x, self.y(face.top.si()) - 4.0), Anchor::Middle, &crate::sheet::clean(&face.name));
        }
        self.label(e.lowest_point_m(), "lowest part");
        self.label(e.standing_m, "standing");
        if let Some(anchor) = e.anchor_m {
            self.label(anchor, "anchor");
        }
    }

    /// A body: attachment, and down to its lowest part; the allowance dotted.
    fn body(&mut self, x: f64, attachment_m: f64, e: &Elevations, name: &str, allowance: bool) {
        let foot = attachment_m - e.body_below_attachment_m;
        let (top, bottom) = (self.y(attachment_m), self.y(foot));
        self.line("body", (x, top), (x, bottom));
        if allowance {
            let low = self.y(attachment_m - e.lowest_point_below_attachment_m);
            self.line("bound", (x, bottom), (x, low));
        }
        self.words("", (x + 8.0, top + 4.0), Anchor::Start, name);
    }

    fn straight(&mut self, e: &Elevations) {
        let stations = [
            ("start", e.attachment_start_m, false),
            ("taut", e.attachment_taut_m, false),
            ("lowest", e.attachment_lowest_m, true),
            ("rest", e.attachment_rest_m, true),
        ];
        let step = (WIDTH - EDGE.0 - EDGE.2) / 4.0;
        let mut x = EDGE.0 + 0.5 * step;
        let standing = self.y(e.standing_m);
        self.line("axis", (EDGE.0, standing), (EDGE.0 + step, standing));
        for (name, attachment, allowance) in stations {
            if let Some(anchor) = e.anchor_m {
                let y = self.y(anchor);
                self.line("axis", (x - 9.0, y), (x + 9.0, y));
                self.line("rope", (x, y), (x, self.y(attachment)));
            }
            self.body(x, attachment, e, name, allowance);
            x += step;
        }
    }

    fn swing(&mut self, report: &Report, e: &Elevations, plane: &PlaneView) {
        let (ax, ay) = (self.x(plane.anchor.offset_m), self.y(plane.anchor.elevation_m));
        self.line("axis", (ax - 9.0, ay), (ax + 9.0, ay));
        let (px, py) = (self.x(plane.pivot.offset_m), self.y(plane.pivot.elevation_m));
        self.line("rope", (ax, ay), (px, py));
        let trace = &report.estimate.trace;
        let end = trace.end_s();
        let samples = trace.samples(0.0, end, (end / 300.0).max(f64::MIN_POSITIVE));
        let points =
            samples.iter().filter_map(|s| s.plane.map(|p| (self.x(p.offset_m), self.y(p.elevation_m)))).collect();
        self.drawing.shapes.push(Shape::Path { class: "curve", points });
        for (name, at, allowance) in
            [("start", plane.start, false), ("taut", plane.taut, false), ("lowest", plane.lowest, true)]
        {
            let x = self.x(at.offset_m);
            self.line("rope", (px, py), (x, self.y(at.elevation_m)));
            self.body(x, at.elevation_m, e, name, allowance);
        }
    }
}
