//! Exact welding: records with equal coordinates become one vertex.

use super::PolygonSoup;
use std::collections::BTreeMap;

impl PolygonSoup {
    /// Makes one vertex of all records whose three coordinates are equal as numbers.
    ///
    /// `+0` and `−0` are equal. The first record of each vertex decides its place in the order and
    /// its attributes. Returns the welded soup and, for every record, the vertex it became.
    /// No tolerance is involved, so the result does not depend on the order of the tests.
    /// A NaN is equal to nothing; [`clean`](Self::clean) refuses it afterwards.
    ///
    /// O(records) for files as they occur, O(records · log records) for one made to defeat the
    /// hash.
    ///
    /// ```
    /// use merestone_geometry::PolygonSoup;
    /// let points = vec![[0., 1., 0.], [1., 1., 0.], [-0., 1., 0.]];
    /// let soup = PolygonSoup { points, ..PolygonSoup::default() };
    /// let (soup, record_to_vertex) = soup.weld_exact();
    /// assert_eq!(record_to_vertex, [0, 1, 0]);
    /// assert_eq!(soup.points, [[0., 1., 0.], [1., 1., 0.]]);
    /// ```
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
    let mut map = Vec::with_capacity(points.len());
    let mut index = Index::with_capacity(points.len());
    let mut batch = [[0.0; 3]; BATCH];
    for start in (0..points.len()).step_by(BATCH) {
        let batch = &mut batch[..BATCH.min(points.len() - start)];
        batch.copy_from_slice(&points[start..start + batch.len()]);
        // Vertices never outnumber the records read, so that none is overwritten unread.
        index.add(&mut Front(points), batch, &mut map);
    }
    points.truncate(index.count);
    points.shrink_to_fit();
    map
}

/// Exact welding of records as they come, without holding them.
///
/// Gives what [`PolygonSoup::weld_exact`] gives for all records together.
///
/// ```
/// use merestone_geometry::Welder;
/// let mut welder = Welder::with_capacity(4);
/// let mut vertices = Vec::new();
/// welder.add(&[[0., 0., 0.], [1., 0., 0.], [-0., 0., 0.]], &mut vertices);
/// welder.add(&[[1., 0., 0.]], &mut vertices);
/// assert_eq!(vertices, [0, 1, 0, 1]);
/// assert_eq!(welder.into_points(), [[0., 0., 0.], [1., 0., 0.]]);
/// ```
#[derive(Clone, Debug)]
pub struct Welder {
    points: Vec<[f64; 3]>,
    index: Index,
}

impl Welder {
    /// A welder with room for about so many records of a closed mesh, six to a vertex.
    #[must_use]
    pub fn with_capacity(records: usize) -> Self {
        Self { points: Vec::with_capacity(records / 6), index: Index::with_capacity(records) }
    }

    /// Appends the vertex of each record to `vertices`. Faster the more records come at once.
    ///
    /// Amortised O(records), as [`PolygonSoup::weld_exact`].
    pub fn add(&mut self, records: &[[f64; 3]], vertices: &mut Vec<u32>) {
        for batch in records.chunks(BATCH) {
            self.index.add(&mut self.points, batch, vertices);
        }
    }

    /// The vertices, in the order of their first records.
    #[must_use]
    pub fn into_points(mut self) -> Vec<[f64; 3]> {
        self.points.shrink_to_fit();
        self.points
    }
}

/// Where vertices are kept.
trait Store {
    fn get(&self, vertex: u32) -> [f64; 3];
    /// Keeps the vertex of the next number.
    fn put(&mut self, vertex: usize, point: [f64; 3]);
}

impl Store for Vec<[f64; 3]> {
    #[inline(always)]
    fn get(&self, vertex: u32) -> [f64; 3] {
        self[vertex as usize]
    }

    #[inline(always)]
    fn put(&mut self, _: usize, point: [f64; 3]) {
        self.push(point);
    }
}

/// The front of the records' own array.
struct Front<'a>(&'a mut [[f64; 3]]);

impl Store for Front<'_> {
    #[inline(always)]
    fn get(&self, vertex: u32) -> [f64; 3] {
        self.0[vertex as usize]
    }

    #[inline(always)]
    fn put(&mut self, vertex: usize, point: [f64; 3]) {
        self.0[vertex] = point;
    }
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
#[derive(Clone, Debug)]
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

/// Probes allowed for each record on average. Chance needs about one.
const PATIENCE: u64 = 64;

/// Which vertex has which point.
#[derive(Clone, Debug)]
struct Index {
    table: Table,
    /// Takes over once so many probes were needed that the points must have been made to collide.
    tree: Option<BTreeMap<[u64; 3], u32>>,
    patience: u64,
    count: usize,
}

impl Index {
    fn with_capacity(records: usize) -> Self {
        // A closed triangle mesh has six records a vertex; half-filled slots make that a third.
        Self { table: Table::new(records / 3), tree: None, patience: 4096, count: 0 }
    }

    /// Appends the vertices of up to [`BATCH`] records to the map.
    #[inline]
    fn add(&mut self, store: &mut impl Store, batch: &[[f64; 3]], map: &mut Vec<u32>) {
        self.patience += PATIENCE * batch.len() as u64;
        let (mut tags, mut hints) = ([0_u32; BATCH], [FREE; BATCH]);
        for (tag, point) in tags.iter_mut().zip(batch) {
            *tag = (hash(bits(point)) >> 32) as u32;
        }
        for (hint, &tag) in hints.iter_mut().zip(&tags[..batch.len().min(BATCH)]) {
            *hint = self.table.slots[self.table.home(tag)];
        }
        for ((&point, &tag), &hint) in batch.iter().zip(&tags).zip(&hints) {
            // Filled slots never change, so what was loaded is still true.
            let vertex =
                if hint != FREE && (hint >> 32) as u32 == tag && store.get(hint as u32) == point {
                    hint as u32
                } else {
                    self.look_up(store, point, tag)
                };
            map.push(vertex);
        }
    }

    /// The vertex of this point, a new one if need be.
    fn look_up(&mut self, store: &mut impl Store, point: [f64; 3], tag: u32) -> u32 {
        if self.tree.is_none() {
            let mask = self.table.slots.len() - 1;
            let mut place = self.table.home(tag);
            while self.patience > 0 {
                let slot = self.table.slots[place];
                if slot == FREE {
                    let vertex = self.new_vertex(store, point);
                    self.table.slots[place] = u64::from(tag) << 32 | u64::from(vertex);
                    if self.count * 2 > self.table.slots.len() {
                        self.table.double();
                    }
                    return vertex;
                }
                if (slot >> 32) as u32 == tag && store.get(slot as u32) == point {
                    return slot as u32;
                }
                place = (place + 1) & mask;
                self.patience -= 1;
            }
        }
        self.look_up_in_tree(store, point)
    }

    #[cold]
    fn look_up_in_tree(&mut self, store: &mut impl Store, point: [f64; 3]) -> u32 {
        let count = self.count as u32;
        let tree =
            self.tree.get_or_insert_with(|| (0..count).map(|v| (bits(&store.get(v)), v)).collect());
        let is_number = point.iter().all(|x| !x.is_nan());
        if let Some(&vertex) = tree.get(&bits(&point)).filter(|_| is_number) {
            return vertex;
        }
        tree.insert(bits(&point), count);
        self.new_vertex(store, point)
    }

    #[inline(always)]
    fn new_vertex(&mut self, store: &mut impl Store, point: [f64; 3]) -> u32 {
        let vertex = self.count;
        store.put(vertex, point);
        self.count += 1;
        vertex as u32
    }
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
    fn by_definition(points: &[[f64; 3]]) -> (Vec<u32>, usize) {
        let mut unique: Vec<[f64; 3]> = Vec::new();
        let vertex = |point: &[f64; 3]| match unique.iter().position(|seen| seen == point) {
            Some(found) => found as u32,
            None => {
                unique.push(*point);
                unique.len() as u32 - 1
            }
        };
        let map = points.iter().map(vertex).collect();
        (map, unique.len())
    }

    #[test]
    fn all_ways_agree_with_the_definition() {
        for count in [0, 1, 2, 64, 100, 5000] {
            let mut points = grid_points(count);
            if count > 2 {
                points[7] = [f64::NAN; 3];
                points[1] = [f64::NAN; 3];
            }
            let (expected, vertices) = by_definition(&points);
            let records = points.clone();
            assert_eq!(weld(&mut points), expected);
            assert_eq!(points.len(), vertices);
            // As they come, a few at a time, and by the tree from the 70th record on.
            let mut welder = Welder::with_capacity(0);
            let mut map = Vec::new();
            for (turn, some) in records.chunks(7).enumerate() {
                if turn == 10 {
                    welder.index.look_up_in_tree(&mut welder.points, [99.0; 3]);
                    welder.points.pop();
                    welder.index.count -= 1;
                }
                welder.add(some, &mut map);
            }
            assert_eq!(map, expected);
            assert_eq!(welder.into_points().len(), vertices);
            // Each vertex is its first record, bit for bit.
            let firsts = firsts(&expected).into_iter().map(|f| records[f as usize]);
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
    fn points_made_to_collide_are_welded_by_the_tree() {
        // x equal to the first constant makes the first product zero whatever y is.
        let x = f64::from_bits(0x243f_6a88_85a3_08d3);
        let mut points: Vec<_> = (0..3000).map(|i| [x, f64::from(i), 0.0]).collect();
        points.extend_from_within(..);
        let records = points.clone();
        let mut welder = Welder::with_capacity(points.len());
        welder.add(&points, &mut Vec::new());
        assert!(welder.index.tree.is_some());
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
