//! The best hand-written arrays for each work: the yardstick `bare`.
//!
//! Nothing here knows the kernels or their trait. Each file does one work in the plainest data
//! that serves it, as fast as safe code goes; the trial compares every kernel's results with these
//! value by value, and its times with these as a ratio. [`floor`] streams the same bytes and does
//! nothing else, [`hash_map`] is the way most programs are written.

pub mod assemble;
pub mod components;
pub mod faces;
pub mod floor;
pub mod half_edge;
pub mod hash_map;
pub mod smooth;
