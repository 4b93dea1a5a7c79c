//! What pairing is told: the corners of a face list, and what tells one edge from another.

use merestone_topology::{EdgeUse, FaceList};

/// What a bucket keeps of a corner: what tells the edge before it, what tells the edge behind it,
/// its number, and what else its list needs.
///
/// Arrays of numbers and not structs, since only of these does the standard library know that
/// zeroed memory will do.
pub(crate) trait Kept: Copy {
    const ZERO: Self;
    fn before(self) -> u32;
    fn behind(self) -> u32;
    fn number(self) -> u32;
    fn with_keys(self, before: u32, behind: u32) -> Self;
    /// Many of them as plain numbers, in the same memory.
    fn into_numbers(many: Vec<Self>) -> Vec<u32>;
}

impl<const N: usize> Kept for [u32; N] {
    const ZERO: Self = [0; N];

    fn into_numbers(many: Vec<Self>) -> Vec<u32> {
        many.into_flattened()
    }

    #[inline(always)]
    fn before(self) -> u32 {
        self[0]
    }

    #[inline(always)]
    fn behind(self) -> u32 {
        self[1]
    }

    #[inline(always)]
    fn number(self) -> u32 {
        self[2]
    }

    #[inline(always)]
    fn with_keys(mut self, before: u32, behind: u32) -> Self {
        (self[0], self[1]) = (before, behind);
        self
    }
}

/// The corners of a list's edge loops, numbered from 0 on in its order. Corner `c` doubles as the
/// use of an edge from its vertex to the next corner's.
pub(crate) trait Corners: Copy {
    type Kept: Kept;
    /// How many there are.
    fn count(self) -> usize;
    /// Calls `f` with each corner's vertex and the corner, its keys the vertices before and behind
    /// it; ascending.
    fn for_each(self, f: impl FnMut(u32, Self::Kept));
    /// The number of the corner before this one in its loop.
    fn entering(self, corner: Self::Kept) -> u32;
    /// The number of the corner behind this one in its loop: by arithmetic, or as `stored` for it.
    fn next(self, number: u32, stored: &[u32]) -> u32;
}

/// Corners of which every `K` are a loop: the way from one to the next is arithmetic.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Every<'a, const K: usize>(pub(crate) &'a [[u32; K]]);

impl<const K: usize> Corners for Every<'_, K> {
    type Kept = [u32; 3];

    fn count(self) -> usize {
        self.0.as_flattened().len()
    }

    #[inline(always)]
    fn for_each(self, mut f: impl FnMut(u32, [u32; 3])) {
        let mut number = 0;
        for corners in self.0 {
            for i in 0..K {
                f(corners[i], [corners[(i + K - 1) % K], corners[(i + 1) % K], number + i as u32]);
            }
            number += K as u32;
        }
    }

    #[inline(always)]
    fn entering(self, [.., number]: [u32; 3]) -> u32 {
        if number.is_multiple_of(K as u32) { number + K as u32 - 1 } else { number - 1 }
    }

    #[inline(always)]
    fn next(self, number: u32, _stored: &[u32]) -> u32 {
        let last = K as u32 - 1;
        if number % K as u32 == last { number - last } else { number + 1 }
    }
}

/// Corners of loops of any length, vertex loops left out. The number before is kept beside each.
#[derive(Clone, Copy, Debug)]
pub(crate) struct AnyLoops<'a> {
    list: FaceList<'a>,
    count: usize,
}

impl<'a> AnyLoops<'a> {
    /// The corners of `list`, of which `vertex_loops` loops are bare vertices.
    pub(crate) fn new(list: FaceList<'a>, vertex_loops: usize) -> Self {
        Self { list, count: list.corner_count() - vertex_loops }
    }
}

impl Corners for AnyLoops<'_> {
    type Kept = [u32; 4];

    fn count(self) -> usize {
        self.count
    }

    #[inline(always)]
    fn for_each(self, mut f: impl FnMut(u32, [u32; 4])) {
        let mut number = 0;
        for listed in (0..self.list.loop_count()).filter_map(|index| self.list.listed_loop(index)) {
            if listed.is_vertex_loop {
                continue;
            }
            let corners = listed.corners;
            let mut before = (corners[corners.len() - 1], number + corners.len() as u32 - 1);
            let behind = corners[1..].iter().chain(&corners[..1]);
            for (&vertex, &behind) in corners.iter().zip(behind) {
                f(vertex, [before.0, behind, number, before.1]);
                before = (vertex, number);
                number += 1;
            }
        }
    }

    #[inline(always)]
    fn entering(self, [.., entering]: [u32; 4]) -> u32 {
        entering
    }

    #[inline(always)]
    fn next(self, number: u32, stored: &[u32]) -> u32 {
        stored[number as usize]
    }
}

/// What tells one edge from another at a vertex.
pub(crate) trait Keys: Copy {
    /// `corner`, whose keys are the vertices before and behind it, with keys that tell the edges.
    fn keyed<C: Corners>(self, corners: C, corner: C::Kept) -> C::Kept;
    /// Whether `a` and `b`, all uses of an edge from a vertex to itself, run opposite ways.
    fn run_opposite(self, a: u32, b: u32) -> bool;
}

/// An edge is an unordered pair of vertices. The uses of an edge from a vertex to itself run with
/// it and against it in turn.
#[derive(Clone, Copy, Debug)]
pub(crate) struct ByVertices;

impl Keys for ByVertices {
    #[inline(always)]
    fn keyed<C: Corners>(self, _corners: C, corner: C::Kept) -> C::Kept {
        corner
    }

    fn run_opposite(self, _a: u32, _b: u32) -> bool {
        true
    }
}

/// As the list says, for every corner.
#[derive(Clone, Copy, Debug)]
pub(crate) struct ByNumber<'a>(pub(crate) &'a [EdgeUse]);

impl Keys for ByNumber<'_> {
    #[inline(always)]
    fn keyed<C: Corners>(self, corners: C, corner: C::Kept) -> C::Kept {
        let edge = |number: u32| self.0[number as usize].edge();
        corner.with_keys(edge(corners.entering(corner)), edge(corner.number()))
    }

    fn run_opposite(self, a: u32, b: u32) -> bool {
        self.0[a as usize].runs_with_edge() != self.0[b as usize].runs_with_edge()
    }
}
