//! How many loops the boundary has.

use super::UnionFind;
use super::fans::fans;
use crate::{Topology, TopologyExt};

/// How many connected pieces the boundary edges form, joined where they meet at a vertex within
/// one fan.
///
/// On a manifold these are the boundary loops. O(oriented edges).
pub fn boundary_loop_count<K: Topology>(mesh: &K) -> usize {
    let mut numbers = mesh.oriented_edge_column(u32::MAX);
    let mut vertices = Vec::new();
    let mut count = 0;
    mesh.oriented_edges().for_each(|h| {
        if mesh.radial(h) == h {
            numbers[h] = count;
            count += 1;
            vertices.extend([mesh.start(h), mesh.end(h)]);
        }
    });
    vertices.sort_unstable();
    vertices.dedup();
    let mut pieces = UnionFind::new(count as usize);
    for v in vertices {
        // For each fan, one of the boundary edges met in it so far.
        let mut fans = fans(mesh, v);
        let mut met = vec![None; fans.parents().len()];
        for (handle, sector) in mesh.vertex_sectors(v).zip(0..) {
            let fan = fans.find(sector) as usize;
            for spoke in mesh.sector_spokes(handle) {
                let number = numbers[spoke.oriented_edge];
                if number != u32::MAX {
                    pieces.union(*met[fan].get_or_insert(number), number);
                }
            }
        }
    }
    pieces.parents().iter().zip(0..).filter(|&(&parent, i)| parent == i).count()
}
