//! Assembling triangle adjacency from an index buffer.
//!
//! Two designs that give the same arrays: [`start`] buckets the corners by vertex and decides
//! everything locally around each vertex; [`lower`] buckets the edges by their lower vertex and
//! looks each side's edge up while filling. [`assemble`] is the faster one, `start`: its loops run
//! without guessing branches, and its memory accesses do not wait for one another, so it wins by a
//! fifth in cache and by two to three times where the faces lie in random order.

pub mod lower;
pub mod start;

/// The bit of a `turn` that says: the side's edge is not plain.
pub const NOT_PLAIN: u32 = 1 << 31;

/// In place of a side: there is none.
pub const NONE: u32 = u32::MAX;

/// Triangle adjacency in two arrays, one entry per side, and one side per vertex.
///
/// Side 3t + i runs from corner i of triangle t to its next corner. The *uses* of an edge are the
/// sides that join its two vertices; `radial(s)` is the next greater use of the edge of side s,
/// and the smallest one after the greatest. An edge is *plain* where it has exactly two uses that
/// run opposite ways.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Adjacency {
    /// The vertex each side ends at: the index buffer, each triangle turned by one.
    pub end: Vec<u32>,
    /// `next(radial(s))` of each side s, with the bit [`NOT_PLAIN`] where its edge is not plain.
    ///
    /// Where the edge is plain this is the next side that leaves the start vertex of s.
    pub turn: Vec<u32>,
    /// One side that leaves each vertex, or [`NONE`].
    ///
    /// The greatest of the sides behind an edge that is not plain (the end of an open sector that
    /// `turn` runs from), else the greatest side.
    pub outgoing: Vec<u32>,
    /// How many edges are not plain.
    pub counts: EdgeCounts,
}

/// How many edges of each kind that is not plain a mesh has.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct EdgeCounts {
    /// Edges with one use.
    pub boundary: usize,
    /// Edges with more than two uses.
    pub non_manifold: usize,
    /// Edges with two uses that run the same way.
    pub misoriented: usize,
}

impl EdgeCounts {
    /// Whether every edge is plain.
    #[must_use]
    pub fn all_plain(&self) -> bool {
        *self == Self::default()
    }
}

/// Why an index buffer could not be assembled.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum AssembleError {
    /// A triangle names a vertex that does not exist.
    #[error("triangle {triangle} names a vertex beyond the {vertices} there are: check its index")]
    Vertex {
        /// The triangle's number.
        triangle: usize,
        /// How many vertices there are.
        vertices: usize,
    },
    /// A triangle names a vertex twice.
    #[error("triangle {triangle} names a vertex twice: remove collapsed triangles first")]
    Repeated {
        /// The triangle's number.
        triangle: usize,
    },
    /// More triangles or vertices than 32-bit sides can number.
    #[error(
        "{triangles} triangles on {vertices} vertices: sides have 31-bit numbers, split the mesh"
    )]
    TooLarge {
        /// How many triangles were given.
        triangles: usize,
        /// How many vertices were given.
        vertices: usize,
    },
}

/// Links the triangles' sides by the fastest design known, [`start`]: see [`Adjacency`].
///
/// Everything in `out` is replaced; its arrays and the scratch memory are reused. O(F), and
/// O(n log n) at a vertex of n > 16 corners. After an error the contents of `out` are unspecified.
///
/// # Errors
/// When a triangle names a vertex that is not there, or one vertex twice, and when there are more
/// sides than 31 bits number.
///
/// ```
/// use merestone_trial::bare::assemble::{Adjacency, assemble, start::Scratch};
///
/// let (mut scratch, mut sheet) = (Scratch::default(), Adjacency::default());
/// assemble(&[[0, 1, 2], [2, 1, 3]], 4, &mut scratch, &mut sheet)?;
/// assert_eq!(sheet.counts.boundary, 4);
/// assert_eq!(sheet.turn[1], 4); // side 1 runs 1 → 2; behind it lies side 3, then side 4
/// # Ok::<(), merestone_trial::bare::assemble::AssembleError>(())
/// ```
pub fn assemble(
    triangles: &[[u32; 3]],
    vertices: usize,
    scratch: &mut start::Scratch,
    out: &mut Adjacency,
) -> Result<(), AssembleError> {
    start::assemble(triangles, vertices, scratch, out)
}

/// The side after `side` in its triangle.
#[inline]
#[must_use]
pub fn next_side(side: u32) -> u32 {
    if side % 3 == 2 { side - 2 } else { side + 1 }
}

/// The side before `side` in its triangle.
#[inline]
#[must_use]
pub fn previous_side(side: u32) -> u32 {
    if side.is_multiple_of(3) { side + 2 } else { side - 1 }
}

/// Checks the sizes and gives the arrays their lengths without touching what will be overwritten.
fn prepare(
    triangles: &[[u32; 3]],
    vertices: usize,
    out: &mut Adjacency,
) -> Result<(), AssembleError> {
    if triangles.len() >= 1 << 29 || vertices >= NOT_PLAIN as usize {
        return Err(AssembleError::TooLarge { triangles: triangles.len(), vertices });
    }
    for array in [&mut out.end, &mut out.turn] {
        resize_stale(array, 3 * triangles.len());
    }
    out.outgoing.clear();
    out.outgoing.reserve_exact(vertices);
    Ok(())
}

/// Gives an array its length; what it holds is stale and must be overwritten.
///
/// Fresh memory comes zeroed from the system, so that only growing in place would touch it twice.
pub(super) fn resize_stale(array: &mut Vec<u32>, length: usize) {
    if array.capacity() < length {
        *array = vec![0; length];
    } else {
        array.resize(length, 0);
    }
}

/// Moves handles to the open end of their sector, after all turns are known.
fn settle_handles(out: &mut Adjacency) {
    if out.counts.all_plain() {
        return;
    }
    // The greatest open end wins, so a vertex that has one must forget its greatest side first.
    for side in 0..out.turn.len() {
        if out.turn[side] & NOT_PLAIN != 0 {
            out.outgoing[out.end[side] as usize] = next_side(side as u32);
        }
    }
    for side in 0..out.turn.len() {
        if out.turn[side] & NOT_PLAIN != 0 {
            let handle = &mut out.outgoing[out.end[side] as usize];
            *handle = (*handle).max(next_side(side as u32));
        }
    }
}

#[cfg(test)]
mod tests;
