//! `merestone check`: whether files bound solids, and if not, where and why not.

mod json;
mod table;
mod verdict;

use clap::Args;
use merestone::exchange::{Encoding, Format, MeshFile, ReadError, Records, read_bytes, read_path};
use merestone::geometry::{
    BuildError, MeshReport, Note, PLANAR_TOLERANCE, ReportOptions, SoupError,
};
use merestone::kernels::HalfEdge;
use std::io::{self, Read, Write};
use std::path::{Path, PathBuf};
use std::process::ExitCode;
use std::str::FromStr;

/// The kernel that files are held in: it holds every complex that a file can have.
type Kernel = HalfEdge;

/// Say whether mesh files bound solids, and if not, where and why not
///
/// Exit code: 0 when every file bounds solids without a defect, 1 when a file has defects, 2 when
/// a file cannot be used.
#[derive(Args, Debug)]
pub(crate) struct Check {
    /// Mesh files, PLY or STL; - is standard input
    #[arg(required = true, value_name = "FILE")]
    files: Vec<PathBuf>,
    /// Print JSON, one object for each file
    #[arg(long)]
    json: bool,
    /// Make one vertex of vertices with equal coordinates (exact), or keep the file's own (none)
    /// [default: exact for STL, none for others]
    #[arg(long, value_name = "exact|none|DIST")]
    weld: Option<Weld>,
    /// Read the files as this format, whatever they look like
    #[arg(long, value_name = "ply|stl", value_parser = format)]
    format: Option<Format>,
    /// How many defects of each kind are listed; the counts are always complete
    #[arg(long, value_name = "N", default_value_t = 10)]
    limit: usize,
    /// An open sheet is wanted: boundary edges are no defects
    #[arg(long)]
    open: bool,
    /// How far a corner may be off its face's plane, as a part of the face's diameter
    #[arg(long, value_name = "REL", default_value_t = PLANAR_TOLERANCE, value_parser = tolerance)]
    planar: f64,
}

/// Which vertices become one.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Weld {
    Exact,
    None,
    Within(f64),
}

impl FromStr for Weld {
    type Err = String;

    fn from_str(word: &str) -> Result<Self, String> {
        match word {
            "exact" => Ok(Self::Exact),
            "none" => Ok(Self::None),
            _ => match word.parse::<f64>() {
                Ok(distance) if distance.is_finite() && distance >= 0.0 => {
                    Ok(Self::Within(distance))
                }
                _ => Err("say exact, none, or a distance that is not negative".to_owned()),
            },
        }
    }
}

fn format(word: &str) -> Result<Format, String> {
    Format::from_ending(word).ok_or_else(|| "readable are ply and stl".to_owned())
}

fn tolerance(word: &str) -> Result<f64, String> {
    match word.parse::<f64>() {
        Ok(value) if value.is_finite() && value >= 0.0 => Ok(value),
        _ => Err("say a number that is not negative, such as 1e-6".to_owned()),
    }
}

/// A file that could not be checked.
#[derive(Debug, thiserror::Error)]
enum CheckError {
    #[error(transparent)]
    Read(#[from] ReadError),
    #[error("standard input cannot be read: {0}; pipe a file into it")]
    StandardInput(io::Error),
    #[error("standard input was read already; name - once only")]
    StandardInputAgain,
    #[error("{file}: {problem}")]
    Soup { file: String, problem: SoupError },
    #[error("{file}: {problem}")]
    Build { file: String, problem: BuildError },
    #[error(
        "{file}: welding within a distance ({distance}) is not supported yet; say --weld exact or --weld none"
    )]
    WeldDistance { file: String, distance: f64 },
}

/// A file that was checked.
struct Checked {
    format: Format,
    encoding: Encoding,
    notes: Vec<Note>,
    report: MeshReport,
}

/// Checks every file and returns the worst exit code.
pub(crate) fn run(arguments: &Check) -> ExitCode {
    let mut worst = 0;
    let mut standard_input = Some(io::stdin());
    for (number, file) in arguments.files.iter().enumerate() {
        let name = file.to_string_lossy();
        let checked = check(file, &name, arguments, &mut standard_input);
        worst = worst.max(match &checked {
            Ok(checked) => u8::from(!checked.report.is_sound()),
            Err(_) => 2,
        });
        if let Err(error) = tell(arguments, number, &name, checked) {
            // Whoever reads has read enough: no reason to complain, but nothing more to do.
            if error.kind() != io::ErrorKind::BrokenPipe {
                let mut out = anstream::stderr();
                let _ = writeln!(out, "error: the answer cannot be written: {error}");
                worst = 2;
            }
            break;
        }
    }
    ExitCode::from(worst)
}

fn check(
    file: &Path,
    name: &str,
    arguments: &Check,
    standard_input: &mut Option<io::Stdin>,
) -> Result<Checked, CheckError> {
    let records = match arguments.weld {
        None => Records::WeldedUnlessIndexed,
        Some(Weld::Exact) => Records::Welded,
        Some(Weld::None) => Records::AsFiled,
        Some(Weld::Within(distance)) => {
            return Err(CheckError::WeldDistance { file: name.to_owned(), distance });
        }
    };
    let read = if file == Path::new("-") {
        let mut input = standard_input.take().ok_or(CheckError::StandardInputAgain)?;
        let mut bytes = Vec::new();
        input.read_to_end(&mut bytes).map_err(CheckError::StandardInput)?;
        read_bytes(&bytes, arguments.format, records, "standard input")
    } else {
        read_path(file, arguments.format, records)
    };
    let MeshFile { format, encoding, mut soup } = read?;
    let notes = std::mem::take(&mut soup.notes);
    // Nothing here looks at columns, and they are as large as the points.
    soup.vertex_columns.clear();
    soup.face_columns.clear();
    let clean =
        soup.clean().map_err(|problem| CheckError::Soup { file: name.to_owned(), problem })?;
    let options = ReportOptions {
        planar_tolerance: arguments.planar,
        listed_per_kind: arguments.limit,
        open: arguments.open,
    };
    let report = MeshReport::new::<Kernel>(&clean, &options)
        .map_err(|problem| CheckError::Build { file: name.to_owned(), problem })?;
    Ok(Checked { format, encoding, notes, report })
}

/// Prints what came out for one file.
fn tell(
    arguments: &Check,
    number: usize,
    name: &str,
    checked: Result<Checked, CheckError>,
) -> io::Result<()> {
    if let Ok(checked) = &checked {
        let mut warn = anstream::stderr().lock();
        for warning in verdict::warnings(checked) {
            writeln!(warn, "warning: {name}: {warning}")?;
        }
    }
    let mut out = anstream::stdout().lock();
    match checked {
        Ok(checked) if arguments.json => json::write(&mut out, name, &checked)?,
        Ok(checked) => {
            if number > 0 {
                writeln!(out)?;
            }
            table::write(&mut out, name, &checked, arguments.limit)?;
        }
        Err(error) if arguments.json => json::write_error(&mut out, name, &error.to_string())?,
        Err(error) => {
            out.flush()?;
            writeln!(anstream::stderr(), "error: {error}")?;
        }
    }
    out.flush()
}
