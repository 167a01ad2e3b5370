//! Where the panes are: one pure function for drawing and for the mouse.
use super::model::{Model, View};
use super::text::wrap;
use crate::sheet::CAUTION_LINE;
use ratatui::layout::{Rect, Size};

/// Columns that the screen needs.
pub const LEAST_WIDTH: u16 = 60;
/// Rows that the screen needs.
pub const LEAST_HEIGHT: u16 = 20;
/// From this width on the log stands beside the view.
const LOG_FROM: u16 = 132;
/// From this height on the margins stand below.
const MARGINS_FROM: u16 = 32;

/// Views where the margins stand below.
const BESIDE_MARGINS: [View; 9] = [
    View::Elevation,
    View::History,
    View::Notes,
    View::Ledger,
    View::Vary,
    View::Map,
    View::Spread,
    View::Remedies,
    View::Compare,
];

/// The panes of the screen. A pane of no height is not shown.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Panes {
    /// File, units, play head.
    pub header: Rect,
    /// The caution, always there.
    pub caution: Rect,
    /// The verdict in a sentence.
    pub verdict: Rect,
    /// The bar of a walk-through.
    pub walk: Rect,
    /// The list of inputs, below its title row.
    pub inputs: Rect,
    /// What the chosen input is.
    pub about: Rect,
    /// The row of tabs.
    pub tabs: Rect,
    /// The large view.
    pub view: Rect,
    /// The row with the play bar.
    pub timeline: Rect,
    /// The event log, below its title row.
    pub log: Rect,
    /// The table of margins with its title row.
    pub margins: Rect,
    /// Source of the chosen check.
    pub basis: Rect,
    /// Keys or a message.
    pub foot: Rect,
}

impl Panes {
    /// The panes for a model in a terminal of this size; `None` when it is too small.
    #[must_use]
    pub fn of(size: Size, model: &Model) -> Option<Self> {
        if size.width < LEAST_WIDTH || size.height < LEAST_HEIGHT {
            return None;
        }
        let mut rest = Rect::new(0, 0, size.width, size.height);
        let mut panes = Self { header: top(&mut rest, 1), ..Self::default() };
        panes.caution = top(&mut rest, rows(CAUTION_LINE, size.width));
        panes.verdict = top(&mut rest, super::panes::verdict::rows(model, size.width));
        panes.walk = top(&mut rest, super::panes::walk::rows(model));
        panes.foot = bottom(&mut rest, super::panes::foot::rows(model, size.width));
        if has_margins_below(size) {
            panes.place_margins(&mut rest, model);
        }
        panes.place_body(rest, model.view);
        Some(panes)
    }

    fn place_margins(&mut self, rest: &mut Rect, model: &Model) {
        let checks = model.answer.report.as_ref().map_or(1, |report| report.margins.len());
        let wanted = u16::try_from(checks).unwrap_or(u16::MAX).saturating_add(1);
        self.basis = bottom(rest, 2);
        self.margins = bottom(rest, wanted.min(rest.height / 3));
    }

    fn place_body(&mut self, rest: Rect, view: View) {
        let inputs_width = match rest.width {
            0..70 => 28,
            70..100 => 34,
            100..132 => 40,
            _ => 43 + (rest.width - 132).min(80) / 8,
        };
        let log_width = if rest.width >= LOG_FROM { 30 + (rest.width - LOG_FROM).min(120) / 6 } else { 0 };
        let mut left = Rect { width: inputs_width, ..rest };
        let mut right = Rect { x: rest.x + inputs_width + 1, width: rest.width - inputs_width - 1, ..rest };
        if log_width > 0 {
            right.width -= log_width + 1;
            self.log = Rect { x: right.right() + 1, width: log_width, ..rest };
        }
        self.about = bottom(&mut left, if rest.height < 20 { 3 } else { 5 });
        self.inputs = left;
        self.tabs = top(&mut right, 1);
        if view.is_study() {
            // The log of the one run stands aside; the tabs stay where they are.
            right.width = rest.right() - right.x;
            self.log = Rect::default();
        }
        if view.has_timeline() {
            self.timeline = bottom(&mut right, 1);
        }
        self.view = right;
    }

    /// The timeline's bar alone: columns that scrub.
    #[must_use]
    pub fn bar(&self) -> Rect {
        let words = super::panes::timeline::WORDS.min(self.timeline.width);
        Rect { x: self.timeline.x + words, width: self.timeline.width - words, ..self.timeline }
    }
}

/// Whether the margins stand below the view; otherwise they are a view of their own.
#[must_use]
pub const fn has_margins_below(size: Size) -> bool {
    size.height >= MARGINS_FROM
}

/// Views that have a tab at this size.
#[must_use]
pub fn views(size: Size) -> &'static [View] {
    if has_margins_below(size) { &BESIDE_MARGINS } else { &View::ALL }
}

/// Rows that a text takes when wrapped.
#[must_use]
pub fn rows(text: &str, width: u16) -> u16 {
    u16::try_from(wrap(text, usize::from(width.saturating_sub(2))).len()).unwrap_or(1)
}

fn top(rest: &mut Rect, height: u16) -> Rect {
    let height = height.min(rest.height);
    let taken = Rect { height, ..*rest };
    rest.y += height;
    rest.height -= height;
    taken
}

fn bottom(rest: &mut Rect, height: u16) -> Rect {
    let height = height.min(rest.height);
    rest.height -= height;
    Rect { y: rest.bottom(), height, ..*rest }
}

/// Which part of a list to show: `shown` rows around `chosen` out of `count`.
#[must_use]
pub fn scroll(chosen: usize, count: usize, shown: usize) -> usize {
    chosen.saturating_sub(shown / 2).min(count.saturating_sub(shown))
}
