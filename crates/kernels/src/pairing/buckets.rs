//! The corners of a list, sorted by the vertex they lie at.

use super::corners::{Corners, Kept, Keys};
use crate::memory::Peak;

/// All corners, those of one vertex together and ascending.
///
/// Each is kept with its neighbours: twelve bytes written once and read once in order are faster
/// than a number that leads back into the list.
#[derive(Debug)]
pub(super) struct Buckets<T> {
    /// Where the bucket of each vertex ends, from place 1 on.
    ends: Vec<u32>,
    corners: Vec<T>,
    /// The uses from a vertex to itself as (vertex, use), ascending.
    pub(super) selves: Vec<(u32, u32)>,
}

impl<T: Kept> Buckets<T> {
    /// A counting sort, O(corners + vertices).
    pub(super) fn new<C: Corners<Kept = T>>(
        list: C,
        keys: impl Keys,
        vertex_count: usize,
        peak: &mut Peak,
    ) -> Self {
        // Counted two places up, so that after the sums place v + 1 holds where bucket v begins,
        // and after the filling where it ends.
        let mut ends = peak.held(vec![0_u32; vertex_count + 2]);
        let counts = &mut ends[2..];
        let mut at_itself = 0;
        list.for_each(|vertex, corner| {
            counts[vertex as usize] += 1;
            at_itself += usize::from(corner.behind() == vertex);
        });
        let selves = peak.held(if at_itself > 0 { selves(list, at_itself) } else { Vec::new() });
        let mut sum = 0;
        for end in &mut ends {
            sum += *end;
            *end = sum;
        }
        let mut corners = peak.held(vec![T::ZERO; list.count()]);
        let places = &mut ends[1..];
        list.for_each(|vertex, corner| {
            let place = &mut places[vertex as usize];
            corners[*place as usize] = keys.keyed(list, corner);
            *place += 1;
        });
        Self { ends, corners, selves }
    }

    /// The corners of one vertex, ascending.
    pub(super) fn corners(&self, vertex: u32) -> &[T] {
        let [begin, end] = [0, 1].map(|i| self.ends[vertex as usize + i] as usize);
        &self.corners[begin..end]
    }

    /// Each vertex with its corners.
    pub(super) fn iter(&self) -> impl Iterator<Item = (u32, &[T])> {
        let mut begin = 0;
        self.ends[1..self.ends.len() - 1].iter().zip(0..).map(move |(&end, vertex)| {
            let corners = &self.corners[begin..end as usize];
            begin = end as usize;
            (vertex, corners)
        })
    }

    /// Keeps the uses from a vertex to itself, and the memory of the corners, to be used again.
    pub(super) fn into_parts(self, peak: &mut Peak) -> (Vec<(u32, u32)>, Vec<T>) {
        peak.drop(self.ends);
        (self.selves, self.corners)
    }
}

/// The `count` uses from a vertex to itself.
#[cold]
fn selves<C: Corners>(list: C, count: usize) -> Vec<(u32, u32)> {
    let mut selves = Vec::with_capacity(count);
    list.for_each(|vertex, corner| {
        if corner.behind() == vertex {
            selves.push((vertex, corner.number()));
        }
    });
    selves.sort_unstable();
    selves
}
