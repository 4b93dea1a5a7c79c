//! Vertices at boundaries, joints and misoriented edges, with several fans, or with many corners.

use super::Links;
use super::buckets::Buckets;
use super::corners::{Corners, Kept, Keys};
use crate::memory::Peak;
use crate::sectors::SectorSearch;
use crate::side::SideTable;
use crate::vertex_table::{LATER, VertexTable, faces_at};
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

/// The vertices left for later, ascending.
fn later(entries: &[u32], peak: &mut Peak) -> Vec<u32> {
    let is_later = |&&entry: &&u32| entry == LATER;
    let mut vertices = Vec::with_capacity(entries.iter().filter(is_later).count());
    let found = (0..).zip(entries).filter(|(_, entry)| is_later(entry));
    vertices.extend(found.map(|(vertex, _)| vertex));
    peak.held(vertices)
}

fn widest<T: Kept>(buckets: &Buckets<T>, vertices: &[u32]) -> usize {
    vertices.iter().map(|&vertex| buckets.corners(vertex).len()).max().unwrap_or(0)
}

/// Links all edges at the vertices left for later. Returns how many edge ends they have, and
/// whether all those edges are plain.
#[cold]
pub(super) fn link<C: Corners>(
    list: C,
    keys: impl Keys,
    buckets: &Buckets<C::Kept>,
    entries: &[u32],
    links: &mut impl Links,
    peak: &mut Peak,
) -> (usize, bool) {
    let vertices = later(entries, peak);
    let widest = widest(buckets, &vertices);
    let mut sides: Vec<Side> = peak.held(Vec::with_capacity(2 * widest));
    let mut uses: Vec<u32> = peak.held(Vec::with_capacity(2 * widest));
    let (mut ends, mut all_plain) = (0, true);
    for &vertex in &vertices {
        sides.clear();
        for &corner in buckets.corners(vertex) {
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
    peak.drop(vertices);
    (ends, all_plain)
}

/// Finds the sectors of the vertices left for later, and of those with vertex loops, which are
/// given as (vertex, face), ascending. All edges must be linked.
#[cold]
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
    let mut vertices = later(&entries, peak);
    let widest = widest(buckets, &vertices);
    let mut search = SectorSearch::with_capacity(widest);
    peak.hold(search.bytes());
    let mut corners: Vec<OrientedEdgeId> = peak.held(Vec::with_capacity(widest));
    let gather = |vertex, corners: &mut Vec<OrientedEdgeId>| {
        corners.clear();
        let bucket = buckets.corners(vertex).iter();
        corners.extend(bucket.map(|corner| OrientedEdgeId::from_u32(corner.number())));
    };
    // Those of one sector first: then the side table's size is known before it is made.
    vertices.retain(|&vertex| {
        gather(vertex, &mut corners);
        let handles = search.handles(mesh, &corners);
        let simple = VertexTable::entry(handles, faces_at(vertex_loops, vertex).len());
        if let Some(simple) = simple {
            entries[vertex as usize] = simple;
        }
        simple.is_none()
    });
    let mut lists = SideTable::with_capacity(vertices.len());
    for &vertex in &vertices {
        gather(vertex, &mut corners);
        let handles = search.handles(mesh, &corners);
        let faces = faces_at(vertex_loops, vertex).iter().map(|&(_, face)| face);
        entries[vertex as usize] = VertexTable::push(&mut lists, vertex, handles, faces);
    }
    peak.hold(lists.bytes());
    peak.release(search.bytes());
    peak.drop(corners);
    peak.drop(vertices);
    VertexTable::new(entries, lists)
}
