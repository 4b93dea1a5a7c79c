//! What hangs together.

use super::UnionFind;
use crate::{Column, Id, Topology, TopologyExt};

/// The label of a face not reached yet.
const NONE: u32 = u32::MAX;

/// Faces of the front taken at once: enough for their loads to overlap.
const BLOCK: usize = 32;

/// The components of a mesh: faces joined through shared edges, numbered by their first face.
///
/// Two ways lead there, and the order of the faces decides: union-find where faces that meet lie
/// close in memory, since it streams; breadth first where they do not, since a whole block of
/// loads is under way at once. The result does not show which.
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
    front: Vec<F>,
    near: Vec<F>,
}

impl<F: Id> Components<F> {
    /// Finds the components. O(uses) as good as.
    #[must_use]
    pub fn of<K: Topology<Face = F>>(mesh: &K) -> Self {
        let mut found =
            Self { labels: Column::new(0, 0), count: 0, front: Vec::new(), near: Vec::new() };
        found.update(mesh);
        found
    }

    /// Finds the components anew, in the memory of the last time.
    pub fn update<K: Topology<Face = F>>(&mut self, mesh: &K) {
        let mut labels = std::mem::replace(&mut self.labels, Column::new(0, 0)).into_values();
        self.count = if is_coherent(mesh) {
            by_union(mesh, &mut labels)
        } else {
            breadth_first(mesh, &mut self.front, &mut self.near, &mut labels)
        };
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
        mesh.faces().for_each(|face| {
            let mut first = None;
            mesh.face_vertices(face).for_each(|v| {
                let number = v.index() as u32;
                sets.union(*first.get_or_insert(number), number);
            });
        });
        let mut count = 0;
        mesh.vertices().for_each(|v| {
            let is_root = sets.parents()[v.index()] as usize == v.index();
            if is_root && !mesh.is_isolated(v) {
                count += 1;
            }
        });
        count
    }
}

/// Whether most of some 256 sampled uses meet a face near their own in the order of faces.
fn is_coherent<K: Topology>(mesh: &K) -> bool {
    let bound = mesh.face_bound();
    let (near, step) = (bound / 16, (bound / 256).max(1));
    let mut balance = 0;
    for face in (0..bound).step_by(step).filter_map(|index| mesh.face_at(index)) {
        for h in mesh.face_corners(face).take(4) {
            let is_near = mesh.across(h).index().abs_diff(face.index()) <= near;
            balance += if is_near { 1 } else { -1 };
        }
    }
    // A smaller mesh lies in a near cache whatever its order.
    balance >= 0 && bound > 1 << 17
}

fn by_union<K: Topology>(mesh: &K, labels: &mut Vec<u32>) -> usize {
    let mut sets = UnionFind::within(std::mem::take(labels), mesh.face_bound());
    let mut all_plain = true;
    mesh.faces().for_each(|face| {
        let number = face.index() as u32;
        let mut across = |h| {
            all_plain &= mesh.is_plain(h);
            mesh.across(h).index() as u32
        };
        // A face above is joined when its turn comes.
        if let Some(corners) = mesh.triangle(face) {
            sets.join_below(number, corners.map(|h| across(h).min(number)));
        } else {
            mesh.face_corners(face).for_each(|h| {
                let other = across(h);
                if other < number {
                    sets.union(number, other);
                }
            });
        }
    });
    if !all_plain {
        // Around an edge of more than two uses, not every use is met from above.
        mesh.oriented_edges().for_each(|h| {
            if !mesh.is_plain(h) {
                sets.union(mesh.face(h).index() as u32, mesh.across(h).index() as u32);
            }
        });
    }
    *labels = sets.into_parents();
    let mut count = 0;
    mesh.faces().for_each(|face| {
        // The parent, being below, has its label already.
        let parent = labels[face.index()] as usize;
        labels[face.index()] = if parent == face.index() {
            count += 1;
            count - 1
        } else {
            labels[parent]
        };
    });
    count as usize
}

fn breadth_first<K: Topology>(
    mesh: &K,
    front: &mut Vec<K::Face>,
    near: &mut Vec<K::Face>,
    labels: &mut Vec<u32>,
) -> usize {
    labels.clear();
    labels.resize(mesh.face_bound(), NONE);
    let labels = &mut labels[..];
    let mut count = 0;
    mesh.faces().for_each(|seed| {
        if labels[seed.index()] != NONE {
            return;
        }
        labels[seed.index()] = count;
        // One place more than faces: what has its label is written there too, and forgotten.
        front.resize(labels.len() + 1, seed);
        front[0] = seed;
        let mut threes = [[seed; 3]; BLOCK];
        let (mut at, mut end) = (0, 1);
        while at < end {
            let block = at..end.min(at + BLOCK);
            at = block.end;
            let size = block.len();
            let mut all_threes = true;
            for (&face, three) in front[block.clone()].iter().zip(&mut threes) {
                match mesh.triangle(face) {
                    Some(corners) => *three = corners.map(|h| mesh.across(h)),
                    None => all_threes = false,
                }
            }
            if all_threes {
                let near = threes[..size].as_flattened_mut();
                end = reach(near, labels, count, front, end);
            } else {
                near.clear();
                for &face in &front[block] {
                    mesh.face_corners(face).for_each(|h| near.push(mesh.across(h)));
                }
                end = reach(near, labels, count, front, end);
            }
        }
        count += 1;
    });
    count as usize
}

/// Labels those of `near` that have no label yet and adds them to the front, whose new end is
/// returned. Overwrites `near`.
#[inline(always)]
fn reach<F: Id>(
    near: &mut [F],
    labels: &mut [u32],
    label: u32,
    front: &mut [F],
    mut end: usize,
) -> usize {
    // No label is written in the first pass: else each load would wait for the stores before it.
    // And no branch is guessed in either.
    let mut kept = 0;
    for i in 0..near.len() {
        let face = near[i];
        near[kept] = face;
        kept += usize::from(labels[face.index()] == NONE);
    }
    for &face in &near[..kept] {
        let place = &mut labels[face.index()];
        front[end] = face;
        end += usize::from(*place == NONE);
        *place = label;
    }
    end
}

#[cfg(all(test, feature = "conformance"))]
mod tests {
    use super::*;
    use crate::conformance::{Reference, random_complex};
    use crate::{Assemble, FaceId};

    /// By the definition: faces around one edge get one label, until nothing changes.
    fn by_definition(mesh: &Reference) -> (Vec<u32>, usize) {
        let mut least: Vec<usize> = (0..mesh.face_bound()).collect();
        loop {
            let before = least.clone();
            for edge in mesh.edges() {
                let faces: Vec<usize> = mesh.edge_faces(edge).map(Id::index).collect();
                let lowest = faces.iter().map(|&face| least[face]).min().unwrap_or(0);
                faces.into_iter().for_each(|face| least[face] = lowest);
            }
            if least == before {
                break;
            }
        }
        let mut roots: Vec<usize> = mesh.faces().map(|face| least[face.index()]).collect();
        roots.sort_unstable();
        roots.dedup();
        let label = |root: &usize| roots.binary_search(root).map_or(NONE, |label| label as u32);
        (least.iter().map(label).collect(), roots.len())
    }

    #[test]
    fn both_ways_give_the_components_of_the_definition() {
        let mut several = 0;
        for seed in 0..150 {
            let complex = random_complex(seed);
            let mut mesh = Reference::assemble(complex.to_list().as_list()).unwrap();
            for index in (seed as usize % 3..mesh.face_bound()).step_by(4) {
                mesh.remove_face(FaceId::from_u32(index as u32)).unwrap();
            }
            let (expected, count) = by_definition(&mesh);
            several += usize::from(count > 1);
            // What memory held before must not show.
            let mut unions = vec![7; 3];
            let mut floods = vec![9; 5];
            let counts = [
                by_union(&mesh, &mut unions),
                breadth_first(&mesh, &mut Vec::new(), &mut Vec::new(), &mut floods),
            ];
            assert_eq!(counts, [count; 2], "{}", complex.name);
            for face in mesh.faces().map(Id::index) {
                let found = [unions[face], floods[face]];
                assert_eq!(found, [expected[face]; 2], "{}, face {face}", complex.name);
            }
        }
        assert!(several > 20, "too few complexes in several pieces: {several}");
    }
}
