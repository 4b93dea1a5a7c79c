//! The contract between kernels and everything above them.
//!
//! | trait | for whom | what |
//! |---|---|---|
//! | [`Topology`] | kernel writers | cells, counts and O(1) steps between them |
//! | [`TopologyExt`] | users | every relation, walk and query; blanket, so nobody can override it |
//! | [`Assemble`] | kernel writers | building from a face list, removing faces, compacting |
//!
//! Two more sisters have their place here and come with the operators that need them:
//! `TriangleEdits` (flip, split, collapse) and `Rewire` (the primitives under Euler operators).

mod assemble;
mod cost;
mod error;
mod ext;
mod footprint;
mod topology;

pub use assemble::{Assemble, Compaction, RemovedFace};
pub use cost::{Cost, Costs};
pub use error::{AssembleError, EditError};
pub use ext::{EdgeKind, TopologyExt};
pub use footprint::{ArrayBytes, Footprint};
pub use topology::{FaceBound, Topology};
