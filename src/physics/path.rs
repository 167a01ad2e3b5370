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

impl Group {
    /// A group that does not stretch.
    #[must_use]
    pub const fn rigid() -> Self {
        Self { elastic: Elastic::Rigid, damping_n_s_per_m: 0.0 }
    }

    /// A linear spring, N/m.
    #[must_use]
    pub const fn spring(stiffness_n_per_m: f64) -> Self {
        Self::damped(stiffness_n_per_m, 0.0)
    }

    /// A linear spring, N/m, with a damper in parallel, N s/m.
    #[must_use]
    pub const fn damped(stiffness_n_per_m: f64, damping_n_s_per_m: f64) -> Self {
        Self { elastic: Elastic::Linear { stiffness_n_per_m }, damping_n_s_per_m }
    }

    /// Whether it never stretches.
    #[must_use]
    pub const fn is_rigid(&self) -> bool {
        self.elastic.is_rigid()
    }

    /// Whether a damper works in it.
    #[must_use]
    pub fn is_damped(&self) -> bool {
        !self.is_rigid() && self.damping_n_s_per_m > 0.0
    }

    /// Several linear groups in series as one: `1/k = sum 1/k_i`, `c = k^2 sum(c_i / k_i^2)`.
    ///
    /// Exact without dampers; first order in the damping otherwise.
    #[must_use]
    pub fn in_series(parts: &[(f64, f64)]) -> Self {
        if parts.is_empty() {
            return Self::rigid();
        }
        let stiffness = 1.0 / parts.iter().map(|(k, _)| 1.0 / k).sum::<f64>();
        let damping = stiffness * stiffness * parts.iter().map(|(k, c)| c / (k * k)).sum::<f64>();
        match parts {
            [(k, c)] => Self::damped(*k, *c),
            _ => Self::damped(stiffness, damping),
        }
    }
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

impl Absorber {
    /// An absorber that deploys at one force.
    #[must_use]
    pub fn constant(force_n: f64, onset_n: f64, stroke_m: f64) -> Self {
        Self { force: Table::constant(force_n, stroke_m), onset_n, stroke_m }
    }
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

impl SeriesPath {
    /// Whether no elastic part has a knot.
    #[must_use]
    pub const fn is_linear(&self) -> bool {
        !matches!(self.line.elastic, Elastic::Table(_)) && !matches!(self.other.elastic, Elastic::Table(_))
    }
}
