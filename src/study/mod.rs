//! Many runs of one scenario: what its bands do to the checks, and which input matters.
mod band;
mod bands;
mod compare;
mod evaluate;
mod field;
mod held;
mod joe_kuo;
mod memory;
mod meter;
mod nearest;
mod pair;
mod rank;
mod ranked;
mod remedy;
mod sample;
mod sobol;
mod spread;
mod vary;
mod watch;
mod worst;
mod zero;

pub use band::{NORMAL_WIDTH, Quantile};
pub use bands::{Bands, MOST_SAMPLES, Sampling, USUAL_SAMPLES, USUAL_SEED, bands, worst_only};
pub use compare::{Comparison, InputChange, NumberChange, SAME_SHARE, Side, VerdictChange, compare};
pub use evaluate::{Evaluator, Failure, Run, StudyError};
pub use field::{Axis, Cell, Edge, Field, MOST_STEPS, Of, Piece, field, zero_line};
pub use held::Held;
pub use meter::Meter;
pub use rank::{Bar, Importance, Part, Ranking, Target, bars, importance, importance_of, importances};
pub use ranked::{CheckRanking, ranked};
pub use remedy::{
    ADJUSTABLE, MASS_MULTIPLE, MULTIPLE, Pair, REACH_M, Remedies, Remedy, Scale, Wanted, Way, Without, Yard, remedies,
    remedies_of,
};
pub use sample::Sampler;
pub use sobol::{MOST_DIMENSIONS, MOST_POINTS, Sobol};
pub use spread::{BARS, BATCH, CheckSpread, KEY_NUMBERS, NumberSpread, QUANTILE_SHARES, Share, Spread, spread};
pub use vary::{Crossing, Row, Variation, usual_range, vary};
pub use watch::{Progress, Step, Watch, unwatched};
pub use worst::{MOST_CORNER_BANDS, Place, Stand, Worst, WorstFound, worst_found};
