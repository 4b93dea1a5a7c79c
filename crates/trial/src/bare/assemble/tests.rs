use super::*;
use crate::bare::hash_map;
use crate::shapes::{TriangleMesh, bipyramid, fan, icosphere, soup};

/// Assembles both ways and by hash map, asserts that they agree, and hands one over.
fn build(triangles: &[[u32; 3]], vertices: usize) -> Adjacency {
    let mapped = hash_map::assemble(triangles, vertices);
    let (mut by_start, mut by_lower) = (Adjacency::default(), Adjacency::default());
    start::assemble(triangles, vertices, &mut start::Scratch::default(), &mut by_start).unwrap();
    lower::assemble(triangles, vertices, &mut lower::Scratch::default(), &mut by_lower).unwrap();
    assert_eq!(by_start, mapped);
    assert_eq!(by_lower, mapped);
    mapped
}

fn free(turn: u32) -> u32 {
    turn | NOT_PLAIN
}

fn counts(boundary: usize, non_manifold: usize, misoriented: usize) -> EdgeCounts {
    EdgeCounts { boundary, non_manifold, misoriented }
}

#[test]
fn tetrahedron_by_hand() {
    let mesh = build(&[[0, 2, 1], [0, 1, 3], [0, 3, 2], [1, 2, 3]], 4);
    assert_eq!(mesh.end, [2, 1, 0, 1, 3, 0, 3, 2, 0, 2, 3, 1]);
    // 0: 0→2 lies on 2→0, side 8, and the next of that is 6. 1: 2→1 on 1→2, side 9, next 10. …
    assert_eq!(mesh.turn, [6, 10, 4, 0, 9, 7, 3, 11, 1, 2, 8, 5]);
    assert_eq!(mesh.outgoing, [6, 9, 10, 11]);
    assert!(mesh.counts.all_plain());
}

#[test]
fn two_triangles_by_hand() {
    let mesh = build(&[[0, 1, 2], [2, 1, 3]], 5);
    assert_eq!(mesh.end, [1, 2, 0, 1, 3, 2]);
    assert_eq!(mesh.turn, [free(1), 4, free(0), 2, free(5), free(3)]);
    // Vertex 1: 0→1 comes in without a partner, side 1 is behind it. Vertex 2: 3→2, side 3.
    assert_eq!(mesh.outgoing, [0, 1, 3, 5, NONE]);
    assert_eq!(mesh.counts, counts(4, 0, 0));
}

#[test]
fn three_triangles_on_one_edge_by_hand() {
    let mesh = build(&[[0, 1, 2], [1, 0, 3], [0, 1, 4]], 5);
    // Uses 0, 3, 6 of the edge 0-1: radial 0 → 3 → 6 → 0, then next of each.
    assert_eq!((mesh.turn[0], mesh.turn[3], mesh.turn[6]), (free(4), free(7), free(1)));
    assert_eq!(mesh.counts, counts(6, 1, 0));
}

#[test]
fn misoriented_pair_by_hand() {
    let mesh = build(&[[0, 1, 2], [0, 1, 3]], 4);
    assert_eq!(mesh.turn, [free(4), free(2), free(0), free(1), free(5), free(3)]);
    assert_eq!(mesh.counts, counts(4, 0, 1));
}

#[test]
fn two_closed_sheets_on_the_same_vertices_are_non_manifold_everywhere() {
    // Each edge has two uses each way: pairing them off would hide that.
    let one = [[0, 2, 1], [0, 1, 3], [0, 3, 2], [1, 2, 3]];
    let mesh = build(&[one, one].concat(), 4);
    assert_eq!(mesh.counts, counts(0, 6, 0));
    assert!(mesh.turn.iter().all(|turn| turn & NOT_PLAIN != 0));
}

#[test]
fn spheres_have_euler_characteristic_2_and_turn_around_every_vertex() {
    for mesh in [icosphere(0), icosphere(4), icosphere(3).shuffled(11), bipyramid(300)] {
        let links = build(&mesh.triangles, mesh.points.len());
        assert!(links.counts.all_plain());
        let edges = links.turn.len() / 2;
        assert_eq!(mesh.points.len() + mesh.triangles.len() - edges, 2);
        let mut corners = 0;
        for (v, &first) in links.outgoing.iter().enumerate() {
            let mut side = first;
            loop {
                assert_eq!(links.end[previous_side(side) as usize] as usize, v);
                corners += 1;
                side = links.turn[side as usize];
                if side == first {
                    break;
                }
            }
        }
        assert_eq!(corners, links.end.len());
    }
}

#[test]
fn designs_agree_on_soups_of_every_density() {
    for seed in 0..300 {
        let vertices = 3 + (seed as u32 * 7) % 90;
        let mesh = soup(vertices, 1 + (seed as usize * 13) % 120, seed);
        build(&mesh.triangles, mesh.points.len());
    }
}

#[test]
fn hubs_and_long_edges_agree() {
    let fan = fan(1000);
    assert_eq!(build(&fan.triangles, fan.points.len()).counts, counts(1000, 0, 0));
    let hub = bipyramid(2000).shuffled(3);
    assert!(build(&hub.triangles, hub.points.len()).counts.all_plain());
    // A thousand triangles on one edge.
    let book: Vec<[u32; 3]> = (2..1002).map(|v| [v % 2, 1 - v % 2, v]).collect();
    assert_eq!(build(&book, 1002).counts, counts(2000, 1, 0));
}

#[test]
fn neighbours_that_fall_on_one_place_of_the_table_are_told_apart() {
    // Vertex numbers 1024 apart: the rim of a fan collides in the small table.
    let fan = fan(6);
    let wide: Vec<_> = fan.triangles.iter().map(|t| t.map(|v| v * 1024)).collect();
    let (near, far) = (build(&fan.triangles, 7), build(&wide, 6 * 1024 + 1));
    assert_eq!((near.turn, near.counts), (far.turn, far.counts));
}

#[test]
fn scratch_and_arrays_can_be_used_again_for_any_mesh() {
    let (mut scratch, mut lower_scratch) = Default::default();
    let (mut one, mut other) = (Adjacency::default(), Adjacency::default());
    let meshes = [icosphere(3), soup(20, 60, 1), icosphere(1), TriangleMesh::default(), fan(30)];
    for mesh in meshes {
        let vertices = mesh.points.len();
        start::assemble(&mesh.triangles, vertices, &mut scratch, &mut one).unwrap();
        lower::assemble(&mesh.triangles, vertices, &mut lower_scratch, &mut other).unwrap();
        let fresh = hash_map::assemble(&mesh.triangles, vertices);
        assert_eq!((&one, &other), (&fresh, &fresh));
    }
}

#[test]
fn bad_triangles_are_refused_with_their_number() {
    let (mut scratch, mut lower_scratch) = Default::default();
    let mut out = Adjacency::default();
    for (bad, error) in [
        ([1, 2, 4], AssembleError::Vertex { triangle: 1, vertices: 4 }),
        ([1, 2, u32::MAX], AssembleError::Vertex { triangle: 1, vertices: 4 }),
        ([1, 2, 2], AssembleError::Repeated { triangle: 1 }),
        ([1, 2, 1], AssembleError::Repeated { triangle: 1 }),
    ] {
        let triangles = [[0, 1, 2], bad];
        assert_eq!(start::assemble(&triangles, 4, &mut scratch, &mut out), Err(error.clone()));
        assert_eq!(lower::assemble(&triangles, 4, &mut lower_scratch, &mut out), Err(error));
    }
}
