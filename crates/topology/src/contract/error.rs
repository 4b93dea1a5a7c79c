//! What assembling and editing refuse.

use crate::{FaceListError, Id};

/// A face list that a kernel does not assemble.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum AssembleError {
    /// The list itself is unusable on any kernel.
    #[error(transparent)]
    List(#[from] FaceListError),
    /// This kernel cannot hold one of the faces.
    #[error("the {kernel} kernel cannot hold face {face}, {what}; {advice}")]
    CannotHold {
        /// The kernel's name.
        kernel: &'static str,
        /// The face's number in the list.
        face: usize,
        /// What about it.
        what: &'static str,
        /// Which kernel can, or how to change the face.
        advice: &'static str,
    },
}

/// An edit that was refused and changed nothing.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum EditError {
    /// The id names no live cell: it was retired, or belongs to another topology.
    #[error(
        "{kind} {index} (generation {generation}) does not live here; ask the topology for its live {kind} ids"
    )]
    Stale {
        /// `"vertex"`, `"edge"`, `"face"` or `"oriented edge"`.
        kind: &'static str,
        /// The id's index.
        index: usize,
        /// The id's generation.
        generation: u32,
    },
    /// A vertex that a face still uses.
    #[error("vertex {vertex} still bounds face {face}; remove its faces first")]
    VertexInUse {
        /// The vertex's index.
        vertex: usize,
        /// The index of a face that uses it.
        face: usize,
    },
}

impl EditError {
    /// The refusal of an id that names no live cell.
    #[must_use]
    pub fn stale(kind: &'static str, id: impl Id) -> Self {
        Self::Stale { kind, index: id.index(), generation: id.generation() }
    }
}
