//! Vertices all of whose edges are plain and whose corners form one ring.

use super::Links;
use super::buckets::{Buckets, Corner};

/// Vertices of more corners are left to sorting, which a hub needs: the table would run full.
const MOST: usize = 16;

/// Places in the table: 8 KiB, to stay in the first cache.
const TABLE: usize = 1024;

/// Links all regular vertices and returns the others, ascending, and how many edge ends the
/// regular ones have.
pub(super) fn link(buckets: &Buckets, links: &mut impl Links) -> (Vec<u32>, usize) {
    let mut table = [0; TABLE];
    let mut irregular = Vec::new();
    let mut ends = 0;
    for (vertex, corners) in buckets.iter() {
        if let [first, ..] = corners {
            if corners.len() <= MOST && link_ring(vertex, corners, &mut table, links) {
                links.sector(vertex, first[2]);
                ends += corners.len();
            } else {
                irregular.push(vertex);
            }
        }
    }
    (irregular, ends)
}

/// Links the corners of one vertex; `false`, with links that do not count, if it is irregular.
///
/// Corner i is behind corner j around the vertex when the vertex before i is the vertex behind j.
/// Every corner leaves its number at the place of the vertex before it, in a table with as good
/// as no collisions among so few; then every corner looks where the vertex behind it leads. No
/// branch depends on the data until all is done. The table is all zero before and after.
#[inline(always)]
fn link_ring(
    vertex: u32,
    corners: &[Corner],
    table: &mut [u64; TABLE],
    links: &mut impl Links,
) -> bool {
    let mut taken = 0;
    let mut at_itself = false;
    for (i, &[before, ..]) in corners.iter().enumerate() {
        let place = &mut table[before as usize % TABLE];
        taken |= *place;
        // A use from the vertex to itself would be taken for its own twin.
        at_itself |= before == vertex;
        *place = (u64::from(before) + 1) << 32 | i as u64;
    }
    let mut fine = taken == 0 && !at_itself;
    // Which corner is behind each, four bits a corner.
    let mut ring = 0_u64;
    for (j, &[_, behind, number]) in corners.iter().enumerate() {
        let place = &mut table[behind as usize % TABLE];
        fine &= *place >> 32 == u64::from(behind) + 1;
        let i = *place & 0xf;
        ring |= i << (4 * j);
        links.turn_to(number, corners[i as usize][2]);
        *place = 0;
    }
    if !fine {
        for &[before, ..] in corners {
            table[before as usize % TABLE] = 0;
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
