//! From a face: to vertices, edges and faces.

use super::mapped_walk;
use crate::walks::{FaceCornersState, FacePlaces, Tally, WalkState};
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
pub struct FaceVerticesState<F, H>(FacePlaces<F, H>);

impl<F: Id, H: Id> FaceVerticesState<F, H> {
    /// From a face's outer bound.
    #[inline(always)]
    pub fn new(face: F) -> Self {
        Self(FacePlaces::new(face))
    }
}

#[inline(always)]
fn vertex_at<K>(mesh: &K, place: FaceBound<K::OrientedEdge, K::Vertex>) -> K::Vertex
where
    K: Topology + ?Sized,
{
    match place {
        FaceBound::EdgeLoop(h) => mesh.start(h),
        FaceBound::VertexLoop(v) => v,
    }
}

impl<K: Topology + ?Sized> WalkState<K> for FaceVerticesState<K::Face, K::OrientedEdge> {
    type Item = K::Vertex;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<K::Vertex> {
        WalkState::<K>::advance(&mut self.0, mesh).map(|place| vertex_at(mesh, place))
    }

    #[inline]
    fn fold<B>(self, mesh: &K, init: B, mut f: impl FnMut(B, K::Vertex) -> B) -> B {
        if let Some([a, b, c]) = self.0.triangle(mesh) {
            // Ends are at hand in every kernel; starts may take arithmetic.
            return [c, a, b].into_iter().fold(init, |acc, h| f(acc, mesh.end(h)));
        }
        WalkState::<K>::fold(self.0, mesh, init, |b, place| f(b, vertex_at(mesh, place)))
    }

    fn lives(&self, mesh: &K) -> bool {
        WalkState::<K>::lives(&self.0, mesh)
    }

    fn spend(&mut self, mesh: &K) -> bool {
        WalkState::<K>::spend(&mut self.0, mesh)
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
