//! Complexes picked by hand, and all tiny ones.

use super::{Complex, Ring};
use crate::EdgeUse;

/// Complexes that each have one feature kernels get wrong.
#[must_use]
pub fn named_complexes() -> Vec<Complex> {
    let triangles = |name: &str, n: usize, list: &[[u32; 3]]| Complex::triangles(name, n, list);
    let polygons = |name: &str, n: usize, list: &[&[u32]]| {
        Complex::polygons(name, n, list.iter().map(|corners| corners.to_vec()))
    };
    let mut all = vec![
        triangles("nothing", 0, &[]),
        triangles("vertices alone", 3, &[]),
        triangles("one triangle", 3, &[[0, 1, 2]]),
        triangles("a triangle and vertices no face uses", 6, &[[1, 3, 4]]),
        triangles("tetrahedron", 4, &[[0, 1, 2], [0, 2, 3], [0, 3, 1], [1, 3, 2]]),
        triangles("two triangles that run alike", 4, &[[0, 1, 2], [0, 1, 3]]),
        triangles("three leaves on an edge", 5, &[[0, 1, 2], [1, 0, 3], [0, 1, 4]]),
        triangles("a triangle and its copy", 3, &[[0, 1, 2], [0, 1, 2]]),
        triangles("a triangle and its reverse", 3, &[[0, 1, 2], [2, 1, 0]]),
        triangles("three copies", 3, &[[0, 1, 2], [1, 2, 0], [2, 0, 1]]),
        triangles("two triangles tip to tip", 5, &[[0, 1, 2], [0, 3, 4]]),
        triangles(
            "three open sectors, one of two",
            8,
            &[[0, 1, 2], [3, 4, 0], [0, 5, 6], [0, 2, 7]],
        ),
        triangles("a fan turned in the middle", 5, &[[0, 1, 2], [0, 3, 2], [0, 3, 4]]),
        triangles("a fan whose ends both go out", 4, &[[0, 1, 2], [0, 3, 2]]),
        triangles("a fan whose ends both come in", 4, &[[0, 2, 1], [0, 2, 3]]),
        triangles("Möbius band", 5, &[[0, 1, 2], [1, 3, 2], [2, 3, 4], [3, 0, 4], [4, 0, 1]]),
        triangles("a vertex twice in a triangle", 3, &[[0, 0, 1], [1, 2, 0]]),
        triangles("a vertex thrice in a triangle", 1, &[[0, 0, 0]]),
        triangles("self-edges of several triangles", 2, &[[0, 0, 1], [0, 1, 0], [1, 0, 0]]),
        polygons("square", 4, &[&[0, 1, 2, 3]]),
        polygons("two corners", 2, &[&[0, 1]]),
        polygons("a pillow of two faces of two corners", 2, &[&[0, 1], &[0, 1]]),
        polygons("one corner", 1, &[&[0]]),
        polygons("one corner twice", 1, &[&[0], &[0]]),
        polygons("an edge used twice by one face", 4, &[&[0, 1, 2, 1, 3]]),
        polygons("a loop that passes a vertex twice", 5, &[&[0, 1, 2, 0, 3, 4]]),
        polygons("a loop to and fro", 2, &[&[0, 1, 0, 1]]),
        polygons("many corners on one self-edge", 1, &[&[0, 0, 0, 0, 0]]),
        polygons("a dart twice round", 3, &[&[0, 1, 2, 0, 1, 2]]),
        polygons(
            "cube",
            8,
            &[
                &[0, 3, 2, 1],
                &[4, 5, 6, 7],
                &[0, 1, 5, 4],
                &[1, 2, 6, 5],
                &[2, 3, 7, 6],
                &[3, 0, 4, 7],
            ],
        ),
    ];
    let ringed = |name: &str, vertex_count, faces| Complex {
        name: name.to_owned(),
        vertex_count,
        faces,
        edge_uses: None,
    };
    let edges = |corners: &[u32]| Ring::Edges(corners.to_vec());
    all.extend([
        ringed("a vertex loop alone", 1, vec![vec![Ring::Vertex(0)]]),
        ringed(
            "vertex loops at one vertex",
            2,
            vec![vec![Ring::Vertex(1), Ring::Vertex(1)], vec![Ring::Vertex(1)]],
        ),
        ringed("a square with a hole", 8, vec![vec![edges(&[0, 1, 2, 3]), edges(&[4, 7, 6, 5])]]),
        ringed(
            "a hole that is filled",
            8,
            vec![vec![edges(&[0, 1, 2, 3]), edges(&[4, 7, 6, 5])], vec![edges(&[4, 5, 6, 7])]],
        ),
        ringed(
            "a hole, a vertex loop, a hole that touches",
            9,
            vec![vec![edges(&[0, 1, 2, 3]), Ring::Vertex(8), edges(&[0, 5, 4])]],
        ),
        ringed(
            "a vertex loop as the outer bound",
            4,
            vec![vec![Ring::Vertex(3), edges(&[0, 1, 2])]],
        ),
    ]);
    let numbered = |name: &str, n: usize, loops: &[&[u32]], uses: &[(u32, bool)]| {
        let mut complex = polygons(name, n, loops);
        complex.edge_uses = Some(uses.iter().map(|&(e, with)| EdgeUse::new(e, with)).collect());
        complex
    };
    all.extend([
        numbered(
            "two edges between two vertices",
            2,
            &[&[0, 1], &[1, 0]],
            &[(1, true), (0, false), (1, false), (0, true)],
        ),
        numbered(
            "triangles kept apart along a seam",
            3,
            &[&[0, 1, 2], &[1, 0, 2]],
            &[(0, true), (1, true), (2, true), (3, true), (2, false), (1, false)],
        ),
        numbered("self-edges that run alike", 1, &[&[0], &[0]], &[(0, false), (0, false)]),
        numbered(
            "a self-edge of each face",
            1,
            &[&[0], &[0], &[0]],
            &[(2, true), (1, false), (0, true)],
        ),
        numbered("a self-edge against itself in one loop", 1, &[&[0, 0]], &[(0, true), (0, false)]),
        numbered(
            "a torus of one vertex and one face",
            1,
            &[&[0, 0, 0, 0]],
            &[(0, true), (1, true), (0, false), (1, false)],
        ),
    ]);
    all
}

/// All lists of one to `most` triangles on four vertices, each triangle with three different ones,
/// up to the names of the vertices (so that the first is always the same): 1, 8, 64, … of them.
pub fn tiny_triangle_lists(most: usize) -> impl Iterator<Item = Complex> {
    let triangles = cyclic_classes(4, |[a, b, c]| a != b && b != c && c != a);
    let all = (1..=most).flat_map(move |length| lists_of(&triangles, 4, length));
    all.filter(|complex| complex.faces[0] == [Ring::Edges(vec![0, 1, 2])])
}

/// All lists of one to `most` triangles on three vertices, repeats allowed: 11, 121, … of them.
pub fn tiny_degenerate_lists(most: usize) -> impl Iterator<Item = Complex> {
    let triangles = cyclic_classes(3, |_| true);
    (1..=most).flat_map(move |length| lists_of(&triangles, 3, length))
}

/// Triangles up to rotation, by their lowest form.
fn cyclic_classes(vertices: u32, wanted: impl Fn([u32; 3]) -> bool) -> Vec<[u32; 3]> {
    let all = (0..vertices.pow(3))
        .map(|code| [code / vertices / vertices, code / vertices % vertices, code % vertices]);
    all.filter(|&[a, b, c]| [a, b, c] <= [b, c, a] && [a, b, c] <= [c, a, b])
        .filter(|&triangle| wanted(triangle))
        .collect()
}

fn lists_of(triangles: &[[u32; 3]], vertices: usize, length: usize) -> Vec<Complex> {
    let n = triangles.len();
    let list = |code: usize| {
        let digits = (0..length as u32).map(|place| code / n.pow(place) % n);
        let list: Vec<[u32; 3]> = digits.map(|digit| triangles[digit]).collect();
        Complex::triangles(&format!("{list:?}"), vertices, &list)
    };
    (0..n.pow(length as u32)).map(list).collect()
}
