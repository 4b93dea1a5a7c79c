//! The sectors and vertex loops of every vertex: one entry a vertex, and a side table for the few
//! that need more.

use crate::TOP;
use crate::memory::vec_bytes;
use crate::moves::Moves;
use crate::side::SideTable;
use crate::slots::Slots;
use merestone_topology::OrientedEdgeId;

/// The entry of a vertex without corners and vertex loops.
pub(crate) const NONE: u32 = u32::MAX;
/// The entry, while assembling, of a vertex whose sectors are still to be found.
pub(crate) const LATER: u32 = u32::MAX - 1;

/// For each vertex the handles of its sectors and the faces of its vertex loops.
///
/// The entry of a vertex with one sector is that sector's handle, so that a manifold mesh pays
/// four bytes a vertex and one test. All other entries have the top bit set.
#[derive(Clone, Debug, Default)]
pub(crate) struct VertexTable {
    /// A handle, [`NONE`], or the top bit and the index of a list.
    entries: Vec<u32>,
    /// How many sectors, their handles, and the faces of the vertex loops, ascending.
    lists: SideTable,
}

/// The vertex loops at `vertex` among (vertex, face), ascending.
pub(crate) fn faces_at(vertex_loops: &[(u32, u32)], vertex: u32) -> &[(u32, u32)] {
    let begin = vertex_loops.partition_point(|&(at, _)| at < vertex);
    let count = vertex_loops[begin..].partition_point(|&(at, _)| at == vertex);
    &vertex_loops[begin..begin + count]
}

impl VertexTable {
    /// A table of entries that are handles or [`NONE`].
    pub(crate) fn all_simple(entries: Vec<u32>) -> Self {
        Self { entries, lists: SideTable::with_capacity(0) }
    }

    /// A table of these entries, those with the top bit made by [`push`](Self::push).
    pub(crate) fn new(entries: Vec<u32>, lists: SideTable) -> Self {
        Self { entries, lists }
    }

    /// The entry of a vertex that needs no list.
    pub(crate) fn entry(handles: &[OrientedEdgeId], vertex_loops: usize) -> Option<u32> {
        match (handles, vertex_loops) {
            ([], 0) => Some(NONE),
            ([only], 0) => Some(only.to_u32()),
            _ => None,
        }
    }

    /// Adds a vertex's list to `lists` and returns the vertex's entry.
    pub(crate) fn push(
        lists: &mut SideTable,
        vertex: u32,
        handles: &[OrientedEdgeId],
        faces: impl ExactSizeIterator<Item = u32>,
    ) -> u32 {
        let handles = handles.iter().map(|handle| handle.to_u32());
        lists.push(vertex, list(handles, faces)) | TOP
    }

    /// The handle of sector number `i` of `vertex`.
    #[inline(always)]
    pub(crate) fn handle(&self, vertex: u32, i: usize) -> Option<u32> {
        let entry = self.entries[vertex as usize];
        if entry < TOP {
            return if i == 0 { Some(entry) } else { None };
        }
        self.listed_handle(entry, i)
    }

    #[cold]
    fn listed_handle(&self, entry: u32, i: usize) -> Option<u32> {
        self.listed(entry).0.get(i).copied()
    }

    /// The faces of the vertex loops at `vertex`, ascending.
    #[inline]
    pub(crate) fn faces(&self, vertex: u32) -> &[u32] {
        let entry = self.entries[vertex as usize];
        if entry < TOP { &[] } else { self.listed(entry).1 }
    }

    /// The handles and faces listed under an entry that is no handle.
    fn listed(&self, entry: u32) -> (&[u32], &[u32]) {
        if entry == NONE {
            return (&[], &[]);
        }
        let list = self.lists.get(entry & !TOP);
        list[1..].split_at(list[0] as usize)
    }

    /// Gives `vertex` these sectors and vertex loops in place of those it had.
    pub(crate) fn set(&mut self, vertex: u32, handles: &[OrientedEdgeId], faces: &[u32]) {
        let old = self.entries[vertex as usize];
        let was_listed = old >= TOP && old != NONE;
        let numbers = handles.iter().map(|handle| handle.to_u32());
        let entry = match Self::entry(handles, faces.len()) {
            None if was_listed => {
                self.lists.replace(old & !TOP, list(numbers, faces.iter().copied()));
                return;
            }
            None => self.lists.push(vertex, list(numbers, faces.iter().copied())) | TOP,
            Some(simple) => {
                if was_listed && let Some(moved) = self.lists.remove(old & !TOP) {
                    self.entries[moved as usize] = old;
                }
                simple
            }
        };
        self.entries[vertex as usize] = entry;
    }

    /// Drops the entries of retired vertices; the closures give each handle's new number and each
    /// face's.
    pub(crate) fn compact(
        &mut self,
        live: &Slots,
        handle: impl Fn(u32) -> u32,
        face: impl Fn(u32) -> u32,
    ) {
        let mut lists = SideTable::with_capacity(self.lists.len());
        let mut owner = 0;
        let entries = Moves::squeeze(&self.entries, live, |entry| {
            owner += 1;
            match entry {
                NONE => NONE,
                entry if entry < TOP => handle(entry),
                entry => {
                    let (handles, faces) = self.listed(entry);
                    let handles = handles.iter().map(|&h| handle(h));
                    let faces = faces.iter().map(|&f| face(f));
                    lists.push(owner - 1, list(handles, faces)) | TOP
                }
            }
        });
        (self.entries, self.lists) = (entries, lists);
    }

    /// The heap bytes of the entries.
    pub(crate) fn entry_bytes(&self) -> usize {
        vec_bytes(&self.entries)
    }

    /// The heap bytes of the side table.
    pub(crate) fn list_bytes(&self) -> usize {
        self.lists.bytes()
    }
}

/// A vertex's list: the number of sectors, their handles, the faces of the vertex loops.
fn list(
    handles: impl ExactSizeIterator<Item = u32>,
    faces: impl ExactSizeIterator<Item = u32>,
) -> (usize, impl Iterator<Item = u32>) {
    let count = handles.len();
    (1 + count + faces.len(), std::iter::once(count as u32).chain(handles).chain(faces))
}
