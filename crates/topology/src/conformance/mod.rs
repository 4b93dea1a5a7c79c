//! The reference topology and the suite that holds every kernel to the contract.
//!
//! Behind the feature `conformance`.

mod definitions;
mod reference;

pub use reference::Reference;
