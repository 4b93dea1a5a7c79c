//! Reading the values, and holding them in a kernel.

use merestone::geometry::{Brep, BuildError, CleanSoup, PolygonSoup};
use merestone::topology::{Assemble, AssembleError};
use serde::Deserialize;
use serde::de::DeserializeOwned;
use std::path::Path;

/// A surface or complex. What a file does not say of it is `None`.
#[derive(Clone, Debug, Deserialize)]
pub(crate) struct Model {
    #[serde(default)]
    pub(crate) name: String,
    #[serde(rename = "V")]
    pub(crate) vertex_count: usize,
    #[serde(rename = "E")]
    pub(crate) edge_count: usize,
    #[serde(rename = "F")]
    pub(crate) face_count: usize,
    pub(crate) euler: Option<i64>,
    pub(crate) genus: Option<i64>,
    pub(crate) demigenus: Option<i64>,
    #[serde(alias = "signed_volume_by_newell")]
    pub(crate) volume: Option<f64>,
    #[serde(alias = "area_by_newell")]
    pub(crate) area: Option<f64>,
    pub(crate) closed: Option<bool>,
    pub(crate) boundary_edges: Option<usize>,
    pub(crate) boundary_loops: Option<usize>,
    pub(crate) edges_inconsistent_as_listed: Option<usize>,
    pub(crate) fans: Option<usize>,
    #[serde(default)]
    pub(crate) nonmanifold_edges: Vec<[usize; 2]>,
    #[serde(default)]
    pub(crate) nonmanifold_vertices: Vec<usize>,
    /// Absent where the model is combinatorial.
    vertices: Option<Vec<[f64; 3]>>,
    #[serde(default)]
    pub(crate) faces: Vec<Vec<u32>>,
}

impl Model {
    /// The points; for a combinatorial model, points on a moment curve, of which no four are in
    /// one plane.
    pub(crate) fn points(&self) -> Vec<[f64; 3]> {
        let on_curve = |t: usize| [t as f64, (t * t) as f64, (t * t * t) as f64];
        self.vertices.clone().unwrap_or_else(|| (0..self.vertex_count).map(on_curve).collect())
    }

    /// Whether every face is a triangle.
    pub(crate) fn is_triangulated(&self) -> bool {
        self.faces.iter().all(|face| face.len() == 3)
    }

    /// The model as a soup that kept the counting rules.
    pub(crate) fn soup(&self) -> CleanSoup {
        let mut soup = PolygonSoup { points: self.points(), ..PolygonSoup::default() };
        soup.faces.set_vertex_count(soup.points.len());
        self.faces.iter().for_each(|face| soup.faces.push_face(face));
        let soup = soup.clean().expect("finite points and corners in range");
        assert_eq!(soup.faces().face_count(), self.face_count, "{}", self.name);
        assert_eq!(soup.points().len(), self.vertex_count, "{}", self.name);
        soup
    }

    /// The model in the kernel `K`; `None` where that holds triangles only and the model is not
    /// made of them. Any other refusal is a failure.
    pub(crate) fn held_by<K: Assemble>(&self) -> Option<Brep<K, f64>> {
        match Brep::from_polygons(self.points(), &self.faces) {
            Ok(mesh) => Some(mesh),
            Err(BuildError::Assemble(AssembleError::CannotHold { .. }))
                if !self.is_triangulated() =>
            {
                None
            }
            Err(error) => panic!("{}: {error}", self.name),
        }
    }
}

/// Reads a file of this folder.
pub(crate) fn read<T: DeserializeOwned>(name: &str) -> T {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("reference");
    let text = std::fs::read_to_string(folder.join(name)).expect(name);
    serde_json::from_str(&text).expect(name)
}

/// Entries of an object of models, by name.
pub(crate) fn read_some(file: &str, names: &[&str]) -> Vec<Model> {
    let mut all: serde_json::Map<String, serde_json::Value> = read(file);
    let model = |name: &&str| {
        let value = all.remove(*name).expect(name);
        let model: Model = serde_json::from_value(value).expect(name);
        Model { name: (*name).to_owned(), ..model }
    };
    names.iter().map(model).collect()
}

/// A fraction as the files write it: `a` or `a/b`.
pub(crate) fn fraction(text: &str) -> f64 {
    let number = |text: &str| text.parse::<f64>().expect("a number");
    match text.split_once('/') {
        Some((above, below)) => number(above) / number(below),
        None => number(text),
    }
}

/// Asserts that two numbers agree to `tolerance`, relative to the second.
#[track_caller]
pub(crate) fn assert_near(found: f64, expected: f64, tolerance: f64, what: &str) {
    assert!((found - expected).abs() <= tolerance * expected.abs(), "{what}: {found} ≠ {expected}");
}
