//! Unit normals of triangles, eight at a time.

use super::unit;
use crate::scalar::Scalar;
use nalgebra::Vector3;

/// Triangles taken at once: two or four vector registers of each coordinate.
const LANES: usize = 8;

/// The unit normal of each triangle, zero where it has no area, from its corner number `FIRST` on.
/// Triangle `i` goes to `normals[i]`.
pub(super) fn unit_normals<const FIRST: usize, S: Scalar>(
    points: &[[S; 3]],
    triangles: &[[u32; 3]],
    normals: &mut [[f64; 3]],
) {
    let alone = |triangle: &[u32; 3]| {
        let [a, b, c] = corners::<FIRST, S>(points, triangle).map(Vector3::from);
        unit((b - a).cross(&(c - a))).into()
    };
    let (blocks, rest) = triangles.as_chunks::<LANES>();
    let (normal_blocks, normal_rest) = normals[..triangles.len()].as_chunks_mut::<LANES>();
    for (block, normals) in blocks.iter().zip(normal_blocks) {
        if !block_normals::<FIRST, S>(points, block, normals) {
            block.iter().zip(normals).for_each(|(t, normal)| *normal = alone(t));
        }
    }
    rest.iter().zip(normal_rest).for_each(|(t, normal)| *normal = alone(t));
}

/// The unit normals of one block; `false`, with normals that do not count, where one of the
/// squared lengths vanishes or overflows.
///
/// A function of its own, from points to normals: unrolled into its caller it is not vectorised,
/// and taken apart it hands single numbers over where the other half wants vectors.
#[inline(never)]
fn block_normals<const FIRST: usize, S: Scalar>(
    points: &[[S; 3]],
    triangles: &[[u32; 3]; LANES],
    normals: &mut [[f64; 3]; LANES],
) -> bool {
    // A register for each coordinate of the ways from the first corner to the others.
    let (mut to_b, mut to_c) = ([[0.0; LANES]; 3], [[0.0; LANES]; 3]);
    for (lane, triangle) in triangles.iter().enumerate() {
        let [a, b, c] = corners::<FIRST, S>(points, triangle);
        for axis in 0..3 {
            to_b[axis][lane] = b[axis] - a[axis];
            to_c[axis][lane] = c[axis] - a[axis];
        }
    }
    let mut n = [[0.0; LANES]; 3];
    for lane in 0..LANES {
        n[0][lane] = to_b[1][lane] * to_c[2][lane] - to_b[2][lane] * to_c[1][lane];
        n[1][lane] = to_b[2][lane] * to_c[0][lane] - to_b[0][lane] * to_c[2][lane];
        n[2][lane] = to_b[0][lane] * to_c[1][lane] - to_b[1][lane] * to_c[0][lane];
    }
    let mut squared = [0.0; LANES];
    for lane in 0..LANES {
        squared[lane] = n[0][lane] * n[0][lane] + n[1][lane] * n[1][lane] + n[2][lane] * n[2][lane];
    }
    // Not `all`: it would stop at the first, and so take one branch a lane.
    let near = |square: &f64| (*square > f64::MIN_POSITIVE) & (*square < f64::MAX);
    let all_near = squared.iter().fold(true, |all, square| all & near(square));
    let length = squared.map(f64::sqrt);
    for (lane, normal) in normals.iter_mut().enumerate() {
        *normal = [0, 1, 2].map(|axis: usize| n[axis][lane] / length[lane]);
    }
    all_near
}

/// The corners of a triangle, from its corner number `FIRST` on.
#[inline(always)]
fn corners<const FIRST: usize, S: Scalar>(points: &[[S; 3]], triangle: &[u32; 3]) -> [[f64; 3]; 3] {
    let place = |i: usize| points[triangle[(FIRST + i) % 3] as usize].map(Scalar::widen);
    [place(0), place(1), place(2)]
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn blocks_and_the_rest_give_what_one_by_one_gives() {
        let mut state = 7_u64;
        let mut random = move || {
            state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1);
            (state >> 40) as f64 / f64::from(1 << 24) - 0.5
        };
        let mut points: Vec<[f64; 3]> = (0..40).map(|_| [random(), random(), random()]).collect();
        // Far out, tiny, and coincident: under- and overflow of the square, and no area.
        points.extend([
            [1e200, 0.0, 0.0],
            [0.0, 1e200, 0.0],
            [1e-200, 0.0, 0.0],
            [0.0, 1e-200, 0.0],
        ]);
        points.extend([[0.0; 3]; 2]);
        let n = points.len() as u32;
        for count in [0, 1, 7, 8, 9, 16, 59] {
            let triangles: Vec<[u32; 3]> = (0..count)
                .map(|_| [0; 3].map(|_: u32| ((random() + 0.5) * f64::from(n)) as u32 % n))
                .collect();
            let mut normals = vec![[9.0; 3]; count];
            unit_normals::<0, f64>(&points, &triangles, &mut normals);
            for (triangle, normal) in triangles.iter().zip(&normals) {
                let [a, b, c] = triangle.map(|v| Vector3::from(points[v as usize]));
                let alone = unit((b - a).cross(&(c - a)));
                let difference = (alone - Vector3::from(*normal)).norm();
                assert!(difference < 1e-15, "{triangle:?}: {alone:?} and {normal:?}");
            }
        }
    }
}
