//! Why a file could not be read, and where.

use merestone_topology::FaceListError;
use std::fmt;

/// A file that could not be read: which, where in it, why, and what to do.
///
/// ```
/// use merestone_exchange::{Place, Records, read_bytes};
/// let text = b"solid s\nfacet normal 0 0 1\nouter loop\nvertex 0 0 nan\n";
/// let error = read_bytes(text, None, Records::AsFiled, "plate.stl").unwrap_err();
/// assert_eq!(error.place(), Place::Line(4));
/// assert!(error.to_string().starts_with("plate.stl, line 4: coordinate z is nan, "));
/// ```
#[derive(Debug, thiserror::Error)]
#[error("{file}{place}: {problem}")]
pub struct ReadError {
    file: String,
    place: Place,
    #[source]
    problem: ReadProblem,
}

impl ReadError {
    pub(crate) fn new(file: &str, fault: Fault) -> Self {
        Self { file: file.to_owned(), place: fault.place, problem: fault.problem }
    }

    /// The file's name as it was given.
    #[must_use]
    pub fn file(&self) -> &str {
        &self.file
    }

    /// Where in the file.
    #[must_use]
    pub fn place(&self) -> Place {
        self.place
    }

    /// What is wrong.
    #[must_use]
    pub fn problem(&self) -> &ReadProblem {
        &self.problem
    }
}

/// A place in a file.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Place {
    /// The file as a whole.
    File,
    /// A line of a text format, counted from 1.
    Line(usize),
    /// A byte of a binary format, counted from 0.
    Byte(usize),
}

impl fmt::Display for Place {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::File => Ok(()),
            Self::Line(line) => write!(f, ", line {line}"),
            Self::Byte(byte) => write!(f, ", byte {byte}"),
        }
    }
}

/// What can be wrong with a file.
#[derive(Debug, thiserror::Error)]
#[non_exhaustive]
pub enum ReadProblem {
    /// The system could not hand the file over.
    #[error("cannot be read: {0}; check the name and the permissions")]
    Io(std::io::Error),
    /// Not a single byte, or blanks only.
    #[error("the file is empty; export the model again")]
    Empty,
    /// Neither content nor name tells.
    #[error(
        "neither the content nor the ending says what format this is; readable are PLY and STL, so convert the file or say which of them it is"
    )]
    UnknownFormat,
    /// A format that is known but not read.
    #[error("this looks like {found}, which is not supported yet; convert it to PLY or STL")]
    Unsupported {
        /// The format.
        found: &'static str,
    },
    /// A statement other than what the grammar allows here.
    #[error("expected {expected}, found {found}; mend that line or export the model again")]
    Expected {
        /// What may stand here.
        expected: &'static str,
        /// What stands here, shortened.
        found: String,
    },
    /// A coordinate that is no number.
    #[error(
        "coordinate {axis} is {found}, which is not a finite number; mend or remove that vertex"
    )]
    NotFinite {
        /// `'x'`, `'y'` or `'z'`.
        axis: char,
        /// What stands there.
        found: String,
    },
    /// The file stops in the middle of something.
    #[error("the file ends inside {inside}; it is incomplete, so copy or export it again")]
    Truncated {
        /// What is incomplete.
        inside: String,
    },
    /// A header that does not describe a mesh that can be read.
    #[error("{0}; mend the header or export the model again")]
    Header(String),
    /// A row that does not fit what the header says of it.
    #[error("row {row} of element `{element}` does not fit the header: {reason}")]
    Row {
        /// The element's name.
        element: String,
        /// The row's number, from 0.
        row: usize,
        /// What does not fit.
        reason: String,
    },
    /// A face that names a vertex the file does not have.
    #[error(
        "face {face} names vertex {index}, but the file has {vertices} vertices numbered from 0; mend the face or add the vertex"
    )]
    IndexOutOfRange {
        /// The face's number, from 0.
        face: usize,
        /// The vertex number it holds.
        index: i64,
        /// How many vertices there are.
        vertices: usize,
    },
    /// More cells than can be numbered.
    #[error(transparent)]
    TooMany(#[from] FaceListError),
}

/// A problem and its place, before the file's name is known.
#[derive(Debug)]
pub(crate) struct Fault {
    pub(crate) place: Place,
    pub(crate) problem: ReadProblem,
}

impl Fault {
    pub(crate) fn file(problem: ReadProblem) -> Self {
        Self { place: Place::File, problem }
    }

    pub(crate) fn byte(byte: usize, problem: ReadProblem) -> Self {
        Self { place: Place::Byte(byte), problem }
    }

    pub(crate) fn line(line: usize, problem: ReadProblem) -> Self {
        Self { place: Place::Line(line), problem }
    }
}

/// What a file says, fit for a message: quoted, readable, and not a page long.
pub(crate) fn quote(bytes: &[u8]) -> String {
    const LONGEST: usize = 40;
    let shown = String::from_utf8_lossy(&bytes[..bytes.len().min(LONGEST)]);
    let shown: String =
        shown.chars().map(|c| if c.is_control() { '\u{fffd}' } else { c }).collect();
    format!("`{shown}{}`", if bytes.len() > LONGEST { "…" } else { "" })
}
