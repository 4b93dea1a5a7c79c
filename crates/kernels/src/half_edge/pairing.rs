//! Pairing the uses of each edge, where the corners decide: one edge for each pair of vertices.
//!
//! The corners are sorted by their vertex (a counting sort). Then one pass over the vertices finds
//! everything locally. At vertex v, a corner is left towards one vertex and entered from another;
//! the uses of the edge {v, x} are the corners left towards x and the predecessors of those
//! entered from x. Each oriented edge is linked at the vertex it starts at. Where every edge at v
//! is plain, or a boundary at the ends of one fan, the same comparison gives the turn from corner
//! to corner, and so the vertex's sector.

use super::loops::Loops;
use super::vertices::LATER;
use super::{NONE, TOP};
use crate::memory::Peak;

/// The corners of a list, sorted by their vertex and then by number.
pub(super) struct Buckets {
    /// The corners.
    pub(super) corners: Vec<u32>,
    /// Where each vertex's corners end; they start where those of the vertex before end.
    pub(super) ends: Vec<u32>,
    /// The most corners at one vertex.
    pub(super) widest: usize,
}

impl Buckets {
    pub(super) fn new(start: &[u32], vertex_count: usize, peak: &mut Peak) -> Self {
        let mut ends = peak.held(vec![0_u32; vertex_count]);
        for &v in start {
            ends[v as usize] += 1;
        }
        let (mut before, mut widest) = (0, 0);
        for end in &mut ends {
            let count = std::mem::replace(end, before);
            before += count;
            widest = widest.max(count);
        }
        let mut corners = peak.held(vec![0; start.len()]);
        for (corner, &v) in (0..).zip(start) {
            let place = &mut ends[v as usize];
            corners[*place as usize] = corner;
            *place += 1;
        }
        Self { corners, ends, widest: widest as usize }
    }

    /// The vertices with their corners.
    pub(super) fn iter(&self) -> impl Iterator<Item = (u32, &[u32])> {
        let mut begin = 0;
        (0..).zip(&self.ends).map(move |(v, &end)| {
            let corners = &self.corners[begin..end as usize];
            begin = end as usize;
            (v, corners)
        })
    }
}

/// Up to this many corners a vertex is paired by comparing all with all, up to 8 faster.
const FEW: usize = 16;

/// Links all uses and finds the sectors of ordinary vertices.
///
/// Fills `radial` and `vertex` ([`LATER`] where [`super::vertices`] has to find the sectors), and
/// sets the top bit in `face` for the first use of every edge that has several and is not plain:
/// numbering the edges takes it away again. Returns the number of edges.
pub(super) fn pair(
    loops: &impl Loops,
    start: &[u32],
    buckets: &Buckets,
    face: &mut [u32],
    radial: &mut [u32],
    vertex: &mut [u32],
    peak: &mut Peak,
) -> usize {
    let mut pairing = Pairing { loops, start, face, radial, plain_uses: 0, other_edges: 0 };
    let mut ends = Vec::new();
    for ((v, corners), entry) in buckets.iter().zip(vertex) {
        let found = match corners.len() {
            0 => Some(NONE),
            1..=8 => pairing.few::<8>(v, corners),
            9..=FEW => pairing.few::<FEW>(v, corners),
            _ => None,
        };
        *entry = found.unwrap_or_else(|| {
            if ends.capacity() == 0 {
                ends = peak.held(Vec::with_capacity(2 * buckets.widest));
            }
            pairing.any(v, corners, &mut ends);
            LATER
        });
    }
    peak.drop(ends);
    pairing.plain_uses / 2 + pairing.other_edges
}

struct Pairing<'a, L> {
    loops: &'a L,
    start: &'a [u32],
    face: &'a mut [u32],
    radial: &'a mut [u32],
    /// Uses of plain edges linked so far.
    plain_uses: usize,
    /// Other edges whose first use was linked.
    other_edges: usize,
}

/// The two sides of each of up to `W` corners of a vertex.
struct Sides<const W: usize> {
    count: usize,
    /// The oriented edge each corner is entered by.
    entering: [u32; W],
    /// The vertex it comes from; no vertex at all from `count` on.
    from: [u32; W],
    /// The vertex the corner is left for.
    to: [u32; W],
}

impl<const W: usize> Sides<W> {
    /// The corners entered from `x`, a bit each. Always looks at all `W`: a fixed number of
    /// comparisons is a few vector instructions.
    #[inline(always)]
    fn entered_from(&self, x: u32) -> u32 {
        let mut bits = 0;
        for j in 0..W {
            bits |= u32::from(self.from[j] == x) << j;
        }
        bits
    }

    /// All corners, a bit each.
    #[inline(always)]
    fn all(&self) -> u32 {
        (1 << self.count) - 1
    }
}

impl<L: Loops> Pairing<'_, L> {
    /// Links what leaves `v`, and returns the entry of `v` when its sectors were seen, unless an
    /// edge at `v` is neither plain nor a boundary: then returns `None`.
    #[inline(always)]
    fn few<const W: usize>(&mut self, v: u32, corners: &[u32]) -> Option<u32> {
        let mut sides =
            Sides { count: corners.len().min(W), entering: [0; W], from: [NONE; W], to: [0; W] };
        for (i, &corner) in corners.iter().enumerate().take(W) {
            let entering = self.loops.prev(corner);
            sides.entering[i] = entering;
            sides.from[i] = self.start[entering as usize];
            sides.to[i] = self.start[self.loops.next(corner) as usize];
        }
        let mut turns = [0; W];
        let mut taken = 0;
        let mut ordinary = true;
        for (i, &corner) in corners.iter().enumerate().take(W) {
            let behind = sides.entered_from(sides.to[i]);
            let turn = behind.trailing_zeros() as usize % W;
            ordinary &= behind & behind.wrapping_sub(1) == 0 && sides.to[i] != v;
            taken |= behind;
            turns[i] = turn as u8;
            self.radial[corner as usize] = sides.entering[turn];
        }
        // As many corners behind as there are corners: each is behind exactly one.
        if !ordinary || taken != sides.all() {
            return self.few_with_boundary(v, corners, &sides);
        }
        self.plain_uses += sides.count;
        let mut at = 0;
        for steps in 1..=sides.count {
            at = usize::from(turns[at]) % W;
            if at == 0 {
                return Some(if steps == sides.count { corners[0] } else { LATER });
            }
        }
        Some(LATER)
    }

    /// The same with boundary edges at `v`.
    #[cold]
    fn few_with_boundary<const W: usize>(
        &mut self,
        v: u32,
        corners: &[u32],
        sides: &Sides<W>,
    ) -> Option<u32> {
        let to = &sides.to[..sides.count];
        let mut turns = [None; W];
        let mut taken = 0;
        for (i, &x) in to.iter().enumerate() {
            let behind = sides.entered_from(x);
            let again = to[..i].contains(&x);
            if x == v || again || behind.count_ones() > 1 {
                return None;
            }
            taken |= behind;
            turns[i] = (behind != 0).then(|| behind.trailing_zeros() as usize);
        }
        for (i, &corner) in corners.iter().enumerate() {
            self.radial[corner as usize] = match turns[i] {
                Some(turn) => sides.entering[turn],
                None => corner | TOP,
            };
            self.plain_uses += usize::from(turns[i].is_some());
            self.other_edges += usize::from(turns[i].is_none());
        }
        // An entry without an exit begins an open sector, and there is one: every exit has at
        // most one entry behind it, and not all entries are taken. If there are more, or rings
        // beside it, the sector of the first misses some corners.
        let first = (sides.all() & !taken).trailing_zeros() as usize;
        let (mut at, mut steps) = (first, 1);
        while let Some(turn) = turns[at] {
            (at, steps) = (turn, steps + 1);
        }
        Some(if steps == sides.count { corners[first] } else { LATER })
    }

    /// Links what leaves `v`, whatever there is, by sorting. `ends` is a workspace.
    #[cold]
    fn any(&mut self, v: u32, corners: &[u32], ends: &mut Vec<u64>) {
        // The far vertex, then the use, then whether the use leaves v.
        let key = |far: u32, side: u32, leaves: bool| {
            u64::from(far) << 32 | u64::from(side) << 1 | u64::from(leaves)
        };
        ends.clear();
        for &corner in corners {
            let entering = self.loops.prev(corner);
            let far = self.start[self.loops.next(corner) as usize];
            ends.push(key(far, corner, true));
            // A use from v to v is an end twice; it is a use once.
            if self.start[entering as usize] != v {
                ends.push(key(self.start[entering as usize], entering, false));
            }
        }
        ends.sort_unstable();
        for uses in ends.chunk_by(|a, b| a >> 32 == b >> 32) {
            self.link_uses((uses[0] >> 32) as u32 == v, uses);
        }
    }

    /// Links those of an edge's uses, ascending, that leave the vertex they were found at.
    fn link_uses(&mut self, is_self_edge: bool, uses: &[u64]) {
        let side = |key: u64| key as u32 >> 1;
        let leaves = |key: u64| key & 1 == 1;
        let plain = uses.len() == 2 && (is_self_edge || leaves(uses[0]) != leaves(uses[1]));
        for (&key, &behind) in uses.iter().zip(uses.iter().cycle().skip(1)) {
            if leaves(key) {
                self.radial[side(key) as usize] = side(behind) | if plain { 0 } else { TOP };
                self.plain_uses += usize::from(plain);
            }
        }
        if !plain && leaves(uses[0]) {
            self.other_edges += 1;
            if uses.len() > 1 {
                self.face[side(uses[0]) as usize] |= TOP;
            }
        }
    }
}

/// Numbers the edges by their first use: fills `edge` and returns a use of each of the `count`
/// edges.
///
/// An edge runs the way its first use does; uses of a self-edge run with, against, with … it.
pub(super) fn number_edges(
    loops: &impl Loops,
    start: &[u32],
    face: &mut [u32],
    radial: &[u32],
    edge: &mut [u32],
    count: usize,
    peak: &mut Peak,
) -> Vec<u32> {
    let mut uses = peak.held(vec![0; count]);
    let mut number = 0_u32;
    for h in 0..radial.len() {
        let behind = radial[h];
        if behind < TOP {
            // Written without a branch on which of the two comes first: nobody could predict it.
            let is_first = behind > h as u32;
            let other = edge[(behind as usize).min(h)] | TOP;
            edge[h] = if is_first { number } else { other };
            if let Some(place) = uses.get_mut(number as usize) {
                *place = h as u32;
            }
            number += u32::from(is_first);
        } else if behind & !TOP == h as u32 {
            edge[h] = number;
            uses[number as usize] = h as u32;
            number += 1;
        } else if face[h] & TOP != 0 {
            face[h] &= !TOP;
            number_cycle(loops, start, radial, edge, h, number);
            uses[number as usize] = h as u32;
            number += 1;
        }
    }
    debug_assert_eq!(number as usize, count, "every edge has a first use");
    uses
}

/// Numbers all uses of an edge that is not plain, from its first on.
#[cold]
fn number_cycle(
    loops: &impl Loops,
    start: &[u32],
    radial: &[u32],
    edge: &mut [u32],
    first: usize,
    number: u32,
) {
    let tail = start[first];
    let is_self_edge = start[loops.next(first as u32) as usize] == tail;
    let (mut h, mut with) = (first, true);
    loop {
        edge[h] = number | if with { 0 } else { TOP };
        h = (radial[h] & !TOP) as usize;
        if h == first {
            return;
        }
        with = if is_self_edge { !with } else { start[h] == tail };
    }
}
