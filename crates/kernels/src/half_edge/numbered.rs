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
    let count = edge.iter().map(|used| (used & !TOP) as usize + 1).max().unwrap_or(0);
    let ends = |h: usize| {
        let (from, to) = (start[h], start[loops.next(h as u32) as usize]);
        if edge[h] < TOP { (from, to) } else { (to, from) }
    };
    // More numbers than uses leave a gap; memory follows the uses, never the numbers.
    if count > edge.len() {
        return Err(explain_gap(edge, ends, list));
    }
    let mut first = peak.held(vec![NONE; count]);
    let mut last = peak.held(vec![NONE; count]);
    let mut radial = peak.held(vec![0; edge.len()]);
    for (h, &used) in edge.iter().enumerate() {
        let number = used & !TOP;
        let (first, last) = (&mut first[number as usize], &mut last[number as usize]);
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
    if first.contains(&NONE) {
        return Err(explain_gap(edge, ends, list));
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

/// What is wrong with numbers that have a gap: the first contradiction, else the gap.
#[cold]
fn explain_gap(
    edge: &[u32],
    ends: impl Fn(usize) -> (u32, u32),
    list: &FaceList<'_>,
) -> FaceListError {
    let mut sorted: Vec<(u32, usize)> =
        edge.iter().enumerate().map(|(h, used)| (used & !TOP, h)).collect();
    sorted.sort_unstable();
    let groups = || sorted.chunk_by(|a, b| a.0 == b.0);
    let contradicting = groups().filter_map(|uses| {
        uses.iter().find(|&&(_, h)| ends(h) != ends(uses[0].1)).map(|&(edge, h)| (h, edge))
    });
    let gap = || {
        let gap = (0..).zip(groups()).find(|(number, uses)| *number != uses[0].0);
        let gap = gap.map_or(0, |(number, _)| number);
        let beyond = edge.iter().position(|&used| used & !TOP > gap).unwrap_or(0);
        (beyond, gap)
    };
    let (h, edge) = contradicting.min().unwrap_or_else(gap);
    FaceListError::InconsistentEdge { edge, corner: corner_of(list, h) }
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
