//! The steps.

use super::{Full, HalfEdge, face_id, oriented, vertex_id};
use crate::TOP;
use crate::cells::Cells;
use merestone_topology::{
    Costs, EdgeId, FaceBound, FaceId, Footprint, OrientedEdgeId, Topology, VertexId,
};

/// Steps answer for live ids only; a stale one is a caller's mistake that debug builds name.
macro_rules! lives {
    ($slots:expr, $id:expr) => {
        debug_assert!($slots.is_live($id.to_u32()), "{:?} does not live in this topology", $id)
    };
}

impl HalfEdge<Full> {
    #[cold]
    fn bound_aside(&self, entry: u32, i: usize) -> Option<FaceBound<OrientedEdgeId, VertexId>> {
        self.face_bounds.get(entry & !TOP).get(i).map(|&bound| as_bound(bound))
    }
}

/// A bound as the side table holds it.
pub(super) fn as_bound(bound: u32) -> FaceBound<OrientedEdgeId, VertexId> {
    if bound & TOP == 0 {
        FaceBound::EdgeLoop(oriented(bound))
    } else {
        FaceBound::VertexLoop(vertex_id(bound & !TOP))
    }
}

#[deny(clippy::missing_trait_methods)]
impl Topology for HalfEdge<Full> {
    type Vertex = VertexId;
    type Edge = EdgeId;
    type Face = FaceId;
    type OrientedEdge = OrientedEdgeId;

    type Vertices<'a> = Cells<'a, VertexId>;
    type Edges<'a> = Cells<'a, EdgeId>;
    type Faces<'a> = Cells<'a, FaceId>;
    type OrientedEdges<'a> = Cells<'a, OrientedEdgeId>;

    const COST: Costs = Costs::CONSTANT;

    #[inline]
    fn vertex_count(&self) -> usize {
        self.vertices.count()
    }
    #[inline]
    fn edge_count(&self) -> usize {
        self.edges.count()
    }
    #[inline]
    fn face_count(&self) -> usize {
        self.faces.count()
    }
    #[inline]
    fn oriented_edge_count(&self) -> usize {
        self.oriented_edges.count()
    }
    #[inline]
    fn inner_loop_count(&self) -> usize {
        self.inner_loops
    }

    #[inline]
    fn vertex_bound(&self) -> usize {
        self.vertices.bound()
    }
    #[inline]
    fn edge_bound(&self) -> usize {
        self.edges.bound()
    }
    #[inline]
    fn face_bound(&self) -> usize {
        self.faces.bound()
    }
    #[inline]
    fn oriented_edge_bound(&self) -> usize {
        self.oriented_edges.bound()
    }

    #[inline]
    fn vertex_at(&self, index: usize) -> Option<VertexId> {
        self.vertices.at(index).map(VertexId::from_u32)
    }
    #[inline]
    fn edge_at(&self, index: usize) -> Option<EdgeId> {
        self.edges.at(index).map(EdgeId::from_u32)
    }
    #[inline]
    fn face_at(&self, index: usize) -> Option<FaceId> {
        self.faces.at(index).map(FaceId::from_u32)
    }
    #[inline]
    fn oriented_edge_at(&self, index: usize) -> Option<OrientedEdgeId> {
        self.oriented_edges.at(index).map(OrientedEdgeId::from_u32)
    }

    #[inline]
    fn vertices(&self) -> Cells<'_, VertexId> {
        Cells::new(&self.vertices)
    }
    #[inline]
    fn edges(&self) -> Cells<'_, EdgeId> {
        Cells::new(&self.edges)
    }
    #[inline]
    fn faces(&self) -> Cells<'_, FaceId> {
        Cells::new(&self.faces)
    }
    #[inline]
    fn oriented_edges(&self) -> Cells<'_, OrientedEdgeId> {
        Cells::new(&self.oriented_edges)
    }

    #[inline]
    fn start(&self, h: OrientedEdgeId) -> VertexId {
        lives!(self.oriented_edges, h);
        vertex_id(self.links.start[h.to_u32() as usize])
    }
    #[inline]
    fn end(&self, h: OrientedEdgeId) -> VertexId {
        lives!(self.oriented_edges, h);
        // Where the edge is plain, the other use starts here: a walk around a vertex has loaded it.
        let radial = self.links.radial[h.to_u32() as usize];
        let behind = if radial < TOP { radial } else { self.links.next[h.to_u32() as usize] };
        VertexId::from_u32(self.links.start[behind as usize])
    }
    #[inline]
    fn next(&self, h: OrientedEdgeId) -> OrientedEdgeId {
        lives!(self.oriented_edges, h);
        oriented(self.links.next[h.to_u32() as usize])
    }
    #[inline]
    fn prev(&self, h: OrientedEdgeId) -> OrientedEdgeId {
        lives!(self.oriented_edges, h);
        oriented(self.links.prev[h.to_u32() as usize])
    }
    #[inline]
    fn radial(&self, h: OrientedEdgeId) -> OrientedEdgeId {
        lives!(self.oriented_edges, h);
        oriented(self.links.radial[h.to_u32() as usize] & !TOP)
    }
    #[inline]
    fn turn(&self, h: OrientedEdgeId) -> Option<OrientedEdgeId> {
        lives!(self.oriented_edges, h);
        let twin = self.links.radial[h.to_u32() as usize];
        if twin < TOP { Some(oriented(self.links.next[twin as usize])) } else { None }
    }
    #[inline]
    fn is_plain(&self, h: OrientedEdgeId) -> bool {
        lives!(self.oriented_edges, h);
        self.links.radial[h.to_u32() as usize] < TOP
    }
    #[inline]
    fn face(&self, h: OrientedEdgeId) -> FaceId {
        lives!(self.oriented_edges, h);
        face_id(self.links.face[h.to_u32() as usize])
    }
    #[inline]
    fn edge(&self, h: OrientedEdgeId) -> EdgeId {
        lives!(self.oriented_edges, h);
        EdgeId::from_u32(self.links.edge[h.to_u32() as usize] & !TOP)
    }
    #[inline]
    fn runs_with_edge(&self, h: OrientedEdgeId) -> bool {
        lives!(self.oriented_edges, h);
        self.links.edge[h.to_u32() as usize] < TOP
    }

    #[inline]
    fn edge_use(&self, e: EdgeId) -> OrientedEdgeId {
        lives!(self.edges, e);
        oriented(self.links.edge_use[e.to_u32() as usize])
    }

    #[inline]
    fn sector(&self, v: VertexId, i: usize) -> Option<OrientedEdgeId> {
        lives!(self.vertices, v);
        self.sectors.handle(v.to_u32(), i).map(oriented)
    }

    #[inline]
    fn vertex_loop(&self, v: VertexId, i: usize) -> Option<FaceId> {
        lives!(self.vertices, v);
        self.sectors.faces(v.to_u32()).get(i).map(|&f| face_id(f))
    }

    #[inline]
    fn bound(&self, f: FaceId, i: usize) -> Option<FaceBound<OrientedEdgeId, VertexId>> {
        lives!(self.faces, f);
        let entry = self.face[f.to_u32() as usize];
        if entry < TOP {
            return if i == 0 { Some(FaceBound::EdgeLoop(oriented(entry))) } else { None };
        }
        self.bound_aside(entry, i)
    }

    #[inline]
    fn triangle(&self, f: FaceId) -> Option<[OrientedEdgeId; 3]> {
        lives!(self.faces, f);
        let first = 3 * f.to_u32();
        self.in_threes.then(|| [first, first + 1, first + 2].map(oriented))
    }

    #[inline(always)]
    fn across(&self, h: OrientedEdgeId) -> FaceId {
        self.face(self.radial(h))
    }

    #[inline]
    fn index_buffer(&self) -> Option<&[[u32; 3]]> {
        self.in_threes.then(|| self.links.start.as_chunks::<3>().0)
    }

    fn footprint(&self) -> Footprint {
        self.exact_footprint()
    }
}
