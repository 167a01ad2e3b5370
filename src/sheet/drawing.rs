//! An SVG figure that needs nothing beside it: text alternative, caution, axes, legend, light and dark.
use super::CAUTION_LINE;
use super::ticks::{Ticks, ticks};
use crate::margin::Verdict;
use svg::Document;
use svg::node::Text;
use svg::node::element::{Element, Style};
use svg::node::{Node, Value};

/// Size of a figure, user units.
pub const SIZE: (f64, f64) = (960.0, 640.0);
/// The frame in which data are drawn: left, top, right, bottom.
pub const FRAME: [f64; 4] = [120.0, 110.0, 930.0, 480.0];

/// Ink on paper, and its reverse in the dark. Verdicts differ by pattern as well as by colour.
const STYLE: &str = "\
svg { --ink: #1b1b1f; --paper: #ffffff; --faint: #5c5f66; --grid: #d5d8de; \
--holds: #dcefe3; --thin: #fdf0c4; --open: #e6def2; --short: #f9d9d3; \
--mark-holds: #1f6b3c; --mark-thin: #7a5a00; --mark-open: #5b3a94; --mark-short: #a32214; } \
@media (prefers-color-scheme: dark) { svg { --ink: #ececf1; --paper: #16171b; --faint: #a9adb6; --grid: #3a3d45; \
--holds: #17382a; --thin: #3d3312; --open: #2f2545; --short: #4a1d18; \
--mark-holds: #86d9a6; --mark-thin: #ecc94b; --mark-open: #c4a9f5; --mark-short: #ff9b8c; } } \
text { fill: var(--ink); font: 14px sans-serif; } .small { font-size: 12px; } .faint { fill: var(--faint); } \
.title { font-size: 17px; font-weight: bold; } .caution { font-weight: bold; } .middle { text-anchor: middle; } \
.end { text-anchor: end; } .paper { fill: var(--paper); } .frame { fill: none; stroke: var(--ink); } \
.grid { stroke: var(--grid); } .ink { stroke: var(--ink); fill: none; } .zero { stroke: var(--ink); stroke-width: 2.5; \
fill: none; stroke-linecap: round; } .halo { stroke: var(--paper); stroke-width: 5; fill: none; stroke-linecap: round; } \
.change { stroke: var(--faint); stroke-dasharray: 2 3; } .flat { shape-rendering: crispEdges; } \
.holds { fill: var(--holds); } .thin { fill: var(--thin); } .open { fill: var(--open); } .short { fill: var(--short); } \
.m-thin { fill: none; stroke: var(--mark-thin); } .m-open { fill: var(--mark-open); } \
.m-short { fill: none; stroke: var(--mark-short); }";

/// One axis: its range in the unit shown, and its words.
#[derive(Clone, Debug)]
pub struct Scale {
    /// Low end.
    pub low: f64,
    /// High end.
    pub high: f64,
    /// What it is, with its unit.
    pub words: String,
}

impl Scale {
    fn share(&self, value: f64) -> f64 {
        (value - self.low) / (self.high - self.low)
    }
    /// Place to the right of a value.
    #[must_use]
    pub fn x(&self, value: f64) -> f64 {
        FRAME[0] + self.share(value) * (FRAME[2] - FRAME[0])
    }
    /// Place downwards of a value.
    #[must_use]
    pub fn y(&self, value: f64) -> f64 {
        FRAME[3] - self.share(value) * (FRAME[3] - FRAME[1])
    }
    fn ticks(&self, at_most: usize) -> Ticks {
        ticks(self.low, self.high, at_most)
    }
}

/// A figure being drawn.
pub struct Drawing {
    document: Document,
}

impl Drawing {
    /// An empty figure with its title, its text alternative and the caution, which the alternative repeats.
    #[must_use]
    pub fn new(title: &str, alternative: &str) -> Self {
        let (width, height) = SIZE;
        let document = Document::new()
            .set("viewBox", (0, 0, px(width), px(height)))
            .set("width", px(width))
            .set("height", px(height))
            .set("role", "img")
            .set("aria-labelledby", "title desc")
            .set("lang", "en");
        let mut drawing = Self { document };
        drawing.add(words("title", title).with("id", "title"));
        drawing.add(words("desc", &format!("{alternative} {CAUTION_LINE}.")).with("id", "desc"));
        drawing.document.append(Style::new(STYLE));
        drawing.add(patterns());
        drawing.rect("paper", [0.0, 0.0, width, height]);
        drawing.text("title", (20.0, 32.0), title);
        // The caution stands in two lines, which a narrow print still holds.
        let (first, second) = CAUTION_LINE.split_once(" - ").unwrap_or((CAUTION_LINE, ""));
        drawing.text("caution small", (20.0, 54.0), first);
        drawing.text("caution small", (20.0, 71.0), second);
        drawing
    }

    /// The figure's bytes.
    #[must_use]
    pub fn finish(self) -> String {
        format!("{}\n", self.document)
    }

    /// Adds an element.
    pub fn add(&mut self, element: Element) {
        self.document.append(element);
    }

    /// A line of text; a class of `middle` or `end` says where it is held.
    pub fn text(&mut self, class: &str, at: (f64, f64), what: &str) {
        self.add(words("text", what).with("class", class).with("x", px(at.0)).with("y", px(at.1)));
    }

    /// A rectangle from its left, top, width and height.
    pub fn rect(&mut self, class: &str, [x, y, width, height]: [f64; 4]) {
        self.add(rect(class, [x, y, width, height]));
    }

    /// A path by its data.
    pub fn path(&mut self, class: &str, data: &str) {
        if !data.is_empty() {
            self.add(Element::new("path").with("class", class).with("d", data));
        }
    }

    /// A field of one verdict: its colour, and its pattern above it.
    pub fn verdict(&mut self, verdict: Verdict, place: [f64; 4]) {
        self.rect(&format!("flat {}", verdict.word()), place);
        if verdict != Verdict::Holds {
            let pattern = format!("url(#p-{})", verdict.word());
            self.add(rect("", place).with("fill", pattern));
        }
    }

    /// The frame with ticks, grid and the words of both axes.
    pub fn axes(&mut self, across: &Scale, up: &Scale) {
        let [left, top, right, bottom] = FRAME;
        let found = across.ticks(9);
        for &value in &found.values {
            let x = px(across.x(value));
            self.path("grid", &format!("M{x} {}V{}", px(bottom), px(bottom + 6.0)));
            self.text("small middle", (across.x(value), bottom + 22.0), &found.label(value));
        }
        let found = up.ticks(8);
        for &value in &found.values {
            let y = px(up.y(value));
            self.path("grid", &format!("M{} {y}H{}", px(left - 6.0), px(left)));
            self.text("small end", (left - 10.0, up.y(value) + 4.0), &found.label(value));
        }
        self.rect("frame", [left, top, right - left, bottom - top]);
        self.text("middle", (f64::midpoint(left, right), bottom + 44.0), &across.words);
        self.text("", (20.0, top - 14.0), &up.words);
    }

    /// A sample of a verdict's field with its words; returns nothing, the caller keeps the places apart.
    pub fn key(&mut self, verdict: Verdict, at: (f64, f64), what: &str) {
        self.verdict(verdict, [at.0, at.1 - 12.0, 22.0, 14.0]);
        self.rect("frame", [at.0, at.1 - 12.0, 22.0, 14.0]);
        self.text("small", (at.0 + 28.0, at.1), what);
    }
}

/// Attributes one after the other.
pub trait With {
    /// The element with an attribute.
    #[must_use]
    fn with(self, name: &str, value: impl Into<Value>) -> Self;
}

impl With for Element {
    fn with(mut self, name: &str, value: impl Into<Value>) -> Self {
        self.assign(name, value);
        self
    }
}

fn rect(class: &str, [x, y, width, height]: [f64; 4]) -> Element {
    let mut rect = Element::new("rect");
    if !class.is_empty() {
        rect.assign("class", class);
    }
    rect.with("x", px(x)).with("y", px(y)).with("width", px(width)).with("height", px(height))
}

fn words(name: &str, what: &str) -> Element {
    let mut element = Element::new(name);
    element.append(Text::new(super::clean(what)));
    element
}

/// Strokes for short, dots for open, waves of a wider step for thin.
fn patterns() -> Element {
    let mut all = Element::new("defs");
    for (verdict, step, class, data) in [
        (Verdict::Short, 8, "m-short", "M0 8L8 0"),
        (Verdict::Thin, 12, "m-thin", "M0 6H12"),
        (Verdict::Open, 8, "m-open", "M3 3h2v2h-2z"),
    ] {
        let mut pattern = Element::new("pattern")
            .with("id", format!("p-{}", verdict.word()))
            .with("width", step)
            .with("height", step)
            .with("patternUnits", "userSpaceOnUse");
        pattern.append(Element::new("path").with("class", class).with("d", data));
        all.append(pattern);
    }
    all
}

/// A length in user units with two decimals at most, the same bytes each time.
#[must_use]
pub fn px(value: f64) -> String {
    let text = super::ticks::fixed(value, 2);
    text.trim_end_matches('0').trim_end_matches('.').to_owned()
}
