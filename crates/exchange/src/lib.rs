//! Mesh files in and out: one file a format, by content first, then by ending.
//!
//! Readers hand out a [`PolygonSoup`]: points, loops and columns
//! as the file has them. Whatever the file says of its own length, memory stays in proportion to
//! the bytes it really has; whatever is irregular but readable becomes a
//! [`Note`](merestone_geometry::Note), and nothing is dropped without one.
//!
//! ```
//! use merestone_exchange::{Format, Records, read_bytes};
//! let text = b"ply\nformat ascii 1.0\nelement vertex 3\n\
//!     property float x\nproperty float y\nproperty float z\n\
//!     element face 1\nproperty list uchar int vertex_indices\nend_header\n\
//!     0 0 0\n1 0 0\n0 1 0\n3 0 1 2\n";
//! let file = read_bytes(text, None, Records::AsFiled, "plate.ply")?;
//! assert_eq!(file.format, Format::Ply);
//! assert_eq!((file.soup.points.len(), file.soup.faces.as_list().face_count()), (3, 1));
//! # Ok::<(), merestone_exchange::ReadError>(())
//! ```
#![forbid(unsafe_code)]

mod cursor;
mod error;
mod format;
mod ply;
mod stl;

pub use error::{Place, ReadError, ReadProblem};
pub use format::{Encoding, Format, detect};

use error::Fault;
use merestone_geometry::PolygonSoup;
use std::path::Path;

/// A file as read.
#[derive(Clone, Debug)]
pub struct MeshFile {
    /// The format it turned out to have.
    pub format: Format,
    /// How its numbers are written.
    pub encoding: Encoding,
    /// What it holds.
    pub soup: PolygonSoup,
}

/// Whether records with equal coordinates become one vertex while a file is read.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Records {
    /// Every record stays a point of its own.
    #[default]
    AsFiled,
    /// As after [`PolygonSoup::weld_exact`]. A binary STL file is read faster this way, and in less
    /// than half the memory, since its records are never held.
    Welded,
    /// Welded for formats without an index, as filed for the others.
    WeldedUnlessIndexed,
}

/// Reads the mesh file at `path`; with `format` the content is read as that, come what may.
///
/// The whole file is held in memory while it is parsed.
///
/// ```no_run
/// use merestone_exchange::{Records, read_path};
/// let file = read_path("bollard.stl", None, Records::Welded)?;
/// println!("{} vertices", file.soup.points.len());
/// # Ok::<(), merestone_exchange::ReadError>(())
/// ```
///
/// # Errors
/// [`ReadError`] with the line or byte.
pub fn read_path(
    path: impl AsRef<Path>,
    format: Option<Format>,
    records: Records,
) -> Result<MeshFile, ReadError> {
    let path = path.as_ref();
    let name = path.to_string_lossy();
    let bytes = std::fs::read(path)
        .map_err(|error| ReadError::new(&name, Fault::file(ReadProblem::Io(error))))?;
    read_named(&bytes, format, records, path, &name)
}

/// Reads a mesh file from memory. `name` goes into messages, and its ending helps where neither
/// `format` nor the content tells the format.
///
/// # Errors
/// [`ReadError`] with the line or byte.
pub fn read_bytes(
    bytes: &[u8],
    format: Option<Format>,
    records: Records,
    name: &str,
) -> Result<MeshFile, ReadError> {
    read_named(bytes, format, records, Path::new(name), name)
}

fn read_named(
    bytes: &[u8],
    format: Option<Format>,
    records: Records,
    path: &Path,
    name: &str,
) -> Result<MeshFile, ReadError> {
    let read = || {
        let format = match format {
            Some(format) => format,
            None => detect(bytes, path).map_err(Fault::file)?,
        };
        let weld = match records {
            Records::AsFiled => false,
            Records::Welded => true,
            Records::WeldedUnlessIndexed => !format.has_index(),
        };
        let (encoding, soup) = match format {
            Format::Ply => {
                let (encoding, soup) = ply::read(bytes)?;
                (encoding, if weld { soup.weld_exact().0 } else { soup })
            }
            Format::Stl => stl::read(bytes, weld)?,
        };
        Ok(MeshFile { format, encoding, soup })
    };
    read().map_err(|fault| ReadError::new(name, fault))
}
