//! A face list that owns its arrays and grows face by face.

use super::{EdgeUse, FaceList, FaceListError, Shape, error};

/// Faces as loops of vertex numbers, owned.
///
/// ```
/// use merestone_topology::FaceListBuf;
/// let mut list = FaceListBuf::new(8);
/// list.push_face(&[0, 1, 2, 3]);
/// list.push_inner_loop(&[4, 7, 6, 5]);
/// assert_eq!(list.as_list().loops(0).count(), 2);
/// ```
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct FaceListBuf {
    vertex_count: usize,
    corners: Vec<u32>,
    loop_ends: Vec<u32>,
    /// `None` while every face is one edge loop.
    face_ends: Option<Vec<u32>>,
    vertex_loops: Vec<u32>,
    /// How many loops have another number of corners than three.
    not_triangles: usize,
    edges: Option<Vec<EdgeUse>>,
}

impl FaceListBuf {
    /// An empty list over vertices `0..vertex_count`.
    #[must_use]
    pub fn new(vertex_count: usize) -> Self {
        Self { vertex_count, ..Self::default() }
    }

    /// An empty list with room for `faces` loops of `corners` corners in all.
    #[must_use]
    pub fn with_capacity(vertex_count: usize, faces: usize, corners: usize) -> Self {
        Self {
            vertex_count,
            corners: Vec::with_capacity(corners),
            loop_ends: Vec::with_capacity(faces),
            ..Self::default()
        }
    }

    /// A list of one loop a face from arrays that stand already.
    ///
    /// # Errors
    /// As [`FaceList::polygons`].
    pub fn from_polygons(
        vertex_count: usize,
        corners: Vec<u32>,
        ends: Vec<u32>,
    ) -> Result<Self, FaceListError> {
        error::check_ends("loop", &ends, corners.len())?;
        let mut start = 0;
        let lengths = ends.iter().map(|&end| end - std::mem::replace(&mut start, end));
        let not_triangles = lengths.filter(|&length| length != 3).count();
        Ok(Self { vertex_count, corners, loop_ends: ends, not_triangles, ..Self::default() })
    }

    /// How many vertices there are.
    #[must_use]
    pub fn vertex_count(&self) -> usize {
        self.vertex_count
    }

    /// Changes how many vertices there are; corners beyond are refused where the list is assembled.
    pub fn set_vertex_count(&mut self, vertex_count: usize) {
        self.vertex_count = vertex_count;
    }

    /// Gives every corner the vertex number that `renumber` makes of its old one, in place.
    ///
    /// Edge numbers stay as they are. O(corners).
    ///
    /// ```
    /// use merestone_topology::FaceListBuf;
    /// let mut list = FaceListBuf::new(4);
    /// list.push_face(&[0, 1, 3]);
    /// list.renumber(3, |vertex| vertex.min(2));
    /// assert_eq!(list.as_list().corners(), [0, 1, 2]);
    /// ```
    pub fn renumber(&mut self, vertex_count: usize, renumber: impl Fn(u32) -> u32) {
        self.vertex_count = vertex_count;
        for corner in &mut self.corners {
            *corner = renumber(*corner);
        }
    }

    /// Adds a face with one outer loop. Without corners nothing is added.
    pub fn push_face(&mut self, corners: &[u32]) {
        if corners.is_empty() {
            return;
        }
        self.push_loop(corners);
        if let Some(ends) = &mut self.face_ends {
            ends.push(self.loop_ends.len() as u32);
        }
    }

    /// Adds a face whose only bound is a vertex loop.
    pub fn push_vertex_face(&mut self, vertex: u32) {
        self.face_ends();
        self.vertex_loops.push(self.loop_ends.len() as u32);
        self.push_face(&[vertex]);
    }

    /// Adds an inner loop to the last face. Without corners, or without a face, nothing is added.
    pub fn push_inner_loop(&mut self, corners: &[u32]) {
        if corners.is_empty() || self.loop_ends.is_empty() {
            return;
        }
        self.push_loop(corners);
        let end = self.loop_ends.len() as u32;
        if let Some(last) = self.face_ends_before(1).last_mut() {
            *last = end;
        }
    }

    /// Adds a vertex loop to the last face. Without a face nothing is added.
    pub fn push_inner_vertex_loop(&mut self, vertex: u32) {
        if !self.loop_ends.is_empty() {
            self.vertex_loops.push(self.loop_ends.len() as u32);
            self.push_inner_loop(&[vertex]);
        }
    }

    /// Says which edge each corner uses, one use a corner, in the order of the corners.
    ///
    /// Faces added later make the list incomplete again: set the uses last.
    ///
    /// # Errors
    /// [`FaceListError::EdgeUses`] when the numbers differ.
    pub fn set_edges(&mut self, edges: Vec<EdgeUse>) -> Result<(), FaceListError> {
        if edges.len() != self.corners.len() {
            return Err(FaceListError::EdgeUses { uses: edges.len(), corners: self.corners.len() });
        }
        self.edges = Some(edges);
        Ok(())
    }

    /// The list, borrowed. O(1).
    #[must_use]
    pub fn as_list(&self) -> FaceList<'_> {
        let loop_ends = &self.loop_ends[..];
        let shape = match &self.face_ends {
            None if self.not_triangles == 0 => Shape::Triangles,
            None => Shape::Polygons { loop_ends },
            Some(face_ends) => {
                Shape::Loops { loop_ends, face_ends, vertex_loops: &self.vertex_loops }
            }
        };
        FaceList {
            vertex_count: self.vertex_count,
            corners: &self.corners,
            shape,
            edges: self.edges.as_deref().filter(|edges| edges.len() == self.corners.len()),
        }
    }

    /// The ends of the faces in loops, written out when they stop being the loops' own numbers.
    fn face_ends(&mut self) -> &mut Vec<u32> {
        self.face_ends_before(0)
    }

    /// The same, leaving aside the last `loops` loops, which belong to no face of their own.
    fn face_ends_before(&mut self, loops: usize) -> &mut Vec<u32> {
        let count = self.loop_ends.len() - loops;
        self.face_ends.get_or_insert_with(|| (1..=count as u32).collect())
    }

    fn push_loop(&mut self, corners: &[u32]) {
        self.not_triangles += usize::from(corners.len() != 3);
        self.corners.extend_from_slice(corners);
        self.loop_ends.push(self.corners.len() as u32);
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn holes_and_vertex_loops_end_up_where_they_were_pushed() {
        let mut buf = FaceListBuf::new(9);
        buf.push_vertex_face(8);
        buf.push_face(&[0, 1, 2]);
        buf.push_inner_loop(&[3, 4, 5, 6]);
        buf.push_inner_vertex_loop(7);
        buf.push_face(&[2, 1]);
        let list = buf.as_list();
        assert_eq!((list.face_count(), list.loop_count(), list.corner_count()), (3, 5, 11));
        let loops: Vec<Vec<_>> = (0..3)
            .map(|f| list.loops(f).map(|l| (l.corners.to_vec(), l.is_vertex_loop)).collect())
            .collect();
        assert_eq!(
            loops,
            [
                vec![(vec![8], true)],
                vec![(vec![0, 1, 2], false), (vec![3, 4, 5, 6], false), (vec![7], true)],
                vec![(vec![2, 1], false)],
            ]
        );
        assert!(list.as_triangles().is_none());
    }

    #[test]
    fn a_list_without_holes_stays_one_loop_a_face() {
        let mut buf = FaceListBuf::new(4);
        buf.push_inner_loop(&[0, 1]);
        buf.push_face(&[]);
        buf.push_face(&[0, 1, 2]);
        buf.push_face(&[0, 2, 3]);
        assert_eq!(buf.as_list().loops(1).next().unwrap().corners, [0, 2, 3]);
        assert_eq!(buf.as_list().as_triangles().unwrap(), [[0, 1, 2], [0, 2, 3]]);
        assert_eq!(buf, FaceListBuf::from_polygons(4, vec![0, 1, 2, 0, 2, 3], vec![3, 6]).unwrap());
    }

    #[test]
    fn ends_that_do_not_cover_the_corners_are_refused() {
        use FaceListError::{Empty, Uncovered};
        assert_eq!(
            FaceList::polygons(3, &[0, 1, 2], &[2]).unwrap_err(),
            Uncovered { what: "loop", end: 2, count: 3 }
        );
        assert_eq!(
            FaceList::polygons(3, &[0, 1, 2], &[2, 2, 3]).unwrap_err(),
            Empty { what: "loop", index: 1, start: 2, end: 2 }
        );
        let list = FaceList::polygons(2, &[0, 1, 2], &[3]).unwrap();
        assert_eq!(
            list.check().unwrap_err(),
            FaceListError::VertexOutOfRange { corner: 2, vertex: 2, vertex_count: 2 }
        );
    }
}
