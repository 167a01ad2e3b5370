//! The motion over time as CSV, SI units.
use super::{CAUTION_LINE, Report};
use crate::estimate::{PlanePoint, Sample, Trace};

/// Rows of a trace, apart from the borders of its phases.
const ROWS: f64 = 2000.0;

/// Column heads of every run.
const HEAD: [&str; 6] = ["time_s", "travel_m", "speed_m_per_s", "line_force_n", "mode", "deployed_m"];
/// Further column heads of a swing.
const PLANE_HEAD: [&str; 4] = ["offset_m", "elevation_m", "swing_angle_deg", "path_speed_m_per_s"];
/// The last column: the caution stands once, in the first row, and travels with the data.
const LAST: &str = "caution";

/// The trace of a report.
///
/// # Errors
/// When the writer refuses a record, which a buffer in memory does not.
pub fn csv(report: &Report) -> Result<String, csv::Error> {
    trace_csv(&report.estimate.trace)
}

fn trace_csv(trace: &Trace) -> Result<String, csv::Error> {
    let end = trace.end_s();
    let step = (end / ROWS).max(f64::MIN_POSITIVE);
    let samples = trace.samples(0.0, end, step);
    let planar = samples.first().is_some_and(|sample| sample.plane.is_some());
    let mut writer = csv::Writer::from_writer(Vec::new());
    let further: &[&str] = if planar { &PLANE_HEAD } else { &[] };
    writer.write_record(HEAD.iter().chain(further).chain([&LAST]))?;
    for (i, sample) in samples.iter().enumerate() {
        let caution = if i == 0 { CAUTION_LINE } else { "" };
        let further = if planar { plane_cells(sample.plane.as_ref()).to_vec() } else { Vec::new() };
        writer.write_record(cells(sample).into_iter().chain(further).chain([caution.to_owned()]))?;
    }
    let bytes = writer.into_inner().map_err(|e| csv::Error::from(e.into_error()))?;
    Ok(String::from_utf8_lossy(&bytes).into_owned())
}

fn cells(sample: &Sample) -> [String; 6] {
    [
        sample.time_s.to_string(),
        sample.travel_m.to_string(),
        sample.speed_m_per_s.to_string(),
        sample.force_n.to_string(),
        sample.mode.word().to_owned(),
        sample.deployed_m.to_string(),
    ]
}

fn plane_cells(plane: Option<&PlanePoint>) -> [String; 4] {
    plane.map_or_else(Default::default, |p| {
        [p.offset_m, p.elevation_m, p.angle_rad.to_degrees(), p.speed_m_per_s].map(|value| value.to_string())
    })
}
