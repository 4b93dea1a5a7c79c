//! The steps of the triangle kernel.

use super::{TriangleAdjacency, TriangleEdges, TriangleSides, next, prev};
use crate::TOP;
use crate::cells::Cells;
use crate::memory::array_bytes;
use merestone_topology::{
    ArrayBytes, Cost, Costs, EdgeId, FaceBound, FaceId, Footprint, OrientedEdgeId, Topology,
    VertexId,
};

type H = OrientedEdgeId;

impl TriangleAdjacency {
    /// Catches stale ids in debug builds; the side's number.
    #[inline(always)]
    #[track_caller]
    fn side(&self, h: H) -> u32 {
        let side = h.to_u32();
        debug_assert!(self.faces.is_live(side / 3), "oriented edge {h} does not live");
        side
    }
}

#[deny(clippy::missing_trait_methods)]
impl Topology for TriangleAdjacency {
    type Vertex = VertexId;
    type Edge = EdgeId;
    type Face = FaceId;
    type OrientedEdge = OrientedEdgeId;
    type Vertices<'a> = Cells<'a, VertexId>;
    type Edges<'a> = TriangleEdges<'a>;
    type Faces<'a> = Cells<'a, FaceId>;
    type OrientedEdges<'a> = TriangleSides<'a>;

    const COST: Costs = Costs { prev: Cost::Constant, face: Cost::Constant, edge: Cost::Uses };

    fn vertex_count(&self) -> usize {
        self.vertex_slots.count()
    }

    fn edge_count(&self) -> usize {
        self.edge_count
    }

    fn face_count(&self) -> usize {
        self.faces.count()
    }

    fn oriented_edge_count(&self) -> usize {
        3 * self.faces.count()
    }

    fn inner_loop_count(&self) -> usize {
        0
    }

    #[inline]
    fn vertex_bound(&self) -> usize {
        self.vertex_slots.bound()
    }

    #[inline]
    fn edge_bound(&self) -> usize {
        self.turns.len()
    }

    #[inline]
    fn face_bound(&self) -> usize {
        self.faces.bound()
    }

    #[inline]
    fn oriented_edge_bound(&self) -> usize {
        self.turns.len()
    }

    fn vertex_at(&self, index: usize) -> Option<VertexId> {
        self.vertex_slots.at(index).map(VertexId::from_u32)
    }

    fn edge_at(&self, index: usize) -> Option<EdgeId> {
        self.faces.at(index / 3)?;
        let side = index as u32;
        (self.lowest_of(side) == side).then(|| EdgeId::from_u32(side))
    }

    fn face_at(&self, index: usize) -> Option<FaceId> {
        self.faces.at(index).map(FaceId::from_u32)
    }

    fn oriented_edge_at(&self, index: usize) -> Option<H> {
        self.faces.at(index / 3).map(|_| H::from_u32(index as u32))
    }

    fn vertices(&self) -> Self::Vertices<'_> {
        Cells::new(&self.vertex_slots)
    }

    fn edges(&self) -> Self::Edges<'_> {
        TriangleEdges::new(self)
    }

    fn faces(&self) -> Self::Faces<'_> {
        Cells::new(&self.faces)
    }

    fn oriented_edges(&self) -> Self::OrientedEdges<'_> {
        TriangleSides::new(&self.faces)
    }

    #[inline(always)]
    fn start(&self, h: H) -> VertexId {
        VertexId::from_u32(self.start_of(self.side(h)))
    }

    #[inline(always)]
    fn end(&self, h: H) -> VertexId {
        VertexId::from_u32(self.end_of(self.side(h)))
    }

    #[inline(always)]
    fn next(&self, h: H) -> H {
        H::from_u32(next(self.side(h)))
    }

    #[inline(always)]
    fn prev(&self, h: H) -> H {
        H::from_u32(prev(self.side(h)))
    }

    #[inline(always)]
    fn radial(&self, h: H) -> H {
        H::from_u32(self.radial_of(self.side(h)))
    }

    #[inline(always)]
    fn turn(&self, h: H) -> Option<H> {
        let turn = self.turns[self.side(h) as usize];
        if turn < TOP { Some(H::from_u32(turn)) } else { None }
    }

    #[inline(always)]
    fn is_plain(&self, h: H) -> bool {
        self.turns[self.side(h) as usize] < TOP
    }

    #[inline(always)]
    fn face(&self, h: H) -> FaceId {
        FaceId::from_u32(self.side(h) / 3)
    }

    #[inline]
    fn edge(&self, h: H) -> EdgeId {
        EdgeId::from_u32(self.lowest_of(self.side(h)))
    }

    fn runs_with_edge(&self, h: H) -> bool {
        let side = self.side(h);
        self.run_alike(side, self.lowest_of(side))
    }

    #[inline]
    fn edge_use(&self, e: EdgeId) -> H {
        H::from_u32(e.to_u32())
    }

    #[inline]
    fn sector(&self, v: VertexId, i: usize) -> Option<H> {
        debug_assert!(self.vertex_slots.is_live(v.to_u32()), "vertex {v} does not live");
        self.vertices.handle(v.to_u32(), i).map(H::from_u32)
    }

    #[inline(always)]
    fn vertex_loop(&self, v: VertexId, _i: usize) -> Option<FaceId> {
        debug_assert!(self.vertex_slots.is_live(v.to_u32()), "vertex {v} does not live");
        None
    }

    #[inline(always)]
    fn bound(&self, f: FaceId, i: usize) -> Option<FaceBound<H, VertexId>> {
        debug_assert!(self.faces.is_live(f.to_u32()), "face {f} does not live");
        if i == 0 { Some(FaceBound::EdgeLoop(H::from_u32(3 * f.to_u32()))) } else { None }
    }

    #[inline(always)]
    fn triangle(&self, f: FaceId) -> Option<[H; 3]> {
        debug_assert!(self.faces.is_live(f.to_u32()), "face {f} does not live");
        let side = 3 * f.to_u32();
        Some([H::from_u32(side), H::from_u32(side + 1), H::from_u32(side + 2)])
    }

    #[inline(always)]
    fn across(&self, h: H) -> FaceId {
        // The turn lies in the same triangle as the radial it follows.
        FaceId::from_u32((self.turns[self.side(h) as usize] & !TOP) / 3)
    }

    #[inline(always)]
    fn index_buffer(&self) -> Option<&[[u32; 3]]> {
        Some(&self.ends)
    }

    fn footprint(&self) -> Footprint {
        let (faces, vertices) = (self.faces.retired(), self.vertex_slots.retired());
        let exact = |name, bytes| ArrayBytes { name, bytes, retired: 0 };
        let arrays = vec![
            array_bytes("ends", &self.ends, faces),
            array_bytes("turns", &self.turns, 3 * faces),
            ArrayBytes {
                name: "sectors",
                bytes: self.vertices.entry_bytes(),
                retired: vertices * size_of::<u32>(),
            },
            exact("further sectors", self.vertices.list_bytes()),
            array_bytes("self-edge directions", &self.against, 0),
            exact("live faces", self.faces.bytes()),
            exact("live vertices", self.vertex_slots.bytes()),
        ];
        Footprint { arrays, assembly_peak: self.assembly_peak }
    }
}
