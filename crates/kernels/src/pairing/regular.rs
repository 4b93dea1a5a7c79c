//! Vertices all of whose edges are plain and whose corners form one ring.

use super::Links;
use super::buckets::Buckets;
use super::corners::{Corners, Kept};
use crate::TOP;
use crate::vertex_table::{LATER, NONE};

/// Vertices of more corners are left to sorting, which a hub needs: the table would run full.
const MOST: usize = 16;

/// Places in the table: 8 KiB, to stay in the first cache.
const TABLE: usize = 1024;

/// What a place of the table holds: from bit [`TAG`] on what tells the keys of that place apart,
/// never 0; from bit [`INDEX`] on the corner's index in its bucket; below, its number.
const TAG: u32 = 35;
const INDEX: u32 = 31;

/// A key's tag and its place in the table.
#[inline(always)]
fn tag_and_place(key: u32) -> (u64, usize) {
    (u64::from(key) / TABLE as u64 + 1, key as usize % TABLE)
}

/// Links all regular vertices. Enters their handles, [`NONE`] where there is no corner, and
/// [`LATER`] for the others. Returns how many edge ends the regular ones have, and how many others
/// there are.
pub(super) fn link<C: Corners>(
    list: C,
    buckets: &Buckets<C::Kept>,
    links: &mut impl Links,
    entries: &mut [u32],
) -> (usize, usize) {
    let mut table = [0; TABLE];
    let (mut ends, mut others) = (0, 0);
    // A use from a vertex to itself would be taken for its own twin.
    let mut selves = buckets.selves.chunk_by(|a, b| a.0 == b.0).map(|uses| uses[0].0);
    let mut at_itself = selves.next();
    for ((vertex, corners), entry) in buckets.iter().zip(entries) {
        let has_few = corners.len() <= MOST && at_itself != Some(vertex);
        *entry = match corners {
            [] => NONE,
            [first, ..] if has_few && link_ring(list, corners, &mut table, links) => {
                ends += corners.len();
                first.number()
            }
            _ => {
                others += 1;
                LATER
            }
        };
        if at_itself == Some(vertex) {
            at_itself = selves.next();
        }
    }
    (ends, others)
}

/// Links the corners of one vertex; `false`, with links that do not count, if it is irregular.
///
/// Corner i is behind corner j around the vertex when the edge before i is the edge behind j.
/// Every corner leaves its number at the place of the edge before it, in a table with as good
/// as no collisions among so few; then every corner looks where the edge behind it leads. No
/// branch depends on the data until all is done. The table is all zero before and after.
#[inline(always)]
fn link_ring<C: Corners>(
    list: C,
    corners: &[C::Kept],
    table: &mut [u64; TABLE],
    links: &mut impl Links,
) -> bool {
    let mut taken = 0;
    for (i, corner) in corners.iter().enumerate() {
        let (tag, place) = tag_and_place(corner.before());
        let place = &mut table[place];
        taken |= *place;
        *place = tag << TAG | (i as u64) << INDEX | u64::from(corner.number());
    }
    let mut fine = taken == 0;
    // Which corner is behind each, four bits a corner.
    let mut ring = 0_u64;
    for (j, corner) in corners.iter().enumerate() {
        let (tag, place) = tag_and_place(corner.behind());
        let place = &mut table[place];
        fine &= *place >> TAG == tag;
        let i = *place >> INDEX & 0xf;
        ring |= i << (4 * j);
        let behind = *place as u32 & !TOP;
        links.plain(corner.number(), list.entering(behind, || corners[i as usize]), behind);
        *place = 0;
    }
    if !fine {
        for corner in corners {
            table[tag_and_place(corner.before()).1] = 0;
        }
        return false;
    }
    // One ring, or are there several fans?
    let mut at = ring & 0xf;
    let mut length = 1;
    while at != 0 {
        at = ring >> (4 * at) & 0xf;
        length += 1;
    }
    length == corners.len()
}
