//! Unit normals, area and signed volume of faces.
//!
//! A face's normal is its Newell vector (the sum of the cross products along its loop; Newell in
//! Sutherland, Sproull & Schumacker 1974, from memory) divided by its length, and 0 where that is
//! 0. For triangles this is the cross product of two sides. Vectors are taken from the loop's first
//! point, so that faces far from the origin lose nothing.

/// Area and signed volume, summed over faces.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Sums {
    /// Half the length of each Newell vector, summed.
    pub area: f64,
    /// Volume of the pyramids over the faces with their tip in the origin, right-hand rule.
    pub volume: f64,
}

/// Area and signed volume of triangles, one by one. O(F).
///
/// # Panics
/// When a triangle names a point that is not there.
#[must_use]
pub fn triangle_sums(points: &[[f64; 3]], triangles: &[[u32; 3]]) -> Sums {
    let mut sums = Sums::default();
    for &[a, b, c] in triangles {
        let (p, q, r) = (points[a as usize], points[b as usize], points[c as usize]);
        let n = cross(minus(q, p), minus(r, p));
        sums.area += dot(n, n).sqrt();
        sums.volume += dot(n, p);
    }
    Sums { area: sums.area / 2.0, volume: sums.volume / 6.0 }
}

/// Unit normals of triangles, one by one. O(F).
///
/// # Panics
/// When a triangle names a point that is not there.
pub fn triangle_normals(points: &[[f64; 3]], triangles: &[[u32; 3]], normals: &mut Vec<[f64; 3]>) {
    normals.clear();
    normals.extend(triangles.iter().map(|&[a, b, c]| {
        let (p, q, r) = (points[a as usize], points[b as usize], points[c as usize]);
        unit(cross(minus(q, p), minus(r, p)))
    }));
}

/// Triangles taken at once by [`triangle_normals_in_lanes`].
const LANES: usize = 8;

/// Unit normals of triangles, eight triangles at a time.
///
/// Coordinates are gathered into one array per axis, so that the arithmetic, square roots and
/// divisions run in vector registers. The normals equal those of [`triangle_normals`] bit for bit.
/// O(F).
///
/// # Panics
/// When a triangle names a point that is not there.
pub fn triangle_normals_in_lanes(
    points: &[[f64; 3]],
    triangles: &[[u32; 3]],
    normals: &mut Vec<[f64; 3]>,
) {
    if normals.len() != triangles.len() {
        normals.clear();
        normals.resize(triangles.len(), [0.0; 3]);
    }
    let (blocks, rest) = triangles.as_chunks::<LANES>();
    let (normal_blocks, normal_rest) = normals.as_chunks_mut::<LANES>();
    for (block, normals) in blocks.iter().zip(normal_blocks) {
        lanes(points, block, normals);
    }
    if !rest.is_empty() {
        // The last block is filled up with triangles of no area.
        let mut block = [[rest[0][0]; 3]; LANES];
        block[..rest.len()].copy_from_slice(rest);
        let mut padded = [[0.0; 3]; LANES];
        lanes(points, &block, &mut padded);
        normal_rest.copy_from_slice(&padded[..rest.len()]);
    }
}

#[inline]
fn lanes(points: &[[f64; 3]], triangles: &[[u32; 3]; LANES], normals: &mut [[f64; 3]; LANES]) {
    let mut q = [[0.0; LANES]; 3];
    let mut r = [[0.0; LANES]; 3];
    for (lane, triangle) in triangles.iter().enumerate() {
        let corners = triangle.map(|v| points[v as usize]);
        for axis in 0..3 {
            q[axis][lane] = corners[1][axis] - corners[0][axis];
            r[axis][lane] = corners[2][axis] - corners[0][axis];
        }
    }
    let mut n = [[0.0; LANES]; 3];
    for lane in 0..LANES {
        n[0][lane] = q[1][lane] * r[2][lane] - q[2][lane] * r[1][lane];
        n[1][lane] = q[2][lane] * r[0][lane] - q[0][lane] * r[2][lane];
        n[2][lane] = q[0][lane] * r[1][lane] - q[1][lane] * r[0][lane];
    }
    let mut length = [0.0; LANES];
    for lane in 0..LANES {
        let square = n[0][lane] * n[0][lane] + n[1][lane] * n[1][lane] + n[2][lane] * n[2][lane];
        length[lane] = square.sqrt();
    }
    for length in &mut length {
        // Dividing 0 by 1 instead of by 0 keeps the lanes free of branches.
        *length = if *length > 0.0 { *length } else { 1.0 };
    }
    for (lane, normal) in normals.iter_mut().enumerate() {
        *normal = [0, 1, 2].map(|axis: usize| n[axis][lane] / length[lane]);
    }
}

/// Unit normals of faces with any number of corners, given as offsets + vertices. O(corners).
///
/// # Panics
/// When a corner names a point that is not there, or the ends are not ascending within `corners`.
pub fn loop_normals(
    points: &[[f64; 3]],
    corners: &[u32],
    face_ends: &[u32],
    normals: &mut Vec<[f64; 3]>,
) {
    normals.clear();
    let mut start = 0;
    normals.extend(face_ends.iter().map(|&end| {
        let face = &corners[start..end as usize];
        start = end as usize;
        unit(newell(points, face))
    }));
}

/// Twice the vector area of a loop.
#[inline]
fn newell(points: &[[f64; 3]], face: &[u32]) -> [f64; 3] {
    let [first, second, rest @ ..] = face else { return [0.0; 3] };
    let origin = points[*first as usize];
    let mut before = minus(points[*second as usize], origin);
    let mut sum = [0.0; 3];
    for &v in rest {
        let here = minus(points[v as usize], origin);
        let n = cross(before, here);
        sum = [sum[0] + n[0], sum[1] + n[1], sum[2] + n[2]];
        before = here;
    }
    sum
}

#[inline]
fn unit(n: [f64; 3]) -> [f64; 3] {
    let length = dot(n, n).sqrt();
    let length = if length > 0.0 { length } else { 1.0 };
    [n[0] / length, n[1] / length, n[2] / length]
}

#[inline]
fn minus(p: [f64; 3], q: [f64; 3]) -> [f64; 3] {
    [p[0] - q[0], p[1] - q[1], p[2] - q[2]]
}

#[inline]
fn dot(p: [f64; 3], q: [f64; 3]) -> f64 {
    p[0] * q[0] + p[1] * q[1] + p[2] * q[2]
}

#[inline]
fn cross(p: [f64; 3], q: [f64; 3]) -> [f64; 3] {
    [p[1] * q[2] - p[2] * q[1], p[2] * q[0] - p[0] * q[2], p[0] * q[1] - p[1] * q[0]]
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::shapes::{icosphere, quad_torus};

    #[test]
    fn unit_tetrahedron_has_the_volume_of_a_corner_of_the_cube() {
        let points = [[0.0; 3], [1.0, 0.0, 0.0], [0.0, 1.0, 0.0], [0.0, 0.0, 1.0]];
        let triangles = [[0, 2, 1], [0, 1, 3], [0, 3, 2], [1, 2, 3]];
        let sums = triangle_sums(&points, &triangles);
        // Three legs of 1/2 and an equilateral triangle of side √2.
        assert!((sums.area - (1.5 + 3.0_f64.sqrt() / 2.0)).abs() < 1e-15);
        assert!((sums.volume - 1.0 / 6.0).abs() < 1e-15);
        let mut normals = Vec::new();
        triangle_normals(&points, &triangles, &mut normals);
        assert_eq!(normals[..3], [[0.0, 0.0, -1.0], [0.0, -1.0, 0.0], [-1.0, 0.0, 0.0]]);
        assert!(normals[3].iter().all(|x| (x - 1.0 / 3.0_f64.sqrt()).abs() < 1e-15));
    }

    #[test]
    fn all_ways_agree_and_vanishing_faces_give_zero() {
        let mut sphere = icosphere(2);
        sphere.triangles.extend([[0, 0, 1], [5, 5, 5], [7, 8, 7]]);
        let (mut plain, mut lanes, mut loops) = (Vec::new(), Vec::new(), Vec::new());
        triangle_normals(&sphere.points, &sphere.triangles, &mut plain);
        triangle_normals_in_lanes(&sphere.points, &sphere.triangles, &mut lanes);
        let polygons = sphere.to_loops();
        loop_normals(&polygons.points, &polygons.corners, &polygons.face_ends, &mut loops);
        assert_eq!(plain, lanes);
        assert_eq!(plain, loops);
        assert_eq!(plain[320..], [[0.0; 3]; 3]);
    }

    #[test]
    fn quads_point_away_from_the_centre_circle() {
        let torus = quad_torus(40, 24);
        let mut normals = Vec::new();
        loop_normals(&torus.points, &torus.corners, &torus.face_ends, &mut normals);
        for (normal, corners) in normals.iter().zip(torus.corners.as_chunks::<4>().0) {
            let [x, y, z] = corners.iter().fold([0.0; 3], |sum, &v| {
                let p = torus.points[v as usize];
                [sum[0] + p[0] / 4.0, sum[1] + p[1] / 4.0, sum[2] + p[2] / 4.0]
            });
            let from_axis = x.hypot(y);
            let out = [x - 2.0 * x / from_axis, y - 2.0 * y / from_axis, z];
            let cosine = dot(*normal, out) / dot(out, out).sqrt();
            assert!(cosine > 0.97, "{cosine}");
        }
    }
}
