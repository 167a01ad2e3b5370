//! Colours and weights, and their monochrome counterpart.
use crate::margin::Verdict;
use ratatui::style::{Color, Modifier, Style};

/// How parts of the screen look. Nothing is told by colour alone: every verdict has a symbol and a word too.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Theme {
    /// The sixteen colours every terminal has.
    #[default]
    Colour,
    /// Weights only, for `NO_COLOR`.
    Mono,
}

impl Theme {
    /// Monochrome when `NO_COLOR` is set to anything but nothing.
    #[must_use]
    pub fn for_no_color(no_color: Option<&std::ffi::OsStr>) -> Self {
        if no_color.is_some_and(|value| !value.is_empty()) { Self::Mono } else { Self::Colour }
    }

    fn pick(self, colour: Color, mono: Modifier) -> Style {
        match self {
            Self::Colour => Style::new().fg(colour),
            Self::Mono => Style::new().add_modifier(mono),
        }
    }

    /// Plain text.
    #[must_use]
    pub const fn plain(self) -> Style {
        Style::new()
    }

    /// Text of second rank.
    #[must_use]
    pub const fn quiet(self) -> Style {
        Style::new().add_modifier(Modifier::DIM)
    }

    /// Headings.
    #[must_use]
    pub const fn heading(self) -> Style {
        Style::new().add_modifier(Modifier::BOLD)
    }

    /// The caution line.
    #[must_use]
    pub fn caution(self) -> Style {
        match self {
            Self::Colour => Style::new().fg(Color::Black).bg(Color::Yellow),
            Self::Mono => Style::new().add_modifier(Modifier::REVERSED),
        }
    }

    /// The row or tab that is chosen, with or without the keys going there.
    #[must_use]
    pub fn chosen(self, has_keys: bool) -> Style {
        if has_keys { Style::new().add_modifier(Modifier::REVERSED) } else { Style::new().add_modifier(Modifier::BOLD) }
    }

    /// The play head and what it points at.
    #[must_use]
    pub fn play_head(self) -> Style {
        self.pick(Color::Cyan, Modifier::BOLD).add_modifier(Modifier::BOLD)
    }

    /// Messages about a fault.
    #[must_use]
    pub fn fault(self) -> Style {
        self.pick(Color::Red, Modifier::BOLD).add_modifier(Modifier::BOLD)
    }

    /// Keys in the key line.
    #[must_use]
    pub fn key(self) -> Style {
        self.pick(Color::Cyan, Modifier::BOLD)
    }

    /// A verdict.
    #[must_use]
    pub fn verdict(self, verdict: Verdict) -> Style {
        match verdict {
            Verdict::Holds => self.pick(Color::Green, Modifier::empty()),
            Verdict::Thin => self.pick(Color::Yellow, Modifier::UNDERLINED),
            Verdict::Open => self.pick(Color::Magenta, Modifier::UNDERLINED),
            Verdict::Short => self.pick(Color::Red, Modifier::BOLD).add_modifier(Modifier::BOLD),
        }
    }

    /// The travel or force curve.
    #[must_use]
    pub fn curve(self) -> Color {
        self.colour(Color::Cyan)
    }

    /// A limit line.
    #[must_use]
    pub fn limit(self) -> Color {
        self.colour(Color::Red)
    }

    /// Envelope, hang position and other helping lines.
    #[must_use]
    pub fn helper(self) -> Color {
        self.colour(Color::Gray)
    }

    fn colour(self, colour: Color) -> Color {
        match self {
            Self::Colour => colour,
            Self::Mono => Color::Reset,
        }
    }
}
