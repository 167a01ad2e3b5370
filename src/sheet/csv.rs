//! The motion over time as CSV, SI units.
use super::{CAUTION_LINE, Report};
use crate::estimate::{Sample, Trace};

/// Rows of a trace, apart from the borders of its phases.
const ROWS: f64 = 2000.0;

/// Column heads; the caution stands once, in the first row, and travels with the data.
const HEAD: [&str; 7] = ["time_s", "travel_m", "speed_m_per_s", "line_force_n", "mode", "deployed_m", "caution"];

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
    let mut writer = csv::Writer::from_writer(Vec::new());
    writer.write_record(HEAD)?;
    for (i, sample) in trace.samples(0.0, end, step).iter().enumerate() {
        writer.write_record(row(sample, if i == 0 { CAUTION_LINE } else { "" }))?;
    }
    let bytes = writer.into_inner().map_err(|e| csv::Error::from(e.into_error()))?;
    Ok(String::from_utf8_lossy(&bytes).into_owned())
}

fn row(sample: &Sample, caution: &str) -> [String; 7] {
    [
        sample.time_s.to_string(),
        sample.travel_m.to_string(),
        sample.speed_m_per_s.to_string(),
        sample.force_n.to_string(),
        sample.mode.word().to_owned(),
        sample.deployed_m.to_string(),
        caution.to_owned(),
    ]
}
