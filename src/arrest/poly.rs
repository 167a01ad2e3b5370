//! Polynomials of fixed degree on the unit interval, and where they change sign.
use super::roots::monotone_zero;

/// Degree of every polynomial.
pub const ORDER: usize = 20;
/// Number of coefficients.
pub const LEN: usize = ORDER + 1;
/// Coefficients of the powers of the argument, lowest first.
pub type Poly = [f64; LEN];

/// Halvings after which two zeros count as one touch.
const HALVINGS: u32 = 50;

/// Value at `t`.
pub fn value(p: &Poly, t: f64) -> f64 {
    p.iter().rev().fold(0.0, |sum, c| sum * t + c)
}

/// Value and slope at `t`.
pub fn value_slope(p: &Poly, t: f64) -> (f64, f64) {
    p.iter().rev().fold((0.0, 0.0), |(sum, slope), c| (sum * t + c, slope * t + sum))
}

/// The derivative.
pub fn derivative(p: &Poly) -> Poly {
    let mut d = [0.0; LEN];
    let mut factor = 1.0;
    for (to, from) in d.iter_mut().zip(&p[1..]) {
        *to = factor * from;
        factor += 1.0;
    }
    d
}

/// `a p + b`.
pub fn scaled(p: &Poly, a: f64, b: f64) -> Poly {
    let mut q = p.map(|c| a * c);
    q[0] += b;
    q
}

/// `p(h t)`.
pub fn stretched(p: &Poly, h: f64) -> Poly {
    let mut power = 1.0;
    p.map(|c| {
        let scaled = c * power;
        power *= h;
        scaled
    })
}

/// `p(t) / t^zeros`, for a polynomial known to be zero so many times at 0.
pub fn deflated(p: &Poly, zeros: usize) -> Poly {
    let mut q = [0.0; LEN];
    q[..LEN - zeros].copy_from_slice(&p[zeros..]);
    q
}

/// A bound on the values in `0..=1`.
pub fn upper_bound(p: &Poly) -> f64 {
    p[0] + p[1..].iter().map(|c| c.max(0.0)).sum::<f64>()
}

/// A change of sign: where in `0..=1`, and whether from below to above.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Crossing {
    /// Where.
    pub at: f64,
    /// From negative to positive.
    pub rising: bool,
}

/// Changes of sign in order; `before` is the sign (-1, 0 for none, 1) that held before 0. The visitor ends the search by
/// returning `true`.
///
/// The polynomial is written in the Bernstein basis: without a change of sign among its coefficients it has no zero,
/// with one it has exactly one, and with more it is halved. No zero of odd order is skipped, whatever its neighbours.
///
/// # Reference
/// Farouki, Computer Aided Geometric Design 29 (2012), 379-419, section 5 (variation diminishing, subdivision).
pub fn crossings(p: &Poly, before: i8, mut visit: impl FnMut(Crossing) -> bool) {
    let spread: f64 = p[1..].iter().map(|c| c.abs()).sum();
    if p[0].abs() > spread {
        let now = sign(p[0]);
        if before != 0 && before != now {
            visit(Crossing { at: 0.0, rising: now > 0 });
        }
        return;
    }
    let mut search = Search { p, last: before, visit: &mut visit };
    search.within(&bernstein(p), 0.0, 1.0, HALVINGS);
}

/// First change from positive to negative, the value having been positive before 0.
pub fn first_fall(p: &Poly) -> Option<f64> {
    let mut found = None;
    crossings(p, 1, |crossing| {
        if !crossing.rising {
            found = Some(crossing.at);
        }
        found.is_some()
    });
    found
}

fn sign(x: f64) -> i8 {
    if x > 0.0 {
        1
    } else if x < 0.0 {
        -1
    } else {
        0
    }
}

struct Search<'a, F> {
    p: &'a Poly,
    last: i8,
    visit: &'a mut F,
}

impl<F: FnMut(Crossing) -> bool> Search<'_, F> {
    fn meet(&mut self, now: i8, at: f64) -> bool {
        let crosses = self.last != 0 && now != self.last;
        self.last = now;
        crosses && (self.visit)(Crossing { at, rising: now > 0 })
    }

    fn within(&mut self, b: &Poly, lo: f64, hi: f64, halvings: u32) -> bool {
        let (changes, first, end) = changes(b);
        if first == 0 {
            return false;
        }
        if self.meet(first, lo) {
            return true;
        }
        if changes == 0 {
            return false;
        }
        if changes == 1 || halvings == 0 {
            let at = if changes == 1 { self.zero(b, lo, hi, first) } else { hi };
            return self.meet(end, at);
        }
        let (left, right) = halves(b);
        let middle = 0.5 * (lo + hi);
        self.within(&left, lo, middle, halvings - 1) || self.within(&right, middle, hi, halvings - 1)
    }
}

impl<F> Search<'_, F> {
    /// The only change of sign in an interval, from the sign `first`. An end that happens to be zero is not the change.
    fn zero(&self, b: &Poly, lo: f64, hi: f64, first: i8) -> f64 {
        let hair = f64::from(first) * f64::MIN_POSITIVE;
        let start = if b[0] == 0.0 { hair } else { b[0] };
        let end = if b[ORDER] == 0.0 { -hair } else { b[ORDER] };
        monotone_zero(|t| value_slope(self.p, t), lo, start, hi, end)
    }
}

/// Number of changes of sign, first and last sign.
fn changes(b: &Poly) -> (u32, i8, i8) {
    let (mut count, mut first, mut last) = (0, 0, 0);
    for now in b.iter().map(|c| sign(*c)).filter(|s| *s != 0) {
        if first == 0 {
            first = now;
        } else if now != last {
            count += 1;
        }
        last = now;
    }
    (count, first, last)
}

/// Binomial coefficients of the degree.
const BINOMIALS: Poly = {
    let mut row = [0.0; LEN];
    row[0] = 1.0;
    let mut n = 0;
    while n < ORDER {
        let mut i = n + 1;
        while i > 0 {
            row[i] += row[i - 1];
            i -= 1;
        }
        n += 1;
    }
    row
};

/// Coefficients in the Bernstein basis of `0..=1`.
fn bernstein(p: &Poly) -> Poly {
    let mut b = *p;
    for (c, binomial) in b.iter_mut().zip(&BINOMIALS) {
        *c /= binomial;
    }
    for k in 1..LEN {
        for j in (k..LEN).rev() {
            b[j] += b[j - 1];
        }
    }
    b
}

/// The same polynomial in the Bernstein bases of both halves (de Casteljau).
fn halves(b: &Poly) -> (Poly, Poly) {
    let (mut left, mut right) = (*b, *b);
    for (k, c) in left.iter_mut().enumerate() {
        *c = right[0];
        for j in 0..ORDER - k {
            right[j] = 0.5 * (right[j] + right[j + 1]);
        }
    }
    (left, right)
}
