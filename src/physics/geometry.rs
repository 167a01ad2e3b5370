//! Where a fall starts and where the line comes taut: from lengths and elevations to the free fall.
//!
//! Offsets are signed from the fall line (0), elevations count up from the file's datum. The attachment starts on the
//! fall line and falls along it. Lengths in m. Two lengths within [`TOUCH_M`] of each other are equal.

mod work;

use work::Work;

/// Lengths closer than this are equal, m: far below anything measured, far above rounding.
pub const TOUCH_M: f64 = 1e-9;

/// A point of the vertical plane, m.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Point {
    /// Offset from the fall line.
    pub offset_m: f64,
    /// Elevation.
    pub elevation_m: f64,
}

impl Point {
    /// Straight distance to another point, m.
    #[must_use]
    pub fn distance_m(self, other: Self) -> f64 {
        (self.offset_m - other.offset_m).hypot(self.elevation_m - other.elevation_m)
    }
}

/// Where everything is before the fall.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Positions {
    /// Elevation of the attachment z0, on the fall line, m.
    pub attachment_m: f64,
    /// The anchor.
    pub anchor: Point,
    /// An edge the line runs over, if any.
    pub edge: Option<Point>,
}

/// One step of the working: a length or elevation in words.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Step {
    /// What it is and where it comes from.
    pub what: &'static str,
    /// Its value, m.
    pub value_m: f64,
}

/// Along the fall line, or with a swing.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Course {
    /// The pivot is on the fall line (or no position is stated): the vertical core.
    Vertical,
    /// The pivot is beside it: the planar solver.
    Planar,
}

/// Where positions are known.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Layout {
    /// Attachment at the start, elevation on the fall line, m.
    pub attachment_start_m: f64,
    /// The anchor.
    pub anchor: Point,
    /// What the free part of the line turns about: the anchor, or the edge.
    pub pivot: Point,
    /// Unstretched line from the pivot to the attachment when it comes taut, m.
    pub free_length_m: f64,
    /// Attachment when the line comes taut, elevation on the fall line, m.
    pub attachment_taut_m: f64,
}

impl Layout {
    /// Depth of the attachment below the anchor when the line comes taut, m.
    #[must_use]
    pub fn taut_below_anchor_m(&self) -> f64 {
        self.anchor.elevation_m - self.attachment_taut_m
    }

    /// Height of the anchor above the attachment at the start, m; negative when below it.
    #[must_use]
    pub fn anchor_above_attachment_m(&self) -> f64 {
        self.anchor.elevation_m - self.attachment_start_m
    }
}

/// What a fall starts from.
#[derive(Clone, Debug, PartialEq)]
pub struct Geometry {
    /// Free-fall distance h, m, `>= 0`.
    pub free_fall_m: f64,
    /// Length that stretches, m: the whole line, or the line out at lock; none where the file states no length.
    pub elastic_length_m: Option<f64>,
    /// Positions, none where the free fall was stated.
    pub layout: Option<Layout>,
    /// The working, in order; the last step is the free fall.
    pub steps: Vec<Step>,
    /// What was taken for granted, in sentences.
    pub notes: Vec<&'static str>,
}

impl Geometry {
    /// Vertical core or planar solver.
    #[must_use]
    pub fn course(&self) -> Course {
        match &self.layout {
            Some(layout) if layout.pivot.offset_m != 0.0 => Course::Planar,
            _ => Course::Vertical,
        }
    }
}

/// Two lengths or positions that contradict each other, m.
#[derive(Clone, Copy, Debug, PartialEq, thiserror::Error)]
pub enum GeometryError {
    /// An input is out of range.
    #[error("{what} is `{value_m:.3}` m")]
    Input {
        /// Which input.
        what: &'static str,
        /// Its value, m.
        value_m: f64,
    },
    /// The line does not reach from the anchor to the attachment.
    #[error(
        "the line of `{length_m:.3}` m is shorter than the distance of `{distance_m:.3}` m from the anchor to the attachment"
    )]
    LineTooShort {
        /// Line, m.
        length_m: f64,
        /// Distance, m.
        distance_m: f64,
    },
    /// The line does not reach from the anchor to the edge.
    #[error(
        "the line of `{length_m:.3}` m is shorter than the distance of `{distance_m:.3}` m from the anchor to the edge"
    )]
    EdgeOutOfReach {
        /// Line, m.
        length_m: f64,
        /// Distance, m.
        distance_m: f64,
    },
    /// The edge is not between the anchor and the fall line.
    #[error(
        "the edge at offset `{edge_m:.3}` m is not between the anchor at offset `{anchor_m:.3}` m and the fall line at 0"
    )]
    EdgeNotBetween {
        /// Offset of the edge, m.
        edge_m: f64,
        /// Offset of the anchor, m.
        anchor_m: f64,
    },
    /// The edge is above the straight line from the anchor to the attachment at the start.
    #[error(
        "the edge at elevation `{edge_m:.3}` m is above the straight way from the anchor to the attachment, there at `{path_m:.3}` m"
    )]
    EdgeAbovePath {
        /// Elevation of the edge, m.
        edge_m: f64,
        /// Elevation of the straight way at the edge's offset, m.
        path_m: f64,
    },
    /// The line comes taut above the edge without touching it.
    #[error(
        "the edge at elevation `{edge_m:.3}` m is not touched: the taut line passes above it, there at `{path_m:.3}` m"
    )]
    EdgeNotTouched {
        /// Elevation of the edge, m.
        edge_m: f64,
        /// Elevation of the taut line at the edge's offset, m.
        path_m: f64,
    },
}

impl GeometryError {
    /// What to do next.
    #[must_use]
    pub const fn hint(&self) -> &'static str {
        match self {
            Self::Input { .. } => "state a length that is a number and not negative",
            Self::LineTooShort { .. } => {
                "lengthen the line, or check the anchor, the standing surface and the attachment height"
            }
            Self::EdgeOutOfReach { .. } => "lengthen the line, or check the anchor and the edge",
            Self::EdgeNotBetween { .. } => "give both offsets with the same sign, the edge nearer to the fall line",
            Self::EdgeAbovePath { .. } => "check the elevations of edge and anchor",
            Self::EdgeNotTouched { .. } => "leave the edge out, or check its elevation and the line's length",
        }
    }
}

/// A free fall that the file states, with the length of the line where it has one.
///
/// # Errors
/// When a value is negative or not finite.
pub fn stated(free_fall_m: f64, elastic_length_m: Option<f64>) -> Result<Geometry, GeometryError> {
    length("the free fall", free_fall_m)?;
    length("the line", elastic_length_m.unwrap_or(0.0))?;
    let steps = vec![Step { what: "free fall, as stated", value_m: free_fall_m }];
    Ok(Geometry { free_fall_m, elastic_length_m, layout: None, steps, notes: Vec::new() })
}

/// A vertical lifeline with a rope grab: `h = free_fall + grab_slide`; the line stretches from the anchor to the grab.
///
/// # Errors
/// When a length is negative or not finite.
pub fn vertical_lifeline(to_grab_m: f64, free_fall_m: f64, grab_slide_m: f64) -> Result<Geometry, GeometryError> {
    length("the line from the anchor to the grab", to_grab_m)?;
    length("the free fall", free_fall_m)?;
    length("the slide of the grab", grab_slide_m)?;
    let total = free_fall_m + grab_slide_m;
    let steps = vec![
        Step { what: "line from the anchor to the grab, which stretches, as stated", value_m: to_grab_m },
        Step { what: "free fall until the grab takes the load, as stated", value_m: free_fall_m },
        Step { what: "slide of the grab before it holds, as stated", value_m: grab_slide_m },
        Step { what: "free fall: until the grab takes the load, and its slide", value_m: total },
    ];
    let notes = vec!["The grab brakes nothing while it slides."];
    Ok(Geometry { free_fall_m: total, elastic_length_m: Some(to_grab_m), layout: None, steps, notes })
}

/// A line of a stated length L from the anchor to the attachment, packed absorber included.
///
/// Taut where the way from the anchor (over the edge, if any) to the attachment is L long: with the free length
/// `f = L - distance(anchor, edge)` and the pivot at offset d and elevation z, `z_taut = z - sqrt(f^2 - d^2)`, and
/// `h = z0 - z_taut`. A line already taut below its anchor gives `h = 0`.
///
/// # Errors
/// When the line is too short or the edge is not in its way.
pub fn hanging(positions: &Positions, length_m: f64) -> Result<Geometry, GeometryError> {
    length("the line", length_m)?;
    let mut work = Work::begin(positions)?;
    work.step("line from the anchor to the attachment, as stated", length_m);
    work.finish(length_m)
}

/// A retractable line: it follows the subject and locks when `slack + lock_travel` more of it is out.
///
/// Line out at the start is the distance from the anchor to the attachment plus the slack; the line out at lock sets
/// the length that stretches. On the fall line below the anchor that makes `h = slack + lock_travel`; beside it, h is the
/// vertical travel after which the distance has grown by as much, which is longer.
///
/// # Errors
/// When a length is negative or not finite, or the edge is not in the line's way.
pub fn retractable(positions: &Positions, slack_m: f64, lock_travel_m: f64) -> Result<Geometry, GeometryError> {
    length("the slack", slack_m)?;
    length("the lock travel", lock_travel_m)?;
    let mut work = Work::begin(positions)?;
    let out = work.distance_m() + slack_m;
    let at_lock = out + lock_travel_m;
    work.step("slack at the start, as stated", slack_m);
    work.step("line out at the start: the distance and the slack", out);
    work.step("travel of the line until it locks, as stated", lock_travel_m);
    work.step("line out at lock, which stretches: line out at the start and the travel until it locks", at_lock);
    if positions.attachment_m > positions.anchor.elevation_m + TOUCH_M {
        work.note("The attachment starts above the retractable line's anchor; that the line draws in while it falls past is left out.");
    }
    work.finish(at_lock)
}

/// A second line that takes over with some slack: on the fall line below its anchor the drop is the slack; none is a
/// step transfer, `h = 0`.
///
/// # Errors
/// When the slack is negative or not finite, or the edge is not in the line's way.
pub fn secondary(positions: &Positions, slack_m: f64) -> Result<Geometry, GeometryError> {
    length("the slack", slack_m)?;
    let mut work = Work::begin(positions)?;
    let whole = work.distance_m() + slack_m;
    work.step("slack of the second line, as stated", slack_m);
    work.step("second line, which stretches: the distance and the slack", whole);
    work.finish(whole)
}

fn length(what: &'static str, value_m: f64) -> Result<(), GeometryError> {
    if value_m >= 0.0 && value_m.is_finite() { Ok(()) } else { Err(GeometryError::Input { what, value_m }) }
}
