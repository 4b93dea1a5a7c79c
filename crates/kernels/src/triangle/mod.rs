//! The triangle kernel: two arrays over the sides of triangles.
//!
//! Side `3t + i` of triangle `t` runs from its corner `i` to its corner `i + 1`, and is an
//! oriented edge. Two numbers are kept for each side: the vertex it **ends** at, which makes the
//! index buffer (turned by one corner), and its **turn**, the side behind it around its start
//! vertex, `next(radial(s))`. The turn's top bit says that the edge is not plain; the link under
//! the bit stays, so `radial(s) = prev(turn(s))` holds for every side by arithmetic, and a ring
//! walk is one dependent load a step.
//!
//! Sides and edges are **places**: side numbers follow from the triangle's, and an edge is named
//! by its lowest side.

mod assemble;
mod compact;
mod edges;
mod remove;
mod topology;

use crate::TOP;
use crate::slots::Slots;
use crate::vertex_table::VertexTable;
pub use edges::{TriangleEdges, TriangleSides};

/// The triangle kernel: 24 bytes a triangle and 4 a vertex.
///
/// Holds triangles only, but any of them: at boundaries, at edges of many uses, in several
/// fans around a vertex, misoriented against each other, repeated, or with a repeated vertex.
///
/// ```
/// use merestone_kernels::TriangleAdjacency;
/// use merestone_topology::{Assemble, FaceList, Topology, TopologyExt};
/// let mesh = TriangleAdjacency::assemble(FaceList::triangles(4, &[[0, 1, 2], [0, 2, 3]]))?;
/// let shared = mesh.edge_between(mesh.vertex_at(0).unwrap(), mesh.vertex_at(2).unwrap()).unwrap();
/// assert_eq!(mesh.edge_faces(shared).count(), 2);
/// # Ok::<(), merestone_topology::AssembleError>(())
/// ```
#[derive(Clone, Debug, Default)]
pub struct TriangleAdjacency {
    /// The vertices the three sides of each triangle end at.
    ends: Vec<[u32; 3]>,
    /// For each side the one behind it around its start; top bit set where the edge is not plain.
    turns: Vec<u32>,
    vertices: VertexTable,
    /// The sides, ascending, that start and end at one vertex and run against their edge: what
    /// the vertices of a triangle cannot tell.
    against: Vec<u32>,
    vertex_slots: Slots,
    faces: Slots,
    edge_count: usize,
    assembly_peak: usize,
}

/// The side behind `side` in its triangle.
#[inline(always)]
fn next(side: u32) -> u32 {
    if side % 3 == 2 { side - 2 } else { side + 1 }
}

/// The side before `side` in its triangle.
#[inline(always)]
fn prev(side: u32) -> u32 {
    if side.is_multiple_of(3) { side + 2 } else { side - 1 }
}

impl TriangleAdjacency {
    #[inline(always)]
    fn end_of(&self, side: u32) -> u32 {
        self.ends.as_flattened()[side as usize]
    }

    #[inline(always)]
    fn start_of(&self, side: u32) -> u32 {
        self.end_of(prev(side))
    }

    #[inline(always)]
    fn radial_of(&self, side: u32) -> u32 {
        prev(self.turns[side as usize] & !TOP)
    }

    /// The uses of `side`'s edge, in radial order from `side`.
    fn uses_of(&self, side: u32) -> impl Iterator<Item = u32> {
        std::iter::successors(Some(side), move |&s| Some(self.radial_of(s)).filter(|&r| r != side))
    }

    /// The lowest side of `side`'s edge: the edge's number.
    #[inline]
    fn lowest_of(&self, side: u32) -> u32 {
        let turn = self.turns[side as usize];
        if turn < TOP {
            return side.min(prev(turn));
        }
        self.uses_of(side).fold(side, u32::min)
    }

    /// Whether two uses of one edge run the same way.
    fn run_alike(&self, a: u32, b: u32) -> bool {
        let (start_a, start_b) = (self.start_of(a), self.start_of(b));
        if start_a != start_b || start_a != self.end_of(a) {
            return start_a == start_b;
        }
        let is_against = |side: u32| self.against.binary_search(&side).is_ok();
        is_against(a) == is_against(b)
    }
}
