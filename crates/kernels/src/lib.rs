//! The mesh kernels of merestone.
#![forbid(unsafe_code)]

mod cells;
mod memory;
mod pairing;
mod sectors;
mod side;
mod slots;
mod triangle;
mod vertex_table;

pub use cells::{Cells, DenseId};
pub use triangle::{TriangleAdjacency, TriangleEdges, TriangleSides};
