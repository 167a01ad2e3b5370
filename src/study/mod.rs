//! Many runs of one scenario: what its bands do to the checks, and which input matters.
mod evaluate;

pub use evaluate::{Evaluator, Failure, Run, StudyError};
