//! Exact accounts of the heap.
//!
//! Kernels allocate with the capacity they end up needing: then what they report is what an
//! allocator counts, and no growth ever holds an array twice.

use merestone_topology::ArrayBytes;

/// The heap bytes of a `Vec`, spare capacity included.
pub(crate) fn vec_bytes<T>(array: &Vec<T>) -> usize {
    array.capacity() * size_of::<T>()
}

/// The account of an array with one `T` a slot, `retired` of them retired.
pub(crate) fn array_bytes<T>(name: &'static str, array: &Vec<T>, retired: usize) -> ArrayBytes {
    ArrayBytes { name, bytes: vec_bytes(array), retired: retired * size_of::<T>() }
}

/// The most heap bytes held at once, told of every allocation that comes and goes.
#[derive(Clone, Copy, Debug, Default)]
pub(crate) struct Peak {
    now: usize,
    most: usize,
}

impl Peak {
    /// `bytes` more are held.
    pub(crate) fn hold(&mut self, bytes: usize) {
        self.now += bytes;
        self.most = self.most.max(self.now);
    }

    /// `bytes` less are held.
    pub(crate) fn release(&mut self, bytes: usize) {
        debug_assert!(bytes <= self.now, "more is released than is held");
        self.now -= bytes;
    }

    /// `array`, now held.
    pub(crate) fn held<T>(&mut self, array: Vec<T>) -> Vec<T> {
        self.hold(vec_bytes(&array));
        array
    }

    /// Drops `array`.
    pub(crate) fn drop<T>(&mut self, array: Vec<T>) {
        self.release(vec_bytes(&array));
        drop(array);
    }

    /// `memory` cut down to what `array` needs and filled by it.
    ///
    /// Counted as the worst an allocator can do: to make the small one before it drops the large.
    pub(crate) fn reused<T: Copy>(
        &mut self,
        mut memory: Vec<T>,
        array: impl ExactSizeIterator<Item = T>,
    ) -> Vec<T> {
        let before = vec_bytes(&memory);
        memory.truncate(array.len());
        memory.iter_mut().zip(array).for_each(|(place, value)| *place = value);
        memory.shrink_to_fit();
        if vec_bytes(&memory) < before {
            self.hold(vec_bytes(&memory));
            self.release(before);
        }
        memory
    }

    /// The most bytes held at once so far.
    pub(crate) fn most(&self) -> usize {
        self.most
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_peak_outlives_what_made_it() {
        let mut peak = Peak::default();
        let kept = peak.held(vec![0_u32; 10]);
        let gone = peak.held(Vec::<u64>::with_capacity(5));
        peak.drop(gone);
        peak.hold(8);
        assert_eq!((peak.most(), peak.now), (80, 48));
        let account = array_bytes("ten", &kept, 3);
        assert_eq!((account.bytes, account.retired), (40, 12));
    }
}
