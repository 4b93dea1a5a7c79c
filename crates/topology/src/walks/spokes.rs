//! The sides around a vertex: every edge end of a sector once, with its direction.

use super::sector::advance_rarely;
use super::{SectorState, WalkState, oriented_edge_lives};
use crate::{Id, Topology};

/// One edge end at a vertex: an oriented edge that starts or ends there.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub struct Spoke<H> {
    /// A use of the edge, in the sector walked.
    pub oriented_edge: H,
    /// Whether it starts at the vertex (else it ends there).
    pub outgoing: bool,
}

impl<H: Id> Spoke<H> {
    /// The vertex at the other end.
    #[inline(always)]
    pub fn far_end<K: Topology<OrientedEdge = H> + ?Sized>(self, mesh: &K) -> K::Vertex {
        if self.outgoing { mesh.end(self.oriented_edge) } else { mesh.start(self.oriented_edge) }
    }
}

/// The edge ends around a vertex, sector by sector: for each corner the side it is left by, and
/// at the end of an open sector the side its first corner is entered by.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct SpokesState<H>(Option<SectorState<H>>);

impl<H: Id> SpokesState<H> {
    /// From a vertex's first sector.
    #[inline(always)]
    pub fn new<K>(mesh: &K, vertex: K::Vertex) -> Self
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        Self(SectorState::first_of(mesh, vertex))
    }

    /// From the handle of a sector, and that sector only.
    #[inline(always)]
    pub fn of_sector(handle: H) -> Self {
        Self(Some(SectorState::new(handle)))
    }

    /// From a sector of a vertex and on to those that follow.
    fn from_sector<K>(mesh: &K, sector: SectorState<H>) -> Self
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        if sector.0.tally.done() && !sector.0.tally.entry() {
            Self(sector.next_sector(mesh))
        } else {
            Self(Some(sector))
        }
    }

    /// A step in any sector. By value, so that a loop can keep the state in registers.
    #[cold]
    #[inline(never)]
    fn step_rarely<K>(mut self, mesh: &K) -> (Self, Option<Spoke<H>>)
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        let Some(sector) = &mut self.0 else { return (self, None) };
        let spoke = if sector.0.tally.done() {
            // Its corners are through, and what is left is where it was entered.
            sector.0.tally.clear_entry();
            entry(mesh, sector)
        } else {
            let corner = sector.0.current;
            let was_backward = sector.0.tally.backward();
            sector.step(mesh);
            let turned_back = corner == sector.0.first && sector.0.tally.reversed();
            exit(mesh, corner, was_backward || turned_back)
        };
        if sector.0.tally.done() && !sector.0.tally.entry() {
            self.0 = sector.next_sector(mesh);
        }
        (self, Some(spoke))
    }
}

/// The side `corner` is left by.
#[inline(always)]
fn exit<K: Topology + ?Sized>(
    mesh: &K,
    corner: K::OrientedEdge,
    backward: bool,
) -> Spoke<K::OrientedEdge> {
    Spoke { oriented_edge: if backward { mesh.prev(corner) } else { corner }, outgoing: !backward }
}

/// The side an open sector's first corner is entered by.
fn entry<K: Topology + ?Sized>(
    mesh: &K,
    sector: &SectorState<K::OrientedEdge>,
) -> Spoke<K::OrientedEdge> {
    // A walk that began backward left its first corner by the incoming side.
    exit(mesh, sector.0.first, !sector.0.tally.reversed())
}

impl<K: Topology + ?Sized> WalkState<K> for SpokesState<K::OrientedEdge> {
    type Item = Spoke<K::OrientedEdge>;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<Spoke<K::OrientedEdge>> {
        let sector = self.0.as_mut()?;
        let Some((corner, last)) = sector.turn_once(mesh) else {
            let (state, item) = self.clone().step_rarely(mesh);
            *self = state;
            return item;
        };
        if last {
            self.0 = None;
        }
        Some(Spoke { oriented_edge: corner, outgoing: true })
    }

    #[inline]
    fn fold<B>(self, mesh: &K, init: B, mut f: impl FnMut(B, Self::Item) -> B) -> B {
        let Some(sector) = self.0 else { return init };
        let outgoing = |h| Spoke { oriented_edge: h, outgoing: true };
        let (mut accumulated, rest) = sector.fold_turns(mesh, init, &mut f, outgoing);
        if let Some(rest) = rest {
            let mut rest = Self::from_sector(mesh, rest);
            while let Some(spoke) = advance_rarely(mesh, &mut rest) {
                accumulated = f(accumulated, spoke);
            }
        }
        accumulated
    }

    fn lives(&self, mesh: &K) -> bool {
        // The first corner's entry is yielded last: it must live even when no corner is left.
        self.0.as_ref().is_none_or(|sector| {
            oriented_edge_lives(mesh, sector.0.first) && WalkState::<K>::lives(sector, mesh)
        })
    }

    fn spend(&mut self, mesh: &K) -> bool {
        // Every corner has two sides, and both come where each corner is a sector of its own.
        let most = 2 * mesh.oriented_edge_bound();
        let spent = self.0.as_mut().is_none_or(|sector| sector.0.tally.spend(most));
        if !spent {
            self.0 = None;
        }
        spent
    }
}
