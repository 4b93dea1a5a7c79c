//! Normals, area and volume.

mod lanes;

use crate::brep::Brep;
use crate::scalar::Scalar;
use crate::sums::Sum;
use merestone_topology::{Column, FaceBound, Id, Topology, TopologyExt};
use nalgebra::{Point3, Vector3};

impl<K: Topology, S: Scalar> Brep<K, S> {
    /// The Newell vector of a face: along its normal, as long as twice its area.
    ///
    /// For a flat face of any shape, with inner loops or without, this is exact up to rounding;
    /// for another it is that of the mean plane. Zero where the loops enclose nothing. Source: the
    /// formula is M. E. Newell's, as in F. Tampieri, *Newell's method for computing the plane
    /// equation of a polygon*, Graphics Gems III, 1992 (from memory). O(corners).
    #[inline]
    #[must_use]
    pub fn newell_vector(&self, face: K::Face) -> Vector3<f64> {
        if let Some([a, b, c]) = self.triangle_positions(face) {
            return (b - a).cross(&(c - a));
        }
        self.topology().face_bounds(face).fold(Vector3::zeros(), |sum, bound| match bound {
            FaceBound::EdgeLoop(h) => sum + self.loop_vector(h),
            FaceBound::VertexLoop(_) => sum,
        })
    }

    /// The corners of a triangle from any of them on, where the kernel has them in one place.
    #[inline(always)]
    fn triangle_positions(&self, face: K::Face) -> Option<[Point3<f64>; 3]> {
        let points = self.points().values();
        let place = |v: u32| Point3::from(points[v as usize].map(Scalar::widen));
        self.topology().index_buffer().map(|triangles| triangles[face.index()].map(place))
    }

    /// The Newell vector of the loop through `first`.
    #[inline]
    fn loop_vector(&self, first: K::OrientedEdge) -> Vector3<f64> {
        let mesh = self.topology();
        // About a corner of the loop, so that nothing large cancels. The two sides at that corner
        // then give nothing, and are left out.
        let origin = self.position(mesh.start(first));
        let from_origin = |h| self.position(mesh.start(h)) - origin;
        let second = mesh.next(first);
        let mut before = from_origin(second);
        let mut h = mesh.next(second);
        let mut sum = Vector3::zeros();
        while h != first {
            let here = from_origin(h);
            sum += before.cross(&here);
            before = here;
            h = mesh.next(h);
        }
        sum
    }

    /// The unit normal of a face, zero where its Newell vector vanishes. O(corners).
    #[inline]
    #[must_use]
    pub fn face_normal(&self, face: K::Face) -> Vector3<f64> {
        unit(self.newell_vector(face))
    }

    /// The unit normals of all faces into a column, as [`face_normal`](Self::face_normal) gives
    /// them up to rounding; retired slots get anything. O(corners).
    ///
    /// Where the kernel keeps triangles in one place, eight are taken at a time, in vector
    /// registers.
    ///
    /// ```
    /// use merestone_geometry::TriangleMesh;
    /// use merestone_topology::TopologyExt;
    /// let points = [[0.0, 0.0, 0.0], [1.0, 0.0, 0.0], [0.0, 1.0, 0.0]];
    /// let mesh = TriangleMesh::from_triangles(points, &[[0, 1, 2]])?;
    /// let mut normals = mesh.face_column([0.0; 3]);
    /// mesh.face_normals_into(&mut normals);
    /// assert_eq!(normals.values(), [[0.0, 0.0, 1.0]]);
    /// # Ok::<(), merestone_geometry::BuildError>(())
    /// ```
    pub fn face_normals_into(&self, normals: &mut Column<K::Face, [f64; 3]>) {
        let mesh = self.topology();
        if let Some(triangles) = mesh.index_buffer()
            && mesh.face_count() == triangles.len()
            && normals.values().len() >= triangles.len()
        {
            // From the loops' first corners, so that all kernels round alike: the normal of a sliver
            // is made of little else than rounding.
            let points = self.points().values();
            let normals = normals.values_mut();
            match self.first_corner(triangles) {
                0 => lanes::unit_normals::<0, S>(points, triangles, normals),
                1 => lanes::unit_normals::<1, S>(points, triangles, normals),
                _ => lanes::unit_normals::<2, S>(points, triangles, normals),
            }
            return;
        }
        mesh.faces().for_each(|face| normals[face] = self.face_normal(face).into());
    }

    /// Where in its three the first face with three different corners has its loop's first corner;
    /// kernels keep all threes alike.
    fn first_corner(&self, triangles: &[[u32; 3]]) -> usize {
        let mesh = self.topology();
        let place = |face: K::Face| {
            let [a, b, c] = triangles[face.index()];
            let Some(FaceBound::EdgeLoop(h)) = mesh.bound(face, 0) else { return None };
            let first = mesh.start(h).index();
            let place = [a, b, c].iter().position(|&v| v as usize == first);
            place.filter(|_| a != b && b != c && c != a)
        };
        mesh.faces().find_map(place).unwrap_or(0)
    }

    /// The area of a face: half the length of its Newell vector. O(corners).
    #[must_use]
    pub fn face_area(&self, face: K::Face) -> f64 {
        0.5 * self.newell_vector(face).norm()
    }

    /// The area of all faces, as a compensated sum. O(corners).
    #[must_use]
    pub fn area(&self) -> f64 {
        self.sum_over_faces(|face| self.face_area(face))
    }

    /// The volume that the faces enclose, positive where they face outward, as a compensated sum.
    ///
    /// Means something where every edge is balanced
    /// ([`is_balanced`](merestone_topology::floods::is_balanced)), as on any closed oriented mesh;
    /// on others it depends on where the mesh lies. The divergence theorem over cones from the
    /// middle of the bounding box; the loops of a face that is not flat are taken as fans from
    /// their first corners. O(corners).
    #[must_use]
    pub fn signed_volume(&self) -> f64 {
        let Some([low, high]) = self.bounding_box() else { return 0.0 };
        let middle = nalgebra::center(&low, &high);
        self.sum_over_faces(|face| self.cone(face, middle))
    }

    fn sum_over_faces(&self, term: impl Fn(K::Face) -> f64) -> f64 {
        let mut sum = Sum::default();
        self.topology().faces().for_each(|face| sum.add(term(face)));
        sum.value()
    }

    /// The signed volume of the cone from `apex` over a face.
    #[inline]
    pub(crate) fn cone(&self, face: K::Face, apex: Point3<f64>) -> f64 {
        let mesh = self.topology();
        if let Some(corners) = self.triangle_positions(face) {
            let [a, b, c] = corners.map(|p| p - apex);
            return a.dot(&b.cross(&c)) / 6.0;
        }
        mesh.face_bounds(face).fold(0.0, |sum, bound| match bound {
            FaceBound::EdgeLoop(h) => {
                let first = self.position(mesh.start(h)) - apex;
                sum + first.dot(&self.loop_vector(h)) / 6.0
            }
            FaceBound::VertexLoop(_) => sum,
        })
    }
}

/// `v` at length one, or zero where it is zero.
#[inline(always)]
pub(crate) fn unit(v: Vector3<f64>) -> Vector3<f64> {
    let squared = v.norm_squared();
    if squared > 0.0 && squared.is_finite() {
        return v / squared.sqrt();
    }
    far_unit(v)
}

/// The same where the square under- or overflows.
#[cold]
fn far_unit(v: Vector3<f64>) -> Vector3<f64> {
    let largest = v.amax();
    if largest == 0.0 { v } else { (v / largest).normalize() }
}
