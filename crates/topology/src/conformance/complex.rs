//! Face lists that can be told apart by what a kernel must be able to hold.

use super::Capabilities;
use super::reference::{ListedBound, Reference};
use crate::{EdgeUse, FaceListBuf, Topology};

/// One loop of a [`Complex`].
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Ring {
    /// Its corners as vertex numbers.
    Edges(Vec<u32>),
    /// A bare vertex.
    Vertex(u32),
}

/// A complex to assemble, with a name that tells where it comes from.
///
/// ```
/// use merestone_topology::conformance::Complex;
/// let complex = Complex::triangles("one triangle", 3, &[[0, 1, 2]]);
/// assert_eq!(complex.to_list().as_list().face_count(), 1);
/// ```
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Complex {
    /// Where it comes from: a description, or the generator and its seed.
    pub name: String,
    /// How many vertices there are.
    pub vertex_count: usize,
    /// The loops of every face, outer first.
    pub faces: Vec<Vec<Ring>>,
    /// The edge every corner uses, corners of vertex loops included, where edges are numbered.
    pub edge_uses: Option<Vec<EdgeUse>>,
}

impl Complex {
    /// Triangles.
    #[must_use]
    pub fn triangles(name: &str, vertex_count: usize, triangles: &[[u32; 3]]) -> Self {
        Self::polygons(name, vertex_count, triangles.iter().map(|t| t.to_vec()))
    }

    /// Faces of one loop each.
    #[must_use]
    pub fn polygons(
        name: &str,
        vertex_count: usize,
        loops: impl IntoIterator<Item = Vec<u32>>,
    ) -> Self {
        let faces = loops.into_iter().map(|corners| vec![Ring::Edges(corners)]).collect();
        Self { name: name.to_owned(), vertex_count, faces, edge_uses: None }
    }

    /// The face list.
    #[must_use]
    pub fn to_list(&self) -> FaceListBuf {
        let mut list = FaceListBuf::new(self.vertex_count);
        for rings in &self.faces {
            for (number, ring) in rings.iter().enumerate() {
                match (ring, number) {
                    (Ring::Edges(corners), 0) => list.push_face(corners),
                    (Ring::Edges(corners), _) => list.push_inner_loop(corners),
                    (Ring::Vertex(v), 0) => list.push_vertex_face(*v),
                    (Ring::Vertex(v), _) => list.push_inner_vertex_loop(*v),
                }
            }
        }
        if let Some(uses) = &self.edge_uses {
            // Uses of another number than corners leave the list without edge numbers.
            let _ = list.set_edges(uses.clone());
        }
        list
    }

    /// The faces as triangles, where all are single loops of three corners without edge numbers.
    #[must_use]
    pub fn as_triangles(&self) -> Option<Vec<[u32; 3]>> {
        if self.edge_uses.is_some() {
            return None;
        }
        let triangle = |rings: &Vec<Ring>| match &rings[..] {
            [Ring::Edges(corners)] => corners[..].try_into().ok(),
            _ => None,
        };
        self.faces.iter().map(triangle).collect()
    }

    /// The corners of all edge loops, in the order of the list: number, start, end.
    #[must_use]
    pub fn sides(&self) -> Vec<(usize, u32, u32)> {
        let mut sides = Vec::new();
        let mut corner = 0;
        for ring in self.faces.iter().flatten() {
            match ring {
                Ring::Vertex(_) => corner += 1,
                Ring::Edges(corners) => {
                    for (i, &start) in corners.iter().enumerate() {
                        sides.push((corner, start, corners[(i + 1) % corners.len()]));
                        corner += 1;
                    }
                }
            }
        }
        sides
    }

    /// Whether face number `face` is one that a kernel of these capabilities cannot hold.
    #[must_use]
    pub fn exceeds(&self, face: usize, capabilities: &Capabilities) -> bool {
        let Some(rings) = self.faces.get(face) else { return false };
        let lacks_holes = !capabilities.holes
            && (rings.len() != 1 || rings.iter().any(|ring| matches!(ring, Ring::Vertex(_))));
        let any_loop = |bad: &dyn Fn(&[u32]) -> bool| {
            rings.iter().any(|ring| matches!(ring, Ring::Edges(corners) if bad(corners)))
        };
        let lacks_polygons = !capabilities.polygons && any_loop(&|corners| corners.len() != 3);
        let has_self_edge = |corners: &[u32]| {
            (0..corners.len()).any(|i| corners[i] == corners[(i + 1) % corners.len()])
        };
        let lacks_self_edges = !capabilities.self_edges && any_loop(&has_self_edge);
        lacks_holes || lacks_polygons || lacks_self_edges
    }
}

impl From<&Reference> for Complex {
    /// What is left in the reference, with its edge numbers. Meant for a compacted one: ids are
    /// taken for numbers.
    fn from(mesh: &Reference) -> Self {
        let mut complex = Self {
            name: "what is left".to_owned(),
            vertex_count: mesh.vertex_bound(),
            faces: Vec::new(),
            edge_uses: None,
        };
        let mut uses = Vec::new();
        for bounds in mesh.faces.values() {
            let mut rings = Vec::new();
            for bound in bounds {
                match bound {
                    ListedBound::VertexLoop(v) => {
                        uses.push(EdgeUse::new(0, true));
                        rings.push(Ring::Vertex(v.to_u32()));
                    }
                    ListedBound::EdgeLoop(corners) => {
                        let records = corners.iter().map(|h| mesh.uses[h]);
                        uses.extend(records.clone().map(|u| EdgeUse::new(u.edge.to_u32(), u.with)));
                        rings.push(Ring::Edges(records.map(|u| u.start.to_u32()).collect()));
                    }
                }
            }
            complex.faces.push(rings);
        }
        complex.edge_uses = Some(uses);
        complex
    }
}
