//! All counts of a topology at once.

use super::{Components, Orientation, boundary_loop_count, fan_count};
use crate::{EdgeKind, Topology, TopologyExt};

/// Whether as many uses of `e` run with it as against it. O(uses).
pub fn is_balanced<K: Topology + ?Sized>(mesh: &K, e: K::Edge) -> bool {
    match mesh.edge_kind(e) {
        EdgeKind::Plain => true,
        EdgeKind::Boundary | EdgeKind::Misoriented => false,
        EdgeKind::NonManifold => {
            let sum: i64 =
                mesh.edge_uses(e).map(|h| if mesh.runs_with_edge(h) { 1 } else { -1 }).sum();
            sum == 0
        }
    }
}

/// What a topology is, in counts.
///
/// ```
/// # use merestone_topology::{*, floods::Survey};
/// # fn f<K: Topology>(mesh: &K) {
/// let survey = Survey::of(mesh);
/// if survey.is_closed() && survey.is_manifold() && survey.is_oriented() {
///     println!("bounds solids of genus {:?}", survey.genus());
/// }
/// # }
/// ```
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Survey {
    /// Vertices that some face uses.
    pub vertices: usize,
    /// Vertices that no face uses.
    pub isolated_vertices: usize,
    /// Edges.
    pub edges: usize,
    /// Faces.
    pub faces: usize,
    /// Bounds of faces beyond their first.
    pub inner_loops: usize,
    /// Edges of one use.
    pub boundary_edges: usize,
    /// Edges of more than two uses.
    pub non_manifold_edges: usize,
    /// Edges of two uses that run the same way.
    pub misoriented_edges: usize,
    /// Edges with more uses one way than the other.
    pub unbalanced_edges: usize,
    /// Vertices with more than one fan.
    pub non_manifold_vertices: usize,
    /// Faces joined through shared edges.
    pub components: usize,
    /// Faces joined through shared vertices.
    pub vertex_components: usize,
    /// Connected pieces of the boundary, joined within fans.
    pub boundary_loops: usize,
    /// Components that are closed and balanced.
    pub shells: usize,
    /// Whether some choice of orientation leaves no misoriented edge.
    pub orientable: bool,
}

impl Survey {
    /// Counts everything. O(uses), O(c log c) at a vertex of c corners in several sectors.
    #[must_use]
    pub fn of<K: Topology>(mesh: &K) -> Self {
        let components = Components::of(mesh);
        let mut survey = Self {
            vertices: 0,
            isolated_vertices: 0,
            edges: mesh.edge_count(),
            faces: mesh.face_count(),
            inner_loops: mesh.inner_loop_count(),
            boundary_edges: 0,
            non_manifold_edges: 0,
            misoriented_edges: 0,
            unbalanced_edges: 0,
            non_manifold_vertices: 0,
            components: components.count(),
            vertex_components: Components::count_through_vertices(mesh),
            boundary_loops: 0,
            shells: 0,
            orientable: true,
        };
        let mut is_shell = vec![true; components.count()];
        mesh.edges().for_each(|e| {
            let kind = mesh.edge_kind(e);
            match kind {
                EdgeKind::Boundary => survey.boundary_edges += 1,
                EdgeKind::Misoriented => survey.misoriented_edges += 1,
                EdgeKind::NonManifold => survey.non_manifold_edges += 1,
                EdgeKind::Plain => return,
            }
            if !is_balanced(mesh, e) {
                survey.unbalanced_edges += 1;
                is_shell[components.number(mesh.face(mesh.edge_use(e)))] = false;
            }
        });
        mesh.vertices().for_each(|v| match fan_count(mesh, v) {
            0 => survey.isolated_vertices += 1,
            1 => {}
            _ => survey.non_manifold_vertices += 1,
        });
        survey.vertices = mesh.vertex_count() - survey.isolated_vertices;
        survey.shells = is_shell.into_iter().filter(|&shell| shell).count();
        if survey.boundary_edges > 0 {
            survey.boundary_loops = boundary_loop_count(mesh);
        }
        if survey.misoriented_edges > 0 {
            survey.orientable = Orientation::of(mesh).is_orientable();
        }
        survey
    }

    /// V − E + F − R over what faces use.
    #[must_use]
    pub fn euler_characteristic(&self) -> i64 {
        let n = |count: usize| count as i64;
        n(self.vertices) - n(self.edges) + n(self.faces) - n(self.inner_loops)
    }

    /// No non-manifold edge or vertex.
    #[must_use]
    pub fn is_manifold(&self) -> bool {
        self.non_manifold_edges == 0 && self.non_manifold_vertices == 0
    }

    /// Faces, and no boundary edge.
    #[must_use]
    pub fn is_closed(&self) -> bool {
        self.faces > 0 && self.boundary_edges == 0
    }

    /// No misoriented edge.
    #[must_use]
    pub fn is_oriented(&self) -> bool {
        self.misoriented_edges == 0
    }

    /// The genus summed over the components, where all is closed, manifold and orientable.
    #[must_use]
    pub fn genus(&self) -> Option<i64> {
        let has_genus = self.is_closed() && self.is_manifold() && self.orientable;
        has_genus.then(|| self.components as i64 - self.euler_characteristic() / 2)
    }
}
