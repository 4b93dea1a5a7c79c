//! All uses of an edge, radially.

use super::{Tally, WalkState, oriented_edge_lives};
use crate::{Id, Topology};

/// The uses of an edge, in radial order from one of them.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct UsesState<H> {
    first: H,
    current: Option<H>,
    tally: Tally,
}

impl<H: Id> UsesState<H> {
    /// From any use of the edge.
    #[inline(always)]
    pub fn new(first: H) -> Self {
        Self { first, current: Some(first), tally: Tally::ZERO }
    }
}

impl<K: Topology + ?Sized> WalkState<K> for UsesState<K::OrientedEdge> {
    type Item = K::OrientedEdge;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<K::OrientedEdge> {
        let h = self.current?;
        let behind = mesh.radial(h);
        self.current = (behind != self.first).then_some(behind);
        Some(h)
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
