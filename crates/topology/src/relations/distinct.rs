//! Dropping repeats from a relation.

use crate::Id;
use smallvec::SmallVec;
use std::collections::HashSet;
use std::iter::FusedIterator;

/// How many items are searched one by one before a table pays.
const SEARCHED: usize = 24;

/// The items of an iterator, each the first time it comes. Made by [`distinct`].
#[derive(Clone, Debug)]
pub struct Distinct<I: Iterator> {
    items: I,
    few: SmallVec<[I::Item; 8]>,
    many: HashSet<I::Item>,
}

/// The items of a relation without repeats, in order of first appearance.
///
/// O(items); allocates beyond eight different ones.
///
/// ```
/// use merestone_topology::{VertexId, relations::distinct};
/// let v = VertexId::from_u32;
/// assert!(distinct([v(3), v(1), v(3)].into_iter()).eq([v(3), v(1)]));
/// ```
pub fn distinct<I: Iterator<Item: Id>>(items: I) -> Distinct<I> {
    Distinct { items, few: SmallVec::new(), many: HashSet::new() }
}

impl<I: Iterator<Item: Id>> Distinct<I> {
    fn is_new(&mut self, item: I::Item) -> bool {
        if self.few.len() < SEARCHED {
            let new = !self.few.contains(&item);
            if new {
                self.few.push(item);
            }
            return new;
        }
        if self.many.is_empty() {
            self.many.extend(self.few.iter().copied());
        }
        self.many.insert(item)
    }
}

impl<I: Iterator<Item: Id>> Iterator for Distinct<I> {
    type Item = I::Item;

    fn next(&mut self) -> Option<I::Item> {
        loop {
            let item = self.items.next()?;
            if self.is_new(item) {
                return Some(item);
            }
        }
    }
}

impl<I: FusedIterator<Item: Id>> FusedIterator for Distinct<I> {}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::VertexId;

    #[test]
    fn many_items_are_told_apart_as_few_are() {
        let items = (0..1000u32).map(|i| VertexId::from_u32(i * 7 % 300));
        let seen: Vec<usize> = distinct(items).map(Id::index).collect();
        assert_eq!(seen, (0..300).map(|i| i * 7 % 300).collect::<Vec<_>>());
    }
}
