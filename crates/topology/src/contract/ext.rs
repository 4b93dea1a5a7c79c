//! [`TopologyExt`]: what users call.

use super::Topology;
use crate::relations::{
    EdgeEdgesState, EdgeEndsState, EdgeFacesState, FaceEdgesState, FaceFacesState,
    FaceVerticesState, VertexEdgesState, VertexFacesState, VertexVerticesState, edge_ends_of,
};
use crate::views::{DefectsOf, Manifold, OrientedManifold, SolidBoundary};
use crate::walks::{
    BoundaryState, FaceBoundsState, FaceCornersState, LoopState, SectorHandlesState, SectorState,
    SpokesState, UsesState, VertexCornersState, Walk,
};
use crate::{Column, Id};

/// How many uses an edge has, and how they run.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum EdgeKind {
    /// One use.
    Boundary,
    /// Two uses that run opposite ways.
    Plain,
    /// Two uses that run the same way.
    Misoriented,
    /// More than two uses.
    NonManifold,
}

macro_rules! walk {
    ($mesh:ty, $state:ident $(<$($p:ident),+>)?) => {
        Walk<'_, $mesh, $state$(<$(<$mesh as Topology>::$p),+>)?>
    };
}

/// Relations, walks and queries on any topology: a blanket implementation that nobody can override.
pub trait TopologyExt: Topology {
    /// `value` for every vertex.
    #[must_use]
    fn vertex_column<T: Clone>(&self, value: T) -> Column<Self::Vertex, T> {
        Column::new(self.vertex_bound(), value)
    }

    /// `value` for every edge.
    #[must_use]
    fn edge_column<T: Clone>(&self, value: T) -> Column<Self::Edge, T> {
        Column::new(self.edge_bound(), value)
    }

    /// `value` for every face.
    #[must_use]
    fn face_column<T: Clone>(&self, value: T) -> Column<Self::Face, T> {
        Column::new(self.face_bound(), value)
    }

    /// `value` for every oriented edge, and so for every corner.
    #[must_use]
    fn oriented_edge_column<T: Clone>(&self, value: T) -> Column<Self::OrientedEdge, T> {
        Column::new(self.oriented_edge_bound(), value)
    }

    /// Whether `v` lives here. O(1).
    fn has_vertex(&self, v: Self::Vertex) -> bool {
        self.vertex_at(v.index()) == Some(v)
    }

    /// Whether `e` lives here. O(1).
    fn has_edge(&self, e: Self::Edge) -> bool {
        self.edge_at(e.index()) == Some(e)
    }

    /// Whether `f` lives here. O(1).
    fn has_face(&self, f: Self::Face) -> bool {
        self.face_at(f.index()) == Some(f)
    }

    /// Whether `h` lives here. O(1).
    fn has_oriented_edge(&self, h: Self::OrientedEdge) -> bool {
        self.oriented_edge_at(h.index()) == Some(h)
    }

    /// Whether no face uses `v`. O(1).
    #[inline]
    fn is_isolated(&self, v: Self::Vertex) -> bool {
        self.sector(v, 0).is_none() && self.vertex_loop(v, 0).is_none()
    }

    /// The handles of a vertex's sectors, by number.
    #[inline]
    fn vertex_sectors(&self, v: Self::Vertex) -> walk!(Self, SectorHandlesState<Vertex>) {
        Walk::new(self, SectorHandlesState::new(v))
    }

    /// The corners of one sector, in turn order from its handle.
    #[inline]
    fn sector_corners(&self, handle: Self::OrientedEdge) -> walk!(Self, SectorState<OrientedEdge>) {
        Walk::new(self, SectorState::new(handle))
    }

    /// The corners of a vertex, sector by sector in turn order: all oriented edges that start there.
    #[inline]
    fn vertex_corners(&self, v: Self::Vertex) -> walk!(Self, VertexCornersState<OrientedEdge>) {
        Walk::new(self, VertexCornersState::new(self, v))
    }

    /// The sides around a vertex, sector by sector: what each corner is left by, then, in an open
    /// sector, what its first corner is entered by.
    #[inline]
    fn vertex_spokes(&self, v: Self::Vertex) -> walk!(Self, SpokesState<OrientedEdge>) {
        Walk::new(self, SpokesState::new(self, v))
    }

    /// The sides around one sector, as [`vertex_spokes`](Self::vertex_spokes) lists them.
    #[inline]
    fn sector_spokes(&self, handle: Self::OrientedEdge) -> walk!(Self, SpokesState<OrientedEdge>) {
        Walk::new(self, SpokesState::of_sector(handle))
    }

    /// The edge ends at a vertex, each exactly once: as [`vertex_spokes`](Self::vertex_spokes), but a non-manifold
    /// edge that several sectors end at comes once. An edge from `v` to `v` has two ends here.
    #[inline]
    fn vertex_edge_ends(&self, v: Self::Vertex) -> walk!(Self, EdgeEndsState<OrientedEdge>) {
        Walk::new(self, EdgeEndsState(SpokesState::new(self, v)))
    }

    /// The oriented edges of the loop through `h`, from `h` on.
    #[inline]
    fn loop_corners(&self, h: Self::OrientedEdge) -> walk!(Self, LoopState<OrientedEdge>) {
        Walk::new(self, LoopState::new(h))
    }

    /// The bounds of a face, outer first.
    #[inline]
    fn face_bounds(&self, f: Self::Face) -> walk!(Self, FaceBoundsState<Face>) {
        Walk::new(self, FaceBoundsState::new(f))
    }

    /// The corners of a face's edge loops, in loop order, outer loop first.
    #[inline]
    fn face_corners(&self, f: Self::Face) -> walk!(Self, FaceCornersState<Face, OrientedEdge>) {
        Walk::new(self, FaceCornersState::new(f))
    }

    /// The uses of `h`'s edge, in radial order from `h`.
    #[inline]
    fn uses(&self, h: Self::OrientedEdge) -> walk!(Self, UsesState<OrientedEdge>) {
        Walk::new(self, UsesState::new(h))
    }

    /// The uses of an edge, in radial order.
    #[inline]
    fn edge_uses(&self, e: Self::Edge) -> walk!(Self, UsesState<OrientedEdge>) {
        self.uses(self.edge_use(e))
    }

    /// The boundary uses met by going along the boundary from `h`; none unless `h` is one.
    ///
    /// Goes through the sector at each far vertex to its other end. Ends when it is back at `h`,
    /// or where a sector ends at a non-manifold edge.
    #[inline]
    fn boundary_loop(&self, h: Self::OrientedEdge) -> walk!(Self, BoundaryState<OrientedEdge>) {
        Walk::new(self, BoundaryState::new(self, h))
    }

    /// The vertices around a vertex: the far ends of [`vertex_spokes`](Self::vertex_spokes).
    #[inline]
    fn vertex_vertices(&self, v: Self::Vertex) -> walk!(Self, VertexVerticesState<OrientedEdge>) {
        Walk::new(self, VertexVerticesState(SpokesState::new(self, v)))
    }

    /// The edges around a vertex: those of [`vertex_spokes`](Self::vertex_spokes).
    #[inline]
    fn vertex_edges(&self, v: Self::Vertex) -> walk!(Self, VertexEdgesState<OrientedEdge>) {
        Walk::new(self, VertexEdgesState(SpokesState::new(self, v)))
    }

    /// The faces around a vertex: of each corner, sector by sector, then of each vertex loop.
    #[inline]
    fn vertex_faces(&self, v: Self::Vertex) -> walk!(Self, VertexFacesState<Vertex, OrientedEdge>) {
        Walk::new(self, VertexFacesState::new(self, v))
    }

    /// The two vertices of an edge, in the edge's direction.
    #[inline]
    fn edge_vertices(&self, e: Self::Edge) -> [Self::Vertex; 2] {
        edge_ends_of(self, e)
    }

    /// The edges that meet an edge: [`vertex_edges`](Self::vertex_edges) of its start, then (if it
    /// is another vertex) of its end, the edge itself left out.
    #[inline]
    fn edge_edges(&self, e: Self::Edge) -> walk!(Self, EdgeEdgesState<Edge, Vertex, OrientedEdge>) {
        Walk::new(self, EdgeEdgesState::new(self, e))
    }

    /// The faces around an edge, one for each use, in radial order.
    #[inline]
    fn edge_faces(&self, e: Self::Edge) -> walk!(Self, EdgeFacesState<OrientedEdge>) {
        Walk::new(self, EdgeFacesState(UsesState::new(self.edge_use(e))))
    }

    /// The vertices of a face, in loop order, outer loop first; vertex loops in their place.
    #[inline]
    fn face_vertices(&self, f: Self::Face) -> walk!(Self, FaceVerticesState<Face, OrientedEdge>) {
        Walk::new(self, FaceVerticesState::new(f))
    }

    /// The edges of a face, one for each oriented edge of its loops, in loop order.
    #[inline]
    fn face_edges(&self, f: Self::Face) -> walk!(Self, FaceEdgesState<Face, OrientedEdge>) {
        Walk::new(self, FaceEdgesState(FaceCornersState::new(f)))
    }

    /// The faces across a face's edges: for each oriented edge in loop order, those of the other
    /// uses of its edge in radial order.
    #[inline]
    fn face_faces(&self, f: Self::Face) -> walk!(Self, FaceFacesState<Face, OrientedEdge>) {
        Walk::new(self, FaceFacesState::new(f))
    }

    /// How many uses `h`'s edge has, and how they run. O(1).
    #[inline]
    fn edge_kind_at(&self, h: Self::OrientedEdge) -> EdgeKind {
        if self.is_plain(h) {
            return EdgeKind::Plain;
        }
        let other = self.radial(h);
        if other == h {
            EdgeKind::Boundary
        } else if self.radial(other) == h {
            EdgeKind::Misoriented
        } else {
            EdgeKind::NonManifold
        }
    }

    /// How many uses `e` has, and how they run. O(1).
    #[inline]
    fn edge_kind(&self, e: Self::Edge) -> EdgeKind {
        self.edge_kind_at(self.edge_use(e))
    }

    /// Whether `e` has one use only. O(1).
    #[inline]
    fn is_boundary(&self, e: Self::Edge) -> bool {
        let h = self.edge_use(e);
        self.radial(h) == h
    }

    /// An edge that joins `a` and `b`, the first in [`vertex_edge_ends`](Self::vertex_edge_ends)
    /// of `a`. O(corners at `a`).
    fn edge_between(&self, a: Self::Vertex, b: Self::Vertex) -> Option<Self::Edge> {
        self.vertex_edge_ends(a)
            .find(|spoke| spoke.far_end(self) == b)
            .map(|spoke| self.edge(spoke.oriented_edge))
    }

    /// This topology as a [`Manifold`], after a check. O(uses).
    ///
    /// # Errors
    /// Every defect, as [`Manifold::new`] lists them.
    fn manifold(&self) -> Result<Manifold<'_, Self>, DefectsOf<Self>>
    where
        Self: Sized,
    {
        Manifold::new(self)
    }

    /// This topology as an [`OrientedManifold`], after a check. O(uses).
    ///
    /// # Errors
    /// Every defect, as [`OrientedManifold::new`] lists them.
    fn oriented_manifold(&self) -> Result<OrientedManifold<'_, Self>, DefectsOf<Self>>
    where
        Self: Sized,
    {
        OrientedManifold::new(self)
    }

    /// This topology as the boundary of a solid, after a check. O(uses).
    ///
    /// # Errors
    /// Every defect, as [`SolidBoundary::new`] lists them; displays as one line that says why not.
    fn solid_boundary(&self) -> Result<SolidBoundary<'_, Self>, DefectsOf<Self>>
    where
        Self: Sized,
    {
        SolidBoundary::new(self)
    }

    /// V − E + F − R of the live cells, R the inner loops.
    fn euler_characteristic(&self) -> i64 {
        let n = |count: usize| count as i64;
        n(self.vertex_count()) - n(self.edge_count()) + n(self.face_count())
            - n(self.inner_loop_count())
    }
}

impl<K: Topology + ?Sized> TopologyExt for K {}
