//! What exerts force: elastic laws, the absorber, the series path. SI throughout, unit in the name.
mod elastic;
mod path;

pub use elastic::{Elastic, Piece, Table, TableError};
pub use path::{Absorber, Group, SeriesPath};
