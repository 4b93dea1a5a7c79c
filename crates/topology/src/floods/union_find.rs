//! Disjoint sets of numbers, whose least member stands for each.
//!
//! Source: B. A. Galler, M. J. Fischer, *An improved equivalence algorithm*, CACM 7 (1964), with
//! path halving: R. E. Tarjan, J. van Leeuwen, *Worst-case analysis of set union algorithms*,
//! JACM 31 (1984) (both from memory). Linking to the least member instead of by rank keeps parents
//! below their children, so that one ascending pass numbers the sets.

/// Disjoint sets over `0..n`.
#[derive(Clone, Debug, Default)]
pub(crate) struct UnionFind {
    parents: Vec<u32>,
}

impl UnionFind {
    /// `count` sets of one member each; memory is used again.
    pub(crate) fn reset(&mut self, count: usize) {
        self.parents.clear();
        self.parents.extend(0..count as u32);
    }

    /// `count` sets of one member each.
    pub(crate) fn new(count: usize) -> Self {
        let mut sets = Self::default();
        sets.reset(count);
        sets
    }

    /// The least member of `a`'s set.
    #[inline(always)]
    pub(crate) fn find(&mut self, mut a: u32) -> u32 {
        loop {
            let parent = self.parents[a as usize];
            if parent == a {
                return a;
            }
            let above = self.parents[parent as usize];
            self.parents[a as usize] = above;
            a = above;
        }
    }

    /// Makes one set of `a`'s and `b`'s.
    #[inline(always)]
    pub(crate) fn union(&mut self, a: u32, b: u32) {
        let (a, b) = (self.find(a), self.find(b));
        if a != b {
            self.parents[a.max(b) as usize] = a.min(b);
        }
    }

    /// The parents, each at most its child: an ascending pass meets every root before its set.
    pub(crate) fn parents(&self) -> &[u32] {
        &self.parents
    }
}
