//! What drawings and sheets need of a run beside its numbers.

/// One step of the working of the geometry.
#[derive(Clone, Debug, PartialEq)]
pub struct WorkStep {
    /// What it is and where it comes from.
    pub what: String,
    /// Its value, m.
    pub value_m: f64,
}

/// A place beside or on the fall line.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PlacePoint {
    /// Horizontal offset from the fall line, m, right positive.
    pub offset_m: f64,
    /// Elevation above the file's datum, m.
    pub elevation_m: f64,
}

/// A planar run.
#[derive(Clone, Debug, PartialEq)]
pub struct PlaneView {
    /// The anchor.
    pub anchor: PlacePoint,
    /// What the free part of the line turns about: the anchor or the edge.
    pub pivot: PlacePoint,
    /// The edge, if any.
    pub edge: Option<PlacePoint>,
    /// Attachment at the start, at taut, and at its lowest.
    pub start: PlacePoint,
    /// Attachment when the line comes taut.
    pub taut: PlacePoint,
    /// Attachment at the lowest point.
    pub lowest: PlacePoint,
    /// Every strike, first one first.
    pub strikes: Vec<StrikeView>,
}

/// A strike of a face or level.
#[derive(Clone, Debug, PartialEq)]
pub struct StrikeView {
    /// Name of the face or obstacle.
    pub name: String,
    /// A vertical face, or else a level.
    pub is_face: bool,
    /// When, s from the start of the fall.
    pub time_s: f64,
    /// Where the attachment is then.
    pub at: PlacePoint,
    /// Speed, m/s.
    pub speed_m_per_s: f64,
    /// Height of a straight fall with that speed, m.
    pub drop_equivalent_m: f64,
}

/// Force on one end support of a lifeline.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct EndLoadView {
    /// Force, N.
    pub force_n: f64,
    /// Its direction: towards the span, this far below the horizontal, degrees.
    pub below_horizontal_deg: f64,
}

/// A horizontal lifeline under the largest load.
#[derive(Clone, Debug, PartialEq)]
pub struct SpanView {
    /// Horizontal length, m.
    pub length_m: f64,
    /// Place of the load from the left support, m.
    pub at_m: f64,
    /// Right support above the left one, m.
    pub level_difference_m: f64,
    /// Deflection at the load before it takes any, m from the chord.
    pub slack_m: f64,
    /// Deflection under the largest load, m from the chord.
    pub peak_deflection_m: f64,
    /// Deflection at rest, m from the chord.
    pub rest_deflection_m: f64,
    /// Largest cable tension, N.
    pub peak_tension_n: f64,
    /// Cable tension over load.
    pub amplification: f64,
    /// Force on the left and right end support.
    pub end_loads: [EndLoadView; 2],
    /// Length deployed by the in-line absorber, m, where there is one.
    pub deployed_m: Option<f64>,
}
