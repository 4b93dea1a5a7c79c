//! The general step around a vertex: through any edge of exactly two uses, whichever way they run.

use crate::Topology;

/// The corner after `corner` around its vertex, and whether the walk then goes backward.
///
/// Forward means leaving a corner by its outgoing side, as [`turn`](Topology::turn) does; behind a
/// misoriented edge the direction flips. `None` where the side is at a boundary or on a
/// non-manifold edge: the sector ends there.
///
/// Cold on purpose: loops go by `turn` and come here only when it answers `None`.
#[cold]
#[inline(never)]
pub fn next_corner_around<K: Topology + ?Sized>(
    mesh: &K,
    corner: K::OrientedEdge,
    backward: bool,
) -> Option<(K::OrientedEdge, bool)> {
    let side = if backward { mesh.prev(corner) } else { corner };
    let other = mesh.radial(side);
    if other == side || mesh.radial(other) != side {
        return None;
    }
    let flips = !mesh.is_plain(side);
    // The other use ends at this vertex when exactly one of "we leave by an outgoing side" and
    // "it runs our way" holds; its corner here is then the one after it.
    let corner = if flips == backward { mesh.next(other) } else { other };
    Some((corner, backward != flips))
}
