//! Dropping the retired slots of the triangle kernel.

use super::{LOOSE, TriangleAdjacency};
use crate::slots::Slots;
use merestone_topology::{
    Compaction, Correspondence, EdgeId, FaceId, OrientedEdgeId, Topology, VertexId,
};

impl TriangleAdjacency {
    pub(super) fn compact_all(&mut self) -> Compaction<VertexId, EdgeId, FaceId, OrientedEdgeId> {
        let vertices = self.vertex_slots.moves(VertexId::from_u32);
        let faces = self.faces.moves(FaceId::from_u32);
        let new_side =
            |side: u32| faces.targets()[side as usize / 3].map(|face| 3 * face.to_u32() + side % 3);
        let moved = |side: u32| new_side(side).unwrap_or(side);
        let sides = 0..self.turns.len() as u32;
        let new_bound = 3 * self.faces.count();
        let oriented_edges = sides.clone().map(|s| new_side(s).map(OrientedEdgeId::from_u32));
        let oriented_edges = Correspondence::new(oriented_edges.collect(), new_bound);
        let edges = sides.map(|s| {
            let edge = self.edge_at(s as usize)?;
            new_side(edge.to_u32()).map(EdgeId::from_u32)
        });
        let edges = Correspondence::new(edges.collect(), new_bound);

        let live = |t: usize| self.faces.is_live(t as u32);
        let new_vertex = |v: u32| vertices.targets()[v as usize].map_or(v, VertexId::to_u32);
        let ends = self.ends.iter().enumerate().filter(|&(t, _)| live(t));
        self.ends = ends.map(|(_, ends)| ends.map(new_vertex)).collect();
        let turns = self.turns.iter().enumerate().filter(|&(s, _)| live(s / 3));
        self.turns = turns.map(|(_, turn)| moved(turn & !LOOSE) | turn & LOOSE).collect();
        self.against.iter_mut().for_each(|side| *side = moved(*side));
        self.ends.shrink_to_fit();
        self.turns.shrink_to_fit();
        self.against.shrink_to_fit();
        self.vertices.compact(&self.vertex_slots, new_vertex, moved);
        self.vertex_slots = Slots::new(self.vertex_slots.count());
        self.faces = Slots::new(self.faces.count());
        Compaction { vertices, edges, faces, oriented_edges }
    }
}
