//! Boundary representations on interchangeable mesh kernels behind one topology trait.
//!
//! This is the one crate to depend on. It gathers
//!
//! - [`topology`]: the contract, the relations, walks, floods and views;
//! - [`kernels`]: the storages, with a paragraph on when to take which;
//! - [`geometry`]: points on a topology, normals, area, volume, polygon soup;
//! - [`exchange`]: reading files.
//!
//! # First steps
//! ```
//! use merestone::prelude::*;
//!
//! // The foundry's smallest casting: a wedge, 40 × 30 × 20 mm.
//! let points = [
//!     [0.0, 0.0, 0.0], [40.0, 0.0, 0.0], [40.0, 30.0, 0.0],
//!     [0.0, 30.0, 0.0], [0.0, 0.0, 20.0], [0.0, 30.0, 20.0],
//! ];
//! let faces: [&[u32]; 5] =
//!     [&[0, 3, 2, 1], &[0, 1, 4], &[3, 5, 2], &[1, 2, 5, 4], &[0, 4, 5, 3]];
//! let wedge = Mesh::from_polygons(points, faces)?;
//! let solid = wedge.solid_boundary()?; // or every reason why not
//! assert_eq!(solid.euler_characteristic(), 2);
//! assert!((wedge.signed_volume() - 12_000.0).abs() < 1e-9);
//! # Ok::<(), Box<dyn std::error::Error>>(())
//! ```
//!
//! # From a file to a mesh
//! ```no_run
//! use merestone::exchange::{Records, read_path};
//! use merestone::prelude::*;
//!
//! let file = read_path("part.stl", None, Records::WeldedUnlessIndexed)?;
//! let soup = file.soup.clean()?; // collapsed faces counted and dropped, nothing silently
//! let part = Mesh::from_face_list(soup.points().to_vec(), soup.faces())?;
//! println!("{:?}", Survey::of(part.topology()));
//! # Ok::<(), Box<dyn std::error::Error>>(())
//! ```
//!
//! Coordinates have no unit here. A figure used to lift, cast or build must be checked by a
//! licensed person against local codes.
#![forbid(unsafe_code)]

pub use merestone_exchange as exchange;
pub use merestone_geometry as geometry;
pub use merestone_kernels as kernels;
pub use merestone_topology as topology;

/// What most programs need, in one line.
pub mod prelude {
    pub use merestone_geometry::{Brep, Mesh, MeshReport, ReportOptions, Scalar, TriangleMesh};
    pub use merestone_kernels::{HalfEdge, TriangleAdjacency};
    pub use merestone_topology::floods::Survey;
    pub use merestone_topology::views::{Manifold, OrientedManifold, SolidBoundary};
    pub use merestone_topology::{
        Assemble, Column, EdgeKind, FaceBound, FaceList, FaceListBuf, Id, Topology, TopologyExt,
    };
}
