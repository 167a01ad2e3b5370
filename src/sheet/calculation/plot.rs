//! A plot with two axes: from values to places of a drawing.
use super::drawing::{Anchor, Drawing, Shape};
use crate::sheet::ticks::ticks;

/// Space around the plotting area: left, top, right, bottom.
const AROUND: (f64, f64, f64, f64) = (64.0, 26.0, 14.0, 40.0);

/// A range of values along one axis.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Axis {
    /// Value at the start: left, or below.
    pub from: f64,
    /// Value at the end: right, or above.
    pub to: f64,
}

impl Axis {
    /// The range with a twentieth more at each end.
    pub fn around(values: impl IntoIterator<Item = f64>) -> Self {
        let (low, high) = values.into_iter().fold((f64::INFINITY, f64::NEG_INFINITY), |(l, h), v| (l.min(v), h.max(v)));
        if !(low.is_finite() && high.is_finite()) {
            return Self { from: 0.0, to: 1.0 };
        }
        let more = 0.05 * (high - low).max(1e-6 * high.abs()).max(1e-9);
        Self { from: low - more, to: high + more }
    }
    fn share(self, value: f64) -> f64 {
        (value - self.from) / (self.to - self.from)
    }
}

/// A plot under way.
pub struct Plot {
    drawing: Drawing,
    x: Axis,
    y: Axis,
}

impl Plot {
    /// Axes with ticks and their names. `y.from` is at the foot; give it as the larger value for an axis that runs
    /// downward.
    pub fn new((width, height): (f64, f64), (x, x_name): (Axis, &str), (y, y_name): (Axis, &str)) -> Self {
        let mut plot = Self { drawing: Drawing { width, height, shapes: Vec::new() }, x, y };
        let (left, top, right, bottom) = AROUND;
        for value in ticks(x.from, x.to, 9).values {
            let label = ticks(x.from, x.to, 9).label(value);
            let (px, _) = plot.place(value, y.from);
            plot.line("grid", (px, top), (px, height - bottom));
            plot.words("faint", (px, height - bottom + 15.0), Anchor::Middle, &label);
        }
        let (low, high) = (y.from.min(y.to), y.from.max(y.to));
        for value in ticks(low, high, 7).values {
            let label = ticks(low, high, 7).label(value);
            let (_, py) = plot.place(x.from, value);
            plot.line("grid", (left, py), (width - right, py));
            plot.words("faint", (left - 6.0, py + 4.0), Anchor::End, &label);
        }
        plot.words("strong", (left, 16.0), Anchor::Start, y_name);
        plot.words("strong", (width - right, height - 6.0), Anchor::End, x_name);
        let size = (width - left - right, height - top - bottom);
        plot.drawing.shapes.push(Shape::Area { class: "frame", at: (left, top), size });
        plot
    }

    /// Where a pair of values is.
    pub fn place(&self, x: f64, y: f64) -> (f64, f64) {
        let (left, top, right, bottom) = AROUND;
        let across = left + self.x.share(x) * (self.drawing.width - left - right);
        let up = self.drawing.height - bottom - self.y.share(y) * (self.drawing.height - top - bottom);
        (across, up)
    }

    /// A path through values; what is outside of the axes is left out.
    pub fn curve(&mut self, class: &'static str, values: &[(f64, f64)]) {
        let inside = |&&(x, y): &&(f64, f64)| {
            (-1e-9..=1.0 + 1e-9).contains(&self.x.share(x)) && (-1e-9..=1.0 + 1e-9).contains(&self.y.share(y))
        };
        let points = values.iter().filter(inside).map(|&(x, y)| self.place(x, y)).collect();
        self.drawing.shapes.push(Shape::Path { class, points });
    }

    /// A level across the plot with words at its right end.
    pub fn level(&mut self, class: &'static str, value: f64, words: &str) {
        let ((x0, y), (x1, _)) = (self.place(self.x.from, value), self.place(self.x.to, value));
        self.line(class, (x0, y), (x1, y));
        let base = if y < AROUND.1 + 18.0 { y + 13.0 } else { y - 4.0 };
        self.words("", (x1 - 4.0, base), Anchor::End, words);
    }

    /// A box between two pairs of values.
    pub fn area(&mut self, class: &'static str, from: (f64, f64), to: (f64, f64)) {
        let ((x0, y0), (x1, y1)) = (self.place(from.0, from.1), self.place(to.0, to.1));
        let at = (x0.min(x1), y0.min(y1));
        self.drawing.shapes.push(Shape::Area { class, at, size: ((x1 - x0).abs(), (y1 - y0).abs()) });
    }

    /// A line between places of the drawing.
    pub fn line(&mut self, class: &'static str, from: (f64, f64), to: (f64, f64)) {
        self.drawing.shapes.push(Shape::Line { class, from, to });
    }

    /// Words at a place of the drawing.
    pub fn words(&mut self, class: &'static str, at: (f64, f64), anchor: Anchor, words: &str) {
        self.drawing.shapes.push(Shape::Words { class, at, anchor, words: words.to_owned() });
    }

    /// The drawing.
    pub fn finish(self) -> Drawing {
        self.drawing
    }
}
