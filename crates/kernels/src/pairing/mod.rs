//! Pairing the uses of edges: what every kernel does when it is assembled.
//!
//! The input is a list of corners, each with the vertex it lies at and the corners before and
//! behind it; corner `c` doubles as the use of an edge from its vertex to the next corner's. The
//! work goes in three strides:
//!
//! 1. [`buckets`] files every use under one of its two vertices and meets its partner there. All
//!    plain edges are done after one pass. Vertices at any other edge are marked *irregular*.
//!    A list that numbers its edges is grouped by those numbers instead ([`numbered`]).
//! 2. [`rings`] walks once around every regular vertex, to find those where two fans meet.
//! 3. [`irregular`] takes the marked vertices one at a time, groups the uses there by edge, and
//!    finds the sectors by definition.
//!
//! A mesh without boundary and joints never gets to the third stride.

mod buckets;
mod irregular;
mod numbered;
mod rings;

use irregular::Directions;
use merestone_topology::{EdgeUse, FaceListError, OrientedEdgeId, Topology};

/// The not-plain bit of a stored link.
pub(crate) const LOOSE: u32 = 1 << 31;

/// Corners and how they follow each other.
pub(crate) trait Corners: Copy {
    /// How many there are.
    fn count(self) -> usize;
    /// The vertex corner `c` lies at.
    fn vertex(self, c: u32) -> u32;
    /// The corner behind `c` in its loop.
    fn next(self, c: u32) -> u32;
    /// The corner before `c` in its loop.
    fn prev(self, c: u32) -> u32;
    /// Calls `f(use, start, end)` for every use, ascending.
    fn for_each_use(self, f: impl FnMut(u32, u32, u32));
}

/// A kernel whose links are being made. Its steps over linked edges must answer already.
pub(crate) trait Links: Topology<OrientedEdge = OrientedEdgeId> {
    /// `a` and `b` are the two uses of an edge and run opposite ways.
    fn plain(&mut self, a: u32, b: u32);
    /// `uses`, ascending, are all the uses of an edge that is not plain.
    fn loose(&mut self, uses: &[u32]);
    /// The corner behind `c` around its vertex, on a plain edge.
    fn behind(&self, c: u32) -> u32;
    /// `handle` stands for the only sector of `vertex`.
    fn sector(&mut self, vertex: u32, handle: u32);
    /// `handles` stand for the sectors of `vertex`.
    fn sectors(&mut self, vertex: u32, handles: &[OrientedEdgeId]);
}

/// What pairing found and used.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub(crate) struct Paired {
    /// How many edges there are.
    pub(crate) edges: usize,
    /// The most bytes of scratch held at once.
    pub(crate) scratch: usize,
}

impl Paired {
    fn held(&mut self, bytes: usize) {
        self.scratch = self.scratch.max(bytes);
    }
}

/// Which vertices are irregular; nothing is allocated while none is.
#[derive(Debug)]
struct Marks {
    vertex_count: usize,
    marked: Vec<bool>,
}

impl Marks {
    fn none(vertex_count: usize) -> Self {
        Self { vertex_count, marked: Vec::new() }
    }

    #[cold]
    fn mark(&mut self, vertex: u32) {
        if self.marked.is_empty() {
            self.marked = vec![false; self.vertex_count];
        }
        self.marked[vertex as usize] = true;
    }

    fn any(&self) -> bool {
        !self.marked.is_empty()
    }

    #[inline(always)]
    fn is_marked(&self, vertex: u32) -> bool {
        self.marked.get(vertex as usize).is_some_and(|&marked| marked)
    }

    fn bytes(&self) -> usize {
        self.marked.capacity()
    }
}

/// Pairs the uses of a list in which an edge is an unordered pair of vertices.
pub(crate) fn pair_by_vertices<C: Corners>(
    corners: C,
    vertex_count: usize,
    links: &mut impl Links,
) -> Paired {
    let mut paired = Paired::default();
    let mut marks = Marks::none(vertex_count);
    let handles = buckets::pair(corners, vertex_count, links, &mut marks, &mut paired);
    finish(corners, handles, &mut marks, links, &mut paired, Directions::ByVertices);
    paired
}

/// Pairs the uses of a list that numbers its edges.
///
/// # Errors
/// [`FaceListError::InconsistentEdge`] unless the numbers have no gap and all uses of an edge
/// join the same two vertices the way they say.
pub(crate) fn pair_by_number<C: Corners>(
    corners: C,
    vertex_count: usize,
    uses: &[EdgeUse],
    links: &mut impl Links,
) -> Result<Paired, FaceListError> {
    let mut paired = Paired::default();
    let mut marks = Marks::none(vertex_count);
    let handles = numbered::pair(corners, vertex_count, uses, links, &mut marks, &mut paired)?;
    finish(corners, handles, &mut marks, links, &mut paired, Directions::ByNumber(uses));
    Ok(paired)
}

/// The second and third stride. `handles` holds some corner of every vertex, or [`u32::MAX`].
fn finish<C: Corners>(
    corners: C,
    handles: Vec<u32>,
    marks: &mut Marks,
    links: &mut impl Links,
    paired: &mut Paired,
    directions: Directions<'_>,
) {
    rings::find_pinched(corners, &handles, marks, links, paired);
    for (vertex, &handle) in handles.iter().enumerate() {
        if handle != u32::MAX && !marks.is_marked(vertex as u32) {
            links.sector(vertex as u32, handle);
        }
    }
    drop(handles);
    if marks.any() {
        irregular::settle(corners, marks, links, paired, directions);
    }
}
