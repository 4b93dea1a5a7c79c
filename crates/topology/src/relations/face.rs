//! From a face: to vertices, edges and faces.

use super::mapped_walk;
use crate::walks::{FaceCornersState, LoopState, Tally, WalkState};
use crate::{FaceBound, Id, Topology};

mapped_walk!(
    /// The edges of a face, one for each oriented edge of its loops, in loop order, outer first.
    FaceEdgesState<F, H>(FaceCornersState<F, H>),
    Edge,
    |mesh, h| mesh.edge(h)
);

/// The vertices of a face, one for each corner in loop order, outer first; vertex loops in their
/// place among the bounds.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct FaceVerticesState<F, H> {
    face: F,
    /// The number of the next bound.
    number: u32,
    ring: Option<LoopState<H>>,
}

impl<F: Id, H: Id> FaceVerticesState<F, H> {
    /// From a face's outer bound.
    #[inline(always)]
    pub fn new(face: F) -> Self {
        Self { face, number: 0, ring: None }
    }
}

impl<K: Topology + ?Sized> WalkState<K> for FaceVerticesState<K::Face, K::OrientedEdge> {
    type Item = K::Vertex;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<K::Vertex> {
        loop {
            if let Some(ring) = &mut self.ring
                && let Some(h) = WalkState::<K>::advance(ring, mesh)
            {
                return Some(mesh.start(h));
            }
            let bound = mesh.bound(self.face, self.number as usize)?;
            self.number += 1;
            match bound {
                FaceBound::EdgeLoop(h) => self.ring = Some(LoopState::new(h)),
                FaceBound::VertexLoop(v) => return Some(v),
            }
        }
    }

    #[inline]
    fn fold<B>(self, mesh: &K, init: B, mut f: impl FnMut(B, K::Vertex) -> B) -> B {
        let mut accumulated = init;
        if self.number == 0
            && let Some([a, b, c]) = mesh.triangle(self.face)
        {
            // Ends are at hand in every kernel; starts may take arithmetic.
            return [c, a, b].into_iter().fold(accumulated, |acc, h| f(acc, mesh.end(h)));
        }
        if let Some(ring) = self.ring {
            accumulated =
                WalkState::<K>::fold(ring, mesh, accumulated, |acc, h| f(acc, mesh.start(h)));
        }
        let mut number = self.number as usize;
        while let Some(bound) = mesh.bound(self.face, number) {
            accumulated = match bound {
                FaceBound::EdgeLoop(h) => {
                    WalkState::<K>::fold(LoopState::new(h), mesh, accumulated, |acc, h| {
                        f(acc, mesh.start(h))
                    })
                }
                FaceBound::VertexLoop(v) => f(accumulated, v),
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

/// The faces across a face's edges: for each of its oriented edges in loop order, the faces of
/// the edge's other uses in radial order. A face that uses an edge twice meets itself there.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct FaceFacesState<F, H> {
    corners: FaceCornersState<F, H>,
    /// The oriented edge we stand at and the use of its edge that comes next.
    across: Option<(H, H)>,
    /// Counts the uses of one edge; `corners` counts the rest.
    tally: Tally,
}

impl<F: Id, H: Id> FaceFacesState<F, H> {
    /// From a face's outer bound.
    #[inline(always)]
    pub fn new(face: F) -> Self {
        Self { corners: FaceCornersState::new(face), across: None, tally: Tally::ZERO }
    }
}

impl<K: Topology + ?Sized> WalkState<K> for FaceFacesState<K::Face, K::OrientedEdge> {
    type Item = K::Face;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<K::Face> {
        loop {
            if let Some((h, other)) = self.across {
                if other != h {
                    self.across = Some((h, mesh.radial(other)));
                    return Some(mesh.face(other));
                }
                self.across = None;
            }
            let h = WalkState::<K>::advance(&mut self.corners, mesh)?;
            self.across = Some((h, mesh.radial(h)));
        }
    }

    #[inline]
    fn fold<B>(self, mesh: &K, init: B, mut f: impl FnMut(B, K::Face) -> B) -> B {
        let mut accumulated = init;
        if let Some((h, mut other)) = self.across {
            while other != h {
                accumulated = f(accumulated, mesh.face(other));
                other = mesh.radial(other);
            }
        }
        WalkState::<K>::fold(self.corners, mesh, accumulated, |mut b, h| {
            let mut other = mesh.radial(h);
            while other != h {
                b = f(b, mesh.face(other));
                other = mesh.radial(other);
            }
            b
        })
    }

    fn lives(&self, mesh: &K) -> bool {
        WalkState::<K>::lives(&self.corners, mesh)
            && self.across.is_none_or(|(h, other)| {
                [h, other].iter().all(|&u| mesh.oriented_edge_at(u.index()) == Some(u))
            })
    }

    fn spend(&mut self, mesh: &K) -> bool {
        if self.across.is_some_and(|(h, other)| h != other) {
            let spent = self.tally.spend(mesh.oriented_edge_bound());
            if !spent {
                self.across = None;
            }
            return spent;
        }
        self.tally = Tally::ZERO;
        WalkState::<K>::spend(&mut self.corners, mesh)
    }
}
