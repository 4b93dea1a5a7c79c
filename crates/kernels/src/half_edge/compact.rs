//! Compacting.

use super::{Full, HalfEdge};
use crate::TOP;
use crate::moves::Moves;
use crate::side::SideTable;
use crate::slots::Slots;
use merestone_topology::{Compaction, EdgeId, FaceId, OrientedEdgeId, VertexId};

impl HalfEdge<Full> {
    pub(super) fn compact_all(&mut self) -> Compaction<VertexId, EdgeId, FaceId, OrientedEdgeId> {
        let vertices = Moves::new(&self.vertices);
        let edges = Moves::new(&self.edges);
        let faces = Moves::new(&self.faces);
        let uses = Moves::new(&self.oriented_edges);

        let live_uses = &self.oriented_edges;
        let Full { next, prev, start, face, radial, edge, edge_use } = &mut self.links;
        for links in [next, prev, radial] {
            *links = Moves::squeeze(links, live_uses, |h| uses.link(h));
        }
        *start = Moves::squeeze(start, live_uses, |v| vertices.link(v));
        *face = Moves::squeeze(face, live_uses, |f| faces.link(f));
        *edge = Moves::squeeze(edge, live_uses, |e| edges.link(e));
        *edge_use = Moves::squeeze(edge_use, &self.edges, |h| uses.link(h));

        let mut bounds = SideTable::with_capacity(self.face_bounds.len());
        let mut owner = 0;
        self.face = Moves::squeeze(&self.face, &self.faces, |entry| {
            owner += 1;
            if entry < TOP {
                return uses.link(entry);
            }
            let list = self.face_bounds.get(entry & !TOP);
            let moved = list
                .iter()
                .map(|&bound| if bound < TOP { uses.link(bound) } else { vertices.link(bound) });
            bounds.push(owner - 1, (list.len(), moved)) | TOP
        });
        self.face_bounds = bounds;

        self.sectors.compact(&self.vertices, |h| uses.link(h), |f| faces.link(f));

        let moved = Compaction {
            vertices: vertices.correspondence(&self.vertices),
            edges: edges.correspondence(&self.edges),
            faces: faces.correspondence(&self.faces),
            oriented_edges: uses.correspondence(&self.oriented_edges),
        };
        for slots in
            [&mut self.vertices, &mut self.edges, &mut self.faces, &mut self.oriented_edges]
        {
            *slots = Slots::new(slots.count());
        }
        moved
    }
}
