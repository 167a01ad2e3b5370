//! Elastic laws: rigid, linear, or piecewise linear.

/// Why a table is not a law; rows count from 1.
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

/// One straight piece of a law: `y = y0 + slope (x - x0)` for `x0 <= x <= x1`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Piece {
    /// Left end.
    pub x0: f64,
    /// Right end, infinite on the last piece.
    pub x1: f64,
    /// Value at the left end.
    pub y0: f64,
    /// Slope.
    pub slope: f64,
}

impl Piece {
    /// Value on the piece's straight line.
    #[must_use]
    pub fn value(&self, x: f64) -> f64 {
        self.y0 + self.slope * (x - self.x0)
    }

    /// Abscissa of a value on the piece's straight line; `slope > 0`.
    #[must_use]
    pub fn inverse(&self, y: f64) -> f64 {
        self.x0 + (y - self.y0) / self.slope
    }
}

/// A piecewise-linear function given by its knots; beyond the last knot the last slope goes on.
#[derive(Clone, Debug, PartialEq)]
pub struct Table {
    knots: Vec<(f64, f64)>,
    /// Integral from 0 to each knot.
    areas: Vec<f64>,
}

impl Table {
    /// A force over elongation: starts at (0, 0), both columns strictly rising.
    ///
    /// # Errors
    /// Names the first row that breaks the rule.
    pub fn elastic(knots: Vec<(f64, f64)>) -> Result<Self, TableError> {
        let table = Self::new(knots)?;
        let (x, y) = table.knots[0];
        if y != 0.0 {
            return Err(TableError::Start { x, y });
        }
        match table.knots.windows(2).position(|w| w[1].1 <= w[0].1) {
            Some(at) => Err(TableError::NotRising { row: at + 2 }),
            None => Ok(table),
        }
    }

    /// A force over deployed length: starts at 0, length strictly rising, force never falling.
    ///
    /// # Errors
    /// Names the first row that breaks the rule.
    pub fn new(knots: Vec<(f64, f64)>) -> Result<Self, TableError> {
        if knots.len() < 2 {
            return Err(TableError::TooShort { rows: knots.len() });
        }
        if let Some(at) = knots.iter().position(|&(x, y)| !(x.is_finite() && y.is_finite())) {
            return Err(TableError::NotFinite { row: at + 1 });
        }
        if knots[0].0 != 0.0 {
            return Err(TableError::Start { x: knots[0].0, y: knots[0].1 });
        }
        match knots.windows(2).position(|w| w[1].0 <= w[0].0 || w[1].1 < w[0].1) {
            Some(at) => Err(TableError::NotRising { row: at + 2 }),
            None => Ok(Self::of(knots)),
        }
    }

    /// The same force at every length up to `length`.
    #[must_use]
    pub fn constant(force: f64, length: f64) -> Self {
        Self::of(vec![(0.0, force), (length, force)])
    }

    fn of(knots: Vec<(f64, f64)>) -> Self {
        let areas = std::iter::once(0.0)
            .chain(knots.windows(2).scan(0.0, |sum, w| {
                *sum += 0.5 * (w[0].1 + w[1].1) * (w[1].0 - w[0].0);
                Some(*sum)
            }))
            .collect();
        Self { knots, areas }
    }

    /// The knots.
    #[must_use]
    pub fn knots(&self) -> &[(f64, f64)] {
        &self.knots
    }

    /// Number of straight pieces, at least 1.
    #[must_use]
    pub fn pieces(&self) -> usize {
        self.knots.len() - 1
    }

    /// Piece by number; the first also serves below 0, the last beyond the last knot.
    #[must_use]
    pub fn piece(&self, index: usize) -> Piece {
        let (x0, y0) = self.knots[index];
        let (xk, yk) = self.knots[index + 1];
        let x1 = if index + 1 == self.pieces() { f64::INFINITY } else { xk };
        Piece { x0, x1, y0, slope: (yk - y0) / (xk - x0) }
    }

    /// Number of the piece that holds `x`; at a knot the upper one.
    #[must_use]
    pub fn piece_at(&self, x: f64) -> usize {
        self.knots[1..self.pieces()].partition_point(|knot| knot.0 <= x)
    }

    /// Value at `x`.
    #[must_use]
    pub fn value(&self, x: f64) -> f64 {
        self.piece(self.piece_at(x)).value(x)
    }

    /// Smallest `x` with value `y`; the law must rise.
    #[must_use]
    pub fn inverse(&self, y: f64) -> f64 {
        let index = self.knots[1..self.pieces()].partition_point(|knot| knot.1 <= y);
        self.piece(index).inverse(y)
    }

    /// Integral from 0 to `x`.
    #[must_use]
    pub fn integral(&self, x: f64) -> f64 {
        self.integral_on(self.piece_at(x), x)
    }

    /// Integral from 0 to `x`, where the piece that holds `x` is known; past its ends its straight line goes on.
    #[must_use]
    pub fn integral_on(&self, index: usize, x: f64) -> f64 {
        let piece = self.piece(index);
        self.areas[index] + 0.5 * (piece.y0 + piece.value(x)) * (x - piece.x0)
    }
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

impl Elastic {
    /// Whether it never stretches.
    #[must_use]
    pub const fn is_rigid(&self) -> bool {
        matches!(self, Self::Rigid)
    }

    /// Elongation in m under a force in N.
    #[must_use]
    pub fn elongation_m(&self, force_n: f64) -> f64 {
        match self {
            Self::Rigid => 0.0,
            Self::Linear { stiffness_n_per_m } => force_n / stiffness_n_per_m,
            Self::Table(table) => table.inverse(force_n),
        }
    }

    /// Elastic energy in J at an elongation in m.
    #[must_use]
    pub fn energy_j(&self, elongation_m: f64) -> f64 {
        match self {
            Self::Rigid => 0.0,
            Self::Linear { stiffness_n_per_m } => 0.5 * stiffness_n_per_m * elongation_m * elongation_m,
            Self::Table(table) => table.integral(elongation_m),
        }
    }

    /// Elastic energy in J at an elongation in m on a straight piece of known number.
    #[must_use]
    pub fn energy_on_j(&self, index: usize, elongation_m: f64) -> f64 {
        match self {
            Self::Table(table) => table.integral_on(index, elongation_m),
            _ => self.energy_j(elongation_m),
        }
    }

    /// Number of the straight piece that holds an elongation in m.
    #[must_use]
    pub fn piece_at(&self, elongation_m: f64) -> usize {
        match self {
            Self::Table(table) => table.piece_at(elongation_m),
            _ => 0,
        }
    }

    /// A straight piece by number; none for a rigid part.
    #[must_use]
    pub fn piece(&self, index: usize) -> Option<Piece> {
        match self {
            Self::Rigid => None,
            Self::Linear { stiffness_n_per_m } => {
                Some(Piece { x0: 0.0, x1: f64::INFINITY, y0: 0.0, slope: *stiffness_n_per_m })
            }
            Self::Table(table) => Some(table.piece(index)),
        }
    }
}
