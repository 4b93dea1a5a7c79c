//! Whether the faces can all face the same side, and which would have to be turned around.

use crate::{Column, EdgeKind, Id, Topology, TopologyExt};

/// A choice of orientation: for each face whether to turn it around, found by a flood over the
/// edges of exactly two uses.
#[derive(Clone, Debug)]
pub struct Orientation<F, E> {
    turned: Column<F, bool>,
    contradiction: Option<E>,
}

impl<F: Id, E: Id> Orientation<F, E> {
    /// Floods each component from its first face, which stays as it is. O(uses).
    #[must_use]
    pub fn of<K: Topology<Face = F, Edge = E>>(mesh: &K) -> Self {
        let mut turned = mesh.face_column(false);
        let mut fixed = mesh.face_column(false);
        let mut contradiction = None;
        let mut front = std::collections::VecDeque::new();
        for seed in mesh.faces() {
            if std::mem::replace(&mut fixed[seed], true) {
                continue;
            }
            front.push_back(seed);
            while let Some(face) = front.pop_front() {
                for h in mesh.face_corners(face) {
                    let flips = match mesh.edge_kind_at(h) {
                        EdgeKind::Plain => false,
                        EdgeKind::Misoriented => true,
                        EdgeKind::Boundary | EdgeKind::NonManifold => continue,
                    };
                    let across = mesh.across(h);
                    let wanted = turned[face] != flips;
                    if !std::mem::replace(&mut fixed[across], true) {
                        turned[across] = wanted;
                        front.push_back(across);
                    } else if turned[across] != wanted && contradiction.is_none() {
                        contradiction = Some(mesh.edge(h));
                    }
                }
            }
        }
        Self { turned, contradiction }
    }

    /// Whether turning some faces around leaves no misoriented edge.
    #[must_use]
    pub fn is_orientable(&self) -> bool {
        self.contradiction.is_none()
    }

    /// The first edge whose two uses the flood reached with opposite demands: a way around the
    /// surface that comes back on its other side.
    #[must_use]
    pub fn contradiction(&self) -> Option<E> {
        self.contradiction
    }

    /// Whether to turn `face` around. Means nothing where the mesh is not orientable.
    #[must_use]
    pub fn is_turned(&self, face: F) -> bool {
        self.turned[face]
    }
}
