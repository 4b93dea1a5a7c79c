//! The nine adjacency relations between vertices, edges and faces.
//!
//! | from \ to | vertex | edge | face |
//! |---|---|---|---|
//! | **vertex** | [`vertex_vertices`] | [`vertex_edges`] | [`vertex_faces`] |
//! | **edge** | [`edge_vertices`] | [`edge_edges`] | [`edge_faces`] |
//! | **face** | [`face_vertices`] | [`face_edges`] | [`face_faces`] |
//!
//! Each lists **one item per incidence**, in the order its method states: a face with three
//! corners at a vertex is listed three times. [`distinct`] drops repeats from any of them.
//!
//! Source of the nine: L. De Floriani, A. Hui, *Data structures for simplicial complexes: an
//! analysis and a comparison*, Eurographics Symposium on Geometry Processing 2005 (from memory).
//!
//! [`vertex_vertices`]: crate::TopologyExt::vertex_vertices
//! [`vertex_edges`]: crate::TopologyExt::vertex_edges
//! [`vertex_faces`]: crate::TopologyExt::vertex_faces
//! [`edge_vertices`]: crate::TopologyExt::edge_vertices
//! [`edge_edges`]: crate::TopologyExt::edge_edges
//! [`edge_faces`]: crate::TopologyExt::edge_faces
//! [`face_vertices`]: crate::TopologyExt::face_vertices
//! [`face_edges`]: crate::TopologyExt::face_edges
//! [`face_faces`]: crate::TopologyExt::face_faces

mod distinct;
mod edge;
mod face;
mod vertex;

pub use distinct::{Distinct, distinct};
pub(crate) use edge::ends_of as edge_ends_of;
pub use edge::{EdgeEdgesState, EdgeFacesState};
pub use face::{FaceEdgesState, FaceFacesState, FaceVerticesState};
pub use vertex::{EdgeEndsState, VertexEdgesState, VertexFacesState, VertexVerticesState};

/// A relation that is another walk with each item turned into one other.
macro_rules! mapped_walk {
    ($(#[$doc:meta])* $name:ident<$($p:ident),+>($inner:ty), $item:ident, |$mesh:ident, $from:ident| $map:expr) => {
        $(#[$doc])*
        #[derive(Clone, Debug, PartialEq, Eq)]
        pub struct $name<$($p),+>(pub(crate) $inner);

        impl<K: Topology + ?Sized> WalkState<K> for mapped_walk!(@on $name K $($p)+) {
            type Item = K::$item;

            #[inline]
            fn advance(&mut self, $mesh: &K) -> Option<K::$item> {
                WalkState::<K>::advance(&mut self.0, $mesh).map(|$from| $map)
            }

            #[inline]
            fn fold<B>(self, $mesh: &K, init: B, mut f: impl FnMut(B, K::$item) -> B) -> B {
                WalkState::<K>::fold(self.0, $mesh, init, move |b, $from| f(b, $map))
            }

            fn lives(&self, mesh: &K) -> bool {
                WalkState::<K>::lives(&self.0, mesh)
            }

            fn spend(&mut self, mesh: &K) -> bool {
                WalkState::<K>::spend(&mut self.0, mesh)
            }
        }
    };
    (@on $name:ident $k:ident H) => { $name<$k::OrientedEdge> };
    (@on $name:ident $k:ident F H) => { $name<$k::Face, $k::OrientedEdge> };
}
pub(crate) use mapped_walk;
