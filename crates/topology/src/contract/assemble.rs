//! [`Assemble`]: building from a face list, removing, compacting.

use super::{AssembleError, EditError, Topology};
use crate::{Correspondence, FaceList};

/// What the removal of a face took along.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct RemovedFace<E> {
    /// Edges that lost their last use, retired with it.
    pub retired_edges: Vec<E>,
    /// Edges that live on under another id, as (old, new). Only kernels whose edges are places
    /// have any.
    pub moved_edges: Vec<(E, E)>,
}

/// Where a compaction moved every cell: old id to new.
#[derive(Clone, Debug)]
pub struct Compaction<V, E, F, H> {
    /// The vertices.
    pub vertices: Correspondence<V, V>,
    /// The edges.
    pub edges: Correspondence<E, E>,
    /// The faces.
    pub faces: Correspondence<F, F>,
    /// The oriented edges.
    pub oriented_edges: Correspondence<H, H>,
}

/// Kernels that are assembled from face lists and can lose faces again.
#[diagnostic::on_unimplemented(
    message = "`{Self}` cannot be assembled from a face list",
    note = "the triangle and half-edge kernels can"
)]
pub trait Assemble: Topology + Sized {
    /// Builds the topology of a face list.
    ///
    /// Vertex and face number `i` of the list get index `i`. Uses of an edge are radially ordered
    /// as their corners are in the list. Where the list numbers its edges, edge number `i` gets
    /// index `i` on kernels that keep records of edges ([`Costs::edge`](crate::Costs) is
    /// constant); elsewhere one edge per unordered pair of vertices is made, and an edge from a
    /// vertex to itself is taken to run with, against, with … its uses in turn.
    ///
    /// Sectors are numbered by their lowest corner in the list.
    ///
    /// Time O(corners) expected, O(c log c) at a vertex or edge of c corners.
    ///
    /// # Errors
    /// [`AssembleError`] where the list is unusable, or holds a face this kernel cannot hold.
    fn assemble(list: FaceList<'_>) -> Result<Self, AssembleError>;

    /// Retires a face, its oriented edges, and the edges that have no use left. Vertices stay.
    ///
    /// Ids of what stays are unmoved but for [`RemovedFace::moved_edges`]. Sectors at the face's
    /// vertices may split, and number anew. O(corners of the face × corners at each of them).
    ///
    /// # Errors
    /// [`EditError::Stale`] when `face` does not live.
    fn remove_face(&mut self, face: Self::Face) -> Result<RemovedFace<Self::Edge>, EditError>;

    /// Retires a vertex that no face uses. O(1).
    ///
    /// # Errors
    /// [`EditError::Stale`] when `vertex` does not live, [`EditError::VertexInUse`] when a loop
    /// passes it.
    fn remove_isolated_vertex(&mut self, vertex: Self::Vertex) -> Result<(), EditError>;

    /// Drops all retired slots: cells move down, keeping their order, and ids of before the call
    /// are void. O(all). Returns where each cell went.
    fn compact(&mut self) -> Compaction<Self::Vertex, Self::Edge, Self::Face, Self::OrientedEdge>;
}
