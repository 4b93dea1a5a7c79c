//! Coordinates on a topology: embedding, normals, measuring, and polygon soup.
#![forbid(unsafe_code)]

mod brep;
mod measures;
mod report;
mod scalar;
mod soup;
mod sums;

pub use brep::{Brep, BuildError, Mesh, NotATriangle, Polygons, TriangleMesh, Triangles};
pub use report::{DefectCell, DefectKind, MeshDefect, MeshReport, ReportOptions};
pub use scalar::Scalar;
pub use soup::{
    AttributeColumn, AttributeValues, CleanSoup, CollapsedLoop, DuplicateFace, Note, NoteKind,
    PLANAR_TOLERANCE, PolygonSoup, SoupError, Welder,
};
pub use sums::Sum;
