//! Floods: walks over whole meshes, and what they find.
//!
//! Each owns its workspace, to be used again without allocating: [`FaceFlood`] goes over faces
//! breadth first, [`Components`] labels what hangs together, [`Orientation`] says which faces
//! would have to be turned around, [`fan_count`] and [`boundary_loop_count`] look at vertices and
//! boundaries, and [`Survey`] counts all of it at once.

mod boundary;
mod breadth_first;
mod components;
mod fans;
mod orientation;
mod survey;
mod union_find;

pub use boundary::boundary_loop_count;
pub use breadth_first::{FaceFlood, Flooded};
pub use components::Components;
pub use fans::fan_count;
pub use orientation::Orientation;
pub use survey::{Survey, is_balanced};

pub(crate) use union_find::UnionFind;
