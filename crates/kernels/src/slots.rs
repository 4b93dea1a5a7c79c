//! Which slots of a kind of cell live.

/// The slots `0..bound` of one kind of cell, and which of them were retired.
///
/// A topology that never lost a cell holds nothing on the heap here: the bit set comes with the
/// first retired slot.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub(crate) struct Slots {
    bound: u32,
    retired: u32,
    /// A bit for each slot, set while it lives; bits from `bound` on are clear.
    live: Option<Box<[u64]>>,
}

impl Slots {
    /// `bound` slots, all live. `bound` is at most 2³¹ − 1, as the dense ids have it.
    pub(crate) fn new(bound: usize) -> Self {
        debug_assert!(bound < 1 << 31, "more slots than dense ids can number");
        Self { bound: bound as u32, retired: 0, live: None }
    }

    /// Above every slot.
    #[inline(always)]
    pub(crate) fn bound(&self) -> usize {
        self.bound as usize
    }

    /// How many live.
    #[inline(always)]
    pub(crate) fn count(&self) -> usize {
        (self.bound - self.retired) as usize
    }

    /// How many were retired.
    #[inline(always)]
    pub(crate) fn retired(&self) -> usize {
        self.retired as usize
    }

    /// Whether slot `index` lives; `false` from the bound on.
    #[inline(always)]
    pub(crate) fn is_live(&self, index: u32) -> bool {
        index < self.bound
            && self
                .live
                .as_ref()
                .is_none_or(|words| words[index as usize / 64] >> (index % 64) & 1 == 1)
    }

    /// `index`, if a slot of that number lives.
    #[inline(always)]
    pub(crate) fn at(&self, index: usize) -> Option<u32> {
        (index < self.bound() && self.is_live(index as u32)).then_some(index as u32)
    }

    /// Retires a slot. `false`, and nothing changes, when it did not live. O(1), but the first
    /// one costs O(bound).
    pub(crate) fn retire(&mut self, index: u32) -> bool {
        if !self.is_live(index) {
            return false;
        }
        let bound = self.bound as usize;
        let words = self.live.get_or_insert_with(|| all_live(bound));
        words[index as usize / 64] &= !(1 << (index % 64));
        self.retired += 1;
        true
    }

    /// Makes a retired slot live again. `false`, and nothing changes, unless it was retired. O(1).
    #[cfg_attr(not(test), allow(dead_code, reason = "what undoes a removal calls it"))]
    pub(crate) fn revive(&mut self, index: u32) -> bool {
        if index >= self.bound || self.is_live(index) {
            return false;
        }
        let Some(words) = &mut self.live else { return false };
        words[index as usize / 64] |= 1 << (index % 64);
        self.retired -= 1;
        true
    }

    /// The bits of the live slots, 64 a word; `None` while all live.
    #[inline(always)]
    pub(crate) fn live_words(&self) -> Option<&[u64]> {
        self.live.as_deref()
    }

    /// The heap bytes of the bit set.
    pub(crate) fn bytes(&self) -> usize {
        self.live.as_ref().map_or(0, |words| size_of_val::<[u64]>(words))
    }
}

fn all_live(bound: usize) -> Box<[u64]> {
    let mut words = vec![u64::MAX; bound.div_ceil(64)];
    if let Some(last) = words.last_mut()
        && !bound.is_multiple_of(64)
    {
        *last = (1 << (bound % 64)) - 1;
    }
    words.into_boxed_slice()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn retired_slots_are_counted_once_and_come_back() {
        let mut slots = Slots::new(70);
        assert_eq!((slots.count(), slots.bytes()), (70, 0));
        assert!(slots.retire(69) && slots.retire(0) && !slots.retire(69) && !slots.retire(70));
        assert_eq!((slots.count(), slots.retired(), slots.bound()), (68, 2, 70));
        assert_eq!((slots.at(69), slots.at(68), slots.at(70)), (None, Some(68), None));
        assert_eq!(slots.at(usize::MAX), None);
        assert_eq!(slots.bytes(), 16);
        assert!(slots.revive(69) && !slots.revive(69) && !slots.revive(68) && !slots.revive(70));
        assert_eq!((slots.count(), slots.is_live(69)), (69, true));
    }

    #[test]
    fn bits_beyond_the_bound_stay_clear() {
        for bound in [1, 63, 64, 65, 128] {
            let mut slots = Slots::new(bound);
            assert!(slots.retire(0));
            let ones: u32 = slots.live_words().unwrap().iter().map(|w| w.count_ones()).sum();
            assert_eq!(ones as usize, bound - 1);
        }
    }
}
