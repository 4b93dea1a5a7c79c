//! [`Topology`] of the reference: each step read off the lists.

use super::{ListedBound, Reference, after, before};
use crate::{
    ArrayBytes, Cost, Costs, EdgeId, FaceBound, FaceId, Footprint, OrientedEdgeId, Topology,
    VertexId,
};
use std::vec::IntoIter;

#[deny(clippy::missing_trait_methods)]
impl Topology for Reference {
    type Vertex = VertexId;
    type Edge = EdgeId;
    type Face = FaceId;
    type OrientedEdge = OrientedEdgeId;

    type Vertices<'a> = IntoIter<VertexId>;
    type Edges<'a> = IntoIter<EdgeId>;
    type Faces<'a> = IntoIter<FaceId>;
    type OrientedEdges<'a> = IntoIter<OrientedEdgeId>;

    const COST: Costs = Costs { prev: Cost::Loop, face: Cost::Constant, edge: Cost::Constant };

    fn vertex_count(&self) -> usize {
        self.vertices.len()
    }

    fn edge_count(&self) -> usize {
        self.edges.len()
    }

    fn face_count(&self) -> usize {
        self.faces.len()
    }

    fn oriented_edge_count(&self) -> usize {
        self.uses.len()
    }

    fn inner_loop_count(&self) -> usize {
        self.faces.values().map(|bounds| bounds.len() - 1).sum()
    }

    fn vertex_bound(&self) -> usize {
        self.bounds.vertices
    }

    fn edge_bound(&self) -> usize {
        self.bounds.edges
    }

    fn face_bound(&self) -> usize {
        self.bounds.faces
    }

    fn oriented_edge_bound(&self) -> usize {
        self.bounds.oriented_edges
    }

    fn vertex_at(&self, index: usize) -> Option<VertexId> {
        VertexId::new(index).ok().filter(|v| self.vertices.contains(v))
    }

    fn edge_at(&self, index: usize) -> Option<EdgeId> {
        EdgeId::new(index).ok().filter(|e| self.edges.contains_key(e))
    }

    fn face_at(&self, index: usize) -> Option<FaceId> {
        FaceId::new(index).ok().filter(|f| self.faces.contains_key(f))
    }

    fn oriented_edge_at(&self, index: usize) -> Option<OrientedEdgeId> {
        OrientedEdgeId::new(index).ok().filter(|h| self.uses.contains_key(h))
    }

    fn vertices(&self) -> IntoIter<VertexId> {
        self.vertices.iter().copied().collect::<Vec<_>>().into_iter()
    }

    fn edges(&self) -> IntoIter<EdgeId> {
        self.edges.keys().copied().collect::<Vec<_>>().into_iter()
    }

    fn faces(&self) -> IntoIter<FaceId> {
        self.faces.keys().copied().collect::<Vec<_>>().into_iter()
    }

    fn oriented_edges(&self) -> IntoIter<OrientedEdgeId> {
        self.uses.keys().copied().collect::<Vec<_>>().into_iter()
    }

    fn start(&self, h: OrientedEdgeId) -> VertexId {
        self.record(h).start
    }

    fn end(&self, h: OrientedEdgeId) -> VertexId {
        self.record(self.next(h)).start
    }

    fn next(&self, h: OrientedEdgeId) -> OrientedEdgeId {
        after(self.loop_through(h), h).unwrap_or(h)
    }

    fn prev(&self, h: OrientedEdgeId) -> OrientedEdgeId {
        before(self.loop_through(h), h).unwrap_or(h)
    }

    fn radial(&self, h: OrientedEdgeId) -> OrientedEdgeId {
        after(self.uses_beside(h), h).unwrap_or(h)
    }

    fn turn(&self, h: OrientedEdgeId) -> Option<OrientedEdgeId> {
        self.is_plain(h).then(|| self.next(self.radial(h)))
    }

    fn is_plain(&self, h: OrientedEdgeId) -> bool {
        match *self.uses_beside(h) {
            [a, b] => self.record(a).with != self.record(b).with,
            _ => false,
        }
    }

    fn face(&self, h: OrientedEdgeId) -> FaceId {
        self.record(h).face
    }

    fn edge(&self, h: OrientedEdgeId) -> EdgeId {
        self.record(h).edge
    }

    fn runs_with_edge(&self, h: OrientedEdgeId) -> bool {
        self.record(h).with
    }

    fn edge_use(&self, e: EdgeId) -> OrientedEdgeId {
        self.edges[&e][0]
    }

    fn sector(&self, v: VertexId, i: usize) -> Option<OrientedEdgeId> {
        self.sectors.get(&v)?.get(i).map(|sector| sector.corners[0].corner)
    }

    fn vertex_loop(&self, v: VertexId, i: usize) -> Option<FaceId> {
        self.vertex_loops_at(v).get(i).copied()
    }

    fn bound(&self, f: FaceId, i: usize) -> Option<FaceBound<OrientedEdgeId, VertexId>> {
        self.faces[&f].get(i).map(|bound| match bound {
            ListedBound::EdgeLoop(corners) => FaceBound::EdgeLoop(corners[0]),
            ListedBound::VertexLoop(v) => FaceBound::VertexLoop(*v),
        })
    }

    fn triangle(&self, f: FaceId) -> Option<[OrientedEdgeId; 3]> {
        match &self.faces[&f][..] {
            [ListedBound::EdgeLoop(corners)] => corners[..].try_into().ok(),
            _ => None,
        }
    }

    fn across(&self, h: OrientedEdgeId) -> FaceId {
        self.face(self.radial(h))
    }

    fn index_buffer(&self) -> Option<&[[u32; 3]]> {
        None
    }

    /// The payload of the lists: what the maps' own nodes take on top is not counted.
    fn footprint(&self) -> Footprint {
        let array = |name, bytes| ArrayBytes { name, bytes, retired: 0 };
        let use_bytes = size_of::<OrientedEdgeId>() + size_of::<super::Use>();
        let arrays = vec![
            array("vertices", self.vertices.len() * size_of::<VertexId>()),
            array("edges", self.edges.len() * size_of::<EdgeId>() + 4 * self.uses.len()),
            array("faces", self.faces.len() * size_of::<FaceId>() + 4 * self.uses.len()),
            array("oriented edges", self.uses.len() * use_bytes),
        ];
        let assembly_peak = arrays.iter().map(|array| array.bytes).sum();
        Footprint { arrays, assembly_peak }
    }
}
