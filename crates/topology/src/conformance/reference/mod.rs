//! The naive reference topology: lists in maps, everything else by definition.

mod assembling;
mod steps;
#[cfg(test)]
mod tests;

use super::definitions::{Joints, Sector, sectors_of};
use crate::{EdgeId, FaceId, OrientedEdgeId, VertexId};
use std::collections::{BTreeMap, BTreeSet};

/// The topology everything else is held against: slow, and obviously right.
///
/// It keeps nothing but lists (the loops of every face, the uses of every edge) in ordered maps,
/// holds every complex, and shares no code with any kernel or walk. Oriented edges are numbered as
/// the edge loops' corners are in the face list; edges as the list numbers them, else by their
/// first use.
///
/// ```
/// use merestone_topology::{conformance::Reference, *};
/// let mesh = Reference::assemble(FaceList::triangles(4, &[[0, 1, 2], [0, 2, 3]]))?;
/// assert_eq!((mesh.edge_count(), mesh.euler_characteristic()), (5, 1));
/// # Ok::<(), AssembleError>(())
/// ```
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Reference {
    /// The live vertices.
    pub(super) vertices: BTreeSet<VertexId>,
    /// The uses of every live edge, in radial order.
    pub(super) edges: BTreeMap<EdgeId, Vec<OrientedEdgeId>>,
    /// The bounds of every live face, outer first.
    pub(super) faces: BTreeMap<FaceId, Vec<ListedBound>>,
    /// Where every live oriented edge is in those lists.
    pub(super) uses: BTreeMap<OrientedEdgeId, Use>,
    /// Above every index ever given out.
    bounds: Bounds,
    /// Worked out anew from the lists after every edit: which corners meet through which sides.
    pub(super) joints: Joints,
    /// Worked out anew from the lists after every edit: the sectors of every vertex that has any.
    pub(super) sectors: BTreeMap<VertexId, Vec<Sector>>,
}

/// One bound, written out.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) enum ListedBound {
    /// Its oriented edges in loop order.
    EdgeLoop(Vec<OrientedEdgeId>),
    /// A bare vertex.
    VertexLoop(VertexId),
}

/// One oriented edge: its place in the faces' lists, and in the edges'.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Use {
    pub(super) start: VertexId,
    pub(super) edge: EdgeId,
    /// Whether it runs the way its edge does.
    pub(super) with: bool,
    pub(super) face: FaceId,
    /// The bound's number in the face.
    pub(super) bound: usize,
    /// The corner's number in the loop.
    pub(super) position: usize,
}

#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
struct Bounds {
    vertices: usize,
    edges: usize,
    faces: usize,
    oriented_edges: usize,
}

impl Reference {
    /// The record of a live oriented edge.
    #[track_caller]
    pub(super) fn record(&self, h: OrientedEdgeId) -> &Use {
        self.uses.get(&h).unwrap_or_else(|| panic!("oriented edge {h} does not live here"))
    }

    /// The loop `h` runs in.
    #[track_caller]
    pub(super) fn loop_through(&self, h: OrientedEdgeId) -> &[OrientedEdgeId] {
        let record = self.record(h);
        match &self.faces[&record.face][record.bound] {
            ListedBound::EdgeLoop(corners) => corners,
            ListedBound::VertexLoop(_) => &[],
        }
    }

    /// The uses of `h`'s edge, in radial order.
    #[track_caller]
    pub(super) fn uses_beside(&self, h: OrientedEdgeId) -> &[OrientedEdgeId] {
        &self.edges[&self.record(h).edge]
    }

    /// The faces of the vertex loops at `v`, one for each.
    pub(super) fn vertex_loops_at(&self, v: VertexId) -> Vec<FaceId> {
        let listed = |bounds: &[ListedBound]| {
            bounds.iter().filter(|bound| **bound == ListedBound::VertexLoop(v)).count()
        };
        self.faces.iter().flat_map(|(&f, bounds)| vec![f; listed(bounds)]).collect()
    }

    /// Works out what is kept beside the lists, from the lists.
    fn refresh(&mut self) {
        self.joints = Joints::of(self);
        self.sectors = BTreeMap::new();
        let starts: BTreeSet<VertexId> = self.uses.values().map(|u| u.start).collect();
        for v in starts {
            self.sectors.insert(v, sectors_of(self, v));
        }
    }
}

/// What comes after `h` in a cyclic list.
fn after(list: &[OrientedEdgeId], h: OrientedEdgeId) -> Option<OrientedEdgeId> {
    let at = list.iter().position(|&other| other == h)?;
    list.get((at + 1) % list.len()).copied()
}

/// What comes before `h` in a cyclic list.
fn before(list: &[OrientedEdgeId], h: OrientedEdgeId) -> Option<OrientedEdgeId> {
    let at = list.iter().position(|&other| other == h)?;
    list.get((at + list.len() - 1) % list.len()).copied()
}
