//! What can be wrong with a polygon soup.

use merestone_topology::FaceListError;

/// A soup that no topology can be made of.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum SoupError {
    /// A coordinate that is NaN or infinite.
    #[error(
        "coordinate {axis} of vertex {vertex} is {value}; every coordinate must be a finite number, so mend or remove that vertex"
    )]
    NotFinite {
        /// The vertex's number in the soup.
        vertex: usize,
        /// `'x'`, `'y'` or `'z'`.
        axis: char,
        /// What stands there.
        value: f64,
    },
    /// The faces do not fit the points.
    #[error("the faces do not fit the points: {0}")]
    Faces(#[from] FaceListError),
    /// A column without one value for each vertex or face.
    #[error(
        "column `{name}` holds {values} values for {cells} {kind}; give one value each or drop the column"
    )]
    Column {
        /// The column's name.
        name: String,
        /// `"vertices"` or `"faces"`.
        kind: &'static str,
        /// How many values it holds.
        values: usize,
        /// How many it should hold.
        cells: usize,
    },
}
