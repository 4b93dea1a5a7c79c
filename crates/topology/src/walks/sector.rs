//! One sector, corner by corner, and the handles of a vertex's sectors.

use super::{Stand, WalkState, next_corner_around};
use crate::{Id, Topology};

/// The corners of one sector, in turn order from its handle.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct SectorState<H>(pub(super) Stand<H>);

impl<H: Id> SectorState<H> {
    /// From a sector's handle.
    #[inline(always)]
    pub fn new(handle: H) -> Self {
        Self(Stand::new(handle))
    }

    /// From the first sector of `vertex`, knowing whether others follow.
    #[inline(always)]
    pub(super) fn first_of<K>(mesh: &K, vertex: K::Vertex) -> Option<Self>
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        let handle = mesh.sector(vertex, 0)?;
        let mut stand = Stand::new(handle);
        if mesh.sector(vertex, 1).is_some() {
            stand.tally.set_more(true);
        }
        Some(Self(stand))
    }

    /// The vertex's next sector after this one, if any.
    #[inline(always)]
    pub(super) fn next_sector<K>(&self, mesh: &K) -> Option<Self>
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        if self.0.tally.more() { self.find_next_sector(mesh) } else { None }
    }

    /// Finds this sector's number by its handle: rare enough not to spend four bytes on it.
    #[cold]
    #[inline(never)]
    fn find_next_sector<K>(&self, mesh: &K) -> Option<Self>
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        let vertex = mesh.start(self.0.first);
        let mut number = 0;
        while mesh.sector(vertex, number)? != self.0.first {
            number += 1;
        }
        let mut stand = Stand::new(mesh.sector(vertex, number + 1)?);
        stand.tally = self.0.tally.without_flags();
        stand.tally.set_more(mesh.sector(vertex, number + 2).is_some());
        Some(Self(stand))
    }

    /// Moves to the corner behind the current one where `turn` has no answer, or to the end.
    #[cold]
    #[inline(never)]
    pub(super) fn step_around<K: Topology<OrientedEdge = H> + ?Sized>(&mut self, mesh: &K) {
        let Stand { first, current, tally } = &mut self.0;
        let backward = tally.backward();
        let mut step = next_corner_around(mesh, *current, backward);
        if step.is_none() && current == first && !backward {
            // A handle whose outgoing side is the end: the sector lies behind its incoming side.
            step = next_corner_around(mesh, *current, true);
            if step.is_some() {
                tally.set_reversed();
            }
        }
        match step {
            Some((corner, backward)) => {
                tally.set_backward(backward);
                tally.set_done(corner == *first);
                *current = corner;
            }
            None => {
                tally.set_entry();
                tally.set_done(true);
            }
        }
    }

    /// Moves to the corner behind the current one, or to the end.
    #[inline(always)]
    pub(super) fn step<K: Topology<OrientedEdge = H> + ?Sized>(&mut self, mesh: &K) {
        if !self.0.tally.backward()
            && let Some(corner) = mesh.turn(self.0.current)
        {
            self.0.current = corner;
            self.0.tally.set_done(corner == self.0.first);
        } else {
            self.step_around(mesh);
        }
    }

    /// A step of a forward walk of one sector where `turn` answers: the corner stood on, and
    /// whether it was the last. `None`, and nothing moves, where there is more to it.
    #[inline(always)]
    pub(super) fn turn_once<K>(&mut self, mesh: &K) -> Option<(H, bool)>
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        if self.0.tally.has_flags() {
            return None;
        }
        let here = self.0.current;
        let behind = mesh.turn(here)?;
        self.0.current = behind;
        Some((here, behind == self.0.first))
    }

    /// Folds the stretch of the sector for which `turn` answers, each corner as `item` says: one
    /// load and one test a corner. Leaves the walk where it has no answer; `None` at the end of a
    /// walk of one sector.
    #[inline(always)]
    pub(super) fn fold_turns<B, T, K>(
        mut self,
        mesh: &K,
        mut accumulated: B,
        f: &mut impl FnMut(B, T) -> B,
        item: impl Fn(H) -> T,
    ) -> (B, Option<Self>)
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        if self.0.tally.has_flags() {
            return (accumulated, Some(self));
        }
        let mut here = self.0.current;
        while let Some(behind) = mesh.turn(here) {
            accumulated = f(accumulated, item(here));
            if behind == self.0.first {
                return (accumulated, None);
            }
            here = behind;
        }
        self.0.current = here;
        (accumulated, Some(self))
    }
}

/// The next item, marked as rare: in a fold, all that is not the hot stretch stays out of its
/// registers.
#[cold]
#[inline(never)]
pub(super) fn advance_rarely<K: Topology + ?Sized, S: WalkState<K>>(
    mesh: &K,
    state: &mut S,
) -> Option<S::Item> {
    state.advance(mesh)
}

impl<K: Topology + ?Sized> WalkState<K> for SectorState<K::OrientedEdge> {
    type Item = K::OrientedEdge;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<K::OrientedEdge> {
        if self.0.tally.done() {
            return None;
        }
        let here = self.0.current;
        self.step(mesh);
        Some(here)
    }

    #[inline]
    fn fold<B>(self, mesh: &K, init: B, mut f: impl FnMut(B, K::OrientedEdge) -> B) -> B {
        let (mut accumulated, rest) = self.fold_turns(mesh, init, &mut f, |h| h);
        if let Some(mut rest) = rest {
            while let Some(corner) = advance_rarely(mesh, &mut rest) {
                accumulated = f(accumulated, corner);
            }
        }
        accumulated
    }

    fn lives(&self, mesh: &K) -> bool {
        self.0.lives(mesh)
    }

    fn spend(&mut self, mesh: &K) -> bool {
        self.0.spend(mesh)
    }
}

/// The handles of a vertex's sectors, by number.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct SectorHandlesState<V> {
    vertex: V,
    number: u32,
}

impl<V: Id> SectorHandlesState<V> {
    /// From a vertex.
    #[inline(always)]
    pub fn new(vertex: V) -> Self {
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
