//! One sector, corner by corner, and the handles of a vertex's sectors.

use super::{Tally, WalkState, next_corner_around, oriented_edge_lives};
use crate::{Id, Topology};

/// The corners of one sector, in turn order from its handle.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct SectorState<H> {
    pub(super) first: H,
    /// What is yielded next.
    pub(super) current: Option<H>,
    pub(super) tally: Tally,
}

impl<H: Id> SectorState<H> {
    /// From a sector's handle.
    #[inline(always)]
    pub fn new(handle: H) -> Self {
        Self { first: handle, current: Some(handle), tally: Tally::ZERO }
    }

    /// From the first sector of `vertex`, knowing whether others follow.
    #[inline(always)]
    pub(super) fn first_of<K>(mesh: &K, vertex: K::Vertex) -> Option<Self>
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        let mut state = Self::new(mesh.sector(vertex, 0)?);
        state.tally.set_more(mesh.sector(vertex, 1).is_some());
        Some(state)
    }

    /// The vertex's next sector after this one, if any.
    #[inline(always)]
    pub(super) fn next_sector<K>(&self, mesh: &K) -> Option<Self>
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        if self.tally.more() { self.find_next_sector(mesh) } else { None }
    }

    /// Finds this sector's number by its handle: rare enough not to spend four bytes on it.
    #[cold]
    fn find_next_sector<K>(&self, mesh: &K) -> Option<Self>
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        let vertex = mesh.start(self.first);
        let mut number = 0;
        while mesh.sector(vertex, number)? != self.first {
            number += 1;
        }
        let handle = mesh.sector(vertex, number + 1)?;
        let mut tally = self.tally.without_flags();
        tally.set_more(mesh.sector(vertex, number + 2).is_some());
        Some(Self { first: handle, current: Some(handle), tally })
    }

    /// The corner behind `h`, when `turn` has no answer.
    pub(super) fn around<K: Topology<OrientedEdge = H> + ?Sized>(
        &mut self,
        mesh: &K,
        h: H,
    ) -> Option<H> {
        let backward = self.tally.backward();
        let mut step = next_corner_around(mesh, h, backward);
        if step.is_none() && h == self.first && !backward {
            // A handle whose outgoing side is the end: the sector lies behind its incoming side.
            step = next_corner_around(mesh, h, true);
            if step.is_some() {
                self.tally.set_reversed();
            }
        }
        match step {
            Some((corner, backward)) => {
                self.tally.set_backward(backward);
                (corner != self.first).then_some(corner)
            }
            None => {
                self.tally.set_entry();
                None
            }
        }
    }

    #[inline(always)]
    fn behind<K: Topology<OrientedEdge = H> + ?Sized>(&mut self, mesh: &K, h: H) -> Option<H> {
        if !self.tally.backward()
            && let Some(corner) = mesh.turn(h)
        {
            return (corner != self.first).then_some(corner);
        }
        self.around(mesh, h)
    }
}

impl<K: Topology + ?Sized> WalkState<K> for SectorState<K::OrientedEdge> {
    type Item = K::OrientedEdge;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<K::OrientedEdge> {
        let h = self.current?;
        self.current = self.behind(mesh, h);
        Some(h)
    }

    #[inline]
    fn fold<B>(mut self, mesh: &K, init: B, mut f: impl FnMut(B, K::OrientedEdge) -> B) -> B {
        let mut accumulated = init;
        while let Some(mut h) = self.current {
            if !self.tally.backward() {
                // The hot stretch: one load and one test a corner.
                loop {
                    accumulated = f(accumulated, h);
                    match mesh.turn(h) {
                        Some(corner) if corner == self.first => return accumulated,
                        Some(corner) => h = corner,
                        None => break,
                    }
                }
            } else {
                accumulated = f(accumulated, h);
            }
            self.current = self.around(mesh, h);
        }
        accumulated
    }

    fn lives(&self, mesh: &K) -> bool {
        self.current
            .is_none_or(|h| oriented_edge_lives(mesh, h) && oriented_edge_lives(mesh, self.first))
    }

    fn spend(&mut self, mesh: &K) -> bool {
        let spent = self.tally.spend(mesh.oriented_edge_bound());
        if !spent {
            self.current = None;
        }
        spent
    }
}

/// The handles of a vertex's sectors, by number.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct SectorHandlesState<V> {
    vertex: V,
    number: u32,
}

impl<V: Id> SectorHandlesState<V> {
    #[inline(always)]
    pub(crate) fn new(vertex: V) -> Self {
        Self { vertex, number: 0 }
    }
}

impl<K: Topology + ?Sized> WalkState<K> for SectorHandlesState<K::Vertex> {
    type Item = K::OrientedEdge;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<K::OrientedEdge> {
        let handle = mesh.sector(self.vertex, self.number as usize)?;
        self.number += 1;
        Some(handle)
    }

    fn lives(&self, mesh: &K) -> bool {
        mesh.vertex_at(self.vertex.index()) == Some(self.vertex)
    }

    fn spend(&mut self, _mesh: &K) -> bool {
        // Numbers only go up, and a vertex has finitely many sectors: it ends by itself.
        true
    }
}
