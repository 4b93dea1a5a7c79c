//! Checking the edge numbers of a list.

use super::corners::{Corners, Kept};
use crate::memory::Peak;
use merestone_topology::{EdgeUse, FaceListError};

/// The ends of an edge no use of which was seen.
const UNSEEN: [u32; 2] = [u32::MAX; 2];

/// An edge's own start and end, as a use of it sees them.
#[inline(always)]
fn ends_of<C: Corners>(listed: EdgeUse, start: u32, corner: C::Kept) -> [u32; 2] {
    let end = corner.behind();
    if listed.runs_with_edge() { [start, end] } else { [end, start] }
}

/// Checks that edge numbers have no gap, and that all uses of an edge join the same two vertices
/// the way they say. `uses` has one use for each of the corners. O(corners).
///
/// # Errors
/// [`FaceListError::InconsistentEdge`] for the first corner whose use contradicts an earlier one;
/// else for the first number without a use, with the first corner that has a number beyond it.
pub(super) fn check<C: Corners>(
    corners: C,
    uses: &[EdgeUse],
    peak: &mut Peak,
) -> Result<(), FaceListError> {
    let count = uses.iter().map(|listed| listed.edge() as usize + 1).max().unwrap_or(0);
    // More numbers than uses leave a gap; memory follows the uses, never the numbers.
    if count > uses.len() {
        return Err(explain(corners, uses));
    }
    let mut seen = peak.held(vec![UNSEEN; count]);
    let mut sound = true;
    corners.for_each(|start, corner| {
        let listed = uses[corner.number() as usize];
        let ends = ends_of::<C>(listed, start, corner);
        let place = &mut seen[listed.edge() as usize];
        sound &= *place == UNSEEN || *place == ends;
        *place = ends;
    });
    sound &= !seen.contains(&UNSEEN);
    peak.drop(seen);
    if sound { Ok(()) } else { Err(explain(corners, uses)) }
}

/// What is wrong with numbers: the first contradiction, else the first gap.
#[cold]
fn explain<C: Corners>(corners: C, uses: &[EdgeUse]) -> FaceListError {
    let mut sorted: Vec<(u32, u32, [u32; 2])> = Vec::with_capacity(uses.len());
    corners.for_each(|start, corner| {
        let listed = uses[corner.number() as usize];
        sorted.push((listed.edge(), corner.number(), ends_of::<C>(listed, start, corner)));
    });
    sorted.sort_unstable();
    let groups = || sorted.chunk_by(|a, b| a.0 == b.0);
    let contradicting = groups().filter_map(|uses| {
        uses.iter().find(|used| used.2 != uses[0].2).map(|&(edge, corner, _)| (corner, edge))
    });
    let gap = || {
        let gap = (0..).zip(groups()).find(|(number, uses)| *number != uses[0].0);
        let gap = gap.map_or(0, |(number, _)| number);
        let beyond = uses.iter().position(|listed| listed.edge() > gap).unwrap_or(0);
        (beyond as u32, gap)
    };
    let (corner, edge) = contradicting.min().unwrap_or_else(gap);
    FaceListError::InconsistentEdge { edge, corner: corner as usize }
}
