//! [`Cells`]: iterating over the live cells of a dense kernel.

use crate::slots::Slots;
use merestone_topology::{EdgeId, FaceId, Id, OrientedEdgeId, VertexId};
use std::fmt::{self, Debug};
use std::iter::FusedIterator;
use std::marker::PhantomData;

/// An id that is nothing but its index.
pub trait DenseId: Id {
    /// The id with this index, which is below 2³¹ − 1.
    fn from_index(index: u32) -> Self;
}

macro_rules! dense {
    ($($id:ident)*) => {$(
        impl DenseId for $id {
            #[inline(always)]
            fn from_index(index: u32) -> Self {
                Self::from_u32(index)
            }
        }
    )*};
}

dense!(VertexId EdgeId FaceId OrientedEdgeId);

/// The live cells of one kind, ascending.
///
/// Knows its exact length. `fold` (and so `for_each`, `sum`, …) is a plain counting loop as long
/// as nothing was retired.
///
/// ```
/// use merestone_kernels::HalfEdge;
/// use merestone_topology::{Assemble, FaceList, Topology};
/// let mesh = HalfEdge::assemble(FaceList::triangles(4, &[[0, 1, 2], [0, 2, 3]]))?;
/// assert_eq!(mesh.faces().len(), 2);
/// # Ok::<(), merestone_topology::AssembleError>(())
/// ```
pub struct Cells<'a, I> {
    /// The slot to look at next.
    next: u32,
    bound: u32,
    /// How many live ones are still to come.
    left: u32,
    live: Option<&'a [u64]>,
    _id: PhantomData<fn() -> I>,
}

impl<'a, I> Cells<'a, I> {
    #[inline]
    pub(crate) fn new(slots: &'a Slots) -> Self {
        Self {
            next: 0,
            bound: slots.bound() as u32,
            left: slots.count() as u32,
            live: slots.live_words(),
            _id: PhantomData,
        }
    }
}

/// The first live slot from `from` on.
#[inline]
fn seek(live: &[u64], from: u32) -> Option<u32> {
    let mut number = from as usize / 64;
    let mut word = live.get(number)? & (u64::MAX << (from % 64));
    while word == 0 {
        number += 1;
        word = *live.get(number)?;
    }
    Some(number as u32 * 64 + word.trailing_zeros())
}

impl<I: DenseId> Iterator for Cells<'_, I> {
    type Item = I;

    #[inline]
    fn next(&mut self) -> Option<I> {
        if self.next >= self.bound {
            return None;
        }
        let index = match self.live {
            None => self.next,
            Some(live) => match seek(live, self.next) {
                Some(index) => index,
                None => {
                    self.next = self.bound;
                    return None;
                }
            },
        };
        self.next = index + 1;
        self.left -= 1;
        Some(I::from_index(index))
    }

    #[inline]
    fn size_hint(&self) -> (usize, Option<usize>) {
        (self.left as usize, Some(self.left as usize))
    }

    #[inline]
    fn fold<B, F: FnMut(B, I) -> B>(self, init: B, mut f: F) -> B {
        // One call of `f`, so that it is inlined; the test is lifted out where nothing is retired.
        (self.next..self.bound).fold(init, |accumulated, index| {
            let lives =
                self.live.is_none_or(|live| live[index as usize / 64] >> (index % 64) & 1 == 1);
            if lives { f(accumulated, I::from_index(index)) } else { accumulated }
        })
    }
}

impl<I: DenseId> ExactSizeIterator for Cells<'_, I> {}
impl<I: DenseId> FusedIterator for Cells<'_, I> {}

impl<I> Clone for Cells<'_, I> {
    fn clone(&self) -> Self {
        Self { ..*self }
    }
}

impl<I> Debug for Cells<'_, I> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.debug_struct("Cells").field("next", &self.next).field("left", &self.left).finish()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn next_and_fold_yield_the_same_live_slots_from_any_place() {
        let mut slots = Slots::new(200);
        for keep in [false, true] {
            if keep {
                (0..200).filter(|i| i % 7 == 0 || (60..140).contains(i)).for_each(|i| {
                    slots.retire(i);
                });
            }
            let expected: Vec<u32> = (0..200).filter(|&i| slots.is_live(i)).collect();
            let mut cells: Cells<'_, VertexId> = Cells::new(&slots);
            for from in 0..=expected.len() {
                assert_eq!(cells.len(), expected.len() - from);
                let folded = cells.clone().fold(Vec::new(), |mut all, v| {
                    all.push(v.to_u32());
                    all
                });
                assert_eq!(folded, expected[from..]);
                assert_eq!(cells.next().map(VertexId::to_u32), expected.get(from).copied());
            }
            assert_eq!((cells.next(), cells.next()), (None, None));
        }
    }
}
