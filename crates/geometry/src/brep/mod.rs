//! [`Brep`]: a topology with a place for every vertex.

mod build;
mod export;
#[cfg(test)]
mod tests;

pub use build::BuildError;
pub use export::{NotATriangle, Polygons, Triangles};

use crate::scalar::Scalar;
use merestone_kernels::{HalfEdge, TriangleAdjacency};
use merestone_topology::{Assemble, Column, Compaction, EditError, Topology, TopologyExt};
use nalgebra::Point3;
use std::fmt::{self, Debug};
use std::ops::Deref;

/// The everyday mesh: any polygons, on the half-edge kernel, in double precision.
pub type Mesh = Brep<HalfEdge, f64>;

/// A mesh of triangles in the smallest space: the triangle kernel, in double precision.
pub type TriangleMesh = Brep<TriangleAdjacency, f64>;

/// A boundary representation: a topology `K`, and a point of scalars `S` for every vertex.
///
/// Dereferences to its topology, so that every relation and walk is at hand, and a function that
/// takes a topology takes `&*mesh`. Coordinates have no unit.
///
/// ```
/// use merestone_geometry::Mesh;
/// use merestone_topology::TopologyExt;
/// let points = [[0.0, 0.0, 0.0], [1.0, 0.0, 0.0], [0.0, 1.0, 0.0], [0.0, 0.0, 1.0]];
/// let faces = [[0, 2, 1], [0, 1, 3], [1, 2, 3], [2, 0, 3]];
/// let mesh = Mesh::from_triangles(points, &faces)?;
/// assert_eq!(mesh.euler_characteristic(), 2);
/// assert!((mesh.signed_volume() - 1.0 / 6.0).abs() < 1e-15);
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub struct Brep<K: Topology, S> {
    topology: K,
    points: Column<K::Vertex, [S; 3]>,
}

impl<K: Topology, S: Scalar> Brep<K, S> {
    /// The topology.
    #[must_use]
    pub fn topology(&self) -> &K {
        &self.topology
    }

    /// Where every vertex is.
    #[must_use]
    pub fn points(&self) -> &Column<K::Vertex, [S; 3]> {
        &self.points
    }

    /// Where every vertex is, to be changed. Nothing checks that the numbers are finite.
    pub fn points_mut(&mut self) -> &mut Column<K::Vertex, [S; 3]> {
        &mut self.points
    }

    /// Where `v` is, as stored.
    #[inline]
    #[must_use]
    pub fn point(&self, v: K::Vertex) -> [S; 3] {
        self.points[v]
    }

    /// Where `v` is, in the precision of arithmetic.
    #[inline]
    #[must_use]
    pub fn position(&self, v: K::Vertex) -> Point3<f64> {
        Point3::from(self.points[v].map(Scalar::widen))
    }

    /// The topology and the points, taken apart.
    #[must_use]
    pub fn into_parts(self) -> (K, Column<K::Vertex, [S; 3]>) {
        (self.topology, self.points)
    }

    /// The corners of the box around all vertices that a face uses; `None` without one. O(V).
    #[must_use]
    pub fn bounding_box(&self) -> Option<[Point3<f64>; 2]> {
        let mut used = self
            .topology
            .vertices()
            .filter(|&v| !self.topology.is_isolated(v))
            .map(|v| self.position(v));
        let first = used.next()?;
        Some(used.fold([first; 2], |[low, high], p| [low.inf(&p), high.sup(&p)]))
    }
}

impl<K: Assemble, S: Scalar> Brep<K, S> {
    /// Removes a face; see [`Assemble::remove_face`].
    ///
    /// # Errors
    /// As there.
    pub fn remove_face(
        &mut self,
        face: K::Face,
    ) -> Result<merestone_topology::RemovedFace<K::Edge>, EditError> {
        self.topology.remove_face(face)
    }

    /// Removes a vertex that no face uses.
    ///
    /// # Errors
    /// As [`Assemble::remove_isolated_vertex`].
    pub fn remove_isolated_vertex(&mut self, vertex: K::Vertex) -> Result<(), EditError> {
        self.topology.remove_isolated_vertex(vertex)
    }

    /// Drops retired slots; the points follow. Returns where each cell went.
    pub fn compact(&mut self) -> Compaction<K::Vertex, K::Edge, K::Face, K::OrientedEdge> {
        let moved = self.topology.compact();
        let points = std::mem::replace(&mut self.points, Column::from_values(Vec::new()));
        self.points = points.follow(&moved.vertices, [S::narrow(0.0); 3]);
        moved
    }
}

impl<K: Topology, S> Deref for Brep<K, S> {
    type Target = K;

    fn deref(&self) -> &K {
        &self.topology
    }
}

impl<K: Topology + Clone, S: Clone> Clone for Brep<K, S> {
    fn clone(&self) -> Self {
        Self { topology: self.topology.clone(), points: self.points.clone() }
    }
}

impl<K: Topology, S: Debug> Debug for Brep<K, S> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.debug_struct("Brep")
            .field("vertices", &self.topology.vertex_count())
            .field("edges", &self.topology.edge_count())
            .field("faces", &self.topology.face_count())
            .finish_non_exhaustive()
    }
}
