//! What keeps a topology from being a manifold, an oriented one, or the boundary of a solid.

use crate::floods::{Orientation, fan_count};
use crate::{EdgeKind, Topology, TopologyExt};
use std::fmt::{self, Debug, Display};

/// One defect and its place.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[non_exhaustive]
pub enum Defect<V, E> {
    /// There is no face.
    Empty,
    /// An edge of more than two uses.
    NonManifoldEdge {
        /// The edge.
        edge: E,
        /// How many uses it has.
        uses: usize,
    },
    /// A vertex where several fans meet.
    NonManifoldVertex {
        /// The vertex.
        vertex: V,
        /// How many fans.
        fans: usize,
    },
    /// An edge whose two uses run the same way.
    MisorientedEdge {
        /// The edge.
        edge: E,
    },
    /// A way around the surface comes back on its other side at this edge: no turning around of
    /// faces can help.
    NonOrientable {
        /// The edge.
        edge: E,
    },
    /// An edge of one use.
    BoundaryEdge {
        /// The edge.
        edge: E,
    },
}

impl<V, E> Defect<V, E> {
    /// What kind it is, in the plural.
    #[must_use]
    pub fn kind(&self) -> &'static str {
        match self {
            Self::Empty => "missing faces",
            Self::NonManifoldEdge { .. } => "non-manifold edges",
            Self::NonManifoldVertex { .. } => "non-manifold vertices",
            Self::MisorientedEdge { .. } => "misoriented edges",
            Self::NonOrientable { .. } => "non-orientable pieces",
            Self::BoundaryEdge { .. } => "boundary edges",
        }
    }
}

impl<V: Debug, E: Debug> Display for Defect<V, E> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Empty => write!(f, "there is no face"),
            Self::NonManifoldEdge { edge, uses } => write!(f, "edge {edge:?} has {uses} uses"),
            Self::NonManifoldVertex { vertex, fans } => {
                write!(f, "{fans} fans meet at vertex {vertex:?}")
            }
            Self::MisorientedEdge { edge } => {
                write!(f, "both uses of edge {edge:?} run the same way")
            }
            Self::NonOrientable { edge } => {
                write!(f, "the surface comes back on its other side at edge {edge:?}")
            }
            Self::BoundaryEdge { edge } => write!(f, "edge {edge:?} has one use only"),
        }
    }
}

/// Every defect that a check found, at least one.
///
/// Displays as one line: the number of each kind, and the first of it.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Defects<V, E> {
    wanted: &'static str,
    list: Vec<Defect<V, E>>,
}

/// The defects of a topology `K`.
pub type DefectsOf<K> = Defects<<K as Topology>::Vertex, <K as Topology>::Edge>;

impl<V, E> Defects<V, E> {
    /// The defects: edges ascending, then vertices ascending, then the rest.
    #[must_use]
    pub fn list(&self) -> &[Defect<V, E>] {
        &self.list
    }
}

impl<V: Debug, E: Debug> Display for Defects<V, E> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "not {}: ", self.wanted)?;
        let mut kinds: Vec<&'static str> = Vec::new();
        for defect in &self.list {
            let kind = defect.kind();
            if kinds.contains(&kind) {
                continue;
            }
            let separator = if kinds.is_empty() { "" } else { "; " };
            kinds.push(kind);
            let count = self.list.iter().filter(|other| other.kind() == kind).count();
            write!(f, "{separator}{count} {kind} (first: {defect})")?;
        }
        Ok(())
    }
}

impl<V: Debug, E: Debug> std::error::Error for Defects<V, E> {}

/// What a check asks for.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Wanted {
    Manifold,
    Oriented,
    Solid,
}

/// Checks a topology. O(uses).
pub(super) fn check<K: Topology>(mesh: &K, wanted: Wanted) -> Result<(), DefectsOf<K>> {
    let mut list = Vec::new();
    let mut misoriented = false;
    mesh.edges().for_each(|edge| match mesh.edge_kind(edge) {
        EdgeKind::NonManifold => {
            list.push(Defect::NonManifoldEdge { edge, uses: mesh.edge_uses(edge).count() });
        }
        EdgeKind::Misoriented if wanted >= Wanted::Oriented => {
            misoriented = true;
            list.push(Defect::MisorientedEdge { edge });
        }
        EdgeKind::Boundary if wanted >= Wanted::Solid => list.push(Defect::BoundaryEdge { edge }),
        _ => {}
    });
    mesh.vertices().for_each(|vertex| {
        let fans = fan_count(mesh, vertex);
        if fans > 1 {
            list.push(Defect::NonManifoldVertex { vertex, fans });
        }
    });
    if misoriented && let Some(edge) = Orientation::of(mesh).contradiction() {
        list.push(Defect::NonOrientable { edge });
    }
    if wanted >= Wanted::Solid && mesh.face_count() == 0 {
        list.push(Defect::Empty);
    }
    if list.is_empty() {
        return Ok(());
    }
    let wanted = match wanted {
        Wanted::Manifold => "a manifold",
        Wanted::Oriented => "an oriented manifold",
        Wanted::Solid => "the boundary of a solid",
    };
    Err(Defects { wanted, list })
}
