//! What can be wrong with a face list.

use crate::id::MAX_DENSE_INDEX;

/// A face list that no topology can be assembled from.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum FaceListError {
    /// A corner names a vertex that does not exist.
    #[error(
        "corner {corner} names vertex {vertex}, but there are {vertex_count} vertices; give more vertices or mend the index"
    )]
    VertexOutOfRange {
        /// The corner's number in the list.
        corner: usize,
        /// The vertex number it holds.
        vertex: u32,
        /// How many vertices the list has.
        vertex_count: usize,
    },
    /// More corners or vertices than dense ids can number.
    #[error("{count} {what} are more than the {max} that can be numbered; split the mesh", max = MAX_DENSE_INDEX + 1)]
    TooMany {
        /// What was counted.
        what: &'static str,
        /// How many there are.
        count: usize,
    },
    /// A run of ends that does not ascend, or leaves a loop or face empty.
    #[error(
        "{what} {index} ends at {end}, no further than it starts ({start}); every {what} needs at least one member"
    )]
    Empty {
        /// `"loop"` or `"face"`.
        what: &'static str,
        /// Its number.
        index: usize,
        /// Where it starts.
        start: usize,
        /// Where it is said to end.
        end: usize,
    },
    /// The last run does not end where the members do.
    #[error(
        "the {what} ends stop at {end}, but there are {count} members; the last end must equal the count"
    )]
    Uncovered {
        /// `"loop"` or `"face"`.
        what: &'static str,
        /// The last end given, 0 without one.
        end: usize,
        /// How many members there are.
        count: usize,
    },
    /// The number of edge uses is not the number of corners.
    #[error("{uses} edge uses for {corners} corners; give one a corner")]
    EdgeUses {
        /// Edge uses given.
        uses: usize,
        /// Corners in the list.
        corners: usize,
    },
    /// An edge number that no use mentions, or one whose uses join different vertices.
    #[error(
        "edge {edge} has no use, or its use at corner {corner} joins other vertices than its first; number edges without gaps and by their end vertices"
    )]
    InconsistentEdge {
        /// The edge's number.
        edge: u32,
        /// The corner at fault.
        corner: usize,
    },
}

pub(super) fn check_ends(
    what: &'static str,
    ends: &[u32],
    count: usize,
) -> Result<(), FaceListError> {
    let mut start = 0;
    for (index, &end) in ends.iter().enumerate() {
        let end = end as usize;
        if end <= start {
            return Err(FaceListError::Empty { what, index, start, end });
        }
        start = end;
    }
    if start != count {
        return Err(FaceListError::Uncovered { what, end: start, count });
    }
    Ok(())
}

pub(super) fn check_numbers(vertex_count: usize, corners: &[u32]) -> Result<(), FaceListError> {
    for (what, count) in [("vertices", vertex_count), ("corners", corners.len())] {
        if count > MAX_DENSE_INDEX + 1 {
            return Err(FaceListError::TooMany { what, count });
        }
    }
    // A plain maximum is a vector instruction; the place is looked for only when it is needed.
    let largest = corners.iter().copied().max();
    if largest.is_none_or(|vertex| (vertex as usize) < vertex_count) {
        return Ok(());
    }
    let corner = corners.iter().position(|&v| v as usize >= vertex_count).unwrap_or(0);
    Err(FaceListError::VertexOutOfRange { corner, vertex: corners[corner], vertex_count })
}
