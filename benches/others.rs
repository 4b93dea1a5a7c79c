//! The library and bare arrays beside what else people would take, and beside the memory floor.
//!
//! Assembling beside the same job with a std hash map, components beside petgraph's
//! `connected_components` on the dual graph (built outside the clock), every work's bare arrays
//! beside streaming the bytes they must move. One run, turn and turn about; nanoseconds a face
//! (a vertex for `smooth`), medians. `SECONDS` in the environment is the time for each row
//! (default 1).

#![expect(clippy::print_stdout, reason = "a bench talks to the person who runs it")]

mod meshes;

use merestone::kernels::TriangleAdjacency;
use merestone::topology::floods::Components;
use merestone::topology::{Assemble, FaceList, Id, Topology, TopologyExt};
use merestone_trial::Subject;
use merestone_trial::bare::smooth::Neighbours;
use merestone_trial::bare::{assemble, components, faces, floor, hash_map, smooth};
use merestone_trial::measure::{Job, interleaved};
use merestone_trial::values::{Cells, Values};
use petgraph::graph::{NodeIndex, UnGraph};
use std::hint::black_box;
use std::time::Duration;

/// A closure as a job; what it does is checked elsewhere, or has no result but its time.
struct Does<F>(F);

impl<F: FnMut()> Job for Does<F> {
    fn run(&mut self) {
        (self.0)();
    }

    fn values(&mut self) -> Values {
        self.run();
        Values { numbers: Vec::new(), cells: Cells::FaceLabels, scale: 1.0 }
    }
}

fn does<'a>(run: impl FnMut() + 'a) -> Box<dyn Job + 'a> {
    Box::new(Does(run))
}

fn main() {
    let budget = merestone_benches::budget();
    meshes::for_each(|name, subject| {
        let Some(triangles) = subject.triangles() else {
            println!("{name}: not all faces are triangles; nothing here takes others");
            return;
        };
        println!("{name}");
        assembling(subject, triangles, budget);
        labelling(subject, triangles, budget);
        face_pass(subject, triangles, budget);
        ring_pass(subject, budget);
    });
}

/// Times the jobs and prints each with its ratio to the first and to the last.
fn print(
    work: &str,
    elements: usize,
    names: &[&str],
    jobs: &mut [Box<dyn Job + '_>],
    budget: Duration,
) {
    let times = interleaved(jobs, budget);
    let medians: Vec<f64> =
        times.iter().map(|times| times.nanoseconds.median / elements as f64).collect();
    let (first, last) = (medians[0], medians[medians.len() - 1]);
    for (name, median) in names.iter().zip(&medians) {
        println!(
            "  {work:<12} {name:<22} {median:9.2} ns  {:7.2} × {}  {:7.2} × {}",
            median / first,
            names[0],
            median / last,
            names[names.len() - 1]
        );
    }
}

fn assembling(subject: &Subject, triangles: &[[u32; 3]], budget: Duration) {
    let vertices = subject.points().len();
    let (mut scratch, mut kept) = (assemble::start::Scratch::default(), Default::default());
    let [mut end, mut turn] = [0, 1].map(|_| vec![0; 3 * triangles.len()]);
    let mut outgoing = vec![0; vertices];
    let mut jobs = [
        does(|| {
            let list = FaceList::triangles(vertices, triangles);
            black_box(TriangleAdjacency::assemble(list).is_ok());
        }),
        does(|| {
            black_box(hash_map::assemble(triangles, vertices));
        }),
        does(|| {
            let (mut scratch, mut fresh) = Default::default();
            black_box(assemble::assemble(triangles, vertices, &mut scratch, &mut fresh).is_ok());
        }),
        does(|| {
            black_box(assemble::assemble(triangles, vertices, &mut scratch, &mut kept).is_ok());
        }),
        does(|| floor::assemble(triangles, &mut end, &mut turn, black_box(&mut outgoing))),
    ];
    let names = ["triangle kernel", "std hash map", "bare, fresh memory", "bare", "floor"];
    print("assemble", triangles.len(), &names, &mut jobs, budget);
}

fn labelling(subject: &Subject, triangles: &[[u32; 3]], budget: Duration) {
    let mesh = TriangleAdjacency::assemble(subject.faces()).expect("a closed mesh of triangles");
    let mut graph = UnGraph::<(), ()>::with_capacity(triangles.len(), mesh.edge_count());
    for _ in 0..triangles.len() {
        graph.add_node(());
    }
    for edge in mesh.edges() {
        let mut faces = mesh.edge_faces(edge).map(|face| NodeIndex::new(face.index()));
        if let (Some(a), Some(b)) = (faces.next(), faces.next()) {
            graph.add_edge(a, b, ());
        }
    }
    let mut arrays = assemble::Adjacency::default();
    assemble::assemble(triangles, subject.points().len(), &mut Default::default(), &mut arrays)
        .expect("a closed mesh of triangles");
    let mut found = Components::of(&mesh);
    let (mut labels, mut queue) = (Vec::new(), Vec::new());
    let mut written = vec![0; triangles.len()];
    let turn = &arrays.turn;
    let mut jobs = [
        does(|| found.update(black_box(&mesh))),
        does(|| {
            black_box(petgraph::algo::connected_components(&graph));
        }),
        does(|| {
            black_box(components::by_turns(&arrays, &mut labels, &mut queue));
        }),
        does(|| {
            black_box(floor::components(turn, &mut written));
        }),
    ];
    let names = ["triangle kernel", "petgraph", "bare", "floor"];
    print("components", triangles.len(), &names, &mut jobs, budget);
}

fn face_pass(subject: &Subject, triangles: &[[u32; 3]], budget: Duration) {
    let points = subject.points();
    let mesh = subject.on_kernel::<TriangleAdjacency>().expect("a closed mesh of triangles");
    let mut column = mesh.face_column([0.0; 3]);
    let mut normals = Vec::new();
    let mut written = vec![[0.0; 3]; triangles.len()];
    let mut jobs = [
        does(|| mesh.face_normals_into(black_box(&mut column))),
        does(|| faces::triangle_normals_in_lanes(points, triangles, black_box(&mut normals))),
        does(|| {
            black_box(floor::faces(points, triangles, &mut written));
        }),
    ];
    print(
        "face-normals",
        triangles.len(),
        &["triangle kernel", "bare", "floor"],
        &mut jobs,
        budget,
    );
}

fn ring_pass(subject: &Subject, budget: Duration) {
    let points = subject.points();
    let lists = Neighbours::from_loops(subject.corners(), subject.face_ends(), points.len());
    let list = subject.corners();
    let (mut moved, mut written) = (Vec::new(), vec![[0.0; 3]; points.len()]);
    let mut jobs = [
        does(|| smooth::by_lists(points, &lists, black_box(&mut moved))),
        // As many bytes as the neighbour lists have: twice the edges, and an end a vertex.
        does(|| {
            black_box(floor::ring(points, &list[..points.len()], list, &mut written));
        }),
    ];
    print("smooth", points.len(), &["bare", "floor"], &mut jobs, budget);
}
