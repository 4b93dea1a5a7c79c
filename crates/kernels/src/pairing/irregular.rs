//! Vertices at boundaries, joints and misoriented edges, with several fans, or with many corners.

use super::buckets::Buckets;
use super::{Corners, Links, Paired};
use crate::memory::vec_bytes;
use crate::sectors::SectorSearch;
use merestone_topology::{EdgeUse, OrientedEdgeId};

/// How uses are told to belong to one edge, and which way they run along it.
#[derive(Clone, Copy)]
pub(super) enum Directions<'a> {
    /// An edge is an unordered pair of vertices; the uses of an edge from a vertex to itself run
    /// with it and against it in turn.
    ByVertices,
    /// As the list says.
    ByNumber(&'a [EdgeUse]),
}

/// A use that starts or ends at the vertex in hand.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
struct Side {
    /// What tells the edge: the far vertex, or the edge's number.
    key: u32,
    number: u32,
    outgoing: bool,
}

/// Links all edges at these vertices, then finds the vertices' sectors. Returns how many edge ends
/// they have.
pub(super) fn link<C: Corners>(
    list: C,
    buckets: &Buckets,
    vertices: &[u32],
    directions: Directions<'_>,
    links: &mut impl Links,
    paired: &mut Paired,
) -> usize {
    let widest = vertices.iter().map(|&v| buckets.corners(v).len()).max().unwrap_or(0);
    let mut sides: Vec<Side> = Vec::with_capacity(2 * widest);
    let mut uses: Vec<u32> = Vec::with_capacity(2 * widest);
    let mut ends = 0;
    for &vertex in vertices {
        sides.clear();
        for &[before, behind, number] in buckets.corners(vertex) {
            let entered = list.prev(number);
            for (number, far, outgoing) in [(entered, before, false), (number, behind, true)] {
                let key = match directions {
                    Directions::ByVertices => far,
                    Directions::ByNumber(listed) => listed[number as usize].edge(),
                };
                sides.push(Side { key, number, outgoing });
            }
        }
        sides.sort_unstable();
        for sides in sides.chunk_by(|a, b| a.key == b.key) {
            uses.clear();
            uses.extend(sides.iter().map(|side| side.number));
            // An edge from the vertex to itself is here with both ends: each of its uses twice.
            uses.dedup();
            ends += sides.len() / uses.len();
            links.cycle(&uses, is_plain(sides, &uses, directions));
        }
    }

    let mut search = SectorSearch::with_capacity(widest);
    let mut at: Vec<OrientedEdgeId> = Vec::with_capacity(widest);
    paired.held(
        buckets.bytes()
            + size_of_val(vertices)
            + vec_bytes(&sides)
            + vec_bytes(&uses)
            + vec_bytes(&at)
            + search.bytes(),
    );
    for &vertex in vertices {
        at.clear();
        at.extend(buckets.corners(vertex).iter().map(|&[.., c]| OrientedEdgeId::from_u32(c)));
        let handles = search.handles(links, &at);
        links.sectors(vertex, handles);
    }
    ends
}

/// Whether `uses`, whose sides at one vertex are `sides`, are two and run opposite ways.
fn is_plain(sides: &[Side], uses: &[u32], directions: Directions<'_>) -> bool {
    let [first, second] = *uses else { return false };
    match directions {
        Directions::ByNumber(listed) => {
            listed[first as usize].runs_with_edge() != listed[second as usize].runs_with_edge()
        }
        Directions::ByVertices => sides.len() == 4 || sides[0].outgoing != sides[1].outgoing,
    }
}
