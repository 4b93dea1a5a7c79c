//! Trying the kernels against each other, and against bare arrays, on a mesh.
//!
//! [`bare`] is the yardstick: hand-written arrays, one purpose each. [`shapes`] makes the meshes
//! that measurements run on.

#![forbid(unsafe_code)]

pub mod bare;
pub mod shapes;
