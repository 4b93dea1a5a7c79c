//! The bare arrays, the memory floor beside them, and the ways most programs are written.
//!
//! Each group is one work on one mesh: `S` has 20,480 triangles, `M` 1,310,720, coherent and
//! shuffled. Throughput is in elements (faces, vertices for `smooth`), so that nanoseconds per
//! element can be read off. Run one work with `cargo bench -p merestone-benches --bench bare -- smooth`.

use criterion::measurement::WallTime;
use criterion::{BenchmarkGroup, Criterion, Throughput, criterion_group, criterion_main};
use merestone_trial::bare::assemble::{self, Adjacency, lower, start};
use merestone_trial::bare::half_edge::{self, HalfEdges};
use merestone_trial::bare::smooth::Neighbours;
use merestone_trial::bare::{components, faces, floor, hash_map, smooth};
use merestone_trial::shapes::{Loops, TriangleMesh, icosphere};
use petgraph::algo::connected_components;
use petgraph::graph::UnGraph;
use std::hint::black_box;
use std::time::Duration;

/// A mesh and all that a work may take as given.
struct Given {
    mesh: TriangleMesh,
    loops: Loops,
    links: Adjacency,
    half_edges: HalfEdges,
    neighbours: Neighbours,
}

impl Given {
    fn new(mesh: TriangleMesh) -> Self {
        let vertices = mesh.points.len();
        let loops = mesh.to_loops();
        let (corners, ends) = (&loops.corners, &loops.face_ends);
        let (mut links, mut half_edges) = (Adjacency::default(), HalfEdges::default());
        assemble::assemble(&mesh.triangles, vertices, &mut Default::default(), &mut links)
            .expect("a sphere has no bad triangle");
        half_edge::assemble(corners, ends, vertices, &mut Default::default(), &mut half_edges)
            .expect("a sphere has no bad face");
        let neighbours = Neighbours::from_loops(corners, ends, vertices);
        Self { loops, links, half_edges, neighbours, mesh }
    }
}

fn bare(criterion: &mut Criterion) {
    let sizes: &[(&str, u32)] =
        if merestone_benches::is_test() { &[("S", 3)] } else { &[("S", 5), ("M", 8)] };
    for &(size, subdivisions) in sizes {
        let coherent = icosphere(subdivisions);
        let shuffled = coherent.shuffled(1);
        for (order, mesh) in [("coherent", coherent), ("shuffled", shuffled)] {
            let given = Given::new(mesh);
            type Work = fn(&mut BenchmarkGroup<'_, WallTime>, &Given);
            let works: [(&str, Work); 5] = [
                ("assemble", assembling),
                ("half-edge", half_edges),
                ("face-normals", normals),
                ("smooth", smoothing),
                ("components", joining),
            ];
            for (work, run) in works {
                let mut group = criterion.benchmark_group(format!("{work}/{size}/{order}"));
                group.sample_size(10).warm_up_time(Duration::from_millis(300));
                group.measurement_time(Duration::from_secs(1));
                group.throughput(Throughput::Elements(given.mesh.triangles.len() as u64));
                run(&mut group, &given);
                group.finish();
            }
        }
    }
}

fn assembling(group: &mut BenchmarkGroup<'_, WallTime>, given: &Given) {
    let (triangles, vertices) = (&given.mesh.triangles[..], given.mesh.points.len());
    let mut out = given.links.clone();
    group.bench_function("floor", |b| {
        b.iter(|| {
            floor::assemble(triangles, &mut out.end, &mut out.turn, &mut out.outgoing);
            black_box(&mut out);
        });
    });
    let mut scratch = start::Scratch::default();
    group.bench_function("by start vertex", |b| {
        b.iter(|| start::assemble(triangles, vertices, &mut scratch, &mut out));
    });
    group.bench_function("by start vertex, fresh memory", |b| {
        b.iter(|| {
            let mut out = Adjacency::default();
            start::assemble(triangles, vertices, &mut start::Scratch::default(), &mut out)
                .map(|()| out)
        });
    });
    let mut scratch = lower::Scratch::default();
    group.bench_function("by lower vertex", |b| {
        b.iter(|| lower::assemble(triangles, vertices, &mut scratch, &mut out));
    });
    group.bench_function("by lower vertex, fresh memory", |b| {
        b.iter(|| {
            let mut out = Adjacency::default();
            lower::assemble(triangles, vertices, &mut lower::Scratch::default(), &mut out)
                .map(|()| out)
        });
    });
    group.bench_function("standard hash map", |b| {
        b.iter(|| hash_map::assemble(triangles, vertices));
    });
}

fn half_edges(group: &mut BenchmarkGroup<'_, WallTime>, given: &Given) {
    let Loops { points, corners, face_ends } = &given.loops;
    let (mut scratch, mut out) = (half_edge::Scratch::default(), HalfEdges::default());
    group.bench_function("all links", |b| {
        b.iter(|| half_edge::assemble(corners, face_ends, points.len(), &mut scratch, &mut out));
    });
}

fn normals(group: &mut BenchmarkGroup<'_, WallTime>, given: &Given) {
    let TriangleMesh { points, triangles } = &given.mesh;
    let Loops { corners, face_ends, .. } = &given.loops;
    let mut normals = vec![[0.0; 3]; triangles.len()];
    group.bench_function("floor", |b| {
        b.iter(|| floor::faces(points, triangles, black_box(&mut normals)));
    });
    group.bench_function("area and volume", |b| {
        b.iter(|| faces::triangle_sums(points, triangles));
    });
    group.bench_function("plain", |b| {
        b.iter(|| faces::triangle_normals(points, triangles, black_box(&mut normals)));
    });
    group.bench_function("lanes, with area and volume", |b| {
        b.iter(|| faces::triangle_normals_in_lanes(points, triangles, black_box(&mut normals)));
    });
    group.bench_function("loops", |b| {
        b.iter(|| faces::loop_normals(points, corners, face_ends, black_box(&mut normals)));
    });
}

fn smoothing(group: &mut BenchmarkGroup<'_, WallTime>, given: &Given) {
    let points = &given.mesh.points;
    group.throughput(Throughput::Elements(points.len() as u64));
    let mut moved = points.clone();
    let Neighbours { ends, list } = &given.neighbours;
    group.bench_function("floor", |b| {
        b.iter(|| floor::ring(points, ends, list, black_box(&mut moved)));
    });
    group.bench_function("lists", |b| {
        b.iter(|| smooth::by_lists(points, &given.neighbours, black_box(&mut moved)));
    });
    group.bench_function("turns", |b| {
        b.iter(|| smooth::by_turns(points, &given.links, black_box(&mut moved)));
    });
    group.bench_function("half-edges", |b| {
        b.iter(|| smooth::by_half_edges(points, &given.half_edges, black_box(&mut moved)));
    });
}

fn joining(group: &mut BenchmarkGroup<'_, WallTime>, given: &Given) {
    let Loops { points, corners, face_ends } = &given.loops;
    let (links, faces) = (&given.links, given.mesh.triangles.len());
    let (mut labels, mut queue) = (vec![0; faces], Vec::new());
    group.bench_function("floor", |b| {
        b.iter(|| floor::components(&links.turn, black_box(&mut labels)));
    });
    group.bench_function("turns, chosen", |b| {
        b.iter(|| components::by_turns(links, &mut labels, &mut queue));
    });
    group.bench_function("turns, union-find", |b| {
        b.iter(|| components::by_turns_union(links, &mut labels));
    });
    group.bench_function("turns, breadth-first", |b| {
        b.iter(|| components::by_turns_breadth_first(links, &mut labels, &mut queue));
    });
    group.bench_function("half-edges", |b| {
        b.iter(|| components::by_half_edges(&given.half_edges, &mut labels));
    });
    let mut scratch = components::Scratch::default();
    group.bench_function("loops alone", |b| {
        b.iter(|| {
            components::from_loops(corners, face_ends, points.len(), &mut scratch, &mut labels)
        });
    });
    let mut parents = Vec::new();
    group.bench_function("loops alone, through vertices", |b| {
        let vertices = points.len();
        b.iter(|| {
            components::through_vertices(corners, face_ends, vertices, &mut parents, &mut labels)
        });
    });
    let mut dual = UnGraph::<(), (), u32>::with_capacity(faces, 3 * faces / 2);
    for _ in 0..faces {
        dual.add_node(());
    }
    for (face, sides) in (0u32..).zip(links.turn.as_chunks::<3>().0) {
        for other in sides.map(|turn| turn / 3).into_iter().filter(|&other| other > face) {
            dual.add_edge(face.into(), other.into(), ());
        }
    }
    group.bench_function("petgraph", |b| b.iter(|| connected_components(&dual)));
}

criterion_group!(benches, bare);
criterion_main!(benches);
