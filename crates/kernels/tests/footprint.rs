//! What kernels report of their heap against what the allocator counts.
//!
//! The count is of the whole process, so this runs alone, without a test harness and its threads.

use merestone_kernels::{HalfEdge, TriangleAdjacency};
use merestone_topology::{Assemble, EdgeUse, FaceId, FaceList, FaceListBuf, Topology, VertexId};
use peak_alloc::PeakAlloc;

#[global_allocator]
static HEAP: PeakAlloc = PeakAlloc;

/// Assembles and compares bytes and peak; then removes and compacts, comparing bytes again.
fn compare<K: Assemble<Face = FaceId, Vertex = VertexId>>(name: &str, list: FaceList<'_>) {
    let before = HEAP.current_usage();
    HEAP.reset_peak_usage();
    let mut mesh = K::assemble(list).unwrap();
    let (held, peak) = (HEAP.current_usage() - before, HEAP.peak_usage() - before);
    let footprint = mesh.footprint();
    assert_eq!(footprint.bytes(), held, "{name}, bytes: {:?}", footprint.arrays);
    assert_eq!(footprint.assembly_peak, peak, "{name}, peak");
    drop(footprint);

    for face in (0..list.face_count()).step_by(3) {
        drop(mesh.remove_face(FaceId::from_u32(face as u32)).unwrap());
    }
    for vertex in 0..list.vertex_count() {
        // Some are in use: refused, and nothing held.
        let _ = mesh.remove_isolated_vertex(VertexId::from_u32(vertex as u32));
    }
    let held = HEAP.current_usage() - before;
    let footprint = mesh.footprint();
    assert_eq!(footprint.bytes(), held, "{name}, after removals: {:?}", footprint.arrays);
    assert_eq!(footprint.assembly_peak, peak, "{name}, the peak is of assembling");
    drop(footprint);

    drop(mesh.compact());
    let held = HEAP.current_usage() - before;
    assert_eq!(mesh.footprint().bytes(), held, "{name}, compacted");
    assert_eq!(mesh.footprint().retired(), 0, "{name}, compacted");
}

/// A grid of squares on a torus, two triangles each.
fn torus(n: u32) -> Vec<[u32; 3]> {
    let v = |i: u32, j: u32| i % n * n + j % n;
    let squares = (0..n * n).map(|k| (k / n, k % n));
    let halves = squares.flat_map(|(i, j)| {
        let [a, b, c, d] = [v(i, j), v(i + 1, j), v(i + 1, j + 1), v(i, j + 1)];
        [[a, b, c], [a, c, d]]
    });
    halves.collect()
}

/// The same for both kernels, with the edges told by their vertices and by number.
fn compare_triangles(name: &str, vertices: usize, triangles: &[[u32; 3]]) {
    let list = FaceList::triangles(vertices, triangles);
    compare::<HalfEdge>(&format!("half-edge, {name}"), list);
    compare::<TriangleAdjacency>(&format!("triangle, {name}"), list);
    let mesh = HalfEdge::assemble(list).unwrap();
    let uses = mesh.oriented_edges();
    let uses = uses.map(|h| EdgeUse::new(mesh.edge(h).to_u32(), mesh.runs_with_edge(h)));
    let uses: Vec<EdgeUse> = uses.collect();
    drop(mesh);
    let list = list.with_edges(&uses).unwrap();
    compare::<HalfEdge>(&format!("half-edge, {name}, by number"), list);
    compare::<TriangleAdjacency>(&format!("triangle, {name}, by number"), list);
}

fn main() {
    let closed = torus(30);
    compare_triangles("closed", 900, &closed);

    // Six links for each oriented edge, one entry for each edge, face and vertex.
    let mesh = HalfEdge::assemble(FaceList::triangles(900, &closed)).unwrap();
    assert_eq!(mesh.footprint().bytes(), 84 * closed.len());
    // Two links for each side, one entry for each vertex.
    let mesh = TriangleAdjacency::assemble(FaceList::triangles(900, &closed)).unwrap();
    assert_eq!(mesh.footprint().bytes(), 26 * closed.len());
    drop(mesh);

    compare_triangles("open", 905, &closed[7..1500]);

    let turned: Vec<[u32; 3]> = (closed.iter().enumerate())
        .map(|(t, &[a, b, c])| if t % 5 == 0 { [a, c, b] } else { [a, b, c] })
        .collect();
    compare_triangles("misoriented", 900, &turned);

    let doubled = [&closed[..], &turned[..400]].concat();
    compare_triangles("on edges of many uses", 900, &doubled);

    let repeating: Vec<[u32; 3]> = (0..90).map(|i| [i % 7, i % 7, i % 11]).collect();
    compare_triangles("with repeated vertices", 11, &repeating);

    let hub: Vec<[u32; 3]> = (0..500).map(|i| [0, 1 + i, 1 + (i + 1) % 500]).collect();
    compare_triangles("a hub", 501, &hub);

    compare_triangles("nothing", 0, &[]);
    compare_triangles("vertices alone", 70, &[]);

    let mut list = FaceListBuf::new(60);
    for i in 0..20 {
        list.push_face(&[i, i + 1, i + 2, i + 20]);
        list.push_inner_loop(&[i + 5, i + 9]);
        list.push_inner_vertex_loop(i + 40);
        list.push_face(&[i, i + 1, i + 30, i + 7, i + 3]);
        list.push_vertex_face(i + 35);
    }
    compare::<HalfEdge>("polygons with holes", list.as_list());
    let uses = (0..list.as_list().corner_count() as u32).map(|e| EdgeUse::new(e, e % 2 == 0));
    let uses: Vec<_> = uses.collect();
    let mut loops_only = FaceListBuf::new(60);
    (0..20).for_each(|i| loops_only.push_face(&[i, i + 1, i + 2, i + 20]));
    loops_only.set_edges(uses[..80].to_vec()).unwrap();
    compare::<HalfEdge>("edges by number", loops_only.as_list());
    // Each vertex loop has a corner and so an edge use, which says nothing.
    let mut with_loops = FaceListBuf::new(60);
    for i in 0..20 {
        with_loops.push_face(&[i, i + 1, i + 2]);
        with_loops.push_inner_vertex_loop(i + 40);
    }
    let uses = (0..80).map(|c| EdgeUse::new(if c % 4 == 3 { 0 } else { c / 4 * 3 + c % 4 }, true));
    with_loops.set_edges(uses.collect()).unwrap();
    compare::<HalfEdge>("edges by number beside vertex loops", with_loops.as_list());
}
