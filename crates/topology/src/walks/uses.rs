//! All uses of an edge, radially.

use super::{Stand, WalkState};
use crate::{Id, Topology};

/// The uses of an edge, in radial order from one of them.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct UsesState<H>(Stand<H>);

impl<H: Id> UsesState<H> {
    /// From any use of the edge.
    #[inline(always)]
    pub fn new(first: H) -> Self {
        Self(Stand::new(first))
    }
}

impl<K: Topology + ?Sized> WalkState<K> for UsesState<K::OrientedEdge> {
    type Item = K::OrientedEdge;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<K::OrientedEdge> {
        self.0.advance(|h| mesh.radial(h))
    }

    #[inline]
    fn fold<B>(self, mesh: &K, init: B, f: impl FnMut(B, K::OrientedEdge) -> B) -> B {
        self.0.fold(init, |h| mesh.radial(h), f)
    }

    fn lives(&self, mesh: &K) -> bool {
        self.0.lives(mesh)
    }

    fn spend(&mut self, mesh: &K) -> bool {
        self.0.spend(mesh)
    }
}
