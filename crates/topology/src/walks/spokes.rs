//! The sides around a vertex: every edge end of a sector once, with its direction.

use super::{SectorState, WalkState};
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
    exit(mesh, sector.first, !sector.tally.reversed())
}

/// One step in `sector`: the exit of the current corner, or the entry of an open sector's first.
#[inline(always)]
fn step<K: Topology + ?Sized>(
    mesh: &K,
    sector: &mut SectorState<K::OrientedEdge>,
) -> Option<Spoke<K::OrientedEdge>> {
    let Some(corner) = sector.current else {
        return sector.tally.entry().then(|| {
            sector.tally.clear_entry();
            entry(mesh, sector)
        });
    };
    if !sector.tally.backward()
        && let Some(behind) = mesh.turn(corner)
    {
        sector.current = (behind != sector.first).then_some(behind);
        return Some(Spoke { oriented_edge: corner, outgoing: true });
    }
    let was_backward = sector.tally.backward();
    sector.current = sector.around(mesh, corner);
    let turned_back = corner == sector.first && sector.tally.reversed();
    Some(exit(mesh, corner, was_backward || turned_back))
}

impl<K: Topology + ?Sized> WalkState<K> for SpokesState<K::OrientedEdge> {
    type Item = Spoke<K::OrientedEdge>;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<Spoke<K::OrientedEdge>> {
        let sector = self.0.as_mut()?;
        let spoke = step(mesh, sector);
        if sector.current.is_none() && !sector.tally.entry() {
            self.0 = sector.next_sector(mesh);
        }
        spoke
    }

    #[inline]
    fn fold<B>(self, mesh: &K, init: B, mut f: impl FnMut(B, Self::Item) -> B) -> B {
        let mut accumulated = init;
        let mut left = self.0;
        'sectors: while let Some(mut sector) = left {
            left = sector.next_sector(mesh);
            if let Some(mut h) = sector.current
                && !sector.tally.backward()
            {
                // The hot stretch: one load and one test a corner.
                while let Some(behind) = mesh.turn(h) {
                    accumulated = f(accumulated, Spoke { oriented_edge: h, outgoing: true });
                    if behind == sector.first {
                        continue 'sectors;
                    }
                    h = behind;
                }
                sector.current = Some(h);
            }
            while let Some(spoke) = step(mesh, &mut sector) {
                accumulated = f(accumulated, spoke);
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
