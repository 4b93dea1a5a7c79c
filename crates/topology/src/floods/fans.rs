//! How many fans meet at a vertex.

use super::UnionFind;
use crate::{EdgeKind, Topology, TopologyExt};
use smallvec::SmallVec;

/// How many fans meet at `v`: the components of its link, that is sectors joined at the
/// non-manifold edges they end at. A vertex loop counts as one of its own.
///
/// O(1) at a vertex of one sector, else O(c log c) for c corners.
pub fn fan_count<K: Topology + ?Sized>(mesh: &K, v: K::Vertex) -> usize {
    let loops = (0..).take_while(|&i| mesh.vertex_loop(v, i).is_some()).count();
    let sectors = if mesh.sector(v, 1).is_some() {
        let fans = fans(mesh, v);
        fans.parents().iter().zip(0..).filter(|&(&parent, i)| parent == i).count()
    } else {
        usize::from(mesh.sector(v, 0).is_some())
    };
    sectors + loops
}

/// The sectors of `v` by number, those of one fan in one set.
pub(super) fn fans<K: Topology + ?Sized>(mesh: &K, v: K::Vertex) -> UnionFind {
    // Every end of a sector at a non-manifold edge: which edge, which end of it, which sector.
    let mut ends: SmallVec<[(K::Edge, bool, u32); 8]> = SmallVec::new();
    let mut count = 0;
    for (handle, number) in mesh.vertex_sectors(v).zip(0..) {
        count += 1;
        for spoke in mesh.sector_spokes(handle) {
            let h = spoke.oriented_edge;
            if mesh.edge_kind_at(h) == EdgeKind::NonManifold {
                ends.push((mesh.edge(h), spoke.outgoing == mesh.runs_with_edge(h), number));
            }
        }
    }
    ends.sort_unstable();
    let mut fans = UnionFind::new(count);
    for pair in ends.windows(2) {
        if (pair[0].0, pair[0].1) == (pair[1].0, pair[1].1) {
            fans.union(pair[0].2, pair[1].2);
        }
    }
    fans
}
