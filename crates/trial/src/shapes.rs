//! Meshes to measure on: spheres of any size, tori of quads, hubs, and shuffled copies.
//!
//! All of them are deterministic: the same arguments give the same mesh, bit for bit, on every
//! machine. Vertices and faces come in a *coherent* order (neighbours lie close in memory);
//! [`TriangleMesh::shuffled`] gives the opposite extreme.

/// A mesh of triangles: points and an index buffer.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct TriangleMesh {
    /// One point per vertex.
    pub points: Vec<[f64; 3]>,
    /// Three vertex numbers per triangle, counter-clockwise seen from outside.
    pub triangles: Vec<[u32; 3]>,
}

/// Faces of any number of corners, each with one loop, as offsets + vertices.
///
/// Face `f` has the corners `corners[face_ends[f - 1]..face_ends[f]]`, face 0 starts at 0.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Loops {
    /// One point per vertex.
    pub points: Vec<[f64; 3]>,
    /// The vertex of each corner, loop after loop.
    pub corners: Vec<u32>,
    /// Where each face's corners end.
    pub face_ends: Vec<u32>,
}

impl TriangleMesh {
    /// The same faces as offsets + vertices.
    #[must_use]
    pub fn to_loops(&self) -> Loops {
        Loops {
            points: self.points.clone(),
            corners: self.triangles.as_flattened().to_vec(),
            face_ends: (1..=self.triangles.len() as u32).map(|f| 3 * f).collect(),
        }
    }

    /// The same mesh with vertices and faces permuted at random; loops keep their orientation.
    ///
    /// The worst case for caches: neighbours lie anywhere in memory. Loops also start at a random
    /// corner. O(V + F).
    #[must_use]
    pub fn shuffled(&self, seed: u64) -> Self {
        let mut random = Random::new(seed);
        let place = random.permutation(self.points.len());
        let mut points = vec![[0.0; 3]; self.points.len()];
        for (&to, &point) in place.iter().zip(&self.points) {
            points[to as usize] = point;
        }
        let triangles = random
            .permutation(self.triangles.len())
            .into_iter()
            .map(|t| {
                let mut triangle = self.triangles[t as usize].map(|v| place[v as usize]);
                triangle.rotate_left(random.below(3) as usize);
                triangle
            })
            .collect();
        Self { points, triangles }
    }
}

impl Loops {
    /// The same mesh with vertices and faces permuted at random; loops keep their orientation.
    #[must_use]
    pub fn shuffled(&self, seed: u64) -> Self {
        let mut random = Random::new(seed);
        let place = random.permutation(self.points.len());
        let mut shuffled = Self {
            points: vec![[0.0; 3]; self.points.len()],
            corners: Vec::with_capacity(self.corners.len()),
            face_ends: Vec::with_capacity(self.face_ends.len()),
        };
        for (&to, &point) in place.iter().zip(&self.points) {
            shuffled.points[to as usize] = point;
        }
        for f in random.permutation(self.face_ends.len()) {
            let f = f as usize;
            let start = if f == 0 { 0 } else { self.face_ends[f - 1] };
            let corners = &self.corners[start as usize..self.face_ends[f] as usize];
            let first = random.below(corners.len().max(1) as u32) as usize;
            let turned = corners[first..].iter().chain(&corners[..first]);
            shuffled.corners.extend(turned.map(|&v| place[v as usize]));
            shuffled.face_ends.push(shuffled.corners.len() as u32);
        }
        shuffled
    }
}

/// A sphere of 20·4ⁿ triangles: the icosahedron, subdivided `n` times and pushed to radius 1.
///
/// Closed, manifold, outward; 10·4ⁿ + 2 vertices, twelve of valence 5 and the rest of valence 6.
/// Children of one triangle lie side by side, vertices are numbered by first use.
///
/// ```
/// let sphere = merestone_trial::shapes::icosphere(2);
/// assert_eq!((sphere.points.len(), sphere.triangles.len()), (162, 320));
/// ```
#[must_use]
pub fn icosphere(subdivisions: u32) -> TriangleMesh {
    let golden = f64::midpoint(1.0, 5.0_f64.sqrt());
    let mut points = Vec::new();
    for axis in 0..3 {
        for (one, long) in [(-1.0, golden), (1.0, golden), (-1.0, -golden), (1.0, -golden)] {
            let mut point = [0.0; 3];
            point[(axis + 1) % 3] = one;
            point[(axis + 2) % 3] = long;
            points.push(unit(point));
        }
    }
    // The hull of twelve points on a sphere: triples whose edges are all the shortest ones.
    let near = |a: usize, b: usize| distance(points[a], points[b]) < 1.06;
    let mut triangles = Vec::new();
    for a in 0..12 {
        for b in a + 1..12 {
            for c in b + 1..12 {
                if near(a, b) && near(b, c) && near(c, a) {
                    let outward = volume(points[a], points[b], points[c]) > 0.0;
                    let triangle = if outward { [a, b, c] } else { [a, c, b] };
                    triangles.push(triangle.map(|v| v as u32));
                }
            }
        }
    }
    let mut mesh = TriangleMesh { points, triangles };
    for _ in 0..subdivisions {
        mesh = subdivide(&mesh);
    }
    renumber_by_first_use(&mut mesh);
    mesh
}

/// Each triangle into four, new points on the unit sphere, edges matched by sorting their keys.
fn subdivide(mesh: &TriangleMesh) -> TriangleMesh {
    let sides = mesh.triangles.iter().flat_map(|&[a, b, c]| [(a, b), (b, c), (c, a)]);
    let mut keys: Vec<(u64, u32)> = sides
        .zip(0u32..)
        .map(|((a, b), side)| (u64::from(a.min(b)) << 32 | u64::from(a.max(b)), side))
        .collect();
    keys.sort_unstable();
    let mut points = mesh.points.clone();
    let mut middle = vec![0u32; keys.len()];
    for uses in keys.chunk_by(|x, y| x.0 == y.0) {
        let (a, b) = ((uses[0].0 >> 32) as usize, uses[0].0 as u32 as usize);
        for &(_, side) in uses {
            middle[side as usize] = points.len() as u32;
        }
        let (p, q) = (mesh.points[a], mesh.points[b]);
        points.push(unit([p[0] + q[0], p[1] + q[1], p[2] + q[2]]));
    }
    let middles = middle.as_chunks::<3>().0;
    let triangles = mesh.triangles.iter().zip(middles).flat_map(|(&[a, b, c], &[ab, bc, ca])| {
        [[a, ab, ca], [ab, b, bc], [ca, bc, c], [ab, bc, ca]]
    });
    TriangleMesh { triangles: triangles.collect(), points }
}

fn renumber_by_first_use(mesh: &mut TriangleMesh) {
    let mut place = vec![u32::MAX; mesh.points.len()];
    let mut points = Vec::with_capacity(mesh.points.len());
    for v in mesh.triangles.as_flattened_mut() {
        let old = *v as usize;
        if place[old] == u32::MAX {
            place[old] = points.len() as u32;
            points.push(mesh.points[old]);
        }
        *v = place[old];
    }
    mesh.points = points;
}

/// A bipyramid over a regular polygon: two hubs of the given valence, 2·valence triangles.
///
/// Closed and manifold for valences of 3 and more; smaller ones are taken as 3. The hubs are the
/// vertices 0 (top) and 1 (bottom).
#[must_use]
pub fn bipyramid(valence: u32) -> TriangleMesh {
    let valence = valence.max(3);
    let mut points = vec![[0.0, 0.0, 1.0], [0.0, 0.0, -1.0]];
    let mut triangles = Vec::with_capacity(2 * valence as usize);
    for i in 0..valence {
        let angle = std::f64::consts::TAU * f64::from(i) / f64::from(valence);
        points.push([angle.cos(), angle.sin(), 0.0]);
        let (here, there) = (2 + i, 2 + (i + 1) % valence);
        triangles.push([0, here, there]);
        triangles.push([1, there, here]);
    }
    TriangleMesh { points, triangles }
}

/// A fan: one hub of the given valence in an open sheet, `valence` triangles.
///
/// The hub is vertex 0; it lies inside, the rim is one boundary loop.
#[must_use]
pub fn fan(valence: u32) -> TriangleMesh {
    let mut mesh = bipyramid(valence);
    mesh.triangles = mesh.triangles.into_iter().step_by(2).collect();
    // Vertex 1 was the lower hub: the last rim vertex takes its place.
    let last = mesh.points.len() as u32 - 1;
    mesh.points.swap_remove(1);
    for v in mesh.triangles.as_flattened_mut() {
        if *v == last {
            *v = 1;
        }
    }
    mesh
}

/// A torus of `rows` × `columns` quads (each at least 3), row by row.
#[must_use]
pub fn quad_torus(rows: u32, columns: u32) -> Loops {
    let (rows, columns) = (rows.max(3), columns.max(3));
    let mut torus = Loops::default();
    for i in 0..rows {
        let (sin, cos) = (std::f64::consts::TAU * f64::from(i) / f64::from(rows)).sin_cos();
        for j in 0..columns {
            let angle = std::f64::consts::TAU * f64::from(j) / f64::from(columns);
            let from_axis = 2.0 + 0.5 * angle.cos();
            torus.points.push([from_axis * cos, from_axis * sin, 0.5 * angle.sin()]);
            let at = |i: u32, j: u32| (i % rows) * columns + j % columns;
            torus.corners.extend([at(i, j), at(i + 1, j), at(i + 1, j + 1), at(i, j + 1)]);
            torus.face_ends.push(torus.corners.len() as u32);
        }
    }
    torus
}

/// Triangles between random vertices, three different ones each: every kind of edge occurs.
///
/// With few vertices most edges are non-manifold, with many most are boundary edges.
#[must_use]
pub fn soup(vertices: u32, triangles: usize, seed: u64) -> TriangleMesh {
    let vertices = vertices.max(3);
    let mut random = Random::new(seed);
    let points = (0..vertices).map(|_| [random.unit(), random.unit(), random.unit()]).collect();
    let triangles = (0..triangles)
        .map(|_| {
            let a = random.below(vertices);
            let b = (a + 1 + random.below(vertices - 1)) % vertices;
            loop {
                let c = random.below(vertices);
                if c != a && c != b {
                    return [a, b, c];
                }
            }
        })
        .collect();
    TriangleMesh { points, triangles }
}

/// A small deterministic generator: SplitMix64 (Steele, Lea & Flood 2014), constants from memory.
#[derive(Clone, Debug)]
pub struct Random(u64);

impl Random {
    /// A generator that always gives the same numbers for the same seed.
    #[must_use]
    pub fn new(seed: u64) -> Self {
        Self(seed)
    }

    /// The next 64 random bits.
    pub fn bits(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        z ^ (z >> 31)
    }

    /// A number below `bound`, or 0 for a bound of 0.
    pub fn below(&mut self, bound: u32) -> u32 {
        (((self.bits() >> 32) * u64::from(bound)) >> 32) as u32
    }

    /// A number in [0, 1).
    pub fn unit(&mut self) -> f64 {
        (self.bits() >> 11) as f64 / (1u64 << 53) as f64
    }

    /// The numbers 0 to `count` − 1 in random order (Fisher & Yates 1938).
    pub fn permutation(&mut self, count: usize) -> Vec<u32> {
        let mut order: Vec<u32> = (0..count as u32).collect();
        for i in (1..count).rev() {
            order.swap(i, self.below(i as u32 + 1) as usize);
        }
        order
    }
}

fn unit(p: [f64; 3]) -> [f64; 3] {
    let length = (p[0] * p[0] + p[1] * p[1] + p[2] * p[2]).sqrt();
    p.map(|x| x / length)
}

fn distance(p: [f64; 3], q: [f64; 3]) -> f64 {
    ((p[0] - q[0]).powi(2) + (p[1] - q[1]).powi(2) + (p[2] - q[2]).powi(2)).sqrt()
}

fn volume(p: [f64; 3], q: [f64; 3], r: [f64; 3]) -> f64 {
    p[0] * (q[1] * r[2] - q[2] * r[1])
        + p[1] * (q[2] * r[0] - q[0] * r[2])
        + p[2] * (q[0] * r[1] - q[1] * r[0])
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::collections::BTreeSet;

    fn edges(mesh: &TriangleMesh) -> usize {
        let sides = mesh.triangles.iter().flat_map(|&[a, b, c]| [(a, b), (b, c), (c, a)]);
        sides.map(|(a, b)| (a.min(b), a.max(b))).collect::<BTreeSet<_>>().len()
    }

    fn euler(mesh: &TriangleMesh) -> isize {
        mesh.points.len() as isize - edges(mesh) as isize + mesh.triangles.len() as isize
    }

    fn enclosed(mesh: &TriangleMesh) -> f64 {
        let at = |v: u32| mesh.points[v as usize];
        mesh.triangles.iter().map(|t| volume(at(t[0]), at(t[1]), at(t[2])) / 6.0).sum()
    }

    #[test]
    fn spheres_have_the_counts_and_the_volume_of_a_sphere() {
        for n in 0..5 {
            let sphere = icosphere(n);
            assert_eq!(sphere.triangles.len(), 20 * 4usize.pow(n));
            assert_eq!(sphere.points.len(), 10 * 4usize.pow(n) + 2);
            assert_eq!(euler(&sphere), 2);
        }
        // Icosahedron of circumradius 1: volume (5/12)(3 + √5)·a³, a = 4 / √(10 + 2√5); from memory.
        let a = 4.0 / (10.0 + 2.0 * 5.0_f64.sqrt()).sqrt();
        let expected = 5.0 / 12.0 * (3.0 + 5.0_f64.sqrt()) * a.powi(3);
        assert!((enclosed(&icosphere(0)) - expected).abs() < 1e-12);
        let sphere = 4.0 / 3.0 * std::f64::consts::PI;
        let ratio = enclosed(&icosphere(4)) / sphere;
        assert!(ratio > 0.99 && ratio < 1.0, "{ratio}");
    }

    #[test]
    fn shuffling_keeps_the_surface_and_moves_the_numbers() {
        let sphere = icosphere(3);
        let shuffled = sphere.shuffled(7);
        assert_eq!(shuffled, sphere.shuffled(7));
        assert_ne!(shuffled, sphere.shuffled(8));
        assert_eq!(euler(&shuffled), 2);
        assert!((enclosed(&sphere) - enclosed(&shuffled)).abs() < 1e-12);
        let torus = quad_torus(5, 7);
        let other = torus.shuffled(3);
        assert_eq!(other.face_ends, torus.face_ends);
        assert_ne!(other.corners, torus.corners);
    }

    #[test]
    fn hubs_have_their_valence() {
        assert_eq!(euler(&bipyramid(100)), 2);
        let fan = fan(100);
        assert_eq!((fan.points.len(), fan.triangles.len(), euler(&fan)), (101, 100, 1));
        assert_eq!(fan.triangles.iter().filter(|t| t.contains(&0)).count(), 100);
    }
}
