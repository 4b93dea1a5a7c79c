//! `merestone trial`: which kernel to commit to.

mod page;

use clap::Args;
use merestone::exchange::{Format, ReadError, Records, read_bytes, read_path};
use merestone::geometry::SoupError;
use merestone_trial::{
    ChoiceError, Options, Report, Step, Subject, TrialError, foundry, kernels_named, mix_named,
    run as measure,
};
use std::io::{IsTerminal, Read, Write};
use std::path::{Path, PathBuf};
use std::process::ExitCode;

/// Measure works on the kernels, and on bare arrays, with a mesh of yours; say which kernel to take.
///
/// Every work is timed on every kernel turn and turn about, and its results are compared with those
/// of hand-written arrays value by value. Exit code 0: done; 1: some results disagree; 2: the input
/// or these words are unusable.
#[derive(Args, Debug)]
pub(crate) struct Arguments {
    /// The mesh file, PLY or STL; - is standard input
    #[arg(required_unless_present = "demo", conflicts_with = "demo")]
    file: Option<PathBuf>,

    /// Use a part of an invented foundry instead of a file: valve-body
    #[arg(long, value_name = "NAME", num_args = 0..=1, default_missing_value = "valve-body")]
    demo: Option<String>,

    /// Kernels to try, of triangle and half-edge [default: both]; bare arrays are always measured
    #[arg(long, value_name = "NAME,…", value_delimiter = ',')]
    kernels: Vec<String>,

    /// Works, and how often your program does each for one mesh: assemble, face-normals, smooth,
    /// components [default: each once]
    #[arg(long, value_name = "NAME[=COUNT],…", value_delimiter = ',')]
    work: Vec<String>,

    /// Seconds for each work on each kernel
    #[arg(long, value_name = "S", default_value_t = 0.5)]
    seconds: f64,

    /// Threads for the works; only 1 so far
    #[arg(long, value_name = "N", default_value_t = 1)]
    threads: usize,

    /// Merge vertices of equal coordinates (exact), or keep the file's numbering (none) [default:
    /// exact for formats without numbering]
    #[arg(long, value_name = "none|exact")]
    weld: Option<String>,

    /// Read the file as this format: ply or stl
    #[arg(long, value_name = "NAME")]
    format: Option<String>,

    /// Print one line of JSON instead of text
    #[arg(long)]
    json: bool,

    #[arg(long, hide = true, value_name = "FILE")]
    report: Option<PathBuf>,

    #[arg(long, hide = true, value_name = "FILE")]
    trace: Option<PathBuf>,
}

/// Why a trial could not be made.
#[derive(Debug, thiserror::Error)]
enum Failure {
    #[error(transparent)]
    Read(#[from] ReadError),
    #[error("standard input cannot be read: {0}")]
    Input(#[source] std::io::Error),
    #[error("{file}: {problem}")]
    Soup {
        file: String,
        #[source]
        problem: SoupError,
    },
    #[error("{file}: {problem}")]
    Trial {
        file: String,
        #[source]
        problem: TrialError,
    },
    #[error(transparent)]
    Choice(#[from] ChoiceError),
    #[error("{flag} is not built yet; without it the findings are printed, or given by --json")]
    NotBuilt { flag: &'static str },
    #[error(
        "{threads} threads: the works run on one thread so far, so leave --threads out or say 1"
    )]
    Threads { threads: usize },
    #[error("there is no demonstration `{name}`; available is {available}")]
    Demo { name: String, available: String },
    #[error("`{word}` is no way to weld; available are none and exact")]
    Weld { word: String },
    #[error(
        "--weld {distance}: merging within a distance is not built yet; available are none and exact"
    )]
    WeldDistance { distance: String },
    #[error("`{name}` is no format that can be read; available are ply and stl")]
    Format { name: String },
}

/// Runs the command; the exit code is the contract's.
pub(crate) fn run(arguments: &Arguments) -> ExitCode {
    let outcome = trial(arguments);
    let printed = match &outcome {
        Ok(report) if arguments.json => print_json(report),
        Ok(report) => page::print(report),
        Err(failure) => {
            complain(&failure.to_string());
            let file = arguments.file.as_ref().map(|file| file.to_string_lossy());
            let error = serde_json::json!({ "file": file, "error": failure.to_string() });
            if arguments.json { print_json(&error) } else { Ok(()) }
        }
    };
    if let Ok(Report { disagreement: Some(disagreement), .. }) = &outcome {
        complain(&disagreement.to_string());
    }
    match printed {
        Ok(()) => ExitCode::from(exit_code(outcome.as_ref())),
        // Whoever read the output has seen enough.
        Err(error) if error.kind() == std::io::ErrorKind::BrokenPipe => {
            ExitCode::from(exit_code(outcome.as_ref()))
        }
        Err(error) => {
            complain(&format!("standard output cannot be written: {error}"));
            ExitCode::from(2)
        }
    }
}

fn exit_code<E>(outcome: Result<&Report, E>) -> u8 {
    match outcome {
        Ok(report) => u8::from(report.disagreement.is_some()),
        Err(_) => 2,
    }
}

fn print_json(value: &impl serde::Serialize) -> std::io::Result<()> {
    let mut line = serde_json::to_string(value)?;
    line.push('\n');
    std::io::stdout().lock().write_all(line.as_bytes())
}

fn complain(message: &str) {
    // With standard error closed there is nobody left to tell.
    let _ = writeln!(anstream::stderr(), "merestone: {message}");
}

fn trial(arguments: &Arguments) -> Result<Report, Failure> {
    for (flag, given) in [("--report", &arguments.report), ("--trace", &arguments.trace)] {
        if given.is_some() {
            return Err(Failure::NotBuilt { flag });
        }
    }
    if arguments.threads != 1 {
        return Err(Failure::Threads { threads: arguments.threads });
    }
    let options = Options {
        kernels: kernels_named(&arguments.kernels)?,
        mix: mix_named(&arguments.work)?,
        seconds: arguments.seconds,
    };
    let subject = match &arguments.demo {
        Some(name) => demonstration(name)?,
        None => read(arguments)?,
    };
    if cfg!(debug_assertions) {
        complain("this is a debug build: its figures say nothing; use cargo run --release");
    }
    let line = StatusLine::new();
    let report = measure(&subject, &options, &mut |step| line.show(step));
    line.clear();
    report.map_err(|problem| Failure::Trial { file: subject.name().to_owned(), problem })
}

fn demonstration(name: &str) -> Result<Subject, Failure> {
    if name != "valve-body" {
        let available = foundry::DEMOS.join(", ");
        return Err(Failure::Demo { name: name.to_owned(), available });
    }
    let body = foundry::valve_body(4);
    let file = format!("{name} (demo)");
    Subject::from_triangles(body.points, &body.triangles)
        .map(|subject| subject.named(&file, None))
        .map_err(|problem| Failure::Trial { file, problem })
}

fn read(arguments: &Arguments) -> Result<Subject, Failure> {
    let format = match &arguments.format {
        None => None,
        Some(name) => {
            Some(Format::from_ending(name).ok_or_else(|| Failure::Format { name: name.clone() })?)
        }
    };
    let records = match arguments.weld.as_deref() {
        None => Records::WeldedUnlessIndexed,
        Some("none") => Records::AsFiled,
        Some("exact") => Records::Welded,
        Some(distance) if distance.parse::<f64>().is_ok_and(|d| d.is_finite() && d >= 0.0) => {
            return Err(Failure::WeldDistance { distance: distance.to_owned() });
        }
        Some(word) => return Err(Failure::Weld { word: word.to_owned() }),
    };
    // Required by the command line unless there is a demonstration.
    let path = arguments.file.as_deref().unwrap_or(Path::new("-"));
    let mesh = if path == Path::new("-") {
        let mut bytes = Vec::new();
        std::io::stdin().lock().read_to_end(&mut bytes).map_err(Failure::Input)?;
        read_bytes(&bytes, format, records, "standard input")?
    } else {
        read_path(path, format, records)?
    };
    let file = if path == Path::new("-") {
        "standard input".to_owned()
    } else {
        path.to_string_lossy().into_owned()
    };
    for note in &mesh.soup.notes {
        complain(&format!("{file}: {note}"));
    }
    let soup =
        mesh.soup.clean().map_err(|problem| Failure::Soup { file: file.clone(), problem })?;
    Subject::from_clean(soup)
        .map(|subject| subject.named(&file, Some(mesh.format.ending())))
        .map_err(|problem| Failure::Trial { file, problem })
}

/// What is being measured, on a terminal's last line; nothing elsewhere.
struct StatusLine {
    shown: bool,
}

impl StatusLine {
    fn new() -> Self {
        Self { shown: std::io::stderr().is_terminal() }
    }

    fn show(&self, step: Step) {
        self.write(&format!(
            "\r\x1b[Kmeasuring {} ({} of {}) …",
            step.work,
            step.done + 1,
            step.all
        ));
    }

    fn clear(&self) {
        self.write("\r\x1b[K");
    }

    fn write(&self, text: &str) {
        if self.shown {
            let mut stderr = std::io::stderr().lock();
            let _ = stderr.write_all(text.as_bytes());
            let _ = stderr.flush();
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use merestone_trial::kernels::{KERNELS, Kernel};
    use merestone_trial::works::Work;

    #[test]
    fn a_kernel_that_disagrees_makes_exit_code_1() {
        let subject = demonstration("valve-body").unwrap();
        let crooked = Kernel::with("crooked", |subject| {
            let moved = subject.points().iter().map(|&[x, y, z]| [x, y, z + 1.0]).collect();
            KERNELS[0].hold(&Subject::new(moved, face_list(subject)).map_err(|_| no_mesh())?)
        });
        let mix = vec![(Work::Smooth, 1)];
        for (kernel, code) in [(KERNELS[0], 0), (crooked, 1)] {
            let options = Options { kernels: vec![kernel], mix: mix.clone(), seconds: 1e-6 };
            let report = measure(&subject, &options, &mut |_| {}).unwrap();
            assert_eq!(exit_code::<()>(Ok(&report)), code);
        }
        assert_eq!(exit_code(Err(())), 2);
    }

    fn face_list(subject: &Subject) -> merestone::topology::FaceListBuf {
        let (corners, ends) = (subject.corners().to_vec(), subject.face_ends().to_vec());
        merestone::topology::FaceListBuf::from_polygons(subject.points().len(), corners, ends)
            .expect("it was one before")
    }

    fn no_mesh() -> merestone::geometry::BuildError {
        merestone::geometry::BuildError::NotFinite { point: 0, coordinates: [f64::NAN; 3] }
    }
}
