//! Assembling the triangle kernel, and the edits every kernel has.

use super::{LOOSE, TriangleAdjacency, next, prev};
use crate::pairing::{self, Corners, Links};
use crate::slots::Slots;
use crate::vertex_table::VertexTable;
use merestone_topology::{
    Assemble, AssembleError, Compaction, EdgeId, EdgeUse, EditError, FaceId, FaceList,
    OrientedEdgeId, RemovedFace, Topology, VertexId,
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
    let mut mesh = TriangleAdjacency {
        ends: triangles.iter().map(|&[a, b, c]| [b, c, a]).collect(),
        turns: vec![0; 3 * triangles.len()],
        vertices: VertexTable::isolated(list.vertex_count()),
        against: against_sides(list, triangles),
        vertex_slots: Slots::new(list.vertex_count()),
        faces: Slots::new(triangles.len()),
        edge_count: 0,
        assembly_peak: 0,
    };
    let held = mesh.footprint().bytes();
    let corners = Sides { triangles };
    let paired = match list.edge_uses() {
        None => pairing::pair_by_vertices(corners, list.vertex_count(), &mut mesh),
        Some(uses) => pairing::pair_by_number(corners, list.vertex_count(), uses, &mut mesh)?,
    };
    mesh.edge_count = paired.edges;
    mesh.assembly_peak = (held + paired.scratch).max(mesh.footprint().bytes());
    Ok(mesh)
}

/// The sides from a vertex to itself that run against their edge.
fn against_sides(list: FaceList<'_>, triangles: &[[u32; 3]]) -> Vec<u32> {
    let mut selves: Vec<(u32, u32)> = Vec::new();
    for (t, &[a, b, c]) in triangles.iter().enumerate() {
        if a == b || b == c || c == a {
            for (i, (start, end)) in [(a, b), (b, c), (c, a)].into_iter().enumerate() {
                if start == end {
                    selves.push((start, 3 * t as u32 + i as u32));
                }
            }
        }
    }
    let mut against: Vec<u32> = match list.edge_uses() {
        Some(uses) => {
            let runs_against = |side: &u32| !EdgeUse::runs_with_edge(uses[*side as usize]);
            selves.iter().map(|&(_, side)| side).filter(runs_against).collect()
        }
        None => {
            // With, against, with … in turn for the uses of each vertex's one such edge.
            selves.sort_unstable();
            selves
                .chunk_by(|a, b| a.0 == b.0)
                .flat_map(|sides| sides.iter().skip(1).step_by(2).map(|&(_, side)| side))
                .collect()
        }
    };
    against.sort_unstable();
    against.shrink_to_fit();
    against
}

/// The corners of a triangle list.
#[derive(Clone, Copy)]
struct Sides<'a> {
    triangles: &'a [[u32; 3]],
}

impl Corners for Sides<'_> {
    fn count(self) -> usize {
        3 * self.triangles.len()
    }

    #[inline(always)]
    fn prev(self, c: u32) -> u32 {
        prev(c)
    }

    #[inline(always)]
    fn for_each(self, mut f: impl FnMut(u32, u32, u32, u32)) {
        let mut side = 0;
        for &[a, b, c] in self.triangles {
            f(side, c, a, b);
            f(side + 1, a, b, c);
            f(side + 2, b, c, a);
            side += 3;
        }
    }
}

impl Links for TriangleAdjacency {
    #[inline(always)]
    fn turn_to(&mut self, leaving: u32, behind: u32) {
        self.turns[leaving as usize] = behind;
    }

    fn cycle(&mut self, uses: &[u32], is_plain: bool) {
        let loose = if is_plain { 0 } else { LOOSE };
        for (i, &side) in uses.iter().enumerate() {
            self.turns[side as usize] = next(uses[(i + 1) % uses.len()]) | loose;
        }
    }

    #[inline(always)]
    fn sector(&mut self, vertex: u32, handle: u32) {
        self.vertices.set_one(vertex, handle);
    }

    fn sectors(&mut self, vertex: u32, handles: &[OrientedEdgeId]) {
        self.vertices.set(vertex, handles);
    }
}
