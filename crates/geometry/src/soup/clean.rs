//! The counting rules: from soup as read to soup that a topology can be assembled from.

use super::{AttributeColumn, Note, PolygonSoup, SoupError};
use merestone_topology::{FaceList, FaceListBuf};

/// A soup that keeps the counting rules.
///
/// Points are finite, every corner names one of them, every point is a corner of some face,
/// consecutive corners of a loop differ (cyclically) and every loop has three different vertices
/// or more. Repeated faces and faces of no area are still there; they are counted by
/// [`duplicate_faces`](Self::duplicate_faces) and [`zero_area_faces`](Self::zero_area_faces).
///
/// Made by [`PolygonSoup::clean`].
#[derive(Clone, Debug)]
pub struct CleanSoup {
    soup: PolygonSoup,
    /// `None` while every vertex kept its number.
    vertex_map: Option<Vec<u32>>,
    vertex_sources: Option<Vec<u32>>,
    /// `None` while every face was kept.
    face_sources: Option<Vec<u32>>,
    source_vertices: usize,
    collapsed_faces: Vec<u32>,
    /// A corner of each, since its vertices may be gone afterwards.
    collapsed_places: Vec<[f64; 3]>,
    collapsed_inner_loops: Vec<CollapsedLoop>,
    repeated_corners: usize,
}

/// An inner loop that was left with fewer than three different vertices, and was dropped.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct CollapsedLoop {
    /// The face's number in the soup that was cleaned.
    pub face: u32,
    /// The loop's number within the face; the outer loop is 0.
    pub bound: u32,
}

const NONE: u32 = u32::MAX;

impl PolygonSoup {
    /// Applies the counting rules, in this order.
    ///
    /// 1. Every coordinate must be finite.
    /// 2. Consecutive equal vertices of a loop become one, the last and the first included.
    /// 3. A face whose outer loop is left with fewer than three different vertices is *collapsed*:
    ///    listed and dropped. An inner loop so left is listed and dropped, its face is kept.
    ///    Vertex loops go the same way.
    /// 4. Vertices that no kept face uses are *isolated*: counted and dropped.
    ///
    /// Vertices are compared by number: weld first where records should be one vertex. Kept
    /// vertices, faces and columns stay in their order. O(vertices + corners); what is in order
    /// is moved, not copied.
    ///
    /// ```
    /// use merestone_geometry::PolygonSoup;
    /// let points = vec![[0., 0., 0.], [1., 0., 0.], [1., 1., 0.], [0., 1., 0.], [9., 9., 9.]];
    /// let mut soup = PolygonSoup { points, ..PolygonSoup::default() };
    /// soup.faces.set_vertex_count(5);
    /// soup.faces.push_face(&[0, 1, 1, 2, 0]); // a triangle with corners said twice
    /// soup.faces.push_face(&[2, 3, 2]);       // nothing is left of this one
    /// let clean = soup.clean()?;
    /// assert_eq!(clean.faces().corners(), [0, 1, 2]);
    /// assert_eq!(clean.collapsed_faces(), [1]);
    /// assert_eq!((clean.points().len(), clean.isolated_vertices()), (3, 2));
    /// # Ok::<(), merestone_geometry::SoupError>(())
    /// ```
    ///
    /// # Errors
    /// [`SoupError`]: a coordinate that is not finite, a corner out of range, a column of the
    /// wrong length.
    pub fn clean(self) -> Result<CleanSoup, SoupError> {
        self.check()?;
        let mut clean = CleanSoup {
            source_vertices: self.points.len(),
            soup: self,
            vertex_map: None,
            vertex_sources: None,
            face_sources: None,
            collapsed_faces: Vec::new(),
            collapsed_places: Vec::new(),
            collapsed_inner_loops: Vec::new(),
            repeated_corners: 0,
        };
        clean.drop_collapsed_loops();
        clean.drop_isolated_vertices();
        Ok(clean)
    }

    fn check(&self) -> Result<(), SoupError> {
        for (vertex, point) in self.points.iter().enumerate() {
            if let Some(axis) = point.iter().position(|x| !x.is_finite()) {
                let value = point[axis];
                return Err(SoupError::NotFinite { vertex, axis: ['x', 'y', 'z'][axis], value });
            }
        }
        // The soup's points decide, whatever count the list was made with.
        let list = self.faces.as_list();
        if list.vertex_count() > self.points.len() {
            let mut faces = self.faces.clone();
            faces.set_vertex_count(self.points.len());
            faces.as_list().check()?;
        }
        list.check()?;
        check_columns(&self.vertex_columns, "vertices", self.points.len())?;
        check_columns(&self.face_columns, "faces", list.face_count())
    }
}

fn check_columns(
    columns: &[AttributeColumn],
    kind: &'static str,
    cells: usize,
) -> Result<(), SoupError> {
    match columns.iter().find(|column| column.values.len() != cells) {
        None => Ok(()),
        Some(column) => Err(SoupError::Column {
            name: column.name.clone(),
            kind,
            values: column.values.len(),
            cells,
        }),
    }
}

/// Whether a loop stays as it is: no equal neighbours, three different vertices.
#[inline]
fn is_clean(corners: &[u32]) -> bool {
    match *corners {
        [a, b, c] => a != b && b != c && c != a,
        _ => !has_equal_neighbours(corners) && has_three_different(corners),
    }
}

fn has_equal_neighbours(corners: &[u32]) -> bool {
    corners.first() == corners.last() || corners.windows(2).any(|pair| pair[0] == pair[1])
}

fn has_three_different(corners: &[u32]) -> bool {
    let Some(&first) = corners.first() else { return false };
    let Some(&second) = corners.iter().find(|&&corner| corner != first) else { return false };
    corners.iter().any(|&corner| corner != first && corner != second)
}

/// Merges equal neighbours, cyclically; false when fewer than three different vertices are left.
fn tidy(corners: &[u32], into: &mut Vec<u32>) -> bool {
    into.clear();
    into.extend_from_slice(corners);
    into.dedup();
    while into.len() > 1 && into.first() == into.last() {
        into.pop();
    }
    has_three_different(into)
}

impl CleanSoup {
    fn drop_collapsed_loops(&mut self) {
        let list = self.soup.faces.as_list();
        let stays = |index| {
            list.listed_loop(index).is_some_and(|l| !l.is_vertex_loop && is_clean(l.corners))
        };
        if (0..list.loop_count()).all(stays) {
            return;
        }
        let mut faces = FaceListBuf::with_capacity(
            self.soup.points.len(),
            list.face_count(),
            list.corner_count(),
        );
        let mut sources = Vec::with_capacity(list.face_count());
        let mut corners = Vec::new();
        let mut corners_kept = 0;
        let mut corners_seen = 0;
        for face in 0..list.face_count() {
            for (bound, listed) in list.loops(face).enumerate() {
                let (face, bound) = (face as u32, bound as u32);
                if !tidy(listed.corners, &mut corners) {
                    if bound == 0 {
                        self.collapsed_faces.push(face);
                        let place = |&corner: &u32| self.soup.points[corner as usize];
                        self.collapsed_places.push(listed.corners.first().map_or([0.0; 3], place));
                        break;
                    }
                    self.collapsed_inner_loops.push(CollapsedLoop { face, bound });
                    continue;
                }
                corners_seen += listed.corners.len();
                corners_kept += corners.len();
                if bound == 0 {
                    faces.push_face(&corners);
                    sources.push(face);
                } else {
                    faces.push_inner_loop(&corners);
                }
            }
        }
        self.repeated_corners = corners_seen - corners_kept;
        self.soup.faces = faces;
        if !self.collapsed_faces.is_empty() {
            for column in &mut self.soup.face_columns {
                column.values.select(&sources);
            }
            self.face_sources = Some(sources);
        }
    }

    fn drop_isolated_vertices(&mut self) {
        let count = self.soup.points.len();
        let mut used = vec![false; count];
        for &corner in self.soup.faces.as_list().corners() {
            used[corner as usize] = true;
        }
        if used.iter().all(|&used| used) {
            self.soup.faces.set_vertex_count(count);
            return;
        }
        let sources: Vec<u32> = (0..count as u32).filter(|&v| used[v as usize]).collect();
        let mut map = vec![NONE; count];
        for (new, &old) in sources.iter().enumerate() {
            map[old as usize] = new as u32;
        }
        self.soup.points = sources.iter().map(|&v| self.soup.points[v as usize]).collect();
        self.soup.faces.renumber(sources.len(), |vertex| map[vertex as usize]);
        for column in &mut self.soup.vertex_columns {
            column.values.select(&sources);
        }
        self.vertex_map = Some(map);
        self.vertex_sources = Some(sources);
    }

    /// The points, each a corner of some face.
    #[must_use]
    pub fn points(&self) -> &[[f64; 3]] {
        &self.soup.points
    }

    /// The kept faces.
    #[must_use]
    pub fn faces(&self) -> FaceList<'_> {
        self.soup.faces.as_list()
    }

    /// Columns of one value a kept vertex.
    #[must_use]
    pub fn vertex_columns(&self) -> &[AttributeColumn] {
        &self.soup.vertex_columns
    }

    /// Columns of one value a kept face.
    #[must_use]
    pub fn face_columns(&self) -> &[AttributeColumn] {
        &self.soup.face_columns
    }

    /// What the reader noted.
    #[must_use]
    pub fn notes(&self) -> &[Note] {
        &self.soup.notes
    }

    /// The soup itself, to take it apart.
    #[must_use]
    pub fn into_soup(self) -> PolygonSoup {
        self.soup
    }

    /// What became of a vertex of the soup that was cleaned; `None` where it is isolated or out
    /// of range. O(1).
    #[must_use]
    pub fn vertex_of(&self, source: usize) -> Option<usize> {
        match &self.vertex_map {
            None => Some(source).filter(|&vertex| vertex < self.source_vertices),
            Some(map) => map.get(source).filter(|&&v| v != NONE).map(|&v| v as usize),
        }
    }

    /// Which vertex of the soup that was cleaned a kept vertex is; `None` out of range. O(1).
    #[must_use]
    pub fn vertex_source(&self, vertex: usize) -> Option<usize> {
        source(self.vertex_sources.as_deref(), self.soup.points.len(), vertex)
    }

    /// Which face of the soup that was cleaned a kept face is; `None` out of range. O(1).
    #[must_use]
    pub fn face_source(&self, face: usize) -> Option<usize> {
        source(self.face_sources.as_deref(), self.faces().face_count(), face)
    }

    /// Vertices that no kept face uses; they are no longer among the points.
    #[must_use]
    pub fn isolated_vertices(&self) -> usize {
        self.source_vertices - self.soup.points.len()
    }

    /// The collapsed faces, by their numbers in the soup that was cleaned, ascending.
    #[must_use]
    pub fn collapsed_faces(&self) -> &[u32] {
        &self.collapsed_faces
    }

    /// Where the collapsed faces were: the first corner of each, in the same order.
    #[must_use]
    pub fn collapsed_places(&self) -> &[[f64; 3]] {
        &self.collapsed_places
    }

    /// How many faces collapsed, counting those without any corner, which have no number.
    #[must_use]
    pub fn collapsed_face_count(&self) -> usize {
        self.collapsed_faces.len() + self.soup.empty_faces
    }

    /// The inner loops that were dropped from kept faces, ascending.
    #[must_use]
    pub fn collapsed_inner_loops(&self) -> &[CollapsedLoop] {
        &self.collapsed_inner_loops
    }

    /// How many corners of kept loops were merged into the corner before them.
    #[must_use]
    pub fn repeated_corners(&self) -> usize {
        self.repeated_corners
    }
}

fn source(sources: Option<&[u32]>, count: usize, cell: usize) -> Option<usize> {
    match sources {
        None => Some(cell).filter(|&cell| cell < count),
        Some(sources) => sources.get(cell).map(|&source| source as usize),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::soup::AttributeValues;

    fn soup(points: usize, faces: &[&[u32]]) -> PolygonSoup {
        let points = (0..points).map(|i| [i as f64, (i * i) as f64, 0.0]).collect();
        let mut soup = PolygonSoup { points, ..PolygonSoup::default() };
        soup.faces.set_vertex_count(soup.points.len());
        faces.iter().for_each(|corners| soup.faces.push_face(corners));
        soup
    }

    #[test]
    fn collapsed_faces_are_listed_and_their_attributes_go_with_them() {
        let mut soup = soup(
            7,
            &[
                &[0, 1],
                &[5, 5, 6, 1],
                &[2],
                &[1, 2, 1, 2],
                &[0, 0, 0],
                &[1, 2, 1, 6],
                &[1, 2, 2, 1],
            ],
        );
        soup.face_columns = vec![AttributeColumn::new("n", AttributeValues::I32((0..7).collect()))];
        soup.vertex_columns =
            vec![AttributeColumn::new("v", AttributeValues::I32((0..7).collect()))];
        soup.empty_faces = 1;
        let clean = soup.clean().unwrap();
        assert_eq!(clean.collapsed_faces(), [0, 2, 3, 4, 6]);
        assert_eq!(clean.collapsed_places().len(), 5);
        assert_eq!(clean.collapsed_places()[3..], [[0., 0., 0.], [1., 1., 0.]]);
        assert_eq!(clean.collapsed_face_count(), 6);
        assert_eq!(clean.repeated_corners(), 1);
        // Vertices 1, 2, 5 and 6 are left.
        assert_eq!(clean.faces().loops(0).next().unwrap().corners, [2, 3, 0]);
        assert_eq!(clean.faces().loops(1).next().unwrap().corners, [0, 1, 0, 3]);
        assert_eq!(clean.faces().vertex_count(), 4);
        assert_eq!(clean.isolated_vertices(), 3);
        assert_eq!(
            (clean.vertex_of(5), clean.vertex_of(0), clean.vertex_of(7)),
            (Some(2), None, None)
        );
        assert_eq!((clean.vertex_source(2), clean.vertex_source(4)), (Some(5), None));
        assert_eq!((clean.face_source(1), clean.face_source(2)), (Some(5), None));
        assert_eq!(clean.face_columns()[0].values, AttributeValues::I32(vec![1, 5]));
        assert_eq!(clean.vertex_columns()[0].values, AttributeValues::I32(vec![1, 2, 5, 6]));
    }

    #[test]
    fn an_inner_loop_that_collapses_is_dropped_alone() {
        let mut soup = soup(9, &[&[0, 1, 2, 3]]);
        soup.faces.push_inner_loop(&[4, 5, 4]);
        soup.faces.push_inner_loop(&[5, 6, 6, 7]);
        soup.faces.push_inner_vertex_loop(8);
        soup.faces.push_face(&[0, 0, 1]);
        soup.faces.push_inner_loop(&[2, 3, 4]);
        let clean = soup.clean().unwrap();
        assert_eq!(
            clean.collapsed_inner_loops(),
            [CollapsedLoop { face: 0, bound: 1 }, CollapsedLoop { face: 0, bound: 3 }]
        );
        assert_eq!(clean.collapsed_faces(), [1]);
        let loops: Vec<_> = clean.faces().loops(0).map(|l| l.corners.to_vec()).collect();
        assert_eq!(loops, [vec![0, 1, 2, 3], vec![4, 5, 6]]);
        assert_eq!(clean.isolated_vertices(), 2);
    }

    #[test]
    fn what_cannot_be_counted_is_refused() {
        let mut bad = soup(4, &[&[0, 1, 2]]);
        bad.points[3][1] = f64::NEG_INFINITY;
        assert_eq!(
            bad.clean().unwrap_err(),
            SoupError::NotFinite { vertex: 3, axis: 'y', value: f64::NEG_INFINITY }
        );
        // The list was told of more vertices than there are points.
        let mut bad = soup(3, &[&[0, 1, 3]]);
        bad.faces.set_vertex_count(10);
        assert!(matches!(bad.clean().unwrap_err(), SoupError::Faces(_)));
        let mut bad = soup(3, &[&[0, 1, 2]]);
        bad.face_columns = vec![AttributeColumn::new("n", AttributeValues::U8(vec![]))];
        let message = bad.clean().unwrap_err().to_string();
        assert!(message.contains("`n` holds 0 values for 1 faces"), "{message}");
    }

    #[test]
    fn nothing_at_all_is_clean() {
        let clean = PolygonSoup::default().clean().unwrap();
        assert_eq!((clean.points().len(), clean.faces().face_count()), (0, 0));
    }
}
