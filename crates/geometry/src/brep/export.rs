//! Giving a [`Brep`] back as points and faces.

use super::Brep;
use crate::scalar::Scalar;
use merestone_topology::{FaceBound, FaceListBuf, Id, Topology, TopologyExt};

/// Points, and triangles over them.
pub type Triangles<S> = (Vec<[S; 3]>, Vec<[u32; 3]>);

/// Points, and faces over them.
pub type Polygons<S> = (Vec<[S; 3]>, FaceListBuf);

/// A face that an index buffer cannot hold.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
#[error(
    "face {face} is not one loop of three corners; split it into triangles, or export polygons"
)]
pub struct NotATriangle {
    /// The face's index.
    pub face: usize,
}

impl<K: Topology, S: Scalar> Brep<K, S> {
    /// The points and triangles, each triangle from its first corner on. Vertices and faces keep
    /// their order; retired ones are left out. O(V + F).
    ///
    /// # Errors
    /// [`NotATriangle`] for the first face that is not one loop of three corners.
    pub fn to_index_buffer(&self) -> Result<Triangles<S>, NotATriangle> {
        let (points, numbers) = self.numbered_points();
        let mut triangles = Vec::with_capacity(self.topology().face_count());
        for face in self.topology().faces() {
            let refused = NotATriangle { face: face.index() };
            let mut bounds = self.topology().face_bounds(face);
            let (Some(FaceBound::EdgeLoop(h)), None) = (bounds.next(), bounds.next()) else {
                return Err(refused);
            };
            let mut corners = self.topology().loop_corners(h);
            let mut corner = || corners.next().map(|h| numbers[self.topology().start(h).index()]);
            match [corner(), corner(), corner(), corner()] {
                [Some(a), Some(b), Some(c), None] => triangles.push([a, b, c]),
                _ => return Err(refused),
            }
        }
        Ok((points, triangles))
    }

    /// The points and faces, inner loops and vertex loops included. Vertices and faces keep their
    /// order; retired ones are left out. Edges are not numbered. O(V + corners).
    #[must_use]
    pub fn to_polygons(&self) -> Polygons<S> {
        let (points, numbers) = self.numbered_points();
        let mut list = FaceListBuf::new(points.len());
        let mut corners = Vec::new();
        for face in self.topology().faces() {
            for (i, bound) in self.topology().face_bounds(face).enumerate() {
                corners.clear();
                match bound {
                    FaceBound::EdgeLoop(h) => corners.extend(
                        self.topology()
                            .loop_corners(h)
                            .map(|h| numbers[self.topology().start(h).index()]),
                    ),
                    FaceBound::VertexLoop(v) => corners.push(numbers[v.index()]),
                }
                match (bound, i) {
                    (FaceBound::EdgeLoop(_), 0) => list.push_face(&corners),
                    (FaceBound::EdgeLoop(_), _) => list.push_inner_loop(&corners),
                    (FaceBound::VertexLoop(_), 0) => list.push_vertex_face(corners[0]),
                    (FaceBound::VertexLoop(_), _) => list.push_inner_vertex_loop(corners[0]),
                }
            }
        }
        (points, list)
    }

    /// The points of the live vertices, and for each vertex slot its number among them.
    fn numbered_points(&self) -> (Vec<[S; 3]>, Vec<u32>) {
        let mut numbers = vec![u32::MAX; self.topology().vertex_bound()];
        let mut points = Vec::with_capacity(self.topology().vertex_count());
        for v in self.topology().vertices() {
            numbers[v.index()] = points.len() as u32;
            points.push(self.point(v));
        }
        (points, numbers)
    }
}
