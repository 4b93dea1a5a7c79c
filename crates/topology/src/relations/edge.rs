//! From an edge: to edges and faces.

use super::mapped_walk;
use crate::walks::{SpokesState, UsesState, WalkState};
use crate::{Id, Topology};

mapped_walk!(
    /// The faces around an edge, one for each use, in radial order.
    EdgeFacesState<H>(UsesState<H>),
    Face,
    |mesh, h| mesh.face(h)
);

/// The edges that meet an edge at its start, then those at its end, as
/// [`vertex_edges`](crate::TopologyExt::vertex_edges) lists them; the edge itself is left out.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct EdgeEdgesState<E, V, H> {
    edge: E,
    spokes: SpokesState<H>,
    /// The vertex whose turn is still to come.
    end: Option<V>,
}

impl<E: Id, V: Id, H: Id> EdgeEdgesState<E, V, H> {
    /// From an edge.
    #[inline]
    pub fn new<K>(mesh: &K, edge: E) -> Self
    where
        K: Topology<Edge = E, Vertex = V, OrientedEdge = H> + ?Sized,
    {
        let [start, end] = ends_of(mesh, edge);
        Self { edge, spokes: SpokesState::new(mesh, start), end: (start != end).then_some(end) }
    }
}

/// The two vertices of an edge, in the edge's direction.
#[inline]
pub(crate) fn ends_of<K: Topology + ?Sized>(mesh: &K, edge: K::Edge) -> [K::Vertex; 2] {
    let h = mesh.edge_use(edge);
    let (start, end) = (mesh.start(h), mesh.end(h));
    if mesh.runs_with_edge(h) { [start, end] } else { [end, start] }
}

impl<K: Topology + ?Sized> WalkState<K> for EdgeEdgesState<K::Edge, K::Vertex, K::OrientedEdge> {
    type Item = K::Edge;

    fn advance(&mut self, mesh: &K) -> Option<K::Edge> {
        loop {
            match WalkState::<K>::advance(&mut self.spokes, mesh) {
                Some(spoke) => {
                    let edge = mesh.edge(spoke.oriented_edge);
                    if edge != self.edge {
                        return Some(edge);
                    }
                }
                None => self.spokes = SpokesState::new(mesh, self.end.take()?),
            }
        }
    }

    fn lives(&self, mesh: &K) -> bool {
        WalkState::<K>::lives(&self.spokes, mesh)
            && self.end.is_none_or(|end| mesh.vertex_at(end.index()) == Some(end))
    }

    fn spend(&mut self, mesh: &K) -> bool {
        WalkState::<K>::spend(&mut self.spokes, mesh)
    }
}
