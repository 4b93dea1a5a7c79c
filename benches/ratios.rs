//! What the shared trait costs: each kernel beside bare arrays on its own layout, in one run.
//!
//! The jobs take turns round by round, so a loaded machine slows both sides of a ratio. Printed
//! for every mesh (see `meshes`) and work, in nanoseconds an element: the kernels, the best bare
//! way, and the ways on the kernels' own layouts; and, for each kernel, the ratios to its layout's
//! and to the best. Arguments that are names of works choose among them; `SECONDS` in the
//! environment is the time for each row (default 1).

#![expect(clippy::print_stdout, reason = "a bench talks to the person who runs it")]

mod meshes;

use merestone_trial::Subject;
use merestone_trial::kernels::KERNELS;
use merestone_trial::measure::{Job, interleaved};
use merestone_trial::works::{Layout, Work};
use std::time::Duration;

fn main() {
    let words: Vec<String> = std::env::args().skip(1).collect();
    let chosen: Vec<Work> =
        Work::ALL.into_iter().filter(|work| words.iter().any(|word| word == work.name())).collect();
    let works = if chosen.is_empty() { Work::ALL.to_vec() } else { chosen };
    let budget = merestone_benches::budget();
    println!(
        "{:<12} {:<13} {:>9} {:>9} {:>9} {:>9} {:>9}   {:>8} {:>6}   {:>9} {:>6}",
        "mesh",
        "work",
        "triangle",
        "half-edge",
        "best",
        "turns",
        "links",
        "tri/own",
        "/best",
        "he/own",
        "/best"
    );
    meshes::for_each(|name, subject| {
        for &work in &works {
            println!("{name:<12} {:<13} {}", work.name(), row(work, subject, budget));
        }
    });
}

fn row(work: Work, subject: &Subject, budget: Duration) -> String {
    let held: Vec<_> = KERNELS.iter().map(|kernel| kernel.hold(subject).ok()).collect();
    // Kernels first, then the bare layouts: a column each.
    let on_kernels = held.iter().map(|mesh| mesh.as_ref().map(|mesh| mesh.job(work, subject)));
    let on_bare = [Layout::Best, Layout::Turns, Layout::HalfEdges]
        .map(|layout| work.on_bare(subject, layout).ok().flatten());
    let mut jobs: Vec<Box<dyn Job + '_>> = Vec::new();
    let mut places = Vec::new();
    for job in on_kernels.chain(on_bare) {
        places.push(job.as_ref().map(|_| jobs.len()));
        jobs.extend(job);
    }
    let times = interleaved(&mut jobs, budget);
    let elements = work.elements(subject) as f64;
    let figures: Vec<f64> = places
        .iter()
        .map(|place| place.map_or(f64::NAN, |place| times[place].nanoseconds.median / elements))
        .collect();
    let columns =
        figures.iter().map(|figure| format!("{figure:9.2}")).collect::<Vec<_>>().join(" ");
    let [triangle, half_edge, best, turns, links] = figures[..] else { return columns };
    format!(
        "{columns}   {:8.2} {:6.2}   {:9.2} {:6.2}",
        triangle / turns,
        triangle / best,
        half_edge / links,
        half_edge / best
    )
}
