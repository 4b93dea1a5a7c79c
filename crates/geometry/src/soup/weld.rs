//! Exact welding: records with equal coordinates become one vertex.

use super::PolygonSoup;

impl PolygonSoup {
    /// Makes one vertex of all records whose three coordinates are equal as numbers.
    ///
    /// `+0` and `−0` are equal. The first record of each vertex decides its place in the order and
    /// its attributes. Returns the welded soup and, for every record, the vertex it became.
    /// No tolerance is involved, so the result does not depend on the order of the tests.
    /// A NaN is equal to nothing; [`clean`](Self::clean) refuses it afterwards.
    ///
    /// O(records) for files as they occur, O(records · log records) for one made to defeat the
    /// hash. See [the module](self) for an example.
    #[must_use]
    pub fn weld_exact(mut self) -> (Self, Vec<u32>) {
        let vertex_of = weld(&mut self.points);
        let count = self.points.len();
        if count < vertex_of.len() {
            // A corner that names no record stays out of range, to be refused where it is checked.
            self.faces.renumber(count, |record| {
                vertex_of.get(record as usize).copied().unwrap_or(u32::MAX)
            });
            if !self.vertex_columns.is_empty() {
                let firsts = firsts(&vertex_of);
                for column in &mut self.vertex_columns {
                    column.values.select(&firsts);
                }
            }
        } else {
            // Nothing merged: the map is the identity and the corners stand as they are.
            self.faces.set_vertex_count(count);
        }
        (self, vertex_of)
    }
}

/// The first record of every vertex. Vertices are numbered in the order of their first records.
fn firsts(vertex_of: &[u32]) -> Vec<u32> {
    let mut firsts: Vec<u32> = Vec::new();
    for (record, &vertex) in vertex_of.iter().enumerate() {
        if vertex as usize == firsts.len() {
            firsts.push(record as u32);
        }
    }
    firsts
}

/// Welds in place: afterwards `points` holds each different point once. Returns the map.
fn weld(points: &mut Vec<[f64; 3]>) -> Vec<u32> {
    let Welded { map, count } = by_table(points).unwrap_or_else(|partial| {
        // Records the table has seen are where their vertices are now.
        let point = |record: usize| match partial.map.get(record) {
            Some(&vertex) => points[vertex as usize],
            None => points[record],
        };
        let records: Vec<[f64; 3]> = (0..points.len()).map(point).collect();
        let welded = by_sorting(&records);
        let mut count = 0;
        for (record, &vertex) in welded.map.iter().enumerate() {
            if vertex as usize == count {
                points[count] = records[record];
                count += 1;
            }
        }
        welded
    });
    points.truncate(count);
    points.shrink_to_fit();
    map
}

/// For each record its vertex, and how many vertices there are.
#[derive(Debug, PartialEq)]
struct Welded {
    map: Vec<u32>,
    count: usize,
}

/// The coordinates' bits, with one zero.
#[inline(always)]
fn bits(point: &[f64; 3]) -> [u64; 3] {
    point.map(|x| (x + 0.0).to_bits())
}

/// Multiplies two words and folds the halves of the product, so that every input bit reaches the
/// low bits that choose the slot: coordinates that come from `f32` have 29 zero bits at the end.
#[inline(always)]
fn fold(a: u64, b: u64) -> u64 {
    let product = u128::from(a) * u128::from(b);
    product as u64 ^ (product >> 64) as u64
}

#[inline(always)]
fn hash([x, y, z]: [u64; 3]) -> u64 {
    // Digits of π, as in Blowfish's tables: nothing-up-my-sleeve numbers.
    let xy = fold(x ^ 0x243f_6a88_85a3_08d3, y ^ 0x1319_8a2e_0370_7344);
    fold(xy ^ z ^ 0xa409_3822_299f_31d0, 0x082e_fa98_ec4e_6c89)
}

const FREE: u64 = u64::MAX;

/// Slots of (hash's upper half, vertex), linear probing. A slot decides most comparisons without
/// a look at the point, and doubling needs no look at all.
struct Table {
    slots: Vec<u64>,
}

impl Table {
    fn new(capacity: usize) -> Self {
        Self { slots: vec![FREE; capacity.next_power_of_two().max(16)] }
    }

    #[inline(always)]
    fn home(&self, tag: u32) -> usize {
        // 32 bits are enough to choose from: record numbers have no more.
        tag as usize & (self.slots.len() - 1)
    }

    fn double(&mut self) {
        let slots = vec![FREE; self.slots.len() * 2];
        let old = std::mem::replace(&mut self.slots, slots);
        let mask = self.slots.len() - 1;
        for slot in old.into_iter().filter(|&slot| slot != FREE) {
            let mut place = self.home((slot >> 32) as u32);
            while self.slots[place] != FREE {
                place = (place + 1) & mask;
            }
            self.slots[place] = slot;
        }
    }
}

/// Records looked up together. Their first slots are loaded before any of them is used, so that
/// the memory's answers overlap.
const BATCH: usize = 64;

/// Welds by an open table, moving the first record of each vertex to the vertex's place.
///
/// `Err` where so many probes were needed that the points must have been made to collide; it
/// holds the map of the records seen until then.
fn by_table(points: &mut [[f64; 3]]) -> Result<Welded, Welded> {
    // A closed triangle mesh has six records a vertex; half-filled slots make that a third.
    let mut table = Table::new(points.len() / 3);
    let mut map = Vec::with_capacity(points.len());
    let mut patience = 64 * points.len() as u64 + 4096;
    let mut count = 0;
    let (mut tags, mut hints) = ([0_u32; BATCH], [FREE; BATCH]);
    for start in (0..points.len()).step_by(BATCH) {
        let end = points.len().min(start + BATCH);
        for (tag, point) in tags.iter_mut().zip(&points[start..end]) {
            *tag = (hash(bits(point)) >> 32) as u32;
        }
        for (hint, &tag) in hints.iter_mut().zip(&tags) {
            *hint = table.slots[table.home(tag)];
        }
        for record in start..end {
            let point = points[record];
            let (tag, hint) = (tags[record - start], hints[record - start]);
            let is_it = |slot: u64| {
                (slot >> 32) as u32 == tag && slot != FREE && points[slot as u32 as usize] == point
            };
            if is_it(hint) {
                map.push(hint as u32);
                continue;
            }
            let mask = table.slots.len() - 1;
            let mut place = table.home(tag);
            let vertex = loop {
                let slot = table.slots[place];
                if slot == FREE {
                    break None;
                }
                if is_it(slot) {
                    break Some(slot as u32);
                }
                place = (place + 1) & mask;
                patience -= 1;
                if patience == 0 {
                    return Err(Welded { map, count });
                }
            };
            map.push(vertex.unwrap_or(count as u32));
            if vertex.is_none() {
                points[count] = point;
                table.slots[place] = u64::from(tag) << 32 | count as u64;
                count += 1;
                if count * 2 > table.slots.len() {
                    table.double();
                }
            }
        }
    }
    Ok(Welded { map, count })
}

/// The same by sorting the records.
fn by_sorting(points: &[[f64; 3]]) -> Welded {
    let mut order: Vec<u32> = (0..points.len() as u32).collect();
    order.sort_unstable_by_key(|&record| (bits(&points[record as usize]), record));
    // First the first record of each run, then the numbers in the order of first records.
    let mut map = vec![0_u32; points.len()];
    for run in order.chunk_by(|&a, &b| points[a as usize] == points[b as usize]) {
        for &record in run {
            map[record as usize] = run[0];
        }
    }
    let mut count = 0;
    for record in 0..map.len() {
        let first = map[record] as usize;
        if first == record {
            map[record] = count;
            count += 1;
        } else {
            map[record] = map[first];
        }
    }
    Welded { map, count: count as usize }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::soup::{AttributeColumn, AttributeValues};

    /// Points on a small grid, so that most records coincide, with zeros of both signs.
    fn grid_points(count: usize) -> Vec<[f64; 3]> {
        let mut state = 0x9e37_79b9_7f4a_7c15_u64;
        let mut coordinate = || {
            state = state.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040);
            let digit = (state >> 60) as i32 - 8;
            if digit == 0 && state >> 59 & 1 == 1 { -0.0 } else { f64::from(digit) * 0.1 }
        };
        (0..count).map(|_| [coordinate(), coordinate(), coordinate()]).collect()
    }

    /// By the definition: the first record that compares equal, number for number.
    fn by_definition(points: &[[f64; 3]]) -> Welded {
        let mut unique: Vec<[f64; 3]> = Vec::new();
        let vertex = |point: &[f64; 3]| match unique.iter().position(|seen| seen == point) {
            Some(found) => found as u32,
            None => {
                unique.push(*point);
                unique.len() as u32 - 1
            }
        };
        let map = points.iter().map(vertex).collect();
        Welded { map, count: unique.len() }
    }

    #[test]
    fn table_and_sorting_agree_with_the_definition() {
        for count in [0, 1, 2, 64, 100, 5000] {
            let mut points = grid_points(count);
            if count > 2 {
                points[7] = [f64::NAN; 3];
                points[1] = [f64::NAN; 3];
            }
            let expected = by_definition(&points);
            assert_eq!(by_sorting(&points), expected);
            let records = points.clone();
            assert_eq!(weld(&mut points), expected.map);
            assert_eq!(points.len(), expected.count);
            // Each vertex is its first record, bit for bit.
            let firsts = firsts(&expected.map).into_iter().map(|f| records[f as usize]);
            let bits = |p: [f64; 3]| p.map(f64::to_bits);
            assert!(points.iter().copied().map(bits).eq(firsts.map(bits)));
        }
    }

    #[test]
    fn zeros_of_both_signs_are_one_and_the_nearest_neighbours_are_not() {
        let next = f64::from_bits(1.0_f64.to_bits() + 1);
        let points = vec![
            [0.0, 1.0, 2.0],
            [-0.0, 1.0, 2.0],
            [0.0, next, 2.0],
            [1.0, 0.0, 2.0],
            [f64::MIN_POSITIVE / 4.0, 1.0, 2.0],
        ];
        let soup = PolygonSoup {
            points,
            vertex_columns: vec![AttributeColumn::new(
                "tone",
                AttributeValues::U8(vec![10, 11, 12, 13, 14]),
            )],
            ..PolygonSoup::default()
        };
        let (soup, map) = soup.weld_exact();
        assert_eq!(map, [0, 0, 1, 2, 3]);
        assert_eq!(soup.points.len(), 4);
        assert_eq!(soup.vertex_columns[0].values, AttributeValues::U8(vec![10, 12, 13, 14]));
    }

    #[test]
    fn points_made_to_collide_are_welded_by_sorting() {
        // x equal to the first constant makes the first product zero whatever y is.
        let x = f64::from_bits(0x243f_6a88_85a3_08d3);
        let mut points: Vec<_> = (0..3000).map(|i| [x, f64::from(i), 0.0]).collect();
        points.extend_from_within(..);
        let records = points.clone();
        assert!(by_table(&mut points.clone()).is_err());
        let map = weld(&mut points);
        assert_eq!(points, records[..3000]);
        assert_eq!(map[3000..], map[..3000]);
    }

    #[test]
    fn a_corner_out_of_range_stays_out_of_range() {
        let mut soup = PolygonSoup { points: vec![[0.0; 3]; 4], ..PolygonSoup::default() };
        soup.faces.push_face(&[0, 3, 4]);
        let (soup, _) = soup.weld_exact();
        assert!(soup.clean().is_err());
    }
}
