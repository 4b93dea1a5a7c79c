//! Along a boundary, edge by edge.

use super::{Stand, WalkState, next_corner_around};
use crate::{Id, Topology};

/// The boundary uses met by going along the boundary from one of them.
///
/// From each boundary use the walk goes through the sector at its far vertex to that sector's
/// other end. Where neighbours are misoriented it may run some uses from their end to their start.
/// It ends when it is back at the first use, or where a sector ends at a non-manifold edge.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct BoundaryState<H>(Stand<H>);

impl<H: Id> BoundaryState<H> {
    /// From a use of a boundary edge; nothing is walked from any other use.
    #[inline]
    pub fn new<K>(mesh: &K, first: H) -> Self
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        let mut stand = Stand::new(first);
        stand.tally.set_done(mesh.radial(first) != first);
        Self(stand)
    }

    /// The use behind `h`; the tally's direction says whether `h` is run from its end.
    fn behind<K>(&mut self, mesh: &K, h: H) -> Option<H>
    where
        K: Topology<OrientedEdge = H> + ?Sized,
    {
        // Enter the sector at the far end of `h` through `h` itself.
        let mut backward = self.0.tally.backward();
        let mut corner = if backward { h } else { mesh.next(h) };
        loop {
            if !backward && let Some(behind) = mesh.turn(corner) {
                corner = behind;
                continue;
            }
            match next_corner_around(mesh, corner, backward) {
                Some(step) => (corner, backward) = step,
                None => break,
            }
        }
        self.0.tally.set_backward(backward);
        let side = if backward { mesh.prev(corner) } else { corner };
        (side != self.0.first && mesh.radial(side) == side).then_some(side)
    }
}

impl<K: Topology + ?Sized> WalkState<K> for BoundaryState<K::OrientedEdge> {
    type Item = K::OrientedEdge;

    fn advance(&mut self, mesh: &K) -> Option<K::OrientedEdge> {
        if self.0.tally.done() {
            return None;
        }
        let here = self.0.current;
        match self.behind(mesh, here) {
            Some(behind) => self.0.current = behind,
            None => self.0.tally.set_done(true),
        }
        Some(here)
    }

    fn lives(&self, mesh: &K) -> bool {
        self.0.lives(mesh)
    }

    fn spend(&mut self, mesh: &K) -> bool {
        self.0.spend(mesh)
    }
}
