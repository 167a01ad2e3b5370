//! Why the screen ended other than by quitting.

/// Why the screen did not start, or ended early.
#[derive(Debug, thiserror::Error)]
pub enum ScreenError {
    /// Input or output is no terminal.
    #[error("{stream} is not a terminal; use `underfoot run FILE` for the same numbers as text")]
    NoTerminal {
        /// `standard input` or `standard output`.
        stream: &'static str,
    },
    /// Ended by a signal.
    #[error("ended by signal {signal}{}", if *.unsaved { "; unsaved changes were not written" } else { "" })]
    Signal {
        /// Number of the signal.
        signal: i32,
        /// Whether there were changes not yet in the file.
        unsaved: bool,
    },
    /// The terminal went away.
    #[error("the terminal went away{}", if *.unsaved { "; unsaved changes were not written" } else { "" })]
    HungUp {
        /// Whether there were changes not yet in the file.
        unsaved: bool,
    },
    /// Interrupted from the keyboard.
    #[error("interrupted")]
    Interrupted,
}

impl ScreenError {
    /// The exit status: 2 without a terminal, 129 when it went away, 130 interrupted, 128 and the number for another signal.
    #[must_use]
    pub fn exit_code(&self) -> u8 {
        match self {
            Self::NoTerminal { .. } => 2,
            Self::Signal { signal, .. } => u8::try_from(128 + signal).unwrap_or(130),
            Self::HungUp { .. } => 129,
            Self::Interrupted => 130,
        }
    }

    /// True when nothing need be printed: the user asked for the end.
    #[must_use]
    pub const fn is_silent(&self) -> bool {
        matches!(self, Self::Interrupted)
    }
}
