//! The trial itself.

use crate::kernels::{BARE, KERNELS, Kernel, OnKernel};
use crate::measure::{self, Job, Times};
use crate::report::{Disagreement, Held, MeshCounts, MixPart, Outcome, Report};
use crate::verdict::{Contender, decide, rounded};
use crate::works::{Layout, Work};
use crate::{Machine, Subject, TrialError};
use merestone::kernels::HalfEdge;
use merestone::topology::ArrayBytes;
use std::time::Duration;

/// What is tried, and for how long.
#[derive(Clone, Debug)]
pub struct Options {
    /// The kernels, in the order they take turns in.
    pub kernels: Vec<Kernel>,
    /// The works, and how often the caller's program does each of them.
    pub mix: Vec<(Work, u64)>,
    /// Seconds for each work on each kernel; at least [`measure::FEWEST_ROUNDS`] rounds are made.
    pub seconds: f64,
}

impl Default for Options {
    fn default() -> Self {
        let mix = Work::ALL.map(|work| (work, 1)).to_vec();
        Self { kernels: KERNELS.to_vec(), mix, seconds: 0.5 }
    }
}

/// How far a trial has come.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Step {
    /// The work that is measured next.
    pub work: Work,
    /// How many works are done.
    pub done: usize,
    /// How many there are.
    pub all: usize,
}

/// Tries the mix of works on the kernels and on bare arrays, on one mesh and one thread.
///
/// Results are compared before anything is timed. A disagreement does not end the trial: it is in
/// the report. `progress` is called before each work.
///
/// # Errors
/// [`TrialError`] where the bare arrays cannot hold the mesh, or no time is given. A kernel that
/// cannot hold the mesh is no error: the report says so.
pub fn run(
    subject: &Subject,
    options: &Options,
    progress: &mut dyn FnMut(Step),
) -> Result<Report, TrialError> {
    let budget = Some(options.seconds)
        .filter(|seconds| *seconds > 0.0 && *seconds <= 3600.0)
        .map(Duration::from_secs_f64)
        .ok_or(TrialError::Seconds { seconds: options.seconds })?;
    let tried: Vec<Tried> =
        options.kernels.iter().map(|kernel| Tried::new(kernel, subject)).collect();
    let mut mesh = counts(subject, &tried)?;
    mesh.isolated_vertices += subject.dropped_vertices();
    mesh.collapsed_faces = subject.collapsed_faces();
    let mut trial =
        Trial { subject, budget, results: Vec::new(), bare_arrays: Vec::new(), disagreement: None };
    let mut times = Vec::with_capacity(options.mix.len());
    for (done, &(work, _)) in options.mix.iter().enumerate() {
        progress(Step { work, done, all: options.mix.len() });
        times.push(trial.measure(work, &tried)?);
    }
    let faces = subject.face_count();
    let mut kernels: Vec<Held> = tried.iter().map(|tried| tried.held(faces)).collect();
    kernels.push(bare_held(&trial.bare_arrays, faces));
    let contender = |index: usize, held: &Held| {
        let times: Option<Vec<[f64; 3]>> = times.iter().map(|row| row[index]).collect();
        Some(Contender { kernel: held.kernel, bytes: held.bytes?, times: times? })
    };
    let mut contenders: Vec<Contender> =
        kernels.iter().enumerate().filter_map(|(index, held)| contender(index, held)).collect();
    let bare = contenders.pop_if(|last| last.kernel == BARE);
    let excluded: Vec<(&'static str, String)> = tried
        .iter()
        .filter_map(|tried| Some((tried.name, tried.mesh.as_ref().err()?.clone())))
        .collect();
    Ok(Report {
        mesh,
        machine: Machine::here(1),
        kernels,
        results: trial.results,
        mix: options
            .mix
            .iter()
            .map(|&(work, count)| MixPart { work: work.name(), count })
            .collect(),
        verdict: decide(&contenders, bare.as_ref(), &excluded, &options.mix),
        break_even: Vec::new(),
        disagreement: trial.disagreement,
    })
}

/// A kernel with the mesh on it, or the reason why it cannot hold it.
struct Tried {
    name: &'static str,
    mesh: Result<Box<dyn OnKernel>, String>,
}

impl Tried {
    fn new(kernel: &Kernel, subject: &Subject) -> Self {
        let mesh = kernel.hold(subject).map_err(|error| error.to_string());
        Self { name: kernel.name(), mesh }
    }

    fn held(&self, faces: usize) -> Held {
        match &self.mesh {
            Ok(mesh) => {
                let footprint = mesh.footprint();
                let peak = Some(footprint.assembly_peak).filter(|&peak| peak > 0);
                Held { assembly_peak: peak, ..held(self.name, &footprint.arrays, faces) }
            }
            Err(reason) => Held {
                bytes: None,
                bytes_per_face: None,
                lossless: false,
                note: Some(reason.clone()),
                ..held(self.name, &[], faces)
            },
        }
    }
}

fn held(kernel: &'static str, arrays: &[ArrayBytes], faces: usize) -> Held {
    let bytes = arrays.iter().map(|array| array.bytes).sum();
    Held {
        kernel,
        bytes: Some(bytes),
        bytes_by_array: arrays.iter().map(|array| (array.name, array.bytes)).collect(),
        bytes_per_face: Some(rounded(bytes as f64 / faces.max(1) as f64)),
        assembly_peak: None,
        lossless: true,
        note: None,
    }
}

fn bare_held(arrays: &[ArrayBytes], faces: usize) -> Held {
    let note =
        "the arrays that these works need, each for one purpose: no ids, no edits, no checks";
    Held { note: Some(note.to_owned()), ..held(BARE, arrays, faces) }
}

/// The mesh in counts, by the first kernel that holds it, or one that holds any.
fn counts(subject: &Subject, tried: &[Tried]) -> Result<MeshCounts, TrialError> {
    let survey = match tried.iter().find_map(|tried| tried.mesh.as_ref().ok()) {
        Some(mesh) => mesh.survey(),
        None => subject.on_kernel::<HalfEdge>()?.survey(),
    };
    Ok(MeshCounts::new(subject.name(), subject.format(), &survey))
}

struct Trial<'a> {
    subject: &'a Subject,
    budget: Duration,
    results: Vec<Outcome>,
    bare_arrays: Vec<ArrayBytes>,
    disagreement: Option<Disagreement>,
}

impl Trial<'_> {
    /// Compares and times one work on all kernels; the low end, median and high end of each, bare
    /// arrays last.
    fn measure(
        &mut self,
        work: Work,
        tried: &[Tried],
    ) -> Result<Vec<Option<[f64; 3]>>, TrialError> {
        let subject = self.subject;
        let mut jobs: Vec<Box<dyn Job + '_>> = Vec::with_capacity(tried.len() + 1);
        let mut rows = Vec::with_capacity(tried.len() + 1);
        let bare = work.on_bare(subject, Layout::Best)?;
        let expected = match bare {
            None => None,
            Some(mut bare) => {
                for array in bare.arrays() {
                    if !self.bare_arrays.iter().any(|known| known.name == array.name) {
                        self.bare_arrays.push(array);
                    }
                }
                let values = bare.values();
                Some((bare, values))
            }
        };
        for tried in tried {
            let row = unsupported(tried.name, work, subject);
            match &tried.mesh {
                Err(reason) => rows.push(Outcome { reason: Some(reason.clone()), ..row }),
                Ok(mesh) => {
                    let mut job = mesh.job(work, subject);
                    let values = job.values();
                    let difference =
                        expected.as_ref().and_then(|(_, wanted)| values.first_difference(wanted));
                    let agrees = expected.as_ref().map(|_| difference.is_none());
                    if let (Some(difference), None) = (difference, &self.disagreement) {
                        let (kernel, work) = (tried.name, work.name());
                        self.disagreement = Some(Disagreement { kernel, work, difference });
                    }
                    let checksum = Some(values.checksum());
                    rows.push(Outcome { supported: true, checksum, agrees, ..row });
                    jobs.push(job);
                }
            }
        }
        if let Some((bare, values)) = expected {
            let (checksum, agrees) = (Some(values.checksum()), Some(true));
            let row = unsupported(BARE, work, subject);
            rows.push(Outcome { supported: true, checksum, agrees, ..row });
            jobs.push(bare);
        }
        let mut times = measure::interleaved(&mut jobs, self.budget).into_iter();
        let mut ends = Vec::with_capacity(rows.len());
        for row in &mut rows {
            let time = if row.supported { times.next() } else { None };
            ends.push(time.map(|time| fill(row, time)));
        }
        self.results.append(&mut rows);
        Ok(ends)
    }
}

fn unsupported(kernel: &'static str, work: Work, subject: &Subject) -> Outcome {
    Outcome {
        kernel,
        work: work.name(),
        supported: false,
        reason: None,
        elements: work.elements(subject),
        runs: 0,
        runs_per_sample: 0,
        median_ns: None,
        low_ns: None,
        high_ns: None,
        ns_per_element: None,
        checksum: None,
        agrees: None,
    }
}

fn fill(row: &mut Outcome, time: Times) -> [f64; 3] {
    let summary = time.nanoseconds;
    row.runs = summary.count;
    row.runs_per_sample = time.runs_per_sample;
    let ends = [summary.low, summary.median, summary.high].map(rounded);
    [row.low_ns, row.median_ns, row.high_ns] = ends.map(Some);
    row.ns_per_element = Some(rounded(ends[1] / row.elements.max(1) as f64));
    ends
}
