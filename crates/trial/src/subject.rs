//! The mesh a trial is made on.

use crate::TrialError;
use merestone::geometry::{Brep, BuildError, CleanSoup};
use merestone::topology::{Assemble, FaceList, FaceListBuf};

/// A mesh as works take it: points, and faces as offsets + vertices.
///
/// Every face has one loop of at least two corners, no corner repeats the one before it, every
/// corner names a point and every coordinate is finite.
#[derive(Clone, Debug)]
pub struct Subject {
    points: Vec<[f64; 3]>,
    faces: FaceListBuf,
    face_ends: Vec<u32>,
    size: f64,
    name: String,
    format: Option<&'static str>,
    dropped_vertices: usize,
    collapsed_faces: usize,
}

impl Subject {
    /// The mesh that a file holds, after the counting rules. O(corners).
    ///
    /// # Errors
    /// [`TrialError`] where it has no faces, or one with several bounds.
    pub fn from_clean(soup: CleanSoup) -> Result<Self, TrialError> {
        let (dropped_vertices, collapsed_faces) =
            (soup.isolated_vertices(), soup.collapsed_face_count());
        let soup = soup.into_soup();
        let subject = Self::new(soup.points, soup.faces)?;
        Ok(Self { dropped_vertices, collapsed_faces, ..subject })
    }

    /// A mesh of triangles.
    ///
    /// # Errors
    /// As [`new`](Self::new).
    pub fn from_triangles(
        points: Vec<[f64; 3]>,
        triangles: &[[u32; 3]],
    ) -> Result<Self, TrialError> {
        let mut faces =
            FaceListBuf::with_capacity(points.len(), triangles.len(), 3 * triangles.len());
        triangles.iter().for_each(|triangle| faces.push_face(triangle));
        Self::new(points, faces)
    }

    /// A mesh of any faces with one loop each. O(corners).
    ///
    /// # Errors
    /// [`TrialError`] where there are no faces, a coordinate is not finite, a corner names no
    /// point, a face has several bounds, or a loop names one vertex twice running.
    pub fn new(points: Vec<[f64; 3]>, mut faces: FaceListBuf) -> Result<Self, TrialError> {
        let finite = |point: &[f64; 3]| point.iter().all(|x| x.is_finite());
        if let Some(vertex) = points.iter().position(|point| !finite(point)) {
            return Err(TrialError::NotFinite { vertex, coordinates: points[vertex] });
        }
        faces.set_vertex_count(points.len());
        let list = faces.as_list();
        list.check()?;
        if list.face_count() == 0 {
            return Err(TrialError::NoFaces);
        }
        let face_ends = face_ends(list)?;
        let size = diagonal(list.corners().iter().map(|&v| points[v as usize]));
        Ok(Self {
            points,
            faces,
            face_ends,
            size,
            name: String::new(),
            format: None,
            dropped_vertices: 0,
            collapsed_faces: 0,
        })
    }

    /// The same under a name, the file's or the demonstration's, and the file's format.
    #[must_use]
    pub fn named(self, name: impl Into<String>, format: Option<&'static str>) -> Self {
        Self { name: name.into(), format, ..self }
    }

    /// The name for reports; empty unless it was given.
    #[must_use]
    pub fn name(&self) -> &str {
        &self.name
    }

    /// The file's format, where it came from a file.
    #[must_use]
    pub fn format(&self) -> Option<&'static str> {
        self.format
    }

    /// Vertices that the counting rules dropped because no face uses them.
    #[must_use]
    pub fn dropped_vertices(&self) -> usize {
        self.dropped_vertices
    }

    /// Faces that the counting rules dropped.
    #[must_use]
    pub fn collapsed_faces(&self) -> usize {
        self.collapsed_faces
    }

    /// One point per vertex.
    #[must_use]
    pub fn points(&self) -> &[[f64; 3]] {
        &self.points
    }

    /// The faces, as kernels are assembled from them.
    #[must_use]
    pub fn faces(&self) -> FaceList<'_> {
        self.faces.as_list()
    }

    /// The vertex of each corner, face after face.
    #[must_use]
    pub fn corners(&self) -> &[u32] {
        self.faces().corners()
    }

    /// Where the corners of each face end.
    #[must_use]
    pub fn face_ends(&self) -> &[u32] {
        &self.face_ends
    }

    /// The index buffer, where every face has three corners.
    #[must_use]
    pub fn triangles(&self) -> Option<&[[u32; 3]]> {
        self.faces.as_list().as_triangles()
    }

    /// How many faces.
    #[must_use]
    pub fn face_count(&self) -> usize {
        self.face_ends.len()
    }

    /// The mesh's size: the diagonal of the box around all vertices that a face uses, and 1 where
    /// they all lie in one place.
    #[must_use]
    pub fn size(&self) -> f64 {
        self.size
    }

    /// The mesh on a kernel. O(corners) expected.
    ///
    /// # Errors
    /// [`BuildError`] where the kernel cannot hold a face.
    pub fn on_kernel<K: Assemble>(&self) -> Result<Brep<K, f64>, BuildError> {
        Brep::from_face_list(self.points.clone(), self.faces())
    }
}

fn face_ends(list: FaceList<'_>) -> Result<Vec<u32>, TrialError> {
    if list.as_triangles().is_some() {
        return Ok((1..=list.face_count() as u32).map(|f| 3 * f).collect());
    }
    let mut ends = Vec::with_capacity(list.face_count());
    for face in 0..list.face_count() {
        let mut loops = list.loops(face);
        match (loops.next(), loops.next()) {
            (Some(outer), None) if outer.is_vertex_loop => {
                return Err(TrialError::VertexLoop { face });
            }
            (Some(outer), None) => ends.push((outer.first_corner + outer.corners.len()) as u32),
            _ => return Err(TrialError::InnerLoop { face }),
        }
    }
    Ok(ends)
}

fn diagonal(mut points: impl Iterator<Item = [f64; 3]>) -> f64 {
    let Some(first) = points.next() else { return 1.0 };
    let (mut low, mut high) = (first, first);
    for point in points {
        for axis in 0..3 {
            low[axis] = low[axis].min(point[axis]);
            high[axis] = high[axis].max(point[axis]);
        }
    }
    let [x, y, z] = [0, 1, 2].map(|axis| high[axis] - low[axis]);
    let length = x.hypot(y).hypot(z);
    // Farther apart than the largest number: the largest number has to do.
    if length > 0.0 { length.min(f64::MAX) } else { 1.0 }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn size_is_the_diagonal_of_what_faces_use() {
        let points = vec![[0.0; 3], [3.0, 0.0, 0.0], [0.0, 4.0, 0.0], [99.0; 3]];
        let subject = Subject::from_triangles(points, &[[0, 1, 2]]).unwrap();
        assert_eq!((subject.size(), subject.face_count()), (5.0, 1));
        let one_place = Subject::from_triangles(vec![[7.0; 3]; 3], &[[0, 1, 2]]).unwrap();
        assert_eq!(one_place.size(), 1.0);
    }

    #[test]
    fn what_no_work_is_defined_on_is_refused() {
        let points = vec![[0.0; 3]; 4];
        let with = |change: &dyn Fn(&mut FaceListBuf)| {
            let mut faces = FaceListBuf::new(4);
            change(&mut faces);
            Subject::new(points.clone(), faces).map(|_| ())
        };
        assert_eq!(with(&|_| {}), Err(TrialError::NoFaces));
        assert!(matches!(with(&|f| f.push_face(&[0, 1, 9])), Err(TrialError::FaceList(_))));
        let holed = with(&|f| {
            f.push_face(&[0, 1, 2]);
            f.push_inner_loop(&[1, 2, 3]);
        });
        assert_eq!(holed, Err(TrialError::InnerLoop { face: 0 }));
        assert_eq!(with(&|f| f.push_vertex_face(2)), Err(TrialError::VertexLoop { face: 0 }));
        let mut nan = points.clone();
        nan[3][1] = f64::NAN;
        let refused = Subject::from_triangles(nan, &[[0, 1, 2]]).unwrap_err();
        assert!(matches!(refused, TrialError::NotFinite { vertex: 3, .. }));
    }
}
