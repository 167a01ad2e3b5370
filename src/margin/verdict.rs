//! The four words.

/// What a check says. Ordered from best to worst.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Verdict {
    /// Holds, also at the worst found in the bands.
    Holds,
    /// Typical holds, the worst found does not.
    Thin,
    /// Cannot be judged: an input is missing or the model is not valid there.
    Open,
    /// Typical does not hold.
    Short,
}

impl Verdict {
    /// `holds`, `thin`, `open`, `short`.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Holds => "holds",
            Self::Thin => "thin",
            Self::Open => "open",
            Self::Short => "short",
        }
    }
    /// A symbol of its own beside the word: `o` holds, `~` thin, `?` open, `x` short.
    #[must_use]
    pub const fn symbol(self) -> char {
        match self {
            Self::Holds => 'o',
            Self::Thin => '~',
            Self::Open => '?',
            Self::Short => 'x',
        }
    }
}

/// The worst of several; `open` when there is nothing to judge.
pub fn worst(verdicts: impl IntoIterator<Item = Verdict>) -> Verdict {
    verdicts.into_iter().max().unwrap_or(Verdict::Open)
}
