//! Assembling with buckets by the lower vertex of each edge.
//!
//! Counting, prefix sums, then one pass in which every side looks its edge up in the filled part
//! of its bucket and links itself to the uses found there.

use super::{
    Adjacency, AssembleError, EdgeCounts, NONE, NOT_PLAIN, next_side, prepare, previous_side,
};

/// At most this many edges of a vertex are searched, the others are sorted: else a hub costs the
/// square of its valence.
const LARGEST_SEARCHED: usize = 16;

/// Reusable scratch memory of [`assemble`].
#[derive(Clone, Debug, Default)]
pub struct Scratch {
    /// Where each vertex's bucket starts, and where its filled part ends.
    buckets: Vec<[u32; 2]>,
    /// The higher vertex (upper half) and the last use so far (lower half) of each edge.
    entries: Vec<u64>,
    /// Lower and higher vertex, and side, of the uses of edges that found their bucket long.
    long: Vec<(u64, u32)>,
}

/// Links the triangles' sides with buckets by lower vertex: see [`Adjacency`] for the layout.
///
/// O(F), and O(n log n) for n sides beyond the first 16 edges of their lower vertex.
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
    out.outgoing.resize(vertices, NONE);
    let Scratch { buckets, entries, long } = scratch;
    buckets.clear();
    buckets.resize(vertices, [0; 2]);
    long.clear();
    for (t, (&[a, b, c], end)) in triangles.iter().zip(out.end.as_chunks_mut::<3>().0).enumerate() {
        if a == b || b == c || c == a {
            return Err(AssembleError::Repeated { triangle: t });
        }
        let side = 3 * t as u32;
        for (v, side) in [(a, side), (b, side + 1), (c, side + 2)] {
            let Some(outgoing) = out.outgoing.get_mut(v as usize) else {
                return Err(AssembleError::Vertex { triangle: t, vertices });
            };
            *outgoing = side;
        }
        for lower in [a.min(b), b.min(c), c.min(a)] {
            buckets[lower as usize][0] += 1;
        }
        *end = [b, c, a];
    }
    let mut total = 0;
    for bucket in buckets.iter_mut() {
        let count = bucket[0];
        *bucket = [total; 2];
        total += count;
    }
    if entries.len() < total as usize {
        *entries = vec![0; total as usize];
    }
    let mut counts = EdgeCounts::default();
    for (t, &[a, b, c]) in triangles.iter().enumerate() {
        let first = 3 * t as u32;
        for (side, next, from, to) in
            [(first, first + 1, a, b), (first + 1, first + 2, b, c), (first + 2, first, c, a)]
        {
            let (lower, higher) = (from.min(to), from.max(to));
            let [start, filled] = &mut buckets[lower as usize];
            let bucket = &mut entries[*start as usize..*filled as usize];
            let entry = u64::from(higher) << 32 | u64::from(side);
            if let Some(known) = bucket.iter_mut().find(|e| (**e >> 32) as u32 == higher) {
                let last = *known as u32;
                *known = entry;
                link(last, side, next, to, out, &mut counts);
            } else if bucket.len() == LARGEST_SEARCHED {
                long.push((u64::from(lower) << 32 | u64::from(higher), side));
            } else {
                entries[*filled as usize] = entry;
                *filled += 1;
                out.turn[side as usize] = next | NOT_PLAIN;
                counts.boundary += 1;
            }
        }
    }
    long.sort_unstable();
    for uses in long.chunk_by(|x, y| x.0 == y.0) {
        let mut last = uses[0].1;
        out.turn[last as usize] = next_side(last) | NOT_PLAIN;
        counts.boundary += 1;
        for &(_, side) in &uses[1..] {
            let to = out.end[side as usize];
            link(last, side, next_side(side), to, out, &mut counts);
            last = side;
        }
    }
    out.counts = counts;
    super::settle_handles(out);
    Ok(())
}

/// Puts `side` behind `last`, the greatest use of its edge so far.
#[inline]
fn link(last: u32, side: u32, next: u32, to: u32, out: &mut Adjacency, counts: &mut EdgeCounts) {
    let turn = out.turn[last as usize];
    let first_next = turn & !NOT_PLAIN;
    let opposite = out.end[last as usize] != to;
    if first_next == next_side(last) {
        counts.boundary -= 1;
        counts.misoriented += usize::from(!opposite);
        let bit = if opposite { 0 } else { NOT_PLAIN };
        out.turn[last as usize] = next | bit;
        out.turn[side as usize] = first_next | bit;
        return;
    }
    let first = previous_side(first_next);
    if previous_side(out.turn[first as usize] & !NOT_PLAIN) == last {
        counts.non_manifold += 1;
        let same_way = out.end[first as usize] == out.end[last as usize];
        counts.misoriented -= usize::from(same_way);
        out.turn[first as usize] |= NOT_PLAIN;
    }
    out.turn[last as usize] = next | NOT_PLAIN;
    out.turn[side as usize] = first_next | NOT_PLAIN;
}
