//! A drawing in plain shapes, as SVG.

/// A drawing.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Drawing {
    /// Width, in units of the drawing.
    pub width: f64,
    /// Height.
    pub height: f64,
    /// Shapes in the order in which they are drawn.
    pub shapes: Vec<Shape>,
}

/// A shape; its look comes from its class.
#[derive(Clone, Debug, PartialEq)]
pub enum Shape {
    /// From one point to another.
    Line {
        /// Class.
        class: &'static str,
        /// First point.
        from: (f64, f64),
        /// Second point.
        to: (f64, f64),
    },
    /// A path through points.
    Path {
        /// Class.
        class: &'static str,
        /// Points.
        points: Vec<(f64, f64)>,
    },
    /// A box.
    Area {
        /// Class.
        class: &'static str,
        /// Upper left corner.
        at: (f64, f64),
        /// Width and height.
        size: (f64, f64),
    },
    /// Words.
    Words {
        /// Class.
        class: &'static str,
        /// Where they are anchored, on their base line.
        at: (f64, f64),
        /// Which end is there.
        anchor: Anchor,
        /// The words.
        words: String,
    },
}

/// Which end of a text is at its place.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Anchor {
    /// Its start.
    Start,
    /// Its middle.
    Middle,
    /// Its end.
    End,
}
