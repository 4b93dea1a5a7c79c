//! Vertices at boundaries, joints and misoriented edges, with several fans, or with many corners.

use super::Links;
use super::buckets::Buckets;
use super::corners::{Corners, Kept, Keys};
use crate::memory::Peak;
use crate::sectors::SectorSearch;
use crate::vertex_table::{LATER, VertexTable, faces_at};
use crate::{memory::vec_bytes, side::SideTable};
use merestone_topology::{OrientedEdgeId, Topology};

/// A use that starts or ends at the vertex in hand, to be sorted by edge and number: what tells
/// the edge, the number, whether the use starts here.
type Side = u64;

fn side(key: u32, number: u32, outgoing: bool) -> Side {
    u64::from(key) << 32 | u64::from(number) << 1 | u64::from(outgoing)
}

fn number_of(side: Side) -> u32 {
    side as u32 >> 1
}

/// The vertices left for later, with their corners.
fn later<'a, T: Kept>(
    buckets: &'a Buckets<T>,
    entries: &'a mut [u32],
) -> impl Iterator<Item = (u32, &'a [T], &'a mut u32)> {
    let all =
        buckets.iter().zip(entries).map(|((vertex, corners), entry)| (vertex, corners, entry));
    all.filter(|(_, _, entry)| **entry == LATER)
}

fn widest<T: Kept>(buckets: &Buckets<T>, entries: &mut [u32]) -> usize {
    later(buckets, entries).map(|(_, corners, _)| corners.len()).max().unwrap_or(0)
}

/// Links all edges at the vertices left for later. Returns how many edge ends they have, and
/// whether all those edges are plain.
#[cold]
pub(super) fn link<C: Corners>(
    list: C,
    keys: impl Keys,
    buckets: &Buckets<C::Kept>,
    entries: &mut [u32],
    links: &mut impl Links,
    peak: &mut Peak,
) -> (usize, bool) {
    let widest = widest(buckets, entries);
    let mut sides: Vec<Side> = peak.held(Vec::with_capacity(2 * widest));
    let mut uses: Vec<u32> = peak.held(Vec::with_capacity(2 * widest));
    let (mut ends, mut all_plain) = (0, true);
    for (_, corners, _) in later(buckets, entries) {
        sides.clear();
        for &corner in corners {
            sides.push(side(corner.before(), list.entering(corner), false));
            sides.push(side(corner.behind(), corner.number(), true));
        }
        sides.sort_unstable();
        for sides in sides.chunk_by(|a, b| a >> 32 == b >> 32) {
            uses.clear();
            uses.extend(sides.iter().map(|&side| number_of(side)));
            // An edge from the vertex to itself is here with both ends: each of its uses twice.
            uses.dedup();
            ends += sides.len() / uses.len();
            let is_plain = match *uses {
                [a, b] if sides.len() == 4 => keys.run_opposite(a, b),
                [_, _] => (sides[0] ^ sides[1]) & 1 == 1,
                _ => false,
            };
            all_plain &= is_plain;
            links.cycle(&uses, is_plain);
        }
    }
    peak.drop(sides);
    peak.drop(uses);
    (ends, all_plain)
}

/// Finds the sectors of the vertices left for later, and of those with vertex loops, which are
/// given as (vertex, face), ascending. All edges must be linked.
pub(super) fn find_sectors<T: Kept>(
    mesh: &impl Topology<OrientedEdge = OrientedEdgeId>,
    buckets: &Buckets<T>,
    mut entries: Vec<u32>,
    vertex_loops: &[(u32, u32)],
    peak: &mut Peak,
) -> VertexTable {
    for &(vertex, _) in vertex_loops {
        entries[vertex as usize] = LATER;
    }
    let widest = widest(buckets, &mut entries);
    let mut search = SectorSearch::with_capacity(widest);
    peak.hold(search.bytes());
    let mut at: Vec<OrientedEdgeId> = peak.held(Vec::with_capacity(widest));
    let mut handles_of = |corners: &[T], found: &mut dyn FnMut(&[OrientedEdgeId])| {
        at.clear();
        at.extend(corners.iter().map(|corner| OrientedEdgeId::from_u32(corner.number())));
        found(search.handles(mesh, &at));
    };
    // Those of one sector first: then the side table's size is known before it is made.
    let mut listed = 0;
    for (vertex, corners, entry) in later(buckets, &mut entries) {
        let faces = faces_at(vertex_loops, vertex);
        handles_of(corners, &mut |handles| match VertexTable::entry(handles, faces.len()) {
            Some(simple) => *entry = simple,
            None => listed += 1,
        });
    }
    let mut lists = SideTable::with_capacity(listed);
    if listed > 0 {
        for (vertex, corners, entry) in later(buckets, &mut entries) {
            let faces = faces_at(vertex_loops, vertex).iter().map(|&(_, face)| face);
            handles_of(corners, &mut |handles| {
                *entry = VertexTable::push(&mut lists, vertex, handles, faces.clone());
            });
        }
    }
    peak.hold(lists.bytes());
    peak.release(search.bytes() + vec_bytes(&at));
    VertexTable::new(entries, lists)
}
