//! Everything in series between the fixed point and the subject.
use super::{Elastic, Table};

/// An elastic part with its damper in parallel: `T = f(e) + c e'`.
#[derive(Clone, Debug, PartialEq)]
pub struct Group {
    /// Elastic law.
    pub elastic: Elastic,
    /// Viscous damping, N s/m, `>= 0`; without meaning when rigid.
    pub damping_n_s_per_m: f64,
}

/// Rigid-plastic slider in series: `s' >= 0`, `T <= F(s)` while `s < S`.
#[derive(Clone, Debug, PartialEq)]
pub struct Absorber {
    /// Deployment force over deployed length, N over m: a constant is a table of two equal rows. Never falls.
    pub force: Table,
    /// Force at which it first moves, N, `>= F(0)`.
    pub onset_n: f64,
    /// Stroke S, m, `> 0`.
    pub stroke_m: f64,
}

/// The massless series path: group 1 is the line, group 2 all other compliance.
#[derive(Clone, Debug, PartialEq)]
pub struct SeriesPath {
    /// Group 1.
    pub line: Group,
    /// Group 2.
    pub other: Group,
    /// The absorber, if any.
    pub absorber: Option<Absorber>,
}
