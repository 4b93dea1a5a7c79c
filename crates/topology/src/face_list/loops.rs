//! Loops of a face list, one at a time.

use super::FaceList;
use std::iter::FusedIterator;
use std::ops::Range;

/// Where run `index` begins, when runs are given by their ends.
#[inline]
pub(super) fn start_of(ends: &[u32], index: usize) -> usize {
    index.checked_sub(1).and_then(|before| ends.get(before)).map_or(0, |&end| end as usize)
}

/// One loop as listed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct ListedLoop<'a> {
    /// The number of its first corner in [`FaceList::corners`].
    pub first_corner: usize,
    /// Its corners as vertex numbers; one for a vertex loop.
    pub corners: &'a [u32],
    /// Whether it is a bare vertex. A loop of one corner that is not is a self-edge.
    pub is_vertex_loop: bool,
}

/// The loops of one face, outer first. Made by [`FaceList::loops`].
#[derive(Clone, Debug)]
pub struct ListedLoops<'a> {
    list: FaceList<'a>,
    range: Range<usize>,
}

impl<'a> ListedLoops<'a> {
    pub(super) fn new(list: FaceList<'a>, range: Range<usize>) -> Self {
        Self { list, range }
    }
}

impl<'a> Iterator for ListedLoops<'a> {
    type Item = ListedLoop<'a>;

    #[inline]
    fn next(&mut self) -> Option<ListedLoop<'a>> {
        self.range.next().and_then(|index| self.list.listed_loop(index))
    }

    fn size_hint(&self) -> (usize, Option<usize>) {
        self.range.size_hint()
    }
}

impl ExactSizeIterator for ListedLoops<'_> {}
impl FusedIterator for ListedLoops<'_> {}
