//! One pass of the mean over neighbours along edges.
//!
//! Every vertex moves to the mean of the vertices it shares an edge with, each edge counted once;
//! vertices without edges keep their place. All old points are read before any new one is.

use super::assemble::{Adjacency, NONE, NOT_PLAIN, previous_side};
use super::half_edge::HalfEdges;

/// The neighbours of each vertex along its edges, as offsets + vertices.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Neighbours {
    /// Where each vertex's neighbours end in `list`.
    pub ends: Vec<u32>,
    /// Neighbours, vertex after vertex, ascending.
    pub list: Vec<u32>,
}

impl Neighbours {
    /// Collects the neighbours of each vertex from loops; an edge counts once, however many uses
    /// it has, and edges from a vertex to itself do not count. O(corners log valence).
    ///
    /// # Panics
    /// When a corner names a vertex that is not below `vertices`, or the ends are not ascending
    /// within `corners`.
    #[must_use]
    pub fn from_loops(corners: &[u32], face_ends: &[u32], vertices: usize) -> Self {
        let mut ends = vec![0u32; vertices + 2];
        let each_edge = |visit: &mut dyn FnMut(u32, u32)| {
            let mut start = 0;
            for &end in face_ends {
                let face = &corners[start..end as usize];
                start = end as usize;
                let mut before = face.last().copied().unwrap_or(0);
                for &v in face {
                    visit(before, v);
                    before = v;
                }
            }
        };
        each_edge(&mut |a, b| {
            ends[a as usize + 2] += 1;
            ends[b as usize + 2] += 1;
        });
        let mut total = 0;
        for end in &mut ends {
            total += *end;
            *end = total;
        }
        let mut list = vec![0u32; total as usize];
        each_edge(&mut |a, b| {
            for (v, neighbour) in [(a, b), (b, a)] {
                let place = &mut ends[v as usize + 1];
                list[*place as usize] = neighbour;
                *place += 1;
            }
        });
        let (mut start, mut kept) = (0, 0);
        for v in 0..vertices {
            let end = ends[v + 1] as usize;
            list[start..end].sort_unstable();
            let mut last = v as u32;
            for k in start..end {
                let neighbour = list[k];
                if neighbour != last && neighbour != v as u32 {
                    list[kept] = neighbour;
                    kept += 1;
                    last = neighbour;
                }
            }
            start = end;
            ends[v] = kept as u32;
        }
        list.truncate(kept);
        list.shrink_to_fit();
        ends.truncate(vertices);
        Self { ends, list }
    }
}

/// Moves every vertex to the mean of its listed neighbours: the floor for one pass. O(V + E).
///
/// # Panics
/// When the lists name a point that is not there.
pub fn by_lists(points: &[[f64; 3]], neighbours: &Neighbours, moved: &mut Vec<[f64; 3]>) {
    moved.clear();
    let mut start = 0;
    moved.extend(points.iter().zip(&neighbours.ends).map(|(point, &end)| {
        let list = &neighbours.list[start..end as usize];
        start = end as usize;
        let mut sum = Sum::default();
        for &v in list {
            sum.add(points[v as usize]);
        }
        sum.mean(list.len() as u32, point)
    }));
}

/// The same by turning around each vertex in triangle adjacency.
///
/// Only for meshes whose vertices have one sector each and whose edges are plain or boundary
/// edges; says `false`, with `moved` unspecified, where some corner was not reached or an edge is
/// neither. O(F).
///
/// # Panics
/// When the adjacency does not belong to the points.
#[must_use]
pub fn by_turns(points: &[[f64; 3]], mesh: &Adjacency, moved: &mut Vec<[f64; 3]>) -> bool {
    if mesh.counts.non_manifold + mesh.counts.misoriented > 0 {
        return false;
    }
    // One length for both arrays lets one bounds check serve both loads of a step.
    let end = &mesh.end[..];
    let turn = &mesh.turn[..end.len()];
    let mut corners = 0;
    moved.clear();
    moved.extend(points.iter().zip(&mesh.outgoing).map(|(point, &first)| {
        let mut sum = Sum::default();
        let mut count = 0;
        if first != NONE {
            let mut side = first;
            loop {
                let link = turn[side as usize];
                sum.add(points[end[side as usize] as usize]);
                count += 1;
                // A link that is not plain is greater than any side: one test ends both kinds.
                if link == first || link & NOT_PLAIN != 0 {
                    corners += u64::from(count);
                    if link != first {
                        // An open sector: the edge it came in by has no side that leaves.
                        let before = previous_side(previous_side(first));
                        sum.add(points[end[before as usize] as usize]);
                        count += 1;
                    }
                    break;
                }
                side = link;
            }
        }
        sum.mean(count, point)
    }));
    corners == end.len() as u64
}

/// The same by turning around each vertex in half-edges: radial, then next.
///
/// Says `false` in the same cases as [`by_turns`]. O(corners).
///
/// # Panics
/// When the half-edges do not belong to the points.
#[must_use]
pub fn by_half_edges(points: &[[f64; 3]], mesh: &HalfEdges, moved: &mut Vec<[f64; 3]>) -> bool {
    if mesh.counts.non_manifold + mesh.counts.misoriented > 0 {
        return false;
    }
    let next = &mesh.next[..];
    let radial = &mesh.radial[..next.len()];
    let start = &mesh.start[..next.len()];
    let mut corners = 0;
    moved.clear();
    moved.extend(points.iter().zip(&mesh.outgoing).map(|(point, &first)| {
        let mut sum = Sum::default();
        let mut count = 0;
        if first != NONE {
            let mut here = first;
            loop {
                let other = radial[here as usize];
                count += 1;
                if other & NOT_PLAIN != 0 {
                    corners += u64::from(count);
                    sum.add(points[start[next[here as usize] as usize] as usize]);
                    let before = mesh.prev[first as usize];
                    sum.add(points[start[before as usize] as usize]);
                    count += 1;
                    break;
                }
                // The other use runs back from the neighbour: no need to go to the end of this one.
                sum.add(points[start[other as usize] as usize]);
                here = next[other as usize];
                if here == first {
                    corners += u64::from(count);
                    break;
                }
            }
        }
        sum.mean(count, point)
    }));
    corners == next.len() as u64
}

/// A sum of points.
#[derive(Clone, Copy, Default)]
struct Sum([f64; 3]);

impl Sum {
    #[inline]
    fn add(&mut self, p: [f64; 3]) {
        self.0 = [self.0[0] + p[0], self.0[1] + p[1], self.0[2] + p[2]];
    }

    #[inline]
    fn mean(self, count: u32, place: &[f64; 3]) -> [f64; 3] {
        if count == 0 {
            return *place;
        }
        let weight = 1.0 / f64::from(count);
        self.0.map(|x| x * weight)
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::bare::{assemble, half_edge};
    use crate::shapes::{TriangleMesh, bipyramid, fan, icosphere, soup};

    struct All {
        lists: Vec<[f64; 3]>,
        turns: Option<Vec<[f64; 3]>>,
        half_edges: Option<Vec<[f64; 3]>>,
    }

    fn all(mesh: &TriangleMesh) -> All {
        let vertices = mesh.points.len();
        let loops = mesh.to_loops();
        let neighbours = Neighbours::from_loops(&loops.corners, &loops.face_ends, vertices);
        let (mut links, mut half) = (Adjacency::default(), HalfEdges::default());
        assemble::assemble(&mesh.triangles, vertices, &mut Default::default(), &mut links).unwrap();
        let (corners, ends) = (&loops.corners, &loops.face_ends);
        half_edge::assemble(corners, ends, vertices, &mut Default::default(), &mut half).unwrap();
        let (mut lists, mut turns, mut half_edges) = (Vec::new(), Vec::new(), Vec::new());
        by_lists(&mesh.points, &neighbours, &mut lists);
        let whole = by_turns(&mesh.points, &links, &mut turns);
        let half_whole = by_half_edges(&mesh.points, &half, &mut half_edges);
        All { lists, turns: whole.then_some(turns), half_edges: half_whole.then_some(half_edges) }
    }

    fn close(left: &[[f64; 3]], right: &[[f64; 3]]) -> bool {
        left.len() == right.len()
            && left
                .as_flattened()
                .iter()
                .zip(right.as_flattened())
                .all(|(x, y)| (x - y).abs() < 1e-12)
    }

    #[test]
    fn hub_of_a_fan_moves_to_the_centre_of_its_rim() {
        let mut mesh = fan(8);
        mesh.points.push([9.0, 9.0, 9.0]);
        let all = all(&mesh);
        assert!(close(&all.lists[..1], &[[0.0; 3]]));
        assert_eq!(all.lists[9], [9.0; 3]);
        // A rim vertex has the hub and two others of the rim as neighbours.
        let angle = std::f64::consts::TAU / 8.0;
        let rim = (2..9).find(|&v| (mesh.points[v][0] + 1.0).abs() < 1e-12).unwrap();
        assert!(close(&[all.lists[rim]], &[[-2.0 * angle.cos() / 3.0, 0.0, 1.0 / 3.0]]));
        assert!(close(&all.turns.unwrap(), &all.lists));
        assert!(close(&all.half_edges.unwrap(), &all.lists));
    }

    #[test]
    fn walks_agree_with_the_lists_on_closed_and_open_meshes() {
        let mut open = icosphere(3).shuffled(2);
        open.triangles.truncate(open.triangles.len() - 1);
        for mesh in [icosphere(3), icosphere(2).shuffled(9), bipyramid(40), open] {
            let all = all(&mesh);
            assert!(close(&all.turns.unwrap(), &all.lists));
            assert!(close(&all.half_edges.unwrap(), &all.lists));
        }
    }

    #[test]
    fn walks_refuse_what_they_cannot_reach() {
        // Two tetrahedra that touch at vertex 0: two sectors.
        let one = [[0, 2, 1], [0, 1, 3], [0, 3, 2], [1, 2, 3]];
        let other = one.map(|t| t.map(|v: u32| if v == 0 { 0 } else { v + 3 }));
        let triangles = [one, other].concat();
        let points = (0..7).map(|v| [f64::from(v), f64::from(v * v), 0.0]).collect();
        let cones = all(&TriangleMesh { points, triangles });
        assert!(cones.turns.is_none() && cones.half_edges.is_none());
        let soup = all(&soup(6, 40, 3));
        assert!(soup.turns.is_none() && soup.half_edges.is_none());
    }

    #[test]
    fn lists_hold_each_neighbour_once() {
        let lists = Neighbours::from_loops(&[0, 1, 2, 2, 1, 3, 1, 2, 4], &[3, 6, 9], 6);
        assert_eq!(lists.ends, [2, 6, 10, 12, 14, 14]);
        assert_eq!(lists.list, [1, 2, 0, 2, 3, 4, 0, 1, 3, 4, 1, 2, 1, 2]);
    }
}
