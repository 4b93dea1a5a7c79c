//! Coordinates on a merestone topology.
#![forbid(unsafe_code)]

mod soup;

pub use soup::{
    AttributeColumn, AttributeValues, CleanSoup, CollapsedLoop, DuplicateFace, Note, NoteKind,
    PLANAR_TOLERANCE, PolygonSoup, SoupError, Welder,
};
