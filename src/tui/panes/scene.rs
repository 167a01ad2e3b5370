//! What Elevation shows, worked out from a report and the play head.
use super::units::Scale;
use crate::estimate::{Elevations, Mode, Sample};
use crate::margin::Verdict;
use crate::quantity::{Dimension, UnitSystem};
use crate::scenario::SubjectKind;
use crate::sheet::Report;

/// Where the numbers of the vertical axis count from.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Origin {
    /// Elevation above the datum, the file's word for it.
    Datum(Option<String>),
    /// The taut position: the file states no elevation.
    Taut,
}

/// The subject at one instant. Heights in m, up positive, from the origin.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Station {
    /// `start`, `taut`, `lowest`, `rest`, `now`.
    pub name: &'static str,
    /// Height of the attachment.
    pub attachment_m: f64,
    /// From the attachment down to feet or underside.
    pub body_m: f64,
    /// Deployed length of the absorber.
    pub deployed_m: f64,
    /// True when the line carries force.
    pub taut: bool,
}

/// One dimension of the string that runs down from the attachment at the start.
#[derive(Clone, Debug, PartialEq)]
pub struct Part {
    /// What it is.
    pub name: String,
    /// Length, m; negative where the next mark lies above.
    pub length_m: f64,
    /// The verdict it decides, for a clearance.
    pub verdict: Option<Verdict>,
}

/// An obstacle with its reserve.
#[derive(Clone, Debug, PartialEq)]
pub struct Bar {
    /// Name.
    pub name: String,
    /// Height of its top, m.
    pub top_m: f64,
    /// Clear space wanted above, m.
    pub reserve_m: f64,
    /// The verdict on its clearance.
    pub verdict: Verdict,
    /// Horizontal extent, m from the fall line; everywhere where absent.
    pub extent_m: Option<(f64, f64)>,
}

/// Everything Elevation draws.
#[derive(Clone, Debug, PartialEq)]
pub struct Scene {
    /// What the axis counts from.
    pub origin: Origin,
    /// Person or load.
    pub subject: SubjectKind,
    /// Height of the anchor, m.
    pub anchor_m: Option<f64>,
    /// Height of the standing surface, m (persons).
    pub standing_m: Option<f64>,
    /// start, taut, lowest, rest, now.
    pub stations: [Station; 5],
    /// The dimension string, downwards.
    pub parts: Vec<Part>,
    /// The obstacle the string ends at, if any.
    pub string_end: Option<String>,
    /// Obstacles.
    pub bars: Vec<Bar>,
    /// Unit of the axis and all numbers.
    pub scale: Scale,
}

/// Travel of less than this is not drawn as a dimension, m.
const TOO_SHORT_M: f64 = 5e-4;

impl Scene {
    /// The scene of a report with the subject at `time_s`.
    #[must_use]
    pub fn of(report: &Report, time_s: f64, units: UnitSystem) -> Self {
        let marks = Marks::of(report);
        let lowest = report.estimate.trace.at(lowest_time(report));
        let bars = bars(report);
        let end = nearest(report, &bars);
        Self {
            origin: origin(report),
            subject: report.scenario.subject.kind,
            anchor_m: marks.anchor_m,
            standing_m: marks.standing_m,
            stations: stations(report, &marks, lowest, report.estimate.trace.at(time_s)),
            parts: parts(report, &marks, lowest, end.map(|index| &bars[index])),
            string_end: end.map(|index| bars[index].name.clone()),
            bars,
            scale: Scale::of(Dimension::Length, units),
        }
    }

    /// Highest and lowest mark that the drawing must hold, m.
    #[must_use]
    pub fn extent(&self) -> (f64, f64) {
        let mut high = self.stations[0].attachment_m.max(self.anchor_m.unwrap_or(f64::NEG_INFINITY));
        let mut low = self.standing_m.unwrap_or(f64::INFINITY);
        for station in &self.stations {
            high = high.max(station.attachment_m);
            low = low.min(station.attachment_m - station.body_m);
        }
        let reach = high - low;
        for bar in &self.bars {
            if bar.top_m >= low - 0.75 * reach || self.string_end.as_deref() == Some(&bar.name) {
                low = low.min(bar.top_m);
                high = high.max(bar.top_m);
            }
        }
        (high, low)
    }
}

/// Heights of the marks, m.
#[expect(clippy::struct_field_names, reason = "the suffix is the unit")]
struct Marks {
    anchor_m: Option<f64>,
    standing_m: Option<f64>,
    start_m: f64,
    taut_m: f64,
    lowest_m: f64,
    rest_m: f64,
    body_m: f64,
    allowance_m: f64,
}

impl Marks {
    fn of(report: &Report) -> Self {
        match &report.estimate.elevations {
            Some(levels) => Self::placed(levels, report.scenario.subject.kind),
            None => Self::relative(report),
        }
    }

    fn placed(levels: &Elevations, subject: SubjectKind) -> Self {
        Self {
            anchor_m: levels.anchor_m,
            standing_m: (subject == SubjectKind::Person).then_some(levels.standing_m),
            start_m: levels.attachment_start_m,
            taut_m: levels.attachment_taut_m,
            lowest_m: levels.attachment_lowest_m,
            rest_m: levels.attachment_rest_m,
            body_m: levels.body_below_attachment_m,
            allowance_m: levels.lowest_point_below_attachment_m - levels.body_below_attachment_m,
        }
    }

    fn relative(report: &Report) -> Self {
        let number = |id: &str| report.estimate.numbers.get(id).unwrap_or(0.0);
        Self {
            anchor_m: None,
            standing_m: None,
            start_m: number("free_fall_distance"),
            taut_m: 0.0,
            lowest_m: -number("arrest_distance"),
            rest_m: -number("hang_travel"),
            body_m: 0.0,
            allowance_m: 0.0,
        }
    }
}

fn origin(report: &Report) -> Origin {
    if report.estimate.elevations.is_some() { Origin::Datum(report.scenario.datum.clone()) } else { Origin::Taut }
}

/// When the subject is lowest; the end of the motion where it creeps to rest.
#[must_use]
pub fn lowest_time(report: &Report) -> f64 {
    report.estimate.numbers.get("time_lowest").unwrap_or_else(|| report.estimate.trace.end_s())
}

fn stations(report: &Report, marks: &Marks, lowest: Sample, now: Sample) -> [Station; 5] {
    let hanging = marks.body_m + marks.allowance_m;
    let final_deployed = report.estimate.numbers.get("deployed_length").unwrap_or(0.0);
    let station =
        |name, attachment_m, body_m, deployed_m, taut| Station { name, attachment_m, body_m, deployed_m, taut };
    let now_body = if now.mode == Mode::Falling { marks.body_m } else { hanging };
    let now_taut = matches!(now.mode, Mode::Taut | Mode::Deploying);
    [
        station("start", marks.start_m, marks.body_m, 0.0, false),
        station("taut", marks.taut_m, hanging, 0.0, true),
        station("lowest", marks.lowest_m, hanging, lowest.deployed_m, true),
        station("rest", marks.rest_m, hanging, final_deployed, true),
        station("now", marks.taut_m - now.travel_m, now_body, now.deployed_m, now_taut),
    ]
}

fn bars(report: &Report) -> Vec<Bar> {
    if report.estimate.elevations.is_none() {
        return Vec::new();
    }
    let verdict = |id: &str| {
        let id = format!("clearance.{id}");
        report.margins.iter().find(|margin| margin.id == id).map_or(Verdict::Open, |margin| margin.verdict)
    };
    let bar = |obstacle: &crate::scenario::Obstacle| Bar {
        name: obstacle.name.trim().to_owned(),
        top_m: obstacle.top.si(),
        reserve_m: obstacle.reserve.map_or(0.0, |reserve| reserve.si()),
        verdict: verdict(&obstacle.id()),
        extent_m: obstacle.extent.map(|(from, to)| (from.si(), to.si())),
    };
    report.scenario.obstacles.iter().map(bar).collect()
}

/// The obstacle with the least room, as the margins order them. None where it lies beside the fall line, or where the
/// smallest gap of a swing is not the one below its lowest point, which is where the string runs.
fn nearest(report: &Report, bars: &[Bar]) -> Option<usize> {
    least_room(report, bars).filter(|&index| is_below_lowest(report, index))
}

fn is_below_lowest(report: &Report, index: usize) -> bool {
    let Some(obstacle) = report.scenario.obstacles.get(index) else { return false };
    let (Some(_), Some(levels)) = (&report.estimate.plane, &report.estimate.elevations) else {
        return obstacle.is_below(&report.scenario.subject);
    };
    let clearance = report.estimate.numbers.get(&format!("clearance.{}", obstacle.id()));
    clearance.is_some_and(|gap| (levels.lowest_point_m() - obstacle.top.si() - gap).abs() < TOO_SHORT_M)
}

fn least_room(report: &Report, bars: &[Bar]) -> Option<usize> {
    let ids: Vec<String> = report.scenario.obstacles.iter().map(|o| format!("clearance.{}", o.id())).collect();
    let first = report.margins.iter().find_map(|margin| ids.iter().position(|id| *id == margin.id));
    first.filter(|&index| index < bars.len()).or_else(|| (!bars.is_empty()).then_some(0))
}

/// What lies between taut and the lowest point: stretch and deployed length, or all of a swing's drop in one.
fn below_taut(report: &Report, marks: &Marks, lowest: Sample) -> Vec<(&'static str, f64)> {
    let drop = marks.taut_m - marks.lowest_m;
    if report.estimate.plane.is_some() {
        return vec![("swing drop", drop)];
    }
    let other = if report.estimate.span.is_some() { "more sag" } else { "other parts" };
    let line = drop - lowest.other_elongation_m - lowest.deployed_m;
    vec![("line stretch", line), (other, lowest.other_elongation_m), ("deployed", lowest.deployed_m)]
}

fn parts(report: &Report, marks: &Marks, lowest: Sample, end: Option<&Bar>) -> Vec<Part> {
    let part = |name: &str, length_m: f64| Part { name: name.to_owned(), length_m, verdict: None };
    let body = match report.scenario.subject.kind {
        SubjectKind::Person => "to feet",
        SubjectKind::Load => "to underside",
    };
    let mut parts = vec![part("free fall", marks.start_m - marks.taut_m)];
    parts.extend(below_taut(report, marks, lowest).into_iter().map(|(name, length_m)| part(name, length_m)));
    parts.extend([part(body, marks.body_m), part("allowance", marks.allowance_m)]);
    parts.retain(|part| part.length_m.abs() > TOO_SHORT_M);
    if let Some(bar) = end {
        let foot = marks.lowest_m - marks.body_m - marks.allowance_m;
        parts.push(Part { name: "clearance".to_owned(), length_m: foot - bar.top_m, verdict: Some(bar.verdict) });
    }
    parts
}
