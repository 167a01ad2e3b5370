//! A text page: wrapped to a width, cleaned of control characters, painted only when asked.
use crate::margin::Verdict;
use anstyle::{AnsiColor, Style};
use std::fmt::Write;
use unicode_width::{UnicodeWidthChar, UnicodeWidthStr};

/// Columns of a text page.
pub const WIDTH: usize = 100;

/// Whether a page carries colour codes. What they tell is told by words and symbols as well.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Paint {
    /// Plain text.
    #[default]
    Plain,
    /// With terminal colour codes.
    Colour,
}

/// How a line is painted.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Tone {
    /// As it is.
    Plain,
    /// A heading.
    Heading,
    /// The caution line.
    Caution,
    /// Beside the main matter.
    Faint,
    /// By a verdict.
    Verdict(Verdict),
}

impl Tone {
    fn style(self) -> Style {
        let colour = |c: AnsiColor| Style::new().fg_color(Some(c.into()));
        match self {
            Self::Plain => Style::new(),
            Self::Heading => Style::new().bold(),
            Self::Caution => colour(AnsiColor::Yellow).bold(),
            Self::Faint => Style::new().dimmed(),
            Self::Verdict(Verdict::Holds) => colour(AnsiColor::Green),
            Self::Verdict(Verdict::Thin) => colour(AnsiColor::Yellow),
            Self::Verdict(Verdict::Open) => colour(AnsiColor::Magenta),
            Self::Verdict(Verdict::Short) => colour(AnsiColor::Red).bold(),
        }
    }
}

/// A page being written.
#[derive(Clone, Debug, Default)]
pub struct Page {
    paint: Paint,
    text: String,
}

impl Page {
    /// An empty page.
    #[must_use]
    pub const fn new(paint: Paint) -> Self {
        Self { paint, text: String::new() }
    }
    /// The page's text.
    #[must_use]
    pub fn finish(self) -> String {
        self.text
    }
    /// An empty line.
    pub fn gap(&mut self) {
        self.text.push('\n');
    }
    /// Text that was laid out elsewhere, as it is.
    pub fn raw(&mut self, text: &str) {
        self.text.push_str(text);
        if !text.ends_with('\n') {
            self.text.push('\n');
        }
    }
    /// A heading with an empty line before it.
    pub fn heading(&mut self, words: &str) {
        self.gap();
        self.line(words, Tone::Heading);
    }
    /// One line as it is.
    pub fn line(&mut self, words: &str, tone: Tone) {
        let words = clean(words);
        let words = words.trim_end();
        match self.paint {
            Paint::Plain => self.text.push_str(words),
            Paint::Colour => {
                let style = tone.style();
                let _ = write!(self.text, "{style}{words}{style:#}");
            }
        }
        self.text.push('\n');
    }
    /// A text wrapped to the page: `first` before its first line, as many blanks before the others.
    pub fn wrapped(&mut self, first: &str, words: &str, tone: Tone) {
        let indent = first.width();
        for (i, line) in wrap(&clean(words), WIDTH.saturating_sub(indent)).iter().enumerate() {
            let lead = if i == 0 { first.to_owned() } else { " ".repeat(indent) };
            self.line(&format!("{lead}{line}"), tone);
        }
    }
}

/// Control characters (a file's own words could steer the terminal) become visible.
#[must_use]
pub fn clean(words: &str) -> String {
    words.chars().map(|c| if c.is_control() { '\u{fffd}' } else { c }).collect()
}

/// Text in lines of at most `width` columns, broken at blanks, else inside a word.
fn wrap(words: &str, width: usize) -> Vec<String> {
    let mut lines = vec![String::new()];
    for word in words.split_whitespace().flat_map(|w| pieces(w, width)) {
        let last = lines.last().map_or(0, |l| l.width());
        if last > 0 && last + 1 + word.width() > width {
            lines.push(String::new());
        }
        if let Some(line) = lines.last_mut() {
            if !line.is_empty() {
                line.push(' ');
            }
            line.push_str(&word);
        }
    }
    lines
}

fn pieces(word: &str, width: usize) -> Vec<String> {
    let mut parts = vec![String::new()];
    let mut used = 0;
    for c in word.chars() {
        let columns = c.width().unwrap_or(0);
        if used + columns > width.max(1) {
            parts.push(String::new());
            used = 0;
        }
        used += columns;
        if let Some(part) = parts.last_mut() {
            part.push(c);
        }
    }
    parts
}

/// Text filled with blanks on the right to a width in columns.
#[must_use]
pub fn pad(words: &str, width: usize) -> String {
    let blanks = width.saturating_sub(words.width());
    format!("{words}{}", " ".repeat(blanks))
}

/// Text filled with blanks on the left to a width in columns.
#[must_use]
pub fn pad_left(words: &str, width: usize) -> String {
    let blanks = width.saturating_sub(words.width());
    format!("{}{words}", " ".repeat(blanks))
}
