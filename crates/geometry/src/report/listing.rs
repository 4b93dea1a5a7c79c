//! Collecting defects with their places, some of each kind.

use super::{DefectCell, DefectKind, MeshDefect, ReportOptions};
use crate::brep::Brep;
use crate::soup::{CleanSoup, DuplicateFace};
use merestone_topology::floods::{Survey, fan_count, is_balanced};
use merestone_topology::{EdgeKind, Id, Topology, TopologyExt};

/// Faces named for one edge.
const FACES_NAMED: usize = 16;

pub(super) struct Listing<'a, K: Topology> {
    soup: &'a CleanSoup,
    mesh: &'a Brep<K, f64>,
    options: &'a ReportOptions,
    by_kind: [Vec<MeshDefect>; DefectKind::ALL.len()],
}

impl<'a, K: Topology> Listing<'a, K> {
    pub(super) fn new(
        soup: &'a CleanSoup,
        mesh: &'a Brep<K, f64>,
        options: &'a ReportOptions,
    ) -> Self {
        Self { soup, mesh, options, by_kind: Default::default() }
    }

    /// All that was listed, kind by kind.
    pub(super) fn finish(self) -> Vec<MeshDefect> {
        self.by_kind.into_iter().flatten().collect()
    }

    fn has_room(&self, kind: DefectKind) -> bool {
        self.by_kind[kind as usize].len() < self.options.listed_per_kind
    }

    fn list(&mut self, kind: DefectKind, at: [f64; 3], cells: Vec<DefectCell>, message: String) {
        self.by_kind[kind as usize].push(MeshDefect { kind, at, cells, message });
    }

    pub(super) fn edges_and_vertices(&mut self, survey: &Survey) {
        let mesh = self.mesh;
        // A good mesh has nothing to look for.
        let suspects = survey.boundary_edges + survey.misoriented_edges + survey.non_manifold_edges;
        if suspects > 0 {
            for edge in mesh.edges() {
                let kind = match mesh.edge_kind(edge) {
                    EdgeKind::Plain => continue,
                    EdgeKind::Boundary if self.options.open => continue,
                    EdgeKind::Boundary => DefectKind::BoundaryEdges,
                    EdgeKind::Misoriented => DefectKind::MisorientedEdges,
                    EdgeKind::NonManifold => DefectKind::NonManifoldEdges,
                };
                self.edge(kind, edge);
                if !is_balanced(mesh.topology(), edge) {
                    self.edge(DefectKind::UnbalancedEdges, edge);
                }
            }
        }
        if survey.non_manifold_vertices > 0 {
            for v in mesh.vertices() {
                let fans = fan_count(mesh.topology(), v);
                if fans > 1 && self.has_room(DefectKind::NonManifoldVertices) {
                    let number = self.vertex(v);
                    let message = format!("{fans} fans of faces meet at vertex {number} alone");
                    let cells = vec![DefectCell::Vertex(number)];
                    self.list(DefectKind::NonManifoldVertices, mesh.point(v), cells, message);
                }
            }
        }
    }

    fn edge(&mut self, kind: DefectKind, edge: K::Edge) {
        if !self.has_room(kind) {
            return;
        }
        let mesh = self.mesh;
        let [a, b] = mesh.edge_vertices(edge).map(|v| self.vertex(v));
        let mut faces: Vec<usize> = Vec::new();
        let (mut uses, mut along) = (0, 0);
        for h in mesh.edge_uses(edge) {
            uses += 1;
            along += usize::from(mesh.runs_with_edge(h));
            let face = self.face(mesh.face(h).index());
            if faces.len() < FACES_NAMED && !faces.contains(&face) {
                faces.push(face);
            }
        }
        let named = if uses > FACES_NAMED { "among others by" } else { "by" };
        let by = format!("{named} {}", named_faces(&faces));
        let against = uses - along;
        let how = match kind {
            DefectKind::BoundaryEdges => "has one use only".to_owned(),
            DefectKind::MisorientedEdges => "is used twice the same way".to_owned(),
            _ if uses == 1 => "has one use only".to_owned(),
            _ => format!("has {uses} uses, {along} one way and {against} the other"),
        };
        let message = format!("the edge between vertices {a} and {b} {how}, {by}");
        let cells = std::iter::once(DefectCell::Edge([a, b]))
            .chain(faces.into_iter().map(DefectCell::Face))
            .collect();
        self.list(kind, self.middle(edge), cells, message);
    }

    pub(super) fn collapsed_faces(&mut self) {
        let soup = self.soup;
        for (&face, &at) in soup.collapsed_faces().iter().zip(soup.collapsed_places()) {
            if !self.has_room(DefectKind::CollapsedFaces) {
                break;
            }
            let face = face as usize;
            let message =
                format!("face {face} has fewer than three different vertices and is left out");
            self.list(DefectKind::CollapsedFaces, at, vec![DefectCell::Face(face)], message);
        }
    }

    pub(super) fn zero_area_faces(&mut self, faces: &[u32]) {
        self.faces(DefectKind::ZeroAreaFaces, faces, |face| {
            format!("all corners of face {face} lie on one line")
        });
    }

    pub(super) fn non_planar_faces(&mut self, faces: &[u32]) {
        let tolerance = self.options.planar_tolerance;
        self.faces(DefectKind::NonPlanarFaces, faces, |face| {
            format!(
                "a corner of face {face} is off its plane by more than {tolerance:e} of its diameter"
            )
        });
    }

    fn faces(&mut self, kind: DefectKind, faces: &[u32], message: impl Fn(usize) -> String) {
        for &face in faces.iter().take(self.options.listed_per_kind) {
            let number = self.face(face as usize);
            let cells = vec![DefectCell::Face(number)];
            self.list(kind, self.middle_of_face(face), cells, message(number));
        }
    }

    pub(super) fn duplicate_faces(&mut self, duplicates: &[DuplicateFace]) {
        for &DuplicateFace { face, first } in duplicates.iter().take(self.options.listed_per_kind) {
            let at = self.middle_of_face(face);
            let (face, first) = (self.face(face as usize), self.face(first as usize));
            let message = format!("face {face} has the same loops as face {first}");
            let cells = vec![DefectCell::Face(face), DefectCell::Face(first)];
            self.list(DefectKind::DuplicateFaces, at, cells, message);
        }
    }

    /// The middle of an edge.
    pub(super) fn middle(&self, edge: K::Edge) -> [f64; 3] {
        mean(self.mesh.edge_vertices(edge).into_iter().map(|v| self.mesh.point(v)))
    }

    /// The mean of the outer loop's corners.
    fn middle_of_face(&self, face: u32) -> [f64; 3] {
        let outer = self.soup.faces().loops(face as usize).next();
        let corners = outer.map_or(&[][..], |listed| listed.corners);
        mean(corners.iter().map(|&v| self.soup.points()[v as usize]))
    }

    /// A vertex's number in the soup that was cleaned.
    fn vertex(&self, v: K::Vertex) -> usize {
        self.soup.vertex_source(v.index()).unwrap_or(v.index())
    }

    /// A kept face's number in the soup that was cleaned.
    fn face(&self, face: usize) -> usize {
        self.soup.face_source(face).unwrap_or(face)
    }
}

fn named_faces(faces: &[usize]) -> String {
    let numbers: Vec<String> = faces.iter().map(usize::to_string).collect();
    format!("{} {}", if faces.len() == 1 { "face" } else { "faces" }, numbers.join(", "))
}

/// The mean of points, divided first so that no sum overflows.
fn mean(points: impl ExactSizeIterator<Item = [f64; 3]>) -> [f64; 3] {
    let share = 1.0 / points.len().max(1) as f64;
    points.fold([0.0; 3], |sum, p| std::array::from_fn(|axis| sum[axis] + p[axis] * share))
}
