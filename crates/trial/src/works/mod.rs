//! The works: what is measured. One definition each serves the trial and the benches.
//!
//! A file each. Every file has the work as a user writes it, against the shared trait, for any
//! kernel (`on_kernel`), and the jobs that time it there and on bare arrays. The kernel, or the
//! bare array, is given; only the work is timed, except where the work is to assemble it.

pub mod assemble;
pub mod components;
pub mod face_normals;
pub mod smooth;

use crate::measure::Job;
use crate::{Subject, TrialError};
use merestone::geometry::Brep;
use merestone::topology::Assemble;
use std::fmt;

/// A work.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Work {
    /// Links from the face list.
    Assemble,
    /// The unit normal of every face.
    FaceNormals,
    /// Every vertex to the mean of its neighbours, once.
    Smooth,
    /// Faces joined through shared edges.
    Components,
}

/// Which bare arrays a work runs on.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Layout {
    /// Those it is fastest on: the yardstick.
    Best,
    /// The triangle kernel's: end vertex and turn of every side.
    Turns,
    /// The half-edge kernel's: all links explicit.
    HalfEdges,
}

impl Work {
    /// All works, in the order they are measured in.
    pub const ALL: [Self; 4] = [Self::Assemble, Self::FaceNormals, Self::Smooth, Self::Components];

    /// The name in words, flags and keys.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Self::Assemble => "assemble",
            Self::FaceNormals => "face-normals",
            Self::Smooth => "smooth",
            Self::Components => "components",
        }
    }

    /// What its elements are.
    #[must_use]
    pub const fn element(self) -> &'static str {
        match self {
            Self::Smooth => "vertex",
            Self::Assemble | Self::FaceNormals | Self::Components => "face",
        }
    }

    /// How many elements it has on a mesh.
    #[must_use]
    pub fn elements(self, subject: &Subject) -> usize {
        match self {
            Self::Smooth => subject.points().len(),
            Self::Assemble | Self::FaceNormals | Self::Components => subject.face_count(),
        }
    }

    /// The work on a mesh that a kernel holds.
    #[must_use]
    pub fn on_kernel<'a, K: Assemble>(
        self,
        mesh: &'a Brep<K, f64>,
        subject: &'a Subject,
    ) -> Box<dyn Job + 'a> {
        match self {
            Self::Assemble => assemble::job::<K>(subject),
            Self::FaceNormals => face_normals::job(mesh),
            Self::Smooth => smooth::job(mesh, subject),
            Self::Components => components::job(mesh),
        }
    }

    /// The work on bare arrays; `None` where it cannot be done on that layout.
    ///
    /// # Errors
    /// [`TrialError`] where the arrays cannot hold the mesh.
    pub fn on_bare(
        self,
        subject: &Subject,
        layout: Layout,
    ) -> Result<Option<Box<dyn Job + '_>>, TrialError> {
        match self {
            Self::Assemble => assemble::bare(subject, layout),
            Self::FaceNormals => Ok(face_normals::bare(subject, layout)),
            Self::Smooth => smooth::bare(subject, layout),
            Self::Components => components::bare(subject, layout),
        }
    }
}

impl fmt::Display for Work {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.pad(self.name())
    }
}

/// What an array of this name holds on the heap.
fn array<T>(name: &'static str, array: &[T]) -> merestone::topology::ArrayBytes {
    merestone::topology::ArrayBytes { name, bytes: size_of_val(array), retired: 0 }
}
