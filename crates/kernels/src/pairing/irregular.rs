//! The third stride: vertices at boundaries, joints and misoriented edges, one at a time.

use super::{Corners, Links, Marks, Paired};
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

/// Links all edges at the marked vertices, then finds the sectors of these vertices.
pub(super) fn settle<C: Corners>(
    corners: C,
    marks: &Marks,
    links: &mut impl Links,
    paired: &mut Paired,
    directions: Directions<'_>,
) {
    let mut count = 0;
    corners.for_each_use(|_, start, _| count += usize::from(marks.is_marked(start)));
    let mut gathered: Vec<(u32, OrientedEdgeId)> = Vec::with_capacity(count);
    corners.for_each_use(|number, start, _| {
        if marks.is_marked(start) {
            gathered.push((start, OrientedEdgeId::from_u32(number)));
        }
    });
    gathered.sort_unstable();
    let widest = gathered.chunk_by(|a, b| a.0 == b.0).map(<[_]>::len).max().unwrap_or(0);

    let mut sides: Vec<Side> = Vec::with_capacity(2 * widest);
    let mut uses: Vec<u32> = Vec::with_capacity(2 * widest);
    for here in gathered.chunk_by(|a, b| a.0 == b.0) {
        sides.clear();
        for &(_, corner) in here {
            let (leaving, entered) = (corner.to_u32(), corners.prev(corner.to_u32()));
            for (number, far, outgoing) in [
                (entered, corners.vertex(entered), false),
                (leaving, corners.vertex(corners.next(leaving)), true),
            ] {
                let key = match directions {
                    Directions::ByVertices => far,
                    Directions::ByNumber(listed) => listed[number as usize].edge(),
                };
                sides.push(Side { key, number, outgoing });
            }
        }
        sides.sort_unstable();
        for sides in sides.chunk_by(|a, b| a.key == b.key) {
            link(sides, &mut uses, links, directions);
        }
    }

    let mut search = SectorSearch::with_capacity(widest);
    let mut at: Vec<OrientedEdgeId> = Vec::with_capacity(widest);
    paired.held(
        marks.bytes()
            + vec_bytes(&gathered)
            + vec_bytes(&sides)
            + vec_bytes(&uses)
            + vec_bytes(&at)
            + search.bytes(),
    );
    for here in gathered.chunk_by(|a, b| a.0 == b.0) {
        at.clear();
        at.extend(here.iter().map(|&(_, corner)| corner));
        let handles = search.handles(links, &at);
        links.sectors(here[0].0, handles);
    }
}

/// Links the uses of one edge; `sides` are those at one of its vertices.
fn link(sides: &[Side], uses: &mut Vec<u32>, links: &mut impl Links, directions: Directions<'_>) {
    uses.clear();
    uses.extend(sides.iter().map(|side| side.number));
    // An edge from the vertex to itself is here with both its ends: each of its uses twice.
    uses.dedup();
    let [first, second] = uses[..] else {
        links.loose(uses);
        return;
    };
    let is_plain = match directions {
        Directions::ByNumber(listed) => {
            listed[first as usize].runs_with_edge() != listed[second as usize].runs_with_edge()
        }
        Directions::ByVertices if sides.len() == 4 => true,
        Directions::ByVertices => sides[0].outgoing != sides[1].outgoing,
    };
    if is_plain {
        links.plain(first, second);
    } else {
        links.loose(uses);
    }
}
