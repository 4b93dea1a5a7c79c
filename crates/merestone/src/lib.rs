//! Boundary representations on interchangeable mesh kernels behind one topology trait.
#![forbid(unsafe_code)]

pub use merestone_exchange as exchange;
pub use merestone_geometry as geometry;
pub use merestone_kernels as kernels;
pub use merestone_topology as topology;

/// What most programs need, in one line.
pub mod prelude {
    pub use merestone_geometry::{Brep, Mesh, Scalar, TriangleMesh};
    pub use merestone_kernels::{HalfEdge, TriangleAdjacency};
    pub use merestone_topology::floods::Survey;
    pub use merestone_topology::views::{Manifold, OrientedManifold, SolidBoundary};
    pub use merestone_topology::{
        Assemble, Column, EdgeKind, FaceBound, FaceList, FaceListBuf, Id, Topology, TopologyExt,
    };
}
