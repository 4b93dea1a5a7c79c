//! The kernels that can be tried: one list.

use crate::Subject;
use crate::measure::Job;
use crate::works::Work;
use merestone::geometry::{Brep, BuildError};
use merestone::kernels::{HalfEdge, TriangleAdjacency};
use merestone::topology::floods::Survey;
use merestone::topology::{Assemble, Footprint};
use std::fmt;

/// The name of the yardstick among the kernels.
pub const BARE: &str = "bare";

/// Every kernel. Another one is one more line.
pub const KERNELS: &[Kernel] =
    &[Kernel::of::<TriangleAdjacency>("triangle"), Kernel::of::<HalfEdge>("half-edge")];

/// Names of kernels that there will be.
pub(crate) const PLANNED: &[&str] = &["half-edge-lean", "incidence", "incidence-lean"];

/// A kernel to be tried, under its name.
#[derive(Clone, Copy)]
pub struct Kernel {
    name: &'static str,
    hold: fn(&Subject) -> Result<Box<dyn OnKernel>, BuildError>,
}

/// A mesh that some kernel holds.
pub trait OnKernel {
    /// What the kernel holds on the heap, points not counted.
    fn footprint(&self) -> Footprint;

    /// All counts of the mesh. O(corners).
    fn survey(&self) -> Survey;

    /// A work on it, ready to be timed.
    fn job<'a>(&'a self, work: Work, subject: &'a Subject) -> Box<dyn Job + 'a>;
}

impl Kernel {
    /// A kernel under a name of the caller's.
    #[must_use]
    pub const fn of<K: Assemble + 'static>(name: &'static str) -> Self {
        Self { name, hold: |subject| Ok(Box::new(subject.on_kernel::<K>()?)) }
    }

    /// A kernel that is filled in a way of the caller's.
    #[must_use]
    pub const fn with(
        name: &'static str,
        hold: fn(&Subject) -> Result<Box<dyn OnKernel>, BuildError>,
    ) -> Self {
        Self { name, hold }
    }

    /// Its name.
    #[must_use]
    pub fn name(&self) -> &'static str {
        self.name
    }

    /// Puts a mesh on it. O(corners) expected.
    ///
    /// # Errors
    /// [`BuildError`] where the kernel cannot hold a face.
    pub fn hold(&self, subject: &Subject) -> Result<Box<dyn OnKernel>, BuildError> {
        (self.hold)(subject)
    }
}

impl fmt::Debug for Kernel {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.debug_tuple("Kernel").field(&self.name).finish()
    }
}

impl<K: Assemble> OnKernel for Brep<K, f64> {
    fn footprint(&self) -> Footprint {
        self.topology().footprint()
    }

    fn survey(&self) -> Survey {
        Survey::of(self.topology())
    }

    fn job<'a>(&'a self, work: Work, subject: &'a Subject) -> Box<dyn Job + 'a> {
        work.on_kernel(self, subject)
    }
}
