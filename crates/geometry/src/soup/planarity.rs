//! Faces whose corners lie in no common plane.

use super::CleanSoup;
use super::zero_area::on_one_line;

/// How far a corner may be from its face's plane, as a part of the face's diameter, unless the
/// caller says otherwise.
pub const PLANAR_TOLERANCE: f64 = 1e-6;

type Vector = [f64; 3];

impl CleanSoup {
    /// The kept faces that are not flat, ascending.
    ///
    /// A face is flat when no corner is farther than `tolerance` × the face's diameter (the
    /// largest distance between two corners) from the plane through its outer loop's mean point
    /// with that loop's Newell vector as normal (Newell, in Sutherland, Sproull & Schumacker
    /// 1974). Corners of inner loops count too. A triangle is flat, and so is a face of no area;
    /// any other face whose Newell vector vanishes to rounding is not.
    ///
    /// O(corners), except where a deviation is so near the limit that the diameter must be known
    /// to better than a factor of √3: then up to O(corners²) for that face.
    ///
    /// ```
    /// use merestone_geometry::{PLANAR_TOLERANCE, PolygonSoup};
    /// let points = vec![[0., 0., 0.], [1., 0., 0.], [1., 1., 0.1], [0., 1., 0.]];
    /// let mut soup = PolygonSoup { points, ..PolygonSoup::default() };
    /// soup.faces.set_vertex_count(4);
    /// soup.faces.push_face(&[0, 1, 2, 3]);
    /// let clean = soup.clean()?;
    /// assert_eq!(clean.non_planar_faces(PLANAR_TOLERANCE), [0]);
    /// assert_eq!(clean.non_planar_faces(0.1), []);
    /// # Ok::<(), merestone_geometry::SoupError>(())
    /// ```
    #[must_use]
    pub fn non_planar_faces(&self, tolerance: f64) -> Vec<u32> {
        let list = self.faces();
        let (mut corners, mut scratch) = (Vec::new(), Vec::new());
        (0..list.face_count())
            .filter(|&face| {
                let mut loops = list.loops(face);
                let outer = loops.next().map_or(&[][..], |listed| listed.corners);
                if outer.len() == 3 && loops.len() == 0 {
                    return false;
                }
                corners.clear();
                corners.extend(outer.iter().map(|&v| self.points()[v as usize]));
                for listed in loops {
                    corners.extend(listed.corners.iter().map(|&v| self.points()[v as usize]));
                }
                !is_flat(&corners, outer.len(), tolerance, &mut scratch)
            })
            .map(|face| face as u32)
            .collect()
    }
}

/// Whether the corners are in the plane of the first `outer` of them.
fn is_flat(corners: &[Vector], outer: usize, tolerance: f64, scratch: &mut Vec<Vector>) -> bool {
    let points = scratch;
    points.clear();
    points.extend_from_slice(corners);
    let Some(diagonal) = bring_to_unit_size(points) else { return true };
    let (normal, magnitude) = newell(&points[..outer]);
    let length = dot(normal, normal).sqrt();
    // Each product carries a rounding error of a few units in its last place.
    if length <= 4.0 * f64::EPSILON * magnitude {
        // Asked of the coordinates as they stand: scaling has rounded the others.
        points.clear();
        points.extend_from_slice(corners);
        return on_one_line(points);
    }
    let normal = normal.map(|x| x / length);
    let mut mean = [0.0; 3];
    for point in &points[..outer] {
        mean = add(mean, *point);
    }
    let mean = mean.map(|x| x / outer as f64);
    let deviation = points.iter().map(|&p| dot(sub(p, mean), normal).abs()).fold(0.0_f64, f64::max);
    // The diameter is between diagonal / √3 and the diagonal of the box around the points.
    if deviation > tolerance * diagonal {
        return false;
    }
    if deviation <= tolerance * diagonal / 3.0_f64.sqrt() {
        return true;
    }
    is_wider_than(points, mean, deviation / tolerance)
}

/// Moves the first point to the origin and scales so that the largest extent is 1. Returns the
/// diagonal of the box around the points, or `None` where all points coincide.
fn bring_to_unit_size(points: &mut [Vector]) -> Option<f64> {
    // Halved, so that no difference overflows.
    let mut extent = [0.0; 3];
    for (axis, extent) in extent.iter_mut().enumerate() {
        let halves = points.iter().map(|p| p[axis] * 0.5);
        let low = halves.clone().fold(f64::INFINITY, f64::min);
        *extent = halves.fold(f64::NEG_INFINITY, f64::max) - low;
    }
    let size = extent.iter().copied().fold(0.0, f64::max);
    if size.is_nan() || size <= 0.0 {
        return None;
    }
    let origin = *points.first()?;
    for point in points {
        for (x, o) in point.iter_mut().zip(origin) {
            *x = (*x * 0.5 - o * 0.5) / size;
        }
    }
    let extent = extent.map(|x| x / size);
    Some(dot(extent, extent).sqrt())
}

/// The Newell vector of a loop and the sum of the magnitudes that went into it.
fn newell(corners: &[Vector]) -> (Vector, f64) {
    let mut sum = [0.0; 3];
    let mut magnitude = 0.0;
    for (i, &a) in corners.iter().enumerate() {
        let b = corners[if i + 1 < corners.len() { i + 1 } else { 0 }];
        sum = add(sum, cross(a, b));
        magnitude += (dot(a, a) * dot(b, b)).sqrt();
    }
    (sum, magnitude)
}

/// Whether two of the points are at least `width` apart. Points far from the centre are tried
/// first, and a pair whose distances from it do not add up to `width` ends the search.
fn is_wider_than(points: &[Vector], centre: Vector, width: f64) -> bool {
    let mut far: Vec<(f64, Vector)> = points
        .iter()
        .map(|&p| {
            let from_centre = sub(p, centre);
            (dot(from_centre, from_centre).sqrt(), p)
        })
        .collect();
    far.sort_unstable_by(|a, b| b.0.total_cmp(&a.0));
    // A hair of slack keeps rounding of the distances from ending the search too early.
    let reach = width * (1.0 - 8.0 * f64::EPSILON);
    far.iter().enumerate().any(|(i, &(distance, p))| {
        far[..i].iter().take_while(|other| other.0 + distance >= reach).any(|&(_, other)| {
            let between = sub(p, other);
            dot(between, between) >= width * width
        })
    })
}

fn add(a: Vector, b: Vector) -> Vector {
    [a[0] + b[0], a[1] + b[1], a[2] + b[2]]
}

fn sub(a: Vector, b: Vector) -> Vector {
    [a[0] - b[0], a[1] - b[1], a[2] - b[2]]
}

fn dot(a: Vector, b: Vector) -> f64 {
    a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
}

fn cross(a: Vector, b: Vector) -> Vector {
    [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]]
}

#[cfg(test)]
mod tests {
    use super::*;

    fn flat(corners: &[Vector], outer: usize, tolerance: f64) -> bool {
        is_flat(corners, outer, tolerance, &mut Vec::new())
    }

    /// The unit square with corner 2 raised by `h`, far from the origin, at some scale.
    fn square(h: f64, scale: f64) -> Vec<Vector> {
        [[0.0, 0.0, 0.0], [1.0, 0.0, 0.0], [1.0, 1.0, h], [0.0, 1.0, 0.0]]
            .map(|p| p.map(|x| x * scale))
            .to_vec()
    }

    #[test]
    fn the_limit_is_a_part_of_the_diameter() {
        // Every corner is h / 4 off the mean plane, to first order in h; the diameter is √2.
        let limit = 4.0 * 2.0_f64.sqrt() * PLANAR_TOLERANCE;
        for scale in [1.0, 1e-200, 1e300, 1e-3] {
            assert!(flat(&square(limit * 0.999, scale), 4, PLANAR_TOLERANCE), "{scale}");
            assert!(!flat(&square(limit * 1.001, scale), 4, PLANAR_TOLERANCE), "{scale}");
        }
        // A hexagon's diameter is less than its box's diagonal: only the pair search tells.
        let hexagon = |h: f64| -> Vec<Vector> {
            (0..6)
                .map(|i| {
                    let angle = f64::from(i) * std::f64::consts::FRAC_PI_3;
                    [angle.cos(), angle.sin(), if i % 2 == 0 { h } else { -h }]
                })
                .collect()
        };
        // Zigzag corners are h off the plane; opposite ones are 2 √(1 + h²) apart.
        assert!(flat(&hexagon(2.0e-6 * 0.999), 6, PLANAR_TOLERANCE));
        assert!(!flat(&hexagon(2.0e-6 * 1.001), 6, PLANAR_TOLERANCE));
    }

    #[test]
    fn a_vanishing_newell_vector_is_flat_only_on_a_line() {
        // A bow tie in a plane: two triangles of opposite sense.
        let bow = vec![[0.0, 0.0, 0.0], [1.0, 1.0, 0.0], [1.0, 0.0, 0.0], [0.0, 1.0, 0.0]];
        assert!(!flat(&bow, 4, PLANAR_TOLERANCE));
        let line = vec![[0.0; 3], [1.0; 3], [3.0; 3], [2.0; 3]];
        assert!(flat(&line, 4, PLANAR_TOLERANCE));
        // Exactly on a line, but rounded off it when scaled to unit size.
        let line = [1.0, 2.0, 4.0, 3.0].map(|k| [3.0 * k, 7.0 * k, k]);
        assert!(flat(&line, 4, PLANAR_TOLERANCE));
        assert!(flat(&[[2.0; 3]; 5], 5, PLANAR_TOLERANCE));
    }

    #[test]
    fn an_inner_loop_must_lie_in_the_outer_ones_plane() {
        let mut points = square(0.0, 1.0);
        points.extend([[0.3, 0.3, 0.0], [0.3, 0.6, 0.0], [0.6, 0.3, 0.0]]);
        assert!(flat(&points, 4, PLANAR_TOLERANCE));
        points[5][2] = 1e-5;
        assert!(!flat(&points, 4, PLANAR_TOLERANCE));
    }
}
