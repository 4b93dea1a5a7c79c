//! The topology contract of merestone.
#![forbid(unsafe_code)]

mod column;
#[cfg(feature = "conformance")]
pub mod conformance;
mod contract;
mod face_list;
pub mod floods;
mod id;
pub mod relations;
pub mod views;
pub mod walks;

pub use column::{Column, Correspondence};
pub use contract::{
    ArrayBytes, Assemble, AssembleError, Compaction, Cost, Costs, EdgeKind, EditError, FaceBound,
    Footprint, RemovedFace, Topology, TopologyExt,
};
pub use face_list::{EdgeUse, FaceList, FaceListBuf, FaceListError, ListedLoop, ListedLoops};
pub use id::{EdgeId, FaceId, Id, IdError, MAX_DENSE_INDEX, OrientedEdgeId, VertexId};
