//! Components: faces joined through shared edges.
//!
//! With adjacency given, two ways, and the mesh decides: union-find over the faces where faces
//! that meet lie close in memory (it streams), breadth-first where they do not (the loads of a
//! whole block of faces overlap, and no branch is left to guess). Both number the components by
//! their smallest faces, so the choice does not show.
//!
//! Union-find is Rem's algorithm (in Dijkstra 1976) with splicing (Patwary, Blair & Manne 2010).
//! Parents are never greater than their children, so one ascending pass at the end turns parents
//! into labels.

use super::assemble::{Adjacency, NONE, NOT_PLAIN};
use super::half_edge::HalfEdges;

/// Places in the table of neighbours.
const TABLE: usize = 1024;

/// Labels the faces of triangle adjacency by component the faster way; returns how many there are.
///
/// Components are numbered by their smallest faces. The queue is scratch memory. Nearly O(F).
///
/// # Panics
/// When a turn names a side that is not there.
///
/// ```
/// use merestone_trial::bare::{assemble, components};
///
/// // Two triangles that share an edge, and one that only touches them at vertex 3.
/// let triangles = [[0, 1, 2], [2, 1, 3], [3, 4, 5]];
/// let mut mesh = assemble::Adjacency::default();
/// assemble::assemble(&triangles, 6, &mut Default::default(), &mut mesh)?;
/// let (mut labels, mut queue) = (Vec::new(), Vec::new());
/// assert_eq!(components::by_turns(&mesh, &mut labels, &mut queue), 2);
/// assert_eq!(labels, [0, 0, 1]);
/// # Ok::<(), assemble::AssembleError>(())
/// ```
pub fn by_turns(mesh: &Adjacency, labels: &mut Vec<u32>, queue: &mut Vec<u32>) -> u32 {
    if is_coherent(mesh) {
        by_turns_union(mesh, labels)
    } else {
        by_turns_breadth_first(mesh, labels, queue)
    }
}

/// Whether most of some 256 sampled faces meet others near them in the order of faces.
fn is_coherent(mesh: &Adjacency) -> bool {
    let turns = mesh.turn.as_chunks::<3>().0;
    let near = (turns.len() / 16) as u32;
    let step = (turns.len() / 256).max(1);
    let sampled = (0u32..).zip(turns).step_by(step);
    let balance: i32 = sampled
        .flat_map(|(t, sides)| sides.map(|turn| ((turn & !NOT_PLAIN) / 3).abs_diff(t) <= near))
        .map(|is_near| if is_near { 1 } else { -1 })
        .sum();
    balance >= 0
}

/// Faces of the queue taken at once.
const BLOCK: usize = 32;

/// The same breadth-first, a block of faces at a time. O(F).
///
/// # Panics
/// When a turn names a side that is not there.
pub fn by_turns_breadth_first(
    mesh: &Adjacency,
    labels: &mut Vec<u32>,
    queue: &mut Vec<u32>,
) -> u32 {
    let turns = mesh.turn.as_chunks::<3>().0;
    labels.clear();
    labels.resize(turns.len(), NONE);
    let labels = &mut labels[..];
    // One place more than faces: what is already labelled is written there too, and forgotten.
    queue.resize(turns.len() + 1, 0);
    let queue = &mut queue[..];
    let mut near = [[0; 3]; BLOCK];
    let mut picked = [0; 3 * BLOCK];
    let mut count = 0;
    for seed in 0..turns.len() {
        if labels[seed] != NONE {
            continue;
        }
        labels[seed] = count;
        queue[0] = seed as u32;
        let (mut at, mut end) = (0, 1);
        while at < end {
            let block = &queue[at..end.min(at + BLOCK)];
            at += block.len();
            for (near, &t) in near.iter_mut().zip(block) {
                *near = turns[t as usize].map(|turn| (turn & !NOT_PLAIN) / 3);
            }
            // No label is written here: else each load would wait for the stores before it.
            let mut kept = 0;
            for &other in near[..block.len()].as_flattened() {
                picked[kept] = other;
                kept += usize::from(labels[other as usize] == NONE);
            }
            for &other in &picked[..kept] {
                let label = &mut labels[other as usize];
                queue[end] = other;
                end += usize::from(*label == NONE);
                *label = count;
            }
        }
        count += 1;
    }
    count
}

/// The same by union-find over the faces.
///
/// # Panics
/// When a turn names a side that is not there.
pub fn by_turns_union(mesh: &Adjacency, labels: &mut Vec<u32>) -> u32 {
    let turns = mesh.turn.as_chunks::<3>().0;
    alone(labels, turns.len());
    for (t, &sides) in (0u32..).zip(turns) {
        // Greater neighbours will join when it is their turn: until then t stands in for them.
        let others = sides.map(|turn| ((turn & !NOT_PLAIN) / 3).min(t));
        let roots = others.map(|other| labels[other as usize]);
        let least = roots[0].min(roots[1]).min(roots[2]);
        labels[t as usize] = least;
        for k in 0..3 {
            if roots[k] != least && roots[k] != t {
                unite(labels, t, others[k]);
            }
        }
    }
    if mesh.counts.non_manifold > 0 {
        // Around a longer cycle not every use meets a smaller one: join each with the next.
        for (t, sides) in (0u32..).zip(turns) {
            for &turn in sides.iter().filter(|&turn| turn & NOT_PLAIN != 0) {
                unite(labels, t, (turn & !NOT_PLAIN) / 3);
            }
        }
    }
    number(labels)
}

/// Labels the faces of half-edges by component, by union-find; returns how many. O(corners).
///
/// # Panics
/// When a link names a half-edge or face that is not there.
pub fn by_half_edges(mesh: &HalfEdges, labels: &mut Vec<u32>) -> u32 {
    alone(labels, mesh.face_first.len());
    for (&face, &radial) in mesh.face.iter().zip(&mesh.radial) {
        let other = mesh.face[(radial & !NOT_PLAIN) as usize];
        // A plain edge joins once, at its greater face; a longer cycle joins at every use.
        if other < face || radial & NOT_PLAIN != 0 {
            unite(labels, face, other);
        }
    }
    number(labels)
}

/// Reusable scratch memory of [`from_loops`].
#[derive(Clone, Debug, Default)]
pub struct Scratch {
    ends: Vec<u32>,
    /// Higher vertex and face of each side, by lower vertex.
    sides: Vec<[u32; 2]>,
}

/// Labels faces by component from loops alone, without building adjacency; returns how many.
///
/// Sides are bucketed by lower vertex and meet in a small table there; where two neighbours fall
/// on one place the bucket is sorted. O(corners), and O(n log n) at a vertex of n > 32 sides.
///
/// # Panics
/// When a corner names a vertex that is not below `vertices`, or the ends are not ascending within
/// `corners`.
pub fn from_loops(
    corners: &[u32],
    face_ends: &[u32],
    vertices: usize,
    scratch: &mut Scratch,
    labels: &mut Vec<u32>,
) -> u32 {
    let Scratch { ends, sides } = scratch;
    ends.clear();
    ends.resize(vertices + 2, 0);
    for_each_side(corners, face_ends, |_, a, b| ends[a.min(b) as usize + 2] += 1);
    let mut total = 0;
    for end in ends.iter_mut() {
        total += *end;
        *end = total;
    }
    if sides.len() < total as usize {
        *sides = vec![[0; 2]; total as usize];
    }
    for_each_side(corners, face_ends, |face, a, b| {
        let place = &mut ends[a.min(b) as usize + 1];
        sides[*place as usize] = [a.max(b), face];
        *place += 1;
    });
    alone(labels, face_ends.len());
    let mut table = Box::new([[NONE; 2]; TABLE]);
    let mut start = 0;
    for &end in &ends[1..=vertices] {
        let bucket = &mut sides[start..end as usize];
        start = end as usize;
        let mut collided = bucket.len() > 32;
        if !collided {
            for &[higher, face] in bucket.iter() {
                let place = &mut table[higher as usize % TABLE];
                if place[0] == higher {
                    unite(labels, face, place[1]);
                } else {
                    collided |= place[0] != NONE;
                    *place = [higher, face];
                }
            }
            for &[higher, _] in bucket.iter() {
                table[higher as usize % TABLE] = [NONE; 2];
            }
        }
        if collided {
            bucket.sort_unstable();
            for pair in bucket.windows(2) {
                if pair[0][0] == pair[1][0] {
                    unite(labels, pair[0][1], pair[1][1]);
                }
            }
        }
    }
    number(labels)
}

/// Labels faces joined through shared vertices, from loops alone; returns how many components.
///
/// Another work than the rest of this file: two cones that touch are one component here. Union-find
/// over the vertices; `parents` is scratch memory. Faces without corners belong to none ([`NONE`]).
///
/// # Panics
/// When a corner names a vertex that is not below `vertices`, or the ends are not ascending within
/// `corners`.
pub fn through_vertices(
    corners: &[u32],
    face_ends: &[u32],
    vertices: usize,
    parents: &mut Vec<u32>,
    labels: &mut Vec<u32>,
) -> u32 {
    alone(parents, vertices);
    for_each_side(corners, face_ends, |_, a, b| unite(parents, a, b));
    number(parents);
    // Vertices without faces have numbers too: number again, by first face.
    labels.clear();
    let mut renumbered = vec![NONE; vertices];
    let mut count = 0;
    let mut start = 0;
    labels.extend(face_ends.iter().map(|&end| {
        let first = corners[start..end as usize].first();
        start = end as usize;
        first.map_or(NONE, |&v| {
            let label = &mut renumbered[parents[v as usize] as usize];
            if *label == NONE {
                *label = count;
                count += 1;
            }
            *label
        })
    }));
    count
}

/// Calls with face, start and end of each side of each loop.
#[inline]
fn for_each_side(corners: &[u32], face_ends: &[u32], mut visit: impl FnMut(u32, u32, u32)) {
    let mut start = 0;
    for (face, &end) in (0u32..).zip(face_ends) {
        let list = &corners[start..end as usize];
        start = end as usize;
        let mut before = list.last().copied().unwrap_or(0);
        for &v in list {
            visit(face, before, v);
            before = v;
        }
    }
}

/// Every face by itself.
fn alone(parents: &mut Vec<u32>, faces: usize) {
    parents.clear();
    parents.extend(0..faces as u32);
}

/// Joins the sets of two faces: climbs from both towards smaller parents, splicing as it goes.
#[inline]
fn unite(parents: &mut [u32], mut a: u32, mut b: u32) {
    loop {
        let (up_a, up_b) = (parents[a as usize], parents[b as usize]);
        if up_a == up_b {
            return;
        }
        if up_a > up_b {
            parents[a as usize] = up_b;
            if a == up_a {
                return;
            }
            a = up_a;
        } else {
            parents[b as usize] = up_a;
            if b == up_b {
                return;
            }
            b = up_b;
        }
    }
}

/// Turns parents into component numbers, in place.
fn number(parents: &mut [u32]) -> u32 {
    let mut count = 0;
    for face in 0..parents.len() {
        let parent = parents[face] as usize;
        // Parents are smaller, so theirs is a label already.
        parents[face] = if parent == face { count } else { parents[parent] };
        count += u32::from(parent == face);
    }
    count
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::bare::{assemble, half_edge};
    use crate::shapes::{TriangleMesh, bipyramid, icosphere, soup};

    /// By definition: faces that share a vertex pair get the smaller label until nothing changes.
    fn by_definition(mesh: &TriangleMesh) -> Vec<u32> {
        let pairs = |t: &[u32; 3]| [(t[0], t[1]), (t[1], t[2]), (t[2], t[0])];
        let mut labels: Vec<usize> = (0..mesh.triangles.len()).collect();
        loop {
            let mut changed = false;
            for (i, t) in mesh.triangles.iter().enumerate() {
                for (j, u) in mesh.triangles.iter().enumerate() {
                    let joined = pairs(t)
                        .iter()
                        .any(|&(a, b)| pairs(u).contains(&(a, b)) || pairs(u).contains(&(b, a)));
                    if joined && labels[i] > labels[j] {
                        labels[i] = labels[j];
                        changed = true;
                    }
                }
            }
            if !changed {
                break;
            }
        }
        let mut roots = labels.clone();
        roots.sort_unstable();
        roots.dedup();
        labels.iter().map(|l| roots.binary_search(l).unwrap() as u32).collect()
    }

    fn check(mesh: &TriangleMesh, expected: &[u32]) {
        let vertices = mesh.points.len();
        let loops = mesh.to_loops();
        let (corners, ends) = (&loops.corners, &loops.face_ends);
        let (mut links, mut half) = (Adjacency::default(), HalfEdges::default());
        assemble::assemble(&mesh.triangles, vertices, &mut Default::default(), &mut links).unwrap();
        half_edge::assemble(corners, ends, vertices, &mut Default::default(), &mut half).unwrap();
        let count = expected.iter().max().map_or(0, |m| m + 1);
        let mut labels = Vec::new();
        let queue = &mut Vec::new();
        assert_eq!(by_turns(&links, &mut labels, queue), count);
        assert_eq!(labels, expected);
        assert_eq!(by_turns_breadth_first(&links, &mut labels, queue), count);
        assert_eq!(labels, expected);
        assert_eq!(by_turns_union(&links, &mut labels), count);
        assert_eq!(labels, expected);
        assert_eq!(by_half_edges(&half, &mut labels), count);
        assert_eq!(labels, expected);
        let scratch = &mut Scratch::default();
        assert_eq!(from_loops(corners, ends, vertices, scratch, &mut labels), count);
        assert_eq!(labels, expected);
    }

    #[test]
    fn all_ways_agree_with_the_definition_on_soups() {
        for seed in 0..60 {
            let mesh = soup(4 + 2 * seed as u32, 24, seed);
            check(&mesh, &by_definition(&mesh));
        }
    }

    #[test]
    fn separate_spheres_and_touching_cones_are_separate() {
        let mut mesh = icosphere(2).shuffled(4);
        let mut expected = vec![0; mesh.triangles.len()];
        let hub = bipyramid(60);
        // The hub's vertex 0 is also a vertex of the sphere: touching joins no faces.
        let shift = mesh.points.len() as u32 - 1;
        mesh.triangles.extend(hub.triangles.iter().map(|t| t.map(|v| v + shift)));
        mesh.points.extend(&hub.points[1..]);
        expected.resize(mesh.triangles.len(), 1);
        check(&mesh, &expected);
        let loops = mesh.to_loops();
        let (mut parents, mut labels) = (Vec::new(), Vec::new());
        let (corners, ends, vertices) = (&loops.corners, &loops.face_ends, mesh.points.len());
        assert_eq!(through_vertices(corners, ends, vertices, &mut parents, &mut labels), 1);
        let apart = [[0, 1, 2], [3, 5, 6], [2, 7, 8]].concat();
        let count = through_vertices(&apart, &[3, 6, 6, 9], 9, &mut parents, &mut labels);
        assert_eq!((count, &labels[..]), (2, &[0, 1, NONE, 0][..]));
        check(&TriangleMesh::default(), &[]);
    }

    #[test]
    fn colliding_neighbours_are_still_told_apart() {
        // Neighbours of vertex 0 that differ by a multiple of the table's size.
        let far = TABLE as u32;
        let triangles = vec![[0, 1, 2], [0, 1 + far, 3], [0, 4, 1], [0, 5, 1 + far]];
        let mesh = TriangleMesh { points: vec![[0.0; 3]; TABLE + 2], triangles };
        check(&mesh, &[0, 1, 0, 1]);
    }
}
