//! The half-edge kernel.
//!
//! One record for each oriented edge, linked to the records around it. Records are numbered by the
//! corners of the face list they were assembled from; those of a face need not lie together once
//! faces are edited.

mod assemble;
mod compact;
mod loops;
mod remove;
mod steps;
#[cfg(test)]
mod tests;

use crate::memory::array_bytes;
use crate::side::SideTable;
use crate::slots::Slots;
use crate::vertex_table::VertexTable;
use merestone_topology::{ArrayBytes, FaceId, Footprint, OrientedEdgeId, VertexId};
use std::fmt::{self, Debug};

/// Which links the records of a [`HalfEdge`] kernel hold.
///
/// The link set decides what the kernel weighs and which steps are constant. There is one now,
/// [`Full`]; the trait is sealed.
pub trait Links: sealed::Sealed + Clone + Debug + Send + Sync + 'static {}

mod sealed {
    #[expect(unnameable_types, reason = "what cannot be named cannot be implemented elsewhere")]
    pub trait Sealed {}
}

/// All links: every step is one or two loads.
#[derive(Clone, Default)]
pub struct Full {
    /// The oriented edge behind each in its loop.
    next: Vec<u32>,
    /// The one before.
    prev: Vec<u32>,
    /// Its start vertex.
    start: Vec<u32>,
    /// Its face.
    face: Vec<u32>,
    /// The next use of its edge; top bit set where the edge is not plain.
    radial: Vec<u32>,
    /// Its edge; top bit set where it runs against it.
    edge: Vec<u32>,
    /// Of each edge, a use.
    edge_use: Vec<u32>,
}

impl sealed::Sealed for Full {}
impl Links for Full {}

impl Debug for Full {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str("Full")
    }
}

/// The half-edge kernel: a record for each oriented edge, linked to the records around it.
///
/// Holds every complex: faces of any number of corners from one on, inner loops and vertex loops,
/// self-edges, edges with any number of uses, vertices with any number of sectors.
///
/// A closed triangle mesh takes 84 bytes a triangle: six links of 4 bytes for each of its 3
/// oriented edges, 4 for each of its 1½ edges, 4 for itself and 4 for its ½ vertex.
///
/// ```
/// use merestone_kernels::HalfEdge;
/// use merestone_topology::{Assemble, FaceListBuf, Topology, TopologyExt};
/// // The foundry's flange, seen from above: a square with a square bolt hole.
/// let mut list = FaceListBuf::new(8);
/// list.push_face(&[0, 1, 2, 3]);
/// list.push_inner_loop(&[4, 7, 6, 5]);
/// let flange = HalfEdge::assemble(list.as_list())?;
/// let face = flange.face_at(0).unwrap();
/// assert_eq!(flange.face_bounds(face).count(), 2);
/// assert_eq!(flange.face_corners(face).count(), 8);
/// # Ok::<(), merestone_topology::AssembleError>(())
/// ```
#[derive(Clone, Default)]
pub struct HalfEdge<L: Links = Full> {
    links: L,
    /// Of each face, the first oriented edge of its only loop, or the top bit and the index of its
    /// bounds in `face_bounds`.
    face: Vec<u32>,
    /// The sectors and vertex loops of each vertex.
    sectors: VertexTable,
    /// The bounds of faces that are not one edge loop: the first oriented edge of a loop, or the
    /// top bit and the vertex of a vertex loop.
    face_bounds: SideTable,
    vertices: Slots,
    edges: Slots,
    faces: Slots,
    oriented_edges: Slots,
    inner_loops: usize,
    /// Whether oriented edges 3f to 3f + 2 are the one loop of face f, for all faces.
    in_threes: bool,
    assembly_peak: usize,
}

impl<L: Links> Debug for HalfEdge<L> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.debug_struct("HalfEdge")
            .field("links", &self.links)
            .field("vertices", &self.vertices.count())
            .field("edges", &self.edges.count())
            .field("faces", &self.faces.count())
            .field("oriented_edges", &self.oriented_edges.count())
            .finish_non_exhaustive()
    }
}

impl HalfEdge<Full> {
    /// Every array, in a fixed order, with its bytes.
    fn exact_footprint(&self) -> Footprint {
        let links = &self.links;
        let uses = self.oriented_edges.retired();
        let live_sets =
            [&self.vertices, &self.edges, &self.faces, &self.oriented_edges].map(Slots::bytes);
        let aside = |name, bytes| ArrayBytes { name, bytes, retired: 0 };
        Footprint {
            arrays: vec![
                array_bytes("next", &links.next, uses),
                array_bytes("prev", &links.prev, uses),
                array_bytes("start", &links.start, uses),
                array_bytes("face", &links.face, uses),
                array_bytes("radial", &links.radial, uses),
                array_bytes("edge", &links.edge, uses),
                array_bytes("edge use", &links.edge_use, self.edges.retired()),
                array_bytes("face entry", &self.face, self.faces.retired()),
                ArrayBytes {
                    name: "vertex entry",
                    bytes: self.sectors.entry_bytes(),
                    retired: self.vertices.retired() * size_of::<u32>(),
                },
                aside("face bounds", self.face_bounds.bytes()),
                aside("vertex uses", self.sectors.list_bytes()),
                aside("live sets", live_sets.iter().sum()),
            ],
            assembly_peak: self.assembly_peak,
        }
    }
}

#[inline(always)]
fn oriented(index: u32) -> OrientedEdgeId {
    OrientedEdgeId::from_u32(index)
}

#[inline(always)]
fn face_id(index: u32) -> FaceId {
    FaceId::from_u32(index)
}

#[inline(always)]
fn vertex_id(index: u32) -> VertexId {
    VertexId::from_u32(index)
}
