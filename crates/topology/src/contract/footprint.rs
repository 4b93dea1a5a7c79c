//! What a kernel holds on the heap.

/// The heap bytes of one array of a kernel.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct ArrayBytes {
    /// What it holds, in a word or two.
    pub name: &'static str,
    /// Every byte allocated for it, spare capacity and retired slots included.
    pub bytes: usize,
    /// Of these, the bytes of retired slots.
    pub retired: usize,
}

/// Exactly what a kernel holds on the heap, array by array, and what assembling it took.
///
/// ```
/// use merestone_topology::{ArrayBytes, Footprint};
/// let links = ArrayBytes { name: "links", bytes: 96, retired: 12 };
/// let footprint = Footprint { arrays: vec![links], assembly_peak: 200 };
/// assert_eq!((footprint.bytes(), footprint.retired()), (96, 12));
/// ```
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Footprint {
    /// The arrays, in a fixed order.
    pub arrays: Vec<ArrayBytes>,
    /// The most heap bytes held at once while the kernel was assembled, its own arrays included;
    /// the caller's face list is not.
    pub assembly_peak: usize,
}

impl Footprint {
    /// All heap bytes.
    #[must_use]
    pub fn bytes(&self) -> usize {
        self.arrays.iter().map(|array| array.bytes).sum()
    }

    /// The bytes of retired slots.
    #[must_use]
    pub fn retired(&self) -> usize {
        self.arrays.iter().map(|array| array.retired).sum()
    }
}
