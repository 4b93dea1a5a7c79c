//! All corners of a vertex, sector by sector.

use super::sector::advance_rarely;
use super::{SectorState, WalkState};
use crate::{Id, Topology};

/// The corners of a vertex: the oriented edges that start there, sector by sector.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct VertexCornersState<H>(Option<SectorState<H>>);

impl<H: Id> VertexCornersState<H> {
    /// From a vertex's first sector.
    #[inline(always)]
    pub fn new<K>(mesh: &K, vertex: K::Vertex) -> Self
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        Self(SectorState::first_of(mesh, vertex))
    }

    /// From a sector of a vertex and on to those that follow.
    fn from_sector<K>(mesh: &K, sector: SectorState<H>) -> Self
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        if sector.0.tally.done() { Self(sector.next_sector(mesh)) } else { Self(Some(sector)) }
    }

    /// A step in any sector. By value, so that a loop can keep the state in registers.
    #[cold]
    #[inline(never)]
    fn step_rarely<K>(mut self, mesh: &K) -> (Self, Option<H>)
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        let Some(sector) = &mut self.0 else { return (self, None) };
        let corner = WalkState::<K>::advance(sector, mesh);
        if sector.0.tally.done() {
            self.0 = sector.next_sector(mesh);
        }
        (self, corner)
    }
}

impl<K: Topology + ?Sized> WalkState<K> for VertexCornersState<K::OrientedEdge> {
    type Item = K::OrientedEdge;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<K::OrientedEdge> {
        let sector = self.0.as_mut()?;
        let Some((corner, last)) = sector.turn_once(mesh) else {
            let (state, item) = self.clone().step_rarely(mesh);
            *self = state;
            return item;
        };
        if last {
            self.0 = None;
        }
        Some(corner)
    }

    #[inline]
    fn fold<B>(self, mesh: &K, init: B, mut f: impl FnMut(B, Self::Item) -> B) -> B {
        let Some(sector) = self.0 else { return init };
        let (mut accumulated, rest) = sector.fold_turns(mesh, init, &mut f, |h| h);
        if let Some(rest) = rest {
            let mut rest = Self::from_sector(mesh, rest);
            while let Some(corner) = advance_rarely(mesh, &mut rest) {
                accumulated = f(accumulated, corner);
            }
        }
        accumulated
    }

    fn lives(&self, mesh: &K) -> bool {
        self.0.as_ref().is_none_or(|sector| WalkState::<K>::lives(sector, mesh))
    }

    fn spend(&mut self, mesh: &K) -> bool {
        let spent = self.0.as_mut().is_none_or(|sector| WalkState::<K>::spend(sector, mesh));
        if !spent {
            self.0 = None;
        }
        spent
    }
}
