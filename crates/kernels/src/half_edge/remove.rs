//! Removing faces and isolated vertices.

use super::{Full, HalfEdge};
use crate::TOP;
use crate::pairing::Links;
use crate::removal::Staying;
use crate::sectors::SectorSearch;
use merestone_topology::{
    EdgeId, EditError, FaceId, OrientedEdgeId, RemovedFace, Topology, TopologyExt, VertexId,
};

impl HalfEdge<Full> {
    pub(super) fn remove(&mut self, face: FaceId) -> Result<RemovedFace<EdgeId>, EditError> {
        if !self.has_face(face) {
            return Err(EditError::stale("face", face));
        }
        let inner_loops = self.face_bounds(face).count() - 1;
        let corners: Vec<OrientedEdgeId> = self.face_corners(face).collect();
        let staying = Staying::without(self, face);

        let mut retired_edges = Vec::new();
        for parted in staying.edges {
            let uses: Vec<u32> = parted.staying.iter().map(|h| h.to_u32()).collect();
            self.cycle(&uses, parted.is_plain);
            match uses.first() {
                Some(&first) => self.keep_use(parted.edge, first, face),
                None => {
                    self.edges.retire(parted.edge.to_u32());
                    retired_edges.push(parted.edge);
                }
            }
        }
        for &h in &corners {
            self.oriented_edges.retire(h.to_u32());
        }
        self.faces.retire(face.to_u32());
        self.inner_loops -= inner_loops;
        self.drop_bounds(face.to_u32());

        let mut search = SectorSearch::with_capacity(0);
        for (vertex, corners) in staying.vertices {
            let vertex = vertex.to_u32();
            let faces = self.sectors.faces(vertex).iter().copied();
            let faces: Vec<u32> = faces.filter(|&other| other != face.to_u32()).collect();
            let handles = search.handles(self, &corners);
            self.sectors.set(vertex, handles, &faces);
        }
        Ok(RemovedFace { retired_edges, moved_edges: Vec::new() })
    }

    pub(super) fn remove_isolated(&mut self, vertex: VertexId) -> Result<(), EditError> {
        if !self.has_vertex(vertex) {
            return Err(EditError::stale("vertex", vertex));
        }
        let user = self.sector(vertex, 0).map(|h| self.face(h));
        if let Some(face) = user.or_else(|| self.vertex_loop(vertex, 0)) {
            let (vertex, face) = (vertex.to_u32() as usize, face.to_u32() as usize);
            return Err(EditError::VertexInUse { vertex, face });
        }
        self.vertices.retire(vertex.to_u32());
        Ok(())
    }

    /// Lets `staying` stand for `edge` where a use of the leaving face does.
    fn keep_use(&mut self, edge: EdgeId, staying: u32, leaving: FaceId) {
        if self.face(self.edge_use(edge)) == leaving {
            self.links.edge_use[edge.to_u32() as usize] = staying;
        }
    }

    /// Takes the bounds of a face out of the side table, if it has any there.
    fn drop_bounds(&mut self, face: u32) {
        let entry = self.face[face as usize];
        if entry >= TOP
            && let Some(moved) = self.face_bounds.remove(entry & !TOP)
        {
            self.face[moved as usize] = entry;
        }
    }
}
