//! Small cases worked out by hand.

use crate::HalfEdge;
use merestone_topology::*;

fn h(index: u32) -> OrientedEdgeId {
    OrientedEdgeId::from_u32(index)
}

fn v(index: u32) -> VertexId {
    VertexId::from_u32(index)
}

fn f(index: u32) -> FaceId {
    FaceId::from_u32(index)
}

fn triangles(vertex_count: usize, list: &[[u32; 3]]) -> HalfEdge {
    HalfEdge::assemble(FaceList::triangles(vertex_count, list)).unwrap()
}

fn handles(mesh: &HalfEdge, at: u32) -> Vec<u32> {
    mesh.vertex_sectors(v(at)).map(OrientedEdgeId::to_u32).collect()
}

#[test]
fn an_open_sector_begins_where_nothing_leads_in() {
    // Three triangles around vertex 0, open between 4 and 1, listed out of order.
    let mesh = triangles(6, &[[0, 2, 3], [0, 1, 2], [0, 3, 4]]);
    // The side from 4 to 0 has no twin, so the corner it enters comes first; a turn then goes
    // to the triangle across the side that leaves: from (0, 3, 4) to (0, 2, 3) to (0, 1, 2).
    assert_eq!(handles(&mesh, 0), [6]);
    assert!(mesh.vertex_corners(v(0)).eq([h(6), h(0), h(3)]));
    assert_eq!(handles(&mesh, 5), []);
}

#[test]
fn leaves_on_one_edge_form_a_cycle_in_list_order_and_open_again_when_removed() {
    let mut mesh = triangles(5, &[[0, 1, 2], [1, 0, 3], [0, 1, 4]]);
    let e = mesh.edge(h(0));
    assert!(mesh.edge_uses(e).eq([h(0), h(3), h(6)]));
    assert_eq!([0, 3, 6].map(|i| mesh.runs_with_edge(h(i))), [true, false, true]);
    assert_eq!((mesh.edge_kind(e), handles(&mesh, 0)), (EdgeKind::NonManifold, vec![0, 4, 6]));

    let removed = mesh.remove_face(f(0)).unwrap();
    assert_eq!(removed.retired_edges, [EdgeId::from_u32(1), EdgeId::from_u32(2)]);
    assert_eq!((mesh.edge_kind(e), handles(&mesh, 0).len()), (EdgeKind::Plain, 1));
    assert_eq!(mesh.edge_use(e), h(3));
    assert_eq!(mesh.remove_face(f(0)), Err(EditError::stale("face", f(0))));
    assert_eq!(mesh.remove_isolated_vertex(v(2)), Ok(()));
    let in_use = EditError::VertexInUse { vertex: 3, face: 1 };
    assert_eq!(mesh.remove_isolated_vertex(v(3)), Err(in_use));

    let moved = mesh.compact();
    assert_eq!((moved.faces.get(f(2)), moved.vertices.get(v(4))), (Some(f(1)), Some(v(3))));
    assert_eq!(mesh.index_buffer(), Some(&[[1, 0, 2], [0, 1, 3]][..]));
}

#[test]
fn uses_of_a_self_edge_run_with_and_against_it_in_turn() {
    let mut list = FaceListBuf::new(1);
    (0..3).for_each(|_| list.push_face(&[0]));
    let mesh = HalfEdge::assemble(list.as_list()).unwrap();
    assert_eq!((mesh.edge_count(), mesh.next(h(1))), (1, h(1)));
    assert_eq!([0, 1, 2].map(|i| mesh.runs_with_edge(h(i))), [true, false, true]);
    // Three uses: no two corners are joined. Two would be, in one ring.
    assert_eq!(handles(&mesh, 0), [0, 1, 2]);
    list = FaceListBuf::new(1);
    (0..2).for_each(|_| list.push_face(&[0]));
    let mesh = HalfEdge::assemble(list.as_list()).unwrap();
    assert_eq!((mesh.turn(h(0)), handles(&mesh, 0)), (Some(h(1)), vec![0]));
}

#[test]
fn vertex_loops_take_no_oriented_edge_and_leave_with_their_face() {
    let mut list = FaceListBuf::new(5);
    list.push_vertex_face(3);
    list.push_face(&[0, 1, 2]);
    list.push_inner_vertex_loop(3);
    list.push_inner_vertex_loop(0);
    let mut mesh = HalfEdge::assemble(list.as_list()).unwrap();
    assert_eq!((mesh.oriented_edge_count(), mesh.inner_loop_count()), (3, 2));
    assert!(mesh.vertex_faces(v(3)).eq([f(0), f(1)]));
    assert!(mesh.vertex_faces(v(0)).eq([f(1), f(1)]));
    assert_eq!(mesh.bound(f(1), 2), Some(FaceBound::VertexLoop(v(0))));
    assert_eq!(mesh.bound(f(1), 3), None);
    mesh.remove_face(f(1)).unwrap();
    assert!(mesh.vertex_faces(v(3)).eq([f(0)]) && mesh.vertex_loop(v(0), 0).is_none());
    assert_eq!((mesh.inner_loop_count(), mesh.edge_count()), (0, 0));
}

#[test]
fn edges_by_number_may_join_the_same_vertices_and_must_not_contradict() {
    let mut list = FaceListBuf::new(2);
    list.push_face(&[0, 1]);
    list.push_face(&[0, 1]);
    let mut assemble = |uses: [(u32, bool); 4]| {
        list.set_edges(uses.map(|(e, with)| EdgeUse::new(e, with)).to_vec()).unwrap();
        HalfEdge::assemble(list.as_list())
    };
    let mesh = assemble([(0, true), (1, true), (0, true), (1, true)]).unwrap();
    assert_eq!((mesh.edge_count(), mesh.edge_kind_at(h(0))), (2, EdgeKind::Misoriented));
    let refused = |edge, corner| FaceListError::InconsistentEdge { edge, corner }.into();
    let error = assemble([(0, true), (1, true), (0, true), (1, false)]).unwrap_err();
    assert_eq!(error, refused(1, 3));
    // No memory is taken for a number far beyond the corners.
    let error = assemble([(0, true), (1, true), (u32::MAX >> 1, true), (1, true)]).unwrap_err();
    assert_eq!(error, refused(2, 2));
}

#[test]
fn two_fans_at_one_vertex_are_two_sectors_whatever_the_valence() {
    // Vertices with up to 8, up to 16 and more corners are paired by three different ways.
    for n in [3, 6, 20] {
        let ring = |from: u32| (0..n).map(move |i| [0, from + i, from + (i + 1) % n]);
        let mesh = triangles(2 * n as usize + 1, &ring(1).chain(ring(1 + n)).collect::<Vec<_>>());
        assert_eq!(handles(&mesh, 0), [0, 3 * n]);
        assert_eq!(mesh.vertex_corners(v(0)).count(), 2 * n as usize);
        assert!(mesh.oriented_edges().all(|h| mesh.is_plain(h) == (h.to_u32() % 3 != 1)));
    }
}
