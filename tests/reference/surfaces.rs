//! Surfaces and complexes that bound nothing, and exactly why not.

use crate::values::{Model, read_some};
use merestone::geometry::{DefectCell, DefectKind, MeshReport, ReportOptions};
use merestone::topology::floods::{Orientation, Survey, fan_count};
use merestone::topology::views::{Defect, Manifold, SolidBoundary};
use merestone::topology::{Assemble, EdgeKind, Id, Topology, TopologyExt};

/// Surfaces of one side: the six-vertex projective plane (the icosahedron with opposite points
/// made one), the tetrahemihexahedron, Klein bottles and Möbius bands. Every edge has at most two
/// uses, so that only a walk that carries the orientation along can refuse them.
pub(crate) fn one_sided<K: Assemble>(holds_polygons: bool) {
    let closed =
        ["projective_plane_6", "tetrahemihexahedron", "klein_bottle_4x4", "klein_bottle_5x3"];
    let bands = ["moebius_band_5", "moebius_band_24"];
    let mut held = 0;
    for model in read_some("surfaces_nonorientable.json", &[&closed[..], &bands[..]].concat()) {
        if let Some(mesh) = model.held_by::<K>() {
            check_one_sided(&model, mesh.topology());
            held += 1;
        }
    }
    // Three faces of the tetrahemihexahedron are squares.
    assert_eq!(held, if holds_polygons { 6 } else { 5 });
}

fn check_one_sided<K: Topology>(model: &Model, k: &K) {
    let name = &model.name;
    let survey = Survey::of(k);
    check_counts(model, &survey);
    assert!(!survey.orientable && survey.is_manifold(), "{name}");
    assert_eq!(survey.genus(), None, "{name}");
    assert_eq!(Some(survey.is_closed()), model.closed, "{name}");
    assert_eq!(survey.boundary_edges, model.boundary_edges.unwrap_or(0), "{name}");
    assert_eq!(survey.boundary_loops, model.boundary_loops.unwrap_or(0), "{name}");
    if let Some(demigenus) = model.demigenus {
        assert_eq!(survey.euler_characteristic(), 2 - demigenus, "{name}");
    }
    if let Some(edges) = model.edges_inconsistent_as_listed {
        assert_eq!(survey.misoriented_edges, edges, "{name}");
    }
    // As a manifold nothing is wrong with it.
    assert!(Manifold::new(k).is_ok(), "{name}");
    let defects = SolidBoundary::new(k).err().expect(name);
    let count = |kind: fn(&Defect<K::Vertex, K::Edge>) -> bool| {
        defects.list().iter().filter(|defect| kind(defect)).count()
    };
    assert_eq!(count(|defect| matches!(defect, Defect::NonOrientable { .. })), 1, "{name}");
    let edges = count(|defect| matches!(defect, Defect::BoundaryEdge { .. }));
    assert_eq!(edges, survey.boundary_edges, "{name}");
    let misoriented = count(|defect| matches!(defect, Defect::MisorientedEdge { .. }));
    assert_eq!(misoriented, survey.misoriented_edges, "{name}");
    assert_eq!(defects.list().len(), 1 + edges + misoriented, "{name}");
    // The edge named is one that two faces share and no choice of sides satisfies.
    let edge = Orientation::of(k).contradiction().expect(name);
    assert!(matches!(k.edge_kind(edge), EdgeKind::Plain | EdgeKind::Misoriented), "{name}");
}

fn check_counts(model: &Model, survey: &Survey) {
    assert_eq!(
        (survey.vertices, survey.edges, survey.faces),
        (model.vertex_count, model.edge_count, model.face_count),
        "{}",
        model.name
    );
    assert_eq!(Some(survey.euler_characteristic()), model.euler, "{}", model.name);
}

/// Complexes that are no surfaces, made for the purpose: which edges have more than two uses, at
/// which vertices several fans meet, and how many fans there are in all. The counts were worked
/// out from the vertices' links.
pub(crate) fn non_manifold<K: Assemble>(holds_polygons: bool) {
    let names = [
        "cubes_sharing_edge",
        "cubes_sharing_vertex",
        "cubes_sharing_face_kept_twice",
        "tetrahedra_sharing_vertex",
        "three_pages",
        "bow_tie",
        "pinched_sphere",
    ];
    // How often each of the non-manifold edges is used, by what the complexes are.
    let uses = [4, 0, 4, 0, 3, 0, 0];
    let mut held = 0;
    for (model, uses) in read_some("complexes_nonmanifold.json", &names).iter().zip(uses) {
        if let Some(mesh) = model.held_by::<K>() {
            check_non_manifold(model, uses, mesh.topology());
            check_report::<K>(model);
            held += 1;
        }
    }
    // All but the three pairs of cubes are made of triangles.
    assert_eq!(held, if holds_polygons { 7 } else { 4 });
}

fn check_non_manifold<K: Topology>(model: &Model, uses: usize, k: &K) {
    let name = &model.name;
    let survey = Survey::of(k);
    check_counts(model, &survey);
    assert_eq!(Some(survey.boundary_edges), model.boundary_edges, "{name}");
    assert_eq!(Some(k.vertices().map(|v| fan_count(k, v)).sum()), model.fans, "{name}");
    let ends = |edge| sorted(k.edge_vertices(edge).map(|v| v.index()));
    let edges = k.edges().filter(|&edge| k.edge_kind(edge) == EdgeKind::NonManifold);
    let mut found: Vec<_> = edges
        .map(|edge| {
            assert_eq!(k.edge_uses(edge).count(), uses, "{name}");
            assert_eq!(k.edge_faces(edge).count(), uses, "{name}");
            ends(edge)
        })
        .collect();
    found.sort_unstable();
    assert_eq!(found, expected_edges(model), "{name}");
    let vertices = k.vertices().filter(|&v| fan_count(k, v) > 1).map(|v| v.index());
    assert_eq!(vertices.collect::<Vec<_>>(), model.nonmanifold_vertices, "{name}");
    // The refusal names just these, and the boundary.
    let defects = SolidBoundary::new(k).err().expect(name);
    for defect in defects.list() {
        match *defect {
            Defect::NonManifoldEdge { edge, uses: counted } => {
                assert_eq!(counted, uses, "{name}");
                assert!(expected_edges(model).contains(&ends(edge)), "{name}");
            }
            Defect::NonManifoldVertex { vertex, fans } => {
                assert_eq!(fans, 2, "{name}");
                assert!(model.nonmanifold_vertices.contains(&vertex.index()), "{name}");
            }
            Defect::BoundaryEdge { edge } => assert!(k.is_boundary(edge), "{name}"),
            _ => panic!("{name}: {defect}"),
        }
    }
    let expected =
        model.nonmanifold_edges.len() + model.nonmanifold_vertices.len() + survey.boundary_edges;
    assert_eq!(defects.list().len(), expected, "{name}");
}

/// The report lists the same cells.
fn check_report<K: Assemble>(model: &Model) {
    let report = MeshReport::new::<K>(&model.soup(), &ReportOptions::default());
    let report = report.expect(&model.name);
    assert!(!report.is_sound(), "{}", model.name);
    let listed = |kind| report.defects.iter().filter(move |defect| defect.kind == kind);
    let mut edges: Vec<_> = listed(DefectKind::NonManifoldEdges)
        .map(|defect| match defect.cells[0] {
            DefectCell::Edge(ends) => sorted(ends),
            other => panic!("{}: {other:?} is no edge", model.name),
        })
        .collect();
    edges.sort_unstable();
    assert_eq!(edges, expected_edges(model), "{}", model.name);
    let points = model.points();
    for defect in listed(DefectKind::NonManifoldVertices) {
        let [DefectCell::Vertex(v)] = defect.cells[..] else { panic!("{}", model.name) };
        assert!(model.nonmanifold_vertices.contains(&v), "{}", model.name);
        assert_eq!(defect.at, points[v], "{}", model.name);
    }
    assert_eq!(
        listed(DefectKind::NonManifoldVertices).count(),
        model.nonmanifold_vertices.len(),
        "{}",
        model.name
    );
}

fn expected_edges(model: &Model) -> Vec<[usize; 2]> {
    let mut edges: Vec<_> = model.nonmanifold_edges.iter().map(|&ends| sorted(ends)).collect();
    edges.sort_unstable();
    edges
}

fn sorted(mut ends: [usize; 2]) -> [usize; 2] {
    ends.sort_unstable();
    ends
}
