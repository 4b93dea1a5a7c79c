//! The sectors of one vertex, found by their definition.
//!
//! Assembling finds the sectors of an ordinary vertex while it pairs its edges. Everything else,
//! and every vertex that a removal touches, comes here.

use merestone_topology::walks::next_corner_around;
use merestone_topology::{Id, Topology};

/// Finds the handles of a vertex's sectors. Owns its workspace, to be used for many vertices.
#[derive(Debug)]
pub(crate) struct SectorSearch<H> {
    /// For each corner given, whether a sector has it already.
    seen: Vec<bool>,
    handles: Vec<H>,
}

impl<H: Id> SectorSearch<H> {
    /// A workspace that does not grow up to this many corners a vertex.
    pub(crate) fn with_capacity(corners: usize) -> Self {
        Self { seen: Vec::with_capacity(corners), handles: Vec::with_capacity(corners) }
    }

    /// The heap bytes of the workspace.
    pub(crate) fn bytes(&self) -> usize {
        crate::memory::vec_bytes(&self.seen) + crate::memory::vec_bytes(&self.handles)
    }

    /// The handles of the sectors that `corners` form, ordered by each sector's lowest corner.
    ///
    /// `corners` are all live corners of one vertex, ascending. Only `next`, `prev`, `radial` and
    /// what follows from them is asked of `mesh`. O(c log c).
    ///
    /// The handle of a cyclic sector is its lowest corner; that of an open sector the corner whose
    /// incoming side is an end. Of two such corners, or of the two at its ends where there is
    /// none (both need misoriented neighbours), it is the lower.
    pub(crate) fn handles<K>(&mut self, mesh: &K, corners: &[H]) -> &[H]
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        self.handles.clear();
        self.seen.clear();
        self.seen.resize(corners.len(), false);
        for number in 0..corners.len() {
            if self.seen[number] {
                continue;
            }
            let lowest = corners[number];
            let seen = &mut self.seen;
            let mut mark = |corner: H| {
                if let Ok(place) = corners.binary_search(&corner) {
                    seen[place] = true;
                }
            };
            let handle = match run_to_end(mesh, lowest, false, &mut mark) {
                None => lowest,
                Some(one) => match run_to_end(mesh, lowest, true, &mut mark) {
                    None => lowest,
                    Some(other) => handle_of_open([one, other]),
                },
            };
            self.handles.push(handle);
        }
        &self.handles
    }
}

/// From `first` on through its sector; where it ends and whether the walk then went backward, or
/// `None` when it came back to `first`.
fn run_to_end<K: Topology + ?Sized>(
    mesh: &K,
    first: K::OrientedEdge,
    mut backward: bool,
    mark: &mut impl FnMut(K::OrientedEdge),
) -> Option<(K::OrientedEdge, bool)> {
    let mut corner = first;
    loop {
        mark(corner);
        let step = match mesh.turn(corner) {
            Some(behind) if !backward => Some((behind, false)),
            _ => next_corner_around(mesh, corner, backward),
        };
        match step {
            None => return Some((corner, backward)),
            Some((behind, _)) if behind == first => return None,
            Some(behind) => (corner, backward) = behind,
        }
    }
}

/// Going backward, a corner is left by its incoming side: that is the end asked for.
fn handle_of_open<H: Id>(mut ends: [(H, bool); 2]) -> H {
    ends.sort_by_key(|&(corner, incoming)| (!incoming, corner));
    ends[0].0
}
