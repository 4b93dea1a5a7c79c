//! What can be wrong with a mesh, and where.

use std::fmt;

/// A kind of defect. Each has a count in [`MeshReport`](super::MeshReport).
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
#[non_exhaustive]
pub enum DefectKind {
    /// An edge of one use.
    BoundaryEdges,
    /// An edge of more than two uses.
    NonManifoldEdges,
    /// An edge whose two uses run the same way.
    MisorientedEdges,
    /// An edge with more uses one way than the other: a boundary or misoriented edge always, a
    /// non-manifold one sometimes.
    UnbalancedEdges,
    /// A vertex where several fans meet.
    NonManifoldVertices,
    /// A face that was dropped because fewer than three different vertices were left of it.
    CollapsedFaces,
    /// A face whose corners lie on one line.
    ZeroAreaFaces,
    /// A face that repeats an earlier one.
    DuplicateFaces,
    /// A face whose corners lie in no common plane.
    NonPlanarFaces,
}

impl DefectKind {
    /// Every kind, in the order in which defects are listed.
    pub const ALL: [Self; 9] = [
        Self::BoundaryEdges,
        Self::NonManifoldEdges,
        Self::MisorientedEdges,
        Self::UnbalancedEdges,
        Self::NonManifoldVertices,
        Self::CollapsedFaces,
        Self::ZeroAreaFaces,
        Self::DuplicateFaces,
        Self::NonPlanarFaces,
    ];

    /// The kind's name for other programs: the name of its count.
    ///
    /// ```
    /// use merestone_geometry::DefectKind;
    /// assert_eq!(DefectKind::BoundaryEdges.key(), "boundary_edges");
    /// ```
    #[must_use]
    pub const fn key(self) -> &'static str {
        match self {
            Self::BoundaryEdges => "boundary_edges",
            Self::NonManifoldEdges => "non_manifold_edges",
            Self::MisorientedEdges => "misoriented_edges",
            Self::UnbalancedEdges => "unbalanced_edges",
            Self::NonManifoldVertices => "non_manifold_vertices",
            Self::CollapsedFaces => "collapsed_faces",
            Self::ZeroAreaFaces => "zero_area_faces",
            Self::DuplicateFaces => "duplicate_faces",
            Self::NonPlanarFaces => "non_planar_faces",
        }
    }

    /// So many of this kind, in words.
    ///
    /// ```
    /// use merestone_geometry::DefectKind;
    /// assert_eq!(DefectKind::ZeroAreaFaces.counted(1), "1 face without area");
    /// assert_eq!(DefectKind::NonManifoldVertices.counted(2), "2 non-manifold vertices");
    /// ```
    #[must_use]
    pub fn counted(self, count: usize) -> String {
        let (one, many) = match self {
            Self::BoundaryEdges => ("boundary edge", "boundary edges"),
            Self::NonManifoldEdges => ("non-manifold edge", "non-manifold edges"),
            Self::MisorientedEdges => ("misoriented edge", "misoriented edges"),
            Self::UnbalancedEdges => ("unbalanced edge", "unbalanced edges"),
            Self::NonManifoldVertices => ("non-manifold vertex", "non-manifold vertices"),
            Self::CollapsedFaces => ("collapsed face", "collapsed faces"),
            Self::ZeroAreaFaces => ("face without area", "faces without area"),
            Self::DuplicateFaces => ("duplicate face", "duplicate faces"),
            Self::NonPlanarFaces => ("face that is not flat", "faces that are not flat"),
        };
        format!("{count} {}", if count == 1 { one } else { many })
    }
}

/// A cell that a defect concerns, by the numbers of the soup that was cleaned.
///
/// Where that soup was read without a weld, these are the file's own numbers, counted from 0; a
/// weld renumbers vertices, never faces.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum DefectCell {
    /// A vertex.
    Vertex(usize),
    /// An edge, by its two vertices, in its direction.
    Edge([usize; 2]),
    /// A face.
    Face(usize),
}

/// One defect: its kind, its place, the cells it concerns, and a sentence.
#[derive(Clone, Debug, PartialEq)]
pub struct MeshDefect {
    /// What kind.
    pub kind: DefectKind,
    /// Where: a vertex, the middle of an edge, the mean of a face's outer corners, the first
    /// corner of a face that collapsed.
    pub at: [f64; 3],
    /// The cells at fault; of an edge at most 16 faces.
    pub cells: Vec<DefectCell>,
    /// What is wrong, for people.
    pub message: String,
}

impl fmt::Display for MeshDefect {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.message)
    }
}
