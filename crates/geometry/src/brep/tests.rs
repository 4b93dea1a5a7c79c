//! What goes into a mesh comes out of it, on both kernels and in both precisions.

use super::{Brep, BuildError, NotATriangle};
use crate::Scalar;
use merestone_kernels::{HalfEdge, TriangleAdjacency};
use merestone_topology::{Assemble, Column, FaceId, FaceListBuf, VertexId};

const POINTS: [[f64; 3]; 5] =
    [[0.0, 0.0, 0.0], [1.0, 0.0, 0.0], [0.0, 1.0, 0.0], [0.0, 0.0, 1.0], [0.25, 0.5, 8.0]];
const TETRAHEDRON: [[u32; 3]; 4] = [[0, 2, 1], [1, 3, 0], [3, 1, 2], [2, 0, 3]];

fn points<S: Scalar>() -> Vec<[S; 3]> {
    POINTS.iter().map(|p| p.map(S::narrow)).collect()
}

fn round_trip<K, S>()
where
    K: Assemble<Vertex = VertexId, Face = FaceId>,
    S: Scalar,
{
    let mut mesh = Brep::<K, S>::from_triangles(points::<S>(), &TETRAHEDRON).unwrap();
    // The same vertices in the same order, and each triangle from its own first corner.
    let (given, triangles) = mesh.to_index_buffer().unwrap();
    assert_eq!((given, &triangles[..]), (points::<S>(), &TETRAHEDRON[..]));
    let (_, faces) = mesh.to_polygons();
    assert_eq!(faces.as_list().corners(), TETRAHEDRON.as_flattened());
    assert_eq!(mesh.signed_volume(), 1.0 / 6.0);
    // The fifth vertex is used by no face.
    assert_eq!(mesh.bounding_box().unwrap().map(|p| p.coords.sum()), [0.0, 3.0]);

    mesh.remove_face(FaceId::from_u32(0)).unwrap();
    mesh.remove_isolated_vertex(VertexId::from_u32(4)).unwrap();
    let kept = (points::<S>()[..4].to_vec(), TETRAHEDRON[1..].to_vec());
    assert_eq!(mesh.to_index_buffer().unwrap(), kept, "retired cells are left out");
    mesh.remove_face(FaceId::from_u32(1)).unwrap();
    let before = mesh.area();
    let moved = mesh.compact();
    assert_eq!(moved.faces.get(FaceId::from_u32(2)), Some(FaceId::from_u32(0)));
    assert_eq!((mesh.vertex_bound(), mesh.area()), (4, before), "the points followed");
    assert_eq!(mesh.to_index_buffer().unwrap(), (kept.0, TETRAHEDRON[2..].to_vec()));

    let (topology, column) = mesh.into_parts();
    assert!(Brep::from_parts(topology, column.clone()).is_ok());
}

#[test]
fn what_goes_in_comes_out() {
    round_trip::<TriangleAdjacency, f64>();
    round_trip::<TriangleAdjacency, f32>();
    round_trip::<HalfEdge, f64>();
    round_trip::<HalfEdge, f32>();
}

#[test]
fn what_makes_no_mesh_is_refused_with_its_place() {
    type Mesh = Brep<HalfEdge, f64>;
    let mut bad = points::<f64>();
    bad[2][1] = f64::NAN;
    let refused = Mesh::from_triangles(bad.clone(), &TETRAHEDRON).unwrap_err();
    assert!(matches!(refused, BuildError::NotFinite { point: 2, .. }), "{refused}");
    let refused = Mesh::from_triangles(points::<f64>(), &[[0, 1, 5]]).unwrap_err();
    assert!(refused.to_string().contains("names vertex 5"), "{refused}");
    let refused = Mesh::from_polygons(points::<f64>(), [&[0, 1, 2][..], &[]]).unwrap_err();
    assert!(refused.to_string().contains("face 1"), "{refused}");

    let mesh = Mesh::from_triangles(points::<f64>(), &TETRAHEDRON).unwrap();
    let (topology, _) = mesh.into_parts();
    assert!(Brep::from_parts(topology.clone(), Column::new(4, [0.0; 3])).is_err());
    assert!(Brep::from_parts(topology, Column::from_values(bad)).is_err());
}

#[test]
fn what_is_no_triangle_is_not_given_as_one() {
    let mut faces = FaceListBuf::new(5);
    faces.push_face(&[0, 1, 2]);
    faces.push_face(&[0, 2, 4, 3]);
    let mesh = Brep::<HalfEdge, f64>::from_face_list(points(), faces.as_list()).unwrap();
    assert_eq!(mesh.to_index_buffer(), Err(NotATriangle { face: 1 }));
    let mut faces = FaceListBuf::new(5);
    faces.push_face(&[0, 1, 2]);
    faces.push_inner_vertex_loop(4);
    let mesh = Brep::<HalfEdge, f64>::from_face_list(points(), faces.as_list()).unwrap();
    assert_eq!(mesh.to_index_buffer(), Err(NotATriangle { face: 0 }));
    assert_eq!(mesh.to_polygons().1, faces);
}
