//! Assembling with buckets by the start vertex of each side.
//!
//! At a vertex v, side s leaves to b(s), and the side before it comes in from a(s). Where a(r) is
//! b(s) for one r only, and s alone leaves to b(s), the edge is plain and turn(s) is r. So all is
//! decided locally at v: links, kinds of edges, sectors.

use super::{
    Adjacency, AssembleError, EdgeCounts, NONE, NOT_PLAIN, next_side, prepare, previous_side,
};

/// Vertices with more corners than this are matched by sorting: the table would collide too often.
const LARGEST_MATCHED: usize = 16;

/// Places in the table of neighbours: 8 KiB, so that it stays in the first cache.
const TABLE: usize = 1024;

/// A corner as its bucket holds it: the vertex before, the vertex after, the side that leaves.
///
/// Twelve bytes that are written once and read once in order, instead of a number that sends the
/// matching back to the index buffer: a third faster on shuffled meshes, not slower on others.
type Corner = [u32; 3];

/// Reusable scratch memory of [`assemble`].
#[derive(Clone, Debug, Default)]
pub struct Scratch {
    /// Counts, then where the filled part of each bucket ends.
    ends: Vec<u32>,
    /// The corners of vertex after vertex.
    corners: Vec<Corner>,
    /// The uses of the edges at the vertex in hand.
    uses: Vec<Use>,
}

/// One use of an edge at the vertex in hand.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
struct Use {
    neighbour: u32,
    side: u32,
    leaves: bool,
}

/// Links the triangles' sides with buckets by start vertex: see [`Adjacency`] for the layout.
///
/// O(F), and O(n log n) at a vertex of n > 16 corners or on an edge that is not plain.
///
/// # Errors
/// As [`super::assemble`].
pub fn assemble(
    triangles: &[[u32; 3]],
    vertices: usize,
    scratch: &mut Scratch,
    out: &mut Adjacency,
) -> Result<(), AssembleError> {
    prepare(triangles, vertices, out)?;
    let Scratch { ends, corners, uses } = scratch;
    ends.clear();
    ends.resize(vertices + 2, 0);
    let counters = &mut ends[2..];
    for (t, (&[a, b, c], end)) in triangles.iter().zip(out.end.as_chunks_mut::<3>().0).enumerate() {
        if a == b || b == c || c == a {
            return Err(AssembleError::Repeated { triangle: t });
        }
        for v in [a, b, c] {
            let Some(counter) = counters.get_mut(v as usize) else {
                return Err(AssembleError::Vertex { triangle: t, vertices });
            };
            *counter += 1;
        }
        *end = [b, c, a];
    }
    let mut total = 0;
    for end in ends.iter_mut() {
        total += *end;
        *end = total;
    }
    if corners.len() < total as usize {
        *corners = vec![[0; 3]; total as usize];
    }
    let filled = &mut ends[1..];
    for (t, &[a, b, c]) in triangles.iter().enumerate() {
        let side = 3 * t as u32;
        for (v, corner) in [(a, [c, b, side]), (b, [a, c, side + 1]), (c, [b, a, side + 2])] {
            let place = &mut filled[v as usize];
            corners[*place as usize] = corner;
            *place += 1;
        }
    }
    let mut counts = EdgeCounts::default();
    let mut table = Box::new([0; TABLE]);
    // From here on `ends[v + 1]` is the end of the full bucket of v.
    let mut start = 0;
    for (v, &end) in ends[1..=vertices].iter().enumerate() {
        let corners = &corners[start..end as usize];
        start = end as usize;
        let handle = match_vertex(corners, &mut out.turn, &mut table)
            .unwrap_or_else(|| sort_vertex(v as u32, corners, uses, out, &mut counts));
        out.outgoing.push(handle);
    }
    out.counts = counts;
    Ok(())
}

/// Links the corners around a vertex all of whose edges are plain; `None` for the sorting way.
///
/// The table is all zero before and after. A place holds a neighbour + 1 and the side to turn to.
#[inline]
fn match_vertex(corners: &[Corner], turn: &mut [u32], table: &mut [u64; TABLE]) -> Option<u32> {
    if corners.len() > LARGEST_MATCHED {
        return None;
    }
    let mut taken = 0;
    for &[from, _, side] in corners {
        let place = &mut table[from as usize % TABLE];
        taken |= *place;
        *place = (u64::from(from) + 1) << 32 | u64::from(side);
    }
    let mut fine = taken == 0;
    let mut last = NONE;
    for &[_, to, side] in corners {
        let place = &mut table[to as usize % TABLE];
        fine &= *place >> 32 == u64::from(to) + 1;
        turn[side as usize] = *place as u32;
        *place = 0;
        last = side;
    }
    if fine {
        return Some(last);
    }
    for &[from, ..] in corners {
        table[from as usize % TABLE] = 0;
    }
    None
}

/// Links the corners around any vertex, by sorting the uses of its edges.
#[cold]
fn sort_vertex(
    v: u32,
    corners: &[Corner],
    uses: &mut Vec<Use>,
    out: &mut Adjacency,
    counts: &mut EdgeCounts,
) -> u32 {
    uses.clear();
    let Some(&last) = corners.last() else { return NONE };
    for &[from, to, side] in corners {
        uses.push(Use { neighbour: to, side, leaves: true });
        uses.push(Use { neighbour: from, side: previous_side(side), leaves: false });
    }
    uses.sort_unstable();
    let mut handle = None;
    for edge in uses.chunk_by(|x, y| x.neighbour == y.neighbour) {
        if let [x, y] = edge
            && x.leaves != y.leaves
        {
            let (leaves, comes) = if x.leaves { (x, y) } else { (y, x) };
            out.turn[leaves.side as usize] = next_side(comes.side);
            continue;
        }
        let leaving = edge.iter().filter(|u| u.leaves).count();
        match edge.len() {
            1 => counts.boundary += leaving,
            2 => counts.misoriented += leaving / 2,
            _ => counts.non_manifold += usize::from(v < edge[0].neighbour),
        }
        for (k, u) in edge.iter().enumerate() {
            if u.leaves {
                let radial = edge[(k + 1) % edge.len()].side;
                out.turn[u.side as usize] = next_side(radial) | NOT_PLAIN;
            } else {
                handle = handle.max(Some(next_side(u.side)));
            }
        }
    }
    handle.unwrap_or(last[2])
}
