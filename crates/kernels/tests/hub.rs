//! A vertex of 100,000 corners: what would take minutes if anything about it were quadratic.

use merestone_kernels::{HalfEdge, TriangleAdjacency};
use merestone_topology::{Assemble, FaceList, FaceListBuf, Id, TopologyExt};

const VALENCE: u32 = 100_000;

/// A ring of vertices joined to two apexes, in an order that jumps around the ring.
fn double_cone() -> Vec<[u32; 3]> {
    // 7 does not divide the valence, so every place of the ring comes once.
    let ring = (0..VALENCE).map(|i| i * 7 % VALENCE).map(|i| (2 + i, 2 + (i + 1) % VALENCE));
    ring.flat_map(|(a, b)| [[0, a, b], [1, b, a]]).collect()
}

/// Checks by what a double cone is: closed, one ring of corners around each apex, Euler's number 2.
fn check<K: Assemble>(name: &str, list: FaceList<'_>) {
    let mesh = K::assemble(list).unwrap();
    let valence = VALENCE as usize;
    assert_eq!(mesh.edge_count(), 3 * valence, "{name}: V - E + F = 2");
    assert!(mesh.oriented_edges().all(|h| mesh.is_plain(h)), "{name}");
    for apex in [0, 1] {
        let apex = mesh.vertex_at(apex).unwrap();
        assert_eq!(mesh.vertex_sectors(apex).count(), 1, "{name}");
        // Around an apex, each corner's edge ends where the face before it came from.
        let first = mesh.sector(apex, 0).unwrap();
        let mut corner = first;
        for _ in 0..valence {
            assert_eq!(mesh.start(corner), apex, "{name}");
            let behind = mesh.turn(corner).unwrap();
            assert_eq!(mesh.end(corner), mesh.start(mesh.prev(behind)), "{name}");
            corner = behind;
        }
        assert_eq!(corner, first, "{name}: once around");
        let mut spokes: Vec<_> = mesh.vertex_corners(apex).map(|h| mesh.end(h).index()).collect();
        spokes.sort_unstable();
        assert!(spokes.into_iter().eq(2..2 + valence), "{name}: every ring vertex once");
    }
    for ring in 2..2 + valence {
        let vertex = mesh.vertex_at(ring).unwrap();
        assert_eq!(mesh.vertex_corners(vertex).count(), 4, "{name}");
        assert!(mesh.sector(vertex, 1).is_none(), "{name}");
    }
}

#[test]
fn a_hub_of_100_000_corners_is_assembled_right() {
    let triangles = double_cone();
    let list = FaceList::triangles(VALENCE as usize + 2, &triangles);
    check::<TriangleAdjacency>("triangle", list);
    check::<HalfEdge>("half-edge", list);
    // The same loops kept as polygons, beside a face that is a vertex alone.
    let mut loops = FaceListBuf::new(VALENCE as usize + 3);
    loops.push_vertex_face(VALENCE + 2);
    triangles.iter().for_each(|corners| loops.push_face(corners));
    check::<HalfEdge>("half-edge, loops", loops.as_list());
}

#[test]
fn a_hub_open_between_every_two_triangles_has_a_sector_for_each() {
    let count = VALENCE / 2;
    let triangles: Vec<_> = (0..count).map(|i| [0, 1 + 2 * i, 2 + 2 * i]).collect();
    let list = FaceList::triangles(1 + VALENCE as usize, &triangles);
    fn handles<K: Assemble>(list: FaceList<'_>) -> Vec<usize> {
        let mesh = K::assemble(list).unwrap();
        let apex = mesh.vertex_at(0).unwrap();
        mesh.vertex_sectors(apex).map(Id::index).collect()
    }
    let expected: Vec<usize> = (0..count as usize).map(|i| 3 * i).collect();
    assert_eq!(handles::<TriangleAdjacency>(list), expected);
    assert_eq!(handles::<HalfEdge>(list), expected);
}
