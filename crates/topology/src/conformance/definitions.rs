//! What sectors, edge kinds and boundary loops *are*, worked out from the reference's lists.
//!
//! Nothing here takes a step through [`Topology`](crate::Topology): a fault in a kernel or a walk
//! cannot hide in what it is held against.

use super::reference::Reference;
use crate::{EdgeId, EdgeKind, OrientedEdgeId, VertexId};
use std::collections::{BTreeMap, BTreeSet};

/// One of the two sides of a corner.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Side {
    /// The oriented edge that ends at the corner.
    Incoming,
    /// The oriented edge that starts there, which names the corner.
    Outgoing,
}

impl Side {
    pub(super) fn opposite(self) -> Self {
        match self {
            Self::Incoming => Self::Outgoing,
            Self::Outgoing => Self::Incoming,
        }
    }
}

/// One end of an edge: at the vertex it starts at (`false`) or the one it ends at (`true`).
pub(super) type EdgeEnd = (EdgeId, bool);

/// A corner and one of its sides.
type Flank = (OrientedEdgeId, Side);

/// Which corners lie at which edge end, and which are joined there.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub(super) struct Joints {
    at: BTreeMap<Flank, EdgeEnd>,
    joined: BTreeMap<Flank, Flank>,
    incoming: BTreeMap<OrientedEdgeId, OrientedEdgeId>,
}

impl Joints {
    /// Goes over all uses once. A use lies at the start of its edge with its own corner if it runs
    /// with the edge, and with the corner behind it if not.
    pub(super) fn of(mesh: &Reference) -> Self {
        let mut joints = Self::default();
        let mut flanks: BTreeMap<EdgeEnd, Vec<Flank>> = BTreeMap::new();
        for (&h, record) in &mesh.uses {
            let ring = mesh.loop_through(h);
            let behind = ring[(record.position + 1) % ring.len()];
            joints.incoming.insert(behind, h);
            for (flank, end) in [
                ((h, Side::Outgoing), (record.edge, !record.with)),
                ((behind, Side::Incoming), (record.edge, record.with)),
            ] {
                joints.at.insert(flank, end);
                flanks.entry(end).or_default().push(flank);
            }
        }
        for (&(edge, _), flanks) in &flanks {
            if mesh.edges[&edge].len() == 2 {
                joints.joined.insert(flanks[0], flanks[1]);
                joints.joined.insert(flanks[1], flanks[0]);
            }
        }
        joints
    }

    /// The corner on the other side of an edge of exactly two uses, and its side there.
    pub(super) fn joined(&self, corner: OrientedEdgeId, side: Side) -> Option<Flank> {
        self.joined.get(&(corner, side)).copied()
    }

    /// The edge end that a corner's side lies at.
    pub(super) fn edge_end(&self, corner: OrientedEdgeId, side: Side) -> EdgeEnd {
        self.at[&(corner, side)]
    }

    /// The oriented edge on a corner's side.
    pub(super) fn oriented_edge(&self, corner: OrientedEdgeId, side: Side) -> OrientedEdgeId {
        match side {
            Side::Outgoing => corner,
            Side::Incoming => self.incoming[&corner],
        }
    }
}

/// A corner of a sector, and the side by which the sector goes on from it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct SectorCorner {
    pub(super) corner: OrientedEdgeId,
    pub(super) exit: Side,
}

/// A sector in order from its handle.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) struct Sector {
    pub(super) corners: Vec<SectorCorner>,
    pub(super) cyclic: bool,
}

impl Sector {
    /// The corners without their order.
    pub(super) fn set(&self) -> BTreeSet<OrientedEdgeId> {
        self.corners.iter().map(|c| c.corner).collect()
    }

    /// The edge ends around the sector: each corner's exit, then an open sector's first entry.
    /// As (oriented edge, whether it starts at the vertex, edge end).
    pub(super) fn spokes(&self, joints: &Joints) -> Vec<(OrientedEdgeId, bool, EdgeEnd)> {
        let mut flanks: Vec<Flank> = self.corners.iter().map(|c| (c.corner, c.exit)).collect();
        if !self.cyclic {
            let first = self.corners[0];
            flanks.push((first.corner, first.exit.opposite()));
        }
        let spoke = |(corner, side): Flank| {
            let h = joints.oriented_edge(corner, side);
            (h, side == Side::Outgoing, joints.edge_end(corner, side))
        };
        flanks.into_iter().map(spoke).collect()
    }
}

/// The sector of `first`, in order from it: forward where that corner's incoming side is an end or
/// the sector is cyclic, backward where only its outgoing side is an end.
pub(super) fn sector_from(joints: &Joints, first: OrientedEdgeId) -> Sector {
    let ends_incoming = joints.joined(first, Side::Incoming).is_none();
    let ends_outgoing = joints.joined(first, Side::Outgoing).is_none();
    let mut exit = if ends_outgoing && !ends_incoming { Side::Incoming } else { Side::Outgoing };
    let mut corners = vec![SectorCorner { corner: first, exit }];
    let mut corner = first;
    while let Some((behind, entered)) = joints.joined(corner, exit) {
        if behind == first {
            return Sector { corners, cyclic: true };
        }
        (corner, exit) = (behind, entered.opposite());
        corners.push(SectorCorner { corner, exit });
    }
    Sector { corners, cyclic: false }
}

/// The corners that may be the handle of the sector they make up: of a cyclic sector all; of an
/// open one those whose incoming side is an end, or else those whose outgoing side is.
pub(super) fn handles_of(
    joints: &Joints,
    sector: &BTreeSet<OrientedEdgeId>,
) -> BTreeSet<OrientedEdgeId> {
    let ends = |side| -> BTreeSet<OrientedEdgeId> {
        sector.iter().copied().filter(|&c| joints.joined(c, side).is_none()).collect()
    };
    let by_incoming = ends(Side::Incoming);
    let by_outgoing = ends(Side::Outgoing);
    if !by_incoming.is_empty() {
        by_incoming
    } else if !by_outgoing.is_empty() {
        by_outgoing
    } else {
        sector.clone()
    }
}

/// The sectors of `v` as sets of corners: the finest sets such that joined corners share one.
pub(super) fn sector_sets(mesh: &Reference, v: VertexId) -> Vec<BTreeSet<OrientedEdgeId>> {
    let mut sets: Vec<BTreeSet<OrientedEdgeId>> = Vec::new();
    let corners: BTreeSet<OrientedEdgeId> =
        mesh.uses.iter().filter(|(_, u)| u.start == v).map(|(&h, _)| h).collect();
    for &corner in &corners {
        let mut merged = BTreeSet::from([corner]);
        for side in [Side::Incoming, Side::Outgoing] {
            merged.extend(mesh.joints.joined(corner, side).map(|(other, _)| other));
        }
        let (touched, apart): (Vec<_>, Vec<_>) =
            sets.into_iter().partition(|set| !set.is_disjoint(&merged));
        merged.extend(touched.into_iter().flatten());
        sets = apart;
        sets.push(merged);
    }
    sets.sort();
    sets
}

/// The sectors of `v`, numbered by their lowest corner, each from the lowest handle it may have.
pub(super) fn sectors_of(mesh: &Reference, v: VertexId) -> Vec<Sector> {
    let sets = sector_sets(mesh, v);
    let handles = sets.iter().filter_map(|set| handles_of(&mesh.joints, set).first().copied());
    handles.map(|handle| sector_from(&mesh.joints, handle)).collect()
}

/// How many uses an edge has, and how they run.
pub(super) fn kind_of(mesh: &Reference, edge: EdgeId) -> EdgeKind {
    match *mesh.edges[&edge] {
        [_] => EdgeKind::Boundary,
        [a, b] if mesh.uses[&a].with != mesh.uses[&b].with => EdgeKind::Plain,
        [_, _] => EdgeKind::Misoriented,
        _ => EdgeKind::NonManifold,
    }
}

/// The vertices of an edge in its direction.
pub(super) fn ends_of(mesh: &Reference, edge: EdgeId) -> [VertexId; 2] {
    let h = mesh.edges[&edge][0];
    let record = mesh.uses[&h];
    let ring = mesh.loop_through(h);
    let end = mesh.uses[&ring[(record.position + 1) % ring.len()]].start;
    if record.with { [record.start, end] } else { [end, record.start] }
}

/// The boundary uses met along the boundary from `first`: at the far end of each, the sector it
/// is an end of is crossed to its other end.
pub(super) fn boundary_from(mesh: &Reference, first: OrientedEdgeId) -> Vec<OrientedEdgeId> {
    let is_boundary = |h: OrientedEdgeId| mesh.uses_beside(h).len() == 1;
    if !is_boundary(first) {
        return Vec::new();
    }
    let mut met = vec![first];
    let ring = mesh.loop_through(first);
    let mut flank = (ring[(mesh.uses[&first].position + 1) % ring.len()], Side::Incoming);
    loop {
        // Cross the sector that begins at this flank.
        let (mut corner, mut exit) = (flank.0, flank.1.opposite());
        while let Some((behind, entered)) = mesh.joints.joined(corner, exit) {
            (corner, exit) = (behind, entered.opposite());
        }
        let h = mesh.joints.oriented_edge(corner, exit);
        if h == first || !is_boundary(h) {
            return met;
        }
        met.push(h);
        flank = match exit {
            // It starts here and is run to its end.
            Side::Outgoing => {
                let ring = mesh.loop_through(h);
                (ring[(mesh.uses[&h].position + 1) % ring.len()], Side::Incoming)
            }
            // It ends here and is run to its start.
            Side::Incoming => (h, Side::Outgoing),
        };
    }
}
