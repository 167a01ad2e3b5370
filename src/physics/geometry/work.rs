//! The working from positions to the taut line, step by step.
use super::{Geometry, GeometryError, Layout, Point, Positions, Step, TOUCH_M};

/// The working under way.
pub struct Work {
    positions: Positions,
    distance_m: f64,
    steps: Vec<Step>,
    notes: Vec<&'static str>,
}

impl Work {
    pub fn begin(positions: &Positions) -> Result<Self, GeometryError> {
        check(positions)?;
        let anchor = positions.anchor;
        let start = Point { offset_m: 0.0, elevation_m: positions.attachment_m };
        let mut work =
            Self { positions: *positions, distance_m: anchor.distance_m(start), steps: Vec::new(), notes: Vec::new() };
        work.step("elevation of the anchor, as stated", anchor.elevation_m);
        work.step("elevation of the attachment at the start", positions.attachment_m);
        work.step("anchor above the attachment", anchor.elevation_m - positions.attachment_m);
        if anchor.offset_m == 0.0 {
            work.step("distance from the anchor to the attachment, along the fall line", work.distance_m);
        } else {
            work.step("anchor beside the fall line, as stated", anchor.offset_m);
            work.step(
                "distance from the anchor to the attachment: third side of the right triangle over the anchor's height \
                 and its offset",
                work.distance_m,
            );
        }
        Ok(work)
    }

    /// Straight distance from the anchor to the attachment at the start, m.
    pub const fn distance_m(&self) -> f64 {
        self.distance_m
    }

    pub fn note(&mut self, sentence: &'static str) {
        self.notes.push(sentence);
    }

    pub fn step(&mut self, what: &'static str, value_m: f64) {
        self.steps.push(Step { what, value_m });
    }

    /// From the whole length to the pivot, the taut position and the free fall.
    pub fn finish(mut self, length_m: f64) -> Result<Geometry, GeometryError> {
        if self.distance_m > length_m + TOUCH_M {
            return Err(GeometryError::LineTooShort { length_m, distance_m: self.distance_m });
        }
        let (pivot, free_length_m) = self.pivot(length_m)?;
        let start = Point { offset_m: 0.0, elevation_m: self.positions.attachment_m };
        let begins_taut = start.elevation_m <= pivot.elevation_m && pivot.distance_m(start) >= free_length_m - TOUCH_M;
        let taut = if begins_taut { start.elevation_m } else { self.taut(pivot, free_length_m)? };
        let free_fall_m = (start.elevation_m - taut).max(0.0);
        let layout = Layout {
            attachment_start_m: start.elevation_m,
            anchor: self.positions.anchor,
            pivot,
            free_length_m,
            attachment_taut_m: taut,
        };
        self.check_edge(&layout)?;
        self.step("elevation of the attachment when the line comes taut", taut);
        let what = if begins_taut {
            "free fall: none, the line is taut at the start"
        } else {
            "free fall: from the start down to where the line comes taut"
        };
        self.step(what, free_fall_m);
        Ok(Geometry {
            free_fall_m,
            elastic_length_m: Some(length_m),
            layout: Some(layout),
            steps: self.steps,
            notes: self.notes,
        })
    }

    fn pivot(&mut self, length_m: f64) -> Result<(Point, f64), GeometryError> {
        let anchor = self.positions.anchor;
        let Some(edge) = self.positions.edge else { return Ok((anchor, length_m)) };
        let behind = anchor.distance_m(edge);
        if behind > length_m {
            return Err(GeometryError::EdgeOutOfReach { length_m, distance_m: behind });
        }
        self.step("elevation of the edge, as stated", edge.elevation_m);
        self.step("edge beside the fall line, as stated", edge.offset_m);
        self.step(
            "line behind the edge: third side of the right triangle over height and offset between anchor and edge",
            behind,
        );
        self.step("line past the edge: the whole line less the part behind the edge", length_m - behind);
        self.notes
            .push("The whole line stretches with one tension; friction at the edge and damage by it are left out.");
        Ok((edge, length_m - behind))
    }

    /// Elevation where the free length hangs taut from the pivot on the fall line.
    fn taut(&mut self, pivot: Point, free_length_m: f64) -> Result<f64, GeometryError> {
        let d = pivot.offset_m.abs();
        if free_length_m < d && self.positions.edge.is_some() {
            // Only past an edge: the straight way from the anchor is used up before the line bends over it.
            return Err(self.not_touched(pivot, free_length_m));
        }
        let depth = ((free_length_m - d) * (free_length_m + d)).max(0.0).sqrt();
        let what = match (self.positions.edge.is_some(), d > 0.0) {
            (false, false) => "depth below the anchor when taut: the length of the line",
            (false, true) => {
                "depth below the anchor when taut: second side of the right triangle with the line as its longest side and \
                 the offset as the other"
            }
            (true, false) => "depth below the edge when taut: the line past the edge",
            (true, true) => {
                "depth below the edge when taut: second side of the right triangle with the line past the edge as its \
                 longest side and the edge's offset as the other"
            }
        };
        self.step(what, depth);
        Ok(pivot.elevation_m - depth)
    }

    /// Where the straight line that comes taut first passes the edge.
    fn not_touched(&self, edge: Point, free_length_m: f64) -> GeometryError {
        let anchor = self.positions.anchor;
        let (length, aside) = (free_length_m + anchor.distance_m(edge), anchor.offset_m.abs());
        let taut = anchor.elevation_m - ((length - aside) * (length + aside)).max(0.0).sqrt();
        GeometryError::EdgeNotTouched { edge_m: edge.elevation_m, path_m: path_at(anchor, taut, edge.offset_m) }
    }

    /// The taut line must bend over the edge.
    fn check_edge(&self, layout: &Layout) -> Result<(), GeometryError> {
        let Some(edge) = self.positions.edge.filter(|_| layout.anchor.offset_m != 0.0) else { return Ok(()) };
        let path_m = path_at(layout.anchor, layout.attachment_taut_m, edge.offset_m);
        if path_m > edge.elevation_m + TOUCH_M {
            return Err(self.not_touched(edge, layout.free_length_m));
        }
        Ok(())
    }
}

/// Elevation of the straight way from an anchor beside the fall line to a point of that line, at an offset between.
fn path_at(anchor: Point, attachment_m: f64, offset_m: f64) -> f64 {
    attachment_m + (anchor.elevation_m - attachment_m) * (offset_m / anchor.offset_m)
}

fn check(positions: &Positions) -> Result<(), GeometryError> {
    let finite = |what, value_m: f64| {
        if value_m.is_finite() { Ok(()) } else { Err(GeometryError::Input { what, value_m }) }
    };
    finite("the elevation of the attachment", positions.attachment_m)?;
    finite("the elevation of the anchor", positions.anchor.elevation_m)?;
    finite("the offset of the anchor", positions.anchor.offset_m)?;
    let Some(edge) = positions.edge else { return Ok(()) };
    finite("the elevation of the edge", edge.elevation_m)?;
    finite("the offset of the edge", edge.offset_m)?;
    let anchor_m = positions.anchor.offset_m;
    let between = edge.offset_m * anchor_m >= 0.0 && edge.offset_m.abs() <= anchor_m.abs();
    if !between {
        return Err(GeometryError::EdgeNotBetween { edge_m: edge.offset_m, anchor_m });
    }
    let path_m = if anchor_m == 0.0 {
        positions.anchor.elevation_m
    } else {
        path_at(positions.anchor, positions.attachment_m, edge.offset_m)
    };
    if edge.elevation_m > path_m + TOUCH_M {
        return Err(GeometryError::EdgeAbovePath { edge_m: edge.elevation_m, path_m });
    }
    Ok(())
}
