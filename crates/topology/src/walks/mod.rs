//! Walks: going over the cells next to a cell.
//!
//! Every local walk is a *state* of a few bytes that knows how to advance on a topology. It comes
//! in two forms, written once for all walks:
//!
//! - [`Walk`] borrows the topology and is an iterator. It allocates nothing, and its `fold` (and
//!   so `for_each`, `sum`, …) runs the walk as one tight loop.
//! - [`Detached`] does not borrow, so the topology can be edited between two steps. It says so
//!   when an edit took the ground from under it, and it always ends.
//!
#![cfg_attr(feature = "conformance", doc = "```")]
#![cfg_attr(not(feature = "conformance"), doc = "```text")]
//! # use merestone_topology::{*, conformance::Reference};
//! let mesh = Reference::assemble(FaceList::triangles(4, &[[0, 1, 2], [0, 2, 3]]))?;
//! let v = mesh.vertex_at(0).unwrap();
//! let walk = mesh.vertex_corners(v);
//! let mut detached = walk.clone().detach();
//! let mut corners = Vec::new();
//! while let Some(corner) = detached.step(&mesh)? {
//!     corners.push(corner);
//! }
//! assert!(corners.iter().copied().eq(walk));
//! # Ok::<(), Box<dyn std::error::Error>>(())
//! ```

mod boundary;
mod face;
mod rim;
mod sector;
mod spokes;
mod uses;
mod vertex;

pub use boundary::BoundaryState;
pub(crate) use face::FacePlaces;
pub use face::{FaceBoundsState, FaceCornersState, LoopState};
pub use rim::next_corner_around;
pub use sector::{SectorHandlesState, SectorState};
pub use spokes::{Spoke, SpokesState};
pub use uses::UsesState;
pub use vertex::VertexCornersState;

use crate::Topology;
use std::fmt::{self, Debug};
use std::iter::FusedIterator;

/// The state of a walk: where it is and how it goes on.
pub trait WalkState<K: Topology + ?Sized>: Clone + Debug {
    /// What the walk yields.
    type Item;

    /// The next item, and the state moved on. `None` from the end on.
    fn advance(&mut self, mesh: &K) -> Option<Self::Item>;

    /// All items that are left, as one loop.
    fn fold<B>(mut self, mesh: &K, init: B, mut f: impl FnMut(B, Self::Item) -> B) -> B {
        let mut accumulated = init;
        while let Some(item) = self.advance(mesh) {
            accumulated = f(accumulated, item);
        }
        accumulated
    }

    /// Whether the cells the state holds on to live.
    fn lives(&self, mesh: &K) -> bool;

    /// Counts one step of a detached walk; `false` when it has made more than any walk can.
    fn spend(&mut self, mesh: &K) -> bool;
}

/// A walk that borrows its topology: an iterator.
pub struct Walk<'a, K: ?Sized, S> {
    mesh: &'a K,
    state: S,
}

impl<'a, K: Topology + ?Sized, S: WalkState<K>> Walk<'a, K, S> {
    #[inline(always)]
    pub(crate) fn new(mesh: &'a K, state: S) -> Self {
        Self { mesh, state }
    }

    /// The same walk, from where it is, without the borrow.
    #[must_use]
    pub fn detach(self) -> Detached<S> {
        Detached(self.state)
    }
}

impl<K: Topology + ?Sized, S: WalkState<K>> Iterator for Walk<'_, K, S> {
    type Item = S::Item;

    #[inline]
    fn next(&mut self) -> Option<S::Item> {
        self.state.advance(self.mesh)
    }

    #[inline]
    fn fold<B, F: FnMut(B, S::Item) -> B>(self, init: B, f: F) -> B {
        self.state.fold(self.mesh, init, f)
    }
}

impl<K: Topology + ?Sized, S: WalkState<K>> FusedIterator for Walk<'_, K, S> {}

impl<K: ?Sized, S: Clone> Clone for Walk<'_, K, S> {
    fn clone(&self) -> Self {
        Self { mesh: self.mesh, state: self.state.clone() }
    }
}

impl<K: ?Sized, S: Debug> Debug for Walk<'_, K, S> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.debug_tuple("Walk").field(&self.state).finish()
    }
}

/// A walk that does not borrow: 12 bytes on dense kernels for a sector, a loop, the uses of an
/// edge and a boundary loop, a few more for those that go over several of them.
///
/// It stays valid while the oriented edge it will yield next and the one it began at live unmoved.
/// After other edits it goes on over the topology as it then is; it never yields a cell that is
/// not live, and ends after at most as many steps as there are slots.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Detached<S>(S);

impl<S> Detached<S> {
    /// The next item, on the topology as it is now; `Ok(None)` from the end on.
    ///
    /// # Errors
    /// [`WalkBroken::Retired`] when a cell the walk holds on to no longer lives, and again for as
    /// long as it does not. [`WalkBroken::Endless`] when the loop, sector or cycle it goes around
    /// cannot be closed any more; the walk has left that one then.
    pub fn step<K: Topology + ?Sized>(&mut self, mesh: &K) -> Result<Option<S::Item>, WalkBroken>
    where
        S: WalkState<K>,
    {
        if !self.0.lives(mesh) {
            return Err(WalkBroken::Retired);
        }
        if !self.0.spend(mesh) {
            return Err(WalkBroken::Endless);
        }
        Ok(self.0.advance(mesh))
    }

    /// The walk from where it is, borrowing again.
    ///
    /// # Errors
    /// As [`step`](Self::step).
    pub fn attach<K: Topology + ?Sized>(self, mesh: &K) -> Result<Walk<'_, K, S>, WalkBroken>
    where
        S: WalkState<K>,
    {
        if self.0.lives(mesh) { Ok(Walk::new(mesh, self.0)) } else { Err(WalkBroken::Retired) }
    }
}

/// A detached walk that lost its way through an edit.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum WalkBroken {
    /// A cell it stood on was retired.
    #[error("the walk stood on a cell that an edit retired; begin it again")]
    Retired,
    /// An edit cut the way back to where it began.
    #[error(
        "the walk made more steps than there are cells: an edit cut its way back; begin it again"
    )]
    Endless,
}

/// The steps of a detached walk and five flags, in four bytes.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(crate) struct Tally(u32);

impl Tally {
    const BACKWARD: u32 = 1 << 31;
    const REVERSED: u32 = 1 << 30;
    const ENTRY: u32 = 1 << 29;
    const MORE: u32 = 1 << 28;
    const DONE: u32 = 1 << 27;
    const STEPS: u32 = Self::DONE - 1;

    pub(crate) const ZERO: Self = Self(0);

    /// The walk goes around its vertex against the direction of `turn`.
    #[inline(always)]
    pub(crate) fn backward(self) -> bool {
        self.0 & Self::BACKWARD != 0
    }

    #[inline(always)]
    pub(crate) fn set_backward(&mut self, backward: bool) {
        self.0 = self.0 & !Self::BACKWARD | if backward { Self::BACKWARD } else { 0 };
    }

    /// The walk began backward.
    #[inline(always)]
    pub(crate) fn reversed(self) -> bool {
        self.0 & Self::REVERSED != 0
    }

    #[inline(always)]
    pub(crate) fn set_reversed(&mut self) {
        self.0 |= Self::REVERSED;
    }

    /// Only the side through which the walk entered is left.
    #[inline(always)]
    pub(crate) fn entry(self) -> bool {
        self.0 & Self::ENTRY != 0
    }

    #[inline(always)]
    pub(crate) fn set_entry(&mut self) {
        self.0 |= Self::ENTRY;
    }

    #[inline(always)]
    pub(crate) fn clear_entry(&mut self) {
        self.0 &= !Self::ENTRY;
    }

    /// Other sectors of the vertex follow.
    #[inline(always)]
    pub(crate) fn more(self) -> bool {
        self.0 & Self::MORE != 0
    }

    #[inline(always)]
    pub(crate) fn set_more(&mut self, more: bool) {
        self.0 = self.0 & !Self::MORE | if more { Self::MORE } else { 0 };
    }

    /// Whether this is anything but a forward walk of one sector that is not at its end.
    #[inline(always)]
    pub(crate) fn has_flags(self) -> bool {
        self.0 & !Self::STEPS != 0
    }

    /// The walk is at its end.
    #[inline(always)]
    pub(crate) fn done(self) -> bool {
        self.0 & Self::DONE != 0
    }

    #[inline(always)]
    pub(crate) fn set_done(&mut self, done: bool) {
        self.0 = self.0 & !Self::DONE | if done { Self::DONE } else { 0 };
    }

    /// The steps alone, for the next sector.
    #[inline(always)]
    pub(crate) fn without_flags(self) -> Self {
        Self(self.0 & Self::STEPS)
    }

    /// Counts a step; `false` beyond `bound` steps, or 2²⁷ − 1 of them.
    pub(crate) fn spend(&mut self, bound: usize) -> bool {
        let steps = self.0 & Self::STEPS;
        if steps as usize > bound || steps == Self::STEPS {
            return false;
        }
        self.0 += 1;
        true
    }
}

impl Debug for Tally {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{} steps", self.0 & Self::STEPS)?;
        for (set, name) in [
            (self.backward(), ", backward"),
            (self.reversed(), ", reversed"),
            (self.entry(), ", entry"),
            (self.more(), ", more"),
            (self.done(), ", done"),
        ] {
            if set {
                f.write_str(name)?;
            }
        }
        Ok(())
    }
}

/// A state that stands on one oriented edge and began at another: what most local walks are.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) struct Stand<H> {
    pub(crate) first: H,
    /// What is yielded next, unless the tally says done.
    pub(crate) current: H,
    pub(crate) tally: Tally,
}

impl<H: crate::Id> Stand<H> {
    #[inline(always)]
    pub(crate) fn new(first: H) -> Self {
        Self { first, current: first, tally: Tally::ZERO }
    }

    /// What is yielded now, after which `behind` tells where the walk stands next; it is over when
    /// that is where it began.
    #[inline(always)]
    pub(crate) fn advance(&mut self, behind: impl FnOnce(H) -> H) -> Option<H> {
        if self.tally.done() {
            return None;
        }
        let here = self.current;
        self.current = behind(here);
        self.tally.set_done(self.current == self.first);
        Some(here)
    }

    /// Everything left, each followed by what `behind` says, until the walk is where it began.
    #[inline(always)]
    pub(crate) fn fold<B>(
        self,
        init: B,
        behind: impl Fn(H) -> H,
        mut f: impl FnMut(B, H) -> B,
    ) -> B {
        let mut accumulated = init;
        if self.tally.done() {
            return accumulated;
        }
        let mut here = self.current;
        loop {
            accumulated = f(accumulated, here);
            here = behind(here);
            if here == self.first {
                return accumulated;
            }
        }
    }

    pub(crate) fn lives<K: Topology<OrientedEdge = H> + ?Sized>(&self, mesh: &K) -> bool {
        self.tally.done()
            || [self.first, self.current].into_iter().all(|h| oriented_edge_lives(mesh, h))
    }

    pub(crate) fn spend<K: Topology<OrientedEdge = H> + ?Sized>(&mut self, mesh: &K) -> bool {
        let spent = self.tally.done() || self.tally.spend(mesh.oriented_edge_bound());
        if !spent {
            self.tally.set_done(true);
        }
        spent
    }
}

/// Whether `h` lives.
pub(crate) fn oriented_edge_lives<K: Topology + ?Sized>(mesh: &K, h: K::OrientedEdge) -> bool {
    mesh.oriented_edge_at(crate::Id::index(h)) == Some(h)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::{FaceId, OrientedEdgeId, VertexId};

    /// An id as a kernel with generational keys has it: a key of 8 bytes and a slot.
    #[derive(Clone)]
    struct Wide {
        _key: [u32; 2],
        _slot: u32,
    }

    #[test]
    fn detached_walks_weigh_what_their_docs_say() {
        type H = OrientedEdgeId;
        assert_eq!(size_of::<Detached<SectorState<H>>>(), 12);
        assert_eq!(size_of::<Detached<LoopState<H>>>(), 12);
        assert_eq!(size_of::<Detached<UsesState<H>>>(), 12);
        assert_eq!(size_of::<Detached<BoundaryState<H>>>(), 12);
        assert_eq!(size_of::<Detached<UsesState<Wide>>>(), 28);
        assert_eq!(size_of::<Detached<SectorHandlesState<VertexId>>>(), 8);
        assert_eq!(size_of::<Detached<FaceBoundsState<FaceId>>>(), 8);
        assert_eq!(size_of::<Detached<VertexCornersState<H>>>(), 16);
    }

    #[test]
    fn a_tally_counts_beside_its_flags() {
        let mut tally = Tally::ZERO;
        tally.set_backward(true);
        tally.set_more(true);
        assert!(tally.spend(2) && tally.spend(2) && tally.spend(2) && !tally.spend(2));
        assert!(tally.backward() && tally.more() && !tally.done() && !tally.reversed());
        assert_eq!(format!("{tally:?}"), "3 steps, backward, more");
        assert!(!tally.without_flags().has_flags());
    }
}
