//! Removing faces and isolated vertices.

use super::{Full, HalfEdge, TOP};
use crate::sectors::SectorSearch;
use merestone_topology::{
    EdgeId, EditError, FaceId, OrientedEdgeId, RemovedFace, Topology, TopologyExt, VertexId,
};

impl HalfEdge<Full> {
    pub(super) fn remove(&mut self, face: FaceId) -> Result<RemovedFace<EdgeId>, EditError> {
        if !self.has_face(face) {
            return Err(EditError::stale("face", face));
        }
        let bounds: Vec<_> = self.face_bounds(face).collect();
        let corners: Vec<OrientedEdgeId> = self.face_corners(face).collect();
        let mut vertices: Vec<VertexId> = self.face_vertices(face).collect();
        vertices.sort_unstable();
        vertices.dedup();
        // What stays is gathered while the walks still find it.
        let staying: Vec<_> =
            vertices.iter().map(|&v| (v, self.staying_corners(v, face))).collect();

        let retired_edges = self.unlink(&corners);
        for &h in &corners {
            self.oriented_edges.retire(h.to_u32());
        }
        self.faces.retire(face.to_u32());
        self.inner_loops -= bounds.len() - 1;
        self.drop_bounds(face.to_u32());

        let mut search = SectorSearch::with_capacity(0);
        for (v, corners) in staying {
            let entry = self.vertex[v.to_u32() as usize];
            let faces: Vec<u32> = self
                .uses_aside(entry)
                .1
                .iter()
                .copied()
                .filter(|&other| other != face.to_u32())
                .collect();
            let handles = search.handles(self, &corners);
            self.set_vertex(v.to_u32(), handles, &faces);
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

    fn staying_corners(&self, v: VertexId, leaving: FaceId) -> Vec<OrientedEdgeId> {
        let mut corners: Vec<_> =
            self.vertex_corners(v).filter(|&corner| self.face(corner) != leaving).collect();
        corners.sort_unstable();
        corners
    }

    /// Takes uses out of their radial cycles. Returns the edges left without one, retired,
    /// ascending.
    fn unlink(&mut self, uses: &[OrientedEdgeId]) -> Vec<EdgeId> {
        let mut retired = Vec::new();
        for &h in uses {
            let edge = self.edge(h);
            let behind = self.radial(h);
            if behind == h {
                self.edges.retire(edge.to_u32());
                retired.push(edge);
                continue;
            }
            let before = self.edge_uses(edge).find(|&other| self.radial(other) == h);
            let Some(before) = before else { continue };
            self.links.radial[before.to_u32() as usize] = behind.to_u32() | TOP;
            self.links.edge_use[edge.to_u32() as usize] = before.to_u32();
            self.mark_plain(before.to_u32());
        }
        retired.sort_unstable();
        retired
    }

    /// Clears the top bits of the edge of `h` if it has become plain; all are set before.
    fn mark_plain(&mut self, h: u32) {
        let Full { radial, edge, .. } = &mut self.links;
        let other = radial[h as usize] & !TOP;
        let is_two = other != h && radial[other as usize] & !TOP == h;
        if is_two && (edge[h as usize] ^ edge[other as usize]) & TOP != 0 {
            radial[h as usize] = other;
            radial[other as usize] = h;
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
