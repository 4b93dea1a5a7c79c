//! What a trial found, in the words and keys that other programs read.

use crate::machine::Machine;
use crate::values::Difference;
use crate::verdict::Verdict;
use merestone::topology::floods::Survey;
use serde::{Serialize, Serializer};

/// A trial's findings. Serialised, it has the keys of the program's contract.
#[derive(Clone, Debug, Serialize)]
pub struct Report {
    /// The mesh, in counts.
    pub mesh: MeshCounts,
    /// Where it ran.
    pub machine: Machine,
    /// The kernels tried, and the bare arrays last.
    pub kernels: Vec<Held>,
    /// Every work on every kernel, work by work, bare arrays last in each.
    pub results: Vec<Outcome>,
    /// How often the caller's program does each work.
    pub mix: Vec<MixPart>,
    /// The answer.
    pub verdict: Verdict,
    /// From how many passes on converting to another kernel pays. Empty while kernels cannot be
    /// converted into each other: without a conversion there is no such number.
    pub break_even: Vec<BreakEven>,
    /// Where a kernel's results first part from those of the bare arrays. An error.
    #[serde(rename = "error", skip_serializing_if = "Option::is_none")]
    pub disagreement: Option<Disagreement>,
}

/// A work of the mix.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
pub struct MixPart {
    /// The work's name.
    pub work: &'static str,
    /// How often.
    pub count: u64,
}

/// The number of passes from which converting pays.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
pub struct BreakEven {
    /// The kernel to leave.
    pub from: &'static str,
    /// The kernel to convert to.
    pub to: &'static str,
    /// The work that is done there.
    pub work: &'static str,
    /// How often; `None` where it never pays.
    pub count: Option<u64>,
}

/// A mesh in counts.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct MeshCounts {
    /// The file, or the demonstration.
    pub file: String,
    /// The file's format.
    pub format: Option<&'static str>,
    /// Vertices that a face uses.
    pub vertices: usize,
    /// Edges.
    pub edges: usize,
    /// Faces.
    pub faces: usize,
    /// Loops of faces beyond their first.
    pub inner_loops: usize,
    /// Vertices that no face uses.
    pub isolated_vertices: usize,
    /// Faces that the counting rules dropped.
    pub collapsed_faces: usize,
    /// Faces joined through shared edges.
    pub components: usize,
    /// Edges with one use.
    pub boundary_edges: usize,
    /// Edges with more than two uses.
    pub non_manifold_edges: usize,
    /// Edges with two uses that run the same way.
    pub misoriented_edges: usize,
    /// Vertices with more than one fan.
    pub non_manifold_vertices: usize,
    /// V − E + F − R.
    pub euler_characteristic: i64,
    /// The genus, where the whole is closed, manifold and orientable.
    pub genus: Option<i64>,
    /// No non-manifold edge or vertex.
    pub manifold: bool,
    /// Faces, and no boundary edge.
    pub closed: bool,
    /// No misoriented edge.
    pub oriented: bool,
    /// Some choice of orientation has no misoriented edge.
    pub orientable: bool,
}

impl MeshCounts {
    pub(crate) fn new(file: &str, format: Option<&'static str>, survey: &Survey) -> Self {
        Self {
            file: file.to_owned(),
            format,
            vertices: survey.vertices,
            edges: survey.edges,
            faces: survey.faces,
            inner_loops: survey.inner_loops,
            isolated_vertices: survey.isolated_vertices,
            collapsed_faces: 0,
            components: survey.components,
            boundary_edges: survey.boundary_edges,
            non_manifold_edges: survey.non_manifold_edges,
            misoriented_edges: survey.misoriented_edges,
            non_manifold_vertices: survey.non_manifold_vertices,
            euler_characteristic: survey.euler_characteristic(),
            genus: survey.genus(),
            manifold: survey.is_manifold(),
            closed: survey.is_closed(),
            oriented: survey.is_oriented(),
            orientable: survey.orientable,
        }
    }
}

/// What a kernel holds for the mesh, coordinates not counted: they are the same for all.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Held {
    /// The kernel's name.
    pub kernel: &'static str,
    /// Heap bytes; `None` where it cannot hold the mesh.
    pub bytes: Option<usize>,
    /// The same array by array.
    #[serde(serialize_with = "as_map")]
    pub bytes_by_array: Vec<(&'static str, usize)>,
    /// Bytes over faces.
    pub bytes_per_face: Option<f64>,
    /// The most it held while it was assembled, where that is known.
    pub assembly_peak: Option<usize>,
    /// Whether it holds all of the mesh.
    pub lossless: bool,
    /// What it could not hold, or what is special about it.
    pub note: Option<String>,
}

/// One work on one kernel.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Outcome {
    /// The kernel's name.
    pub kernel: &'static str,
    /// The work's name.
    pub work: &'static str,
    /// Whether it can be done there.
    pub supported: bool,
    /// Why not.
    pub reason: Option<String>,
    /// Faces or vertices that it goes over.
    pub elements: usize,
    /// How many samples were taken.
    pub runs: usize,
    /// How many runs made a sample.
    pub runs_per_sample: usize,
    /// Nanoseconds a run, the median.
    pub median_ns: Option<f64>,
    /// The lower end of its 95 % interval.
    pub low_ns: Option<f64>,
    /// The upper end.
    pub high_ns: Option<f64>,
    /// The median over the elements.
    pub ns_per_element: Option<f64>,
    /// Of the results.
    pub checksum: Option<i64>,
    /// Whether the results are those of the bare arrays, value by value.
    pub agrees: Option<bool>,
}

/// A result that is not what it should be.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
#[error(
    "{kernel} disagrees with the bare arrays in {work} at {}: {} instead of {}; \
     do not trust this kernel with this mesh, and report it",
    .difference.cell, shown(.difference.found), shown(.difference.expected)
)]
pub struct Disagreement {
    /// The kernel's name.
    pub kernel: &'static str,
    /// The work's name.
    pub work: &'static str,
    /// The cell, and both numbers.
    pub difference: Difference,
}

impl Serialize for Disagreement {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.collect_str(self)
    }
}

fn shown(number: Option<f64>) -> String {
    number.map_or_else(|| "nothing".to_owned(), |number| number.to_string())
}

/// Pairs as an object, in their order.
pub(crate) fn as_map<T: Serialize, S: Serializer>(
    pairs: &[(&'static str, T)],
    serializer: S,
) -> Result<S::Ok, S::Error> {
    serializer.collect_map(pairs.iter().map(|(key, value)| (key, value)))
}
