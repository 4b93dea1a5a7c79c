//! Over faces, breadth first.

use crate::{Column, Id, Topology, TopologyExt};

/// The workspace of a flood over faces: which were reached, and the front.
///
/// Using it again costs nothing per face that is not reached.
///
/// ```
/// # use merestone_topology::{*, floods::FaceFlood};
/// # fn f<K: Topology>(mesh: &K) {
/// let mut flood = FaceFlood::new();
/// let mut components = 0;
/// for face in mesh.faces() {
///     if !flood.has_reached(face) {
///         components += 1;
///         flood.from(mesh, face).for_each(drop);
///     }
/// }
/// # }
/// ```
#[derive(Clone, Debug)]
pub struct FaceFlood<F> {
    reached: Column<F, bool>,
    front: std::collections::VecDeque<F>,
    touched: Vec<F>,
}

impl<F: Id> Default for FaceFlood<F> {
    fn default() -> Self {
        Self::new()
    }
}

impl<F: Id> FaceFlood<F> {
    /// An empty workspace.
    #[must_use]
    pub fn new() -> Self {
        Self {
            reached: Column::new(0, false),
            front: std::collections::VecDeque::new(),
            touched: Vec::new(),
        }
    }

    /// Whether a flood since the last [`clear`](Self::clear) reached `face`.
    #[must_use]
    pub fn has_reached(&self, face: F) -> bool {
        self.reached.get(face).is_some_and(|&reached| reached)
    }

    /// Forgets what was reached. O(faces reached).
    pub fn clear(&mut self) {
        for face in self.touched.drain(..) {
            self.reached[face] = false;
        }
        self.front.clear();
    }

    /// The faces joined to `seed` through shared edges, `seed` first, breadth first; those of one
    /// face in the order of its corners and radially. Faces reached before are left out.
    ///
    /// O(corners and uses of the faces reached).
    pub fn from<'a, K>(&'a mut self, mesh: &'a K, seed: F) -> Flooded<'a, K>
    where
        K: Topology<Face = F>,
    {
        if self.reached.values().len() < mesh.face_bound() {
            let mut values =
                std::mem::replace(&mut self.reached, Column::new(0, false)).into_values();
            values.resize(mesh.face_bound(), false);
            self.reached = Column::from_values(values);
        }
        self.front.clear();
        self.reach(seed);
        Flooded { mesh, flood: self }
    }

    fn reach(&mut self, face: F) {
        if !std::mem::replace(&mut self.reached[face], true) {
            self.touched.push(face);
            self.front.push_back(face);
        }
    }
}

/// A flood over faces under way. Made by [`FaceFlood::from`].
#[derive(Debug)]
pub struct Flooded<'a, K: Topology> {
    mesh: &'a K,
    flood: &'a mut FaceFlood<K::Face>,
}

impl<K: Topology> Iterator for Flooded<'_, K> {
    type Item = K::Face;

    fn next(&mut self) -> Option<K::Face> {
        let face = self.flood.front.pop_front()?;
        let (mesh, flood) = (self.mesh, &mut *self.flood);
        mesh.face_faces(face).for_each(|across| flood.reach(across));
        Some(face)
    }
}

impl<K: Topology> std::iter::FusedIterator for Flooded<'_, K> {}

#[cfg(all(test, feature = "conformance"))]
mod tests {
    use super::*;
    use crate::conformance::{Reference, random_complex};
    use crate::{Assemble, FaceId, floods::Components};

    #[test]
    fn floods_reach_each_component_once_and_by_distance() {
        let mut flood = FaceFlood::new();
        for seed in 0..120 {
            let complex = random_complex(seed);
            let mut mesh = Reference::assemble(complex.to_list().as_list()).unwrap();
            for index in (seed as usize % 3..mesh.face_bound()).step_by(5) {
                mesh.remove_face(FaceId::from_u32(index as u32)).unwrap();
            }
            let components = Components::of(&mesh);
            let mut distance = mesh.face_column(usize::MAX);
            let mut floods = 0;
            for seed in mesh.faces() {
                if flood.has_reached(seed) {
                    continue;
                }
                floods += 1;
                let reached: Vec<FaceId> = flood.from(&mesh, seed).collect();
                assert_eq!(reached[0], seed);
                distance[seed] = 0;
                let mut last = 0;
                for face in reached {
                    assert_eq!(components.number(face), components.number(seed));
                    assert!(distance[face] >= last, "{}: {face} comes too late", complex.name);
                    last = distance[face];
                    for across in mesh.face_faces(face) {
                        distance[across] = distance[across].min(last + 1);
                    }
                }
            }
            assert_eq!(floods, components.count(), "{}", complex.name);
            assert!(mesh.faces().all(|face| flood.has_reached(face)), "{}", complex.name);
            flood.clear();
            assert!(!mesh.faces().any(|face| flood.has_reached(face)), "{}", complex.name);
        }
    }
}
