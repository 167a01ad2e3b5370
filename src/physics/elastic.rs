//! Elastic laws: rigid, linear, or piecewise linear.

/// Why a table is not an elastic law; rows count from 1.
#[derive(Clone, Copy, Debug, PartialEq, thiserror::Error)]
pub enum TableError {
    /// Fewer than two rows.
    #[error("a table needs at least two rows, found {rows}")]
    TooShort {
        /// Rows found.
        rows: usize,
    },
    /// The first row is not at zero.
    #[error("row 1 must start at zero, found {x}, {y}")]
    Start {
        /// First abscissa.
        x: f64,
        /// First ordinate.
        y: f64,
    },
    /// Not rising.
    #[error("row {row} does not rise above row {}", row - 1)]
    NotRising {
        /// The offending row.
        row: usize,
    },
    /// Not a finite number.
    #[error("row {row} holds a number that is not finite")]
    NotFinite {
        /// The offending row.
        row: usize,
    },
}

/// A piecewise-linear function given by its knots; beyond the last knot the last slope goes on.
#[derive(Clone, Debug, PartialEq)]
pub struct Table {
    pub(super) knots: Vec<(f64, f64)>,
}

/// Force over elongation of one elastic part, `f(0) = 0`, rising.
#[derive(Clone, Debug, PartialEq)]
pub enum Elastic {
    /// Does not stretch.
    Rigid,
    /// `f = k e`, N/m, `k > 0`.
    Linear {
        /// Stiffness, N/m.
        stiffness_n_per_m: f64,
    },
    /// Piecewise linear, elongation in m over force in N.
    Table(Table),
}
