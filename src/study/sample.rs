//! A sample of the band box: which values run number `i` has.
use super::band::Quantile;
use super::evaluate::{Evaluator, StudyError};
use super::sobol::{MOST_DIMENSIONS, Sobol};

/// A seeded low-discrepancy sample over every wide band of a scenario; inputs are taken as independent.
#[derive(Clone, Debug, PartialEq)]
pub struct Sampler {
    sobol: Sobol,
    bands: Vec<(usize, Quantile)>,
}

impl Sampler {
    /// A sample of the evaluator's wide bands.
    ///
    /// # Errors
    /// [`StudyError::TooManyBands`] when more than [`MOST_DIMENSIONS`] inputs are wide.
    pub fn new(evaluator: &Evaluator, seed: u64) -> Result<Self, StudyError> {
        let wide = evaluator.wide();
        if wide.len() > MOST_DIMENSIONS {
            return Err(StudyError::TooManyBands { bands: wide.len(), most: MOST_DIMENSIONS });
        }
        let quantile = |&index: &usize| (index, Quantile::new(evaluator.inputs()[index].measure.band));
        Ok(Self { sobol: Sobol::scrambled(wide.len(), seed), bands: wide.iter().map(quantile).collect() })
    }

    /// The values of run `index`: input number and value, SI. The same for the same seed and index, always.
    #[must_use]
    pub fn values(&self, index: usize) -> Vec<(usize, f64)> {
        let draw = |(d, (input, quantile)): (usize, &(usize, Quantile))| {
            (*input, quantile.at(self.sobol.coordinate(index, d)))
        };
        self.bands.iter().enumerate().map(draw).collect()
    }
}
