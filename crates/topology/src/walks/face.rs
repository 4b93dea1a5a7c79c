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

/// All places on a face's bounds: each corner of an edge loop as `EdgeLoop`, each vertex loop.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct FacePlaces<F, H> {
    face: F,
    /// The number of the next bound.
    number: u32,
    ring: Option<LoopState<H>>,
}

impl<F: Id, H: Id> FacePlaces<F, H> {
    #[inline(always)]
    pub(crate) fn new(face: F) -> Self {
        Self { face, number: 0, ring: None }
    }

    /// The corners of the face, where it is still to be walked and known to be a triangle.
    #[inline(always)]
    pub(crate) fn triangle<K>(&self, mesh: &K) -> Option<[H; 3]>
    where
        K: Topology<Face = F, OrientedEdge = H> + ?Sized,
    {
        if self.number == 0 { mesh.triangle(self.face) } else { None }
    }
}

impl<K: Topology + ?Sized> WalkState<K> for FacePlaces<K::Face, K::OrientedEdge> {
    type Item = FaceBound<K::OrientedEdge, K::Vertex>;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<Self::Item> {
        loop {
            if let Some(ring) = &mut self.ring
                && let Some(h) = WalkState::<K>::advance(ring, mesh)
            {
                return Some(FaceBound::EdgeLoop(h));
            }
            let bound = mesh.bound(self.face, self.number as usize)?;
            self.number += 1;
            match bound {
                FaceBound::EdgeLoop(h) => self.ring = Some(LoopState::new(h)),
                FaceBound::VertexLoop(_) => return Some(bound),
            }
        }
    }

    #[inline]
    fn fold<B>(self, mesh: &K, init: B, mut f: impl FnMut(B, Self::Item) -> B) -> B {
        let mut accumulated = init;
        if let Some(ring) = self.ring {
            let place = |b, h| f(b, FaceBound::EdgeLoop(h));
            accumulated = WalkState::<K>::fold(ring, mesh, accumulated, place);
        }
        let mut number = self.number as usize;
        while let Some(bound) = mesh.bound(self.face, number) {
            accumulated = match bound {
                FaceBound::EdgeLoop(h) => {
                    WalkState::<K>::fold(LoopState::new(h), mesh, accumulated, |b, h| {
                        f(b, FaceBound::EdgeLoop(h))
                    })
                }
                FaceBound::VertexLoop(_) => f(accumulated, bound),
            };
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

/// The corners of a face's edge loops, loop by loop, outer first.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct FaceCornersState<F, H>(FacePlaces<F, H>);

impl<F: Id, H: Id> FaceCornersState<F, H> {
    /// From a face's outer bound.
    #[inline(always)]
    pub fn new(face: F) -> Self {
        Self(FacePlaces::new(face))
    }
}

impl<K: Topology + ?Sized> WalkState<K> for FaceCornersState<K::Face, K::OrientedEdge> {
    type Item = K::OrientedEdge;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<K::OrientedEdge> {
        loop {
            if let FaceBound::EdgeLoop(h) = WalkState::<K>::advance(&mut self.0, mesh)? {
                return Some(h);
            }
        }
    }

    #[inline]
    fn fold<B>(self, mesh: &K, init: B, mut f: impl FnMut(B, K::OrientedEdge) -> B) -> B {
        if let Some(corners) = self.0.triangle(mesh) {
            return corners.into_iter().fold(init, f);
        }
        WalkState::<K>::fold(self.0, mesh, init, |b, place| match place {
            FaceBound::EdgeLoop(h) => f(b, h),
            FaceBound::VertexLoop(_) => b,
        })
    }

    fn lives(&self, mesh: &K) -> bool {
        WalkState::<K>::lives(&self.0, mesh)
    }

    fn spend(&mut self, mesh: &K) -> bool {
        WalkState::<K>::spend(&mut self.0, mesh)
    }
}
