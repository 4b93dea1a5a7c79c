//! The facts that need a topology: edges, fans, components, genus, area, volume.

use super::{data, facts};
use merestone_exchange::{Records, read_path};
use merestone_geometry::{Brep, CleanSoup};
use merestone_topology::conformance::Reference;
use merestone_topology::floods::{Components, Survey, fan_count};
use merestone_topology::views::{Manifold, OrientedManifold, SolidBoundary};
use merestone_topology::{Assemble, FaceListBuf, Topology, TopologyExt};
use serde_json::{Value, json};
use std::path::Path;

/// Facts that are not compared here: those that points and loops alone tell (`super` has them),
/// what no function gives yet, and what is said in words.
const ELSEWHERE: [&str; 15] = [
    "vertices_in_file",
    "vertices_welded",
    "vertices",
    "faces_in_file",
    "faces_dropped",
    "faces",
    "faces_zero_area",
    "faces_duplicate",
    "faces_nonplanar",
    "note",
    // Measures that are not built yet.
    "centroid",
    "inertia",
    "area_fan",
    // Compared apart, as numbers that are rounded.
    "area",
    "signed_volume",
];

/// What one mesh in one kernel is, under the facts' names.
fn found<K: Assemble>(soup: &CleanSoup) -> (Value, Brep<K, f64>) {
    let mesh = Brep::<K, f64>::from_soup(soup).expect("every kernel asked holds these faces");
    let k = mesh.topology();
    let survey = Survey::of(k);
    let components = Components::of(k);
    assert_eq!(components.count(), survey.components);
    let fans: usize = k.vertices().map(|v| fan_count(k, v)).sum();
    let euler_split = fans as i64 - survey.edges as i64 + survey.faces as i64;
    // Every boundary loop closed by a disk; the same with vertices split into their fans.
    let bounded =
        |euler: i64| survey.components as i64 - (euler + survey.boundary_loops as i64) / 2;
    let is_surface = survey.orientable && survey.non_manifold_edges == 0;
    let is_balanced = survey.unbalanced_edges == 0;
    assert_eq!(Manifold::new(k).is_ok(), survey.is_manifold());
    let is_oriented_manifold = OrientedManifold::new(k).is_ok();
    assert_eq!(is_oriented_manifold, survey.is_manifold() && survey.is_oriented());
    let mut face_sizes = serde_json::Map::new();
    let mut repeating = 0;
    for face in k.faces() {
        let mut vertices: Vec<_> = k.face_vertices(face).collect();
        let size = face_sizes.entry(vertices.len().to_string()).or_insert(json!(0));
        *size = json!(size.as_u64().expect("a count") + 1);
        vertices.sort_unstable();
        repeating += usize::from(vertices.windows(2).any(|pair| pair[0] == pair[1]));
    }
    let [low, high] = mesh.bounding_box().expect("a face").map(|p| [p.x, p.y, p.z]);
    let found = json!({
        "face_sizes": face_sizes,
        "faces_repeating_a_vertex": repeating,
        "edges": survey.edges,
        "edges_boundary": survey.boundary_edges,
        "boundary_loops": survey.boundary_loops,
        "edges_nonmanifold": survey.non_manifold_edges,
        "edges_inconsistent": survey.misoriented_edges,
        "edges_unbalanced": survey.unbalanced_edges,
        "fans": fans,
        "vertices_nonmanifold": survey.non_manifold_vertices,
        "components_by_edge": survey.components,
        "components_by_vertex": survey.vertex_components,
        "valence_max": k.vertices().map(|v| k.vertex_edge_ends(v).count()).max(),
        "euler": survey.euler_characteristic(),
        "euler_split": euler_split,
        "is_closed": survey.is_closed(),
        "is_oriented": survey.is_oriented(),
        "is_orientable": survey.orientable,
        "is_manifold": survey.is_manifold(),
        "is_solid_boundary": SolidBoundary::new(k).is_ok(),
        "genus": survey.genus(),
        "genus_bounded": (is_surface && survey.is_manifold())
            .then(|| bounded(survey.euler_characteristic())),
        "genus_split": is_surface.then(|| bounded(euler_split)),
        "volume_is_meaningful": is_balanced,
        "components_negative": is_balanced.then(|| negative_components(&mesh, &components)),
        "bbox_min": low,
        "bbox_max": high,
    });
    (found, mesh)
}

/// How many components, each as a mesh of its own, have a negative volume.
fn negative_components<K: Assemble>(
    mesh: &Brep<K, f64>,
    components: &Components<K::Face>,
) -> usize {
    let points: Vec<[f64; 3]> = mesh.vertices().map(|v| mesh.point(v)).collect();
    let (_, all) = mesh.to_polygons();
    let all = all.as_list();
    let mut lists = vec![FaceListBuf::new(points.len()); components.count()];
    for (number, face) in mesh.faces().enumerate() {
        let list = &mut lists[components.number(face)];
        all.loops(number).for_each(|listed| list.push_face(listed.corners));
    }
    let is_negative = |list: FaceListBuf| {
        let part = Brep::<K, f64>::from_face_list(points.clone(), list.as_list());
        part.expect("faces that were held before").signed_volume() < 0.0
    };
    lists.into_iter().map(is_negative).filter(|&negative| negative).count()
}

/// Compares one kernel's answers with the facts of a file. Returns how many.
fn compare<K: Assemble>(name: &str, fact: &Value, soup: &CleanSoup) -> usize {
    let kernel = std::any::type_name::<K>();
    let (found, mesh) = found::<K>(soup);
    let mut compared = 0;
    for (key, expected) in fact.as_object().expect("an object") {
        if !ELSEWHERE.contains(&key.as_str()) {
            let found = found.get(key).unwrap_or_else(|| panic!("no answer for {key}"));
            assert_eq!(found, expected, "{name}, {kernel}: {key}");
            compared += 1;
        }
    }
    // Sums in another order. Besides, a needle's area is a small difference of large products,
    // each off by its last place, and which ones depends on the corner it is taken from.
    let number = |key: &str| fact[key].as_f64().expect(key);
    let [low, high] = mesh.bounding_box().expect("a face");
    let (area, volume) = (mesh.area(), mesh.signed_volume());
    let products = 4.0 * f64::EPSILON * squared_diameters(&mesh);
    let off = (area - number("area")).abs();
    assert!(off <= 1e-12 * area + products, "{name}, {kernel}: area {area}");
    let off = (volume - number("signed_volume")).abs();
    let bound = (1e-13 * area + products) * (high - low).norm();
    assert!(off <= bound, "{name}, {kernel}: volume {volume}");
    compared + 2
}

/// The sum of the faces' squared diameters, roughly: twice the longest way from a first corner.
fn squared_diameters<K: Topology>(mesh: &Brep<K, f64>) -> f64 {
    let of_face = |face| {
        let mut corners = mesh.face_vertices(face).map(|v| mesh.position(v));
        let first = corners.next().expect("a corner");
        4.0 * corners.map(|p| (p - first).norm_squared()).fold(0.0, f64::max)
    };
    mesh.faces().map(of_face).sum()
}

/// Faces the reference topology is asked about: it looks everything up in lists.
const REFERENCE_FACES: usize = 2500;

/// Compares every PLY and STL file that has facts. Returns the comparisons and, for each kernel,
/// the files.
fn compare_all(folder: &Path) -> (usize, [usize; 3]) {
    let (mut compared, mut files) = (0, [0; 3]);
    for (name, fact) in facts(folder) {
        // Without edges there are no facts to compare, and OBJ is not read yet.
        if fact.get("edges").is_none() || name.ends_with(".obj") {
            continue;
        }
        let soup = read_path(folder.join(&name), None, Records::Welded).expect(&name).soup;
        let soup = soup.clean().expect(&name);
        compared += compare::<merestone::kernels::HalfEdge>(&name, &fact, &soup);
        files[0] += 1;
        if soup.faces().as_triangles().is_some() {
            compared += compare::<merestone::kernels::TriangleAdjacency>(&name, &fact, &soup);
            files[1] += 1;
        }
        if soup.faces().face_count() <= REFERENCE_FACES {
            compared += compare::<Reference>(&name, &fact, &soup);
            files[2] += 1;
        }
    }
    (compared, files)
}

#[test]
fn the_files_beside_the_tests_give_their_facts_on_every_kernel() {
    let (compared, files) = compare_all(&data());
    // 31 files have facts; two of them hold a quadrilateral, and the terrain and the vertebra are large.
    assert_eq!(files, [31, 29, 29]);
    // 27 facts and two measures a file.
    assert_eq!(compared, (31 + 29 + 29) * 29);
}

#[test]
fn more_files_give_their_facts_on_every_kernel() {
    // Absent for most people; the files above are always read.
    if let Some(folder) = std::env::var_os("MERESTONE_DATA") {
        assert!(compare_all(Path::new(&folder)).0 > 0);
    }
}
