//! What a kernel can do, and how it failed to.

/// Which complexes a kernel holds; a case beyond them must be refused as
/// [`CannotHold`](crate::AssembleError::CannotHold).
///
/// ```
/// use merestone_topology::conformance::Capabilities;
/// const TRIANGLES: Capabilities = Capabilities::triangles("triangle");
/// assert!(TRIANGLES.self_edges && !TRIANGLES.polygons);
/// ```
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Capabilities {
    /// The kernel's name, as its refusals give it.
    pub kernel: &'static str,
    /// Loops of any number of corners, one and two included; else of three only.
    pub polygons: bool,
    /// Inner loops and vertex loops.
    pub holes: bool,
    /// Faces that run from a vertex to itself.
    pub self_edges: bool,
    /// Edges as the list numbers them; else one for each pair of vertices, numbers or not.
    pub edge_numbers: bool,
}

impl Capabilities {
    /// Every complex.
    #[must_use]
    pub const fn everything(kernel: &'static str) -> Self {
        Self { kernel, polygons: true, holes: true, self_edges: true, edge_numbers: true }
    }

    /// Triangles only, one edge for each pair of vertices.
    #[must_use]
    pub const fn triangles(kernel: &'static str) -> Self {
        Self { kernel, polygons: false, holes: false, self_edges: true, edge_numbers: false }
    }
}

/// Where a kernel departs from the contract: a [`Departure`], boxed so that success stays small.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[error(transparent)]
pub struct Failure(Box<Departure>);

impl From<Departure> for Failure {
    fn from(departure: Departure) -> Self {
        Self(Box::new(departure))
    }
}

impl std::ops::Deref for Failure {
    type Target = Departure;

    fn deref(&self) -> &Departure {
        &self.0
    }
}

/// What a kernel did, where, and what it should have done.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[error("{kernel}, case \"{case}\", {step}: {what} at {place}: expected {expected}, found {found}")]
pub struct Departure {
    /// The kernel's name.
    pub kernel: &'static str,
    /// The complex's name; for random ones it holds the seed.
    pub case: String,
    /// What was done before, from assembling on.
    pub step: String,
    /// The method or promise that is broken.
    pub what: &'static str,
    /// The cells concerned, by the reference's ids.
    pub place: String,
    /// What the definitions give.
    pub expected: String,
    /// What the kernel gave.
    pub found: String,
}
