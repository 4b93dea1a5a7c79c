//! Pairing the uses of edges: what every kernel does when it is assembled.
//!
//! The input is a list of corners, each with the vertex it lies at and the corners before and
//! behind it; corner `c` doubles as the use of an edge from its vertex to the next corner's
//! ([`corners`]). The corners are sorted by vertex ([`buckets`]), and each vertex is then a small
//! matter of its own:
//!
//! 1. [`regular`]: where the vertices before and behind its corners are the same, each once, all
//!    edges there are plain and the corners follow one another; linked without a branch that
//!    depends on the data.
//! 2. [`irregular`]: otherwise the uses there are grouped by edge and linked one edge at a time,
//!    and when all links stand, the sectors are found by definition.
//!
//! A closed manifold mesh never gets to the second. A list that numbers its edges takes the same
//! way, once the numbers are [checked](numbered), with those numbers in place of the far vertices.

mod buckets;
mod corners;
mod irregular;
mod numbered;
mod regular;

use crate::memory::Peak;
use crate::vertex_table::VertexTable;
use buckets::Buckets;
pub(crate) use corners::{AnyLoops, Corners, Every, Kept};
use corners::{ByNumber, ByVertices, Keys};
use merestone_topology::{EdgeUse, FaceListError, OrientedEdgeId, Topology};

/// A kernel whose links are being made.
///
/// Where edges are linked it is asked for its steps `next`, `prev`, `radial`, `turn` and
/// `is_plain`, and for nothing else.
pub(crate) trait Links: Topology<OrientedEdge = OrientedEdgeId> {
    /// The link of a use whose edge is plain: its other use is `twin`, behind which comes the
    /// corner `behind`.
    fn link(twin: u32, behind: u32) -> u32;
    /// `leaving` has this link. Comes for both uses of a plain edge, and may come in vain before
    /// [`cycle`](Self::cycle) corrects it.
    fn plain(&mut self, leaving: u32, link: u32);
    /// The corner behind `leaving` around its start, by the link it has.
    fn behind(&self, list: impl Corners, leaving: u32) -> u32;
    /// `uses`, in radial order, are all the uses of an edge: plain (then there are two) or not.
    fn cycle(&mut self, uses: &[u32], is_plain: bool);
}

/// What pairing found.
#[derive(Clone, Debug)]
pub(crate) struct Paired<T> {
    /// How many edges there are.
    pub(crate) edges: usize,
    /// Whether all of them are plain.
    pub(crate) all_plain: bool,
    /// The sectors, and the vertex loops that were given.
    pub(crate) vertices: VertexTable,
    /// The uses from a vertex to itself as (vertex, use), ascending.
    pub(crate) selves: Vec<(u32, u32)>,
    /// The memory the corners were sorted in, one place a corner, for an array of the kernel's:
    /// memory that was touched before is faster than fresh memory.
    pub(crate) memory: Vec<T>,
}

/// Pairs the uses of a list in which an edge is an unordered pair of vertices.
///
/// `vertex_loops` are (vertex, face), ascending. What is returned is held in `peak`.
/// O(corners) expected; a vertex of c corners costs O(c log c) at worst.
pub(crate) fn pair_by_vertices<C: Corners>(
    corners: C,
    vertex_count: usize,
    vertex_loops: &[(u32, u32)],
    links: &mut impl Links,
    peak: &mut Peak,
) -> Paired<C::Kept> {
    pair(corners, ByVertices, vertex_count, vertex_loops, links, peak)
}

/// Pairs the uses of a list that numbers its edges, a use for each of the corners.
///
/// # Errors
/// [`FaceListError::InconsistentEdge`] unless the numbers have no gap and all uses of an edge
/// join the same two vertices the way they say.
pub(crate) fn pair_by_number<C: Corners>(
    corners: C,
    uses: &[EdgeUse],
    vertex_count: usize,
    vertex_loops: &[(u32, u32)],
    links: &mut impl Links,
    peak: &mut Peak,
) -> Result<Paired<C::Kept>, FaceListError> {
    numbered::check(corners, uses, peak)?;
    Ok(pair(corners, ByNumber(uses), vertex_count, vertex_loops, links, peak))
}

fn pair<C: Corners>(
    list: C,
    keys: impl Keys,
    vertex_count: usize,
    vertex_loops: &[(u32, u32)],
    links: &mut impl Links,
    peak: &mut Peak,
) -> Paired<C::Kept> {
    let buckets = Buckets::new(list, keys, vertex_count, peak);
    let mut entries = peak.held(vec![0; vertex_count]);
    let mut ends = regular::link(list, &buckets, links, &mut entries);
    let mut all_plain = true;
    let has_irregular = ends < list.count();
    if has_irregular {
        let linked = irregular::link(list, keys, &buckets, &entries, links, peak);
        ends += linked.0;
        all_plain = linked.1;
    }
    let vertices = if has_irregular || !vertex_loops.is_empty() {
        irregular::find_sectors(links, &buckets, entries, vertex_loops, peak)
    } else {
        VertexTable::all_simple(entries)
    };
    let (selves, memory) = buckets.into_parts(peak);
    Paired { edges: ends / 2, all_plain, vertices, selves, memory }
}
