//! The topology contract of merestone.
#![forbid(unsafe_code)]

mod face_list;
mod id;

pub use face_list::{EdgeUse, FaceList, FaceListBuf, FaceListError, ListedLoop, ListedLoops};
pub use id::{EdgeId, FaceId, Id, IdError, MAX_DENSE_INDEX, OrientedEdgeId, VertexId};
