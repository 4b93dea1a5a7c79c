//! Streaming: what the memory alone takes for the bytes that a work must read and write.
//!
//! Every work's figure is best read as a multiple of this floor, measured beside it: machines and
//! their loads differ, the multiple much less.

/// Reads an index buffer and writes arrays of the sizes assembling it writes: 12 bytes a triangle
/// in, 24 bytes a triangle and 4 a vertex out.
///
/// # Panics
/// When `end` has another length than the index buffer.
pub fn assemble(triangles: &[[u32; 3]], end: &mut [u32], turn: &mut [u32], outgoing: &mut [u32]) {
    end.copy_from_slice(triangles.as_flattened());
    turn.fill(1);
    outgoing.fill(2);
}

/// Reads points and an index buffer and writes one vector a triangle: 36 bytes a triangle of a
/// closed mesh in, 24 out. The result depends on all that was read.
pub fn faces(points: &[[f64; 3]], triangles: &[[u32; 3]], normals: &mut [[f64; 3]]) -> f64 {
    let sum = sum_f64(points.as_flattened()) + f64::from(sum_u32(triangles.as_flattened()));
    normals.as_flattened_mut().fill(1.0);
    sum
}

/// Reads points and neighbour lists and writes points: 24 bytes, about 28 more, and 24 a vertex.
///
/// # Panics
/// When `moved` has another length than `points`.
pub fn ring(points: &[[f64; 3]], ends: &[u32], list: &[u32], moved: &mut [[f64; 3]]) -> u32 {
    moved.copy_from_slice(points);
    sum_u32(ends).wrapping_add(sum_u32(list))
}

/// Reads links and writes one label a face: 12 bytes a triangle in, 4 out.
pub fn components(turn: &[u32], labels: &mut [u32]) -> u32 {
    labels.fill(0);
    sum_u32(turn)
}

/// Several sums at once: one alone waits for each addition before the next.
fn sum_f64(values: &[f64]) -> f64 {
    let (blocks, rest) = values.as_chunks::<16>();
    let mut sums = [0.0; 16];
    for block in blocks {
        for (sum, x) in sums.iter_mut().zip(block) {
            *sum += x;
        }
    }
    sums.iter().chain(rest).sum()
}

fn sum_u32(values: &[u32]) -> u32 {
    values.iter().fold(0, |sum, &x| sum.wrapping_add(x))
}
