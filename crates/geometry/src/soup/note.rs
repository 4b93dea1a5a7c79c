//! What a reader has to say about a file it could read.

use std::fmt;

/// One kind of irregularity in a file that could be read all the same.
///
/// ```
/// use merestone_geometry::{Note, NoteKind};
/// let note = Note::new(NoteKind::TrailingBytes, 7, "7 bytes follow the last facet");
/// assert_eq!(note.to_string(), "7 bytes follow the last facet");
/// ```
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Note {
    /// Which kind.
    pub kind: NoteKind,
    /// How often it occurs.
    pub count: usize,
    /// A sentence for people: what, where first, and what was done about it.
    pub message: String,
}

impl Note {
    /// A note of this kind.
    #[must_use]
    pub fn new(kind: NoteKind, count: usize, message: impl Into<String>) -> Self {
        Self { kind, count, message: message.into() }
    }
}

impl fmt::Display for Note {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.message)
    }
}

/// What a [`Note`] is about.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
#[non_exhaustive]
pub enum NoteKind {
    /// The file announces another number of records than it holds.
    WrongCount,
    /// Bytes after the last record, or text after the last statement.
    TrailingBytes,
    /// A statement that opens or closes something is missing.
    Unclosed,
    /// Two names that should be equal differ.
    NameMismatch,
    /// Facets of other than three vertices in a format of triangles.
    FacetCorners,
    /// Facet normals that are missing or zero.
    MissingNormal,
    /// Facet normals that are no numbers.
    InvalidNormal,
    /// Facet normals that point elsewhere than the facet's corners say.
    WrongNormal,
    /// Faces without any corner.
    EmptyFaces,
    /// Elements or properties that were read over.
    Skipped,
    /// There is not a single face.
    NoFaces,
}
