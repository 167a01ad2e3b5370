//! Many runs of one scenario: what its bands do to the checks, and which input matters.
mod band;
mod compare;
mod evaluate;
mod field;
mod joe_kuo;
mod meter;
mod rank;
mod remedy;
mod sample;
mod sobol;
mod spread;
mod vary;
mod worst;
mod zero;

pub use band::{NORMAL_WIDTH, Quantile};
pub use compare::{Comparison, InputChange, NumberChange, SAME_SHARE, Side, VerdictChange, compare};
pub use evaluate::{Evaluator, Failure, Run, StudyError};
pub use field::{Axis, Cell, Edge, Field, MOST_STEPS, Of, Piece, field, zero_line};
pub use meter::Meter;
pub use rank::{Bar, Importance, Part, Ranking, Target, bars, importance, importance_of};
pub use remedy::{ADJUSTABLE, MASS_MULTIPLE, MULTIPLE, REACH_M, Remedies, Remedy, Way, remedies};
pub use sample::Sampler;
pub use sobol::{MOST_DIMENSIONS, MOST_POINTS, Sobol};
pub use spread::{BARS, BATCH, CheckSpread, KEY_NUMBERS, NumberSpread, QUANTILE_SHARES, Share, Spread, spread};
pub use vary::{Crossing, Row, Variation, usual_range, vary};
pub use worst::{MOST_CORNER_BANDS, Place, Stand, Worst, WorstFound, worst_found};
