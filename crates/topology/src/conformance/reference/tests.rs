//! The reference against what is known of small complexes without any program: counts and
//! characteristics from textbooks, sectors and boundary loops drawn on paper.

use super::Reference;
use crate::conformance::named_complexes;
use crate::{Assemble, EdgeKind, Id, Topology, TopologyExt};

fn named(name: &str) -> Reference {
    let complex = named_complexes().into_iter().find(|complex| complex.name == name);
    let list = complex.unwrap_or_else(|| panic!("no complex \"{name}\"")).to_list();
    Reference::assemble(list.as_list()).unwrap()
}

/// How many corners each sector of a vertex has, and whether it is cyclic, by number.
fn sectors(mesh: &Reference, v: usize) -> Vec<(usize, bool)> {
    let v = mesh.vertex_at(v).unwrap();
    let sectors = mesh.sectors.get(&v);
    sectors.into_iter().flatten().map(|s| (s.corners.len(), s.cyclic)).collect()
}

fn kinds(mesh: &Reference, kind: EdgeKind) -> usize {
    mesh.edges().filter(|&e| mesh.edge_kind(e) == kind).count()
}

/// V, E, F, inner loops and V − E + F − R. The solids: Euler 1758; torus and Möbius band 0, disk 1
/// (any textbook of surfaces); the rest counted by hand.
#[test]
fn counts_are_those_of_the_textbooks() {
    let expected = [
        ("tetrahedron", [4, 6, 4, 0], 2),
        ("cube", [8, 12, 6, 0], 2),
        ("one triangle", [3, 3, 1, 0], 1),
        ("Möbius band", [5, 10, 5, 0], 0),
        ("a torus of one vertex and one face", [1, 2, 1, 0], 0),
        ("a pillow of two faces of two corners", [2, 1, 2, 0], 3),
        ("a vertex loop alone", [1, 0, 1, 0], 2),
        ("a square with a hole", [8, 8, 1, 1], 0),
        ("two triangles tip to tip", [5, 6, 2, 0], 1),
        ("three leaves on an edge", [5, 7, 3, 0], 1),
        ("two edges between two vertices", [2, 2, 2, 0], 2),
    ];
    for (name, counts, characteristic) in expected {
        let mesh = named(name);
        let found =
            [mesh.vertex_count(), mesh.edge_count(), mesh.face_count(), mesh.inner_loop_count()];
        assert_eq!((found, mesh.euler_characteristic()), (counts, characteristic), "{name}");
    }
}

#[test]
fn sectors_are_those_drawn_on_paper() {
    assert_eq!(sectors(&named("tetrahedron"), 0), [(3, true)]);
    assert_eq!(sectors(&named("two triangles tip to tip"), 0), [(1, false), (1, false)]);
    assert_eq!(sectors(&named("three leaves on an edge"), 0), [(1, false); 3]);
    assert_eq!(sectors(&named("three leaves on an edge"), 3), [(1, false)]);
    let fans = named("three open sectors, one of two");
    assert_eq!(sectors(&fans, 0), [(2, false), (1, false), (1, false)]);
    // Through a misoriented edge a sector goes on, from the end whose incoming side is free.
    assert_eq!(sectors(&named("a fan turned in the middle"), 0), [(3, false)]);
    assert_eq!(sectors(&named("a triangle and its reverse"), 0), [(2, true)]);
    assert_eq!(sectors(&named("a triangle and its copy"), 0), [(2, true)]);
    // All four edge ends of a torus of one square meet in one cycle of four corners.
    assert_eq!(sectors(&named("a torus of one vertex and one face"), 0), [(4, true)]);
    // A self-edge run there and back: each of the two corners closes on itself.
    assert_eq!(sectors(&named("a self-edge against itself in one loop"), 0), [(1, true); 2]);
    assert_eq!(sectors(&named("vertices alone"), 0), []);
}

#[test]
fn edges_are_of_the_kinds_drawn_on_paper() {
    let leaves = named("three leaves on an edge");
    assert_eq!((kinds(&leaves, EdgeKind::NonManifold), kinds(&leaves, EdgeKind::Boundary)), (1, 6));
    assert_eq!(kinds(&named("two triangles that run alike"), EdgeKind::Misoriented), 1);
    assert_eq!(kinds(&named("cube"), EdgeKind::Plain), 12);
    assert_eq!(kinds(&named("a triangle and its copy"), EdgeKind::Misoriented), 3);
    assert_eq!(kinds(&named("self-edges that run alike"), EdgeKind::Misoriented), 1);
}

/// The five-triangle Möbius band has one boundary, a pentagon; it is not orientable, so at least
/// one edge is misoriented however its triangles are turned.
#[test]
fn the_möbius_band_has_one_boundary_of_five_edges() {
    let mesh = named("Möbius band");
    let boundary = mesh.oriented_edges().find(|&h| mesh.radial(h) == h).unwrap();
    assert_eq!(mesh.boundary_loop(boundary).count(), 5);
    assert_eq!(kinds(&mesh, EdgeKind::Boundary), 5);
    assert!(kinds(&mesh, EdgeKind::Misoriented) > 0);
}

#[test]
fn a_removal_reports_the_edges_it_takes_along_and_leaves_the_rest_unmoved() {
    let mut mesh = named("tetrahedron");
    let [first, second] = [0, 1].map(|f| mesh.face_at(f).unwrap());
    assert!(mesh.remove_face(first).unwrap().retired_edges.is_empty());
    // Faces 0 (0 1 2) and 1 (0 2 3) share edge 0 2, numbered 2 as the third edge listed.
    let retired = mesh.remove_face(second).unwrap().retired_edges;
    assert_eq!(retired.iter().map(|e| e.index()).collect::<Vec<_>>(), [2]);
    assert_eq!((mesh.edge_count(), mesh.edge_bound()), (5, 6));
    assert_eq!(mesh.faces().map(|f| f.index()).collect::<Vec<_>>(), [2, 3]);
    let moved = mesh.compact();
    assert_eq!(
        moved.faces.targets().iter().flatten().map(|f| f.index()).collect::<Vec<_>>(),
        [0, 1]
    );
    assert_eq!((mesh.edge_bound(), mesh.face_bound(), mesh.oriented_edge_bound()), (5, 2, 6));
}
