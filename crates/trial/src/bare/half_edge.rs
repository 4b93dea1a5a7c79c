//! Assembling half-edges with all links explicit, for faces of any number of corners.
//!
//! The design is that of [`super::assemble::start`]: corners bucketed by vertex, all links of the
//! edges at a vertex decided there.

use super::assemble::{EdgeCounts, NONE, NOT_PLAIN, resize_stale};

/// Vertices with more corners than this are matched by sorting.
const LARGEST_MATCHED: usize = 16;

/// Places in the table of neighbours.
const TABLE: usize = 1024;

/// Half-edges with full links. A half-edge is one use of an edge; half-edge h starts at corner h.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct HalfEdges {
    /// The half-edge after each in its loop.
    pub next: Vec<u32>,
    /// The half-edge before each in its loop.
    pub prev: Vec<u32>,
    /// The vertex each starts at.
    pub start: Vec<u32>,
    /// The face each belongs to.
    pub face: Vec<u32>,
    /// The next greater use of the same edge, after the greatest the smallest; with the bit
    /// [`NOT_PLAIN`] unless the edge has exactly two uses that run opposite ways.
    pub radial: Vec<u32>,
    /// The edge each is a use of; edges are numbered by their first uses.
    pub edge: Vec<u32>,
    /// The smallest use of each edge.
    pub edge_first: Vec<u32>,
    /// The first half-edge of each face, or [`NONE`] for a face without corners.
    pub face_first: Vec<u32>,
    /// One half-edge that leaves each vertex, or [`NONE`]: the greatest of those behind an edge
    /// that is not plain, else the greatest.
    pub outgoing: Vec<u32>,
    /// How many edges are not plain.
    pub counts: EdgeCounts,
}

/// Why loops could not be assembled.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum LoopError {
    /// A face names a vertex that does not exist.
    #[error("face {face} names a vertex beyond the {vertices} there are: check its index")]
    Vertex {
        /// The face's number.
        face: usize,
        /// How many vertices there are.
        vertices: usize,
    },
    /// A face names a vertex twice running.
    #[error("face {face} names a vertex twice running: merge equal neighbours first")]
    Repeated {
        /// The face's number.
        face: usize,
    },
    /// The ends of the faces do not run through the corners in order.
    #[error("face {face} ends before it starts or beyond the corners: check the offsets")]
    Ends {
        /// The face's number; the number of faces where the last one ends too early.
        face: usize,
    },
    /// More corners or vertices than 31 bits number.
    #[error(
        "{corners} corners on {vertices} vertices: half-edges have 31-bit numbers, split the mesh"
    )]
    TooLarge {
        /// How many corners were given.
        corners: usize,
        /// How many vertices were given.
        vertices: usize,
    },
}

/// A corner as its bucket holds it.
#[derive(Clone, Copy, Debug, Default)]
struct Corner {
    from: u32,
    to: u32,
    half_edge: u32,
    prev: u32,
}

/// Reusable scratch memory of [`assemble`].
#[derive(Clone, Debug, Default)]
pub struct Scratch {
    ends: Vec<u32>,
    corners: Vec<Corner>,
    uses: Vec<Use>,
}

/// One use of an edge at the vertex in hand; `behind` leaves the vertex after it.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
struct Use {
    neighbour: u32,
    half_edge: u32,
    leaves: bool,
    behind: u32,
}

/// Links the half-edges of faces given as offsets + vertices.
///
/// Everything in `out` is replaced; its arrays and the scratch memory are reused. O(corners), and
/// O(n log n) at a vertex of n > 16 corners. After an error `out` is unspecified.
///
/// # Errors
/// When a corner names a vertex that is not there, a loop names one twice running (so a loop of one
/// corner is refused), the ends are not in order, or numbers exceed 31 bits.
pub fn assemble(
    corners: &[u32],
    face_ends: &[u32],
    vertices: usize,
    scratch: &mut Scratch,
    out: &mut HalfEdges,
) -> Result<(), LoopError> {
    if corners.len() >= NOT_PLAIN as usize || vertices >= NOT_PLAIN as usize {
        return Err(LoopError::TooLarge { corners: corners.len(), vertices });
    }
    if face_ends.last().map_or(0, |&end| end as usize) != corners.len() {
        return Err(LoopError::Ends { face: face_ends.len() });
    }
    for array in [
        &mut out.next,
        &mut out.prev,
        &mut out.start,
        &mut out.face,
        &mut out.radial,
        &mut out.edge,
    ] {
        resize_stale(array, corners.len());
    }
    let Scratch { ends, corners: buckets, uses } = scratch;
    link_loops(corners, face_ends, vertices, ends, out)?;
    let mut total = 0;
    for end in ends.iter_mut() {
        total += *end;
        *end = total;
    }
    if buckets.len() < corners.len() {
        buckets.resize(corners.len(), Corner::default());
    }
    let filled = &mut ends[1..];
    let mut first = 0;
    for &end in face_ends {
        let face = &corners[first..end as usize];
        let (mut from, mut prev) = (face.last().copied().unwrap_or(0), end.wrapping_sub(1));
        for (k, &v) in face.iter().enumerate() {
            let half_edge = (first + k) as u32;
            let to = face.get(k + 1).copied().unwrap_or(face[0]);
            let place = &mut filled[v as usize];
            buckets[*place as usize] = Corner { from, to, half_edge, prev };
            *place += 1;
            (from, prev) = (v, half_edge);
        }
        first = end as usize;
    }
    out.counts = EdgeCounts::default();
    out.outgoing.clear();
    out.outgoing.reserve_exact(vertices);
    let mut table = Box::new([0; TABLE]);
    let mut start = 0;
    for (v, &end) in ends[1..=vertices].iter().enumerate() {
        let corners = &buckets[start..end as usize];
        start = end as usize;
        let handle = match_vertex(corners, &mut out.radial, &mut table).unwrap_or_else(|| {
            sort_vertex(v as u32, corners, uses, &mut out.radial, &mut out.counts)
        });
        out.outgoing.push(handle);
    }
    number_edges(out);
    Ok(())
}

/// Writes what the loops alone decide, and counts the corners of each vertex into `ends[v + 2]`.
fn link_loops(
    corners: &[u32],
    face_ends: &[u32],
    vertices: usize,
    ends: &mut Vec<u32>,
    out: &mut HalfEdges,
) -> Result<(), LoopError> {
    ends.clear();
    ends.resize(vertices + 2, 0);
    let counters = &mut ends[2..];
    out.start.copy_from_slice(corners);
    out.face_first.clear();
    out.face_first.reserve_exact(face_ends.len());
    let mut first = 0;
    for (f, &end) in face_ends.iter().enumerate() {
        let range = first as usize..end as usize;
        let Some(face) = corners.get(range.clone()) else {
            return Err(LoopError::Ends { face: f });
        };
        let Some(&before) = face.last() else {
            out.face_first.push(NONE);
            continue;
        };
        out.face_first.push(first);
        out.face[range.clone()].fill(f as u32);
        let (next, prev) = (&mut out.next[range.clone()], &mut out.prev[range]);
        let mut before = before;
        for (((&v, next), prev), h) in
            face.iter().zip(next.iter_mut()).zip(prev.iter_mut()).zip(first..)
        {
            if v == before {
                return Err(LoopError::Repeated { face: f });
            }
            let Some(counter) = counters.get_mut(v as usize) else {
                return Err(LoopError::Vertex { face: f, vertices });
            };
            *counter += 1;
            *next = h + 1;
            *prev = h.wrapping_sub(1);
            before = v;
        }
        if let (Some(next), Some(prev)) = (next.last_mut(), prev.first_mut()) {
            *next = first;
            *prev = end - 1;
        }
        first = end;
    }
    Ok(())
}

/// Links the corners around a vertex all of whose edges are plain; `None` for the sorting way.
#[inline]
fn match_vertex(corners: &[Corner], radial: &mut [u32], table: &mut [u64; TABLE]) -> Option<u32> {
    if corners.len() > LARGEST_MATCHED {
        return None;
    }
    let mut taken = 0;
    for corner in corners {
        let place = &mut table[corner.from as usize % TABLE];
        taken |= *place;
        *place = (u64::from(corner.from) + 1) << 32 | u64::from(corner.prev);
    }
    let mut fine = taken == 0;
    let mut last = NONE;
    for corner in corners {
        let place = &mut table[corner.to as usize % TABLE];
        fine &= *place >> 32 == u64::from(corner.to) + 1;
        radial[corner.half_edge as usize] = *place as u32;
        *place = 0;
        last = corner.half_edge;
    }
    if fine {
        return Some(last);
    }
    for corner in corners {
        table[corner.from as usize % TABLE] = 0;
    }
    None
}

/// Links the corners around any vertex, by sorting the uses of its edges.
#[cold]
fn sort_vertex(
    v: u32,
    corners: &[Corner],
    uses: &mut Vec<Use>,
    radial: &mut [u32],
    counts: &mut EdgeCounts,
) -> u32 {
    uses.clear();
    let Some(last) = corners.last() else { return NONE };
    for &Corner { from, to, half_edge, prev } in corners {
        uses.push(Use { neighbour: to, half_edge, leaves: true, behind: NONE });
        uses.push(Use { neighbour: from, half_edge: prev, leaves: false, behind: half_edge });
    }
    uses.sort_unstable();
    let mut handle = None;
    for edge in uses.chunk_by(|x, y| x.neighbour == y.neighbour) {
        let leaving = edge.iter().filter(|u| u.leaves).count();
        let plain = edge.len() == 2 && leaving == 1;
        match edge.len() {
            1 => counts.boundary += leaving,
            2 => counts.misoriented += leaving / 2,
            _ => counts.non_manifold += usize::from(v < edge[0].neighbour),
        }
        let bit = if plain { 0 } else { NOT_PLAIN };
        for (k, u) in edge.iter().enumerate() {
            if u.leaves {
                radial[u.half_edge as usize] = edge[(k + 1) % edge.len()].half_edge | bit;
            } else if !plain {
                handle = handle.max(Some(u.behind));
            }
        }
    }
    handle.unwrap_or(last.half_edge)
}

/// Numbers the edges by their first uses: uses ascend around an edge, so each hands on its number.
fn number_edges(out: &mut HalfEdges) {
    out.edge.fill(NONE);
    out.edge_first.clear();
    out.edge_first.reserve(out.radial.len().div_ceil(2));
    for (h, &radial) in out.radial.iter().enumerate() {
        let mut edge = out.edge[h];
        if edge == NONE {
            edge = out.edge_first.len() as u32;
            out.edge_first.push(h as u32);
            out.edge[h] = edge;
        }
        out.edge[(radial & !NOT_PLAIN) as usize] = edge;
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::bare::assemble::{self, previous_side};
    use crate::shapes::{bipyramid, fan, icosphere, quad_torus, soup};

    fn build(corners: &[u32], face_ends: &[u32], vertices: usize) -> Result<HalfEdges, LoopError> {
        let mut out = HalfEdges::default();
        assemble(corners, face_ends, vertices, &mut Scratch::default(), &mut out)?;
        Ok(out)
    }

    #[test]
    fn two_quads_and_a_triangle_by_hand() {
        // 0 1 2 3 | 1 4 2 | 3 2 5 6: edges 1-2 and 2-3 are plain, the other seven boundary.
        let mesh = build(&[0, 1, 2, 3, 1, 4, 2, 3, 2, 5, 6], &[4, 7, 11], 8).unwrap();
        assert_eq!(mesh.next, [1, 2, 3, 0, 5, 6, 4, 8, 9, 10, 7]);
        assert_eq!(mesh.prev, [3, 0, 1, 2, 6, 4, 5, 10, 7, 8, 9]);
        assert_eq!(mesh.face, [0, 0, 0, 0, 1, 1, 1, 2, 2, 2, 2]);
        let free = |h: u32| h | NOT_PLAIN;
        let radial = [free(0), 6, 7, free(3), free(4), free(5), 1, 2, free(8), free(9), free(10)];
        assert_eq!(mesh.radial, radial);
        assert_eq!(mesh.edge, [0, 1, 2, 3, 4, 5, 1, 2, 6, 7, 8]);
        assert_eq!(mesh.edge_first, [0, 1, 2, 3, 4, 5, 8, 9, 10]);
        assert_eq!(mesh.face_first, [0, 4, 7]);
        // Handles lie behind the boundary edge that comes in; nothing uses vertex 7.
        assert_eq!(mesh.outgoing, [0, 1, 6, 7, 5, 9, 10, NONE]);
        assert_eq!(mesh.counts, EdgeCounts { boundary: 7, ..EdgeCounts::default() });
    }

    #[test]
    fn triangles_link_as_the_triangle_assembler_links_them() {
        for seed in 0..40 {
            let mesh = match seed {
                0 => icosphere(3).shuffled(1),
                1 => bipyramid(50),
                2 => fan(40),
                _ => soup(4 + seed as u32, 30, seed),
            };
            let vertices = mesh.points.len();
            let loops = mesh.to_loops();
            let half = build(&loops.corners, &loops.face_ends, vertices).unwrap();
            let mut links = assemble::Adjacency::default();
            assemble::assemble(&mesh.triangles, vertices, &mut Default::default(), &mut links)
                .unwrap();
            let radial: Vec<u32> = links
                .turn
                .iter()
                .map(|turn| previous_side(turn & !NOT_PLAIN) | (turn & NOT_PLAIN))
                .collect();
            assert_eq!(half.radial, radial);
            assert_eq!((half.outgoing, half.counts), (links.outgoing, links.counts));
        }
    }

    #[test]
    fn torus_of_quads_has_euler_characteristic_0() {
        let torus = quad_torus(7, 9).shuffled(5);
        let half = build(&torus.corners, &torus.face_ends, torus.points.len()).unwrap();
        assert!(half.counts.all_plain());
        assert_eq!(torus.points.len() + torus.face_ends.len(), half.edge_first.len());
        for (h, &edge) in half.edge.iter().enumerate() {
            let radial = half.radial[h] as usize;
            assert_eq!(half.edge[radial], edge);
            assert_eq!(half.start[half.next[radial] as usize], half.start[h]);
            assert_eq!(half.edge_first[edge as usize] as usize, h.min(radial));
        }
    }

    #[test]
    fn loops_that_are_none_are_refused() {
        assert_eq!(build(&[0, 1, 1], &[3], 2), Err(LoopError::Repeated { face: 0 }));
        assert_eq!(build(&[0], &[1], 2), Err(LoopError::Repeated { face: 0 }));
        assert_eq!(build(&[0, 1, 2], &[3], 2), Err(LoopError::Vertex { face: 0, vertices: 2 }));
        assert_eq!(build(&[0, 1, 2], &[2], 3), Err(LoopError::Ends { face: 1 }));
        assert_eq!(build(&[0, 1, 2], &[4, 3], 3), Err(LoopError::Ends { face: 0 }));
        assert_eq!(build(&[0, 1, 2], &[2, 1, 3], 3), Err(LoopError::Ends { face: 1 }));
    }

    #[test]
    fn faces_without_corners_and_with_two_are_held() {
        let mesh = build(&[0, 1], &[0, 2, 2], 2).unwrap();
        assert_eq!(mesh.radial, [1, 0]);
        assert_eq!(mesh.face_first, [NONE, 0, NONE]);
        assert_eq!(mesh.face, [1, 1]);
    }
}
