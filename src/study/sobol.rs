//! Points that fill a unit cube evenly: a Sobol' sequence, scrambled by a seed.
use super::joe_kuo::DIRECTIONS;

/// Most dimensions of one sequence.
pub const MOST_DIMENSIONS: usize = DIRECTIONS.len() + 1;
/// Most points of one sequence: 2^32.
pub const MOST_POINTS: usize = 1 << BITS;
const BITS: usize = 32;

/// A Sobol' sequence in Gray code order. Any point can be had directly by its index, so it does not matter which thread
/// asks for it, nor when.
///
/// # Reference
/// Joe and Kuo (2008), SIAM J. Sci. Comput. 30(5):2635-2654, direction numbers `new-joe-kuo-6`; Antonov and Saleev
/// (1979) for the order; Matousek (1998), J. Complexity 14(4):527-556, for the linear scramble with a digital shift.
#[derive(Clone, Debug, PartialEq)]
pub struct Sobol {
    /// Per dimension its direction numbers, highest bit first, and its shift.
    dimensions: Vec<([u64; BITS], u64)>,
}

impl Sobol {
    /// The plain sequence of at most [`MOST_DIMENSIONS`] dimensions; more than these are not made.
    #[must_use]
    pub fn plain(dimensions: usize) -> Self {
        Self { dimensions: (0..dimensions.min(MOST_DIMENSIONS)).map(|d| (directions(d), 0)).collect() }
    }

    /// The sequence scrambled by a seed: as even as the plain one, every point evenly distributed over all seeds.
    /// Dimension `d` draws from the stream (seed, d).
    #[must_use]
    pub fn scrambled(dimensions: usize, seed: u64) -> Self {
        let scramble = |d: usize| {
            let mut stream = SplitMix::of(seed, d as u64);
            let rows: [u64; 64] = std::array::from_fn(|row| unit_row(row, stream.next()));
            (directions(d).map(|v| mix(&rows, v)), stream.next())
        };
        Self { dimensions: (0..dimensions.min(MOST_DIMENSIONS)).map(scramble).collect() }
    }

    /// How many dimensions its points have.
    #[must_use]
    pub const fn dimensions(&self) -> usize {
        self.dimensions.len()
    }

    /// One coordinate of a point, from 0 to below 1 (53 bits); `index` below [`MOST_POINTS`], `dimension` from 0.
    /// Zero for a dimension that the sequence does not have.
    #[must_use]
    pub fn coordinate(&self, index: usize, dimension: usize) -> f64 {
        let Some((directions, shift)) = self.dimensions.get(dimension) else { return 0.0 };
        let mut gray = index ^ (index >> 1);
        let mut bits = *shift;
        while gray != 0 {
            let lowest = gray.trailing_zeros() as usize;
            bits ^= directions[lowest % BITS];
            gray &= gray - 1;
        }
        fraction(bits)
    }

    /// A whole point.
    #[must_use]
    pub fn point(&self, index: usize) -> Vec<f64> {
        (0..self.dimensions()).map(|d| self.coordinate(index, d)).collect()
    }
}

/// The upper 53 bits as a fraction of 1; exact.
#[expect(clippy::cast_precision_loss, reason = "53 bits fit")]
pub(super) fn fraction(bits: u64) -> f64 {
    (bits >> 11) as f64 / (1_u64 << 53) as f64
}

/// Direction numbers of one dimension, each a fraction of 2^64.
fn directions(dimension: usize) -> [u64; BITS] {
    let mut m = [0_u64; BITS];
    match dimension.checked_sub(1).and_then(|at| DIRECTIONS.get(at)) {
        None => m = [1; BITS],
        Some(&(polynomial, first)) => {
            let degree = first.len();
            for k in 0..BITS {
                m[k] = if k < degree { first[k] } else { next(&m[k - degree..k], polynomial) };
            }
        }
    }
    std::array::from_fn(|k| m[k] << (63 - k))
}

/// The recurrence of Joe and Kuo: the last `degree` numbers give the next.
fn next(last: &[u64], polynomial: u64) -> u64 {
    let degree = last.len();
    let mut value = last[0] ^ (last[0] << degree);
    for j in 1..degree {
        if polynomial >> (degree - 1 - j) & 1 == 1 {
            value ^= last[degree - j] << j;
        }
    }
    value
}

/// Row of a lower triangular matrix with ones on the diagonal, counted from the highest bit.
fn unit_row(row: usize, random: u64) -> u64 {
    let diagonal = 1_u64 << (63 - row);
    let above = !(diagonal | (diagonal - 1));
    (random & above) | diagonal
}

fn mix(rows: &[u64; 64], v: u64) -> u64 {
    rows.iter().enumerate().fold(0, |bits, (row, mask)| bits | u64::from((mask & v).count_ones() & 1) << (63 - row))
}

/// A small generator for scrambles and resampling.
///
/// # Reference
/// Steele, Lea and Flood (2014), Fast splittable pseudorandom number generators, OOPSLA.
#[derive(Clone, Debug)]
pub(super) struct SplitMix(u64);

impl SplitMix {
    pub(super) const fn new(seed: u64) -> Self {
        Self(seed)
    }

    /// The stream of one index under a seed.
    pub(super) fn of(seed: u64, index: u64) -> Self {
        let start = Self::new(seed).next();
        Self::new(Self::new(start ^ index).next())
    }

    pub(super) fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let z = (self.0 ^ (self.0 >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        let z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        z ^ (z >> 31)
    }
}

#[cfg(test)]
mod tests {
    use super::SplitMix;

    #[test]
    fn the_generator_gives_the_published_numbers_for_its_seed() {
        // Reference output of the authors' C program for the seed 1234567.
        let mut stream = SplitMix::new(1_234_567);
        assert_eq!([stream.next(), stream.next()], [6_457_827_717_110_365_317, 3_203_168_211_198_807_973]);
    }
}
