//! Pairing by the edge numbers of the list, where it has them.

use super::{Corners, Links, Marks, Paired};
use merestone_topology::{EdgeUse, FaceListError};

/// Links every plain edge, marks both ends of every other, and returns a corner of every vertex.
pub(super) fn pair<C: Corners>(
    corners: C,
    vertex_count: usize,
    uses: &[EdgeUse],
    links: &mut impl Links,
    marks: &mut Marks,
    paired: &mut Paired,
) -> Result<Vec<u32>, FaceListError> {
    let mut by_edge: Vec<(u32, u32)> = Vec::with_capacity(corners.count());
    let mut handles = vec![u32::MAX; vertex_count];
    corners.for_each_use(|number, start, _| {
        by_edge.push((uses[number as usize].edge(), number));
        let handle = &mut handles[start as usize];
        *handle = (*handle).min(number);
    });
    by_edge.sort_unstable();
    // The edge's own two ends, as a use of it sees them.
    let ends = |number: u32| {
        let (start, end) = (corners.vertex(number), corners.vertex(corners.next(number)));
        if uses[number as usize].runs_with_edge() { (start, end) } else { (end, start) }
    };
    for group in by_edge.chunk_by(|a, b| a.0 == b.0) {
        let (edge, first) = group[0];
        let odd = group.iter().find(|&&(_, number)| ends(number) != ends(first));
        if edge as usize != paired.edges || odd.is_some() {
            let corner = odd.map_or(first, |&(_, number)| number) as usize;
            return Err(FaceListError::InconsistentEdge {
                edge: edge.min(paired.edges as u32),
                corner,
            });
        }
        paired.edges += 1;
        match *group {
            [(_, a), (_, b)]
                if uses[a as usize].runs_with_edge() != uses[b as usize].runs_with_edge() =>
            {
                links.plain(a, b);
            }
            _ => {
                marks.mark(ends(first).0);
                marks.mark(ends(first).1);
            }
        }
    }
    paired.held(size_of_val(&by_edge[..]) + size_of_val(&handles[..]) + marks.bytes());
    Ok(handles)
}
