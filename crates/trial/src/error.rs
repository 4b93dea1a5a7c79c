//! Why a mesh cannot be tried.

use crate::bare::assemble::AssembleError;
use crate::bare::half_edge::LoopError;
use merestone::geometry::BuildError;
use merestone::topology::FaceListError;

/// A mesh, or a wish, that no trial can be made of.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum TrialError {
    /// There is nothing to measure.
    #[error("the mesh has no faces: there is nothing to measure, so choose another file")]
    NoFaces,
    /// A coordinate is NaN or infinite.
    #[error("vertex {vertex} has the coordinates {coordinates:?}: all must be finite")]
    NotFinite {
        /// The vertex's number.
        vertex: usize,
        /// Its coordinates.
        coordinates: [f64; 3],
    },
    /// A face with several bounds.
    #[error(
        "face {face} has an inner loop: works on such faces are not built yet, \
         so bridge or split the face first"
    )]
    InnerLoop {
        /// The face's number.
        face: usize,
    },
    /// A face whose only bound is a vertex.
    #[error("face {face} is bounded by a vertex loop: works on such faces are not built yet")]
    VertexLoop {
        /// The face's number.
        face: usize,
    },
    /// The face list is unusable.
    #[error(transparent)]
    FaceList(#[from] FaceListError),
    /// The bare arrays cannot hold the triangles.
    #[error("the bare arrays cannot hold this mesh: {0}")]
    Triangles(#[from] AssembleError),
    /// The bare arrays cannot hold the loops.
    #[error("the bare arrays cannot hold this mesh: {0}")]
    Loops(#[from] LoopError),
    /// No kernel holds the mesh.
    #[error(transparent)]
    Kernel(#[from] BuildError),
    /// A time that no measurement can take.
    #[error(
        "{seconds} seconds cannot be spent on a measurement: give more than 0 and at most 3600"
    )]
    Seconds {
        /// What was asked for.
        seconds: f64,
    },
}
