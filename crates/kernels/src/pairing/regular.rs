//! Vertices all of whose edges are plain and whose corners form one ring.

use super::Links;
use super::buckets::Buckets;
use super::corners::{Corners, Kept};
use crate::vertex_table::{LATER, NONE};

/// Vertices of more corners are left to sorting, which a hub needs: the table would run full.
const MOST: usize = 16;

/// Places in the table: 8 KiB, to stay in the first cache.
const TABLE: usize = 1024;

/// Links all regular vertices. Enters their handles, [`NONE`] where there is no corner, and
/// [`LATER`] for the others. Returns how many edge ends the regular ones have.
pub(super) fn link<C: Corners>(
    list: C,
    buckets: &Buckets<C::Kept>,
    links: &mut impl Links,
    entries: &mut [u32],
) -> usize {
    let mut table = [0; TABLE];
    for ((_, corners), entry) in buckets.iter().zip(entries.iter_mut()) {
        *entry = match corners {
            [] => NONE,
            [first, ..] if link_ring(list, corners, &mut table, links) => first.number(),
            _ => LATER,
        };
    }
    // A use from a vertex to itself was taken for its own twin.
    for &(vertex, _) in &buckets.selves {
        entries[vertex as usize] = LATER;
    }
    let all = list.count();
    if entries.contains(&LATER) { all - later_corners(buckets, entries) } else { all }
}

/// How many corners lie at the vertices left for later.
#[cold]
fn later_corners<T: Kept>(buckets: &Buckets<T>, entries: &[u32]) -> usize {
    let later = buckets.iter().zip(entries).filter(|(_, entry)| **entry == LATER);
    later.map(|((_, corners), _)| corners.len()).sum()
}

/// Links the corners of one vertex; `false`, with links that do not count, if it is irregular.
///
/// A corner is behind another around the vertex when the edge before it is the edge behind the
/// other. Every corner leaves the link to it at the place of the edge before it, in a table with
/// as good as no collisions among so few; then every corner looks where the edge behind it leads.
/// No branch depends on the data until all is done. The table is all zero before and after.
#[inline(always)]
fn link_ring<C: Corners, L: Links>(
    list: C,
    corners: &[C::Kept],
    table: &mut [u64; TABLE],
    links: &mut L,
) -> bool {
    if corners.len() > MOST {
        return false;
    }
    let mut taken = 0;
    for &corner in corners {
        let before = corner.before();
        let place = &mut table[before as usize % TABLE];
        taken |= *place;
        let link = L::link(list.entering(corner), corner.number());
        *place = (u64::from(before) + 1) << 32 | u64::from(link);
    }
    let mut fine = taken == 0;
    for corner in corners {
        let place = &mut table[corner.behind() as usize % TABLE];
        fine &= *place >> 32 == u64::from(corner.behind()) + 1;
        links.plain(corner.number(), *place as u32);
        *place = 0;
    }
    if !fine {
        for corner in corners {
            table[corner.before() as usize % TABLE] = 0;
        }
        return false;
    }
    // One ring, or are there several fans?
    let first = corners[0].number();
    let mut at = links.behind(list, first);
    let mut length = 1;
    while at != first {
        at = links.behind(list, at);
        length += 1;
    }
    length == corners.len()
}
