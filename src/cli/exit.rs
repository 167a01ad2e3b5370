//! Exit codes.
use crate::margin::Verdict;

/// How the program ends. Ordered: with several files the largest counts.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Code {
    /// 0: every check holds.
    Holds,
    /// 1: a check is thin, short or open.
    NotHeld,
    /// 2: the input is wrong.
    WrongInput,
    /// 3: it could not be computed.
    NotComputed,
    /// 130: Ctrl-C; what there was by then is printed and marked.
    Interrupted,
}

impl Code {
    /// The number given to the shell.
    #[must_use]
    pub const fn number(self) -> u8 {
        match self {
            Self::Holds => 0,
            Self::NotHeld => 1,
            Self::WrongInput => 2,
            Self::NotComputed => 3,
            Self::Interrupted => 130,
        }
    }
}

impl From<Verdict> for Code {
    fn from(verdict: Verdict) -> Self {
        match verdict {
            Verdict::Holds => Self::Holds,
            Verdict::Thin | Verdict::Open | Verdict::Short => Self::NotHeld,
        }
    }
}
