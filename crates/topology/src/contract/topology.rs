//! [`Topology`]: what a kernel supplies.

use super::{Costs, Footprint};
use crate::Id;
use std::fmt::Debug;
use std::iter::FusedIterator;

/// One bound of a face.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum FaceBound<H, V> {
    /// An edge loop, by one of its oriented edges.
    EdgeLoop(H),
    /// A vertex loop.
    VertexLoop(V),
}

/// The cells of a boundary and O(1) steps between them: what a kernel writer implements.
///
/// Users call [`TopologyExt`](crate::TopologyExt), which has every relation and walk. A signature
/// `fn f<K: Topology>(mesh: &K)` is enough for nearly all generic code.
///
/// # The model
/// An **oriented edge** is one use of an edge by one loop of a face, running that loop's way. A
/// loop's corner and the oriented edge that leaves it are the same id. The uses of an edge form
/// its **radial** cycle, in the order the edge was assembled in. An edge is **plain** when it has
/// exactly two uses and they run opposite ways.
///
/// A **sector** is a maximal run of corners around a vertex, each joined to the next through an
/// edge of exactly two uses; it is cyclic or open.
///
/// # Stale ids
/// An id of a retired cell, or of another topology, breaks a promise of the caller's: steps catch
/// it in debug builds and answer anything or panic in release builds. [`vertex_at`](Self::vertex_at)
/// and its sisters answer for any index.
///
/// # Implementing
/// Every method without a default must be O(1) but for `prev`, `face` and `edge`, whose cost
/// [`COST`](Self::COST) states. Hold a kernel to the contract with the suite behind the feature
/// `conformance`, and put `#[deny(clippy::missing_trait_methods)]` on the `impl`.
pub trait Topology {
    /// Names a vertex.
    type Vertex: Id;
    /// Names an edge.
    type Edge: Id;
    /// Names a face.
    type Face: Id;
    /// Names one use of an edge by one face.
    type OrientedEdge: Id;

    /// Iterates over the live vertices, ascending.
    type Vertices<'a>: Iterator<Item = Self::Vertex> + Clone + Debug + FusedIterator
    where
        Self: 'a;
    /// Iterates over the live edges, ascending.
    type Edges<'a>: Iterator<Item = Self::Edge> + Clone + Debug + FusedIterator
    where
        Self: 'a;
    /// Iterates over the live faces, ascending.
    type Faces<'a>: Iterator<Item = Self::Face> + Clone + Debug + FusedIterator
    where
        Self: 'a;
    /// Iterates over the live oriented edges, ascending.
    type OrientedEdges<'a>: Iterator<Item = Self::OrientedEdge> + Clone + Debug + FusedIterator
    where
        Self: 'a;

    /// What `prev`, `face` and `edge` cost.
    const COST: Costs;

    /// How many vertices live, those without a face included.
    fn vertex_count(&self) -> usize;
    /// How many edges live. Each has at least one use.
    fn edge_count(&self) -> usize;
    /// How many faces live.
    fn face_count(&self) -> usize;
    /// How many oriented edges live.
    fn oriented_edge_count(&self) -> usize;
    /// How many bounds the live faces have beyond their first.
    fn inner_loop_count(&self) -> usize;

    /// Above every vertex index, retired ones included.
    fn vertex_bound(&self) -> usize;
    /// Above every edge index, retired ones included.
    fn edge_bound(&self) -> usize;
    /// Above every face index, retired ones included.
    fn face_bound(&self) -> usize;
    /// Above every oriented edge's index, retired ones included.
    fn oriented_edge_bound(&self) -> usize;

    /// The live vertex in slot `index`, if any, for every `index` whatever.
    fn vertex_at(&self, index: usize) -> Option<Self::Vertex>;
    /// The live edge in slot `index`, if any, for every `index` whatever.
    fn edge_at(&self, index: usize) -> Option<Self::Edge>;
    /// The live face in slot `index`, if any, for every `index` whatever.
    fn face_at(&self, index: usize) -> Option<Self::Face>;
    /// The live oriented edge in slot `index`, if any, for every `index` whatever.
    fn oriented_edge_at(&self, index: usize) -> Option<Self::OrientedEdge>;

    /// The live vertices, ascending.
    fn vertices(&self) -> Self::Vertices<'_>;
    /// The live edges, ascending.
    fn edges(&self) -> Self::Edges<'_>;
    /// The live faces, ascending.
    fn faces(&self) -> Self::Faces<'_>;
    /// The live oriented edges, ascending.
    fn oriented_edges(&self) -> Self::OrientedEdges<'_>;

    /// The vertex `h` starts at: its corner.
    fn start(&self, h: Self::OrientedEdge) -> Self::Vertex;
    /// The vertex `h` ends at.
    fn end(&self, h: Self::OrientedEdge) -> Self::Vertex;
    /// The oriented edge after `h` in its loop.
    fn next(&self, h: Self::OrientedEdge) -> Self::OrientedEdge;
    /// The oriented edge before `h` in its loop.
    fn prev(&self, h: Self::OrientedEdge) -> Self::OrientedEdge;
    /// The next use of `h`'s edge, radially: `h` itself at a boundary, the twin at a plain edge.
    fn radial(&self, h: Self::OrientedEdge) -> Self::OrientedEdge;
    /// `next(radial(h))` where `h`'s edge is plain, else `None`: the step every rotation around a
    /// vertex is made of.
    fn turn(&self, h: Self::OrientedEdge) -> Option<Self::OrientedEdge>;
    /// Whether `h`'s edge has exactly two uses that run opposite ways.
    fn is_plain(&self, h: Self::OrientedEdge) -> bool;
    /// The face whose loop `h` runs in.
    fn face(&self, h: Self::OrientedEdge) -> Self::Face;
    /// The edge that `h` uses.
    fn edge(&self, h: Self::OrientedEdge) -> Self::Edge;
    /// Whether `h` runs the way its edge does. An edge runs the way its first use did when it was
    /// assembled, unless the face list said otherwise.
    fn runs_with_edge(&self, h: Self::OrientedEdge) -> bool;

    /// A use of `e`; which one is the kernel's choice, but the same until an edit touches `e`.
    fn edge_use(&self, e: Self::Edge) -> Self::OrientedEdge;

    /// The handle of `v`'s sector number `i`: an oriented edge that starts at `v`.
    ///
    /// In an open sector it is a corner at an end: the one whose *incoming* side is that end,
    /// where the sector has such a corner (it always does unless neighbours are misoriented).
    /// `None` from the number of sectors on.
    fn sector(&self, v: Self::Vertex, i: usize) -> Option<Self::OrientedEdge>;

    /// The face of `v`'s vertex loop number `i`, one for each vertex loop at `v`.
    fn vertex_loop(&self, v: Self::Vertex, i: usize) -> Option<Self::Face>;

    /// Bound number `i` of `f`, the outer one first. `None` from the number of bounds on.
    fn bound(&self, f: Self::Face, i: usize)
    -> Option<FaceBound<Self::OrientedEdge, Self::Vertex>>;

    /// The three oriented edges of `f` in loop order, where the kernel knows without looking that
    /// its faces are single loops of three corners. The default, `None`, is always right and costs
    /// face walks a test for every corner.
    #[inline(always)]
    fn triangle(&self, f: Self::Face) -> Option<[Self::OrientedEdge; 3]> {
        let _ = f;
        None
    }

    /// `face(radial(h))`: the face across `h`'s edge, or the next one around it. The default is
    /// always right; a kernel whose links make it shorter says so.
    #[inline(always)]
    fn across(&self, h: Self::OrientedEdge) -> Self::Face {
        self.face(self.radial(h))
    }

    /// Vertex indices in threes, one three for each face slot, where the kernel keeps them so:
    /// the slice-level way in for vectorised face passes. Retired slots hold anything. A three
    /// begins at any of its face's corners. The default, `None`, is always right.
    #[inline(always)]
    fn index_buffer(&self) -> Option<&[[u32; 3]]> {
        None
    }

    /// Exactly the heap bytes held, array by array.
    fn footprint(&self) -> Footprint;
}
