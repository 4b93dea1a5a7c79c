//! What a kernel's costlier steps cost.

/// How a step's cost grows.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Cost {
    /// Constant.
    Constant,
    /// The number of corners of the loop.
    Loop,
    /// The number of uses of the edge.
    Uses,
}

/// What the three steps cost that a lean kernel may have to search for; all others are constant.
///
/// Walks choose their route by these constants at compile time.
///
/// ```
/// use merestone_topology::{Cost, Costs};
/// const FULL: Costs = Costs::CONSTANT;
/// assert_eq!(FULL.prev, Cost::Constant);
/// ```
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Costs {
    /// Of [`prev`](crate::Topology::prev).
    pub prev: Cost,
    /// Of [`face`](crate::Topology::face).
    pub face: Cost,
    /// Of [`edge`](crate::Topology::edge).
    pub edge: Cost,
}

impl Costs {
    /// Every step is constant.
    pub const CONSTANT: Self =
        Self { prev: Cost::Constant, face: Cost::Constant, edge: Cost::Constant };
}
