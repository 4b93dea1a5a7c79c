//! Pairing the uses of edges: what every kernel does when it is assembled.
//!
//! The input is a list of corners, each with the vertex it lies at and the corners before and
//! behind it; corner `c` doubles as the use of an edge from its vertex to the next corner's. The
//! corners are sorted by vertex ([`buckets`]), and each vertex is then a small matter of its own:
//!
//! 1. [`regular`]: where the vertices before and behind its corners are the same, each once, all
//!    edges there are plain and the corners follow one another; linked without a branch that
//!    depends on the data.
//! 2. [`irregular`]: otherwise the uses there are grouped by edge and linked one edge at a time,
//!    and when all links stand, the sectors are found by definition.
//!
//! A closed manifold mesh never gets to the second. A list that numbers its edges takes the same
//! way with those numbers in place of the far vertices.

mod buckets;
mod irregular;
mod numbered;
mod regular;

use crate::memory::vec_bytes;
use buckets::Buckets;
use irregular::Directions;
use merestone_topology::{EdgeUse, FaceListError, OrientedEdgeId, Topology};

/// The not-plain bit of a stored link.
pub(crate) const LOOSE: u32 = 1 << 31;

/// Corners and how they follow each other.
pub(crate) trait Corners: Copy {
    /// How many there are.
    fn count(self) -> usize;
    /// The corner before `c` in its loop.
    fn prev(self, c: u32) -> u32;
    /// Calls `f(corner, vertex before, vertex, vertex behind)` for every corner, ascending.
    fn for_each(self, f: impl FnMut(u32, u32, u32, u32));
}

/// A kernel whose links are being made. Its steps over linked edges must answer already.
pub(crate) trait Links: Topology<OrientedEdge = OrientedEdgeId> {
    /// The edge that `leaving` uses is plain, and around `leaving`'s start the corner behind
    /// `leaving` is `behind`. Comes for both uses of the edge, and may come in vain before
    /// [`loose`](Self::loose) corrects it.
    fn turn_to(&mut self, leaving: u32, behind: u32);
    /// `uses`, ascending, are all the uses of an edge: plain (then there are two) or not.
    fn cycle(&mut self, uses: &[u32], is_plain: bool);
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

/// Pairs the uses of a list in which an edge is an unordered pair of vertices.
///
/// O(corners) expected; a vertex of c corners costs O(c log c) at worst.
pub(crate) fn pair_by_vertices<C: Corners>(
    corners: C,
    vertex_count: usize,
    links: &mut impl Links,
) -> Paired {
    let buckets = Buckets::new(corners, vertex_count);
    let mut paired = Paired::default();
    let (irregular, mut ends) = regular::link(&buckets, links);
    paired.held(buckets.bytes() + vec_bytes(&irregular));
    ends +=
        irregular::link(corners, &buckets, &irregular, Directions::ByVertices, links, &mut paired);
    paired.edges = ends / 2;
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
    let mut paired = numbered::check(corners, uses)?;
    let buckets = Buckets::new(corners, vertex_count);
    let all: Vec<u32> = buckets.vertices().filter(|&v| !buckets.corners(v).is_empty()).collect();
    irregular::link(corners, &buckets, &all, Directions::ByNumber(uses), links, &mut paired);
    Ok(paired)
}
