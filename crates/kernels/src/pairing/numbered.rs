//! Checking the edge numbers of a list.

use super::{Corners, Paired};
use crate::memory::vec_bytes;
use merestone_topology::{EdgeUse, FaceListError};

/// Checks that edge numbers have no gap, and that all uses of an edge join the same two vertices
/// the way they say. O(corners).
pub(super) fn check<C: Corners>(corners: C, uses: &[EdgeUse]) -> Result<Paired, FaceListError> {
    // The edge's own two ends as a use of it sees them, and that use.
    let mut seen: Vec<Option<(u32, u32)>> = Vec::new();
    let mut fault: Option<(u32, u32)> = None;
    let count = corners.count();
    seen.resize(count, None);
    let mut edges = 0;
    corners.for_each(|number, _, start, end| {
        let listed = uses[number as usize];
        let ends = if listed.runs_with_edge() { (start, end) } else { (end, start) };
        match seen.get_mut(listed.edge() as usize) {
            Some(Some(first)) if *first == ends => {}
            Some(place @ None) => {
                *place = Some(ends);
                edges = edges.max(listed.edge() as usize + 1);
            }
            Some(_) => fault = fault.or(Some((listed.edge(), number))),
            // More numbers than corners: one of those below has no use, and is looked for then.
            None => edges = count,
        }
    });
    if fault.is_none()
        && let Some(gap) = seen[..edges].iter().position(Option::is_none)
    {
        fault = Some((gap as u32, 0));
    }
    if let Some((edge, corner)) = fault {
        return Err(FaceListError::InconsistentEdge { edge, corner: corner as usize });
    }
    Ok(Paired { edges, scratch: vec_bytes(&seen) })
}
