//! Faces whose corners all lie on one line, decided exactly.

use super::CleanSoup;
use robust::{Coord, orient2d};

impl CleanSoup {
    /// The kept faces whose corners, inner loops included, all lie on one line, ascending.
    ///
    /// Decided in exact arithmetic on the coordinates as they stand: three points are on one line
    /// just when their projections along each axis are, and each projection is an exact
    /// orientation test (Shewchuk 1997). Coordinates beyond 2±¹⁶⁰ are scaled by a power of two
    /// first, which is exact as long as a face does not span more than some 260 powers of ten.
    /// O(corners).
    ///
    /// ```
    /// use merestone_geometry::PolygonSoup;
    /// let points = vec![[0.1, 0.1, 0.], [0.2, 0.2, 0.], [0.4, 0.4, 0.], [0.3, 0.3, 1e-300]];
    /// let mut soup = PolygonSoup { points, ..PolygonSoup::default() };
    /// soup.faces.set_vertex_count(4);
    /// soup.faces.push_face(&[0, 1, 2]);
    /// soup.faces.push_face(&[0, 1, 3]);
    /// assert_eq!(soup.clean()?.zero_area_faces(), [0]);
    /// # Ok::<(), merestone_geometry::SoupError>(())
    /// ```
    #[must_use]
    pub fn zero_area_faces(&self) -> Vec<u32> {
        let list = self.faces();
        let mut corners = Vec::new();
        (0..list.face_count())
            .filter(|&face| {
                corners.clear();
                for listed in list.loops(face) {
                    corners.extend(listed.corners.iter().map(|&v| self.points()[v as usize]));
                }
                on_one_line(&mut corners)
            })
            .map(|face| face as u32)
            .collect()
    }
}

/// Whether all these points are on one line. May scale them.
pub(super) fn on_one_line(points: &mut [[f64; 3]]) -> bool {
    bring_into_range(points);
    let Some((&a, rest)) = points.split_first() else { return true };
    // Without a second point that differs there is no line to leave.
    let Some(&b) = rest.iter().find(|&&p| p != a) else { return true };
    rest.iter().all(|&c| {
        [(0, 1), (1, 2), (2, 0)].iter().all(|&(u, v)| {
            let project = |p: [f64; 3]| Coord { x: p[u], y: p[v] };
            orient2d(project(a), project(b), project(c)) == 0.0
        })
    })
}

/// Powers of two up to which the exact test neither overflows nor loses a digit unscaled.
const SAFE_EXPONENT: i32 = 160;
/// Where scaling puts the largest coordinate: products of two stay finite, and as much room as
/// there is remains below for the digits of the smallest.
const TOP_EXPONENT: i32 = 400;

fn bring_into_range(points: &mut [[f64; 3]]) {
    let (low, high) = (2.0_f64.powi(-SAFE_EXPONENT), 2.0_f64.powi(SAFE_EXPONENT));
    let coordinates = points.as_flattened_mut();
    if coordinates.iter().all(|&x| x == 0.0 || (low..=high).contains(&x.abs())) {
        return;
    }
    let largest = coordinates.iter().fold(0.0_f64, |most, x| most.max(x.abs()));
    // A subnormal has fewer digits, not more, so its exponent may be overestimated.
    let exponent = (largest.to_bits() >> 52) as i32 - 1023;
    // Two factors, since one alone may be out of range itself.
    let half = (TOP_EXPONENT - exponent) / 2;
    let factors = [2.0_f64.powi(half), 2.0_f64.powi(TOP_EXPONENT - exponent - half)];
    for x in coordinates {
        *x = *x * factors[0] * factors[1];
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// p and q times it, exactly: q is small enough for the products to have no rounding.
    fn multiple(p: [f64; 3], q: f64) -> [f64; 3] {
        p.map(|x| x * q)
    }

    #[test]
    fn collinear_points_are_found_at_every_scale() {
        // 25-bit numbers, so that small multiples are exact.
        let p = [12_345_679.0, -9_876_543.0, 31_415_927.0];
        for exponent in (-1040..=990).step_by(7) {
            let scale = |point: [f64; 3]| {
                point
                    .map(|x| x * 2.0_f64.powi(exponent / 2) * 2.0_f64.powi(exponent - exponent / 2))
            };
            let line = [p, multiple(p, 3.0), multiple(p, -5.0), [0.0; 3], p];
            assert!(on_one_line(&mut line.map(scale)), "2^{exponent}");
            // One unit in the last place of the smallest multiple off the line.
            let mut off = line;
            off[2][1] += 1.0;
            assert!(!on_one_line(&mut off.map(scale)), "2^{exponent}");
        }
    }

    #[test]
    fn a_difference_only_exact_arithmetic_sees_counts() {
        let next = |x: f64| f64::from_bits(x.to_bits() + 1);
        let (a, b) = ([0.5, 0.5, 0.0], [12.0, 12.0, 0.0]);
        // Kettner et al. 2008: near this line plain orientation tests give any sign.
        assert!(on_one_line(&mut [a, b, [24.0, 24.0, 0.0]]));
        assert!(!on_one_line(&mut [a, b, [next(24.0), 24.0, 0.0]]));
        assert!(!on_one_line(&mut [a, b, [24.0, 24.0, f64::from_bits(1)]]));
    }

    #[test]
    fn coincident_corners_are_on_one_line() {
        assert!(on_one_line(&mut [[1.0, 2.0, 3.0]; 4]));
        assert!(on_one_line(&mut [[0.0, -0.0, 0.0], [-0.0, 0.0, 0.0], [0.0; 3]]));
        assert!(on_one_line(&mut []));
    }
}
