//! What is left when a face leaves: the same for every kernel.

use merestone_topology::{Topology, TopologyExt};

/// An edge of a face that leaves.
#[derive(Debug)]
pub(crate) struct Parted<K: Topology> {
    pub(crate) edge: K::Edge,
    /// Its other uses, in radial order.
    pub(crate) staying: Vec<K::OrientedEdge>,
    /// Whether those make it a plain edge.
    pub(crate) is_plain: bool,
}

/// What stays around a face, gathered while the walks still find it.
#[derive(Debug)]
pub(crate) struct Staying<K: Topology> {
    /// The face's vertices, each once and ascending, with their other corners, ascending.
    pub(crate) vertices: Vec<(K::Vertex, Vec<K::OrientedEdge>)>,
    /// The face's edges, each once and ascending.
    pub(crate) edges: Vec<Parted<K>>,
}

impl<K: Topology> Staying<K> {
    /// O(corners of the face × corners at each of them).
    pub(crate) fn without(mesh: &K, face: K::Face) -> Self {
        let stays = |&h: &K::OrientedEdge| mesh.face(h) != face;
        let mut vertices: Vec<_> = mesh.face_vertices(face).collect();
        vertices.sort_unstable();
        vertices.dedup();
        let corners = |vertex| {
            let mut corners: Vec<_> = mesh.vertex_corners(vertex).filter(stays).collect();
            corners.sort_unstable();
            (vertex, corners)
        };
        let mut edges: Vec<_> = mesh.face_edges(face).collect();
        edges.sort_unstable();
        edges.dedup();
        let parted = |edge| {
            let staying: Vec<_> = mesh.edge_uses(edge).filter(stays).collect();
            let is_plain =
                matches!(*staying, [a, b] if mesh.runs_with_edge(a) != mesh.runs_with_edge(b));
            Parted { edge, staying, is_plain }
        };
        Self {
            vertices: vertices.into_iter().map(corners).collect(),
            edges: edges.into_iter().map(parted).collect(),
        }
    }
}
