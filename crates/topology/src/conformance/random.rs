//! Random complexes: what files do to a kernel, in small.

use super::{Complex, Ring};
use crate::EdgeUse;

/// A small generator of random numbers: SplitMix64 (Steele, Lea, Flood, *Fast splittable
/// pseudorandom number generators*, OOPSLA 2014; constants from memory). The same seed gives the
/// same numbers everywhere.
///
/// ```
/// use merestone_topology::conformance::Random;
/// let draw = |seed| Random::new(seed).below(1000);
/// assert_eq!(draw(5), draw(5));
/// ```
#[derive(Clone, Debug)]
pub struct Random(u64);

impl Random {
    /// The numbers of this seed.
    #[must_use]
    pub fn new(seed: u64) -> Self {
        Self(seed)
    }

    fn bits(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut z = self.0;
        z = (z ^ z >> 30).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        z = (z ^ z >> 27).wrapping_mul(0x94d0_49bb_1331_11eb);
        z ^ z >> 31
    }

    /// A number below `bound`; 0 when that is 0. Slightly uneven, which no test here minds.
    pub fn below(&mut self, bound: u32) -> u32 {
        (self.bits() >> 32).checked_rem(u64::from(bound)).unwrap_or(0) as u32
    }

    /// An index below `len`, none when there is none.
    pub fn below_len(&mut self, len: usize) -> Option<usize> {
        (len > 0).then(|| self.below(len as u32) as usize)
    }

    /// From `low` to `high`, both included.
    pub fn between(&mut self, low: u32, high: u32) -> u32 {
        low + self.below(high - low + 1)
    }

    /// True `of` times in `out_of`.
    pub fn chance(&mut self, of: u32, out_of: u32) -> bool {
        self.below(out_of) < of
    }

    /// Puts the items in a random order (Fisher and Yates; Durstenfeld 1964).
    pub fn shuffle<T>(&mut self, items: &mut [T]) {
        for last in (1..items.len()).rev() {
            items.swap(last, self.below(last as u32 + 1) as usize);
        }
    }
}

/// The random complex of a seed: one of several families, each with boundaries, joints and
/// orientations of its own, named after the family and the seed.
///
/// ```
/// use merestone_topology::conformance::random_complex;
/// assert_eq!(random_complex(11), random_complex(11));
/// ```
#[must_use]
pub fn random_complex(seed: u64) -> Complex {
    let mut random = Random::new(seed ^ 0x6d65_7265);
    let r = &mut random;
    let (family, mut complex) = match r.below(8) {
        0 => ("triangles on few vertices", soup(r, false)),
        1 => ("triangles that may repeat a vertex", soup(r, true)),
        2 | 3 => ("glued closed surfaces", closed(r)),
        4 => ("polygons", polygons(r, false)),
        5 => ("polygons with holes", polygons(r, true)),
        6 => ("numbered edges", numbered(r)),
        _ => ("polygons of a grid", grid(r)),
    };
    // A vertex or two that no face uses, and vertices numbered against the order of faces.
    if r.chance(1, 3) {
        complex.vertex_count += r.between(1, 2) as usize;
    }
    complex.name = format!("{family}, seed {seed}");
    complex
}

/// The random complexes of so many seeds from the first on.
pub fn random_complexes(first_seed: u64, count: u64) -> impl Iterator<Item = Complex> {
    (0..count).map(move |i| random_complex(first_seed.wrapping_add(i)))
}

/// How many random complexes a run of the suite takes: `usual`, unless the environment variable
/// `MERESTONE_CONFORMANCE_CASES` asks for another number.
#[must_use]
pub fn case_count(usual: u64) -> u64 {
    let asked = std::env::var("MERESTONE_CONFORMANCE_CASES").ok();
    asked.and_then(|count| count.parse().ok()).unwrap_or(usual)
}

fn soup(r: &mut Random, repeats: bool) -> Complex {
    let vertices = r.between(3, 7);
    let mut triangles = Vec::new();
    for _ in 0..r.between(1, 11) {
        let a = r.below(vertices);
        let mut b = r.below(vertices);
        let mut c = r.below(vertices);
        while !repeats && (b == a || c == a || c == b) {
            (b, c) = (r.below(vertices), r.below(vertices));
        }
        triangles.push(vec![a, b, c]);
    }
    Complex::polygons("", vertices as usize, triangles)
}

/// One or two closed surfaces, glued at vertices picked at random, some faces turned or doubled.
fn closed(r: &mut Random) -> Complex {
    let mut vertices = 0;
    let mut faces: Vec<Vec<u32>> = Vec::new();
    for _ in 0..r.between(1, 2) {
        let (count, surface) =
            if r.chance(2, 3) { bipyramid(r.between(3, 6)) } else { torus(3, 3) };
        faces.extend(surface.into_iter().map(|face| face.map(|v| v + vertices).to_vec()));
        vertices += count;
    }
    for _ in 0..r.below(4) {
        // Identify two vertices. Faces that would repeat one are dropped: boundaries appear.
        let (kept, dropped) = (r.below(vertices), r.below(vertices));
        for face in &mut faces {
            for v in face.iter_mut().filter(|v| **v == dropped) {
                *v = kept;
            }
        }
        faces.retain(|f| f[0] != f[1] && f[1] != f[2] && f[2] != f[0]);
    }
    if r.chance(1, 2) {
        for face in &mut faces {
            if r.chance(1, 6) {
                face.reverse();
            }
        }
    }
    if r.chance(1, 3)
        && let Some(i) = r.below_len(faces.len())
    {
        faces.push(faces[i].clone());
    }
    if r.chance(2, 3) {
        r.shuffle(&mut faces);
    }
    Complex::polygons("", vertices as usize, faces)
}

/// Two apexes over a ring of `n` vertices.
fn bipyramid(n: u32) -> (u32, Vec<[u32; 3]>) {
    let (top, bottom) = (n, n + 1);
    let around = (0..n).map(|i| (i, (i + 1) % n));
    let faces = around.flat_map(|(a, b)| [[a, b, top], [b, a, bottom]]).collect();
    (n + 2, faces)
}

/// A grid of `m` by `n` squares closed both ways, each square cut in two.
fn torus(m: u32, n: u32) -> (u32, Vec<[u32; 3]>) {
    let at = |i: u32, j: u32| (i % m) * n + j % n;
    let mut faces = Vec::new();
    for (i, j) in (0..m).flat_map(|i| (0..n).map(move |j| (i, j))) {
        let (a, b, c, d) = (at(i, j), at(i + 1, j), at(i + 1, j + 1), at(i, j + 1));
        faces.extend([[a, b, c], [a, c, d]]);
    }
    (m * n, faces)
}

/// An open grid of squares, some turned, some with neighbours merged into one longer loop, some
/// with a hole.
fn grid(r: &mut Random) -> Complex {
    let (m, n) = (r.between(1, 3), r.between(2, 3));
    let at = |i: u32, j: u32| i * (n + 1) + j;
    let mut vertices = (m + 1) * (n + 1);
    let mut faces = Vec::new();
    for i in 0..m {
        let mut j = 0;
        while j < n {
            let long = j + 1 < n && r.chance(1, 3);
            let mut ring = vec![at(i, j), at(i + 1, j), at(i + 1, j + 1)];
            if long {
                ring.extend([at(i + 1, j + 2), at(i, j + 2)]);
            }
            ring.push(at(i, j + 1));
            j += if long { 2 } else { 1 };
            if r.chance(1, 8) {
                ring.reverse();
            }
            let mut rings = vec![Ring::Edges(ring)];
            if r.chance(1, 8) {
                rings.push(Ring::Edges(vec![vertices, vertices + 1, vertices + 2]));
                vertices += 3;
            }
            faces.push(rings);
        }
    }
    Complex { name: String::new(), vertex_count: vertices as usize, faces, edge_uses: None }
}

fn ring(r: &mut Random, vertices: u32, repeats: bool) -> Vec<u32> {
    let longest = if repeats { 7 } else { 5.min(vertices) };
    let length = if r.chance(1, 6) { r.between(1, 2) } else { r.between(3, longest.max(3)) };
    if repeats && (length > 1 || r.chance(1, 2)) {
        return (0..length).map(|_| r.below(vertices)).collect();
    }
    let mut all: Vec<u32> = (0..vertices).collect();
    r.shuffle(&mut all);
    // A loop of one corner is a self-edge: only with repeats.
    all.truncate((length as usize).max(2));
    all
}

fn polygons(r: &mut Random, holes: bool) -> Complex {
    let vertices = r.between(3, 8);
    let repeats = r.chance(1, 2);
    let mut faces: Vec<Vec<Ring>> = Vec::new();
    for _ in 0..r.between(1, 6) {
        if r.chance(1, 8)
            && let Some(i) = r.below_len(faces.len())
        {
            faces.push(faces[i].clone());
            continue;
        }
        let mut rings = Vec::new();
        let loops = if holes && r.chance(1, 2) { r.between(2, 3) } else { 1 };
        for _ in 0..loops {
            if holes && r.chance(1, 4) {
                rings.push(Ring::Vertex(r.below(vertices)));
            } else {
                rings.push(Ring::Edges(ring(r, vertices, repeats)));
            }
        }
        faces.push(rings);
    }
    Complex { name: String::new(), vertex_count: vertices as usize, faces, edge_uses: None }
}

/// Any other complex with its edges numbered at random: several between the same two vertices, in
/// both directions, numbers in no order.
fn numbered(r: &mut Random) -> Complex {
    let mut complex = match r.below(4) {
        0 => soup(r, true),
        1 => closed(r),
        _ => {
            let holes = r.chance(1, 2);
            polygons(r, holes)
        }
    };
    let sides = complex.sides();
    let mut edges: Vec<(u32, u32)> = Vec::new();
    let mut using: Vec<(usize, u32, bool)> = Vec::new();
    for &(corner, start, end) in &sides {
        let joins = |edge: &(u32, u32)| *edge == (start, end) || *edge == (end, start);
        let known: Vec<u32> =
            (0..edges.len() as u32).filter(|&e| joins(&edges[e as usize])).collect();
        let edge = match r.below_len(known.len()) {
            Some(pick) if r.chance(4, 5) => known[pick],
            _ => {
                edges.push(if r.chance(1, 2) { (start, end) } else { (end, start) });
                edges.len() as u32 - 1
            }
        };
        let way = edges[edge as usize];
        let with = if start == end { r.chance(1, 2) } else { way == (start, end) };
        using.push((corner, edge, with));
    }
    let mut numbers: Vec<u32> = (0..edges.len() as u32).collect();
    if r.chance(1, 2) {
        r.shuffle(&mut numbers);
    }
    let corners = complex.to_list().as_list().corner_count();
    let mut uses = vec![EdgeUse::new(0, true); corners];
    for (corner, edge, with) in using {
        uses[corner] = EdgeUse::new(numbers[edge as usize], with);
    }
    complex.edge_uses = Some(uses);
    complex
}
