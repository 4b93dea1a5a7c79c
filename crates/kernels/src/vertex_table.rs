//! The sectors of every vertex: one entry a vertex, and a side table for the few that need more.

use crate::memory::vec_bytes;
use crate::side::SideTable;
use crate::slots::Slots;
use merestone_topology::OrientedEdgeId;

/// The entry of a vertex without a corner.
const NONE: u32 = u32::MAX >> 1;
/// Marks an entry that is an index into the side table.
const LISTED: u32 = 1 << 31;

/// For each vertex the handles of its sectors.
///
/// The entry of a vertex with one sector is that sector's handle, so that a manifold mesh pays
/// four bytes a vertex and one test.
#[derive(Clone, Debug)]
pub(crate) struct VertexTable {
    entries: Vec<u32>,
    listed: SideTable,
}

impl VertexTable {
    /// `count` vertices without a corner.
    pub(crate) fn isolated(count: usize) -> Self {
        Self { entries: vec![NONE; count], listed: SideTable::with_capacity(0) }
    }

    /// The handle of sector number `i` of `vertex`.
    #[inline(always)]
    pub(crate) fn handle(&self, vertex: u32, i: usize) -> Option<u32> {
        let entry = self.entries[vertex as usize];
        if entry < NONE {
            return if i == 0 { Some(entry) } else { None };
        }
        self.listed_handle(entry, i)
    }

    #[cold]
    fn listed_handle(&self, entry: u32, i: usize) -> Option<u32> {
        if entry == NONE { None } else { self.listed.get(entry & !LISTED).get(i).copied() }
    }

    /// Gives `vertex` one sector; only for a vertex that is not listed.
    #[inline(always)]
    pub(crate) fn set_one(&mut self, vertex: u32, handle: u32) {
        self.entries[vertex as usize] = handle;
    }

    /// Gives `vertex` these sectors in place of those it had.
    pub(crate) fn set(&mut self, vertex: u32, handles: &[OrientedEdgeId]) {
        let entry = self.entries[vertex as usize];
        let listed = (entry >= LISTED).then_some(entry & !LISTED);
        self.entries[vertex as usize] = match (handles, listed) {
            ([_, _, ..], Some(index)) => {
                self.listed.replace(index, numbers(handles));
                return;
            }
            ([_, _, ..], None) => LISTED | self.listed.push(vertex, numbers(handles)),
            (few, listed) => {
                if let Some(index) = listed
                    && let Some(moved) = self.listed.remove(index)
                {
                    self.entries[moved as usize] = LISTED | index;
                }
                few.first().map_or(NONE, |h| h.to_u32())
            }
        };
    }

    /// Drops the entries of retired vertices; `moved` gives each handle's new number, `new_vertex`
    /// each live vertex's.
    pub(crate) fn compact(
        &mut self,
        slots: &Slots,
        new_vertex: impl Fn(u32) -> u32,
        moved: impl Fn(u32) -> u32,
    ) {
        let mut listed = SideTable::with_capacity(self.listed.len());
        let mut entries = Vec::with_capacity(slots.count());
        for (vertex, &entry) in self.entries.iter().enumerate() {
            let vertex = vertex as u32;
            if slots.is_live(vertex) {
                entries.push(match entry {
                    NONE => NONE,
                    entry if entry < NONE => moved(entry),
                    entry => {
                        let handles = self.listed.get(entry & !LISTED);
                        let moved = handles.iter().map(|&handle| moved(handle));
                        LISTED | listed.push(new_vertex(vertex), (handles.len(), moved))
                    }
                });
            }
        }
        (self.entries, self.listed) = (entries, listed);
    }

    /// The heap bytes of the entries.
    pub(crate) fn entry_bytes(&self) -> usize {
        vec_bytes(&self.entries)
    }

    /// The heap bytes of the side table.
    pub(crate) fn listed_bytes(&self) -> usize {
        self.listed.bytes()
    }
}

fn numbers(handles: &[OrientedEdgeId]) -> (usize, impl Iterator<Item = u32>) {
    (handles.len(), handles.iter().map(|h| h.to_u32()))
}
