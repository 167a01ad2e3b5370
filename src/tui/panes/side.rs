//! What Elevation shows of places beside the fall line: a swing, an edge, faces, a lifeline. Worked out from a report
//! and the play head; heights and offsets in m.
use super::scene::{Scene, lowest_time};
use crate::estimate::{EndLoadView, EventKind, PlacePoint, Sample, SpanView};
use crate::scenario::{AnchorKind, SpanTension};
use crate::sheet::Report;

/// Offset from the fall line (right positive) and height, m.
pub type Spot = (f64, f64);

/// What a mark stands for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum MarkKind {
    /// A station of the fall.
    Station,
    /// Where a face or level is struck.
    Strike,
    /// The play head.
    Now,
}

/// The attachment at one instant.
#[derive(Clone, Debug, PartialEq)]
pub struct Mark {
    /// `S` start, `T` taut, `L` lowest, `B` turns back, `H` hangs, `X` strike, `@` now.
    pub symbol: &'static str,
    /// `start`, `strikes wall`.
    pub word: String,
    /// Where.
    pub at: Spot,
    /// When, s from the start of the fall.
    pub time_s: f64,
    /// What it stands for.
    pub kind: MarkKind,
}

/// A vertical face.
#[derive(Clone, Debug, PartialEq)]
pub struct Wall {
    /// Name.
    pub name: String,
    /// Offset from the fall line, m.
    pub offset_m: f64,
    /// Elevation of its lower end, m.
    pub bottom_m: f64,
    /// Elevation of its upper end, m.
    pub top_m: f64,
}

/// A horizontal lifeline.
#[derive(Clone, Debug, PartialEq)]
pub struct Cable {
    /// Left and right support.
    pub supports: [Spot; 2],
    /// Its shape without load, from left to right.
    pub unloaded: Vec<Spot>,
    /// Lowest point without load, below the chord, m.
    pub sag_m: f64,
    /// Where it carries the line under the largest load.
    pub peak: Spot,
    /// Deflection under the largest load, from the chord, m.
    pub peak_sag_m: f64,
    /// Where it carries the line now.
    pub now: Spot,
    /// Loads of the left and the right support under the largest load.
    pub end_loads: [EndLoadView; 2],
}

/// Everything beside the fall line.
#[derive(Clone, Debug, PartialEq)]
pub struct Side {
    /// The anchor.
    pub anchor: Spot,
    /// The edge, if any.
    pub edge: Option<Spot>,
    /// The lifeline, if any.
    pub cable: Option<Cable>,
    /// Faces.
    pub walls: Vec<Wall>,
    /// Path of the attachment.
    pub path: Vec<Spot>,
    /// Marks in the order of drawing, the play head last.
    pub marks: Vec<Mark>,
    /// The line at the play head, from what holds it to the attachment.
    pub line: Vec<Spot>,
    /// True when the line carries force at the play head.
    pub taut: bool,
    /// Half the width of the body, m.
    pub half_width_m: f64,
    /// True where the attachment leaves the fall line.
    pub swings: bool,
}

/// Points along the path.
const STEPS: f64 = 600.0;
/// Points along the unloaded cable.
const CABLE_STEPS: u32 = 240;

impl Side {
    /// What stands beside the fall line, if there is anything and the file gives elevations.
    #[must_use]
    pub fn of(report: &Report, scene: &Scene, time_s: f64) -> Option<Self> {
        let (scenario, estimate) = (&report.scenario, &report.estimate);
        let beside = estimate.plane.is_some()
            || estimate.span.is_some()
            || scenario.place.edge.is_some()
            || !scenario.faces.is_empty()
            || scenario.obstacles.iter().any(|obstacle| obstacle.extent.is_some());
        let anchor_m = scene.anchor_m.filter(|_| beside && estimate.elevations.is_some())?;
        let now = estimate.trace.at(time_s);
        let anchor = estimate.plane.as_ref().map_or((0.0, anchor_m), |plane| spot(plane.anchor));
        let edge = scenario.place.edge.as_ref().map(|edge| (edge.offset.si(), edge.elevation.si()));
        let cable = estimate.span.as_ref().map(|span| cable(report, span, anchor_m, &now));
        let held = cable.as_ref().map_or(anchor, |cable| cable.now);
        let line = [Some(held), edge, Some(place(report, &now))].into_iter().flatten().collect();
        Some(Self {
            anchor,
            edge,
            cable,
            walls: walls(report),
            path: path(report),
            marks: marks(report, scene, &now),
            line,
            taut: now.force_n > 0.0,
            half_width_m: scenario.subject.half_width.map_or(0.0, |half| half.si()),
            swings: estimate.plane.is_some(),
        })
    }

    /// Least and largest offset that the drawing must hold, m. A face or a level beyond twice the reach of the fall is
    /// drawn only as far as it comes into the picture.
    #[must_use]
    pub fn extent(&self) -> (f64, f64) {
        let body = self.path.iter().flat_map(|&(x, _)| [x - self.half_width_m, x + self.half_width_m]);
        let supports = self.cable.iter().flat_map(|cable| cable.supports.map(|at| at.0));
        let fixed = [Some(self.anchor.0), self.edge.map(|edge| edge.0)].into_iter().flatten();
        let wide = |(left, right): Spot, x: f64| (left.min(x), right.max(x));
        let (left, right) = body.chain(supports).chain(fixed).fold((0.0, 0.0), wide);
        let reach = (right - left).max(1.0);
        let near = |x: &f64| *x >= left - reach && *x <= right + reach;
        self.walls.iter().map(|wall| wall.offset_m).filter(near).fold((left, right), wide)
    }
}

const fn spot(point: PlacePoint) -> Spot {
    (point.offset_m, point.elevation_m)
}

/// Where the attachment is.
fn place(report: &Report, sample: &Sample) -> Spot {
    let taut_m = report.estimate.elevations.map_or(0.0, |levels| levels.attachment_taut_m);
    sample.plane.map_or((0.0, taut_m - sample.travel_m), |plane| (plane.offset_m, plane.elevation_m))
}

fn path(report: &Report) -> Vec<Spot> {
    let trace = &report.estimate.trace;
    let end = trace.end_s();
    trace.samples(0.0, end, end.max(1e-3) / STEPS).iter().map(|sample| place(report, sample)).collect()
}

fn walls(report: &Report) -> Vec<Wall> {
    let wall = |face: &crate::scenario::Face| Wall {
        name: face.name.trim().to_owned(),
        offset_m: face.offset.si(),
        bottom_m: face.bottom.si(),
        top_m: face.top.si(),
    };
    report.scenario.faces.iter().map(wall).collect()
}

fn marks(report: &Report, scene: &Scene, now: &Sample) -> Vec<Mark> {
    let estimate = &report.estimate;
    let mark = |symbol, word: &str, time_s: f64, kind| {
        let at = place(report, &estimate.trace.at(time_s));
        Mark { symbol, word: word.to_owned(), at, time_s, kind }
    };
    let station = |symbol, word, time_s| mark(symbol, word, time_s, MarkKind::Station);
    let mut marks = vec![station("S", "start", 0.0)];
    marks.extend(estimate.numbers.get("time_taut").map(|time| station("T", "taut", time)));
    marks.push(station("L", "lowest", lowest_time(report)));
    let turn = estimate.events.iter().find(|event| event.kind == EventKind::TurnsBack);
    marks.extend(turn.map(|event| station("B", "turns back", event.time_s)));
    if estimate.plane.is_none() {
        let rest = scene.stations[3].attachment_m;
        marks.push(Mark { at: (0.0, rest), ..station("H", "rest", estimate.trace.end_s()) });
    }
    let strikes = estimate.plane.iter().flat_map(|plane| &plane.strikes);
    marks.extend(strikes.map(|strike| Mark {
        at: spot(strike.at),
        ..mark("X", &format!("strikes {}", strike.name.trim()), strike.time_s, MarkKind::Strike)
    }));
    marks.push(mark("@", "now", now.time_s, MarkKind::Now));
    marks
}

/// The cable: a parabola (or straight) without load, two straight pieces under one.
fn cable(report: &Report, span: &SpanView, chord_m: f64, now: &Sample) -> Cable {
    let slope = span.level_difference_m / span.length_m;
    let chord = |x: f64| chord_m + slope * x;
    let (left, right) = (-span.at_m, span.length_m - span.at_m);
    let sag_m = match &report.scenario.anchor.kind {
        AnchorKind::Span(rigged) => match rigged.tension {
            SpanTension::Sag(sag) => sag.si(),
            SpanTension::Pretension(_) => 0.0,
        },
        AnchorKind::Fixed | AnchorKind::Sprung(_) => 0.0,
    };
    let droop = |x: f64| 4.0 * sag_m * (x - left) * (right - x) / (span.length_m * span.length_m);
    let point = |step: u32| {
        let x = left + span.length_m * f64::from(step) / f64::from(CABLE_STEPS);
        (x, chord(x) - droop(x))
    };
    Cable {
        supports: [(left, chord(left)), (right, chord(right))],
        unloaded: (0..=CABLE_STEPS).map(point).collect(),
        sag_m,
        peak: (0.0, chord_m - span.peak_deflection_m),
        peak_sag_m: span.peak_deflection_m,
        now: (0.0, chord_m - deflection_now(report, span, droop(0.0), now)),
        end_loads: span.end_loads,
    }
}

/// Deflection of the cable at the play head: in proportion to what gives beside the line, exact where nothing else does.
fn deflection_now(report: &Report, span: &SpanView, unloaded_m: f64, now: &Sample) -> f64 {
    let largest = report.estimate.numbers.get("other_elongation_peak").unwrap_or(0.0);
    // A cable that its absorber has made longer hangs lower, slack or not.
    let is_longer = now.other_elongation_m > 0.0;
    if now.force_n <= 0.0 && !is_longer || largest <= 0.0 {
        return unloaded_m;
    }
    span.slack_m + (span.peak_deflection_m - span.slack_m) * (now.other_elongation_m / largest).clamp(0.0, 1.0)
}
