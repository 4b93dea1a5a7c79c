//! Every work gives on every kernel what it gives on bare arrays, on meshes of every kind; and a
//! kernel that does not is found out.

use merestone::geometry::{Brep, PolygonSoup};
use merestone::kernels::{HalfEdge, TriangleAdjacency};
use merestone::topology::{FaceListBuf, Topology};
use merestone_trial::kernels::{BARE, KERNELS, Kernel};
use merestone_trial::measure::FEWEST_ROUNDS;
use merestone_trial::works::{Layout, Work};
use merestone_trial::{Options, Report, Subject, foundry, run, shapes};

fn tried(subject: &Subject) -> Report {
    let options = Options { seconds: 1e-6, ..Options::default() };
    run(subject, &options, &mut |_| {}).expect("the mesh can be tried")
}

/// All works on all kernels, and on the kernels' own layouts of bare arrays.
fn agrees(subject: &Subject) {
    for work in Work::ALL {
        let mut bare = work.on_bare(subject, Layout::Best).unwrap().expect("there is a best way");
        let expected = bare.values();
        assert!(!expected.numbers.is_empty());
        for layout in [Layout::Turns, Layout::HalfEdges] {
            if let Some(mut job) = work.on_bare(subject, layout).unwrap() {
                assert_eq!(job.values().first_difference(&expected), None, "{work}, {layout:?}");
            }
        }
        let mut held = 0;
        for kernel in KERNELS {
            if let Ok(mesh) = kernel.hold(subject) {
                let values = mesh.job(work, subject).values();
                let name = kernel.name();
                assert_eq!(values.first_difference(&expected), None, "{work} on {name}");
                assert_eq!(values.checksum(), expected.checksum(), "{work} on {name}");
                held += 1;
            }
        }
        assert!(held >= if subject.triangles().is_some() { 2 } else { 1 });
    }
}

fn triangles(mesh: shapes::TriangleMesh) -> Subject {
    Subject::from_triangles(mesh.points, &mesh.triangles).unwrap()
}

fn polygons(mesh: shapes::Loops) -> Subject {
    let faces =
        FaceListBuf::from_polygons(mesh.points.len(), mesh.corners, mesh.face_ends).unwrap();
    Subject::new(mesh.points, faces).unwrap()
}

fn faces(points: usize, faces: &[&[u32]]) -> Subject {
    let mut list = FaceListBuf::new(points);
    faces.iter().for_each(|face| list.push_face(face));
    let place = |i: usize| [i as f64, (i * i % 7) as f64, (i * i * i % 11) as f64];
    Subject::new((0..points).map(place).collect(), list).unwrap()
}

#[test]
fn closed_meshes_agree() {
    agrees(&triangles(shapes::icosphere(3)));
    agrees(&triangles(shapes::icosphere(3).shuffled(5)));
    agrees(&triangles(shapes::bipyramid(60)));
    agrees(&triangles(foundry::valve_body(1)));
}

#[test]
fn open_meshes_agree() {
    agrees(&triangles(shapes::fan(30)));
    let mut open = shapes::icosphere(3).shuffled(8);
    open.triangles.truncate(900);
    agrees(&triangles(open));
}

#[test]
fn non_manifold_and_misoriented_meshes_agree() {
    for seed in 0..40 {
        agrees(&triangles(shapes::soup(5 + 2 * seed as u32, 40, seed)));
    }
    // Two tetrahedra that touch at vertex 0, and two triangles that run the same way along 1 → 2.
    let tips: [&[u32]; 8] = [
        &[0, 2, 1],
        &[0, 1, 3],
        &[0, 3, 2],
        &[1, 2, 3],
        &[0, 5, 4],
        &[0, 4, 6],
        &[0, 6, 5],
        &[4, 5, 6],
    ];
    agrees(&faces(7, &tips));
    agrees(&faces(4, &[&[0, 1, 2], &[3, 1, 2]]));
    // The same face three times.
    agrees(&faces(3, &[&[0, 1, 2], &[1, 2, 0], &[0, 2, 1]]));
}

#[test]
fn isolated_vertices_keep_their_place_on_all_kernels() {
    let subject = faces(9, &[&[1, 3, 5], &[5, 3, 7]]);
    agrees(&subject);
    for kernel in KERNELS {
        let mesh = kernel.hold(&subject).unwrap();
        let moved = mesh.job(Work::Smooth, &subject).values().numbers;
        for v in [0, 2, 4, 6, 8] {
            assert_eq!(moved[3 * v..3 * v + 3], subject.points()[v]);
        }
    }
    assert_eq!(tried(&subject).mesh.isolated_vertices, 5);
}

#[test]
fn polygons_agree_and_the_triangle_kernel_says_why_it_cannot() {
    agrees(&polygons(shapes::quad_torus(12, 9)));
    agrees(&polygons(shapes::quad_torus(12, 9).shuffled(4)));
    // A pentagon, a quad, two triangles, a face whose loop passes vertex 1 twice, and two corners.
    agrees(&faces(
        10,
        &[&[0, 1, 2, 3, 4], &[1, 0, 5, 6], &[2, 1, 6], &[1, 7, 8, 1, 8, 9], &[3, 2]],
    ));

    let report = tried(&polygons(shapes::quad_torus(5, 5)));
    let held = &report.kernels[0];
    assert_eq!((held.kernel, held.bytes, held.lossless), ("triangle", None, false));
    assert!(held.note.as_ref().unwrap().contains("face 0"), "{:?}", held.note);
    let rows = || report.results.iter().filter(|row| row.kernel == "triangle");
    assert_eq!(rows().count(), Work::ALL.len());
    assert!(rows().all(|row| !row.supported && row.reason.is_some() && row.median_ns.is_none()));
    assert_eq!(report.verdict.kernel, Some("half-edge"));
    assert!(report.verdict.sentence.contains("Left out is triangle"));
    assert_eq!(report.mesh.genus, Some(1));
}

#[test]
fn faces_of_no_area_have_no_normal_anywhere() {
    let points = vec![[0.0; 3], [1.0, 1.0, 1.0], [2.0, 2.0, 2.0], [0.0, 5.0, 0.0]];
    let subject = Subject::from_triangles(points, &[[0, 1, 2], [0, 1, 3]]).unwrap();
    agrees(&subject);
    let mut bare = Work::FaceNormals.on_bare(&subject, Layout::Best).unwrap().unwrap();
    assert_eq!(bare.values().numbers[..3], [0.0; 3]);
}

#[test]
fn slivers_have_the_same_normal_on_all_kernels() {
    // Corners on one line but for the rounding of tenths: which corner the arithmetic starts from
    // decides the direction.
    let points: Vec<[f64; 3]> = (0..30)
        .map(|i| [0.1 * f64::from(i), 0.3 * f64::from(i) + 0.7, 0.7 * f64::from(i) - 0.1])
        .collect();
    let triangles: Vec<[u32; 3]> =
        (0..10).flat_map(|i| [[i, i + 7, i + 18], [i + 3, i + 19, i + 1]]).collect();
    let subject = Subject::from_triangles(points, &triangles).unwrap();
    let mut bare = Work::FaceNormals.on_bare(&subject, Layout::Best).unwrap().unwrap();
    let noisy = bare.values().numbers.as_chunks::<3>().0.iter().filter(|n| **n != [0.0; 3]).count();
    assert!(noisy > 5, "rounding leaves a direction to {noisy} faces");
    agrees(&subject);
}

#[test]
fn reports_are_complete_and_add_up() {
    let subject = triangles(shapes::icosphere(2)).named("sphere", None);
    let mix = vec![(Work::Smooth, 20), (Work::Assemble, 3)];
    let options = Options { mix, seconds: 1e-6, ..Options::default() };
    let mut steps = Vec::new();
    let report = run(&subject, &options, &mut |step| steps.push((step.work, step.done))).unwrap();
    assert_eq!(steps, [(Work::Smooth, 0), (Work::Assemble, 1)]);
    assert_eq!((&report.mesh.file[..], report.mesh.faces, report.mesh.edges), ("sphere", 320, 480));
    let names: Vec<&str> = report.kernels.iter().map(|held| held.kernel).collect();
    assert_eq!(names, ["triangle", "half-edge", BARE]);
    assert_eq!(report.results.len(), 6);
    for row in &report.results {
        assert_eq!((row.supported, row.agrees), (true, Some(true)));
        assert_eq!(row.elements, if row.work == "smooth" { 162 } else { 320 });
        let [low, median, high] = [row.low_ns, row.median_ns, row.high_ns].map(Option::unwrap);
        assert!(0.0 < low && low <= median && median <= high && row.runs >= FEWEST_ROUNDS);
        let each = row.ns_per_element.unwrap();
        assert!((each - median / row.elements as f64).abs() < 1e-3);
    }
    for (kernel, total) in &report.verdict.totals_ns {
        let median = |work| {
            let row = report.results.iter().find(|row| row.kernel == *kernel && row.work == work);
            row.and_then(|row| row.median_ns).unwrap()
        };
        let expected = 20.0 * median("smooth") + 3.0 * median("assemble");
        assert!((total - expected).abs() <= 1e-9 * expected, "{kernel}");
    }
    let [triangle, _, bare] = &report.kernels[..] else { panic!("three rows") };
    // 24 bytes a triangle and 4 a vertex, as the kernel's layout says.
    assert_eq!(triangle.bytes, Some(24 * 320 + 4 * 162));
    // Links for assembling and the lists of 960 neighbours; coordinates are not counted.
    assert_eq!(bare.bytes, Some(24 * 320 + 4 * 162 + 4 * 162 + 4 * 960));
    for held in &report.kernels {
        let sum: usize = held.bytes_by_array.iter().map(|(_, bytes)| bytes).sum();
        assert_eq!(held.bytes, Some(sum));
    }
}

#[test]
fn a_time_that_is_none_is_refused() {
    let subject = triangles(shapes::icosphere(0));
    for seconds in [0.0, -1.0, f64::NAN, f64::INFINITY, 3601.0] {
        let options = Options { seconds, ..Options::default() };
        assert!(run(&subject, &options, &mut |_| {}).is_err(), "{seconds}");
    }
}

/// Holds another mesh than it was given: one point is moved.
fn crooked(name: &'static str) -> Kernel {
    Kernel::with(name, |subject| {
        let mut points = subject.points().to_vec();
        points[7][1] += 1e-6;
        let mesh: Brep<TriangleAdjacency, f64> = Brep::from_face_list(points, subject.faces())?;
        Ok(Box::new(mesh))
    })
}

#[test]
fn a_kernel_with_wrong_results_is_found_out_and_named() {
    let subject = triangles(shapes::icosphere(2));
    let kernels = vec![KERNELS[1], crooked("crooked")];
    let mix = vec![(Work::Assemble, 1), (Work::Components, 1), (Work::Smooth, 1)];
    let options = Options { kernels, mix, seconds: 1e-6 };
    let report = run(&subject, &options, &mut |_| {}).unwrap();
    let agreed = |kernel, work| {
        let mut rows = report.results.iter();
        rows.find(|row| row.kernel == kernel && row.work == work).unwrap().agrees
    };
    // The links are right; the points are not.
    assert_eq!(agreed("crooked", "assemble"), Some(true));
    assert_eq!(agreed("crooked", "components"), Some(true));
    assert_eq!(agreed("crooked", "smooth"), Some(false));
    assert_eq!(agreed("half-edge", "smooth"), Some(true));
    let found = report.disagreement.as_ref().unwrap();
    assert_eq!((found.kernel, found.work), ("crooked", "smooth"));
    // The first neighbour of vertex 7 in the file's order is where it shows.
    let list = merestone_trial::bare::smooth::Neighbours::from_loops(
        subject.corners(),
        subject.face_ends(),
        subject.points().len(),
    );
    let (start, end) = (list.ends[6] as usize, list.ends[7] as usize);
    let first = list.list[start..end].iter().min().unwrap();
    assert_eq!(found.difference.cell, format!("vertex {first}, y"));
    let json: serde_json::Value = serde_json::to_value(&report).unwrap();
    assert!(json["error"].as_str().unwrap().contains("crooked disagrees"), "{}", json["error"]);
}

#[test]
fn a_missing_face_is_found_out() {
    let subject = triangles(shapes::icosphere(1));
    let lossy = Kernel::with("lossy", |subject| {
        let mut mesh: Brep<HalfEdge, f64> = subject.on_kernel()?;
        let last = mesh.topology().faces().last();
        if let Some(face) = last {
            let _ = mesh.remove_face(face);
        }
        Ok(Box::new(mesh))
    });
    // Assembling starts from the face list again, and all edges are still there for smoothing.
    for work in [Work::FaceNormals, Work::Components] {
        let options = Options { kernels: vec![lossy], mix: vec![(work, 1)], seconds: 1e-6 };
        let report = run(&subject, &options, &mut |_| {}).unwrap();
        let found = report.disagreement.expect("a face is missing");
        assert_eq!((found.kernel, found.work), ("lossy", work.name()));
    }
}

#[test]
fn what_the_counting_rules_drop_is_told() {
    let mut soup = PolygonSoup { points: vec![[0.0; 3]; 5], ..PolygonSoup::default() };
    soup.points[1][0] = 1.0;
    soup.points[2][1] = 1.0;
    soup.faces.set_vertex_count(5);
    soup.faces.push_face(&[0, 1, 1, 2]);
    soup.faces.push_face(&[0, 1, 0]);
    let report = tried(&Subject::from_clean(soup.clean().unwrap()).unwrap());
    let mesh = &report.mesh;
    assert_eq!((mesh.faces, mesh.vertices), (1, 3));
    assert_eq!((mesh.collapsed_faces, mesh.isolated_vertices), (1, 2));
}
