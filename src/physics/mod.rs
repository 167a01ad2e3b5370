//! What exerts force: elastic laws, the absorber, the series path, horizontal lifelines, and where a fall starts.
//! SI throughout, unit in the name.
pub mod cable;
pub mod clearance;
mod elastic;
pub mod geometry;
pub mod knots;
mod path;
pub mod span;

pub use elastic::{Elastic, Piece, Table, TableError};
pub use geometry::{
    Course, Geometry, GeometryError, Layout, Point, Positions, Step as GeometryStep, hanging, retractable, secondary,
    stated, vertical_lifeline,
};
pub use path::{Absorber, Group, SeriesPath};
pub use span::{EndLoad, InlineAbsorber, Loading, Span, SpanCurve, SpanError, Tightness, YieldingSpan};
