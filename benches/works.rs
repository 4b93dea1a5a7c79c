//! The works of the trial as criterion benches: every kernel, and bare arrays on every layout.
//!
//! Each group is one work on one mesh: `S` has 20,480 triangles, `M` 1,310,720, coherent and
//! shuffled; with `MERESTONE_BENCH_FILE` set to a mesh file, that file's mesh instead. `bare` is the best
//! way found, `bare, turns` and `bare, half-edges` the best on the arrays that the triangle and the
//! half-edge kernel keep. Throughput is in elements (faces, vertices for `smooth`). What is given
//! to a work is made outside the clock, and what it leaves behind is dropped there.
//!
//! Criterion measures one after the other; for ratios on a machine that does other work, too, run
//! `cargo bench -p merestone-benches --bench ratios`.

#![expect(clippy::print_stderr, reason = "a bench talks to the person who runs it")]

mod meshes;

use criterion::{Criterion, Throughput, criterion_group, criterion_main};
use merestone_trial::Subject;
use merestone_trial::kernels::KERNELS;
use merestone_trial::measure::Job;
use merestone_trial::works::{Layout, Work};
use std::time::{Duration, Instant};

fn works(criterion: &mut Criterion) {
    meshes::for_each(|name, subject| {
        for work in Work::ALL {
            register(criterion, name, work, subject);
        }
    });
}

/// One work on one mesh as a group.
fn register(criterion: &mut Criterion, name: &str, work: Work, subject: &Subject) {
    let mut group = criterion.benchmark_group(format!("{work}/{name}"));
    group.sample_size(10).warm_up_time(Duration::from_millis(300));
    group.measurement_time(Duration::from_secs(1));
    group.throughput(Throughput::Elements(work.elements(subject) as u64));
    for kernel in KERNELS {
        match kernel.hold(subject) {
            Ok(mesh) => {
                let mut job = mesh.job(work, subject);
                group
                    .bench_function(kernel.name(), |b| b.iter_custom(|runs| time(&mut *job, runs)));
            }
            Err(reason) => eprintln!("{work}/{name}: {reason}"),
        }
    }
    let layouts = [
        ("bare", Layout::Best),
        ("bare, turns", Layout::Turns),
        ("bare, half-edges", Layout::HalfEdges),
    ];
    for (label, layout) in layouts {
        match work.on_bare(subject, layout) {
            Ok(Some(mut job)) => {
                group.bench_function(label, |b| b.iter_custom(|runs| time(&mut *job, runs)));
            }
            Ok(None) => {}
            Err(reason) => eprintln!("{work}/{name}: {reason}"),
        }
    }
    group.finish();
}

/// Only the runs are timed, one by one: what a run makes is dropped before the next one.
fn time(job: &mut dyn Job, runs: u64) -> Duration {
    let mut lasted = Duration::ZERO;
    for _ in 0..runs {
        job.reserve(1);
        let begin = Instant::now();
        job.run();
        lasted += begin.elapsed();
        job.clear();
    }
    lasted
}

criterion_group!(benches, works);
criterion_main!(benches);
