//! The topology contract of merestone: what every kernel promises, and what is written once on top.
//!
//! No storage and no coordinates live here. The main types:
//!
//! - [`Topology`]: the cells of a boundary and constant-time steps between them; a kernel supplies
//!   them. [`Assemble`] builds a kernel from a [`FaceList`] and takes faces away again.
//! - [`TopologyExt`]: what users call on any kernel: the nine [`relations`], the local [`walks`],
//!   and queries. A blanket implementation, so that no kernel can answer differently.
//! - [`floods`]: what goes over whole meshes: components, orientation, boundary loops, and
//!   [`Survey`](floods::Survey), which counts everything.
//! - [`views`]: [`Manifold`](views::Manifold), [`OrientedManifold`](views::OrientedManifold) and
//!   [`SolidBoundary`](views::SolidBoundary), to be had only by a check that passed; one that fails
//!   lists every defect.
//! - [`Column`]: one value for every cell of a kind; [`Correspondence`]: where cells went.
//!
//! # The model in short
//! An *oriented edge* is one use of an edge by a loop of a face, and doubles as the loop's corner at
//! its start. The uses of an edge form a *radial* cycle. An edge is *plain* when it has two uses
//! that run opposite ways; a *sector* is a run of corners around a vertex that are joined through
//! edges of two uses. Everything that a list of faces can be is held: see [`Topology`].
//!
//! # Writing against the trait
//! ```
//! use merestone_topology::{Topology, TopologyExt};
//!
//! /// How many edges meet at the busiest vertex.
//! fn largest_valence<K: Topology>(mesh: &K) -> usize {
//!     mesh.vertices().map(|v| mesh.vertex_edge_ends(v).count()).max().unwrap_or(0)
//! }
//! ```
//! Hot loops go by `for_each` and `fold`, which every walk implements as one tight loop; `next` is
//! there for when you need to stop and think.
//!
//! # A kernel of your own
//! Implement [`Topology`] and [`Assemble`], then hold it to the suite behind the feature
//! `conformance`, which compares it with a naive reference topology on thousands of complexes.
#![forbid(unsafe_code)]

mod column;
#[cfg(feature = "conformance")]
pub mod conformance;
mod contract;
mod face_list;
pub mod floods;
mod id;
pub mod relations;
pub mod views;
pub mod walks;

pub use column::{Column, Correspondence};
pub use contract::{
    ArrayBytes, Assemble, AssembleError, Compaction, Cost, Costs, EdgeKind, EditError, FaceBound,
    Footprint, RemovedFace, Topology, TopologyExt,
};
pub use face_list::{EdgeUse, FaceList, FaceListBuf, FaceListError, ListedLoop, ListedLoops};
pub use id::{EdgeId, FaceId, Id, IdError, MAX_DENSE_INDEX, OrientedEdgeId, VertexId};
