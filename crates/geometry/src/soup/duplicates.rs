//! Faces that repeat others.

use super::CleanSoup;
use std::cmp::Ordering;

/// A face that has the same loops as an earlier one.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct DuplicateFace {
    /// The repeating face.
    pub face: u32,
    /// The first face with these loops.
    pub first: u32,
}

impl CleanSoup {
    /// Every face that equals an earlier one up to rotation or reversal of its loops, ascending.
    ///
    /// Their number is the faces less the different ones. Inner loops may come in any order; each
    /// may be rotated and reversed by itself. O(corners + faces · log of the faces that share
    /// their smallest vertex); no hash is involved.
    ///
    /// ```
    /// use merestone_geometry::{DuplicateFace, PolygonSoup};
    /// let points = vec![[0., 0., 0.], [1., 0., 0.], [0., 1., 0.]];
    /// let mut soup = PolygonSoup { points, ..PolygonSoup::default() };
    /// soup.faces.set_vertex_count(3);
    /// soup.faces.push_face(&[0, 1, 2]);
    /// soup.faces.push_face(&[1, 0, 2]);
    /// assert_eq!(soup.clean()?.duplicate_faces(), [DuplicateFace { face: 1, first: 0 }]);
    /// # Ok::<(), merestone_geometry::SoupError>(())
    /// ```
    #[must_use]
    pub fn duplicate_faces(&self) -> Vec<DuplicateFace> {
        let list = self.faces();
        let mut canonical = Canonical::with_capacity(list.face_count(), list.corner_count());
        for face in 0..list.face_count() {
            canonical.push_face(list.loops(face).map(|listed| listed.corners));
        }

        // Counting sort by the smallest vertex of the outer loop, which the canonical form begins
        // with; what is left in a bucket is sorted by comparing.
        let mut starts = vec![0_u32; self.points().len() + 1];
        for face in 0..list.face_count() {
            starts[canonical.face(face as u32)[0] as usize] += 1;
        }
        let mut sum = 0;
        for start in &mut starts {
            sum += std::mem::replace(start, sum);
        }
        let mut order = vec![0_u32; list.face_count()];
        for face in 0..list.face_count() as u32 {
            let place = &mut starts[canonical.face(face)[0] as usize];
            order[*place as usize] = face;
            *place += 1;
        }

        // Each start now stands at its bucket's end.
        let mut duplicates = Vec::new();
        let mut begin = 0;
        for &end in &starts[..self.points().len()] {
            let bucket = &mut order[begin..end as usize];
            begin = end as usize;
            if bucket.len() > 1 {
                bucket.sort_unstable_by(|&a, &b| {
                    canonical.face(a).cmp(canonical.face(b)).then(a.cmp(&b))
                });
                for run in bucket.chunk_by(|&a, &b| canonical.face(a) == canonical.face(b)) {
                    let first = run[0];
                    duplicates.extend(run[1..].iter().map(|&face| DuplicateFace { face, first }));
                }
            }
        }
        duplicates.sort_unstable_by_key(|duplicate| duplicate.face);
        duplicates
    }
}

/// A mark between the loops of a face. No vertex has this number.
const SEPARATOR: u32 = u32::MAX;

/// One sequence a face that is the same for equal faces only.
struct Canonical {
    words: Vec<u32>,
    ends: Vec<usize>,
    scratch: Vec<u32>,
}

impl Canonical {
    fn with_capacity(faces: usize, corners: usize) -> Self {
        Self {
            words: Vec::with_capacity(corners),
            ends: Vec::with_capacity(faces),
            scratch: Vec::new(),
        }
    }

    fn face(&self, face: u32) -> &[u32] {
        let face = face as usize;
        let start = if face == 0 { 0 } else { self.ends[face - 1] };
        &self.words[start..self.ends[face]]
    }

    fn push_face<'a>(&mut self, mut loops: impl ExactSizeIterator<Item = &'a [u32]>) {
        if let Some(outer) = loops.next() {
            self.push_loop(outer);
        }
        if loops.len() > 0 {
            let mut inner: Vec<Vec<u32>> = loops
                .map(|corners| {
                    let start = self.words.len();
                    self.push_loop(corners);
                    self.words.split_off(start)
                })
                .collect();
            inner.sort_unstable();
            for corners in inner {
                self.words.push(SEPARATOR);
                self.words.extend(corners);
            }
        }
        self.ends.push(self.words.len());
    }

    /// Appends the least of all rotations of the loop and of its reversal.
    fn push_loop(&mut self, corners: &[u32]) {
        if let [a, b, c] = *corners {
            // The six orders of three are all the rotations and reversals there are.
            let (low, high) = (a.min(b), a.max(b));
            self.words.extend([low.min(c), low.max(high.min(c)), high.max(c)]);
            return;
        }
        let forward = least_rotation(corners);
        self.scratch.clear();
        self.scratch.extend(corners.iter().rev());
        let backward = least_rotation(&self.scratch);
        let rotated = |corners: &[u32], at: usize| {
            let (head, tail) = corners.split_at(at);
            tail.iter().chain(head).copied().collect::<Vec<_>>()
        };
        let (forward, backward) = (rotated(corners, forward), rotated(&self.scratch, backward));
        self.words.extend(forward.min(backward));
    }
}

/// Where the least rotation of a cyclic sequence begins.
///
/// Two candidates run against each other; a mismatch after k steps rules out k + 1 starts.
/// O(length) (the least-rotation problem of Booth 1980; this two-pointer form is from memory).
fn least_rotation(corners: &[u32]) -> usize {
    let n = corners.len();
    let at = |place: usize| corners[if place < n { place } else { place - n }];
    let (mut i, mut j, mut matched) = (0, 1, 0);
    while i < n && j < n && matched < n {
        match at(i + matched).cmp(&at(j + matched)) {
            Ordering::Equal => matched += 1,
            order => {
                let lost = if order == Ordering::Greater { &mut i } else { &mut j };
                *lost += matched + 1;
                if i == j {
                    j += 1;
                }
                matched = 0;
            }
        }
    }
    i.min(j)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::PolygonSoup;

    #[test]
    fn the_least_rotation_is_the_least_of_all() {
        // All words of up to seven letters over three: ties and periods of every kind.
        for length in 1..=7_u32 {
            for word in 0..3_u32.pow(length) {
                let corners: Vec<u32> = (0..length).map(|i| word / 3_u32.pow(i) % 3).collect();
                let rotation = |at: usize| [&corners[at..], &corners[..at]].concat();
                let least = (0..corners.len()).map(rotation).min().unwrap();
                assert_eq!(rotation(least_rotation(&corners)), least, "{corners:?}");
            }
        }
    }

    fn soup(faces: &[&[&[u32]]]) -> PolygonSoup {
        let mut soup = PolygonSoup { points: vec![[0.0; 3]; 12], ..PolygonSoup::default() };
        soup.faces.set_vertex_count(12);
        for face in faces {
            soup.faces.push_face(face[0]);
            face[1..].iter().for_each(|inner| soup.faces.push_inner_loop(inner));
        }
        soup
    }

    #[test]
    fn rotations_and_reversals_repeat_and_other_orders_do_not() {
        let clean = soup(&[
            &[&[3, 1, 2, 0]],
            &[&[0, 1, 2, 3]],
            &[&[2, 1, 0, 3]],
            &[&[0, 2, 1, 3]],
            &[&[1, 2, 3, 0]],
            &[&[5, 3, 4]],
            &[&[4, 3, 5]],
            // A loop that passes a vertex twice: the same corners another way round.
            &[&[0, 1, 2, 0, 3, 4]],
            &[&[0, 1, 2, 0, 4, 3]],
            &[&[3, 0, 2, 1, 0, 4]],
        ])
        .clean()
        .unwrap();
        let pairs: Vec<_> = clean.duplicate_faces().iter().map(|d| (d.face, d.first)).collect();
        assert_eq!(pairs, [(2, 1), (3, 0), (4, 1), (6, 5), (9, 7)]);
    }

    #[test]
    fn inner_loops_may_come_in_any_order() {
        let clean = soup(&[
            &[&[0, 1, 2], &[3, 4, 5], &[6, 7, 8, 9]],
            &[&[0, 1, 2]],
            &[&[2, 1, 0], &[8, 7, 6, 9], &[4, 5, 3]],
            &[&[0, 1, 2], &[3, 4, 5]],
            &[&[0, 1, 2], &[3, 4, 5], &[7, 6, 8, 9]],
        ])
        .clean()
        .unwrap();
        let pairs: Vec<_> = clean.duplicate_faces().iter().map(|d| (d.face, d.first)).collect();
        assert_eq!(pairs, [(2, 0)]);
    }
}
