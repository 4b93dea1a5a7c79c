//! Removing faces from the triangle kernel.

use super::TriangleAdjacency;
use crate::pairing::Links;
use crate::removal::Staying;
use crate::sectors::SectorSearch;
use merestone_topology::{EdgeId, EditError, FaceId, RemovedFace};

impl TriangleAdjacency {
    pub(super) fn remove(&mut self, face: FaceId) -> Result<RemovedFace<EdgeId>, EditError> {
        if !self.faces.is_live(face.to_u32()) {
            return Err(EditError::stale("face", face));
        }
        let staying = Staying::without(self, face);
        let mut removed = RemovedFace { retired_edges: Vec::new(), moved_edges: Vec::new() };
        for parted in staying.edges {
            let uses: Vec<u32> = parted.staying.iter().map(|h| h.to_u32()).collect();
            match uses.iter().min().map(|&lowest| EdgeId::from_u32(lowest)) {
                None => removed.retired_edges.push(parted.edge),
                Some(new) if new != parted.edge => removed.moved_edges.push((parted.edge, new)),
                Some(_) => {}
            }
            self.cycle(&uses, parted.is_plain);
        }
        self.edge_count -= removed.retired_edges.len();
        self.against.retain(|side| side / 3 != face.to_u32());
        self.faces.retire(face.to_u32());
        let mut search = SectorSearch::with_capacity(0);
        for (vertex, corners) in staying.vertices {
            let handles = search.handles(self, &corners);
            self.vertices.set(vertex.to_u32(), handles, &[]);
        }
        Ok(removed)
    }
}
