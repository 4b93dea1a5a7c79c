//! Places and numbers, on small soups worked out by hand.

use super::*;
use crate::PolygonSoup;
use merestone_kernels::{HalfEdge, TriangleAdjacency};

/// Faces of every flaw around one unit square, after a vertex and a face that are left out, so
/// that numbers in the soup and in the mesh differ.
fn flawed() -> CleanSoup {
    let mut soup = PolygonSoup {
        points: vec![
            [9., 9., 9.],
            [0., 0., 0.],
            [1., 0., 0.],
            [1., 1., 0.],
            [0., 1., 0.],
            [2., 0., 0.],
            [5., 5., 5.],
            [1., 1., 1.],
        ],
        ..PolygonSoup::default()
    };
    soup.faces.set_vertex_count(8);
    for face in
        [&[6, 2, 6][..], &[1, 2, 3, 4], &[1, 2, 5], &[4, 3, 2, 1], &[3, 2, 1, 4], &[2, 3, 7, 4]]
    {
        soup.faces.push_face(face);
    }
    soup.clean().unwrap()
}

fn report(options: ReportOptions) -> MeshReport {
    MeshReport::new::<HalfEdge>(&flawed(), &options).unwrap()
}

fn listed(report: &MeshReport, kind: DefectKind) -> Vec<([f64; 3], Vec<DefectCell>)> {
    let of_kind = report.defects.iter().filter(|defect| defect.kind == kind);
    of_kind.map(|defect| (defect.at, defect.cells.clone())).collect()
}

#[test]
fn cells_have_their_numbers_in_the_soup_and_their_places() {
    use DefectCell::{Edge, Face};
    let report = report(ReportOptions::default());
    assert_eq!(report.survey.isolated_vertices, 2);
    assert_eq!(
        listed(&report, DefectKind::CollapsedFaces),
        [([5., 5., 5.], vec![Face(0)])],
        "its vertex is gone, its place is not"
    );
    assert_eq!(listed(&report, DefectKind::ZeroAreaFaces), [([1., 0., 0.], vec![Face(2)])]);
    assert_eq!(
        listed(&report, DefectKind::DuplicateFaces),
        [([0.5, 0.5, 0.], vec![Face(3), Face(1)]), ([0.5, 0.5, 0.], vec![Face(4), Face(1)])]
    );
    assert_eq!(listed(&report, DefectKind::NonPlanarFaces), [([0.75, 0.75, 0.25], vec![Face(5)])]);
    // Of face 2 two edges are used once, of face 5 three; the square's are used by three and more.
    let boundary = listed(&report, DefectKind::BoundaryEdges);
    assert_eq!(
        boundary,
        [
            ([1.5, 0., 0.], vec![Edge([2, 5]), Face(2)]),
            ([1., 0., 0.], vec![Edge([5, 1]), Face(2)]),
            ([1., 1., 0.5], vec![Edge([3, 7]), Face(5)]),
            ([0.5, 1., 0.5], vec![Edge([7, 4]), Face(5)]),
            ([0.5, 0.5, 0.], vec![Edge([4, 2]), Face(5)]),
        ]
    );
    let joint = &listed(&report, DefectKind::NonManifoldEdges)[0];
    let expected = [Edge([1, 2]), Face(1), Face(2), Face(3), Face(4)];
    assert_eq!(*joint, ([0.5, 0., 0.], expected.to_vec()));
    // Faces 1 and 2 run one way along it, 3 and 4 the other: balanced. All counts are complete.
    let unbalanced = listed(&report, DefectKind::UnbalancedEdges);
    assert!(!unbalanced.iter().any(|(_, cells)| cells[0] == Edge([1, 2])));
    for kind in DefectKind::ALL {
        assert_eq!(listed(&report, kind).len(), report.count(kind), "{kind:?}");
        assert_eq!(report.count(kind), report.defect_count(kind), "{kind:?}");
    }
}

#[test]
fn an_open_sheet_may_have_a_boundary_and_nothing_else() {
    let open = report(ReportOptions { open: true, ..ReportOptions::default() });
    let closed = report(ReportOptions::default());
    assert_eq!(open.survey, closed.survey);
    assert!(listed(&open, DefectKind::BoundaryEdges).is_empty());
    assert_eq!(open.defect_count(DefectKind::BoundaryEdges), 0);
    let unbalanced = open.defect_count(DefectKind::UnbalancedEdges);
    assert_eq!(unbalanced, closed.count(DefectKind::UnbalancedEdges) - 5);
    assert_eq!(listed(&open, DefectKind::UnbalancedEdges).len(), unbalanced);
    assert!(!open.is_sound());

    let mut soup = PolygonSoup {
        points: vec![[0., 0., 0.], [1., 0., 0.], [0., 1., 0.]],
        ..PolygonSoup::default()
    };
    soup.faces.set_vertex_count(3);
    soup.faces.push_face(&[0, 1, 2]);
    let sheet = soup.clean().unwrap();
    for (open, is_sound) in [(true, true), (false, false)] {
        let options = ReportOptions { open, ..ReportOptions::default() };
        let report = MeshReport::new::<TriangleAdjacency>(&sheet, &options).unwrap();
        assert_eq!((report.is_sound(), report.volume), (is_sound, None));
    }
}

#[test]
fn an_edge_of_many_uses_names_some() {
    let mut soup = PolygonSoup {
        points: (0..102).map(|i| [f64::from(i), f64::from(i * i), 0.0]).collect(),
        ..PolygonSoup::default()
    };
    soup.faces.set_vertex_count(102);
    (2..102).for_each(|tip| soup.faces.push_face(&[0, 1, tip]));
    let options = ReportOptions { listed_per_kind: 1, ..ReportOptions::default() };
    let report = MeshReport::new::<HalfEdge>(&soup.clean().unwrap(), &options).unwrap();
    let kind = DefectKind::NonManifoldEdges;
    let defect = report.defects.iter().find(|defect| defect.kind == kind).unwrap();
    assert_eq!(defect.cells.len(), 1 + 16);
    assert!(defect.message.contains("100 uses, 100 one way and 0 the other, among others by"));
    assert_eq!(listed(&report, DefectKind::BoundaryEdges).len(), 1);
    assert_eq!(report.count(DefectKind::BoundaryEdges), 200);
}

#[test]
fn a_kernel_of_triangles_refuses_polygons() {
    let options = ReportOptions::default();
    let refused = MeshReport::new::<TriangleAdjacency>(&flawed(), &options);
    assert!(matches!(refused, Err(BuildError::Assemble(_))));
}

#[test]
fn nothing_is_not_sound() {
    for open in [false, true] {
        let options = ReportOptions { open, ..ReportOptions::default() };
        let nothing = PolygonSoup::default().clean().unwrap();
        let report = MeshReport::new::<HalfEdge>(&nothing, &options).unwrap();
        assert!(!report.is_sound() && report.defects.is_empty());
        assert_eq!((report.area, report.volume), (0.0, None));
    }
}
