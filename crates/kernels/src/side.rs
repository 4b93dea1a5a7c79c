//! Side tables: what the few cells need that do not fit one entry.

/// Lists of numbers, each owned by one cell, whose entry holds the list's index.
///
/// A list is replaced as a whole and removed by moving the last one into its place, so there are
/// no dead lists and no spare capacity inside one.
#[derive(Clone, Debug, Default)]
pub(crate) struct SideTable {
    /// Each list after the number of its owner.
    lists: Vec<Box<[u32]>>,
}

impl SideTable {
    pub(crate) fn with_capacity(lists: usize) -> Self {
        Self { lists: Vec::with_capacity(lists) }
    }

    /// The list at `index`, without its owner.
    #[inline]
    pub(crate) fn get(&self, index: u32) -> &[u32] {
        &self.lists[index as usize][1..]
    }

    /// Adds a list, given with its length, and returns its index.
    pub(crate) fn push(&mut self, owner: u32, list: (usize, impl Iterator<Item = u32>)) -> u32 {
        self.lists.push(exact(owner, list));
        (self.lists.len() - 1) as u32
    }

    /// Gives the list at `index` other contents.
    pub(crate) fn replace(&mut self, index: u32, list: (usize, impl Iterator<Item = u32>)) {
        let place = &mut self.lists[index as usize];
        *place = exact(place[0], list);
    }

    /// Removes the list at `index`. Returns the owner of the list that moved there, if one did.
    pub(crate) fn remove(&mut self, index: u32) -> Option<u32> {
        self.lists.swap_remove(index as usize);
        self.lists.get(index as usize).map(|list| list[0])
    }

    /// How many lists.
    pub(crate) fn len(&self) -> usize {
        self.lists.len()
    }

    /// The heap bytes, the lists' own included.
    pub(crate) fn bytes(&self) -> usize {
        crate::memory::vec_bytes(&self.lists)
            + self.lists.iter().map(|list| size_of_val::<[u32]>(list)).sum::<usize>()
    }
}

fn exact(owner: u32, (len, list): (usize, impl Iterator<Item = u32>)) -> Box<[u32]> {
    let mut exact = Vec::with_capacity(1 + len);
    exact.push(owner);
    exact.extend(list);
    exact.into_boxed_slice()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_last_list_moves_into_a_gap_and_its_owner_is_told() {
        let mut table = SideTable::with_capacity(3);
        for owner in [7, 8, 9] {
            assert_eq!(table.push(owner, (2, [owner * 10, owner].into_iter())), owner - 7);
        }
        assert_eq!(table.bytes(), 3 * 16 + 3 * 3 * 4);
        assert_eq!(table.remove(0), Some(9));
        assert_eq!((table.get(0), table.get(1)), (&[90, 9][..], &[80, 8][..]));
        assert_eq!(table.remove(1), None);
        table.replace(0, (1, [1].into_iter()));
        assert_eq!((table.get(0), table.len()), (&[1][..], 1));
    }
}
