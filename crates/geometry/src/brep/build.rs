//! Building a [`Brep`] from points and faces.

use super::Brep;
use crate::scalar::Scalar;
use crate::soup::CleanSoup;
use merestone_topology::{Assemble, AssembleError, Column, FaceList, FaceListBuf, FaceListError};

/// Points and faces that make no mesh.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum BuildError {
    /// A coordinate is NaN or infinite.
    #[error("point {point} has the coordinates {coordinates:?}; all must be finite")]
    NotFinite {
        /// The point's number.
        point: usize,
        /// Its coordinates.
        coordinates: [f64; 3],
    },
    /// The faces cannot be assembled.
    #[error(transparent)]
    Assemble(#[from] AssembleError),
}

impl From<FaceListError> for BuildError {
    fn from(error: FaceListError) -> Self {
        Self::Assemble(error.into())
    }
}

impl<K: Assemble, S: Scalar> Brep<K, S> {
    /// A mesh of triangles over `points`; vertex i is point i, face f is triangle f.
    ///
    /// Time O(points + triangles) expected.
    ///
    /// # Errors
    /// [`BuildError`] when a coordinate is not finite, or a triangle names a point that is not
    /// there.
    pub fn from_triangles(
        points: impl Into<Vec<[S; 3]>>,
        triangles: &[[u32; 3]],
    ) -> Result<Self, BuildError> {
        let points = points.into();
        let list = FaceList::triangles(points.len(), triangles);
        Self::from_face_list(points, list)
    }

    /// A mesh of polygons over `points`, each face one loop of point numbers.
    ///
    /// ```
    /// use merestone_geometry::Mesh;
    /// use merestone_topology::Topology;
    /// let points = [[0.0, 0.0, 0.0], [2.0, 0.0, 0.0], [2.0, 1.0, 0.0], [0.0, 1.0, 0.0]];
    /// let mesh = Mesh::from_polygons(points, [[0, 1, 2, 3]])?;
    /// assert_eq!((mesh.edge_count(), mesh.area()), (4, 2.0));
    /// # Ok::<(), merestone_geometry::BuildError>(())
    /// ```
    ///
    /// # Errors
    /// As [`from_triangles`](Self::from_triangles), and where the kernel cannot hold a face, or a face has no corner.
    pub fn from_polygons<F: AsRef<[u32]>>(
        points: impl Into<Vec<[S; 3]>>,
        faces: impl IntoIterator<Item = F>,
    ) -> Result<Self, BuildError> {
        let points = points.into();
        let mut list = FaceListBuf::new(points.len());
        for (index, face) in faces.into_iter().enumerate() {
            let corners = face.as_ref();
            if corners.is_empty() {
                let (start, end) = (list.as_list().corner_count(), list.as_list().corner_count());
                return Err(FaceListError::Empty { what: "face", index, start, end }.into());
            }
            list.push_face(corners);
        }
        Self::from_face_list(points, list.as_list())
    }

    /// A mesh from any face list; inner loops and edge numbers included.
    ///
    /// # Errors
    /// As [`from_polygons`](Self::from_polygons).
    pub fn from_face_list(points: Vec<[S; 3]>, faces: FaceList<'_>) -> Result<Self, BuildError> {
        check_finite(&points)?;
        if points.len() < faces.vertex_count() {
            let vertex = points.len() as u32;
            let vertex_count = points.len();
            return Err(FaceListError::VertexOutOfRange { corner: 0, vertex, vertex_count }.into());
        }
        let topology = K::assemble(faces)?;
        Ok(Self { topology, points: Column::from_values(points) })
    }

    /// A mesh from its parts: a topology and a point for each of its vertex slots.
    ///
    /// # Errors
    /// [`BuildError`] when a coordinate is not finite or the column is too short.
    pub fn from_parts(topology: K, points: Column<K::Vertex, [S; 3]>) -> Result<Self, BuildError> {
        let (vertex_count, bound) = (points.values().len(), topology.vertex_bound());
        if vertex_count < bound {
            let vertex = vertex_count as u32;
            return Err(FaceListError::VertexOutOfRange { corner: 0, vertex, vertex_count }.into());
        }
        check_finite(points.values())?;
        Ok(Self { topology, points })
    }
}

impl<K: Assemble> Brep<K, f64> {
    /// The mesh of a cleaned soup; vertex i and face f are those of the soup.
    ///
    /// ```
    /// use merestone_geometry::{PolygonSoup, TriangleMesh};
    /// let points = vec![[0., 0., 0.], [3., 0., 0.], [0., 2., 0.]];
    /// let mut soup = PolygonSoup { points, ..PolygonSoup::default() };
    /// soup.faces.set_vertex_count(3);
    /// soup.faces.push_face(&[0, 1, 2]);
    /// let mesh = TriangleMesh::from_soup(&soup.clean()?)?;
    /// assert_eq!(mesh.area(), 3.0);
    /// # Ok::<(), Box<dyn std::error::Error>>(())
    /// ```
    ///
    /// # Errors
    /// [`BuildError::Assemble`] where the kernel cannot hold a face, or there are too many.
    pub fn from_soup(soup: &CleanSoup) -> Result<Self, BuildError> {
        Self::from_face_list(soup.points().to_vec(), soup.faces())
    }
}

fn check_finite<S: Scalar>(points: &[[S; 3]]) -> Result<(), BuildError> {
    let widened = |point: usize| points[point].map(Scalar::widen);
    match (0..points.len()).find(|&point| !widened(point).iter().all(|c| c.is_finite())) {
        Some(point) => Err(BuildError::NotFinite { point, coordinates: widened(point) }),
        None => Ok(()),
    }
}
