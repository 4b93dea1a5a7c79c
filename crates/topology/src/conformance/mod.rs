//! The reference topology and the suite that holds every kernel to the contract.
//!
//! Behind the feature `conformance`. [`Reference`] keeps lists in maps and answers by definition;
//! the suite assembles the same face lists in a kernel and in it, takes the same steps, removes
//! the same faces, and compares place by place: vertices and faces have their index on every
//! kernel, an oriented edge is known by its face, bound and position in the loop, an edge by its
//! uses.
//!
//! A kernel joins with one line in its own tests:
//!
//! ```
//! use merestone_topology::conformance::{Capabilities, Reference};
//! merestone_topology::conformance_suite!(
//!     reference,
//!     Reference,
//!     Capabilities::everything("reference")
//! );
//! ```
//!
//! Every part of the suite is a plain function as well, so that a failing case can be run alone:
//! [`check_complex`] with the complex and seed that the [`Failure`] names.

mod complex;
mod definitions;
mod failure;
mod macros;
mod named;
#[cfg(test)]
mod planted;
mod random;
mod reference;
mod suite;

pub use complex::{Complex, Ring};
pub use failure::{Capabilities, Departure, Failure};
pub use named::{named_complexes, tiny_degenerate_lists, tiny_triangle_lists};
pub use random::{Random, case_count, random_complex, random_complexes};
pub use reference::Reference;
pub use suite::{
    Paired, Ran, check_bounds, check_complex, check_corpus, check_counts, check_edges,
    check_everything, check_fast_ways, check_footprint, check_iterators, check_malformed_lists,
    check_overtaken_walks, check_relations, check_sectors, check_steps, check_walks,
};

#[cfg(test)]
mod tests {
    use super::*;

    crate::conformance_suite!(suite_on_reference, Reference, Capabilities::everything("reference"));
}
