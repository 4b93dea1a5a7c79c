//! What a mesh is and what is wrong with it, in one report.

mod defect;
mod listing;
#[cfg(test)]
mod tests;

pub use defect::{DefectCell, DefectKind, MeshDefect};

use crate::brep::{Brep, BuildError};
use crate::soup::{CleanSoup, PLANAR_TOLERANCE};
use listing::Listing;
use merestone_topology::Assemble;
use merestone_topology::floods::{Orientation, Survey};

/// What a [`MeshReport`] looks at, and how much of it is listed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ReportOptions {
    /// How far a corner may be from its face's plane, as a part of the face's diameter.
    pub planar_tolerance: f64,
    /// How many defects of each kind are listed. All are counted.
    pub listed_per_kind: usize,
    /// Whether an open sheet is wanted: boundary edges are then no defects.
    pub open: bool,
}

impl Default for ReportOptions {
    fn default() -> Self {
        Self { planar_tolerance: PLANAR_TOLERANCE, listed_per_kind: 10, open: false }
    }
}

/// What a mesh is, in counts and measures, and what keeps it from bounding a solid.
///
/// The counting rules are those of [`PolygonSoup::clean`](crate::PolygonSoup::clean) and
/// [`Survey`].
///
/// ```
/// use merestone_geometry::{DefectKind, MeshReport, PolygonSoup, ReportOptions};
/// use merestone_kernels::HalfEdge;
/// // The foundry's bracket, cut down to three plates that meet along one edge.
/// let points = vec![[0., 0., 0.], [0., 0., 40.], [60., 0., 0.], [-30., 50., 0.], [-30., -50., 0.]];
/// let mut soup = PolygonSoup { points, ..PolygonSoup::default() };
/// soup.faces.set_vertex_count(5);
/// for tip in [2, 3, 4] {
///     soup.faces.push_face(&[0, 1, tip]);
/// }
/// let report = MeshReport::new::<HalfEdge>(&soup.clean()?, &ReportOptions::default())?;
/// assert_eq!(report.count(DefectKind::NonManifoldEdges), 1);
/// assert_eq!(report.survey.boundary_edges, 6);
/// assert!(!report.is_sound());
/// let edge = report.defects.iter().find(|d| d.kind == DefectKind::NonManifoldEdges).unwrap();
/// assert_eq!(edge.at, [0., 0., 20.]);
/// assert_eq!(
///     edge.message,
///     "the edge between vertices 0 and 1 has 3 uses, 3 one way and 0 the other, by faces 0, 1, 2"
/// );
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
#[derive(Clone, Debug, PartialEq)]
#[non_exhaustive]
pub struct MeshReport {
    /// The counts of the topology; its isolated vertices are those of the soup.
    pub survey: Survey,
    /// Faces that were dropped because fewer than three different vertices were left of them.
    pub collapsed_faces: usize,
    /// Kept faces whose corners lie on one line.
    pub zero_area_faces: usize,
    /// Kept faces less the different ones.
    pub duplicate_faces: usize,
    /// Kept faces that are not flat.
    pub non_planar_faces: usize,
    /// Solids, where known. Not searched for yet.
    pub solids: Option<usize>,
    /// Void shells within solids, where known. Not searched for yet.
    pub voids: Option<usize>,
    /// Outer shells that face inward, where known. Not searched for yet.
    pub inside_out_components: Option<usize>,
    /// The area of all faces; infinite where a double does not hold it.
    pub area: f64,
    /// The signed volume; `None` without faces, where an edge is unbalanced, or where a double
    /// does not hold it.
    pub volume: Option<f64>,
    /// A place where the surface comes back on its other side; `None` where it is orientable.
    pub turns_over_at: Option<[f64; 3]>,
    /// The defects, kind by kind, as many of each as the options said.
    pub defects: Vec<MeshDefect>,
    /// Whether boundary edges are no defects.
    pub open: bool,
}

impl MeshReport {
    /// Assembles a cleaned soup in the kernel `K`, counts, measures and lists.
    ///
    /// O(corners) expected, and O(faces · log of the faces that share a smallest vertex) for the
    /// duplicates.
    ///
    /// # Errors
    /// [`BuildError`] where the kernel cannot hold a face.
    pub fn new<K: Assemble>(soup: &CleanSoup, options: &ReportOptions) -> Result<Self, BuildError> {
        let mesh = Brep::<K, f64>::from_soup(soup)?;
        let mut survey = Survey::of(mesh.topology());
        survey.isolated_vertices = soup.isolated_vertices();
        let zero_area = soup.zero_area_faces();
        let duplicates = soup.duplicate_faces();
        let non_planar = soup.non_planar_faces(options.planar_tolerance);

        let mut listing = Listing::new(soup, &mesh, options);
        listing.edges_and_vertices(&survey);
        listing.collapsed_faces();
        listing.zero_area_faces(&zero_area);
        listing.duplicate_faces(&duplicates);
        listing.non_planar_faces(&non_planar);
        let turns_over_at = if survey.orientable {
            None
        } else {
            Orientation::of(mesh.topology()).contradiction().map(|edge| listing.middle(edge))
        };
        let defects = listing.finish();

        let is_enclosing = survey.faces > 0 && survey.unbalanced_edges == 0;
        // Adding zero takes the sign from a zero.
        let volume = is_enclosing.then(|| mesh.signed_volume() + 0.0).filter(|v| v.is_finite());
        Ok(Self {
            survey,
            collapsed_faces: soup.collapsed_face_count(),
            zero_area_faces: zero_area.len(),
            duplicate_faces: duplicates.len(),
            non_planar_faces: non_planar.len(),
            solids: None,
            voids: None,
            inside_out_components: None,
            area: mesh.area(),
            volume,
            turns_over_at,
            defects,
            open: options.open,
        })
    }

    /// Collapsed faces and faces of no area together.
    #[must_use]
    pub fn degenerate_faces(&self) -> usize {
        self.collapsed_faces + self.zero_area_faces
    }

    /// How many cells have this property, whether it is a defect here or not.
    #[must_use]
    pub fn count(&self, kind: DefectKind) -> usize {
        match kind {
            DefectKind::BoundaryEdges => self.survey.boundary_edges,
            DefectKind::NonManifoldEdges => self.survey.non_manifold_edges,
            DefectKind::MisorientedEdges => self.survey.misoriented_edges,
            DefectKind::UnbalancedEdges => self.survey.unbalanced_edges,
            DefectKind::NonManifoldVertices => self.survey.non_manifold_vertices,
            DefectKind::CollapsedFaces => self.collapsed_faces,
            DefectKind::ZeroAreaFaces => self.zero_area_faces,
            DefectKind::DuplicateFaces => self.duplicate_faces,
            DefectKind::NonPlanarFaces => self.non_planar_faces,
        }
    }

    /// How many defects of this kind there are: the [`count`](Self::count), less boundary edges
    /// where an open sheet is wanted.
    #[must_use]
    pub fn defect_count(&self, kind: DefectKind) -> usize {
        let count = self.count(kind);
        match kind {
            DefectKind::BoundaryEdges if self.open => 0,
            // Every boundary edge is unbalanced, too.
            DefectKind::UnbalancedEdges if self.open => count - self.survey.boundary_edges,
            _ => count,
        }
    }

    /// Whether this bounds solids, seen as topology: closed, manifold and oriented.
    #[must_use]
    pub fn is_solid_boundary(&self) -> bool {
        self.survey.is_closed() && self.survey.is_manifold() && self.survey.is_oriented()
    }

    /// Whether the faces as a whole point inward: the volume is negative.
    #[must_use]
    pub fn is_inside_out(&self) -> bool {
        self.volume.is_some_and(|volume| volume < 0.0)
    }

    /// Whether there are faces, no defect of any kind, and no negative volume. Isolated vertices
    /// do no harm: no face uses them.
    #[must_use]
    pub fn is_sound(&self) -> bool {
        self.survey.faces > 0
            && !self.is_inside_out()
            && DefectKind::ALL.into_iter().all(|kind| self.defect_count(kind) == 0)
    }
}
