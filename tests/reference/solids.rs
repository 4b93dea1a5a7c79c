//! Solids: counts, genus, volume and area.

use crate::values::{Model, assert_near, fraction, read, read_some};
use merestone::geometry::{Brep, MeshReport, ReportOptions};
use merestone::topology::floods::Survey;
use merestone::topology::views::SolidBoundary;
use merestone::topology::{Assemble, FaceListBuf, TopologyExt};
use serde::Deserialize;

/// Everything a model says of itself, for a model that bounds one solid.
fn check_boundary<K: Assemble>(model: &Model, mesh: &Brep<K, f64>) {
    let (k, name) = (mesh.topology(), &model.name);
    let survey = Survey::of(k);
    assert_eq!(
        (survey.vertices, survey.edges, survey.faces),
        (model.vertex_count, model.edge_count, model.face_count),
        "{name}"
    );
    let genus = model.genus.expect("a solid has a genus");
    assert_eq!(survey.genus(), Some(genus), "{name}");
    assert_eq!(survey.euler_characteristic(), 2 - 2 * genus, "{name}");
    assert_eq!((survey.components, survey.shells, survey.orientable), (1, 1, true), "{name}");
    assert!(SolidBoundary::new(k).is_ok(), "{name}");
    // The values are good to 1e-12; so many faces add no error worth the name.
    if let Some(volume) = model.volume {
        assert_near(mesh.signed_volume(), volume, 4e-12, name);
    }
    if let Some(area) = model.area {
        assert_near(mesh.area(), area, 4e-12, name);
    }
}

/// Checks all models that the kernel holds: all of them, or those made of triangles.
fn check_boundaries<K: Assemble>(models: &[Model], holds_polygons: bool) {
    let mut held = 0;
    for model in models {
        if let Some(mesh) = model.held_by::<K>() {
            check_boundary(model, &mesh);
            held += 1;
        }
    }
    let expected = models.iter().filter(|m| holds_polygons || m.is_triangulated()).count();
    assert_eq!(held, expected, "models held");
    assert!(held > 0);
}

/// What holds of convex solids besides: every face looks away from the middle, nothing is wrong.
fn check_convex<K: Assemble>(models: &[Model]) {
    for model in models {
        let Some(mesh) = model.held_by::<K>() else { continue };
        let sum = mesh.vertices().fold([0.0; 3], |s, v| {
            let p = mesh.point(v);
            [s[0] + p[0], s[1] + p[1], s[2] + p[2]]
        });
        let middle = nalgebra::Point3::from(sum.map(|x| x / mesh.vertex_count() as f64));
        for face in mesh.faces() {
            let corner = mesh.face_vertices(face).next().expect("a corner");
            let outward = (mesh.position(corner) - middle).dot(&mesh.face_normal(face));
            assert!(outward > 1e-3, "{}: face {face:?} looks inward", model.name);
        }
        let report = MeshReport::new::<K>(&model.soup(), &ReportOptions::default());
        let report = report.expect("a mesh that was held before");
        assert!(report.is_sound() && report.defects.is_empty(), "{}", model.name);
    }
}

/// The five regular solids: V, E and F as in Euclid, Elements XIII; volume and area by their
/// closed forms (H. S. M. Coxeter, Regular Polytopes, table I, from memory).
pub(crate) fn platonic<K: Assemble>(holds_polygons: bool) {
    let models: Vec<Model> = read("solids_platonic.json");
    let counts = models.iter().map(|m| (&*m.name, m.vertex_count, m.edge_count, m.face_count));
    assert_eq!(
        counts.collect::<Vec<_>>(),
        [
            ("tetrahedron", 4, 6, 4),
            ("cube", 8, 12, 6),
            ("octahedron", 6, 12, 8),
            ("dodecahedron", 20, 30, 12),
            ("icosahedron", 12, 30, 20),
        ]
    );
    let root = f64::sqrt;
    let closed_forms = [
        (root(2.0) / 12.0, root(3.0)),
        (1.0, 6.0),
        (root(2.0) / 3.0, 2.0 * root(3.0)),
        ((15.0 + 7.0 * root(5.0)) / 4.0, 3.0 * root(25.0 + 10.0 * root(5.0))),
        (5.0 * (3.0 + root(5.0)) / 12.0, 5.0 * root(3.0)),
    ];
    for (model, (volume, area)) in models.iter().zip(closed_forms) {
        assert_near(model.volume.expect("a volume"), volume, 1e-15, &model.name);
        assert_near(model.area.expect("an area"), area, 1e-15, &model.name);
    }
    check_boundaries::<K>(&models, holds_polygons);
    check_convex::<K>(&models);
}

/// The thirteen semiregular solids of Archimedes (lost; after Pappus): closed forms in
/// `solids_archimedean.json`, from memory and recomputed.
pub(crate) fn archimedean<K: Assemble>(holds_polygons: bool) {
    let models: Vec<Model> = read("solids_archimedean.json");
    assert_eq!(models.len(), 13);
    if !holds_polygons {
        // Each has faces of several sizes, and every one is refused.
        assert!(models.iter().all(|model| model.held_by::<K>().is_none()));
        return;
    }
    check_boundaries::<K>(&models, holds_polygons);
    check_convex::<K>(&models);
}

/// The 92 convex solids with regular faces: N. W. Johnson, Convex polyhedra with regular faces,
/// Canad. J. Math. 18 (1966) 169-200.
pub(crate) fn johnson<K: Assemble>(holds_polygons: bool) {
    let models: Vec<Model> = read("solids_johnson.json");
    assert_eq!(models.len(), 92);
    check_boundaries::<K>(&models, holds_polygons);
    check_convex::<K>(&models);
}

/// The four star solids of Kepler and Poinsot: surfaces of genus 4, 4, 0 and 0 that pass through
/// themselves (L. Poinsot 1810; the genera from V − E + F, as A. Cayley counted 1859, from memory).
pub(crate) fn stars<K: Assemble>(holds_polygons: bool) {
    let models: Vec<Model> = read("solids_star.json");
    let genera: Vec<_> = models.iter().map(|model| model.genus).collect();
    assert_eq!(genera, [Some(4), Some(4), Some(0), Some(0)]);
    check_boundaries::<K>(&models, holds_polygons);
}

/// Closed surfaces with holes through them: A. F. Möbius (seven-vertex torus), Á. Császár 1949,
/// L. Szilassi 1977, and families made by rule.
pub(crate) fn toroids<K: Assemble>(holds_polygons: bool) {
    let named = ["moebius_torus_7", "csaszar", "szilassi", "triangular_frame"];
    let models = read_some("toroids.json", &named);
    check_boundaries::<K>(&models, holds_polygons);
    for model in &models[..2] {
        // Every two of the seven vertices are joined: the complete graph K₇.
        let mesh = model.held_by::<K>().expect("triangles");
        let vertices: Vec<_> = mesh.vertices().collect();
        for (i, &a) in vertices.iter().enumerate() {
            assert!(vertices[i + 1..].iter().all(|&b| mesh.edge_between(a, b).is_some()));
        }
    }
    // Császár's torus holds 125 exactly; Szilassi's 5226/5, though fans of its hexagons overlap.
    assert_eq!(models[1].held_by::<K>().expect("triangles").signed_volume(), 125.0);
    if let Some(szilassi) = models[2].held_by::<K>() {
        assert_near(szilassi.signed_volume(), 5226.0 / 5.0, 1e-14, "Szilassi");
        for face in szilassi.faces() {
            // Every face meets each of the six others in one edge.
            let mut across: Vec<_> = szilassi.face_faces(face).collect();
            across.sort_unstable();
            across.dedup();
            assert_eq!(across.len(), 6);
        }
    }

    #[derive(Deserialize)]
    struct Family<M> {
        members: Vec<M>,
    }
    #[derive(Deserialize)]
    struct Grid {
        p: u32,
        q: u32,
        #[serde(rename = "quads_V_E_F")]
        quads: [usize; 3],
        #[serde(rename = "triangles_V_E_F")]
        triangles: [usize; 3],
    }
    #[derive(Deserialize)]
    struct Families {
        regular_toroids: Family<Grid>,
        plates_genus_g: Family<Model>,
    }
    let families: Families = read("toroids.json");
    for Grid { p, q, quads, triangles } in families.regular_toroids.members {
        let at = |i: u32, j: u32| (i % p) * q + j % q;
        let cells = (0..p).flat_map(|i| (0..q).map(move |j| (i, j)));
        let corners = |(i, j): (u32, u32)| [at(i, j), at(i + 1, j), at(i + 1, j + 1), at(i, j + 1)];
        let squares: Vec<_> = cells.map(corners).collect();
        let halves: Vec<_> =
            squares.iter().flat_map(|&[a, b, c, d]| [[a, b, c], [a, c, d]]).collect();
        check_torus::<K, _>(triangles, p * q, &halves);
        if holds_polygons {
            check_torus::<K, _>(quads, p * q, &squares);
        }
    }
    // Squares around unit cubes, stored for genus 1 to 3.
    let plates = families.plates_genus_g.members.into_iter();
    let plates: Vec<Model> = plates.filter(|plate| !plate.faces.is_empty()).collect();
    assert_eq!(plates.iter().map(|plate| plate.genus).collect::<Vec<_>>(), [1, 2, 3].map(Some));
    if holds_polygons {
        check_boundaries::<K>(&plates, holds_polygons);
    }
}

fn check_torus<K: Assemble, F: AsRef<[u32]>>(counts: [usize; 3], vertices: u32, faces: &[F]) {
    let mut list = FaceListBuf::new(vertices as usize);
    faces.iter().for_each(|face| list.push_face(face.as_ref()));
    let k = K::assemble(list.as_list()).expect("faces this kernel holds");
    assert_eq!([k.vertex_count(), k.edge_count(), k.face_count()], counts);
    assert!(SolidBoundary::new(&k).is_ok());
    assert_eq!(Survey::of(&k).genus(), Some(1));
}

#[derive(Deserialize)]
struct Masses {
    solids: Vec<Mass>,
    tonon_2004: Tetrahedron,
}

#[derive(Deserialize)]
struct Mass {
    name: String,
    volume: String,
    vertices: Vec<[String; 3]>,
    faces: Vec<Vec<Vec<u32>>>,
}

#[derive(Deserialize)]
struct Tetrahedron {
    volume: String,
    vertices: Vec<[String; 3]>,
    /// One loop a face.
    faces: Vec<[[u32; 3]; 1]>,
}

fn points(fractions: &[[String; 3]]) -> Vec<[f64; 3]> {
    fractions.iter().map(|p| [fraction(&p[0]), fraction(&p[1]), fraction(&p[2])]).collect()
}

/// Ten solids whose volumes are exact fractions, with inner loops and a cavity among them
/// (textbook formulas from memory, checked by exact integration).
pub(crate) fn exact_volumes<K: Assemble>(holds_polygons: bool) {
    let masses: Masses = read("mass_properties.json");
    assert_eq!(masses.solids.len(), 10);
    let mut held = 0;
    for solid in &masses.solids {
        let mut list = FaceListBuf::new(solid.vertices.len());
        for loops in &solid.faces {
            list.push_face(&loops[0]);
            loops[1..].iter().for_each(|inner| list.push_inner_loop(inner));
        }
        let is_triangulated =
            solid.faces.iter().all(|loops| loops.len() == 1 && loops[0].len() == 3);
        if !holds_polygons && !is_triangulated {
            assert!(K::assemble(list.as_list()).is_err(), "{}", solid.name);
            continue;
        }
        let mesh = Brep::<K, f64>::from_face_list(points(&solid.vertices), list.as_list());
        let mesh = mesh.expect(&solid.name);
        assert!(SolidBoundary::new(mesh.topology()).is_ok(), "{}", solid.name);
        assert_near(mesh.signed_volume(), fraction(&solid.volume), 1e-14, &solid.name);
        held += 1;
    }
    assert_eq!(held, if holds_polygons { 10 } else { 2 });
}

/// The tetrahedron of F. Tonon, J. Math. Stat. 1(1):8-11, 2004. Its vertices are as printed,
/// rounded to five decimals; the fraction is exact for those.
pub(crate) fn tonon<K: Assemble>() {
    let masses: Masses = read("mass_properties.json");
    let tetrahedron = masses.tonon_2004;
    let points = points(&tetrahedron.vertices);
    let mesh = Brep::<K, f64>::from_triangles(points, tetrahedron.faces.as_flattened())
        .expect("a tetrahedron");
    assert!(SolidBoundary::new(mesh.topology()).is_ok());
    assert_near(mesh.signed_volume(), fraction(&tetrahedron.volume), 1e-14, "Tonon");
}
