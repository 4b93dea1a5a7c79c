//! The first stride: every use meets its partner in the bucket of one of its vertices.

use super::{Corners, Links, Marks, Paired};

/// Buckets above this many uses are sorted instead of searched, so that a hub costs n log n.
const SEARCHED: u32 = 16;

/// A filed use: the other vertex (31 bits), whether it runs down to the bucket's vertex, whether
/// it has met its partner, and its number (31 bits), from the top.
#[derive(Clone, Copy)]
struct Filed(u64);

impl Filed {
    const MET: u64 = 1 << 31;
    const DOWN: u64 = 1 << 32;

    #[inline(always)]
    fn new(high: u32, down: bool, number: u32) -> Self {
        Self(u64::from(high) << 33 | if down { Self::DOWN } else { 0 } | u64::from(number))
    }

    #[inline(always)]
    fn high(self) -> u32 {
        (self.0 >> 33) as u32
    }

    #[inline(always)]
    fn number(self) -> u32 {
        self.0 as u32 & (u32::MAX >> 1)
    }

    #[inline(always)]
    fn down(self) -> bool {
        self.0 & Self::DOWN != 0
    }

    #[inline(always)]
    fn met(self) -> bool {
        self.0 & Self::MET != 0
    }
}

/// A bucket: where it begins, and how much of it is filled.
#[derive(Clone, Copy)]
struct Bucket {
    begin: u32,
    filled: u32,
}

/// Links every plain edge, marks both ends of every other, and returns a corner of every vertex.
///
/// Uses are filed under the lower of their two vertices, so one look into one bucket finds the
/// partner whichever way it runs. O(uses) expected; a bucket of c uses costs O(c log c) at worst.
pub(super) fn pair<C: Corners>(
    corners: C,
    vertex_count: usize,
    links: &mut impl Links,
    marks: &mut Marks,
    paired: &mut Paired,
) -> Vec<u32> {
    let mut buckets = vec![Bucket { begin: 0, filled: 0 }; vertex_count + 1];
    corners.for_each_use(|_, a, b| buckets[a.min(b) as usize].filled += 1);
    let mut sum = 0;
    let mut hubs = false;
    for bucket in &mut buckets {
        hubs |= bucket.filled > SEARCHED;
        bucket.begin = sum;
        sum += bucket.filled;
        bucket.filled = 0;
    }
    let mut filed = vec![Filed(0); corners.count()];
    let mut handles = vec![u32::MAX; vertex_count];
    paired.held(
        size_of_val(&buckets[..])
            + size_of_val(&filed[..])
            + size_of_val(&handles[..])
            + marks.bytes(),
    );

    let mut alone = 0;
    corners.for_each_use(|number, a, b| {
        // The first corner stays: sectors are numbered and handled by their lowest corner.
        let handle = &mut handles[a as usize];
        *handle = (*handle).min(number);
        let (low, high) = (a.min(b), a.max(b));
        let Bucket { begin, filled } = buckets[low as usize];
        if hubs && buckets[low as usize + 1].begin - begin > SEARCHED {
            filed[(begin + filled) as usize] = Filed::new(high, a > b, number);
            buckets[low as usize].filled = filled + 1;
            return;
        }
        let bucket = &mut filed[begin as usize..(begin + filled + 1) as usize];
        if let Some(partner) = bucket[..filled as usize].iter_mut().find(|p| p.high() == high) {
            if !partner.met() && partner.down() != (a > b) && a != b {
                links.plain(partner.number(), number);
                alone -= 1;
            } else {
                marks.mark(low);
                marks.mark(high);
                alone -= usize::from(!partner.met());
            }
            partner.0 |= Filed::MET;
        } else {
            bucket[filled as usize] = Filed::new(high, a > b, number);
            buckets[low as usize].filled = filled + 1;
            alone += 1;
            paired.edges += 1;
        }
    });

    if hubs {
        pair_hubs(&mut filed, &buckets, links, marks, paired);
    }
    if alone > 0 {
        mark_boundaries(&filed, &buckets, marks);
    }
    paired.held(
        size_of_val(&buckets[..])
            + size_of_val(&filed[..])
            + size_of_val(&handles[..])
            + marks.bytes(),
    );
    handles
}

/// Pairs what the large buckets hold, by sorting them.
#[cold]
fn pair_hubs(
    filed: &mut [Filed],
    buckets: &[Bucket],
    links: &mut impl Links,
    marks: &mut Marks,
    paired: &mut Paired,
) {
    for (low, pair) in buckets.windows(2).enumerate() {
        if pair[1].begin - pair[0].begin <= SEARCHED {
            continue;
        }
        let bucket = &mut filed[pair[0].begin as usize..pair[1].begin as usize];
        bucket.sort_unstable_by_key(|f| (f.high(), f.number()));
        for uses in bucket.chunk_by(|f, g| f.high() == g.high()) {
            paired.edges += 1;
            match uses {
                [f, g] if f.down() != g.down() && f.high() != low as u32 => {
                    links.plain(f.number(), g.number());
                }
                _ => {
                    marks.mark(low as u32);
                    marks.mark(uses[0].high());
                }
            }
        }
    }
}

/// Marks the ends of the edges whose only use met nobody.
#[cold]
fn mark_boundaries(filed: &[Filed], buckets: &[Bucket], marks: &mut Marks) {
    for (low, pair) in buckets.windows(2).enumerate() {
        if pair[1].begin - pair[0].begin > SEARCHED {
            continue;
        }
        let begin = pair[0].begin as usize;
        for f in &filed[begin..begin + pair[0].filled as usize] {
            if !f.met() {
                marks.mark(low as u32);
                marks.mark(f.high());
            }
        }
    }
}
