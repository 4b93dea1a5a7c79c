//! Removing faces from the triangle kernel.

use super::TriangleAdjacency;
use crate::sectors::SectorSearch;
use merestone_topology::{
    EdgeId, EditError, FaceId, OrientedEdgeId, RemovedFace, TopologyExt, VertexId,
};

impl TriangleAdjacency {
    pub(super) fn remove(&mut self, face: FaceId) -> Result<RemovedFace<EdgeId>, EditError> {
        if !self.faces.is_live(face.to_u32()) {
            return Err(EditError::stale("face", face));
        }
        let sides = [0, 1, 2].map(|i| 3 * face.to_u32() + i);
        let mut vertices = sides.map(|side| self.start_of(side)).to_vec();
        vertices.sort_unstable();
        vertices.dedup();
        // The corners that stay, asked for while the links still lead to all of them.
        let staying: Vec<Vec<OrientedEdgeId>> = vertices
            .iter()
            .map(|&v| {
                let mut corners: Vec<_> = self
                    .vertex_corners(VertexId::from_u32(v))
                    .filter(|h| !sides.contains(&h.to_u32()))
                    .collect();
                corners.sort_unstable();
                corners
            })
            .collect();

        let mut removed = RemovedFace { retired_edges: Vec::new(), moved_edges: Vec::new() };
        // All cycles before any is relinked: a second side on the same edge would not find back.
        let cycles = sides.map(|side| {
            let mut uses: Vec<u32> = self.uses_of(side).collect();
            uses.sort_unstable();
            uses
        });
        for (i, mut uses) in cycles.into_iter().enumerate() {
            if sides[..i].iter().any(|earlier| uses.contains(earlier)) {
                // The face uses this edge twice, and it was unlinked with the first of them.
                continue;
            }
            let lowest = uses[0];
            uses.retain(|used| !sides.contains(used));
            match uses.first() {
                None => removed.retired_edges.push(EdgeId::from_u32(lowest)),
                Some(&new) if new != lowest => {
                    removed.moved_edges.push((EdgeId::from_u32(lowest), EdgeId::from_u32(new)));
                }
                Some(_) => {}
            }
            self.link_cycle(&uses);
        }
        self.edge_count -= removed.retired_edges.len();
        self.against.retain(|side| !sides.contains(side));
        self.faces.retire(face.to_u32());
        let mut search = SectorSearch::with_capacity(0);
        for (&v, corners) in vertices.iter().zip(&staying) {
            let handles = search.handles(self, corners);
            self.vertices.set(v, handles);
        }
        Ok(removed)
    }
}
