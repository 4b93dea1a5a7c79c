//! Face lists: what a topology is assembled from.
//!
//! A face list names, for every face, its loops, and for every loop its corners as vertex numbers.
//! [`FaceList`] borrows that from the caller's own arrays, [`FaceListBuf`] owns it. Both may also
//! say which edge each corner's oriented edge uses; without that, the corners decide: **one edge
//! for each unordered pair of vertices**.
//!
//! ```
//! use merestone_topology::FaceList;
//! let triangles = [[0, 1, 2], [0, 2, 3]];
//! let list = FaceList::triangles(4, &triangles);
//! assert_eq!((list.face_count(), list.corner_count()), (2, 6));
//! ```

mod buffer;
mod error;
mod loops;

pub use buffer::FaceListBuf;
pub use error::FaceListError;
pub use loops::{ListedLoop, ListedLoops};

/// Which edge a corner's oriented edge uses, and which way.
///
/// Four bytes: edge numbers go up to 2³¹ − 1.
///
/// ```
/// use merestone_topology::EdgeUse;
/// let u = EdgeUse::new(5, false);
/// assert_eq!((u.edge(), u.runs_with_edge()), (5, false));
/// ```
#[derive(Clone, Copy, PartialEq, Eq, Hash, Debug)]
pub struct EdgeUse(u32);

impl EdgeUse {
    /// A use of edge number `edge`, along it or against it. The top bit of `edge` is ignored.
    #[must_use]
    pub const fn new(edge: u32, runs_with_edge: bool) -> Self {
        Self(edge & (u32::MAX >> 1) | if runs_with_edge { 0 } else { 1 << 31 })
    }

    /// The edge's number.
    #[must_use]
    pub const fn edge(self) -> u32 {
        self.0 & (u32::MAX >> 1)
    }

    /// Whether the use runs the way its edge does.
    #[must_use]
    pub const fn runs_with_edge(self) -> bool {
        self.0 >> 31 == 0
    }
}

/// Faces as loops of vertex numbers, borrowed. `Copy`; every accessor is O(1).
#[derive(Clone, Copy, Debug)]
pub struct FaceList<'a> {
    vertex_count: usize,
    corners: &'a [u32],
    shape: Shape<'a>,
    edges: Option<&'a [EdgeUse]>,
}

#[derive(Clone, Copy, Debug)]
enum Shape<'a> {
    /// Every face is one loop of three corners.
    Triangles,
    /// Every face is one loop; its last corner + 1.
    Polygons { loop_ends: &'a [u32] },
    /// Last corner + 1 of every loop, last loop + 1 of every face, and the loops (ascending) that
    /// are a bare vertex.
    Loops { loop_ends: &'a [u32], face_ends: &'a [u32], vertex_loops: &'a [u32] },
}

impl<'a> FaceList<'a> {
    /// Faces of three corners each, over vertices `0..vertex_count`.
    ///
    /// Vertex numbers are checked where the list is assembled, once.
    #[must_use]
    pub fn triangles(vertex_count: usize, triangles: &'a [[u32; 3]]) -> Self {
        Self {
            vertex_count,
            corners: triangles.as_flattened(),
            shape: Shape::Triangles,
            edges: None,
        }
    }

    /// Faces of one loop each: face `f` has the corners `corners[ends[f - 1]..ends[f]]`.
    ///
    /// # Errors
    /// [`FaceListError`] where the ends do not ascend, leave a face without corners, or do not
    /// end with the corners.
    pub fn polygons(
        vertex_count: usize,
        corners: &'a [u32],
        ends: &'a [u32],
    ) -> Result<Self, FaceListError> {
        error::check_ends("loop", ends, corners.len())?;
        Ok(Self { vertex_count, corners, shape: Shape::Polygons { loop_ends: ends }, edges: None })
    }

    /// The same list, saying which edge each corner's oriented edge uses.
    ///
    /// Edge `e` of the assembled topology is the edge numbered `e` here. Uses are taken round
    /// their edge in the order of their corners.
    ///
    /// # Errors
    /// [`FaceListError::EdgeUses`] unless there is one use a corner; that each edge joins the same two vertices in
    /// all its uses is checked where the list is assembled.
    pub fn with_edges(self, edges: &'a [EdgeUse]) -> Result<Self, FaceListError> {
        if edges.len() != self.corners.len() {
            return Err(FaceListError::EdgeUses { uses: edges.len(), corners: self.corners.len() });
        }
        Ok(Self { edges: Some(edges), ..self })
    }

    /// How many vertices there are; corners name `0..vertex_count`.
    #[must_use]
    pub fn vertex_count(&self) -> usize {
        self.vertex_count
    }

    /// How many faces.
    #[must_use]
    pub fn face_count(&self) -> usize {
        match self.shape {
            Shape::Triangles => self.corners.len() / 3,
            Shape::Polygons { loop_ends } => loop_ends.len(),
            Shape::Loops { face_ends, .. } => face_ends.len(),
        }
    }

    /// How many loops, vertex loops included.
    #[must_use]
    pub fn loop_count(&self) -> usize {
        match self.shape {
            Shape::Triangles => self.corners.len() / 3,
            Shape::Polygons { loop_ends } | Shape::Loops { loop_ends, .. } => loop_ends.len(),
        }
    }

    /// How many corners, counting one for each vertex loop.
    #[must_use]
    pub fn corner_count(&self) -> usize {
        self.corners.len()
    }

    /// The vertex number of every corner, loop by loop.
    #[must_use]
    pub fn corners(&self) -> &'a [u32] {
        self.corners
    }

    /// The edge uses, one a corner, where the list has them.
    #[must_use]
    pub fn edge_uses(&self) -> Option<&'a [EdgeUse]> {
        self.edges
    }

    /// The corners in threes, where every face is one loop of three corners: always so for
    /// [`triangles`](Self::triangles) and from a [`FaceListBuf`], never for
    /// [`polygons`](Self::polygons), which does not look.
    #[must_use]
    pub fn as_triangles(&self) -> Option<&'a [[u32; 3]]> {
        match self.shape {
            Shape::Triangles => Some(self.corners.as_chunks::<3>().0),
            _ => None,
        }
    }

    /// The loops of a face, outer first. Empty when `face` is out of range.
    #[must_use]
    pub fn loops(&self, face: usize) -> ListedLoops<'a> {
        let range = match self.shape {
            Shape::Triangles | Shape::Polygons { .. } => {
                if face < self.face_count() {
                    face..face + 1
                } else {
                    0..0
                }
            }
            Shape::Loops { face_ends, .. } => match face_ends.get(face) {
                Some(&end) => loops::start_of(face_ends, face)..end as usize,
                None => 0..0,
            },
        };
        ListedLoops::new(*self, range)
    }

    /// Loop number `index`, counted over all faces; `None` when out of range.
    #[inline]
    #[must_use]
    pub fn listed_loop(&self, index: usize) -> Option<ListedLoop<'a>> {
        let (range, is_vertex_loop) = match self.shape {
            Shape::Triangles if index < self.loop_count() => (3 * index..3 * index + 3, false),
            Shape::Triangles => return None,
            Shape::Polygons { loop_ends } => {
                (loops::start_of(loop_ends, index)..*loop_ends.get(index)? as usize, false)
            }
            Shape::Loops { loop_ends, vertex_loops, .. } => (
                loops::start_of(loop_ends, index)..*loop_ends.get(index)? as usize,
                vertex_loops.binary_search(&(index as u32)).is_ok(),
            ),
        };
        Some(ListedLoop {
            first_corner: range.start,
            corners: &self.corners[range],
            is_vertex_loop,
        })
    }

    /// Checks what assembling relies on: every corner names a vertex, and the counts fit dense ids.
    ///
    /// O(corners), one pass.
    ///
    /// # Errors
    /// [`FaceListError`] naming the first corner at fault.
    pub fn check(&self) -> Result<(), FaceListError> {
        error::check_numbers(self.vertex_count, self.corners)
    }
}
