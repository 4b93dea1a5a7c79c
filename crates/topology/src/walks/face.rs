//! The loops and corners of a face.

use super::{Stand, WalkState};
use crate::{FaceBound, Id, Topology};

/// The oriented edges of one loop, in loop order.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct LoopState<H>(Stand<H>);

impl<H: Id> LoopState<H> {
    /// From any oriented edge of the loop.
    #[inline(always)]
    pub fn new(first: H) -> Self {
        Self(Stand::new(first))
    }
}

impl<K: Topology + ?Sized> WalkState<K> for LoopState<K::OrientedEdge> {
    type Item = K::OrientedEdge;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<K::OrientedEdge> {
        self.0.advance(|h| mesh.next(h))
    }

    #[inline]
    fn fold<B>(self, mesh: &K, init: B, f: impl FnMut(B, K::OrientedEdge) -> B) -> B {
        self.0.fold(init, |h| mesh.next(h), f)
    }

    fn lives(&self, mesh: &K) -> bool {
        self.0.lives(mesh)
    }

    fn spend(&mut self, mesh: &K) -> bool {
        self.0.spend(mesh)
    }
}

/// The bounds of a face, outer first.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct FaceBoundsState<F> {
    face: F,
    number: u32,
}

impl<F: Id> FaceBoundsState<F> {
    /// From a face's outer bound.
    #[inline(always)]
    pub fn new(face: F) -> Self {
        Self { face, number: 0 }
    }
}

impl<K: Topology + ?Sized> WalkState<K> for FaceBoundsState<K::Face> {
    type Item = FaceBound<K::OrientedEdge, K::Vertex>;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<Self::Item> {
        let bound = mesh.bound(self.face, self.number as usize)?;
        self.number += 1;
        Some(bound)
    }

    fn lives(&self, mesh: &K) -> bool {
        mesh.face_at(self.face.index()) == Some(self.face)
    }

    fn spend(&mut self, _mesh: &K) -> bool {
        // Numbers only go up, and a face has finitely many bounds: it ends by itself.
        true
    }
}

/// The corners of a face's edge loops, loop by loop, outer first.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct FaceCornersState<F, H> {
    face: F,
    /// The number of the next bound.
    number: u32,
    ring: Option<LoopState<H>>,
}

impl<F: Id, H: Id> FaceCornersState<F, H> {
    /// From a face's outer bound.
    #[inline(always)]
    pub fn new(face: F) -> Self {
        Self { face, number: 0, ring: None }
    }
}

impl<K: Topology + ?Sized> WalkState<K> for FaceCornersState<K::Face, K::OrientedEdge> {
    type Item = K::OrientedEdge;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<K::OrientedEdge> {
        loop {
            if let Some(ring) = &mut self.ring
                && let Some(h) = WalkState::<K>::advance(ring, mesh)
            {
                return Some(h);
            }
            let bound = mesh.bound(self.face, self.number as usize)?;
            self.number += 1;
            if let FaceBound::EdgeLoop(h) = bound {
                self.ring = Some(LoopState::new(h));
            }
        }
    }

    #[inline]
    fn fold<B>(self, mesh: &K, init: B, mut f: impl FnMut(B, K::OrientedEdge) -> B) -> B {
        let mut accumulated = init;
        if self.number == 0
            && let Some(corners) = mesh.triangle(self.face)
        {
            return corners.into_iter().fold(accumulated, f);
        }
        if let Some(ring) = self.ring {
            accumulated = WalkState::<K>::fold(ring, mesh, accumulated, &mut f);
        }
        let mut number = self.number as usize;
        while let Some(bound) = mesh.bound(self.face, number) {
            if let FaceBound::EdgeLoop(h) = bound {
                accumulated = WalkState::<K>::fold(LoopState::new(h), mesh, accumulated, &mut f);
            }
            number += 1;
        }
        accumulated
    }

    fn lives(&self, mesh: &K) -> bool {
        mesh.face_at(self.face.index()) == Some(self.face)
            && self.ring.as_ref().is_none_or(|ring| WalkState::<K>::lives(ring, mesh))
    }

    fn spend(&mut self, mesh: &K) -> bool {
        self.ring.as_mut().is_none_or(|ring| WalkState::<K>::spend(ring, mesh))
    }
}
