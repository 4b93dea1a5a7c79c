//! The mesh kernels of merestone: ways to store a topology.
//!
//! Each kernel implements [`Topology`](merestone_topology::Topology) and
//! [`Assemble`](merestone_topology::Assemble), so that code written against the traits runs on any
//! of them. Choose by what your meshes are and what you do with them.
//!
//! # Triangle adjacency: [`TriangleAdjacency`]
//! - **What**: for each side of each triangle its end and the turn around its start, nothing else.
//! - **When**: triangle meshes that are measured, walked and flooded.
//! - **The catch**: triangles only; sides and edges are places, so that an edit can move them.
//! - **Bytes**: 24 F + 4 V for F triangles and V vertices, which is 26 a triangle on a closed mesh.
//!
//! # Half-edge: [`HalfEdge`]
//! - **What**: a record for each oriented edge, linked to the records around it.
//! - **When**: polygons, faces with holes, solids, editing; where every step should be constant.
//! - **The catch**: the heavier of the two; a record's links lie in six arrays.
//! - **Bytes**: 24 H + 4 E + 4 F + 4 V for H oriented edges, E edges, F faces and V vertices,
//!   which is 84 a triangle on a closed triangle mesh.
#![forbid(unsafe_code)]

mod cells;
mod half_edge;
mod memory;
mod moves;
mod pairing;
mod removal;
mod sectors;
mod side;
mod slots;
mod triangle;
mod vertex_table;

/// Set in an entry or link that says more than a number.
const TOP: u32 = 1 << 31;

pub use cells::{Cells, DenseId};
pub use half_edge::{Full, HalfEdge, Links};
pub use triangle::{TriangleAdjacency, TriangleEdges, TriangleSides};
