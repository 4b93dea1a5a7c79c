//! From a vertex: to vertices, edges and faces.

use super::mapped_walk;
use crate::walks::{Spoke, SpokesState, VertexCornersState, WalkState};
use crate::{Id, Topology};

mapped_walk!(
    /// The vertices around a vertex, one for each edge end of each sector.
    VertexVerticesState<H>(SpokesState<H>),
    Vertex,
    |mesh, spoke| spoke.far_end(mesh)
);

mapped_walk!(
    /// The edges around a vertex, one for each edge end of each sector.
    VertexEdgesState<H>(SpokesState<H>),
    Edge,
    |mesh, spoke| mesh.edge(spoke.oriented_edge)
);

/// The edge ends around a vertex, each once: a non-manifold edge that several sectors end at is
/// left out of all but one.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct EdgeEndsState<H>(pub(crate) SpokesState<H>);

/// Whether `spoke` is the one spoke that stands for its edge end.
#[inline(always)]
fn stands_for_its_edge<K: Topology + ?Sized>(mesh: &K, spoke: Spoke<K::OrientedEdge>) -> bool {
    // A crossing through two uses is listed once anyway; only ends at further uses repeat.
    mesh.is_plain(spoke.oriented_edge) || stands_among_many(mesh, spoke.oriented_edge)
}

#[cold]
fn stands_among_many<K: Topology + ?Sized>(mesh: &K, h: K::OrientedEdge) -> bool {
    mesh.radial(mesh.radial(h)) == h || mesh.edge_use(mesh.edge(h)) == h
}

impl<K: Topology + ?Sized> WalkState<K> for EdgeEndsState<K::OrientedEdge> {
    type Item = Spoke<K::OrientedEdge>;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<Self::Item> {
        loop {
            let spoke = WalkState::<K>::advance(&mut self.0, mesh)?;
            if stands_for_its_edge(mesh, spoke) {
                return Some(spoke);
            }
        }
    }

    #[inline]
    fn fold<B>(self, mesh: &K, init: B, mut f: impl FnMut(B, Self::Item) -> B) -> B {
        WalkState::<K>::fold(self.0, mesh, init, move |b, spoke| {
            if stands_for_its_edge(mesh, spoke) { f(b, spoke) } else { b }
        })
    }

    fn lives(&self, mesh: &K) -> bool {
        WalkState::<K>::lives(&self.0, mesh)
    }

    fn spend(&mut self, mesh: &K) -> bool {
        WalkState::<K>::spend(&mut self.0, mesh)
    }
}

/// The faces around a vertex: one for each corner, then one for each vertex loop.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct VertexFacesState<V, H> {
    corners: VertexCornersState<H>,
    vertex: V,
    /// The number of the next vertex loop.
    number: u32,
}

impl<V: Id, H: Id> VertexFacesState<V, H> {
    /// From a vertex's first sector.
    #[inline(always)]
    pub fn new<K>(mesh: &K, vertex: V) -> Self
    where
        K: Topology<Vertex = V, OrientedEdge = H> + ?Sized,
    {
        Self { corners: VertexCornersState::new(mesh, vertex), vertex, number: 0 }
    }
}

impl<K: Topology + ?Sized> WalkState<K> for VertexFacesState<K::Vertex, K::OrientedEdge> {
    type Item = K::Face;

    #[inline]
    fn advance(&mut self, mesh: &K) -> Option<K::Face> {
        if let Some(corner) = WalkState::<K>::advance(&mut self.corners, mesh) {
            return Some(mesh.face(corner));
        }
        let face = mesh.vertex_loop(self.vertex, self.number as usize)?;
        self.number += 1;
        Some(face)
    }

    #[inline]
    fn fold<B>(self, mesh: &K, init: B, mut f: impl FnMut(B, K::Face) -> B) -> B {
        let mut accumulated =
            WalkState::<K>::fold(self.corners, mesh, init, |b, corner| f(b, mesh.face(corner)));
        let mut number = self.number as usize;
        while let Some(face) = mesh.vertex_loop(self.vertex, number) {
            accumulated = f(accumulated, face);
            number += 1;
        }
        accumulated
    }

    fn lives(&self, mesh: &K) -> bool {
        mesh.vertex_at(self.vertex.index()) == Some(self.vertex)
            && WalkState::<K>::lives(&self.corners, mesh)
    }

    fn spend(&mut self, mesh: &K) -> bool {
        WalkState::<K>::spend(&mut self.corners, mesh)
    }
}
