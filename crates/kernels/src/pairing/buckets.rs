//! The corners of a list, sorted by the vertex they lie at.

use super::Corners;
use crate::memory::vec_bytes;

/// A corner in its bucket: the vertex before it in its loop, the vertex behind it, its number.
///
/// An array of numbers and not a struct, since only of these does the standard library know that
/// zeroed memory will do.
pub(super) type Corner = [u32; 3];

/// All corners, those of one vertex together and ascending.
///
/// Each is kept with its neighbours: twelve bytes written once and read once in order are faster
/// than a number that leads back into the list.
#[derive(Debug)]
pub(super) struct Buckets {
    /// Where the bucket of each vertex ends.
    ends: Vec<u32>,
    corners: Vec<Corner>,
}

impl Buckets {
    /// A counting sort, O(corners + vertices).
    pub(super) fn new<C: Corners>(list: C, vertex_count: usize) -> Self {
        // Counted two places up, so that after the sums place v + 1 holds where bucket v begins,
        // and after the filling where it ends.
        let mut ends = vec![0_u32; vertex_count + 2];
        let counts = &mut ends[2..];
        list.for_each(|_, _, vertex, _| counts[vertex as usize] += 1);
        let mut sum = 0;
        for end in &mut ends {
            sum += *end;
            *end = sum;
        }
        let mut corners = vec![[0; 3]; list.count()];
        let places = &mut ends[1..];
        list.for_each(|number, before, vertex, behind| {
            let place = &mut places[vertex as usize];
            corners[*place as usize] = [before, behind, number];
            *place += 1;
        });
        Self { ends, corners }
    }

    /// All vertices.
    pub(super) fn vertices(&self) -> std::ops::Range<u32> {
        0..self.ends.len() as u32 - 2
    }

    /// The corners of one vertex, ascending.
    pub(super) fn corners(&self, vertex: u32) -> &[Corner] {
        let [begin, end] = [0, 1].map(|i| self.ends[vertex as usize + i] as usize);
        &self.corners[begin..end]
    }

    /// Each vertex with its corners.
    pub(super) fn iter(&self) -> impl Iterator<Item = (u32, &[Corner])> {
        let mut begin = 0;
        self.ends[1..self.ends.len() - 1].iter().zip(0..).map(move |(&end, vertex)| {
            let corners = &self.corners[begin..end as usize];
            begin = end as usize;
            (vertex, corners)
        })
    }

    /// The heap bytes.
    pub(super) fn bytes(&self) -> usize {
        vec_bytes(&self.ends) + vec_bytes(&self.corners)
    }
}
