//! Compacting.

use super::vertices::vertex_list;
use super::{Full, HalfEdge, NONE, TOP};
use crate::cells::DenseId;
use crate::side::SideTable;
use crate::slots::Slots;
use merestone_topology::{Compaction, Correspondence, EdgeId, FaceId, OrientedEdgeId, VertexId};

/// Where each slot goes; meaningless for retired ones.
struct Moves {
    to: Vec<u32>,
}

impl Moves {
    fn new(slots: &Slots) -> Self {
        let mut next = 0;
        let mut to = Vec::with_capacity(slots.bound());
        to.extend((0..slots.bound() as u32).map(|index| {
            let here = next;
            next += u32::from(slots.is_live(index));
            here
        }));
        Self { to }
    }

    /// A link after the move, its top bit kept.
    fn link(&self, link: u32) -> u32 {
        self.to[(link & !TOP) as usize] | link & TOP
    }

    /// The entries of the live slots, each changed by `change`, in an array of exactly their size.
    fn squeeze(entries: &[u32], slots: &Slots, mut change: impl FnMut(u32) -> u32) -> Vec<u32> {
        let mut squeezed = Vec::with_capacity(slots.count());
        let live = (0..).zip(entries).filter(|&(index, _)| slots.is_live(index));
        squeezed.extend(live.map(|(_, &entry)| change(entry)));
        squeezed
    }

    fn correspondence<I: DenseId>(self, slots: &Slots) -> Correspondence<I, I> {
        let target = |(index, to)| slots.is_live(index).then(|| I::from_index(to));
        Correspondence::new((0..).zip(self.to).map(target).collect(), slots.count())
    }
}

impl HalfEdge<Full> {
    pub(super) fn compact_all(&mut self) -> Compaction<VertexId, EdgeId, FaceId, OrientedEdgeId> {
        let vertices = Moves::new(&self.vertices);
        let edges = Moves::new(&self.edges);
        let faces = Moves::new(&self.faces);
        let uses = Moves::new(&self.oriented_edges);

        let live_uses = &self.oriented_edges;
        let Full { next, prev, start, face, radial, edge, edge_use } = &mut self.links;
        for links in [next, prev, radial] {
            *links = Moves::squeeze(links, live_uses, |h| uses.link(h));
        }
        *start = Moves::squeeze(start, live_uses, |v| vertices.link(v));
        *face = Moves::squeeze(face, live_uses, |f| faces.link(f));
        *edge = Moves::squeeze(edge, live_uses, |e| edges.link(e));
        *edge_use = Moves::squeeze(edge_use, &self.edges, |h| uses.link(h));

        let mut bounds = SideTable::with_capacity(self.face_bounds.len());
        let mut owner = 0;
        self.face = Moves::squeeze(&self.face, &self.faces, |entry| {
            owner += 1;
            if entry < TOP {
                return uses.link(entry);
            }
            let list = self.face_bounds.get(entry & !TOP);
            let moved = list
                .iter()
                .map(|&bound| if bound < TOP { uses.link(bound) } else { vertices.link(bound) });
            bounds.push(owner - 1, (list.len(), moved)) | TOP
        });
        self.face_bounds = bounds;

        let mut lists = SideTable::with_capacity(self.vertex_uses.len());
        let mut owner = 0;
        self.vertex = Moves::squeeze(&self.vertex, &self.vertices, |entry| {
            owner += 1;
            if entry < TOP {
                return uses.link(entry);
            }
            if entry == NONE {
                return NONE;
            }
            let (handles, loops) = self.uses_aside(entry);
            let handles: Vec<_> =
                handles.iter().map(|&h| OrientedEdgeId::from_u32(uses.link(h))).collect();
            let list = vertex_list(&handles, loops.iter().map(|&f| faces.link(f)));
            lists.push(owner - 1, list) | TOP
        });
        self.vertex_uses = lists;

        let moved = Compaction {
            vertices: vertices.correspondence(&self.vertices),
            edges: edges.correspondence(&self.edges),
            faces: faces.correspondence(&self.faces),
            oriented_edges: uses.correspondence(&self.oriented_edges),
        };
        for slots in
            [&mut self.vertices, &mut self.edges, &mut self.faces, &mut self.oriented_edges]
        {
            *slots = Slots::new(slots.count());
        }
        moved
    }
}
