//! Assembling the triangle kernel, and the edits every kernel has.

use super::{TriangleAdjacency, next};
use crate::TOP;
use crate::memory::Peak;
use crate::pairing::{Corners, Every, Links, pair_by_number, pair_by_vertices};
use crate::slots::Slots;
use merestone_topology::{
    Assemble, AssembleError, Compaction, EdgeId, EdgeUse, EditError, FaceId, FaceList,
    OrientedEdgeId, RemovedFace, VertexId,
};

impl TriangleAdjacency {
    /// The name errors and tables use.
    pub const NAME: &str = "triangle";
}

#[deny(clippy::missing_trait_methods)]
impl Assemble for TriangleAdjacency {
    fn assemble(list: FaceList<'_>) -> Result<Self, AssembleError> {
        list.check()?;
        match list.as_triangles() {
            Some(triangles) => from_triangles(list, triangles),
            None => {
                check_shapes(list)?;
                from_triangles(list, list.corners().as_chunks::<3>().0)
            }
        }
    }

    fn remove_face(&mut self, face: FaceId) -> Result<RemovedFace<EdgeId>, EditError> {
        self.remove(face)
    }

    fn remove_isolated_vertex(&mut self, vertex: VertexId) -> Result<(), EditError> {
        let index = vertex.to_u32();
        if !self.vertex_slots.is_live(index) {
            return Err(EditError::stale("vertex", vertex));
        }
        if let Some(side) = self.vertices.handle(index, 0) {
            let face = side as usize / 3;
            return Err(EditError::VertexInUse { vertex: index as usize, face });
        }
        self.vertex_slots.retire(index);
        Ok(())
    }

    fn compact(&mut self) -> Compaction<VertexId, EdgeId, FaceId, OrientedEdgeId> {
        self.compact_all()
    }
}

/// Refuses every face that is not one loop of three corners.
#[cold]
fn check_shapes(list: FaceList<'_>) -> Result<(), AssembleError> {
    let refuse = |face, what| AssembleError::CannotHold {
        kernel: TriangleAdjacency::NAME,
        face,
        what,
        advice: "use the half-edge kernel or split the face into triangles",
    };
    for face in 0..list.face_count() {
        let mut loops = list.loops(face);
        match (loops.next(), loops.next()) {
            (Some(l), _) if l.is_vertex_loop => {
                return Err(refuse(face, "bounded by a vertex loop"));
            }
            (_, Some(_)) => return Err(refuse(face, "which has inner loops")),
            (Some(l), None) if l.corners.len() != 3 => {
                return Err(refuse(face, "whose loop has not three corners"));
            }
            _ => {}
        }
    }
    Ok(())
}

fn from_triangles(
    list: FaceList<'_>,
    triangles: &[[u32; 3]],
) -> Result<TriangleAdjacency, AssembleError> {
    let mut peak = Peak::default();
    let mut mesh = TriangleAdjacency {
        turns: peak.held(vec![0; 3 * triangles.len()]),
        faces: Slots::new(triangles.len()),
        vertex_slots: Slots::new(list.vertex_count()),
        ..TriangleAdjacency::default()
    };
    let (corners, vertices) = (Every(triangles), list.vertex_count());
    let paired = match list.edge_uses() {
        None => pair_by_vertices(corners, vertices, &[], &mut mesh, &mut peak),
        Some(uses) => pair_by_number(corners, uses, vertices, &[], &mut mesh, &mut peak)?,
    };
    mesh.edge_count = paired.edges;
    mesh.vertices = paired.vertices;
    // Pairing asks for no vertex, so that the ends can take over what it sorted the corners in.
    let ends = triangles.iter().map(|&[a, b, c]| [b, c, a]);
    mesh.ends = peak.reused(paired.memory, ends);
    mesh.against = peak.held(against_sides(&paired.selves, list.edge_uses()));
    mesh.assembly_peak = peak.most();
    Ok(mesh)
}

/// Of the sides from a vertex to itself, given by vertex, those that run against their edge.
fn against_sides(selves: &[(u32, u32)], uses: Option<&[EdgeUse]>) -> Vec<u32> {
    let runs_against = |&(index, &(vertex, side)): &(usize, &(u32, u32))| match uses {
        Some(uses) => !uses[side as usize].runs_with_edge(),
        // With, against, with … in turn for the uses of each vertex's one such edge.
        None => (index - selves.partition_point(|&(at, _)| at < vertex)) % 2 == 1,
    };
    let found = || selves.iter().enumerate().filter(runs_against).map(|(_, &(_, side))| side);
    let mut against = Vec::with_capacity(found().count());
    against.extend(found());
    against.sort_unstable();
    against
}

impl Links for TriangleAdjacency {
    #[inline(always)]
    fn link(_twin: u32, behind: u32) -> u32 {
        behind
    }

    #[inline(always)]
    fn plain(&mut self, leaving: u32, link: u32) {
        self.turns[leaving as usize] = link;
    }

    #[inline(always)]
    fn behind(&self, _list: impl Corners, leaving: u32) -> u32 {
        self.turns[leaving as usize]
    }

    fn cycle(&mut self, uses: &[u32], is_plain: bool) {
        let bit = if is_plain { 0 } else { TOP };
        for (i, &side) in uses.iter().enumerate() {
            self.turns[side as usize] = next(uses[(i + 1) % uses.len()]) | bit;
        }
    }
}
