//! Dropping the retired slots of the triangle kernel.

use super::TriangleAdjacency;
use crate::TOP;
use crate::moves::Moves;
use crate::slots::Slots;
use merestone_topology::{
    Compaction, Correspondence, EdgeId, FaceId, OrientedEdgeId, Topology, VertexId,
};

impl TriangleAdjacency {
    pub(super) fn compact_all(&mut self) -> Compaction<VertexId, EdgeId, FaceId, OrientedEdgeId> {
        let vertices = Moves::new(&self.vertex_slots);
        let faces = Moves::new(&self.faces);
        // A side keeps its place in its triangle, a turn its top bit.
        let moved = |link: u32| {
            let side = link & !TOP;
            (3 * faces.link(side / 3) + side % 3) | (link & TOP)
        };
        let new_side = |side: u32| self.faces.is_live(side / 3).then(|| moved(side));
        let sides = 0..self.turns.len() as u32;
        let new_bound = 3 * self.faces.count();
        let oriented_edges = sides.clone().map(|s| new_side(s).map(OrientedEdgeId::from_u32));
        let oriented_edges = Correspondence::new(oriented_edges.collect(), new_bound);
        let edges = sides.map(|s| {
            let edge = self.edge_at(s as usize)?;
            new_side(edge.to_u32()).map(EdgeId::from_u32)
        });
        let edges = Correspondence::new(edges.collect(), new_bound);

        self.ends = Moves::squeeze(&self.ends, &self.faces, |ends| ends.map(|v| vertices.link(v)));
        let turns = self.turns.as_chunks::<3>().0;
        let turns = Moves::squeeze(turns, &self.faces, |turns| turns.map(moved));
        self.turns = turns.into_flattened();
        self.against.iter_mut().for_each(|side| *side = moved(*side));
        self.against.shrink_to_fit();
        self.vertices.compact(&self.vertex_slots, moved, |face| faces.link(face));
        let moves = Compaction {
            vertices: vertices.correspondence(&self.vertex_slots),
            edges,
            faces: faces.correspondence(&self.faces),
            oriented_edges,
        };
        self.vertex_slots = Slots::new(self.vertex_slots.count());
        self.faces = Slots::new(self.faces.count());
        moves
    }
}
