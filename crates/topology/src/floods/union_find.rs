//! Disjoint sets of numbers, whose least member stands for each.
//!
//! Source: Rem's algorithm, in E. W. Dijkstra, *A Discipline of Programming*, 1976, with splicing:
//! M. M. A. Patwary, J. Blair, F. Manne, *Experiments on union-find algorithms for the
//! disjoint-set data structure*, SEA 2010 (both from memory). Parents are never above their
//! children, so that one ascending pass numbers the sets.

/// Disjoint sets over `0..n`.
#[derive(Clone, Debug, Default)]
pub(crate) struct UnionFind {
    parents: Vec<u32>,
}

impl UnionFind {
    /// `count` sets of one member each.
    pub(crate) fn new(count: usize) -> Self {
        Self::within(Vec::new(), count)
    }

    /// The same, in memory that is at hand.
    pub(crate) fn within(mut parents: Vec<u32>, count: usize) -> Self {
        parents.clear();
        parents.extend(0..count as u32);
        Self { parents }
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
    pub(crate) fn union(&mut self, mut a: u32, mut b: u32) {
        let parents = &mut self.parents[..];
        let (mut above_a, mut above_b) = (parents[a as usize], parents[b as usize]);
        while above_a != above_b {
            if above_a < above_b {
                (a, b) = (b, a);
                (above_a, above_b) = (above_b, above_a);
            }
            parents[a as usize] = above_b;
            if a == above_a {
                return;
            }
            a = above_a;
            above_a = parents[a as usize];
        }
    }

    /// Joins `a`, which nothing was joined to yet, with `others`, none of which is above it.
    #[inline(always)]
    pub(crate) fn join_below<const N: usize>(&mut self, a: u32, others: [u32; N]) {
        let parents = others.map(|other| self.parents[other as usize]);
        let least = parents.iter().fold(a, |least, &parent| least.min(parent));
        self.parents[a as usize] = least;
        for i in 0..N {
            // Where the parent is `a`, it is `a` itself that was given.
            if parents[i] != least && parents[i] != a {
                self.union(a, others[i]);
            }
        }
    }

    /// The parents, each at most its child: an ascending pass meets every root before its set.
    pub(crate) fn parents(&self) -> &[u32] {
        &self.parents
    }

    /// The parents, taken over.
    pub(crate) fn into_parents(self) -> Vec<u32> {
        self.parents
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn sets_are_those_of_a_plain_relabelling() {
        let mut state = 1_u32;
        let mut random = move |n: u32| {
            state = state.wrapping_mul(1_664_525).wrapping_add(1_013_904_223);
            (state >> 8) % n
        };
        for pairs in 0..60 {
            let mut sets = UnionFind::new(40);
            let mut labels: Vec<u32> = (0..40).collect();
            for _ in 0..pairs {
                let (a, b) = (random(40), random(40));
                sets.union(a, b);
                let (from, to) = (labels[a as usize], labels[b as usize]);
                let (from, to) = (from.max(to), from.min(to));
                labels.iter_mut().filter(|l| **l == from).for_each(|l| *l = to);
            }
            assert!((0..40).all(|i| sets.find(i) == labels[i as usize]));
            assert!(sets.parents().iter().zip(0..).all(|(&parent, i)| parent <= i));
        }
    }
}
