//! A kernel whose edges are places, over the reference: an edge is named by its lowest use.

use crate::conformance::Reference;
use crate::*;
use std::collections::BTreeMap;

#[derive(Clone, Debug)]
pub(super) struct Placed(Reference);

impl Placed {
    fn place(&self, e: EdgeId) -> EdgeId {
        let lowest = self.0.edges[&e].iter().min().copied();
        EdgeId::from_u32(lowest.map_or(0, OrientedEdgeId::to_u32))
    }

    fn record(&self, place: EdgeId) -> EdgeId {
        self.0.edge(OrientedEdgeId::from_u32(place.to_u32()))
    }

    fn places(&self) -> BTreeMap<EdgeId, EdgeId> {
        self.0.edges().map(|e| (e, self.place(e))).collect()
    }
}

macro_rules! same_as_reference {
    ($(fn $name:ident(&self $(, $arg:ident: $kind:ty)?) -> $answer:ty;)*) => {
        $(fn $name(&self $(, $arg: $kind)?) -> $answer {
            self.0.$name($($arg)?)
        })*
    };
}

#[deny(clippy::missing_trait_methods)]
impl Topology for Placed {
    type Vertex = VertexId;
    type Edge = EdgeId;
    type Face = FaceId;
    type OrientedEdge = OrientedEdgeId;
    type Vertices<'a> = std::vec::IntoIter<VertexId>;
    type Edges<'a> = std::vec::IntoIter<EdgeId>;
    type Faces<'a> = std::vec::IntoIter<FaceId>;
    type OrientedEdges<'a> = std::vec::IntoIter<OrientedEdgeId>;

    const COST: Costs = Costs { prev: Cost::Loop, face: Cost::Constant, edge: Cost::Uses };

    same_as_reference! {
        fn vertex_count(&self) -> usize;
        fn edge_count(&self) -> usize;
        fn face_count(&self) -> usize;
        fn oriented_edge_count(&self) -> usize;
        fn inner_loop_count(&self) -> usize;
        fn vertex_bound(&self) -> usize;
        fn face_bound(&self) -> usize;
        fn oriented_edge_bound(&self) -> usize;
        fn vertex_at(&self, index: usize) -> Option<VertexId>;
        fn face_at(&self, index: usize) -> Option<FaceId>;
        fn oriented_edge_at(&self, index: usize) -> Option<OrientedEdgeId>;
        fn vertices(&self) -> std::vec::IntoIter<VertexId>;
        fn faces(&self) -> std::vec::IntoIter<FaceId>;
        fn oriented_edges(&self) -> std::vec::IntoIter<OrientedEdgeId>;
        fn start(&self, h: OrientedEdgeId) -> VertexId;
        fn end(&self, h: OrientedEdgeId) -> VertexId;
        fn next(&self, h: OrientedEdgeId) -> OrientedEdgeId;
        fn prev(&self, h: OrientedEdgeId) -> OrientedEdgeId;
        fn radial(&self, h: OrientedEdgeId) -> OrientedEdgeId;
        fn turn(&self, h: OrientedEdgeId) -> Option<OrientedEdgeId>;
        fn is_plain(&self, h: OrientedEdgeId) -> bool;
        fn face(&self, h: OrientedEdgeId) -> FaceId;
        fn triangle(&self, f: FaceId) -> Option<[OrientedEdgeId; 3]>;
        fn across(&self, h: OrientedEdgeId) -> FaceId;
        fn index_buffer(&self) -> Option<&[[u32; 3]]>;
        fn footprint(&self) -> Footprint;
    }

    fn edge_bound(&self) -> usize {
        self.0.oriented_edge_bound()
    }

    fn edge_at(&self, index: usize) -> Option<EdgeId> {
        let place = self.0.edge(self.0.oriented_edge_at(index)?);
        Some(self.place(place)).filter(|e| e.index() == index)
    }

    fn edges(&self) -> std::vec::IntoIter<EdgeId> {
        let mut places: Vec<EdgeId> = self.places().into_values().collect();
        places.sort_unstable();
        places.into_iter()
    }

    fn edge(&self, h: OrientedEdgeId) -> EdgeId {
        self.place(self.0.edge(h))
    }

    /// An edge runs as its lowest use does: after a removal perhaps the other way.
    fn runs_with_edge(&self, h: OrientedEdgeId) -> bool {
        let lowest = OrientedEdgeId::from_u32(self.edge(h).to_u32());
        self.0.runs_with_edge(h) == self.0.runs_with_edge(lowest)
    }

    fn edge_use(&self, e: EdgeId) -> OrientedEdgeId {
        OrientedEdgeId::from_u32(e.to_u32())
    }

    fn sector(&self, v: VertexId, i: usize) -> Option<OrientedEdgeId> {
        self.0.sector(v, i)
    }

    fn vertex_loop(&self, v: VertexId, i: usize) -> Option<FaceId> {
        self.0.vertex_loop(v, i)
    }

    fn bound(&self, f: FaceId, i: usize) -> Option<FaceBound<OrientedEdgeId, VertexId>> {
        self.0.bound(f, i)
    }
}

#[deny(clippy::missing_trait_methods)]
impl Assemble for Placed {
    fn assemble(list: FaceList<'_>) -> Result<Self, AssembleError> {
        Reference::assemble(list).map(Self)
    }

    fn remove_face(&mut self, face: FaceId) -> Result<RemovedFace<EdgeId>, EditError> {
        let before = self.places();
        let removed = self.0.remove_face(face)?;
        let moved = self.places().into_iter().map(|(e, place)| (before[&e], place));
        Ok(RemovedFace {
            retired_edges: removed.retired_edges.iter().map(|e| before[e]).collect(),
            moved_edges: moved.filter(|(old, new)| old != new).collect(),
        })
    }

    fn remove_isolated_vertex(&mut self, vertex: VertexId) -> Result<(), EditError> {
        self.0.remove_isolated_vertex(vertex)
    }

    fn compact(&mut self) -> Compaction<VertexId, EdgeId, FaceId, OrientedEdgeId> {
        let mut targets = vec![None; self.edge_bound()];
        let places: Vec<EdgeId> = self.edges().collect();
        let records: Vec<EdgeId> = places.iter().map(|&place| self.record(place)).collect();
        let moved = self.0.compact();
        for (place, record) in places.into_iter().zip(records) {
            targets[place.index()] = moved.edges.get(record).map(|e| self.place(e));
        }
        let edges = Correspondence::new(targets, self.edge_bound());
        Compaction { edges, ..moved }
    }
}
