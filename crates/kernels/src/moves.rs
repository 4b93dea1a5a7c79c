//! Where compacting moves the slots of one kind of cell.

use crate::TOP;
use crate::cells::DenseId;
use crate::slots::Slots;
use merestone_topology::Correspondence;

/// Where each slot goes when the retired ones are dropped and the others keep their order;
/// meaningless for retired ones.
#[derive(Debug)]
pub(crate) struct Moves {
    to: Vec<u32>,
}

impl Moves {
    pub(crate) fn new(slots: &Slots) -> Self {
        let mut next = 0;
        let mut to = Vec::with_capacity(slots.bound());
        to.extend((0..slots.bound() as u32).map(|index| {
            let here = next;
            next += u32::from(slots.is_live(index));
            here
        }));
        Self { to }
    }

    /// A number after the move, its top bit kept.
    #[inline(always)]
    pub(crate) fn link(&self, link: u32) -> u32 {
        self.to[(link & !TOP) as usize] | link & TOP
    }

    /// The entries of the live slots, each changed by `change`, in an array of exactly their size.
    pub(crate) fn squeeze<T: Copy>(
        entries: &[T],
        slots: &Slots,
        mut change: impl FnMut(T) -> T,
    ) -> Vec<T> {
        let mut squeezed = Vec::with_capacity(slots.count());
        let live = (0..).zip(entries).filter(|&(index, _)| slots.is_live(index));
        squeezed.extend(live.map(|(_, &entry)| change(entry)));
        squeezed
    }

    pub(crate) fn correspondence<I: DenseId>(self, slots: &Slots) -> Correspondence<I, I> {
        let target = |(index, to)| slots.is_live(index).then(|| I::from_index(to));
        Correspondence::new((0..).zip(self.to).map(target).collect(), slots.count())
    }
}
