//! Unit normals of triangles, eight at a time.

use super::unit;
use crate::scalar::Scalar;
use nalgebra::Vector3;

/// Triangles taken at once: two or four vector registers of each coordinate.
const LANES: usize = 8;

/// One number of each of the triangles taken at once.
type Lanes = [f64; LANES];

/// The unit normal of each triangle, zero where it has no area, from its corner number `FIRST` on.
/// Triangle `i` goes to `normals[i]`.
pub(super) fn unit_normals<const FIRST: usize, S: Scalar>(
    points: &[[S; 3]],
    triangles: &[[u32; 3]],
    normals: &mut [[f64; 3]],
) {
    let place = |v: u32| points[v as usize].map(Scalar::widen);
    let turned = |t: &[u32; 3]| [t[FIRST % 3], t[(FIRST + 1) % 3], t[(FIRST + 2) % 3]];
    let (blocks, rest) = triangles.as_chunks::<LANES>();
    let (normal_blocks, normal_rest) = normals[..triangles.len()].as_chunks_mut::<LANES>();
    for (block, normals) in blocks.iter().zip(normal_blocks) {
        // From points to a register for each coordinate: the corner, and the way to the others.
        let (mut to_b, mut to_c) = ([[0.0; LANES]; 3], [[0.0; LANES]; 3]);
        for (lane, triangle) in block.iter().enumerate() {
            let [a, b, c] = turned(triangle).map(place);
            for axis in 0..3 {
                to_b[axis][lane] = b[axis] - a[axis];
                to_c[axis][lane] = c[axis] - a[axis];
            }
        }
        let [x, y, z] = cross(&to_b, &to_c);
        let mut squared: Lanes = [0.0; LANES];
        let mut far = false;
        for lane in 0..LANES {
            squared[lane] = x[lane] * x[lane] + y[lane] * y[lane] + z[lane] * z[lane];
            far |= !(squared[lane] > f64::MIN_POSITIVE && squared[lane] < f64::MAX);
        }
        if far {
            for (lane, normal) in normals.iter_mut().enumerate() {
                *normal = unit(Vector3::new(x[lane], y[lane], z[lane])).into();
            }
            continue;
        }
        let length = squared.map(f64::sqrt);
        for (lane, normal) in normals.iter_mut().enumerate() {
            *normal = [x, y, z].map(|axis| axis[lane] / length[lane]);
        }
    }
    for (triangle, normal) in rest.iter().zip(normal_rest) {
        let [a, b, c] = turned(triangle).map(|v| Vector3::from(place(v)));
        *normal = unit((b - a).cross(&(c - a))).into();
    }
}

#[inline(always)]
fn cross(u: &[Lanes; 3], v: &[Lanes; 3]) -> [Lanes; 3] {
    [[1, 2], [2, 0], [0, 1]].map(|[j, k]: [usize; 2]| {
        std::array::from_fn(|lane| u[j][lane] * v[k][lane] - u[k][lane] * v[j][lane])
    })
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
