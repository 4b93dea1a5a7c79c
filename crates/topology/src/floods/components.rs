//! What hangs together.

use super::UnionFind;
use crate::{Column, Id, Topology, TopologyExt};

/// The components of a mesh: faces joined through shared edges, numbered by their first face.
///
/// ```
/// # use merestone_topology::{*, floods::Components};
/// # fn f<K: Topology>(mesh: &K) {
/// let components = Components::of(mesh);
/// for face in mesh.faces() {
///     assert!(components.number(face) < components.count());
/// }
/// # }
/// ```
#[derive(Clone, Debug)]
pub struct Components<F> {
    labels: Column<F, u32>,
    count: usize,
    sets: UnionFind,
}

impl<F: Id> Components<F> {
    /// Finds the components. O(uses) as good as.
    #[must_use]
    pub fn of<K: Topology<Face = F>>(mesh: &K) -> Self {
        let mut found = Self { labels: Column::new(0, 0), count: 0, sets: UnionFind::default() };
        found.update(mesh);
        found
    }

    /// Finds the components anew, in the memory of the last time.
    pub fn update<K: Topology<Face = F>>(&mut self, mesh: &K) {
        let sets = &mut self.sets;
        sets.reset(mesh.face_bound());
        mesh.faces().for_each(|face| {
            mesh.face_corners(face).for_each(|h| {
                // Each use is joined to the one behind it, and every pair is met from above.
                let across = mesh.face(mesh.radial(h));
                if across < face {
                    sets.union(face.index() as u32, across.index() as u32);
                }
            });
        });
        self.number_sets(mesh);
    }

    fn number_sets<K: Topology<Face = F>>(&mut self, mesh: &K) {
        let mut labels = std::mem::replace(&mut self.labels, Column::new(0, 0)).into_values();
        labels.clear();
        labels.resize(mesh.face_bound(), u32::MAX);
        let parents = self.sets.parents();
        let mut count = 0;
        mesh.faces().for_each(|face| {
            let parent = parents[face.index()] as usize;
            if parent == face.index() {
                labels[parent] = count;
                count += 1;
            } else {
                labels[face.index()] = labels[parent];
            }
        });
        self.count = count as usize;
        self.labels = Column::from_values(labels);
    }

    /// How many there are.
    #[must_use]
    pub fn count(&self) -> usize {
        self.count
    }

    /// The number of `face`'s component, below [`count`](Self::count).
    #[inline]
    #[must_use]
    pub fn number(&self, face: F) -> usize {
        self.labels[face] as usize
    }

    /// How many components there are when faces that share a vertex hang together too.
    #[must_use]
    pub fn count_through_vertices<K: Topology<Face = F>>(mesh: &K) -> usize {
        let mut sets = UnionFind::new(mesh.vertex_bound());
        let mut without_vertex = 0;
        mesh.faces().for_each(|face| {
            let mut vertices = mesh.face_vertices(face).map(|v| v.index() as u32);
            match vertices.next() {
                Some(first) => vertices.for_each(|v| sets.union(first, v)),
                None => without_vertex += 1,
            }
        });
        let used = |v: &K::Vertex| mesh.vertex_faces(*v).next().is_some();
        let roots =
            mesh.vertices().filter(used).filter(|v| sets.parents()[v.index()] == v.index() as u32);
        roots.count() + without_vertex
    }
}
