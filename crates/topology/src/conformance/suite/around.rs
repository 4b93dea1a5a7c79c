//! Sectors: how many, from which handle, in which order.

use super::pairing::Paired;
use crate::conformance::Failure;
use crate::conformance::definitions::{EdgeEnd, Sector, handles_of, sector_from, sector_sets};
use crate::{OrientedEdgeId, Topology, VertexId};

/// The sectors of a vertex as the kernel numbers them, each in the order its handle gives it.
pub(super) fn sectors_by_handles<K: Topology>(
    on: &Paired<'_, K>,
    v: VertexId,
) -> Result<Vec<Sector>, Failure> {
    let theirs = on.ids.vertices.theirs[&v];
    let count = on.reference.sectors.get(&v).map_or(0, Vec::len);
    let mut sectors = Vec::new();
    for number in 0..count {
        let Some(handle) = on.mesh.sector(theirs, number) else {
            let place = format_args!("{v}, sector {number}");
            return Err(on.scene.fail("sector", place, format!("one of {count}"), "none"));
        };
        let handle = on.h("sector", handle)?;
        sectors.push(sector_from(&on.reference.joints, handle));
    }
    Ok(sectors)
}

/// The edge ends around a vertex in the kernel's order of sectors: use, whether outgoing, end.
pub(super) fn spokes_of<K: Topology>(
    on: &Paired<'_, K>,
    sectors: &[Sector],
) -> Vec<(OrientedEdgeId, bool, EdgeEnd)> {
    sectors.iter().flat_map(|sector| sector.spokes(&on.reference.joints)).collect()
}

/// Every vertex's sectors: each asked for once, by a handle at its end if it is open; numbered by
/// their lowest corner when freshly assembled; none beyond.
///
/// # Errors
/// [`Failure`] naming the vertex and sector.
pub fn check_sectors<K: Topology>(on: &Paired<'_, K>) -> Result<(), Failure> {
    let (mesh, joints) = (on.mesh, &on.reference.joints);
    for (&v, &theirs) in &on.ids.vertices.theirs {
        let expected = sector_sets(on.reference, v);
        let sectors = sectors_by_handles(on, v)?;
        let mut found: Vec<_> = sectors.iter().map(Sector::set).collect();
        if !on.fresh {
            found.sort();
        }
        on.same("sectors", format_args!("{v}"), &expected, &found)?;
        for (number, sector) in sectors.iter().enumerate() {
            let at = format_args!("{v}, sector {number}");
            let handle = sector.corners[0].corner;
            let allowed = handles_of(joints, &sector.set());
            if !allowed.contains(&handle) {
                return Err(on.scene.fail("handle of sector", at, allowed, handle));
            }
            // From the handle, single turns run along the sector until it turns or ends.
            let mut corner = mesh.sector(theirs, number);
            for here in &sector.corners {
                let found = corner.map(|c| on.h("turn around a sector", c)).transpose()?;
                on.same("turn around a sector", at, &Some(here.corner), &found)?;
                let plain = |c| mesh.is_plain(on.ids.oriented_edges.theirs[&c]);
                if !plain(here.corner) || here.exit == super::super::definitions::Side::Incoming {
                    break;
                }
                corner = corner.and_then(|c| mesh.turn(c));
            }
        }
        for beyond in [sectors.len(), sectors.len() + 1, usize::MAX] {
            let at = format_args!("{v}, sector {beyond}");
            on.same("sector beyond the last", at, &None, &mesh.sector(theirs, beyond))?;
        }
    }
    Ok(())
}
