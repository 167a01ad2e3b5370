//! The large views.

/// The large view.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Hash)]
pub enum View {
    /// The fall to scale.
    #[default]
    Elevation,
    /// Travel and force over time.
    History,
    /// Every check; a view of its own only where the margins find no room below.
    Margins,
    /// What must be read beside the numbers.
    Notes,
    /// The energy account and every number with its definition.
    Ledger,
    /// The chosen input across its range.
    Vary,
    /// Two inputs, each across its range.
    Map,
    /// What the bands do.
    Spread,
    /// For each input the nearest value at which every check holds.
    Remedies,
    /// A kept state against the present one.
    Compare,
}

impl View {
    /// All views in the order of the tabs.
    pub const ALL: [Self; 10] = [
        Self::Elevation,
        Self::History,
        Self::Margins,
        Self::Notes,
        Self::Ledger,
        Self::Vary,
        Self::Map,
        Self::Spread,
        Self::Remedies,
        Self::Compare,
    ];

    /// The name on the tab.
    #[must_use]
    pub const fn title(self) -> &'static str {
        match self {
            Self::Elevation => "Elevation",
            Self::History => "History",
            Self::Margins => "Margins",
            Self::Notes => "Notes",
            Self::Ledger => "Ledger",
            Self::Vary => "Vary",
            Self::Map => "Map",
            Self::Spread => "Spread",
            Self::Remedies => "Remedies",
            Self::Compare => "Compare",
        }
    }

    /// The name where tabs stand close.
    #[must_use]
    pub const fn short_title(self) -> &'static str {
        match self {
            Self::Elevation => "Elev",
            Self::History => "Hist",
            Self::Margins => "Marg",
            Self::Remedies => "Remedy",
            other => other.title(),
        }
    }

    /// Whether the time line below belongs to it.
    #[must_use]
    pub const fn has_timeline(self) -> bool {
        matches!(self, Self::Elevation | Self::History)
    }

    /// Whether it speaks of many runs: the log of the one run stands aside for it.
    #[must_use]
    pub const fn is_study(self) -> bool {
        matches!(self, Self::Vary | Self::Map | Self::Spread | Self::Remedies | Self::Compare)
    }

    /// Whether keys can go to it.
    #[must_use]
    pub const fn takes_keys(self) -> bool {
        matches!(self, Self::Map | Self::Remedies)
    }

    /// Whether it is a text that scrolls.
    #[must_use]
    pub const fn is_text(self) -> bool {
        matches!(self, Self::Notes | Self::Ledger | Self::Spread | Self::Compare)
    }
}
