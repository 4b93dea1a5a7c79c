//! Entries of vertices that are not ordinary: several sectors, misoriented neighbours, vertex
//! loops, many corners.

use super::pairing::Buckets;
use super::{Full, HalfEdge, NONE, TOP, oriented};
use crate::memory::Peak;
use crate::sectors::SectorSearch;
use crate::side::SideTable;
use crate::slots::Slots;
use merestone_topology::{FaceList, OrientedEdgeId};

/// The entry, while assembling, of a vertex whose sectors are still to be found.
pub(super) const LATER: u32 = u32::MAX - 1;

/// The vertex loops of a list as (vertex, face), by vertex, then in the list's order.
pub(super) fn listed_vertex_loops(
    list: &FaceList<'_>,
    count: usize,
    peak: &mut Peak,
) -> Vec<(u32, u32)> {
    let mut found = peak.held(Vec::with_capacity(count));
    if count > 0 {
        for face in 0..list.face_count() {
            let bare = list.loops(face).filter(|listed| listed.is_vertex_loop);
            found.extend(bare.map(|listed| (listed.corners[0], face as u32)));
        }
        found.sort_unstable();
    }
    found
}

fn loops_at(vertex_loops: &[(u32, u32)], v: u32) -> &[(u32, u32)] {
    let begin = vertex_loops.partition_point(|&(at, _)| at < v);
    let count = vertex_loops[begin..].partition_point(|&(at, _)| at == v);
    &vertex_loops[begin..begin + count]
}

/// A vertex's list in the side table: the number of sectors, their handles, the vertex loops.
pub(super) fn vertex_list<'a>(
    handles: &'a [OrientedEdgeId],
    faces: impl ExactSizeIterator<Item = u32> + 'a,
) -> (usize, impl Iterator<Item = u32> + 'a) {
    let len = 1 + handles.len() + faces.len();
    let handle_numbers = handles.iter().map(|handle| handle.to_u32());
    (len, std::iter::once(handles.len() as u32).chain(handle_numbers).chain(faces))
}

impl HalfEdge<Full> {
    /// Finds the sectors of the vertices whose entry is [`LATER`] or that vertex loops are at.
    pub(super) fn settle(
        &mut self,
        buckets: &Buckets,
        vertex_loops: &[(u32, u32)],
        peak: &mut Peak,
    ) {
        // Steps are asked for now; all oriented edges live.
        self.oriented_edges = Slots::new(self.links.start.len());
        // Entries are taken out so that the topology can be walked while they change.
        let mut entries = std::mem::take(&mut self.vertex);
        for &(v, _) in vertex_loops {
            entries[v as usize] = LATER;
        }
        if entries.contains(&LATER) {
            let mut search = SectorSearch::with_capacity(buckets.widest);
            peak.hold(search.bytes());
            let mut corners: Vec<OrientedEdgeId> = peak.held(Vec::with_capacity(buckets.widest));
            // What has one sector is settled first: then the table's size is known before it is made.
            let mut aside = 0;
            for ((v, bucket), entry) in buckets.iter().zip(&mut entries) {
                if *entry == LATER {
                    corners.clear();
                    corners.extend(bucket.iter().map(|&corner| oriented(corner)));
                    match search.handles(self, &corners) {
                        [only] if loops_at(vertex_loops, v).is_empty() => *entry = only.to_u32(),
                        _ => aside += 1,
                    }
                }
            }
            let mut table = SideTable::with_capacity(aside);
            if aside > 0 {
                for ((v, bucket), entry) in buckets.iter().zip(&mut entries) {
                    if *entry == LATER {
                        corners.clear();
                        corners.extend(bucket.iter().map(|&corner| oriented(corner)));
                        let handles = search.handles(self, &corners);
                        let faces = loops_at(vertex_loops, v).iter().map(|&(_, face)| face);
                        *entry = table.push(v, vertex_list(handles, faces)) | TOP;
                    }
                }
            }
            self.vertex_uses = table;
            peak.hold(self.vertex_uses.bytes());
            peak.drop(corners);
            peak.release(search.bytes());
        }
        self.vertex = entries;
    }

    /// Gives a vertex other sectors and vertex loops.
    pub(super) fn set_vertex(&mut self, v: u32, handles: &[OrientedEdgeId], faces: &[u32]) {
        let entry = self.vertex[v as usize];
        let was_aside = entry >= TOP && entry != NONE;
        let simple = match (handles, faces) {
            ([], []) => Some(NONE),
            ([only], []) => Some(only.to_u32()),
            _ => None,
        };
        if let Some(simple) = simple {
            self.vertex[v as usize] = simple;
            if was_aside && let Some(moved) = self.vertex_uses.remove(entry & !TOP) {
                self.vertex[moved as usize] = entry;
            }
            return;
        }
        let list = vertex_list(handles, faces.iter().copied());
        if was_aside {
            self.vertex_uses.replace(entry & !TOP, list);
        } else {
            self.vertex[v as usize] = self.vertex_uses.push(v, list) | TOP;
        }
    }
}
