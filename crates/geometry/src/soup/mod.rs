//! Polygon soup: points and faces as a file has them, before there is any topology.
//!
//! [`PolygonSoup`] is what readers hand out. [`PolygonSoup::weld_exact`] makes one vertex of
//! records that coincide, [`PolygonSoup::clean`] applies the counting rules and hands back a
//! [`CleanSoup`]: finite points, corners in range, loops of at least three different vertices,
//! no vertex without a face. That is what a topology is assembled from.

mod clean;
mod columns;
mod duplicates;
mod error;
mod note;
mod planarity;
mod weld;
mod zero_area;

pub use clean::{CleanSoup, CollapsedLoop};
pub use columns::{AttributeColumn, AttributeValues};
pub use duplicates::DuplicateFace;
pub use error::SoupError;
pub use note::{Note, NoteKind};
pub use planarity::PLANAR_TOLERANCE;
pub use weld::Welder;

use merestone_topology::FaceListBuf;

/// Points and loops as a file has them, with the columns that came along.
///
/// Readers hand it out, [`weld_exact`](Self::weld_exact) makes one vertex of records that coincide,
/// and [`clean`](Self::clean) hands back what a topology is assembled from.
///
/// ```
/// use merestone_geometry::PolygonSoup;
/// // Two triangles as an unindexed file stores them: each brings its own three points.
/// let corners = [[0., 0., 0.], [1., 0., 0.], [0., 1., 0.], [1., 0., 0.], [1., 1., 0.], [-0., 1., 0.]];
/// let mut soup = PolygonSoup { points: corners.to_vec(), ..PolygonSoup::default() };
/// soup.faces.set_vertex_count(6);
/// soup.faces.push_face(&[0, 1, 2]);
/// soup.faces.push_face(&[3, 4, 5]);
///
/// let (soup, record_to_vertex) = soup.weld_exact();
/// assert_eq!(record_to_vertex, [0, 1, 2, 1, 3, 2]);
/// let clean = soup.clean()?;
/// assert_eq!((clean.points().len(), clean.faces().face_count()), (4, 2));
/// # Ok::<(), merestone_geometry::SoupError>(())
/// ```
///
/// The parts are public because a reader fills them and a caller may: nothing is promised about
/// them until [`clean`](Self::clean) has passed.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct PolygonSoup {
    /// The vertices' coordinates, in file order.
    pub points: Vec<[f64; 3]>,
    /// The faces' loops, in file order; corners are indices into `points`.
    pub faces: FaceListBuf,
    /// Columns of one value a vertex.
    pub vertex_columns: Vec<AttributeColumn>,
    /// Columns of one value a face.
    pub face_columns: Vec<AttributeColumn>,
    /// Names of the parts, where the format has them; a face column `solid` holds indices into it.
    pub part_names: Vec<String>,
    /// Faces without a single corner. A face list cannot hold them, so they are counted here.
    pub empty_faces: usize,
    /// What the reader met that is worth telling, but no reason to refuse the file.
    pub notes: Vec<Note>,
}
