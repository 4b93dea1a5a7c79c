//! Linking the uses of each edge, where the list numbers the edges.

use super::loops::Loops;
use super::pairing::Buckets;
use super::vertices::LATER;
use super::{NONE, TOP};
use crate::memory::Peak;
use merestone_topology::{EdgeUse, FaceList, FaceListError};

/// The edge uses of the corners that are oriented edges: those of vertex loops are left out.
pub(super) fn oriented_uses(
    list: &FaceList<'_>,
    uses: &[EdgeUse],
    count: usize,
    peak: &mut Peak,
) -> Vec<u32> {
    let packed = |u: &EdgeUse| u.edge() | if u.runs_with_edge() { 0 } else { TOP };
    let mut edge = peak.held(Vec::with_capacity(count));
    if count == uses.len() {
        edge.extend(uses.iter().map(packed));
        return edge;
    }
    for listed in (0..list.loop_count()).filter_map(|number| list.listed_loop(number)) {
        if !listed.is_vertex_loop {
            let range = listed.first_corner..listed.first_corner + listed.corners.len();
            edge.extend(uses[range].iter().map(packed));
        }
    }
    edge
}

/// The corner of oriented edge `h` in the list.
fn corner_of(list: &FaceList<'_>, h: usize) -> usize {
    let mut before = 0;
    for listed in (0..list.loop_count()).filter_map(|number| list.listed_loop(number)) {
        if !listed.is_vertex_loop {
            if h < before + listed.corners.len() {
                return listed.first_corner + h - before;
            }
            before += listed.corners.len();
        }
    }
    h
}

/// The radial links and a use of each edge, from the uses' edge numbers, after checking that the numbers are an order of
/// edges: no gap, and every use joins the two vertices its edge does, the way it says.
///
/// # Errors
/// [`FaceListError::InconsistentEdge`] for the first corner whose use contradicts an earlier one;
/// else for the first number without a use, with the first corner that has a number beyond it.
pub(super) fn link(
    start: &[u32],
    edge: &[u32],
    loops: &impl Loops,
    list: &FaceList<'_>,
    peak: &mut Peak,
) -> Result<(Vec<u32>, Vec<u32>), FaceListError> {
    let count = edge.iter().map(|use_| (use_ & !TOP) as usize + 1).max().unwrap_or(0);
    // More numbers than uses leave a gap below; memory follows the uses, never the numbers.
    let held = count.min(edge.len());
    let mut first = peak.held(vec![NONE; held]);
    let mut last = peak.held(vec![NONE; held]);
    let mut radial = peak.held(vec![0; edge.len()]);
    let ends = |h: usize| {
        let (from, to) = (start[h], start[loops.next(h as u32) as usize]);
        if edge[h] < TOP { (from, to) } else { (to, from) }
    };
    for h in 0..edge.len() {
        let number = edge[h] & !TOP;
        let (Some(first), Some(last)) =
            (first.get_mut(number as usize), last.get_mut(number as usize))
        else {
            continue;
        };
        if *first == NONE {
            *first = h as u32;
        } else {
            if ends(*first as usize) != ends(h) {
                let corner = corner_of(list, h);
                return Err(FaceListError::InconsistentEdge { edge: number, corner });
            }
            radial[*last as usize] = h as u32 | TOP;
        }
        *last = h as u32;
    }
    if let Some(gap) = first.iter().position(|&h| h == NONE) {
        let beyond = edge.iter().position(|&use_| (use_ & !TOP) as usize > gap).unwrap_or(0);
        let corner = corner_of(list, beyond);
        return Err(FaceListError::InconsistentEdge { edge: gap as u32, corner });
    }
    for (&first, &last) in first.iter().zip(&last) {
        radial[last as usize] = first | TOP;
        let two = first != last && radial[first as usize] == last | TOP;
        if two && (edge[first as usize] ^ edge[last as usize]) & TOP != 0 {
            radial[first as usize] = last;
            radial[last as usize] = first;
        }
    }
    peak.drop(last);
    Ok((radial, first))
}

/// The entries of vertices with one cyclic sector of plain edges; [`LATER`] for all others.
pub(super) fn enter_ordinary(loops: &impl Loops, buckets: &Buckets, radial: &[u32]) -> Vec<u32> {
    let mut entries = Vec::with_capacity(buckets.ends.len());
    entries.extend(buckets.iter().map(|(_, corners)| {
        let Some(&lowest) = corners.first() else { return NONE };
        let (mut at, mut steps) = (lowest, 0);
        while steps < corners.len() {
            let twin = radial[at as usize];
            if twin >= TOP {
                return LATER;
            }
            (at, steps) = (loops.next(twin), steps + 1);
            if at == lowest {
                break;
            }
        }
        if at == lowest && steps == corners.len() { lowest } else { LATER }
    }));
    entries
}
