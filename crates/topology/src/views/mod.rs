//! Views that prove what they say.
//!
//! A [`Manifold`] is to be had only by a check that passed, and so are [`OrientedManifold`] and
//! [`SolidBoundary`]. Each dereferences to the one before and is itself a
//! [`Topology`](crate::Topology), so that a function can ask for the property in its signature.
//! A check that fails lists every [`Defect`] with its place.
//!
//! ```
//! use merestone_topology::{Topology, views::SolidBoundary};
//! fn volume_is_meant<K: Topology>(_: &SolidBoundary<'_, K>) -> bool {
//!     true // nothing left to check
//! }
//! ```

mod defects;
mod proofs;

pub use defects::{Defect, Defects, DefectsOf};
pub use proofs::{Manifold, OrientedManifold, SolidBoundary};
