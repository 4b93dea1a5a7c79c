//! What kernels report of their heap against what the allocator counts.
//!
//! One test only: the count is of the whole process, so nothing else may run beside it.

use merestone_kernels::HalfEdge;
use merestone_topology::{Assemble, EdgeUse, FaceId, FaceList, FaceListBuf, VertexId};
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

#[test]
fn kernels_report_exactly_what_they_hold() {
    let closed = torus(30);
    compare::<HalfEdge>("closed triangles", FaceList::triangles(900, &closed));

    // Six links for each oriented edge, one entry for each edge, face and vertex.
    let mesh = HalfEdge::assemble(FaceList::triangles(900, &closed)).unwrap();
    assert_eq!(merestone_topology::Topology::footprint(&mesh).bytes(), 84 * closed.len());
    drop(mesh);

    let open = &closed[7..1500];
    compare::<HalfEdge>("open triangles", FaceList::triangles(905, open));

    let turned: Vec<[u32; 3]> = (closed.iter().enumerate())
        .map(|(t, &[a, b, c])| if t % 5 == 0 { [a, c, b] } else { [a, b, c] })
        .collect();
    compare::<HalfEdge>("misoriented triangles", FaceList::triangles(900, &turned));

    let doubled = [&closed[..], &turned[..400]].concat();
    compare::<HalfEdge>("triangles on edges of many uses", FaceList::triangles(900, &doubled));

    let hub: Vec<[u32; 3]> = (0..500).map(|i| [0, 1 + i, 1 + (i + 1) % 500]).collect();
    compare::<HalfEdge>("a hub", FaceList::triangles(501, &hub));

    compare::<HalfEdge>("nothing", FaceList::triangles(0, &[]));

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
}
